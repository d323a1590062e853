/// A network as it is wired, part by part, for the second solver: winding and diodes where they stand, a negative rail
/// below earth, a tap as a part of its half.
#pragma once

#include <turnwright/supply/network.hpp>

#include <cstddef>
#include <numbers>
#include <utility>
#include <variant>
#include <vector>

#include <Eigen/Core>

namespace turnwright::testing::wired {

using index = Eigen::Index;

inline constexpr index earth = -1;

struct resistor_part {
  index a, b;
  double siemens;
};
struct capacitor_part {
  index a, b;
  double farad, esr;
};
struct inductor_part {
  index a, b;
  double henry, ohm;
};
struct source_part {  // amperes out of a, into earth
  index a;
  double amps;
};
struct winding_part {  // a stretch of wire: v_a - v_b = turns x v_p - ohm x amperes
  index a, b;
  double part, ohm;
};
struct diode_part {
  index anode, cathode;
  double drop, ohm;
};

class wiring {
 public:
  explicit wiring(const supply::network& net) {
    mains_peak = std::numbers::sqrt2 * plain(net.mains.plain());
    omega = 2 * std::numbers::pi * plain(net.frequency);
    primary_ohm = plain(net.source_resistance) + plain(net.primary_resistance);
    if (net.core_loss_resistance) resistors.push_back({0, earth, 1 / plain(*net.core_loss_resistance)});
    if (net.magnetising_inductance) inductors.push_back({0, earth, plain(*net.magnetising_inductance), 0});
    add_windings(net);
    for (const supply::rail& r : net.rails) add_rail(r);
    for (std::size_t k = 0; k < net.ports.size(); ++k) {
      if (net.ports[k].load) resistors.push_back({hot[k], cold[k], 1 / plain(*net.ports[k].load)});
    }
  }

  index nodes = 1;  // node 0 feeds the ideal transformer
  double mains_peak, omega, primary_ohm;
  std::vector<resistor_part> resistors;
  std::vector<capacitor_part> capacitors;
  std::vector<inductor_part> inductors;
  std::vector<source_part> sources;
  std::vector<winding_part> windings;
  std::vector<diode_part> diodes;
  std::vector<index> hot, cold;                     // ends of each port
  std::vector<std::pair<index, index>> current_in;  // of each port: its stretch of wire, and one to be taken off or -1
  std::vector<std::vector<index>> rail_nodes;
  std::vector<double> sign;  // of each rail

 private:
  void add_windings(const supply::network& net) {
    const std::size_t all = net.ports.size();
    std::vector<index> tap_of(all, -1);
    for (std::size_t k = 0; k < all; ++k) {
      if (net.ports[k].inside) tap_of[*net.ports[k].inside] = static_cast<index>(k);
    }
    std::vector<bool> reversed(all, false), afloat(all, false);
    for (const supply::rail& r : net.rails) {
      if (r.second) reversed[*r.second] = true;
      afloat[r.first] = r.kind == supply::circuit::bridge || r.kind == supply::circuit::full_wave_doubler;
    }
    hot.assign(all, earth);
    cold.assign(all, earth);
    current_in.assign(all, {-1, -1});
    for (std::size_t k = 0; k < all; ++k) {
      if (net.ports[k].inside) continue;
      hot[k] = nodes++;
      if (afloat[k]) cold[k] = nodes++;
      const double part = net.ports[k].ratio * (reversed[k] ? -1 : 1), ohm = plain(net.ports[k].resistance);
      if (tap_of[k] < 0) {
        current_in[k] = {add_winding(hot[k], cold[k], part, ohm), -1};
        continue;
      }
      const auto tap = static_cast<std::size_t>(tap_of[k]);
      const double tap_part = net.ports[tap].ratio * (reversed[k] ? -1 : 1), tap_ohm = plain(net.ports[tap].resistance);
      hot[tap] = nodes++;
      const index near = add_winding(hot[tap], cold[k], tap_part, tap_ohm);
      const index far = add_winding(hot[k], hot[tap], part - tap_part, ohm - tap_ohm);
      current_in[k] = {far, -1};
      current_in[tap] = {near, far};
    }
  }

  index add_winding(index a, index b, double part, double ohm) {
    windings.push_back({a, b, part, ohm});
    return static_cast<index>(windings.size()) - 1;
  }

  // A diode that lets current through from a to b where the rail is positive.
  void add_diode(const supply::rail& r, index a, index b) {
    const auto& law = std::get<supply::drop_law>(r.anode.law);
    const double ohm = plain(law.resistance) + plain(r.anode.series);
    diodes.push_back(r.negative ? diode_part{b, a, plain(law.drop), ohm} : diode_part{a, b, plain(law.drop), ohm});
  }

  void add_capacitor(const supply::capacitor& c, index a, index b) {
    capacitors.push_back({a, b, plain(c.value), plain(c.esr)});
  }

  void add_rail(const supply::rail& r) {
    using supply::circuit;
    const double s = r.negative ? -1 : 1;
    const index entry = nodes++, a = hot[r.first], b = cold[r.first];
    index middle = earth;
    if (r.kind == circuit::half_wave_doubler) {
      const index clamped = nodes++;
      add_capacitor(*r.series, a, clamped);
      add_diode(r, clamped, entry);
      add_diode(r, earth, clamped);
    } else {
      add_diode(r, a, entry);
    }
    if (r.kind == circuit::full_wave_centre_tap) add_diode(r, hot[*r.second], entry);
    if (r.kind == circuit::bridge) {
      add_diode(r, b, entry);
      add_diode(r, earth, a);
      add_diode(r, earth, b);
    }
    if (r.kind == circuit::full_wave_doubler) {
      add_diode(r, earth, a);
      middle = b;
    }
    rail_nodes.emplace_back();
    sign.push_back(s);
    index before = entry;
    for (const supply::rail_node& n : r.nodes) {
      index here = before;
      if (const auto* way = std::get_if<ohms>(&n.through)) {
        here = nodes++;
        resistors.push_back({before, here, 1 / plain(*way)});
      } else if (const auto* coil = std::get_if<supply::choke>(&n.through)) {
        here = nodes++;
        inductors.push_back({before, here, plain(coil->value), plain(coil->resistance)});
      }
      if (n.shunt) add_capacitor(*n.shunt, here, rail_nodes.back().empty() ? middle : earth);
      if (n.shunt && middle != earth && rail_nodes.back().empty()) add_capacitor(*n.shunt, middle, earth);
      if (n.load_resistance) resistors.push_back({here, earth, 1 / plain(*n.load_resistance)});
      sources.push_back({here, s * plain(n.load.plain())});
      rail_nodes.back().push_back(here);
      before = here;
    }
  }
};

}  // namespace turnwright::testing::wired
