/// Constants of nature that more than one layer needs.
#pragma once

#include <numbers>

namespace turnwright {

/// Magnetic constant [H/m]: 4 pi 1e-7, within 1e-9 of the measured one. For numeric kernels. Source: SI before 2019
/// (exact).
inline constexpr double mu0_H_per_m = 4e-7 * std::numbers::pi;

}  // namespace turnwright
