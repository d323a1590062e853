/// Positions of the mains selector and what each does with the primary.
#pragma once

#include <turnwright/plan/demand.hpp>
#include <turnwright/winding/coil.hpp>

#include <vector>

namespace turnwright {

/// One position: which tap of which winding, and how the windings are linked.
struct selector_position {
  volts at;
  std::size_t tap_a = 0;
  std::optional<std::size_t> tap_b;  ///< present where there are two windings
  bool series = false;
};

/// All positions, lowest volts first. Two windings: each tap in parallel, each pair of taps in series.
std::vector<selector_position> selector_positions(const primary_wish& p);

/// The position of the nominal mains. Throws std::logic_error where `on` fits none (the job's reader refuses that).
selector_position nominal_position(const primary_wish& p);
/// Whether any position fits `on`.
bool has_nominal_position(const primary_wish& p);

/// Turns of every tap from the start.
using tap_turns = std::vector<turns>;

/// Turns in use at a position.
turns turns_in_use(const selector_position& s, const tap_turns& taps);

/// How the line current parts between the windings, and the resistance it meets.
struct primary_share {
  double a = 1.0, b = 0.0;  ///< of the line current
  ohms resistance;
};
primary_share share_of(const selector_position& s, ohms resistance_a, ohms resistance_b);

/// Which end goes to which, in words for the link table.
std::string links_of(const selector_position& s, const primary_wish& p);

}  // namespace turnwright
