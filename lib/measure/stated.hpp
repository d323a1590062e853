/// Volts and amperes that say whether they are r.m.s., peak or direct: one dimension, three manners, never mixed.
#pragma once

#include <turnwright/measure/quantity.hpp>

#include <numbers>

namespace turnwright {

/// A quantity with its manner. No arithmetic: crossing over is a named function with its assumption. It holds a double
/// and hands out the quantity, which keeps it trivially copyable.
template <class Manner, class Quantity>
class stated {
 public:
  constexpr stated() = default;
  constexpr explicit stated(const Quantity& q) : si_(q.value()) {}
  /// The quantity without its manner.
  constexpr Quantity plain() const { return Quantity::from_value(si_); }
  friend constexpr auto operator<=>(const stated&, const stated&) = default;

 private:
  double si_ = 0.0;
};

struct rms_manner {};
struct peak_manner {};
struct dc_manner {};

using volts_rms = stated<rms_manner, volts>;
using volts_peak = stated<peak_manner, volts>;
using volts_dc = stated<dc_manner, volts>;
using amperes_rms = stated<rms_manner, amperes>;
using amperes_peak = stated<peak_manner, amperes>;
using amperes_dc = stated<dc_manner, amperes>;

/// Peak of a sine wave of the given r.m.s. volts.
constexpr volts_peak peak_of_sine(volts_rms v) { return volts_peak{v.plain() * std::numbers::sqrt2}; }

/// Product of r.m.s. volts and r.m.s. amperes, whatever their phase.
constexpr volt_amperes apparent_power(volts_rms v, amperes_rms a) {
  return as<volt_amperes>(turnwright::plain(v.plain()) * turnwright::plain(a.plain()));
}

}  // namespace turnwright
