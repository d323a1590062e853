#include <turnwright/measure/written.hpp>

#include <array>
#include <charconv>
#include <cmath>
#include <cstdlib>

#include <turnwright/measure/read.hpp>
#include <turnwright/measure/unit_list.hpp>

namespace turnwright {
namespace {

using measure_detail::prefix_list;
using measure_detail::unit_entry;
using measure_detail::unit_list;

std::string in_chars(double x, std::chars_format format, int precision) {
  std::array<char, 512> room{};
  const auto done = precision < 0 ? std::to_chars(room.data(), room.data() + room.size(), x, format)
                                  : std::to_chars(room.data(), room.data() + room.size(), x, format, precision);
  return {room.data(), done.ptr};
}

struct decimal {
  bool negative = false;
  std::string digits;  // d1 d2 ... , value = 0.d1d2... x 10^exponent
  int exponent = 0;
};

decimal parts(const std::string& scientific) {
  decimal d;
  std::size_t i = 0;
  if (scientific[0] == '-') {
    d.negative = true;
    i = 1;
  }
  const std::size_t e = scientific.find('e');
  for (; i < e; ++i) {
    if (scientific[i] != '.') d.digits += scientific[i];
  }
  d.exponent = std::atoi(scientific.c_str() + e + 1) + 1;
  return d;
}

// The decimal with its point moved, written without an exponent.
std::string plain_text(const decimal& d, int shift, bool keep_zeros) {
  std::string digits = d.digits;
  if (!keep_zeros) {
    while (digits.size() > 1 && digits.back() == '0') digits.pop_back();
  }
  const int point = d.exponent + shift;
  std::string text = d.negative ? "-" : "";
  if (point <= 0) {
    text += "0." + std::string(static_cast<std::size_t>(-point), '0') + digits;
  } else if (static_cast<std::size_t>(point) >= digits.size()) {
    text += digits + std::string(static_cast<std::size_t>(point) - digits.size(), '0');
  } else {
    text += digits.substr(0, static_cast<std::size_t>(point)) + "." + digits.substr(static_cast<std::size_t>(point));
  }
  return text;
}

const unit_entry& preferred(kind k) {
  for (const unit_entry& u : unit_list()) {
    if (u.of == k) return u;
  }
  std::abort();  // every kind has a unit in the list
}

// The shop's habit: lengths in mm, areas in mm2, densities of current in A/mm2, masses in kg.
struct habit {
  std::string_view unit;
  int decimal;
};
habit fixed_habit(kind k) {
  switch (k) {
    case kind::length:
      return {"mm", -3};
    case kind::area:
      return {"mm2", -6};
    case kind::current_density:
      return {"A/mm2", 6};
    case kind::mass:
      return {"kg", 0};
    case kind::ratio:
      return {"%", -2};
    case kind::temperature_point:
      return {"degC", 0};
    case kind::temperature_rise:
      return {"K", 0};
    case kind::frequency:
      return {"Hz", 0};
    case kind::voltage:
      return {"V", 0};
    case kind::per_mass:
      return {"/kg", 0};
    case kind::specific_loss:
      return {"W/kg", 0};
    case kind::flux_density:
      return {"T", 0};
    default:
      return {"", 0};
  }
}

std::string with_unit(const decimal& d, kind k, bool keep_zeros, bool zero) {
  const habit h = fixed_habit(k);
  const std::string gap = k == kind::per_mass ? " " : " ";
  if (!h.unit.empty()) return plain_text(d, -h.decimal, keep_zeros) + gap + std::string(h.unit);
  const unit_entry& u = preferred(k);
  std::string_view prefix;
  int power = 0;
  if (u.prefixed && !zero) {
    const int leading = d.exponent - 1 - u.decimal;  // power of ten of the first digit
    const int wanted = leading >= 0 ? leading / 3 * 3 : -((-leading + 2) / 3) * 3;
    for (const auto& p : prefix_list()) {
      const bool nearer = std::abs(p.decimal - wanted) < std::abs(power - wanted);
      if (nearer) {
        power = p.decimal;
        prefix = p.symbol;
      }
    }
  }
  return plain_text(d, -(u.decimal + power), keep_zeros) + gap + std::string(prefix) + std::string(u.symbol);
}

}  // namespace

std::string written_plain(double si, kind k) {
  if (k == kind::temperature_point) {  // an offset stands between text and store: take the fewest digits that come back
    for (int digits = 0; digits < 14; ++digits) {
      const std::string text = fixed(si, digits) + " degC";
      const auto again = read<temperature>(text);
      if (again.value && again.value->value() == celsius(si).value()) return text;
    }
  }
  return with_unit(parts(in_chars(si, std::chars_format::scientific, -1)), k, false, si == 0);
}

std::string shown_plain(double si, kind k, int digits) {
  if (k == kind::temperature_point) return fixed(si, 0) + " degC";
  const std::string scientific = in_chars(si, std::chars_format::scientific, digits - 1);
  return with_unit(parts(scientific), k, true, si == 0);
}

std::string fixed(double x, int decimals) {
  const std::string text = in_chars(x, std::chars_format::fixed, decimals);
  const bool negative_zero = text.front() == '-' && text.find_first_not_of("-0.") == std::string::npos;
  return negative_zero ? text.substr(1) : text;
}

std::string percent(double ratio, int decimals) { return fixed(100 * ratio, decimals) + " %"; }

std::string signed_percent(double ratio) { return (ratio >= 0 ? "+" : "") + percent(ratio); }

std::string shortest(double x) {
  std::array<char, 64> room{};
  return {room.data(), std::to_chars(room.data(), room.data() + room.size(), x).ptr};
}

double rounded_to(double x, int digits) {
  const std::string text = in_chars(x, std::chars_format::scientific, digits - 1);
  double value = x;
  std::from_chars(text.data(), text.data() + text.size(), value);
  return value;
}

}  // namespace turnwright
