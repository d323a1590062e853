/// Pieces of text that several reports share. Private to the sheet layer.
#pragma once

#include <turnwright/measure/written.hpp>
#include <turnwright/remark/remark.hpp>
#include <turnwright/sheet/columns.hpp>

namespace turnwright::sheet_detail {

/// A number with so many significant digits.
inline std::string number(double x, int digits) { return shortest(rounded_to(x, digits)); }

/// A check as lines: its level, what was compared, and the cure.
inline std::string check_lines(const check& c) {
  std::string word(word_of(c.weight));
  if (c.weight == level::stop) word = "STOP";
  if (c.weight == level::caution) word = "CAUTION";
  word.resize(8, ' ');
  std::string out = wrapped(c.code + ": " + c.text + "; found " + c.found + ", bound " + c.bound, "  " + word + " ");
  if (!c.cure.empty()) out += wrapped("cure: " + c.cure, "           ");
  return out;
}

}  // namespace turnwright::sheet_detail
