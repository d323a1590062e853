#include <turnwright/job/result.hpp>

#include <cmath>

#include "rails_json.hpp"

namespace turnwright {

using namespace job_detail;

namespace {

json half_json(const supply::port_state& p, const supply::port& of) {
  json j{{"voltage_no_load_V", figure(p.no_load)},
         {"voltage_on_load_V", figure(p.on_load)},
         {"current_A", figure(p.current)}};
  if (carries_dc(p.current_dc, p.current)) j["current_dc_A"] = figure(std::abs(plain(p.current_dc.plain())));
  j["resistance_hot_ohm"] = figure(of.resistance);
  return j;
}

json winding_json(const supply_study& s, const supplied_winding& w) {
  const supply::state& full = s.full;
  const supply::port_state &a = full.ports[w.first], &b = full.ports[w.second.value_or(w.first)];
  json j{{"name", w.name}};
  if (w.tap_of) j["tap_of"] = *w.tap_of;
  const volts open = w.second ? a.no_load.plain() + b.no_load.plain() : a.no_load.plain();
  const volts_rms loaded = volts_of(w, full);
  const supply::port_state& larger = a.current < b.current ? b : a;
  volt_amperes apparent = apparent_power(a.on_load, a.current);
  if (w.second) apparent += apparent_power(b.on_load, b.current);
  watts loss = full.copper[w.first];
  if (w.second) loss += full.copper[*w.second];
  j["voltage_no_load_V"] = figure(open);
  j["voltage_on_load_V"] = figure(loaded);
  j["current_A"] = figure(larger.current);
  if (carries_dc(larger.current_dc, larger.current))
    j["current_dc_A"] = figure(std::abs(plain(larger.current_dc.plain())));
  if (!w.second) j["resistance_hot_ohm"] = figure(s.of.base.ports[w.first].resistance);
  j["loss_W"] = figure(loss);
  j["apparent_power_VA"] = figure(apparent);
  j["regulation_ratio"] = figure(plain(open) / plain(loaded.plain()) - 1);
  if (w.second) j["halves"] = {half_json(a, s.of.base.ports[w.first]), half_json(b, s.of.base.ports[*w.second])};
  return j;
}

json primary_json(const supply_study& s) {
  const supply::state& full = s.full;
  const double wall_va = plain(s.of.base.mains.plain()) * plain(full.primary_current.plain());
  json j{{"current_A", figure(full.primary_current)}};
  // With a magnetising inductance nothing drives any direct current.
  if (!s.of.base.magnetising_inductance && !s.rails.empty()) j["current_dc_A"] = figure(full.primary_dc);
  j["apparent_power_VA"] = figure(wall_va);
  j["power_W"] = figure(full.wall);
  return j;
}

}  // namespace

std::string json_of(const supply_study& s, const std::vector<check>& checks, const std::vector<assumption>& assumed,
                    const std::vector<std::string>& cautions) {
  json j{{"format", "turnwright-supply/1"}, {"title", s.of.title}};
  j["windings"] = json::array();
  for (const supplied_winding& w : s.of.windings) j["windings"].push_back(winding_json(s, w));
  j["primary"] = primary_json(s);
  add_rails(j, s);
  j["balance_ratio"] = figure(s.full.balance_ratio);
  j["residual_ratio"] = figure(s.full.residual_ratio);
  j["settled"] = s.full.settled;
  j["checks"] = json::array();
  for (const check& c : checks) j["checks"].push_back(check_json(c));
  j["assumed"] = json::array();
  for (const assumption& a : assumed) j["assumed"].push_back({{"path", a.path}, {"value", a.value}, {"why", a.why}});
  j["cautions"] = cautions;
  return text_of(j);
}

}  // namespace turnwright
