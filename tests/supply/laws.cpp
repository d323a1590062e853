// What holds in every supply, whatever its values: scaling, exchange, and things that change nothing.
#include <turnwright/supply/sine.hpp>

#include "near.hpp"
#include "random_supply.hpp"

using namespace turnwright;
using namespace turnwright::testing;
using supply::circuit;

namespace {

#ifdef __SANITIZE_ADDRESS__
constexpr int supplies = 30;
#else
constexpr int supplies = 500;
#endif

// The search ends where no state changes by more than a twenty-thousandth in a cycle; r.m.s. currents of short pulses
// feel that most.
constexpr double settled_to = 1e-3;

// Highest mean volts of any node.
double highest_volts(const supply::state& s) {
  double most = 0;
  for (const supply::rail_state& r : s.rails) {
    for (const supply::node_state& n : r.nodes) most = std::max(most, std::abs(plain(n.mean.plain())));
  }
  return most;
}

// The most by which volts, amperes of ports and of the line differ, against the largest of their sort. Ports of b are
// looked up by `place`, nodes that b has beside those of a by `node`.
template <class Place, class Node>
double apart(const supply::state& a, const supply::state& b, Place place, Node node) {
  double most = 0;
  const double whole = std::max(1.0, highest_volts(a));
  for (std::size_t r = 0; r < a.rails.size(); ++r) {
    for (std::size_t n = 0; n < a.rails[r].nodes.size(); ++n) {
      most = std::max(most, std::abs(mean_volts(a, n, r) - mean_volts(b, node(r, n), r)) / whole);
      most = std::max(most, std::abs(ripple_volts(a, n, r) - ripple_volts(b, node(r, n), r)) / whole);
    }
  }
  const double line = plain(a.primary_current.plain());
  most = std::max(most, std::abs(line - plain(b.primary_current.plain())) / line);
  for (std::size_t k = 0; k < a.ports.size(); ++k) {
    const double open = plain(a.ports[k].no_load.plain());
    // A port's amperes against those that would take the whole of the primary's.
    const double all = line * std::max(0.01, plain(a.ports[0].no_load.plain()) / open);
    most = std::max(most, std::abs(port_amps(a, k) - port_amps(b, place(k))) / all);
  }
  return most;
}
double apart(const supply::state& a, const supply::state& b) {
  return apart(
      a, b, [](std::size_t k) { return k; }, [](std::size_t, std::size_t n) { return n; });
}

bool all_full_wave(const supply::network& net) {
  for (const supply::rail& r : net.rails) {
    if (r.kind == circuit::half_wave || r.kind == circuit::half_wave_doubler) return false;
  }
  return true;
}

double dc_of(const supply::diode_state& d) { return plain(d.average.plain()); }

}  // namespace

TEST_CASE("mains, diode drops and load currents grown together make all grow with them", "[property]") {
  supply_dice dice(301);
  supply_choice want;
  want.silicon_only = true;
  for (int i = 0; i < supplies; ++i) {
    const supply::network net = dice.network(want);
    supply::network grown = net;
    const double k = dice.real(0.3, 3);
    grown.mains = volts_rms{as<volts>(k * plain(net.mains.plain()))};
    for (supply::rail& r : grown.rails) {
      auto& law = std::get<supply::drop_law>(r.anode.law);
      law.drop = as<volts>(k * plain(law.drop));
      for (supply::rail_node& n : r.nodes) n.load = amperes_dc{as<amperes>(k * plain(n.load.plain()))};
    }
    const supply::state a = supply::solve_periodic(net), b = supply::solve_periodic(grown);
    INFO("supply " << i);
    const double whole = highest_volts(a), line = plain(a.primary_current.plain());
    for (std::size_t r = 0; r < a.rails.size(); ++r) {
      for (std::size_t n = 0; n < a.rails[r].nodes.size(); ++n) {
        REQUIRE(mean_volts(b, n, r) / k == Approx(mean_volts(a, n, r)).margin(2e-4 * whole));
        REQUIRE(ripple_volts(b, n, r) / k == Approx(ripple_volts(a, n, r)).margin(2e-4 * whole));
      }
    }
    REQUIRE(plain(b.primary_current.plain()) / k == Approx(line).epsilon(5e-4));
  }
}

TEST_CASE("the halves of a winding exchanged exchange their results", "[property]") {
  supply_dice dice(302);
  for (int i = 0, done = 0; done < supplies / 4; ++i) {
    const supply::network net = dice.network();
    if (!all_full_wave(net)) continue;
    ++done;
    supply::network exchanged = net;
    for (supply::rail& r : exchanged.rails)
      if (r.second) std::swap(r.first, *r.second);
    const supply::state a = supply::solve_periodic(net), b = supply::solve_periodic(exchanged);
    INFO("supply " << i);
    REQUIRE(apart(a, b) < settled_to);
    // All is as it was half a cycle earlier: the diodes of bridges and doublers change places too.
    for (std::size_t r = 0; r < net.rails.size(); ++r) {
      const double all = total_amps(a.rails[r]);
      for (std::size_t d = 0; d < 2; ++d)
        REQUIRE(dc_of(b.rails[r].diodes[1 - d]) == Approx(dc_of(a.rails[r].diodes[d])).margin(5e-3 * all));
    }
  }
}

TEST_CASE("a resistor in two parts and an open winding more change nothing", "[property]") {
  supply_dice dice(303);
  for (int i = 0; i < supplies; ++i) {
    const supply::network net = dice.network();
    supply::network other = net;
    add_port(other, dice.real(5, 400), 10);
    std::vector<std::vector<std::size_t>> place(net.rails.size());
    for (std::size_t r = 0; r < net.rails.size(); ++r) {
      std::vector<supply::rail_node> nodes;
      for (const supply::rail_node& n : net.rails[r].nodes) {
        const auto* whole = std::get_if<ohms>(&n.through);
        const double part = dice.real(0.2, 0.8);
        if (whole) nodes.push_back(node_of(resistor(part * plain(*whole)), 0, 0, 0));
        nodes.push_back(n);
        if (whole) nodes.back().through = as<ohms>((1 - part) * plain(*whole));
        place[r].push_back(nodes.size() - 1);
      }
      other.rails[r].nodes = std::move(nodes);
    }
    const supply::state a = supply::solve_periodic(net), b = supply::solve_periodic(other);
    INFO("supply " << i);
    REQUIRE(apart(
                a, b, [](std::size_t k) { return k; }, [&](std::size_t r, std::size_t n) { return place[r][n]; }) <
            2e-4);
  }
}

TEST_CASE("a rail turned to the other polarity turns only its windings' direct current", "[property]") {
  supply_dice dice(304);
  supply_choice want;
  want.rails = 1;
  for (int i = 0, done = 0; done < supplies; ++i) {
    const supply::network net = dice.network(want);
    if (net.rails.size() != 1) continue;
    ++done;
    supply::network turned = net;
    turned.rails[0].negative = !net.rails[0].negative;
    const supply::state a = supply::solve_periodic(net), b = supply::solve_periodic(turned);
    INFO("supply " << i);
    REQUIRE(apart(a, b) < settled_to);
    const double all = total_amps(a.rails[0]);
    for (std::size_t k = 0; k < net.ports.size(); ++k)
      REQUIRE(plain(b.ports[k].current_dc.plain()) == Approx(-plain(a.ports[k].current_dc.plain())).margin(5e-3 * all));
  }
}

TEST_CASE("no capacitor gains charge: what comes to a node leaves it", "[property]") {
  supply_dice dice(305);
  for (int i = 0; i < supplies; ++i) {
    const supply::network net = dice.network();
    const supply::state s = supply::solve_periodic(net);
    INFO("supply " << i);
    for (std::size_t k = 0; k < s.rails.size(); ++k) {
      const supply::rail_state& r = s.rails[k];
      const double all = total_amps(r);
      // An idle diode is taken for a gigaohm, which lets some microamperes through.
      const double hair = 1e-3 * all + 3e-6;
      double behind = all;
      for (std::size_t n = 0; n < r.nodes.size(); ++n) {
        if (!std::holds_alternative<std::monostate>(net.rails[k].nodes[n].through))
          REQUIRE(plain(r.nodes[n].through.plain()) == Approx(behind).margin(hair));
        behind -= plain(r.nodes[n].load.plain());
      }
      const circuit sort = net.rails[k].kind;
      if (sort == circuit::full_wave_doubler || sort == circuit::half_wave_doubler) {
        for (const supply::diode_state& d : r.diodes) REQUIRE(dc_of(d) == Approx(all).margin(hair));
      } else {
        double sum = 0;
        for (const supply::diode_state& d : r.diodes) sum += dc_of(d);
        REQUIRE(sum == Approx(all).margin(hair));
      }
    }
  }
}

TEST_CASE("a network without rails is solved alike by steps and by phasors", "[property]") {
  supply_dice dice(306);
  for (int i = 0; i < supplies; ++i) {
    supply::network net = dice.network();
    net.rails.clear();
    for (supply::port& p : net.ports)
      if (!p.load && !p.inside) p.load = as<ohms>(plain(p.resistance) * dice.real(5, 50));
    const supply::state a = supply::solve_sine(net), b = supply::solve_periodic(net);
    INFO("supply " << i);
    REQUIRE(b.settled);
    REQUIRE(apart(a, b) < 5e-4);
    for (std::size_t k = 0; k < net.ports.size(); ++k)
      REQUIRE(plain(b.ports[k].on_load.plain()) == Approx(plain(a.ports[k].on_load.plain())).epsilon(5e-4));
    REQUIRE(plain(b.wall) == Approx(plain(a.wall)).epsilon(1e-3));
  }
}
