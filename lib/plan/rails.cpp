#include <turnwright/plan/rails.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include <turnwright/measure/literals.hpp>

namespace turnwright {

using namespace literals;
using supply::circuit;

namespace {

node_load load_at(const node_wish& n, load_state s) {
  switch (s) {
    case load_state::full:
      return n.full;
    case load_state::idle:
      return n.idle;
    case load_state::cold:
      return {amperes_dc{}, n.idle.resistance};
  }
  return {};
}

supply::rail circuit_of(const supplied_winding& w, load_state s) {
  const rail_wish& wish = *w.rail;
  const bool two = wish.kind == circuit::full_wave_centre_tap;
  supply::rail r{wish.kind,   w.first, two ? w.second : std::nullopt, wish.rectifier.each, wish.negative,
                 wish.series, {}};
  for (const node_wish& n : wish.nodes) {
    const node_load load = load_at(n, s);
    r.nodes.push_back({n.through, n.shunt, load.constant, load.resistance});
  }
  return r;
}

// The worse of two diodes, figure by figure.
supply::diode_state worse(const supply::diode_state& a, const supply::diode_state& b) {
  return {std::max(a.peak, b.peak),
          std::max(a.average, b.average),
          std::max(a.rms, b.rms),
          std::max(a.inverse, b.inverse),
          std::max(a.mean_drop, b.mean_drop),
          std::max(a.conduction_deg, b.conduction_deg),
          std::max(a.loss, b.loss),
          std::max(a.series_loss, b.series_loss)};
}

// Peak inverse of each diode without load over the r.m.s. volts of what feeds an anode: exact for an ideal transformer.
double inverse_over_rms(circuit c) { return (c == circuit::bridge ? 1 : 2) * std::numbers::sqrt2; }

std::vector<std::size_t> rectified(const amplifier_supply& a) {
  std::vector<std::size_t> all;
  for (std::size_t i = 0; i < a.windings.size(); ++i) {
    if (a.windings[i].rail) all.push_back(i);
  }
  return all;
}

planned_rail figures_of_rail(const amplifier_supply& a, const supplied_winding& w, const supply::state& full,
                             const supply::state& idle, const supply::state& cold_high,
                             const supply::surge_state& surge, std::size_t number) {
  planned_rail r;
  r.winding = w.name;
  r.wish = *w.rail;
  const supply::rail_state &at_full = full.rails[number], &at_idle = idle.rails[number];
  r.ripple_per_cycle = at_full.ripple_per_cycle;
  for (std::size_t n = 0; n < w.rail->nodes.size(); ++n)
    r.nodes.push_back({w.rail->nodes[n], at_full.nodes[n], at_idle.nodes[n].mean,
                       cold_high.settled
                           ? std::max(surge.highest[number][n], volts_peak{cold_high.rails[number].nodes[n].highest})
                           : surge.highest[number][n]});
  r.choke_lowest_idle = at_idle.nodes.front().through_lowest;
  r.worst = at_full.diodes.front();
  for (const supply::diode_state& d : at_full.diodes) r.worst = worse(r.worst, d);
  r.surge = surge.diode_peak[number];
  volts_rms largest = full.ports[w.first].no_load;
  ohms least = 0_ohm;
  for (const std::size_t port : {w.first, w.second.value_or(w.first)}) {
    const supply::port& p = a.base.ports[port];
    largest = std::max(largest, full.ports[port].no_load);
    const ohms here = p.resistance + p.ratio * p.ratio * a.base.primary_resistance + w.rail->rectifier.each.series;
    if (port == w.first || here < least) least = here;
  }
  r.anode_resistance = least;
  r.each_anode = largest;
  r.inverse_worst = volts_peak{largest.plain() * ((1 + a.over_ratio) * inverse_over_rms(w.rail->kind))};
  return r;
}

// How far a rail lands from its target, and what one turn more would do: solved again with that turn.
void note_target(const amplifier_supply& a, std::size_t winding, double one_turn_ratio, planned_rail& r) {
  if (!r.wish.target) return;
  const auto node = std::find_if(r.nodes.begin(), r.nodes.end(),
                                 [&](const planned_node& n) { return n.wish.name == r.wish.target->node; });
  r.off_target = node->full.mean.plain() - r.wish.target->at.plain();
  if (one_turn_ratio <= 0) return;
  amplifier_supply more = a;
  const supplied_winding& w = a.windings[winding];
  for (const std::size_t port : {w.first, w.second.value_or(w.first)})
    more.base.ports[port].ratio = a.base.ports[port].ratio * (1 + one_turn_ratio);
  const supply::state s = supply::solve(network_at(more, load_state::full, 1.0));
  const std::vector<std::size_t> all = rectified(a);
  const auto number = static_cast<std::size_t>(std::find(all.begin(), all.end(), winding) - all.begin());
  const auto at = static_cast<std::size_t>(node - r.nodes.begin());
  r.one_turn = s.rails[number].nodes[at].mean.plain() - node->full.mean.plain();
}

supplied_state state_at(const amplifier_supply& a, load_state load, const char* mains, const supply::state& s) {
  supplied_state out{load, mains, {}, {}, s.settled, s.residual_ratio};
  for (const supplied_winding& w : a.windings) {
    if (!w.rail) out.windings.emplace_back(w.name, volts_of(w, s));
  }
  for (const supply::rail_state& r : s.rails) {
    out.rails.emplace_back();
    for (const supply::node_state& n : r.nodes) out.rails.back().push_back(n.mean);
  }
  return out;
}

}  // namespace

std::string_view word_of(load_state s) {
  return s == load_state::full ? "full" : s == load_state::idle ? "idle" : "cold";
}

std::string_view word_of(circuit c) {
  switch (c) {
    case circuit::full_wave_centre_tap:
      return "full-wave centre-tap";
    case circuit::bridge:
      return "bridge";
    case circuit::half_wave:
      return "half-wave";
    case circuit::full_wave_doubler:
      return "full-wave doubler";
    case circuit::half_wave_doubler:
      return "half-wave doubler";
  }
  throw std::logic_error("a circuit without a word");
}

supply::diode_law law_of(const rectifier_type& t) {
  if (const auto* k = std::get_if<three_halves_law>(&t.law.value())) return supply::valve_law{k->each_anode};
  const auto& line = std::get<straight_law>(*t.law);
  return supply::drop_law{line.drop, line.slope};
}

amperes_dc direct_current(const rail_wish& w, load_state s, volts_dc at) {
  amperes sum = 0_A;
  for (const node_wish& n : w.nodes) {
    const node_load load = load_at(n, s);
    sum += load.constant.plain();
    if (load.resistance) sum += at.plain() / *load.resistance;
  }
  return amperes_dc{sum};
}

amperes_rms first_guess_rms(circuit c, amperes_dc load) {
  switch (c) {
    case circuit::full_wave_centre_tap:
      return amperes_rms{load.plain() * 1.2};
    case circuit::bridge:
      return amperes_rms{load.plain() * 1.9};
    case circuit::half_wave:
      return amperes_rms{load.plain() * 2.5};
    case circuit::full_wave_doubler:
    case circuit::half_wave_doubler:
      return amperes_rms{load.plain() * 4.0};
  }
  return amperes_rms{load.plain()};
}

amperes_dc whole_current(const planned_rail& r) {
  amperes sum = 0_A;
  for (const planned_node& n : r.nodes) sum += n.full.load.plain();
  return amperes_dc{sum};
}

std::string one_turn_words(const planned_rail& r) {
  return r.wish.kind == circuit::full_wave_centre_tap ? "one turn more of each half" : "one turn more";
}

supply::network network_at(const amplifier_supply& a, load_state load, double mains_ratio) {
  supply::network net = a.base;
  net.mains = volts_rms{net.mains.plain() * mains_ratio};
  for (const supplied_winding& w : a.windings) {
    if (w.rail) net.rails.push_back(circuit_of(w, load));
  }
  return net;
}

bool carries_dc(amperes_dc mean, amperes_rms whole) {
  return std::abs(plain(mean.plain())) > 2e-3 * plain(whole.plain());
}

volts_rms volts_of(const supplied_winding& w, const supply::state& s) {
  const volts first = s.ports[w.first].on_load.plain();
  return volts_rms{w.second ? first + s.ports[*w.second].on_load.plain() : first};
}

supply_study study(const amplifier_supply& a, const std::function<double(std::size_t)>& one_turn_ratio) {
  supply_study out;
  out.of = a;
  const double low = 1 - a.under_ratio, high = 1 + a.over_ratio;
  const std::vector<std::size_t> rails = rectified(a);
  supply::state idle_nominal, cold_high;
  for (const load_state load : {load_state::full, load_state::idle, load_state::cold}) {
    for (const auto& [mains, ratio_of_mains] : {std::pair{"low", low}, {"nominal", 1.0}, {"high", high}}) {
      const bool nominal = ratio_of_mains == 1.0;
      const supply::network net = network_at(a, load, ratio_of_mains);
      const supply::state s = net.rails.empty()
                                  ? supply::solve(net)
                                  : supply::solve_periodic(net, {192, nominal && load == load_state::full});
      out.states.push_back(state_at(a, load, mains, s));
      if (load == load_state::cold && ratio_of_mains == high) cold_high = s;
      if (nominal && load == load_state::full) out.full = s;
      if (nominal && load == load_state::idle) idle_nominal = s;
    }
    if (rails.empty()) break;  // without rails every state is the same
  }
  if (rails.empty()) return out;
  const supply::surge_state surge = supply::switch_on(network_at(a, load_state::cold, high), 2_s);
  for (std::size_t k = 0; k < rails.size(); ++k) {
    out.rails.push_back(figures_of_rail(a, a.windings[rails[k]], out.full, idle_nominal, cold_high, surge, k));
    note_target(a, rails[k], one_turn_ratio ? one_turn_ratio(rails[k]) : 0, out.rails.back());
  }
  return out;
}

}  // namespace turnwright
