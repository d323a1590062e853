/// All windings of a transformer as one network under sine volts and resistive loads.
///
///   wall - source resistance - primary resistance - node p;  across p: magnetising branch and core loss;
///   on p every port in its exact turns ratio, through the leakage matrix and its own resistance, with its load
///
/// Every load shares the primary's drop: that is computed, not estimated.
#pragma once

#include <turnwright/measure/stated.hpp>
#include <turnwright/measure/turns.hpp>

#include <cstddef>
#include <optional>
#include <vector>

namespace turnwright::supply {

/// One loaded coil: a winding, a half of a centre-tapped one, or a tapped part of a half.
struct port {
  turns n;
  ohms resistance;           ///< of the whole port at working temperature
  std::optional<ohms> load;  ///< absent: open
  std::optional<std::size_t>
      inside;  ///< the port that contains this one: its current flows through this resistance too
};

struct sine_network {
  volts_rms mains;
  hertz frequency;
  ohms source_resistance;
  turns primary_turns;
  ohms primary_resistance;
  std::optional<ohms> core_loss_resistance;   ///< across p, referred to the primary
  std::optional<ohms> magnetising_reactance;  ///< across p, referred to the primary
  std::vector<port> ports;
  std::vector<henries> leakage;  ///< ports x ports, row by row, of each port against the primary, referred to its turns
};

struct port_state {
  volts_rms no_load;    ///< turns ratio times mains
  volts_rms on_load;    ///< at the terminals
  amperes_rms current;  ///< in the port's own load; with `inside` the shared part carries more
  watts load;
};

struct sine_state {
  std::vector<port_state> ports;
  amperes_rms primary_current;
  volts_rms terminal;     ///< at the primary's terminals, behind the source resistance
  volts_rms emf;          ///< across p
  watts input;            ///< into the primary's terminals
  volt_amperes apparent;  ///< at the primary's terminals
  watts primary_copper;
  std::vector<watts>
      copper;  ///< per port; what a shared part loses is divided by the currents' shares, and the sum is right
  std::vector<amperes_rms>
      shared_current;  ///< per port: current at the far end of a tap's part, with all that flows there
  watts core;
  watts output;
};

/// Solves the network [r.m.s. figures]. Throws std::logic_error where the leakage matrix is of another size than the
/// ports. Source: circuit laws (exact). Checked: tests/supply/sine.cpp.
sine_state solve(const sine_network& net);

/// The kernel, in plain doubles of SI units; its doors are `solve` and `sine_solver`.
namespace kernel {
struct port_si {
  double n, r, load;  // load: infinite where open
  int inside;         // -1 where in none
};
struct network_si {
  double mains, omega, source, n1, r1, g_core, b_mag;  // conductance and susceptance of the shunt
  std::vector<port_si> ports;
  std::vector<double> leakage;
};
struct state_si {
  std::vector<double> v, i, copper, shared, load;
  double i1, terminal, emf, input, core, copper1, apparent;
};
state_si solve(const network_si& net);
}  // namespace kernel

/// A network that is solved again and again while resistances and shunt settle: through the door once, in and out.
class sine_solver {
 public:
  /// Throws std::logic_error where the leakage matrix is of another size than the ports.
  explicit sine_solver(const sine_network& net);

  /// Resistance of the primary in use, and of each port, at working temperature.
  void set_resistances(ohms primary, const std::vector<ohms>& ports);
  /// The branch across p: core loss and magnetising reactance, referred to the primary.
  void set_shunt(ohms core_loss, ohms magnetising);
  void solve();

  /// Figures of the last solution: volts across p, line current, loss in the core and in a port's own resistance.
  volts emf() const { return as<volts>(last_.emf); }
  amperes line() const { return as<amperes>(last_.i1); }
  watts core() const { return as<watts>(last_.core); }
  watts copper(std::size_t port) const { return as<watts>(last_.copper[port]); }
  /// All figures of the last solution.
  sine_state state() const;

 private:
  kernel::network_si net_;
  kernel::state_si last_;
};

}  // namespace turnwright::supply
