#include "elements.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include <turnwright/measure/electrics.hpp>

#include "tap.hpp"

namespace turnwright::supply::kernel {
namespace {

constexpr double least_r = 1e-6;  // nothing wound or soldered has less [ohm]
constexpr double thermal_volts_300K = 1.380649e-23 * 300.15 / 1.602176634e-19;  // kT/q, SI defining constants

junction junction_of(const diode& d, double halves) {
  const double series = plain(d.series) * halves;
  if (const auto* line = std::get_if<drop_law>(&d.law)) {
    const double r = std::max(plain(line->resistance) * halves, 1e-3);
    return {law::line, plain(line->drop) * halves, 1 / r, 0, 0, 0, series, halves};
  }
  if (const auto* valve = std::get_if<valve_law>(&d.law)) {
    return {law::three_halves, 0, plain(valve->k) / std::pow(halves, 1.5), 0, 0, 0, series, halves};
  }
  const auto& e = std::get<exponential_law>(d.law);
  const double unit = e.ideality * thermal_volts_300K * halves, own = plain(e.resistance) * halves;
  constexpr double least_seen = 1e-7;  // below this current a junction counts as off [A]
  return {law::exponential,
          unit * std::log1p(least_seen / plain(e.saturation)),
          plain(e.saturation),
          unit,
          least_seen + plain(e.saturation),
          own,
          series + own,
          halves};
}

class numbering {
 public:
  explicit numbering(const network& net) : net_(net), sign_(net.ports.size(), 0) {}

  elements finish() {
    e_.mains_peak = std::numbers::sqrt2 * plain(net_.mains.plain());
    e_.omega = plain(reactance(net_.frequency, as<henries>(1)));
    e_.source_r = plain(net_.source_resistance);
    e_.r1 = std::max(e_.source_r + plain(net_.primary_resistance), least_r);
    e_.l1 = plain(net_.primary_leakage);
    e_.lm = net_.magnetising_inductance ? plain(*net_.magnetising_inductance) : 0;
    e_.core_g = net_.core_loss_resistance ? 1 / plain(*net_.core_loss_resistance) : 0;
    claim_ports();
    add_ports();
    for (const rail& r : net_.rails) add_rail(r);
    add_port_states();
    add_primary_states();
    return std::move(e_);
  }

 private:
  // A port that feeds a negative rail, or the second half of a centre-tapped winding, is reckoned from its other end.
  void claim_ports() {
    const auto claim = [&](std::size_t k, int sign) {
      if (k >= sign_.size() || sign_[k] != 0) throw std::logic_error("a rail on a port that is not free");
      sign_[k] = sign;
    };
    for (const rail& r : net_.rails) {
      if (r.nodes.empty()) throw std::logic_error("a rail without nodes");
      if (r.second.has_value() != (r.kind == circuit::full_wave_centre_tap))
        throw std::logic_error("a second half belongs to a full-wave centre-tap circuit alone");
      claim(r.first, r.negative ? -1 : 1);
      if (r.second) claim(*r.second, r.negative ? 1 : -1);
    }
    for (int& s : sign_) s = s == 0 ? 1 : s;
  }

  void add_ports() {
    const std::size_t all = net_.ports.size();
    if (net_.leakage.size() != all * all) throw std::logic_error("leakage matrix of another size than the ports");
    e_.r.assign(all * all, 0);
    e_.l.assign(all * all, 0);
    for (std::size_t k = 0; k < all; ++k) {
      const port& p = net_.ports[k];
      if (p.inside && (*p.inside >= all || *p.inside == k))
        throw std::logic_error("a tap of a port that does not exist");
      e_.ports.push_back({sign_[k] * p.ratio, p.load ? 1 / std::max(plain(*p.load), least_r) : 0, e_.nodes++, ground,
                          -1, p.inside ? static_cast<int>(*p.inside) : -1});
      for (std::size_t m = 0; m < all; ++m) {
        const double both = sign_[k] * sign_[m];
        e_.r[k * all + m] = both * shared_resistance(place(k), static_cast<int>(k), place(m), static_cast<int>(m));
        e_.l[k * all + m] = both * plain(net_.leakage[k * all + m]) * net_.ports[k].ratio * net_.ports[m].ratio;
      }
      // A tap's own lead: a ten-thousandth of its resistance, so that taps at one turn do not make one branch twice.
      if (p.inside) e_.r[k * all + k] *= 1 + 1e-4;
      e_.r[k * all + k] = std::max(e_.r[k * all + k], least_r);
    }
    amps_.assign(all, 0);
  }

  tap_place place(std::size_t k) const {
    const port& p = net_.ports[k];
    return {plain(p.resistance), p.inside ? static_cast<int>(*p.inside) : -1};
  }

  int add_state(double start, double scale, double weight) {
    e_.start.push_back(start);
    e_.scale.push_back(scale);
    e_.weight.push_back(weight);
    return e_.states++;
  }

  int add_capacitor(const capacitor& c, int top, int bottom, double start, double volts_scale) {
    const double farad = plain(c.value);
    const int s = add_state(start, std::max(std::abs(start), 0.05 * volts_scale), farad);
    e_.capacitors.push_back({top, bottom, s, farad, plain(c.esr)});
    return static_cast<int>(e_.capacitors.size()) - 1;
  }

  int add_diode(const diode& d, double halves, incidence across) {
    e_.diodes.push_back({across, junction_of(d, halves)});
    return static_cast<int>(e_.diodes.size()) - 1;
  }

  // Volts of the rail before its chain, for a start [V].
  static double start_volts(const rail& r, double winding_rms) {
    const bool choke_input = std::holds_alternative<choke>(r.nodes.front().through);
    const bool doubled = r.kind == circuit::full_wave_doubler || r.kind == circuit::half_wave_doubler;
    return winding_rms * (doubled ? 2.5 : choke_input && r.kind != circuit::half_wave ? 0.85 : 1.25);
  }

  void add_rail(const rail& r) {
    const double rms = std::abs(e_.ports[r.first].n) * plain(net_.mains.plain());
    const double volts = start_volts(r, rms);
    const int hot = e_.ports[r.first].hot;
    si_rail out{{},
                {},
                static_cast<int>(r.first),
                r.kind == circuit::half_wave || r.kind == circuit::half_wave_doubler ? 1.0 : 2.0};
    const bool direct = std::holds_alternative<std::monostate>(r.nodes.front().through);
    const int entry = e_.nodes++;  // where the rectifier delivers; the first node itself where nothing leads to it
    switch (r.kind) {
      case circuit::full_wave_centre_tap:
        out.diodes = {add_diode(r.anode, 1, {{hot, entry}, {1, -1}, 2}),
                      add_diode(r.anode, 1, {{e_.ports[*r.second].hot, entry}, {1, -1}, 2})};
        break;
      case circuit::bridge:  // two diodes in series each way: one of twice the drop
        out.diodes = {add_diode(r.anode, 2, {{hot, entry}, {1, -1}, 2}),
                      add_diode(r.anode, 2, {{hot, entry}, {-1, -1}, 2})};
        break;
      case circuit::half_wave:
        out.diodes = {add_diode(r.anode, 1, {{hot, entry}, {1, -1}, 2})};
        break;
      case circuit::full_wave_doubler: {
        if (!direct || !r.nodes.front().shunt)
          throw std::logic_error("a full-wave doubler begins with its two capacitors");
        const int middle = e_.nodes++;
        e_.ports[r.first].ret = middle;
        doubler_middle_ = middle;
        out.diodes = {add_diode(r.anode, 1, {{hot, entry}, {1, -1}, 2}), add_diode(r.anode, 1, {{hot}, {-1}, 1})};
        break;
      }
      case circuit::half_wave_doubler: {
        if (!r.series) throw std::logic_error("a half-wave doubler needs its series capacitor");
        const int clamped = e_.nodes++;
        add_capacitor(*r.series, hot, clamped, -1.25 * rms, rms);
        out.diodes = {add_diode(r.anode, 1, {{clamped, entry}, {1, -1}, 2}),
                      add_diode(r.anode, 1, {{clamped}, {-1}, 1})};
        break;
      }
    }
    add_chain(r, volts, entry, direct, out);
    e_.rails.push_back(std::move(out));
  }

  // Direct current that flows to a node and all behind it, at a start's volts.
  static double current_from(const rail& r, std::size_t from, double volts) {
    double sum = 0;
    for (std::size_t i = from; i < r.nodes.size(); ++i) {
      sum += plain(r.nodes[i].load.plain());
      if (r.nodes[i].load_resistance) sum += volts / plain(*r.nodes[i].load_resistance);
    }
    return sum;
  }

  void add_chain(const rail& r, double volts, int entry, bool direct, si_rail& out) {
    const double whole = volts;
    int before = entry;
    for (std::size_t i = 0; i < r.nodes.size(); ++i) {
      const rail_node& n = r.nodes[i];
      const bool first = i == 0;
      if (!first && std::holds_alternative<std::monostate>(n.through))
        throw std::logic_error("nothing leads to a node that is not the first");
      const double amps = current_from(r, i, whole);
      si_node here{first && direct ? entry : e_.nodes++,
                   plain(n.load.plain()),
                   n.load_resistance ? 1 / std::max(plain(*n.load_resistance), least_r) : 0,
                   {},
                   -1,
                   -1};
      if (const auto* l = std::get_if<choke>(&n.through)) {
        const double henry = plain(l->value), r_ohm = plain(l->resistance);
        const int s = add_state(amps, std::max(amps, 0.02 * whole / (e_.omega * henry)), henry);
        here.choke = static_cast<int>(e_.chokes.size());
        e_.chokes.push_back({before, here.at, s, henry, r_ohm});
        volts -= amps * r_ohm;
      } else if (const auto* ohm = std::get_if<ohms>(&n.through)) {
        here.link = static_cast<int>(e_.links.size());
        e_.links.push_back({before, here.at, 1 / std::max(plain(*ohm), least_r)});
        volts -= amps * plain(*ohm);
      }
      const double start = std::max(volts, 0.1 * whole);
      if (n.shunt && first && r.kind == circuit::full_wave_doubler) {
        here.capacitors = {add_capacitor(*n.shunt, here.at, doubler_middle_, start / 2, whole),
                           add_capacitor(*n.shunt, doubler_middle_, ground, start / 2, whole)};
      } else if (n.shunt) {
        here.capacitors = {add_capacitor(*n.shunt, here.at, ground, start, whole)};
      }
      before = here.at;
      out.nodes.push_back(std::move(here));
    }
    const double amps = current_from(r, 0, whole);
    amps_[r.first] += amps;
    if (r.second) amps_[*r.second] += amps;
  }

  void add_port_states() {
    const std::size_t all = e_.ports.size();
    for (std::size_t k = 0; k < all; ++k) {
      amps_[k] += std::abs(e_.ports[k].n) * plain(net_.mains.plain()) * e_.ports[k].load_g;
      const double henry = e_.l[k * all + k];
      if (henry <= 0) continue;
      const double bound = 0.02 * std::abs(e_.ports[k].n) * e_.mains_peak / (e_.omega * henry);
      e_.ports[k].current = add_state(0, std::max(amps_[k], std::min(bound, 10 * amps_[k] + 1e-3)), henry);
    }
  }

  void add_primary_states() {
    double amps = 1e-4;
    for (std::size_t k = 0; k < e_.ports.size(); ++k) amps += std::abs(e_.ports[k].n) * amps_[k];
    if (e_.l1 > 0) e_.line_current = add_state(0, amps, e_.l1);
    if (e_.lm > 0)
      e_.magnetising = add_state(-e_.mains_peak / (e_.omega * e_.lm), e_.mains_peak / (e_.omega * e_.lm), e_.lm);
  }

  const network& net_;
  elements e_{};
  std::vector<int> sign_;
  std::vector<double> amps_;  // of each port, roughly
  int doubler_middle_ = ground;
};

}  // namespace

double elements::cycle() const { return 2 * std::numbers::pi / omega; }

elements elements_of(const network& net) { return numbering(net).finish(); }

}  // namespace turnwright::supply::kernel
