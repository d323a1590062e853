/// Quantities as JSON numbers. Private to the job layer.
#pragma once

#include <turnwright/measure/stated.hpp>
#include <turnwright/measure/turns.hpp>
#include <turnwright/measure/written.hpp>

#include <nlohmann/json.hpp>

#include <cmath>
#include <stdexcept>

namespace turnwright::job_detail {

using json = nlohmann::ordered_json;

/// A figure with nine significant digits, the same from every compiler. A figure that is not finite is our own fault.
inline double figure(double x) {
  if (!std::isfinite(x)) throw std::logic_error("a figure of the result is not finite");
  return rounded_to(x, 9);
}
template <class Unit>
double figure(const units::quantity<Unit, double>& q) {
  return figure(plain(q));
}
template <class Manner, class Q>
double figure(const stated<Manner, Q>& s) {
  return figure(s.plain());
}
/// Millimetres.
inline double in_mm(const metres& l) { return figure(plain(l) * 1e3); }
/// Square millimetres.
inline double in_mm2(const square_metres& a) { return figure(plain(a) * 1e6); }
/// Amperes per square millimetre.
inline double in_a_per_mm2(const amperes_per_square_metre& j) { return figure(plain(j) * 1e-6); }
/// Degrees Celsius.
inline double in_degrees(const temperature& t) { return figure(in_celsius(t)); }

/// A JSON text with a newline at its end.
inline std::string text_of(const json& j) { return j.dump(1) + "\n"; }

}  // namespace turnwright::job_detail
