#include <turnwright/supply/periodic.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "figures.hpp"

namespace turnwright::supply {

using namespace kernel;

state solve_periodic(const network& net, const grid& g) {
  const elements e = elements_of(net);
  stepper fine(e, g.steps);
  const shot s = shoot(e, fine);
  return figures_of(e, fine, s, g.curves);
}

network cold(network net) {
  for (rail& r : net.rails) {
    for (rail_node& n : r.nodes) n.load = amperes_dc{};
  }
  return net;
}

namespace {

// Highest volts of every node so far.
void raise(const record& r, const std::vector<Eigen::RowVectorXd>& rows, int steps, std::vector<double>& highest) {
  for (int n = 0; n < steps; ++n) {
    const Eigen::Map<const Eigen::VectorXd> z(r.at(2 * n + 1), r.width);
    for (std::size_t k = 0; k < rows.size(); ++k) highest[k] = std::max(highest[k], rows[k].dot(z));
  }
}

}  // namespace

surge_state switch_on(const network& loaded, seconds how_long, const grid& g) {
  const network net = cold(loaded);
  const elements e = elements_of(net);
  stepper at_crest(e, g.steps, std::numbers::pi / 2);
  std::vector<Eigen::RowVectorXd> rows;
  for (const si_rail& r : e.rails) {
    for (const si_node& n : r.nodes) rows.push_back(node_volts_row(e, at_crest.map(), n.at));
  }
  std::vector<double> x(static_cast<std::size_t>(e.states), 0.0), highest(rows.size(), 0.0);
  std::vector<double> surge = at_crest.first_currents(x.data());
  record kept;
  const int cycles = std::max(1, static_cast<int>(std::ceil(plain(how_long) / e.cycle())));
  for (int k = 0; k < cycles; ++k) {
    at_crest.cycle(x.data(), nullptr, &kept);
    raise(kept, rows, g.steps, highest);
    for (int n = 0; n < 2 * g.steps && k < 10; ++n) {
      for (std::size_t d = 0; d < surge.size(); ++d)
        surge[d] = std::max(surge[d], kept.at(n)[static_cast<std::size_t>(e.states) + 2 + d]);
    }
  }
  // Slow chains are still rising then: the settled cold state is sought as well.
  stepper settled_grid(e, g.steps);
  const shot settled = shoot(e, settled_grid);
  if (settled.settled) raise(settled.last, rows, g.steps, highest);

  surge_state out;
  std::size_t row = 0;
  for (const si_rail& r : e.rails) {
    out.highest.emplace_back();
    for (std::size_t n = 0; n < r.nodes.size(); ++n)
      out.highest.back().push_back(volts_peak{as<volts>(highest[row++])});
    double most = 0;
    for (const int d : r.diodes) most = std::max(most, surge[static_cast<std::size_t>(d)]);
    out.diode_peak.push_back(amperes_peak{as<amperes>(most)});
  }
  return out;
}

}  // namespace turnwright::supply
