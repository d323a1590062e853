/// The periodic state of a network with rectifiers, and how it gets there after switching on.
#pragma once

#include <turnwright/supply/network.hpp>
#include <turnwright/supply/state.hpp>

namespace turnwright::supply {

struct grid {
  int steps = 192;  ///< in a mains cycle, a multiple of 4
  bool curves = false;
};

/// The periodic state itself, by shooting: two-stage L-stable steps, Newton with the monodromy of a coarse grid,
/// chord iterations on the fine one. The cost does not depend on the slowest time constant. It always ends: `settled`
/// and `residual_ratio` say how well. Throws std::logic_error for a network that is no circuit (a rail without nodes,
/// a port that does not exist).
/// Source: T. J. Aprille and T. N. Trick, steady-state analysis of nonlinear circuits with periodic inputs, Proc. IEEE
/// 60, 1972 (memory); R. Alexander, diagonally implicit Runge-Kutta methods, SIAM J. Numer. Anal. 14, 1977 (memory).
/// Checked: tests/supply/.
state solve_periodic(const network& net, const grid& g = {});

/// Switching on with every capacitor empty, constant-current loads absent (valves cold), resistances there.
struct surge_state {
  std::vector<std::vector<volts_peak>> highest;  ///< of each node of each rail, as if positive
  std::vector<amperes_peak> diode_peak;          ///< of each rail, switched on at the crest of the mains
};
/// Highest volts and charging current after switching on: the transient itself for `how_long`, and the settled cold
/// state, whichever is more. Throws like `solve_periodic`.
surge_state switch_on(const network& net, seconds how_long, const grid& g = {96, false});

/// The network without its constant-current loads: valves cold.
network cold(network net);

}  // namespace turnwright::supply
