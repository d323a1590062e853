#include <algorithm>
#include <cmath>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>

#include "rails.hpp"

namespace turnwright::job_detail {

using namespace literals;
using supply::circuit;

namespace {

const std::vector<std::pair<std::string, circuit>>& circuits() {
  static const std::vector<std::pair<std::string, circuit>> all = [] {
    std::vector<std::pair<std::string, circuit>> list;
    for (const circuit c : {circuit::full_wave_centre_tap, circuit::bridge, circuit::half_wave,
                            circuit::full_wave_doubler, circuit::half_wave_doubler})
      list.emplace_back(word_of(c), c);
    return list;
  }();
  return all;
}

std::optional<circuit> read_circuit(page& w) {
  std::vector<std::string> words;
  for (const auto& [text, c] : circuits()) words.push_back(text);
  const auto found = w.word("circuit", words);
  if (!found) return std::nullopt;
  return std::find_if(circuits().begin(), circuits().end(), [&](const auto& p) { return p.first == *found; })->second;
}

std::optional<supply::capacitor> read_capacitor(page& owner, const json& v, const std::string& where,
                                                std::optional<volts>* rated) {
  if (v.is_string()) {
    const auto value = owner.quantity_of<farads>(v, where, "1 nF", "1 F");
    return value ? std::optional(supply::capacitor{*value, 0_ohm}) : std::nullopt;
  }
  if (!v.is_object()) {
    owner.fault(wording::wrong_sort(where, as_written(v),
                                    "a capacitance such as \"32 uF\", or {\"value\", \"rated\", \"esr\"}"));
    return std::nullopt;
  }
  page c = owner.at(v, where);
  const auto value = c.quantity<farads>("value", "1 nF", "1 F");
  if (!c.has("value")) c.fault(wording::missing(c.place("value"), "a capacitance, such as \"32 uF\""));
  const auto esr = c.quantity<ohms>("esr", "0 ohm", "10 kohm");
  const auto volts_rated = c.quantity<volts>("rated", "1 V", "20 kV");
  if (rated) *rated = volts_rated;
  c.finish();
  return value ? std::optional(supply::capacitor{*value, esr.value_or(0_ohm)}) : std::nullopt;
}

// One load: a current or a resistance.
void add_load(page& owner, const json& v, const std::string& where, node_load& sum) {
  if (v.is_string()) {
    const std::string text = v.get<std::string>();
    if (read<ohms>(text).value) {
      if (const auto r = owner.quantity_in<ohms>(text, where, "1 mohm", "1 Gohm"))
        sum.resistance = sum.resistance ? 1.0 / (1.0 / *sum.resistance + 1.0 / *r) : *r;
      return;
    }
    if (const auto i = owner.quantity_in<amperes>(text, where, "0 A", "100 A"))
      sum.constant = amperes_dc{sum.constant.plain() + *i};
    return;
  }
  owner.fault(
      wording::wrong_sort(where, as_written(v), "a current such as \"8 mA\" or a resistance such as \"220 kohm\""));
}

node_load read_load(page& owner, const json& v, const std::string& where) {
  node_load sum{};
  if (!v.is_array()) {
    add_load(owner, v, where, sum);
    return sum;
  }
  for (std::size_t i = 0; i < v.size(); ++i) add_load(owner, v[i], where + "/" + std::to_string(i), sum);
  return sum;
}

void read_loads(page& n, node_wish& out) {
  const json* v = n.value("load");
  if (!v) return;
  if (!v->is_object()) {
    out.full = out.idle = read_load(n, *v, n.place("load"));
    return;
  }
  page both = n.at(*v, n.place("load"));
  const json *full = both.value("full"), *idle = both.value("idle");
  if (!full) both.fault(wording::missing(both.place("full"), "the load at full drive, such as \"95 mA\""));
  if (full) out.full = out.idle = read_load(both, *full, both.place("full"));
  if (idle) out.idle = read_load(both, *idle, both.place("idle"));
  if (out.idle.constant > out.full.constant)
    both.fault(wording::other("wrong-sort", both.place("idle"), "more current at idle than at full load",
                              "full as the heavier load: rectifier and heat are judged by it"));
  both.finish();
}

void read_through(page& n, node_wish& out) {
  auto through = n.object("through");
  if (!through) return;
  const auto henry = through->quantity<henries>("choke", "1 uH", "10 kH");
  const auto ohm = through->quantity<ohms>("resistor", "1 mohm", "100 Mohm");
  const bool choke_there = through->has("choke"), resistor_there = through->has("resistor");
  if (choke_there == resistor_there) {
    through->fault(wording::other("either-or", through->where(),
                                  choke_there ? "both a choke and a resistor" : "neither a choke nor a resistor",
                                  "{\"choke\": \"5 H\", \"resistance\": \"110 ohm\"} or {\"resistor\": \"10 kohm\"}"));
  }
  const auto copper = choke_there ? through->quantity<ohms>("resistance", "0 ohm", "1 Mohm") : std::nullopt;
  if (henry) out.through = supply::choke{*henry, copper.value_or(0_ohm)};
  if (ohm) out.through = *ohm;
  through->finish();
}

node_wish read_node(page& n, std::size_t number) {
  node_wish out;
  out.name = n.text("node").value_or("");
  if (!n.has("node")) n.fault(wording::missing(n.place("node"), "a letter for the node, such as \"A\""));
  if ((n.has("node") && out.name.empty()) || out.name.size() > 20 ||
      std::any_of(out.name.begin(), out.name.end(),
                  [](char c) { return static_cast<unsigned char>(c) < 32 || c == 127; }))
    n.fault(wording::other("bad-name", n.place("node"), wording::quoted(out.name), "a name of 1 to 20 characters"));
  read_through(n, out);
  if (const json* c = n.value("capacitor")) out.shunt = read_capacitor(n, *c, n.place("capacitor"), &out.rated);
  read_loads(n, out);
  if (number > 0 && !n.has("through"))
    n.fault(wording::missing(n.place("through"), "what leads to this node: a choke or a resistor"));
  const bool draws = plain(out.full.constant.plain()) > 0 || plain(out.idle.constant.plain()) > 0;
  if (draws && !n.has("capacitor") && std::holds_alternative<std::monostate>(out.through))
    n.fault(wording::other("wrong-sort", n.place("load"), "a constant current at a node without a capacitor",
                           "a resistance, or a capacitor at the node",
                           "nothing could feed it while the rectifier is off"));
  n.finish();
  return out;
}

std::optional<rectifier_wish> named_rectifier(reading_desk& desk, const std::string& name, const std::string& where) {
  try {
    const rectifier_type& t = desk.tools.valves.rectifier(name, where);
    if (!t.law) {
      desk.faults.push_back(wording::other("unknown-name", where, wording::quoted(name),
                                           "a rectifier whose drop is known",
                                           "give its law: {\"perveance\": \"1.9 mA/V^1.5\"} for each anode"));
      return std::nullopt;
    }
    return rectifier_wish{t, {law_of(t), 0_ohm}};
  } catch (const refused& why) {
    for (const remark& r : why.remarks()) desk.faults.push_back(r);
    return std::nullopt;
  }
}

std::optional<rectifier_wish> written_law(page& r) {
  rectifier_wish out;
  int ways = 0;
  if (const auto k = r.quantity<perveance>("perveance", "1 uA/V^1.5", "1 A/V^1.5")) {
    out.each.law = supply::valve_law{*k};
    ++ways;
  }
  const bool exponential = r.has("saturation_current"), line = r.has("drop");
  if (line) {
    const auto drop = r.quantity<volts>("drop", "0 V", "500 V");
    const auto slope = r.quantity<ohms>("resistance", "0 ohm", "100 kohm");
    out.each.law = supply::drop_law{drop.value_or(0_V), slope.value_or(0_ohm)};
    ++ways;
  }
  if (exponential) {
    const auto saturation = r.quantity<amperes>("saturation_current", "0.000001 nA", "1 mA");
    const auto slope = r.quantity<ohms>("resistance", "0 ohm", "100 kohm");
    const json* ideality = r.value("ideality");
    const bool number =
        ideality && ideality->is_number() && ideality->get<double>() >= 0.5 && ideality->get<double>() <= 10;
    if (!number)
      r.fault(ideality
                  ? wording::wrong_sort(r.place("ideality"), as_written(*ideality),
                                        "a plain number from 0.5 to 10, such as 1.8")
                  : wording::missing(r.place("ideality"), "the ideality of the junction, a plain number such as 1.8"));
    out.each.law = supply::exponential_law{saturation.value_or(as<amperes>(1e-9)),
                                           number ? ideality->get<double>() : 1.0, slope.value_or(0_ohm)};
    ++ways;
  }
  if (r.has("perveance") && ways == 0) return std::nullopt;  // its own fault stands
  if (ways == 1) return out;
  r.fault(wording::other(
      "either-or", r.where(), ways == 0 ? "no law" : "more than one law",
      "a \"type\", a \"perveance\", a \"drop\" with \"resistance\", or a \"saturation_current\" with \"ideality\""));
  return std::nullopt;
}

std::optional<rectifier_wish> read_rectifier(reading_desk& desk, page& w) {
  const json* v = w.value("rectifier");
  if (!v) {
    desk.assume(w.pointer() + "/rectifier", "silicon", "no rectifier is named; 0.75 V and 0.3 ohm for each diode");
    return named_rectifier(desk, "silicon", w.place("rectifier"));
  }
  if (v->is_string()) return named_rectifier(desk, v->get<std::string>(), w.place("rectifier"));
  if (!v->is_object()) {
    w.fault(wording::wrong_sort(w.place("rectifier"), as_written(*v),
                                "a type such as \"GZ34\" or \"silicon\", or an object with its law"));
    return std::nullopt;
  }
  page r = w.at(*v, w.place("rectifier"));
  const auto type = r.text("type");
  std::optional<rectifier_wish> out = type            ? named_rectifier(desk, *type, r.place("type"))
                                      : r.has("type") ? std::nullopt
                                                      : written_law(r);
  const auto series = r.quantity<ohms>("series", "0 ohm", "100 kohm");
  if (out && series) out->each.series = *series;
  r.finish();
  return out;
}

// The next value up of the series of six a decade that reservoirs come in.
double next_of_six(double x) {
  const double decade = std::pow(10.0, std::floor(std::log10(x)));
  for (const double step : {1.0, 1.5, 2.2, 3.3, 4.7, 6.8}) {
    if (step * decade >= x * (1 - 1e-9)) return step * decade;
  }
  return 10 * decade;
}

// Where the job names none. Source: practice (judgement).
farads usual_reservoir(const rail_wish& r, amperes load, volts winding, hertz mains) {
  if (r.rectifier.type.sort == rectifier_sort::valve && !r.rectifier.type.name.empty())
    return std::min(r.rectifier.type.reservoir_most ? *r.rectifier.type.reservoir_most : 40_uF, 40_uF);
  if (plain(winding) <= 50 && plain(load) > 0.1) return as<farads>(next_of_six(4.7e-3 * plain(load)));
  if (r.negative) return 47_uF;
  const double per_ampere = 50e-6 / 0.1 * 50 / plain(mains);
  return as<farads>(std::clamp(next_of_six(per_ampere * plain(load)), 22e-6, 220e-6));
}

void read_nodes(reading_desk& desk, page& w, rail_wish& out) {
  w.each("rail", [&](const json& v, const std::string& where) {
    if (!v.is_object()) {
      desk.faults.push_back(wording::wrong_sort(
          where, as_written(v), "a node such as {\"node\": \"A\", \"capacitor\": \"32 uF\", \"load\": \"95 mA\"}"));
      return;
    }
    page n = w.at(v, where);
    node_wish node = read_node(n, out.nodes.size());
    if (std::any_of(out.nodes.begin(), out.nodes.end(), [&](const node_wish& o) { return o.name == node.name; }))
      n.fault(wording::other("repeated-name", n.place("node"), wording::quoted(node.name) + " a second time",
                             "a name of its own for every node"));
    out.nodes.push_back(std::move(node));
  });
  if (out.nodes.empty())
    desk.faults.push_back(wording::missing(
        w.place("rail"),
        "at least one node, such as {\"node\": \"A\", \"capacitor\": \"32 uF\", \"load\": \"95 mA\"}"));
  if (out.nodes.size() > 24)
    desk.faults.push_back(
        wording::other("out-of-range", w.place("rail"), std::to_string(out.nodes.size()) + " nodes", "24 at most"));
}

// A constant current can only be drawn where a capacitor holds the rail while the rectifier is off.
void refuse_bare_rail(reading_desk& desk, page& w, const rail_wish& r) {
  const bool held = std::any_of(r.nodes.begin(), r.nodes.end(), [](const node_wish& n) { return n.shunt.has_value(); });
  const bool drawn = std::any_of(r.nodes.begin(), r.nodes.end(),
                                 [](const node_wish& n) { return plain(n.full.constant.plain()) > 0; });
  if (!held && drawn && !std::holds_alternative<std::monostate>(r.nodes.front().through))
    desk.faults.push_back(wording::other("wrong-sort", w.place("rail"),
                                         "a constant current from a rail without a capacitor",
                                         "a resistance, or a capacitor at a node"));
}

void read_target(page& w, rail_wish& out) {
  auto target = w.object("target");
  if (!target) return;
  const auto node = target->text("node");
  const auto at = target->quantity<volts>("voltage", "1 V", "10 kV");
  if (!target->has("voltage"))
    target->fault(wording::missing(target->place("voltage"), "the volts wanted, such as \"330 V\""));
  std::vector<std::string> names;
  for (const node_wish& n : out.nodes) names.push_back(n.name);
  const std::string wanted = node.value_or(names.empty() ? "" : names.front());
  if (!names.empty() && std::find(names.begin(), names.end(), wanted) == names.end())
    target->fault(wording::unknown_word(target->place("node"), wanted, names));
  target->finish();
  if (at) out.target = target_wish{wanted, volts_dc{*at}};
}

void check_first_node(reading_desk& desk, page& w, const rail_wish& r) {
  if (r.nodes.empty()) return;
  const node_wish& first = r.nodes.front();
  const bool direct = std::holds_alternative<std::monostate>(first.through);
  if (r.kind == circuit::full_wave_doubler && (!direct || !first.shunt))
    desk.faults.push_back(
        wording::other("circuit", w.place("rail") + "/0", "a first node without its capacitors",
                       "a full-wave doubler whose first node has a capacitor (each of the two) and nothing before it"));
  if (r.kind == circuit::half_wave_doubler && !r.series)
    desk.faults.push_back(
        wording::missing(w.place("series_capacitor"), "the capacitor in series with the winding, such as \"47 uF\""));
  if (r.kind != circuit::half_wave_doubler && r.series)
    desk.faults.push_back(wording::other("circuit", w.place("series_capacitor"),
                                         "a series capacitor in another circuit", "one in a half-wave doubler alone"));
  if (r.rectifier.type.sort == rectifier_sort::bridge && r.kind != circuit::bridge)
    desk.faults.push_back(wording::other("circuit", w.place("rectifier"),
                                         "a bridge in a " + std::string(word_of(r.kind)) + " circuit",
                                         "single diodes, or the circuit bridge"));
}

}  // namespace

bool asks_for_rail(page& w) {
  bool asks = false;
  for (const char* key : {"dc_current", "circuit", "rail", "rectifier", "target", "polarity", "series_capacitor"})
    asks = w.has(key) || asks;
  return asks;
}

std::optional<rail_wish> read_rail(reading_desk& desk, page& w, bool halves, bool tap, volts winding,
                                   std::optional<amperes> guessed) {
  rail_wish out;
  const std::size_t faults_before = desk.faults.size();
  const auto kind_read = read_circuit(w);
  if (!w.has("circuit")) {
    out.kind = halves ? circuit::full_wave_centre_tap : tap ? circuit::half_wave : circuit::bridge;
    desk.assume(w.pointer() + "/circuit", std::string(word_of(out.kind)),
                halves ? "a centre-tapped winding"
                : tap  ? "a tap, one end of which is earthed"
                       : "a winding without a centre tap");
  }
  out.kind = kind_read.value_or(out.kind);
  out.negative = w.word("polarity", {"positive", "negative"}) == "negative";
  if (const auto r = read_rectifier(desk, w)) out.rectifier = *r;
  if (const json* c = w.value("series_capacitor"))
    out.series = read_capacitor(w, *c, w.place("series_capacitor"), nullptr);
  const auto dc = w.quantity<amperes>("dc_current", "1 uA", "100 A");
  if (w.has("rail") && w.has("dc_current")) {
    desk.faults.push_back(wording::other("either-or", w.where(), "both a rail and dc_current",
                                         "one of them: a rail has its loads at its nodes"));
  } else if (w.has("rail")) {
    read_nodes(desk, w, out);
  } else if (dc || guessed) {
    node_wish a;
    a.name = "A";
    const amperes load = dc ? *dc : *guessed;
    a.full.constant = a.idle.constant = amperes_dc{load};
    a.shunt = supply::capacitor{usual_reservoir(out, load, winding, desk.out.mains.frequency), 0_ohm};
    desk.assume(w.pointer() + "/rail", "one node, " + shown(a.shunt->value, 2) + ", all of the load at it",
                "a usual reservoir; the worst case for the winding");
    if (!dc) desk.assume(w.pointer() + "/dc_current", shown(load), "a first guess from the list of valves");
    out.nodes = {a};
  } else if (!w.has("dc_current")) {
    desk.faults.push_back(
        wording::missing(w.place("rail"), "a rail, or the direct current of the load as \"dc_current\""));
  }
  refuse_bare_rail(desk, w, out);
  read_target(w, out);
  check_first_node(desk, w, out);
  if (out.kind != circuit::full_wave_centre_tap && halves) out.centre_tap_left = true;
  if (tap && out.kind != circuit::half_wave && out.kind != circuit::half_wave_doubler)
    desk.faults.push_back(wording::other("tap", w.place("circuit"), "a " + std::string(word_of(out.kind)) + " on a tap",
                                         "half-wave, or half-wave doubler", "one end of a tap stays at earth"));
  if (out.kind == circuit::full_wave_centre_tap && !halves && !w.has("target"))
    desk.faults.push_back(wording::other(
        "circuit", w.place("circuit"), "a full-wave centre-tap circuit on a winding without a centre tap",
        "volts written as halves, such as \"300-0-300 V\"", "or the circuit \"bridge\""));
  return desk.faults.size() == faults_before ? std::optional(out) : std::nullopt;
}

void assume_sine(reading_desk& desk) {
  desk.assume("waveform", "a sine",
              "a wall with a flat top costs a capacitor-input rail 3 to 5 % of its volts at the same r.m.s. (memory)");
}

volts guessed_winding(const rail_wish& r) {
  const double rail = plain(r.target->at.plain());
  const bool choke_input = std::holds_alternative<supply::choke>(r.nodes.front().through);
  switch (r.kind) {
    case circuit::full_wave_doubler:
    case circuit::half_wave_doubler:
      return as<volts>(rail / 2.5);
    case circuit::half_wave:
      return as<volts>(rail / 1.15);
    default:
      return as<volts>(rail / (choke_input ? 0.83 : 1.2));
  }
}

}  // namespace turnwright::job_detail
