/// A network that is solved again and again while a design settles, by phasors where it has no rails.
#pragma once

#include <turnwright/supply/periodic.hpp>
#include <turnwright/supply/sine.hpp>

namespace turnwright::supply {

class network_solver {
 public:
  /// Throws std::logic_error for a network that is no circuit.
  explicit network_solver(network net);

  /// Whether the solution is exact: no rails, phasors.
  bool exact() const { return sine_.has_value(); }
  /// Resistance of the primary in use, and of each port, at working temperature.
  void set_resistances(ohms primary, const std::vector<ohms>& ports);
  /// The branch across p: core loss and magnetising inductance, referred to the primary.
  void set_shunt(ohms core_loss, henries magnetising);
  /// Solves; with rails on a grid of so many steps to the cycle.
  void solve(int steps = grid{}.steps);

  /// Figures of the last solution: volts across p, line current, loss in the core and in a port's own resistance.
  volts emf() const { return sine_ ? sine_->emf() : last_.emf.plain(); }
  amperes line() const { return sine_ ? sine_->line() : last_.primary_current.plain(); }
  watts core() const { return sine_ ? sine_->core() : last_.core; }
  watts copper(std::size_t port) const { return sine_ ? sine_->copper(port) : last_.copper[port]; }
  /// All figures of the last solution.
  state all() const { return sine_ ? sine_->all() : last_; }

 private:
  network net_;
  std::optional<sine_solver> sine_;
  state last_;
};

/// The state of any network: by phasors where it has no rails, else the periodic state. Throws like those.
state solve(const network& net);

}  // namespace turnwright::supply
