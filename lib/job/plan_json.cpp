#include <turnwright/job/result.hpp>

#include "figures_json.hpp"
#include "rails_json.hpp"

namespace turnwright {

using namespace job_detail;

namespace {

json core_json(const design& p) {
  const core_body& core = p.made.coil.core;
  const core_choice& c = core.choice();
  return {{"lamination", c.pattern.name},
          {"also", c.pattern.also},
          {"steel", c.grade.name},
          {"tongue_mm", in_mm(c.pattern.tongue)},
          {"stack_mm", in_mm(c.stack)},
          {"stacking_factor_ratio", figure(c.stacking_factor)},
          {"stacking", word_of(c.style)},
          {"net_area_mm2", in_mm2(core.net_area())},
          {"path_mm", in_mm(core.path())},
          {"mass_kg", figure(core.mass())},
          {"sheets", core.sheets()},
          {"flux_density_T", figure(p.flux_nominal)},
          {"flux_density_on_load_T", figure(p.flux_on_load)},
          {"flux_density_high_T", figure(p.flux_high)},
          {"loss_W", figure(p.made.nominal.core_loss)},
          {"no_load_current_A", figure(p.idle.current)},
          {"no_load_power_W", figure(p.idle.power)},
          {"no_load_core_loss_W", figure(p.idle.core_loss)},
          {"standing", word_of(std::min(c.pattern.known_how, c.grade.known_how))},
          {"sources", {{"lamination", c.pattern.source}, {"steel", c.grade.source}}}};
}

json wire_json(const wire_pick& w) {
  return {{"size", w.wire.size},
          {"bare_mm", in_mm(w.wire.bare)},
          {"overall_mm", in_mm(w.overall)},
          {"strands", w.strands},
          {"grade", w.grade},
          {"standing", word_of(w.wire.known_how)},
          {"source", w.wire.source}};
}

json tap_json(const planned_tap& t) {
  return {{"at", t.at}, {"turns", t.n.count()}, {"layer", t.layer}, {"side", t.side}};
}

json half_json(const planned_half& h) {
  return {{"turns", h.n.count()},
          {"voltage_no_load_V", figure(h.no_load)},
          {"voltage_on_load_V", figure(h.on_load)},
          {"current_A", figure(h.current)},
          {"resistance_20C_ohm", figure(h.resistance_20)},
          {"resistance_hot_ohm", figure(h.resistance_hot)}};
}

json screen_json(const planned_winding& w) {
  return {{"name", w.name},
          {"kind", "screen"},
          {"purpose", *w.screen == screen_kind::safety ? "safety" : "noise"},
          {"build_mm", in_mm(w.build)},
          {"wrap_under_mm", in_mm(w.wrap_under)}};
}

void add_place(json& j, const planned_winding& w) {
  j["layers"] = w.layers;
  j["turns_per_layer"] = w.per_layer.count();
  if (w.tap_of) return;
  j["last_layer_turns"] = w.last_layer.count();
  j["finish_side"] = w.finish_side;
  j["margin_mm"] = in_mm(w.margin);
  j["interlayer_mm"] = in_mm(w.interlayer);
  j["wrap_under_mm"] = in_mm(w.wrap_under);
  j["build_mm"] = in_mm(w.build);
}

json winding_json(const planned_winding& w) {
  if (w.screen) return screen_json(w);
  json j{{"name", w.name}};
  if (w.tap_of) j["tap_of"] = *w.tap_of;
  j["turns"] = w.n.count();
  if (!w.taps.empty()) {
    j["taps"] = json::array();
    for (const planned_tap& t : w.taps) j["taps"].push_back(tap_json(t));
  }
  j["wire"] = wire_json(w.sections.front().wire);
  if (w.sections.size() > 1) {
    j["sections"] = json::array();
    for (const planned_section& s : w.sections) {
      j["sections"].push_back({{"from_turn", s.from.count()},
                               {"to_turn", s.to.count()},
                               {"wire", wire_json(s.wire)},
                               {"length_m", figure(s.length)},
                               {"mass_kg", figure(s.mass)}});
    }
  }
  add_place(j, w);
  j["mean_turn_mm"] = in_mm(w.mean_turn);
  j["length_m"] = figure(w.length);
  if (!w.tap_of) j["mass_kg"] = figure(w.mass);
  j["resistance_20C_ohm"] = figure(w.resistance_20);
  j["resistance_hot_ohm"] = figure(w.resistance_hot);
  j["voltage_no_load_V"] = figure(w.no_load);
  j["voltage_on_load_V"] = figure(w.on_load);
  if (!w.primary) j["voltage_resistive_V"] = figure(w.on_load_resistive);
  j["current_A"] = figure(w.current);
  if (carries_dc(w.current_dc, w.current)) j["current_dc_A"] = figure(std::abs(plain(w.current_dc.plain())));
  j["current_density_A_per_mm2"] = in_a_per_mm2(w.density);
  if (!w.tap_of) j["loss_W"] = figure(w.loss);
  j["apparent_power_VA"] = figure(w.apparent);
  if (w.regulation_ratio) j["regulation_ratio"] = figure(*w.regulation_ratio);
  j["rise_K"] = figure(w.rise);
  j["hot_spot_C"] = in_degrees(w.hot_spot);
  j["one_turn_V"] = figure(w.one_turn);
  if (!w.halves.empty()) {
    j["halves"] = json::array();
    for (const planned_half& h : w.halves) j["halves"].push_back(half_json(h));
  }
  return j;
}

json volts_json(const std::vector<std::pair<std::string, volts_rms>>& list) {
  json j = json::object();
  for (const auto& [name, v] : list) j[name] = figure(v);
  return j;
}

json pair_json(const planned_pair& p) {
  json j{{"between", {p.a, p.b}}, {"working_rms_V", figure(p.working)}, {"working_peak_V", figure(p.peak)}};
  if (p.dc) j["dc_V"] = figure(*p.dc);
  if (p.wrap) j["wrap_mm"] = in_mm(*p.wrap);
  j["test_V"] = figure(p.test);
  return j;
}

json setting_json(const planned_setting& s) {
  return {{"at", written(s.at)},
          {"links", s.links},
          {"turns", s.n.count()},
          {"current_A", figure(s.current)},
          {"current_density_A_per_mm2", in_a_per_mm2(s.density)},
          {"flux_density_T", figure(s.flux_density)},
          {"volts", volts_json(s.on_load)}};
}

json heat_json(const planned_heat& h) {
  return {{"at", written(h.position)},
          {"ambient_C", in_degrees(h.ambient)},
          {"winding_rise_K", figure(h.winding_rise)},
          {"hot_spot_C", in_degrees(h.hot_spot)},
          {"core_rise_K", figure(h.core_rise)}};
}

json window_json(const design& p) {
  const draft& f = p.made.coil;
  const coil_size out = outside_of(f);
  return {{"winding_width_mm", in_mm(f.room.winding_width)},
          {"winding_height_mm", in_mm(f.room.winding_height)},
          {"former_wall_mm", in_mm(f.room.wall)},
          {"bulge_ratio", figure(f.shape.bulge)},
          {"used_mm", in_mm(f.used)},
          {"fill_ratio", figure(f.fill)},
          {"fits", f.fill <= 1.0 && !f.too_wide},
          {"coil_outside_mm", {in_mm(out.across), in_mm(out.deep)}}};
}

std::string_view unit_key(kind k) {
  switch (k) {
    case kind::resistance:
      return "resistance_ohm";
    case kind::current:
      return "current_A";
    case kind::power:
      return "power_W";
    default:
      return "voltage_V";
  }
}

json tests_json(const design& p) {
  json list = json::array();
  for (const planned_test& t : p.tests) {
    json j{{"code", t.code}, {"text", t.text}};
    j[std::string(unit_key(t.of))] = figure(t.expected_si);
    j["tolerance_ratio"] = figure(t.tolerance_ratio);
    list.push_back(std::move(j));
  }
  return list;
}

json materials_json(const design& p) {
  json list = json::array();
  for (const material& m : p.materials) {
    json j{{"what", m.what}};
    if (m.length) j["length_m"] = figure(*m.length);
    if (m.mass) j["mass_kg"] = figure(*m.mass);
    if (m.count) j["count"] = *m.count;
    list.push_back(std::move(j));
  }
  return list;
}

void add_power(json& j, const design& p) {
  const running& r = p.made.nominal;
  const watts total = r.copper_loss + r.core_loss;
  j["losses"] = {{"copper_W", figure(r.copper_loss)}, {"core_W", figure(r.core_loss)}, {"total_W", figure(total)}};
  j["output_W"] = figure(r.electric.output);
  j["input_W"] = figure(r.electric.input);
  j["efficiency_ratio"] = figure(plain(r.electric.output) / plain(r.electric.input));
  j["apparent_power_VA"] = figure(r.electric.apparent);
}

void add_lists(json& j, const design& p) {
  j["pairs"] = json::array();
  for (const planned_pair& pair : p.pairs) j["pairs"].push_back(pair_json(pair));
  j["window"] = window_json(p);
  j["settings"] = json::array();
  for (const planned_setting& s : p.settings) j["settings"].push_back(setting_json(s));
  add_rails(j, p.supply);
}

void add_papers(json& j, const design& p) {
  j["leakage"] = json::array();
  for (const planned_leakage& l : p.leakage) {
    j["leakage"].push_back(
        {{"between", {l.a, l.b}}, {"referred_to", l.a}, {"inductance_H", figure(l.inductance)}, {"method", l.method}});
  }
  j["mass_kg"] = figure(p.mass);
  if (p.cost) j["cost"] = figure(*p.cost);
  j["materials"] = materials_json(p);
  j["tests"] = tests_json(p);
  j["checks"] = json::array();
  for (const check& c : p.checks) j["checks"].push_back(check_json(c));
  j["assumed"] = json::array();
  for (const assumption& a : p.assumed) j["assumed"].push_back({{"path", a.path}, {"value", a.value}, {"why", a.why}});
  j["accepted"] = p.wanted.accepted;
  j["cautions"] = p.cautions;
}

}  // namespace

std::string json_of(const design& p) {
  json j{{"format", "turnwright-plan/1"},
         {"title", p.wanted.title},
         {"windable", p.windable},
         {"turns_per_volt", figure(p.turns_per_volt)},
         {"volts_per_turn_V", figure(1 / p.turns_per_volt)},
         {"core", core_json(p)}};
  j["windings"] = json::array();
  for (const planned_winding& w : p.windings) j["windings"].push_back(winding_json(w));
  add_lists(j, p);
  add_power(j, p);
  j["thermal"] = heat_json(p.heat_high);
  j["thermal"]["class"] = std::string(1, p.wanted.insulation.thermal_class);
  j["thermal"]["nominal"] = heat_json(p.heat_nominal);
  add_papers(j, p);
  return text_of(j);
}

}  // namespace turnwright
