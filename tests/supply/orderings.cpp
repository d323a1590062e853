// What is more than what in a supply.
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

// Two equal halves of 300 V on a choke of so many henries.
supply::state behind_choke(double henry, double amps) {
  supply::network net = mains_of(230, 50);
  add_centre_tap(net, 300, 1, 1, line_diode(0.7, 0.1), {node_of(choke_of(henry, 1), 100e-6, 0, amps)});
  return supply::solve_periodic(net);
}

supply::network plain_supply(circuit sort, bool idle) {
  supply::network net = mains_of(230, 50, 10);
  const std::vector<supply::rail_node> nodes{node_of(direct(), 47e-6, 0, idle ? 0.01 : 0.05),
                                             node_of(resistor(220), 47e-6, 0, idle ? 0 : 0.02, 470e3)};
  if (sort == circuit::full_wave_centre_tap) {
    add_centre_tap(net, 250, 40, 42, line_diode(0.7, 0.1), nodes);
  } else {
    add_single(net, sort, 250, 40, line_diode(0.7, 0.1), nodes);
  }
  if (sort == circuit::half_wave_doubler) net.rails[0].series = capacitor_of(47e-6);
  return net;
}

constexpr circuit sorts[] = {circuit::full_wave_centre_tap, circuit::bridge, circuit::half_wave,
                             circuit::full_wave_doubler, circuit::half_wave_doubler};

}  // namespace

TEST_CASE("the winding of a rectifier carries more in r.m.s. than its direct current", "[property]") {
  supply_dice dice(401);
  supply_choice want;
  // Without leakage and choke input no diode conducts for more than half a cycle.
  want.leakage = false;
  constexpr double least = 1 - 3e-3;
  for (int i = 0; i < supplies; ++i) {
    const supply::network net = dice.network(want);
    const supply::state s = supply::solve_periodic(net);
    INFO("supply " << i);
    for (std::size_t k = 0; k < s.rails.size(); ++k) {
      const supply::rail_state& r = s.rails[k];
      if (std::holds_alternative<supply::choke>(net.rails[k].nodes.front().through)) continue;
      const circuit sort = net.rails[k].kind;
      const double all = total_amps(r), winding = port_amps(s, net.rails[k].first);
      for (const supply::diode_state& d : r.diodes)
        REQUIRE(plain(d.rms.plain()) >= least * std::numbers::sqrt2 * plain(d.average.plain()));
      if (sort == circuit::full_wave_centre_tap)
        REQUIRE(std::hypot(winding, port_amps(s, *net.rails[k].second)) >= least * all);
      if (sort == circuit::bridge) REQUIRE(winding >= least * all);
      if (sort == circuit::half_wave) REQUIRE(winding >= least * std::numbers::sqrt2 * all);
      if (sort == circuit::full_wave_doubler || sort == circuit::half_wave_doubler) REQUIRE(winding >= least * 2 * all);
    }
  }
}

TEST_CASE("equal halves carry at least 0.707 of the direct current each", "[property]") {
  for (const double c : {1e-6, 10e-6, 100e-6}) {
    for (const double henry : {0.0, 0.5, 5.0, 50.0}) {
      supply::network net = mains_of(230, 50, 5);
      const way_in through = henry > 0 ? choke_of(henry, 20) : direct();
      add_centre_tap(net, 300, 40, 40, valve_diode(2e-3), {node_of(through, c, 0, 0, 4000)});
      const supply::state s = supply::solve_periodic(net);
      INFO(c << " F, " << henry << " H");
      CHECK(port_amps(s, 0) >= 0.998 * total_amps(s.rails[0]) / std::numbers::sqrt2);
      CHECK(port_amps(s, 1) == within_percent(port_amps(s, 0), 0.1));
    }
  }
}

TEST_CASE("a softer source never raises direct volts or peak current", "[property]") {
  supply_dice dice(402);
  supply_choice want;
  want.leakage = want.chokes = false;
  want.rails = 1;
  for (int i = 0, done = 0; done < supplies; ++i) {
    supply::network net = dice.network(want);
    if (net.rails.size() != 1) continue;
    ++done;
    INFO("supply " << i);
    double volts_before = 1e300, peak_before = 1e300;
    for (int step = 0; step < 4; ++step) {
      const supply::state s = supply::solve_periodic(net);
      double peak = 0;
      for (std::size_t d = 0; d < s.rails[0].diodes.size(); ++d) peak = std::max(peak, peak_amps(s, d));
      REQUIRE(mean_volts(s) <= volts_before + 1e-4 * std::abs(volts_before));
      REQUIRE(peak <= 1.01 * peak_before);
      volts_before = mean_volts(s);
      peak_before = peak;
      net.source_resistance = as<ohms>(plain(net.source_resistance) + 0.2 * plain(net.primary_resistance));
    }
  }
}

TEST_CASE("a chain that takes minutes to settle is solved in as few cycles as a quick one, or one more", "[property]") {
  for (const circuit sort : sorts) {
    const auto cycles = [&](double r, double c) {
      supply::network net = plain_supply(sort, false);
      net.rails[0].nodes.push_back(node_of(resistor(r), c, 0, 0, 10 * r));
      const supply::state s = supply::solve_periodic(net);
      CHECK(s.settled);
      return s.cycles;
    };
    INFO("sort " << static_cast<int>(sort));
    CHECK(cycles(1e6, 220e-6) <= cycles(1e3, 10e-6) + 1);
  }
}

TEST_CASE("with cold valves a capacitor charges to the peak of its winding", "[property]") {
  for (const circuit sort : sorts) {
    supply::network net = plain_supply(sort, false);
    const double peaks = sort == circuit::full_wave_doubler || sort == circuit::half_wave_doubler ? 2 : 1;
    const double expected = 250 * std::numbers::sqrt2 * peaks;
    INFO("sort " << static_cast<int>(sort));
    const supply::state bled = supply::solve_periodic(supply::cold(net));
    CHECK(bled.settled);
    CHECK(mean_volts(bled) == within_percent(expected, 1.5));
    for (supply::rail_node& n : net.rails[0].nodes) n.load_resistance.reset();
    const supply::state s = supply::solve_periodic(supply::cold(net));
    CHECK(s.settled);
    CHECK(mean_volts(s) == within_percent(expected, 1));
    CHECK(mean_volts(s) <= expected);
    CHECK(mean_volts(s, 1) == within_percent(mean_volts(s), 0.1));
  }
}

TEST_CASE("volts at switching on are no less than cold, cold than idle, idle than at full load", "[property]") {
  for (const circuit sort : sorts) {
    const supply::network full = plain_supply(sort, false), idle = plain_supply(sort, true);
    const supply::surge_state surge = supply::switch_on(full, as<seconds>(1));
    const supply::state cold = supply::solve_periodic(supply::cold(full));
    const supply::state at_idle = supply::solve_periodic(idle), at_full = supply::solve_periodic(full);
    INFO("sort " << static_cast<int>(sort));
    for (std::size_t n = 0; n < 2; ++n) {
      CHECK(plain(surge.highest[0][n].plain()) >= mean_volts(cold, n));
      CHECK(mean_volts(cold, n) >= mean_volts(at_idle, n));
      CHECK(mean_volts(at_idle, n) >= mean_volts(at_full, n));
    }
    CHECK(plain(surge.diode_peak[0].plain()) > peak_amps(at_full));
  }
}

TEST_CASE("choke input gives nine tenths of the r.m.s. volts above the critical current and more below", "[property]") {
  // 300 V and 5 H: the critical current is about 0.06 A.
  CHECK(mean_volts(behind_choke(5, 0.2)) == within_percent(300 * 0.9003 - 0.7 - 0.2 * 2.1, 0.3));
  CHECK(mean_volts(behind_choke(5, 0.1)) == within_percent(300 * 0.9003 - 0.7 - 0.1 * 2.1, 0.3));
  double before = mean_volts(behind_choke(5, 0.05));
  CHECK(before > 300 * 0.9003);
  for (const double amps : {0.02, 0.01, 0.003, 0.001, 0.0003}) {
    const double now = mean_volts(behind_choke(5, amps));
    CHECK(now > before);
    before = now;
  }
  CHECK(before > 0.95 * 300 * std::numbers::sqrt2);
  CHECK(before < 300 * std::numbers::sqrt2);
}
