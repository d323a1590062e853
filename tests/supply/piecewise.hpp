/// A second solver, for diodes with a straight-line law: it shares nothing with the first but the description of the
/// circuit. Between two changes of a diode the circuit is linear and is carried on by matrix exponentials, exactly; the
/// instants of change are found by halving. Winding and diodes stand as they are wired: four diodes in a bridge, a
/// negative rail below earth, a tap as a part of its half.
///
/// Left out: leakage inductance, a second tap of one winding, and a choke that nothing but open diodes or other chokes
/// feed.
#pragma once

#include <turnwright/supply/network.hpp>

#include <vector>

namespace turnwright::testing {

struct exact_node {
  double mean, ripple;  ///< volts as if the rail were positive; ripple in r.m.s.
};
struct exact_state {
  std::vector<std::vector<exact_node>> rails;  ///< nodes of each rail
  std::vector<double> port_rms;                ///< current in each port's own load or rail [A]
  double line_rms;                             ///< in the primary [A]
  double residual;  ///< largest change of a state over a cycle, against the largest of its sort
};

/// Whether the second solver can do this network.
bool is_piecewise(const supply::network& net);
/// Its periodic state.
exact_state solve_piecewise(const supply::network& net);

}  // namespace turnwright::testing
