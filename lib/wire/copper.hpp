/// Constants of annealed copper.
#pragma once

#include <turnwright/measure/literals.hpp>

namespace turnwright::copper {

using namespace turnwright::literals;

/// Resistivity at 20 degC. Source: IEC 60028 (1925), 58 MS/m (read).
inline constexpr ohm_metres resistivity_20 = as<ohm_metres>(1e-6 / 58);
/// Density. Source: mass resistivity 0.15328 ohm g/m2 over volume resistivity 0.017241 ohm mm2/m (K. C. Agrawal,
/// Industrial Power Engineering and Applications Handbook, p. 970, read).
inline constexpr kilograms_per_cubic_metre density = 8890_kg_per_m3;
/// Inferred temperature of no resistance, below zero Celsius. Source: heating test by change of resistance (read); 1 /
/// 0.00393 - 20 is 234.45.
inline constexpr double inferred_zero_C = 234.5;

/// Resistance at a temperature over resistance at 20 degC: (234.5 + T) / 254.5. Holds for 0 to 200 degC.
/// Source: heating test by change of resistance, 234.5 + T (read in a text following IEC 61558-1). Checked:
/// tests/wire/gauge.cpp.
inline double over_20(temperature t) { return (inferred_zero_C + in_celsius(t)) / (inferred_zero_C + 20.0); }

}  // namespace turnwright::copper
