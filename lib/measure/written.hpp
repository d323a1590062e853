/// Quantity to text: exact, for files that are read again; and rounded, for people.
#pragma once

#include <turnwright/measure/kind.hpp>

#include <string>
#include <string_view>

namespace turnwright {

/// Text of a quantity with an engineering prefix, such that reading it gives the same double again.
std::string written_plain(double si, kind k);

template <class Q>
std::string written(const Q& q) {
  return written_plain(plain(q), kind_of<Q>::value);
}
template <>
inline std::string written<temperature>(const temperature& t) {
  return written_plain(in_celsius(t), kind::temperature_point);
}
template <>
inline std::string written<ratio>(const ratio& r) {
  return written_plain(r.value, kind::ratio);
}

/// Text of a quantity for a report: engineering prefix, `digits` significant figures, such as "35.2 mohm".
std::string shown_plain(double si, kind k, int digits = 3);

template <class Q>
std::string shown(const Q& q, int digits = 3) {
  return shown_plain(plain(q), kind_of<Q>::value, digits);
}
template <>
inline std::string shown<temperature>(const temperature& t, int digits) {
  return shown_plain(in_celsius(t), kind::temperature_point, digits);
}

/// A number with a fixed count of decimals, such as "12.50".
std::string fixed(double x, int decimals);

/// A ratio in per cent, such as "12.5 %"; with its sign, such as "+2.5 %".
std::string percent(double ratio, int decimals = 1);
std::string signed_percent(double ratio);

/// The shortest text that reads back as exactly x.
std::string shortest(double x);

/// x rounded to that many significant figures, halves to even digits of its shortest text.
double rounded_to(double x, int digits);

}  // namespace turnwright
