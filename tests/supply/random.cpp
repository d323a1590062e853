// Random supplies of every sort: each must find its periodic state, whatever its values.
#include <turnwright/measure/literals.hpp>

#include "near.hpp"
#include "random_supply.hpp"

using namespace turnwright;
using namespace turnwright::testing;

namespace {

#ifdef __SANITIZE_ADDRESS__
constexpr int supplies = 75;
#else
constexpr int supplies = 5000;
#endif

bool finite(const supply::state& s) {
  double sum = plain(s.wall) + plain(s.primary_current.plain()) + plain(s.emf.plain()) + s.balance_ratio;
  for (const supply::port_state& p : s.ports) sum += plain(p.on_load.plain()) + plain(p.current.plain());
  for (const supply::rail_state& r : s.rails) {
    for (const supply::node_state& n : r.nodes) {
      sum += plain(n.mean.plain()) + plain(n.ripple.plain()) + plain(n.ripple_peak_to_peak) + plain(n.through_lowest);
    }
    for (const supply::diode_state& d : r.diodes)
      sum += plain(d.peak.plain()) + plain(d.inverse.plain()) + d.conduction_deg;
  }
  return std::isfinite(sum);
}

// The largest difference of two solutions in the mean volts of any node, against the first node of its rail.
double apart(const supply::state& a, const supply::state& b) {
  double most = 0;
  for (std::size_t r = 0; r < a.rails.size(); ++r) {
    for (std::size_t n = 0; n < a.rails[r].nodes.size(); ++n) {
      const double whole = std::max(1.0, std::abs(mean_volts(b, 0, r)));
      most = std::max(most, std::abs(mean_volts(a, n, r) - mean_volts(b, n, r)) / whole);
    }
  }
  return most;
}

void solve_many(unsigned seed) {
  supply_dice dice(seed);
  double balance = 0, residual = 0, finer = 0;
  int beyond = 0;  // of the circuits that were solved on both grids, those that moved by more than a thousandth
  for (int i = 0; i < supplies; ++i) {
    const supply::network net = dice.network();
    const supply::state s = supply::solve_periodic(net);
    INFO("seed " << seed << ", supply " << i << ", balance " << s.balance_ratio << ", residual " << s.residual_ratio);
    const bool well = s.settled && finite(s) && std::abs(s.balance_ratio) < 1e-3 && s.residual_ratio < 1e-4;
    if (!well) CHECK(well);
    balance = std::max(balance, std::abs(s.balance_ratio));
    residual = std::max(residual, s.residual_ratio);
    if (i % 20 != 0) continue;
    const double moved = apart(s, supply::solve_periodic(net, {384, false}));
    finer = std::max(finer, moved);
    beyond += moved < 1e-3 ? 0 : 1;
  }
  CHECK(balance < 1e-3);
  CHECK(residual < 1e-4);
  // A rail drawn down far below what it has without load may be moved by the switching of another between two steps:
  // one or two in a thousand such circuits by one to four thousandths of its volts. More would be a fault.
  CHECK(beyond <= 2);
  CHECK(finer < 5e-3);
}

}  // namespace

TEST_CASE("every supply finds its periodic state and accounts for its watts, first lot", "[property]") {
  solve_many(101);
}
TEST_CASE("every supply finds its periodic state and accounts for its watts, second lot", "[property]") {
  solve_many(102);
}
TEST_CASE("every supply finds its periodic state and accounts for its watts, third lot", "[property]") {
  solve_many(103);
}
TEST_CASE("every supply finds its periodic state and accounts for its watts, fourth lot", "[property]") {
  solve_many(104);
}

TEST_CASE("silicon with its true curve settles behind a choke", "[property]") {
  // Both diodes conduct while the current passes from one to the other; once this did not end.
  for (const double henry : {1.0, 2.0, 5.0, 10.0, 20.0, 100.0}) {
    for (const double winding : {1.0, 10.0, 50.0}) {
      for (const double amps : {0.01, 0.1}) {
        supply::network net = mains_of(230, 50, winding == 10 ? 0 : 5);
        const supply::diode silicon{supply::exponential_law{as<amperes>(5e-9), 1.8, as<ohms>(0.05)}, as<ohms>(0)};
        add_centre_tap(net, 300, winding, winding, silicon, {node_of(choke_of(henry, 50), 50e-6, 0, amps)});
        const supply::state s = supply::solve_periodic(net);
        INFO(henry << " H, " << winding << " ohm, " << amps << " A");
        CHECK(s.settled);
        CHECK(std::abs(s.balance_ratio) < 1e-3);
      }
    }
  }
}
