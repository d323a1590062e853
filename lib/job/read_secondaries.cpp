#include <algorithm>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/turn_choice.hpp>

#include "rails.hpp"
#include "winding_text.hpp"

namespace turnwright::job_detail {

using namespace literals;

namespace {

void read_volts(reading_desk& desk, page& w, secondary_wish& out) {
  const auto on_load = w.text("voltage"), no_load = w.text("no_load_voltage");
  if (!w.has("voltage") && !w.has("no_load_voltage") && !w.has("target")) {
    desk.faults.push_back(
        wording::missing(w.place("voltage"), "the volts on load, such as \"6.3 V\" or \"300-0-300 V\""));
  }
  if (on_load && no_load)
    desk.faults.push_back(wording::other("either-or", w.where(), "both voltage and no_load_voltage", "one of them"));
  if (!on_load && !no_load) return;
  const auto v =
      read_winding_volts(on_load ? *on_load : *no_load, w.place(on_load ? "voltage" : "no_load_voltage"), desk.faults);
  if (!v) return;
  out.voltage = v->first;
  out.second_half = v->second;
  out.no_load = v->no_load || !on_load;
}

// What is behind the winding's rectifier, and the volts to begin with where a rail aims at some.
void read_rectified(reading_desk& desk, page& w, secondary_wish& out, bool has_volts) {
  const bool halves = out.second_half.has_value() || w.flag("centre_tap").value_or(false);
  const auto guess = desk.draws ? std::optional(desk.draws->full.plain()) : std::nullopt;
  auto rail = read_rail(desk, w, halves, w.has("tap_of"), out.voltage, guess);
  if (!rail) return;
  if (rail->target && has_volts)
    desk.faults.push_back(
        wording::other("either-or", w.where(), "both a target and the winding's volts", "one of them"));
  if (rail->target) {
    out.voltage = guessed_winding(*rail);
    if (rail->kind == supply::circuit::full_wave_centre_tap) out.second_half = out.voltage;
  }
  if (rail->kind == supply::circuit::full_wave_centre_tap && !out.second_half)
    out.second_half = out.voltage = out.voltage / 2.0;
  if (rail->kind != supply::circuit::full_wave_centre_tap && out.second_half) {  // the whole winding is rectified
    out.voltage += *out.second_half;
    out.second_half.reset();
    out.centre_tap = true;
  }
  const volts_dc about{out.voltage * 1.2};
  out.current = first_guess_rms(rail->kind, direct_current(*rail, load_state::full, about));
  if (plain(out.current.plain()) <= 0) out.current = amperes_rms{1_mA};
  out.rail = std::move(rail);
}

bool allowed_name(const std::string& name) {
  if (name.empty() || name.size() > 40 || is_primary_name(name) || name == "core" || name == "screen") return false;
  return std::none_of(name.begin(), name.end(),
                      [](char c) { return static_cast<unsigned char>(c) < 32 || c == '+' || c == 127; });
}

secondary_wish read_secondary(reading_desk& desk, page& w) {
  secondary_wish out;
  out.voltage = 0_V;
  const auto name = w.text("name");
  if (!w.has("name")) desk.faults.push_back(wording::missing(w.place("name"), "a name, such as \"heaters\""));
  if (name && !allowed_name(*name)) {
    desk.faults.push_back(
        wording::other("bad-name", w.place("name"), wording::quoted(*name),
                       "a name of 1 to 40 characters that is not primary, core or screen and holds no '+'"));
  }
  out.name = name.value_or("");
  read_volts(desk, w, out);
  out.centre_tap = w.flag("centre_tap").value_or(false) && !out.second_half;
  const bool rectified = asks_for_rail(w);
  const auto current = w.quantity<amperes>("current", "10 uA", "300 A");
  const bool rms_there = w.has("current");
  if (rectified) {
    read_rectified(desk, w, out, w.has("voltage") || w.has("no_load_voltage"));
    if (current) out.rated = amperes_rms{*current};
    if (!out.rail) out.current = amperes_rms{1_A};  // its faults are noted; nothing more is to be said of it
  } else if (!rms_there && !desk.valves.empty()) {
    out.current = amperes_rms{0_A};  // from the list of valves, once every winding is read
  } else {
    if (!rms_there)
      desk.faults.push_back(wording::missing(w.place("current"), "the r.m.s. current in the winding, such as \"3.1 A\"",
                                             "or \"dc_current\" with a \"circuit\", or a list of valves for heaters"));
    out.current = amperes_rms{current.value_or(1_A)};
  }
  w.not_yet("load", "a load as such, which belongs to a known transformer",
            "give \"current\", or a rail with loads at its nodes");
  w.not_yet("leakage_inductance", "the leakage of a winding that is still to be made");
  out.floats_on = w.text("floats_on");
  out.tap_of = w.text("tap_of");
  out.fixed = read_wishes(desk, w);
  if (out.rail && out.rail->target) out.rail->target->tolerance_ratio = tolerance_of(out).over;
  if (out.tap_of && (out.second_half || out.centre_tap)) {
    desk.faults.push_back(
        wording::other("tap", w.where(), "a tap of another winding with a centre tap of its own", "a plain tap"));
  }
  w.finish();
  return out;
}

const secondary_wish* find(const demand& d, const std::string& name) {
  const auto at =
      std::find_if(d.secondaries.begin(), d.secondaries.end(), [&](const auto& s) { return s.name == name; });
  return at == d.secondaries.end() ? nullptr : &*at;
}

void check_references(reading_desk& desk, const std::string& place) {
  std::vector<std::string> names;
  for (const secondary_wish& s : desk.out.secondaries) names.push_back(s.name);
  for (std::size_t i = 0; i < desk.out.secondaries.size(); ++i) {
    const secondary_wish& s = desk.out.secondaries[i];
    const std::string here = place + "/" + std::to_string(i);
    for (std::size_t j = 0; j < i; ++j) {
      if (desk.out.secondaries[j].name == s.name) {
        desk.faults.push_back(wording::other("repeated-name", here + "/name",
                                             wording::quoted(s.name) + " a second time",
                                             "a name of its own for every winding"));
      }
    }
    std::vector<std::string> others = names;
    others.erase(others.begin() + static_cast<std::ptrdiff_t>(i));
    for (const auto& [key, other] : {std::pair{"floats_on", s.floats_on}, std::pair{"tap_of", s.tap_of}}) {
      if (other && (!find(desk.out, *other) || *other == s.name)) {
        desk.faults.push_back(wording::unknown_word(here + "/" + key, *other, others));
      }
    }
    const secondary_wish* under = s.floats_on ? find(desk.out, *s.floats_on) : nullptr;
    if (under && under != &s && (under->floats_on || under->tap_of)) {
      desk.faults.push_back(wording::other("floats", here + "/floats_on",
                                           wording::quoted(*s.floats_on) + ", which itself rides on another winding",
                                           "a winding that makes its own potential, such as the HT"));
    }
    const bool equal_halves = s.centre_tap || (s.second_half && *s.second_half == s.voltage);
    if (equal_halves && s.fixed.n && s.fixed.n->count() % 2 != 0) {
      desk.faults.push_back(wording::other("odd-turns", here + "/turns",
                                           std::to_string(s.fixed.n->count()) + " turns with a centre tap",
                                           "an even number of turns"));
    }
    const secondary_wish* host = s.tap_of ? find(desk.out, *s.tap_of) : nullptr;
    const bool fixed_end = !host || !host->rail || host->rail->kind == supply::circuit::full_wave_centre_tap ||
                           host->rail->kind == supply::circuit::half_wave;
    if (!fixed_end && s.rail) {
      desk.faults.push_back(wording::other(
          "tap", here + "/tap_of", "a rectified tap of a winding behind a " + std::string(word_of(host->rail->kind)),
          "a tap of a centre-tapped or half-wave winding, or a winding of its own",
          "neither end of such a winding stays at earth"));
    }
    const bool comparable = host && plain(host->voltage) > 0 && plain(s.voltage) > 0;  // else that fault is noted
    if (host && (host->tap_of || (comparable && s.voltage >= host->voltage))) {
      desk.faults.push_back(wording::other("tap", here,
                                           wording::quoted(s.name) + " as a tap of " + wording::quoted(host->name),
                                           "fewer volts than the half it is a tap of, which is no tap itself"));
    }
  }
}

volts whole_volts(const secondary_wish& w) { return w.second_half ? w.voltage + *w.second_half : w.voltage; }

// Amperes that the windings for so many heater volts give, one of them left out.
amperes given_at(const demand& d, volts heater, const secondary_wish* left_out) {
  amperes sum = 0_A;
  for (const secondary_wish& o : d.secondaries) {
    const volts there = whole_volts(o);
    if (&o != left_out && !o.rail && there < heater * 1.02 && there > heater * 0.98) sum += o.current.plain();
  }
  return sum;
}

// A heater winding without a current gets what the listed valves take and no other winding gives.
void share_heaters(reading_desk& desk, const std::string& place) {
  for (std::size_t i = 0; i < desk.out.secondaries.size(); ++i) {
    secondary_wish& s = desk.out.secondaries[i];
    if (plain(s.current.plain()) > 0) continue;
    const std::string here = place + "/" + std::to_string(i) + "/current";
    const heater_load load = heater_current(desk.valves, whole_volts(s));
    const amperes others = given_at(desk.out, whole_volts(s), &s);
    if (load.current <= others) {
      desk.faults.push_back(
          wording::missing(here, "the r.m.s. current in the winding, such as \"3.1 A\"",
                           "none of the listed valves has a heater for these volts that no other winding feeds"));
      s.current = amperes_rms{1_A};
      continue;
    }
    s.current = amperes_rms{load.current - others};
    desk.assume("/secondaries/" + std::to_string(i) + "/current", shown(s.current.plain(), 4),
                "heaters of the listed valves, " + std::string(word_of(load.known_how)));
  }
}

// The heater of a rectifier valve with 5 V (or any but the common 6.3 V) is tied to its cathode or is the cathode: its
// winding rides on the HT, whether the job says so or not.
void float_rectifier_heaters(reading_desk& desk, const std::string& place) {
  for (const secondary_wish& ht : desk.out.secondaries) {
    if (!ht.rail || ht.tap_of || ht.rail->rectifier.type.sort != rectifier_sort::valve) continue;
    const auto& heater = ht.rail->rectifier.type.heater_volts;
    if (!heater) continue;
    for (std::size_t i = 0; i < desk.out.secondaries.size(); ++i) {
      secondary_wish& w = desk.out.secondaries[i];
      const bool common = *heater > 6_V && *heater < 6.6_V && w.name.find("rectifier") == std::string::npos;
      const bool fits = whole_volts(w) > *heater * 0.95 && whole_volts(w) < *heater * 1.05;
      if (w.rail || w.tap_of || w.floats_on || common || !fits) continue;
      w.floats_on = ht.name;
      desk.assume(place + "/" + std::to_string(i) + "/floats_on", ht.name,
                  "the heater of a " + ht.rail->rectifier.type.name + " stands at the HT");
    }
  }
}

// What the listed valves take at each heater voltage there is, beside what the windings give.
void note_heaters(reading_desk& desk) {
  for (const secondary_wish& s : desk.out.secondaries) {
    if (!is_heater(s)) continue;
    const volts at = whole_volts(s);
    const auto seen = [&](const heater_need& n) { return n.at < at * 1.02 && n.at > at * 0.98; };
    if (std::any_of(desk.out.heaters.begin(), desk.out.heaters.end(), seen)) continue;
    const amperes taken = heater_current(desk.valves, at).current;
    if (taken > 0_A) desk.out.heaters.push_back({at, taken, given_at(desk.out, at, nullptr)});
  }
}

}  // namespace

winding_wishes read_wishes(reading_desk& desk, page& winding) {
  winding_wishes w;
  if (const auto n = winding.whole("turns", 100000)) w.n = turns{*n};
  w.strands = winding.whole("strands", 20);
  if (const auto t = winding.quantity<ratio>("tolerance", "0.05 %", "30 %")) w.tolerance_ratio = t->value;
  if (const auto wire = winding.text("wire")) {
    try {
      const looked_up_gauge found = desk.tools.wire.look_up(*wire, winding.place("wire"));
      if (!found.exact || !film_of(found.wire, desk.out.wire.grade)) {
        desk.faults.push_back(wording::other("unknown-name", winding.place("wire"), wording::quoted(*wire),
                                             "a size of the table whose enamel is known",
                                             found.exact ? "the table has no enamel figures for it"
                                                         : "the nearest size is " + wording::quoted(found.wire.size)));
      }
      w.wire = *wire;
    } catch (const refused& why) {
      for (const remark& r : why.remarks()) desk.faults.push_back(r);
    }
  }
  if (const json* r = winding.value("resistance")) {
    if (r->is_object()) {
      page limit(*r, winding.place("resistance"), desk.faults);
      w.resistance_least = limit.quantity<ohms>("least", "1 uohm", "1 Mohm");
      limit.finish();
    } else {
      w.resistance_most = winding.quantity<ohms>("resistance", "1 uohm", "1 Mohm");
    }
  }
  return w;
}

void read_secondaries(reading_desk& desk, page& root) {
  if (!root.has("secondaries")) {
    desk.faults.push_back(wording::missing(root.place("secondaries"), "a list of secondary windings"));
    return;
  }
  root.each("secondaries", [&](const json& node, const std::string& where) {
    if (!node.is_object()) {
      desk.faults.push_back(wording::wrong_sort(where, as_written(node), "a winding as an object in braces"));
      return;
    }
    page w(node, where, desk.faults);
    desk.out.secondaries.push_back(read_secondary(desk, w));
  });
  const json* list = root.value("secondaries");
  if (list->is_array() && list->empty())
    desk.faults.push_back(wording::missing(root.place("secondaries"), "at least one winding"));
  if (list->is_array() && list->size() > 24) {
    desk.faults.push_back(wording::other("out-of-range", root.place("secondaries"),
                                         std::to_string(list->size()) + " windings", "24 at most"));
  }
  check_references(desk, root.place("secondaries"));
  share_heaters(desk, root.place("secondaries"));
  note_heaters(desk);
  float_rectifier_heaters(desk, "/secondaries");
  if (std::any_of(desk.out.secondaries.begin(), desk.out.secondaries.end(), [](const auto& s) { return s.rail; }))
    assume_sine(desk);
  for (std::size_t i = 0; i < desk.out.secondaries.size(); ++i) {
    const secondary_wish& s = desk.out.secondaries[i];
    if (s.fixed.tolerance_ratio) continue;
    desk.assume("/secondaries/" + std::to_string(i) + "/tolerance", written(tolerance_of(s)),
                is_heater(s) ? "valves stand 5 %, less what the mains takes"
                : s.tap_of   ? "a bias must not fall short"
                             : "practice");
  }
}

}  // namespace turnwright::job_detail
