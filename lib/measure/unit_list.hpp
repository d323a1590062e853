/// The units that may be written in a file, shared by reading and writing.
#pragma once

#include <turnwright/measure/kind.hpp>

#include <span>
#include <string_view>

namespace turnwright::measure_detail {

struct unit_entry {
  std::string_view symbol;
  kind of;
  int decimal = 0;          ///< power of ten to the SI unit, applied exactly
  double factor = 1.0;      ///< further factor to the SI unit
  bool prefixed = false;    ///< takes SI prefixes
  bool reciprocal = false;  ///< SI value is factor / number
};

/// All units, the preferred one of each kind first.
std::span<const unit_entry> unit_list();

struct prefix_entry {
  std::string_view symbol;
  int decimal;
};

/// SI prefixes p to G, with both spellings of micro; preferred spelling first.
std::span<const prefix_entry> prefix_list();

}  // namespace turnwright::measure_detail
