/// Building networks by hand, for the tests of the supply layer. Figures in volts, ohms, henries, farads, amperes.
#pragma once

#include <turnwright/supply/periodic.hpp>

#include <cmath>
#include <numbers>
#include <optional>
#include <utility>
#include <vector>

namespace turnwright::testing {

/// What leads to a node: nothing, a resistor, a choke.
using way_in = std::variant<std::monostate, ohms, supply::choke>;

inline way_in direct() { return std::monostate{}; }
inline way_in resistor(double r) { return as<ohms>(r); }
inline way_in choke_of(double l, double r) { return supply::choke{as<henries>(l), as<ohms>(r)}; }
inline supply::capacitor capacitor_of(double c, double esr = 0) { return {as<farads>(c), as<ohms>(esr)}; }

/// A node of a rail; no capacitor where `c` is nothing, no resistor where `load_r` is.
inline supply::rail_node node_of(way_in through, double c, double esr, double amps, double load_r = 0) {
  supply::rail_node n{through, std::nullopt, amperes_dc{as<amperes>(amps)}, std::nullopt};
  if (c > 0) n.shunt = capacitor_of(c, esr);
  if (load_r > 0) n.load_resistance = as<ohms>(load_r);
  return n;
}

inline supply::diode line_diode(double drop, double r, double series = 0) {
  return {supply::drop_law{as<volts>(drop), as<ohms>(r)}, as<ohms>(series)};
}
inline supply::diode valve_diode(double k, double series = 0) {
  return {supply::valve_law{as<perveance>(k)}, as<ohms>(series)};
}
/// A diode without drop; the solver's least resistance of a milliohm is left to it.
inline supply::diode ideal_diode() { return line_diode(0, 0); }

inline supply::network mains_of(double v, double hz, double primary_r = 0) {
  return {volts_rms{as<volts>(v)},
          as<hertz>(hz),
          as<ohms>(0),
          as<ohms>(primary_r),
          as<henries>(0),
          std::nullopt,
          std::nullopt,
          {},
          {},
          {}};
}

/// Adds a port with so many volts off load and, last, enlarges the leakage matrix by nothing.
inline std::size_t add_port(supply::network& net, double open_volts, double r, std::optional<double> load = {},
                            std::optional<std::size_t> inside = {}) {
  const std::size_t before = net.ports.size(), all = before + 1;
  supply::port p{open_volts / plain(net.mains.plain()), as<ohms>(r), std::nullopt, inside};
  if (load) p.load = as<ohms>(*load);
  net.ports.push_back(p);
  std::vector<henries> grown(all * all, as<henries>(0));
  for (std::size_t k = 0; k < before; ++k) {
    for (std::size_t m = 0; m < before; ++m) grown[k * all + m] = net.leakage[k * before + m];
  }
  net.leakage = std::move(grown);
  return before;
}

inline supply::rail rail_of(supply::circuit sort, std::size_t first, supply::diode anode,
                            std::vector<supply::rail_node> nodes) {
  return {sort, first, std::nullopt, anode, false, std::nullopt, std::move(nodes)};
}

/// A centre-tapped winding of two equal halves with its rectifier.
inline supply::rail& add_centre_tap(supply::network& net, double open_volts, double r1, double r2, supply::diode anode,
                                    std::vector<supply::rail_node> nodes) {
  const std::size_t a = add_port(net, open_volts, r1), b = add_port(net, open_volts, r2);
  supply::rail made = rail_of(supply::circuit::full_wave_centre_tap, a, anode, std::move(nodes));
  made.second = b;
  net.rails.push_back(std::move(made));
  return net.rails.back();
}

/// One winding with a rectifier of any other sort.
inline supply::rail& add_single(supply::network& net, supply::circuit sort, double open_volts, double r,
                                supply::diode anode, std::vector<supply::rail_node> nodes) {
  const std::size_t a = add_port(net, open_volts, r);
  net.rails.push_back(rail_of(sort, a, anode, std::move(nodes)));
  return net.rails.back();
}

inline double mean_volts(const supply::state& s, std::size_t node = 0, std::size_t rail = 0) {
  return plain(s.rails[rail].nodes[node].mean.plain());
}
inline double ripple_volts(const supply::state& s, std::size_t node = 0, std::size_t rail = 0) {
  return plain(s.rails[rail].nodes[node].ripple.plain());
}
/// All that hangs on a rail.
inline double total_amps(const supply::rail_state& r) {
  double sum = 0;
  for (const supply::node_state& n : r.nodes) sum += plain(n.load.plain());
  return sum;
}
inline double port_amps(const supply::state& s, std::size_t port = 0) { return plain(s.ports[port].current.plain()); }
inline double peak_amps(const supply::state& s, std::size_t anode = 0, std::size_t rail = 0) {
  return plain(s.rails[rail].diodes[anode].peak.plain());
}

}  // namespace turnwright::testing
