#include <turnwright/supply/solver.hpp>

#include <utility>

namespace turnwright::supply {

network_solver::network_solver(network net) : net_(std::move(net)) {
  if (net_.rails.empty()) sine_.emplace(net_);
}

void network_solver::set_resistances(ohms primary, const std::vector<ohms>& ports) {
  if (sine_) return sine_->set_resistances(primary, ports);
  net_.primary_resistance = primary;
  for (std::size_t k = 0; k < ports.size(); ++k) net_.ports[k].resistance = ports[k];
}

void network_solver::set_shunt(ohms core_loss, henries magnetising) {
  if (sine_) return sine_->set_shunt(core_loss, magnetising);
  net_.core_loss_resistance = core_loss;
  net_.magnetising_inductance = magnetising;
}

void network_solver::solve(int steps) {
  if (sine_) return sine_->solve();
  last_ = solve_periodic(net_, {steps, false});
}

state solve(const network& net) { return net.rails.empty() ? solve_sine(net) : solve_periodic(net); }

}  // namespace turnwright::supply
