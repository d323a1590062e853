/// Text to quantity: "120 mA", "1-1/4 in", "13 kG", "700 cmil/A".
#pragma once

#include <turnwright/measure/kind.hpp>

#include <optional>
#include <string>
#include <string_view>

namespace turnwright {

/// Why a text is not the quantity that was wanted.
struct misread {
  enum class why { empty, no_number, bare_number, unknown_unit, other_kind, not_finite } reason = why::empty;
  kind wanted = kind::ratio;
  std::optional<kind> found;  ///< for other_kind
  std::string unit;           ///< the unit as written, for unknown_unit
};

/// A value in SI units (degrees Celsius for a point of temperature), or why there is none.
struct plain_reading {
  std::optional<double> si;
  misread fault;
};

/// Reads a text of the wanted kind. Never throws.
plain_reading read_plain(std::string_view text, kind wanted);

/// The number at the head of a text, with fractions ("1-1/4", "9/16") and a decimal exponent of ten added exactly.
/// Moves `text` past it; empty when there is none.
std::optional<double> take_number(std::string_view& text, int decimal_exponent = 0);

/// A quantity, or why there is none.
template <class Q>
struct reading {
  std::optional<Q> value;
  misread fault;
};

/// Reads a text as a quantity of type Q. Never throws.
template <class Q>
reading<Q> read(std::string_view text) {
  const plain_reading r = read_plain(text, kind_of<Q>::value);
  if (!r.si) return {std::nullopt, r.fault};
  return {as<Q>(*r.si), {}};
}
template <>
inline reading<temperature> read<temperature>(std::string_view text) {
  const plain_reading r = read_plain(text, kind::temperature_point);
  if (!r.si) return {std::nullopt, r.fault};
  return {celsius(*r.si), {}};
}
template <>
inline reading<ratio> read<ratio>(std::string_view text) {
  const plain_reading r = read_plain(text, kind::ratio);
  if (!r.si) return {std::nullopt, r.fault};
  return {ratio{*r.si}, {}};
}

}  // namespace turnwright
