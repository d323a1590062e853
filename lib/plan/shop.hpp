/// Everything the shop has on paper: the books built from the tables.
#pragma once

#include <turnwright/insulation/practice.hpp>
#include <turnwright/iron/lamination.hpp>
#include <turnwright/iron/steel.hpp>
#include <turnwright/valve/valve_book.hpp>
#include <turnwright/wire/gauge.hpp>

namespace turnwright {

struct shop {
  /// Builds all books. Throws `refused` with the faults of the first table that has any.
  explicit shop(const catalogue& tables)
      : wire(tables), patterns(tables), steels(tables), insulation(tables), valves(tables) {}

  wire_book wire;
  pattern_book patterns;
  steel_book steels;
  insulation_book insulation;
  valve_book valves;
};

}  // namespace turnwright
