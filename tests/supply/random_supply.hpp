/// Random supplies of every sort of rectifier and filter, the same for the same seed. Each begins as a design that can
/// deliver its load; then every value is moved at random.
#pragma once

#include <random>

#include "circuits.hpp"

namespace turnwright::testing {

struct supply_choice {
  bool silicon_only = false;  ///< straight-line law alone
  bool exponential = true;    ///< junctions with an exponential law too
  bool leakage = true;        ///< leakage and magnetising branch
  bool chokes = true;
  std::size_t rails = 4, nodes = 8;  ///< at most
};

class supply_dice {
 public:
  explicit supply_dice(unsigned seed) : dice_(seed) {}

  double real(double from, double to) { return std::uniform_real_distribution<double>(from, to)(dice_); }
  bool chance(double p) { return real(0, 1) < p; }
  std::size_t whole(std::size_t from, std::size_t to) {
    return std::uniform_int_distribution<std::size_t>(from, to)(dice_);
  }

  supply::network network(const supply_choice& want = {}) {
    want_ = want;
    net_ = mains_of(chance(0.5) ? 230 : 120, chance(0.5) ? 50 : 60);
    const std::size_t rails = chance(0.5) ? 1 : whole(1, want.rails);
    watts_ = 0;
    for (std::size_t k = 0; k < rails; ++k) add_rail();
    const std::size_t heaters = whole(0, 2);
    for (std::size_t k = 0; k < heaters; ++k) add_heater();
    add_primary();
    if (want.leakage && chance(0.6)) add_leakage();
    return std::move(net_);
  }

 private:
  double moved(double x) { return x * std::exp(real(-1, 1)); }
  double moved_load_r(double x) { return x * std::exp(0.7 * real(-1, 1)); }
  double moved_amps(double x) {
    const double u = real(-1, 1);
    return x * std::exp((u < 0 ? 1.5 : 0.5) * u);
  }

  // A diode for a rail of so many volts and amperes.
  supply::diode diode_for(double v, double amps) {
    const double series = chance(0.25) ? moved(0.02 * v / amps) : 0;
    const std::size_t sort = want_.silicon_only ? 1 : whole(0, want_.exponential ? 2 : 1);
    if (sort == 0) return valve_diode(4 * amps / std::pow(0.05 * v, 1.5) * std::exp(0.7 * real(-1, 1)), series);
    if (sort == 1) return line_diode(real(0.3, 1), moved(0.2), series);
    return {supply::exponential_law{as<amperes>(moved(5e-9)), real(1.2, 2), as<ohms>(moved(0.05))}, as<ohms>(series)};
  }

  // Nodes of a rail; a twentieth to an eighth of the volts is dropped in the chain.
  std::vector<supply::rail_node> chain(double v, double amps, bool doubled, bool choke_input, double ripples) {
    const std::size_t count = chance(0.3) ? 1 : whole(1, want_.nodes);
    const double r_load = v / amps, hz = plain(net_.frequency) * ripples, left = real(0.05, 0.12) / double(count);
    std::vector<supply::rail_node> nodes;
    double behind = amps;
    for (std::size_t i = 0; i < count; ++i) {
      way_in through = direct();
      if (i == 0 && choke_input) {
        through = choke_of(moved(r_load / (9.4 * hz) * real(0.5, 4)), moved(0.03 * r_load));
      } else if (i > 0) {
        const double r = left * v / behind;
        through = want_.chokes && chance(0.3) ? choke_of(moved(20 * r_load / (6.3 * hz)), moved(0.5 * r))
                                              : resistor(moved(r));
      } else if (!doubled && chance(0.15)) {
        through = resistor(moved(0.05 * r_load));
      }
      const bool last = i + 1 == count;
      const double here = last ? behind : behind * real(0, 0.6);
      const double c = moved((doubled && i == 0 ? 2 : 1) * amps / (hz * 0.05 * v));
      const bool bare = i > 0 && chance(0.05);  // a node without capacitor
      supply::rail_node n = node_of(through, bare ? 0 : c, chance(0.5) ? moved(0.05 / (6.3 * hz * c)) : 0, 0);
      const std::size_t sort = whole(0, 2);
      if (sort != 1) n.load = amperes_dc{as<amperes>(moved_amps(sort == 2 ? here / 2 : here))};
      if (sort != 0) n.load_resistance = as<ohms>(moved_load_r(v / (sort == 2 ? here / 2 : here)));
      if (!last && chance(0.2)) {
        n.load = amperes_dc{};
        n.load_resistance.reset();
      }
      nodes.push_back(n);
      behind -= last ? 0 : here;
    }
    return nodes;
  }

  void add_rail() {
    using supply::circuit;
    static const circuit sorts[] = {circuit::full_wave_centre_tap, circuit::bridge, circuit::half_wave,
                                    circuit::full_wave_doubler, circuit::half_wave_doubler};
    const circuit sort = sorts[whole(0, 4)];
    const bool doubled = sort == circuit::full_wave_doubler || sort == circuit::half_wave_doubler;
    const bool one_way = sort == circuit::half_wave || sort == circuit::half_wave_doubler;
    const bool choke_input = !doubled && !one_way && want_.chokes && chance(0.25);
    const double open = chance(0.3) ? real(12, 80) : real(150, 450);
    const double power = std::exp(real(0, 4.2));
    const double v = open * (doubled ? 2.4 : choke_input ? 0.85 : 1.2), amps = power / v;
    watts_ += power;
    const double r = (doubled ? 0.2 : 1) * real(0.02, 0.06) * v / amps;
    std::vector<supply::rail_node> nodes = chain(v, amps, doubled, choke_input, one_way ? 1 : 2);
    const supply::diode anode = diode_for(v, amps);
    if (sort == circuit::full_wave_centre_tap) {
      const double second = moved(r);
      add_centre_tap(net_, open, moved(r), second, anode, std::move(nodes));
      if (chance(0.5)) net_.ports.back().ratio *= real(0.97, 1.03);
      net_.rails.back().negative = chance(0.3);
      if (chance(0.3)) add_bias_tap(net_.rails.back().first, open, r);
      return;
    }
    add_single(net_, sort, open, moved(r), anode, std::move(nodes));
    net_.rails.back().negative = chance(0.3);
    if (sort == circuit::half_wave_doubler)
      net_.rails.back().series = capacitor_of(moved(2 * amps / (plain(net_.frequency) * 0.05 * v)), moved(0.01 * r));
  }

  // A bias supply from a tap within a half.
  void add_bias_tap(std::size_t half, double open, double r) {
    const double part = real(0.1, 0.5), v = 1.2 * part * open, amps = std::exp(real(-7, -4));
    const std::size_t tap = add_port(net_, part * open, plain(net_.ports[half].resistance) * part, std::nullopt, half);
    watts_ += v * amps;
    supply::diode anode = diode_for(v, amps);
    if (chance(0.5)) anode.series = as<ohms>(moved(0.1 * v / amps));
    net_.rails.push_back(rail_of(supply::circuit::half_wave, tap, anode, chain(v, amps, false, false, 1)));
    net_.rails.back().negative = chance(0.7);
    static_cast<void>(r);
  }

  void add_heater() {
    const double v = chance(0.5) ? 6.3 : real(4, 30), power = std::exp(real(1, 3.5));
    watts_ += power;
    add_port(net_, v * 1.05, moved(0.03 * v * v / power), moved_load_r(v * v / power));
  }

  void add_primary() {
    const double full = std::pow(plain(net_.mains.plain()), 2) / watts_;
    net_.primary_resistance = as<ohms>(moved(real(0.01, 0.04) * full));
    if (chance(0.5)) net_.source_resistance = as<ohms>(moved(0.5));
    if (want_.leakage && chance(0.6)) {
      const double w = 6.283 * plain(net_.frequency);
      net_.magnetising_inductance = as<henries>(moved(real(3, 20) * full / w));
      if (chance(0.7)) net_.core_loss_resistance = as<ohms>(moved(20 * full));
    }
    if (want_.leakage && chance(0.4)) net_.primary_leakage = as<henries>(moved(0.02 * full / (6.283 * 50)));
  }

  // Each port's own leakage and what a pair has in common; some ports have none.
  void add_leakage() {
    const std::size_t all = net_.ports.size();
    const double unit = 0.03 * std::pow(plain(net_.mains.plain()), 2) / watts_ / (6.283 * 50);
    std::vector<double> shared(all);
    for (double& s : shared) s = chance(0.15) ? 0 : std::sqrt(moved(0.3 * unit));
    const bool coupled = chance(0.7);
    for (std::size_t k = 0; k < all; ++k) {
      for (std::size_t m = 0; m < all; ++m) {
        double l = coupled ? shared[k] * shared[m] : 0;
        if (k == m && shared[k] > 0) l += moved(unit);
        net_.leakage[k * all + m] = as<henries>(l);
      }
    }
  }

  std::mt19937 dice_;
  supply_choice want_;
  supply::network net_;
  double watts_ = 0;
};

}  // namespace turnwright::testing
