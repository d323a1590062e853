#include "rails_json.hpp"

#include <algorithm>
#include <cmath>

namespace turnwright::job_detail {

namespace {

json node_json(const planned_rail& r, const planned_node& n, hertz mains) {
  const double sign = r.wish.negative ? -1 : 1;
  const double mean = plain(n.full.mean.plain()), ripple = plain(n.full.ripple.plain());
  json j{{"node", n.wish.name},
         {"voltage_V", figure(sign * mean)},
         {"voltage_idle_V", figure(sign * plain(n.idle.plain()))},
         {"voltage_switch_on_V", figure(sign * plain(n.switch_on.plain()))},
         {"ripple_rms_V", figure(ripple)},
         {"ripple_peak_to_peak_V", figure(n.full.ripple_peak_to_peak)},
         {"ripple_frequency_Hz", figure(plain(mains) * r.ripple_per_cycle)}};
  if (ripple > 0 && mean != 0) j["hum_dB"] = figure(20 * std::log10(ripple / std::abs(mean)));
  j["load_A"] = figure(n.full.load);
  if (n.wish.shunt) j["capacitor_ripple_current_A"] = figure(n.full.capacitor_ripple);
  if (std::holds_alternative<ohms>(n.wish.through)) j["resistor_loss_W"] = figure(n.full.through_loss);
  if (std::holds_alternative<supply::choke>(n.wish.through)) {
    j["choke_current_A"] = figure(n.full.through);
    j["choke_loss_W"] = figure(n.full.through_loss);
  }
  return j;
}

json rectifier_json(const planned_rail& r) {
  const rectifier_type& t = r.wish.rectifier.type;
  json j{{"type", t.name.empty() ? "as written in the job" : t.name},
         {"peak_current_A", figure(r.worst.peak)},
         {"average_current_A", figure(r.worst.average)},
         {"rms_current_A", figure(r.worst.rms)},
         {"conduction_deg", figure(r.worst.conduction_deg)},
         {"peak_inverse_V", figure(r.worst.inverse)},
         {"peak_inverse_worst_V", figure(r.inverse_worst)},
         {"mean_drop_V", figure(r.worst.mean_drop)},
         {"anode_resistance_ohm", figure(r.anode_resistance)},
         {"loss_W", figure(r.worst.loss)},
         {"surge_current_A", figure(r.surge)}};
  if (plain(r.wish.rectifier.each.series) > 0) j["series_loss_W"] = figure(r.worst.series_loss);
  if (!t.name.empty()) {
    j["standing"] = word_of(std::min(t.known_how, t.law_known_how));
    j["source"] = t.source;
  }
  return j;
}

json rail_json(const planned_rail& r, hertz mains) {
  json j{{"name", r.winding},
         {"circuit", word_of(r.wish.kind)},
         {"polarity", r.wish.negative ? "negative" : "positive"},
         {"nodes", json::array()}};
  for (const planned_node& n : r.nodes) j["nodes"].push_back(node_json(r, n, mains));
  j["rectifier"] = rectifier_json(r);
  if (r.off_target) {
    j["target"] = {
        {"node", r.wish.target->node}, {"voltage_V", figure(r.wish.target->at)}, {"off_V", figure(*r.off_target)}};
    if (r.one_turn) j["target"]["one_turn_V"] = figure(*r.one_turn);
  }
  return j;
}

json state_json(const supply_study& s, const supplied_state& state) {
  json j{{"load", word_of(state.load)}, {"mains", state.mains}, {"volts", json::object()}};
  for (const auto& [name, v] : state.windings) j["volts"][name] = figure(v);
  if (!s.rails.empty()) j["rails"] = json::object();
  for (std::size_t k = 0; k < s.rails.size(); ++k) {
    const planned_rail& r = s.rails[k];
    json& nodes = j["rails"][r.winding] = json::object();
    for (std::size_t n = 0; n < r.nodes.size(); ++n)
      nodes[r.nodes[n].wish.name] = figure((r.wish.negative ? -1 : 1) * plain(state.rails[k][n].plain()));
  }
  return j;
}

}  // namespace

void add_rails(json& j, const supply_study& s) {
  if (!s.rails.empty()) {
    j["rails"] = json::array();
    for (const planned_rail& r : s.rails) j["rails"].push_back(rail_json(r, s.of.base.frequency));
  }
  j["states"] = json::array();
  for (const supplied_state& state : s.states) j["states"].push_back(state_json(s, state));
}

json check_json(const check& c) {
  json j{{"code", c.code}, {"level", word_of(c.weight)}, {"text", c.text}, {"found", c.found}, {"bound", c.bound}};
  if (!c.cure.empty()) j["cure"] = c.cure;
  return j;
}

}  // namespace turnwright::job_detail
