/// A network in plain doubles of SI units, with its nodes and states numbered. Private to the supply layer.
#pragma once

#include <turnwright/supply/network.hpp>

#include <vector>

namespace turnwright::supply::kernel {

inline constexpr int ground = -1;
/// Conductance across every diode, so that a floating winding has a defined potential [S].
inline constexpr double leak = 1e-9;

enum class law { line, three_halves, exponential };

/// The law of a diode's junction; what is linear in series with it stands in `series`.
struct junction {
  law kind;
  double threshold;  // below it the diode is off [V]
  double a, b;       // line: slope 1/r; three_halves: k; exponential: saturation current, n kT/q
  double off;        // exponential: its law at the threshold, which counts as nothing [A]: a law with a step there may
                     // have no solution
  double own_r;      // of an exponential diode, part of `series` [ohm]
  double series;     // in series, resistor and own_r [ohm]
  double halves;     // diodes that this one stands for: 2 in a bridge
};

struct incidence {  // volts across = sum of c x node volts
  int node[3];
  double c[3];
  int count;
};

struct si_port {
  double n, load_g;
  int hot, ret, current;  // node, node, state of the current or -1
  int inside;             // -1 where in none
};
struct si_capacitor {
  int top, bottom, volts_state;
  double c, esr;
};
struct si_choke {
  int from, to, current_state;
  double l, r;
};
struct si_link {
  int from, to;
  double g;
};
struct si_diode {
  incidence across;
  junction j;
};
/// Where a node of a rail stands in the circuit; -1 for what is not there.
struct si_node {
  int at;
  double sink, load_g;
  std::vector<int> capacitors;
  int choke, link;
};
struct si_rail {
  std::vector<si_node> nodes;
  std::vector<int> diodes;
  int first_port;
  double ripple_per_cycle;
};

struct elements {
  double mains_peak, omega, source_r, r1, l1, lm, core_g;  // lm, l1: 0 where there is none
  std::vector<si_port> ports;
  std::vector<double> r, l;  // ports x ports at the ports' own turns
  std::vector<si_capacitor> capacitors;
  std::vector<si_choke> chokes;
  std::vector<si_link> links;  // resistors in rails
  std::vector<si_diode> diodes;
  std::vector<si_rail> rails;
  int nodes = 1;  // node 0 is p
  int states = 0;
  int line_current = -1, magnetising = -1;  // states
  std::vector<double> start;                // a first guess of all states
  std::vector<double> scale;                // what a state is measured against
  std::vector<double> weight;               // energy: C or L of each state

  double cycle() const;  // length of a mains cycle [s]
};

/// Numbers the circuit and guesses its state. Throws std::logic_error for one that is no circuit.
elements elements_of(const network& net);

}  // namespace turnwright::supply::kernel
