/// A network without rectifiers under sine volts: phasors, exact.
#pragma once

#include <turnwright/supply/network.hpp>
#include <turnwright/supply/state.hpp>

namespace turnwright::supply {

/// Solves a network that has no rails [r.m.s. figures]. Throws std::logic_error where it has some, or where the leakage
/// matrix is of another size than the ports. Source: circuit laws (exact). Checked: tests/supply/sine.cpp.
state solve_sine(const network& net);

/// The kernel, in plain doubles of SI units; its doors are `solve_sine` and `sine_solver`.
namespace kernel {
struct port_si {
  double n, r, load;  // ratio; load: infinite where open
  int inside;         // -1 where in none
};
struct network_si {
  double mains, omega, source, r1, l1, g_core, b_mag;  // conductance and susceptance of the shunt
  std::vector<port_si> ports;
  std::vector<double> leakage;
};
struct state_si {
  std::vector<double> v, i, copper, shared, load;
  double i1, terminal, emf, input, wall, core, copper1, apparent;
};
state_si solve(const network_si& net);
}  // namespace kernel

/// A network without rails that is solved again and again while resistances and shunt settle: through the door once.
class sine_solver {
 public:
  /// Throws like `solve_sine`.
  explicit sine_solver(const network& net);

  /// Resistance of the primary in use, and of each port, at working temperature.
  void set_resistances(ohms primary, const std::vector<ohms>& ports);
  /// The branch across p: core loss and magnetising inductance, referred to the primary.
  void set_shunt(ohms core_loss, henries magnetising);
  void solve();

  /// Figures of the last solution: volts across p, line current, loss in the core and in a port's own resistance.
  volts emf() const { return as<volts>(last_.emf); }
  amperes line() const { return as<amperes>(last_.i1); }
  watts core() const { return as<watts>(last_.core); }
  watts copper(std::size_t port) const { return as<watts>(last_.copper[port]); }
  /// All figures of the last solution.
  state all() const;

 private:
  kernel::network_si net_;
  kernel::state_si last_;
};

}  // namespace turnwright::supply
