#include <turnwright/measure/read.hpp>

#include <algorithm>
#include <charconv>
#include <cmath>

#include <turnwright/measure/unit_list.hpp>

namespace turnwright {
namespace {

using measure_detail::prefix_list;
using measure_detail::unit_entry;
using measure_detail::unit_list;

bool digit(char c) { return c >= '0' && c <= '9'; }

std::string_view trimmed(std::string_view s) {
  while (!s.empty() && (s.front() == ' ' || s.front() == '\t')) s.remove_prefix(1);
  while (!s.empty() && (s.back() == ' ' || s.back() == '\t')) s.remove_suffix(1);
  return s;
}

// The decimal number at the head of s: optional sign, digits with a point, optional exponent. Length 0 when none.
std::size_t decimal_length(std::string_view s) {
  std::size_t i = 0;
  if (i < s.size() && (s[i] == '+' || s[i] == '-')) ++i;
  std::size_t digits = 0;
  for (; i < s.size() && digit(s[i]); ++i) ++digits;
  if (i < s.size() && s[i] == '.') {
    ++i;
    for (; i < s.size() && digit(s[i]); ++i) ++digits;
  }
  if (digits == 0) return 0;
  if (i < s.size() && (s[i] == 'e' || s[i] == 'E')) {
    std::size_t j = i + 1;
    if (j < s.size() && (s[j] == '+' || s[j] == '-')) ++j;
    if (j < s.size() && digit(s[j])) {
      while (j < s.size() && digit(s[j])) ++j;
      i = j;
    }
  }
  return i;
}

// Value of a decimal text with its exponent raised by `decimal`: one correct rounding, so "120 mA" is 0.120 exactly.
std::optional<double> decimal_value(std::string_view s, int decimal) {
  if (!s.empty() && s.front() == '+') s.remove_prefix(1);
  std::string text(s);
  const std::size_t e = text.find_first_of("eE");
  long exponent = decimal;
  if (e != std::string::npos) {
    long written = 0;
    const char* from = text.data() + e + 1 + (text[e + 1] == '+' ? 1 : 0);
    if (std::from_chars(from, text.data() + text.size(), written).ec != std::errc{}) return std::nullopt;
    written = std::clamp(written, -100000L, 100000L);  // far beyond any double, and safe to add to
    exponent += written;
    text.erase(e);
  }
  text += 'e' + std::to_string(exponent);
  double value = 0;
  const auto done = std::from_chars(text.data(), text.data() + text.size(), value);
  if (done.ec != std::errc{} || done.ptr != text.data() + text.size()) return std::nullopt;
  return value;
}

std::size_t digits_length(std::string_view s) {
  std::size_t i = 0;
  while (i < s.size() && digit(s[i])) ++i;
  return i;
}

// "9/16" at the head of s, with its length.
std::optional<std::pair<double, std::size_t>> fraction(std::string_view s) {
  const std::size_t top = digits_length(s);
  if (top == 0 || top > 6 || top >= s.size() || s[top] != '/') return std::nullopt;
  const std::size_t bottom = digits_length(s.substr(top + 1));
  if (bottom == 0 || bottom > 6) return std::nullopt;
  int over = 0, under = 0;
  std::from_chars(s.data(), s.data() + top, over);
  std::from_chars(s.data() + top + 1, s.data() + top + 1 + bottom, under);
  if (under == 0) return std::nullopt;
  return std::pair{static_cast<double>(over) / under, top + 1 + bottom};
}

struct unit_match {
  const unit_entry* unit;
  int decimal;
};

std::optional<unit_match> match_unit(std::string_view text) {
  for (const unit_entry& u : unit_list()) {
    if (u.symbol == text) return unit_match{&u, u.decimal};
  }
  for (const auto& p : prefix_list()) {
    if (!text.starts_with(p.symbol)) continue;
    const std::string_view rest = text.substr(p.symbol.size());
    for (const unit_entry& u : unit_list()) {
      if (u.prefixed && u.symbol == rest) return unit_match{&u, u.decimal + p.decimal};
    }
  }
  return std::nullopt;
}

plain_reading refused_as(misread::why reason, kind wanted) {
  return {std::nullopt, {reason, wanted, std::nullopt, {}}};
}

}  // namespace

std::optional<double> take_number(std::string_view& text, int decimal_exponent) {
  const std::string_view s = text;
  if (const auto f = fraction(s)) {
    text.remove_prefix(f->second);
    return f->first * std::pow(10.0, decimal_exponent);
  }
  const std::size_t length = decimal_length(s);
  if (length == 0) return std::nullopt;
  // "1-1/4" and "1 1/4": a whole number, then a fraction
  if (digits_length(s) == length && length < s.size() && (s[length] == '-' || s[length] == ' ')) {
    if (const auto f = fraction(s.substr(length + 1))) {
      const auto whole = decimal_value(s.substr(0, length), 0);
      text.remove_prefix(length + 1 + f->second);
      return (*whole + f->first) * std::pow(10.0, decimal_exponent);
    }
  }
  text.remove_prefix(length);
  return decimal_value(s.substr(0, length), decimal_exponent);
}

plain_reading read_plain(std::string_view text, kind wanted) {
  const std::string_view whole = trimmed(text);
  if (whole.empty()) return refused_as(misread::why::empty, wanted);
  std::string_view rest = whole;
  if (!take_number(rest)) {
    // a number was there but did not fit a double, or there was none at all
    const bool overflow = rest.size() != whole.size();
    return refused_as(overflow ? misread::why::not_finite : misread::why::no_number, wanted);
  }
  const std::string_view unit = trimmed(rest);
  if (unit.empty()) {
    return refused_as(misread::why::bare_number, wanted);
  }
  const auto match = match_unit(unit);
  if (!match) return {std::nullopt, {misread::why::unknown_unit, wanted, std::nullopt, std::string(unit)}};
  if (match->unit->of != wanted) {
    return {std::nullopt, {misread::why::other_kind, wanted, match->unit->of, std::string(unit)}};
  }
  std::string_view again = whole;
  const auto number = take_number(again, match->unit->reciprocal ? 0 : match->decimal);
  if (!number) return refused_as(misread::why::not_finite, wanted);
  const double si = match->unit->reciprocal ? match->unit->factor / *number : *number * match->unit->factor;
  if (!std::isfinite(si)) return refused_as(misread::why::not_finite, wanted);
  return {si, {}};
}

}  // namespace turnwright
