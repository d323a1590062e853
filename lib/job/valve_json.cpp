#include <turnwright/job/result.hpp>

#include <algorithm>

#include "figures_json.hpp"

namespace turnwright {

using namespace job_detail;

namespace {

// An object that takes figures one by one: those that are known, their standings, and which are weak.
class figure_page {
 public:
  explicit figure_page(json& j) : out(j) {}

  template <class Q>
  void add(const char* key, const known_figure<Q>& f) {
    if (!f) return;
    out[key] = figure(*f);
    note(key, f.known_how, f.weak);
  }
  template <class T>
  void add_word(const char* key, const known_figure<T>& f, std::string_view word) {
    if (!f) return;
    out[key] = word;
    note(key, f.known_how, f.weak);
  }
  void note(const char* key, standing known_how, bool is_weak) {
    standings_[key] = word_of(known_how);
    if (is_weak) weak_.push_back(key);
  }
  // What the row says as a whole.
  void close(const std::string& remarks, standing known_how, const std::string& source, bool each_standing) {
    if (!weak_.empty()) out["weak"] = weak_;
    if (!remarks.empty()) out["note"] = remarks;
    out["standing"] = word_of(known_how);
    if (each_standing) out["standings"] = standings_;
    out["source"] = source;
  }

  json& out;

 private:
  json standings_ = json::object();
  json weak_ = json::array();
};

void add_law(figure_page& page, const rectifier_type& t) {
  if (!t.law) return;
  const auto give = [&](const char* key, double value) {
    page.out[key] = figure(value);
    page.note(key, t.law_known_how, t.law_weak);
  };
  if (const auto* valve = std::get_if<three_halves_law>(&*t.law)) {
    page.out["law"] = "three-halves";
    give("perveance_A_per_V1_5", plain(valve->each_anode));
  } else {
    const auto& line = std::get<straight_law>(*t.law);
    page.out["law"] = plain(line.slope) > 0 ? "straight" : "constant";
    give("law_drop_V", plain(line.drop));
    if (plain(line.slope) > 0) give("law_resistance_ohm", plain(line.slope));
  }
  page.out["law_standing"] = word_of(t.law_known_how);
}

void add_least_resistances(figure_page& page, const rectifier_type& t) {
  if (t.least_resistances.empty()) return;
  json list = json::array();
  std::vector<std::string> sources;
  standing weakest = standing::read;
  for (const anode_resistance_point& p : t.least_resistances) {
    json point = json::object();
    if (p.at) point["at_V"] = figure(*p.at);
    if (p.reservoir) point["reservoir_F"] = figure(*p.reservoir);
    point["ohm"] = figure(p.least);
    list.push_back(point);
    weakest = std::min(weakest, p.known_how);
    if (std::find(sources.begin(), sources.end(), p.source) == sources.end()) sources.push_back(p.source);
  }
  page.out["anode_resistance_least"] = list;
  page.out["anode_resistance_source"] = sources;
  page.note("anode_resistance_least", weakest, false);
}

const char* current_of(const rectifier_type& t) {
  if (t.sort == rectifier_sort::valve) return "the whole valve, direct current out";
  return t.sort == rectifier_sort::bridge ? "the whole bridge, direct current out" : "one diode";
}

json stage_json(const output_stage& s) {
  json j{{"class", s.operation}, {"valves", s.valves}};
  if (!s.how.empty()) j["how"] = s.how;
  const auto add = [&](const char* key, const auto& value) {
    if (value) j[key] = figure(*value);
  };
  add("anode_V", s.anode_volts);
  add("screen_V", s.screen_volts);
  add("anode_idle_A", s.anode_idle);
  add("anode_full_A", s.anode_full);
  add("screen_idle_A", s.screen_idle);
  add("screen_full_A", s.screen_full);
  add("power_W", s.power);
  add("load_ohm", s.load);
  j["confidence"] = word_of(s.trust);
  if (!s.note.empty()) j["note"] = s.note;
  j["standing"] = word_of(s.known_how);
  j["source"] = s.source;
  return j;
}

std::string valve_text(const json& valve) { return text_of({{"format", "turnwright-valve/1"}, {"valve", valve}}); }

}  // namespace

std::string json_of(const rectifier_type& t, bool each_standing) {
  json j{{"type", t.name}, {"also", t.also}, {"kind", word_of(t.sort)}};
  figure_page page(j);
  if (t.sort == rectifier_sort::valve) {
    page.add_word("arrangement", t.anodes, t.anodes.value == 2 ? "full-wave" : "half-wave");
  }
  page.add_word("heated", t.heated, t.heated ? word_of(*t.heated) : "");
  page.add("heater_V", t.heater_volts);
  page.add("heater_A", t.heater_current);
  add_law(page, t);
  page.add(t.sort == rectifier_sort::valve ? "drop_V" : "drop_most_V", t.drop);
  page.add("drop_at_A", t.drop_at);
  page.add("peak_inverse_V", t.peak_inverse);
  page.add("capacitor_input_V", t.capacitor_input);
  page.add("choke_input_V", t.choke_input);
  page.add("average_current_A", t.direct_current);
  if (t.direct_current) j["average_current_of"] = current_of(t);
  page.add("peak_current_A", t.peak_current);
  page.add("transient_peak_current_A", t.transient_peak);
  page.add("reservoir_most_F", t.reservoir_most);
  add_least_resistances(page, t);
  page.add("heater_cathode_V", t.heater_cathode);
  page.add("warm_up_s", t.warm_up);
  if (!t.package.empty()) j["package"] = t.package;
  page.close(t.note, t.known_how, t.source, each_standing);
  return valve_text(j);
}

std::string json_of(const amplifying_valve& v, const valve_book& book, bool each_standing) {
  json j{{"type", v.name}, {"also", v.also}, {"kind", "amplifying valve"}, {"function", v.function}};
  figure_page page(j);
  page.add_word("heated", v.heated, word_of(*v.heated));
  page.add("heater_V", v.heater_volts);
  page.add("heater_A", v.heater_current);
  if (v.other_heater_volts) {
    j["heater_alternative"] = {{"heater_V", figure(*v.other_heater_volts)},
                               {"heater_A", figure(*v.other_heater_current)}};
    page.note("heater_alternative", std::min(v.other_heater_volts.known_how, v.other_heater_current.known_how), false);
  }
  page.add("heater_cathode_V", v.heater_cathode);
  page.add("heater_positive_V", v.heater_positive);
  page.add("anode_current_A", v.anode_current);
  page.add("screen_current_A", v.screen_current);
  if (v.anode_current) {
    j["sections"] = v.sections;
    j["condition"] = v.condition;
  }
  json stages = json::array();
  for (const output_stage& s : book.stages()) {
    if (name_key(s.type) == name_key(v.name)) stages.push_back(stage_json(s));
  }
  if (!stages.empty()) j["output_stages"] = stages;
  page.close(v.note, v.known_how, v.source, each_standing);
  return valve_text(j);
}

std::string json_of_valves(const valve_book& book) {
  json valves = json::array(), silicon = json::array(), amplifying = json::array();
  for (const rectifier_type& t : book.rectifiers())
    (t.sort == rectifier_sort::valve ? valves : silicon).push_back(t.name);
  for (const amplifying_valve& v : book.amplifiers()) amplifying.push_back(v.name);
  return text_of(
      {{"format", "turnwright-list/1"}, {"rectifiers", valves}, {"silicon", silicon}, {"valves", amplifying}});
}

}  // namespace turnwright
