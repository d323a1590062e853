#include <turnwright/job/result.hpp>

#include "figures_json.hpp"

namespace turnwright {

using namespace job_detail;

namespace {

json gauge_json(const gauge& g) {
  json j{{"size", g.size}, {"system", word_of(g.system)}};
  if (!g.also.empty()) j["also"] = g.also;
  j["bare_mm"] = in_mm(g.bare);
  if (g.listed) j["listed_mm"] = in_mm(*g.listed);
  j["area_mm2"] = in_mm2(bare_area(g));
  j["resistance_20C_ohm_per_m"] = figure(resistance_at_20(g));
  if (g.resistance_least) j["resistance_20C_min_ohm_per_m"] = figure(*g.resistance_least);
  if (g.resistance_most) j["resistance_20C_max_ohm_per_m"] = figure(*g.resistance_most);
  j["mass_kg_per_m"] = figure(mass_per_metre(g));
  j["grades"] = json::array();
  for (const film& f : g.films) j["grades"].push_back({{"grade", f.grade}, {"overall_mm", in_mm(f.overall)}});
  j["standing"] = word_of(g.known_how);
  j["source"] = g.source;
  return j;
}

}  // namespace

std::string json_of(const looked_up_gauge& g, const shop& s) {
  json j{{"format", "turnwright-wire/1"}, {"exact", g.exact}, {"wire", gauge_json(g.wire)}, {"nearest", json::array()}};
  for (const wire_system system : {wire_system::metric, wire_system::awg, wire_system::swg}) {
    const gauge& near = s.wire.nearest(system, g.wire.bare);
    if (near.size != g.wire.size) j["nearest"].push_back({{"size", near.size}, {"bare_mm", in_mm(near.bare)}});
  }
  return text_of(j);
}

std::string json_of(const lamination& l) {
  json stacks = json::array();
  for (const metres& t : l.stacks) stacks.push_back(in_mm(t));
  const json core{{"lamination", l.name},
                  {"also", l.also},
                  {"family", word_of(l.family)},
                  {"tongue_mm", in_mm(l.tongue)},
                  {"window_width_mm", in_mm(l.window_width)},
                  {"window_length_mm", in_mm(l.window_length)},
                  {"outer_limb_mm", in_mm(l.outer_limb)},
                  {"yoke_mm", in_mm(l.yoke)},
                  {"width_mm", in_mm(l.width)},
                  {"height_mm", in_mm(l.height)},
                  {"path_mm", in_mm(mean_path(l))},
                  {"stacks_mm", stacks},
                  {"standing", word_of(l.known_how)},
                  {"source", l.source}};
  return text_of({{"format", "turnwright-core/1"}, {"core", core}});
}

std::string json_of(const steel& s, const std::optional<steel_point>& at) {
  json curve = json::array(), loss = json::array();
  const char* value_key = s.polarisation ? "polarisation_T" : "flux_density_T";
  for (const magnetisation_point& p : s.magnetisation)
    curve.push_back({{value_key, figure(p.value)}, {"field_A_per_m", figure(p.field)}});
  for (const loss_point& p : s.loss_curve) {
    loss.push_back({{"frequency_Hz", figure(p.frequency)},
                    {"flux_density_T", figure(p.flux_density)},
                    {"loss_W_per_kg", figure(p.loss)}});
  }
  json row{{"name", s.name},
           {"also", s.also},
           {"density_kg_per_m3", figure(s.density)},
           {"sheet_mm", in_mm(s.sheet)},
           {"stacking_factor_ratio", figure(s.stacking_factor)},
           {"flux_density_nominal_T", figure(s.flux_nominal)},
           {"flux_density_high_T", figure(s.flux_high)},
           {"magnetisation_from", s.magnetisation_from},
           {"magnetisation", curve},
           {"loss_from", s.loss_from},
           {"loss_scale_ratio", figure(s.loss_scale)},
           {"loss", loss},
           {"standing", word_of(s.known_how)},
           {"source", s.source}};
  json j{{"format", "turnwright-steel/1"}, {"steel", row}};
  if (at) {
    const magnetisation_curve bh(s.magnetisation, s.polarisation);
    const steel_loss p = loss_law(s).at(at->flux_density, at->frequency);
    j["at"] = {{"flux_density_T", figure(at->flux_density)},
               {"frequency_Hz", figure(at->frequency)},
               {"field_A_per_m", figure(bh.field(at->flux_density))},
               {"loss_W_per_kg", figure(p.value)}};
    if (p.beyond_curve) j["at"]["beyond_curve"] = true;
  }
  return text_of(j);
}

std::string json_of_names(const std::string& what, const std::vector<std::string>& names) {
  return text_of({{"format", "turnwright-list/1"}, {what, names}});
}

}  // namespace turnwright
