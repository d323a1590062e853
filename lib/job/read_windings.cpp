#include <algorithm>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/selector.hpp>
#include <turnwright/plan/turn_choice.hpp>

#include "sections.hpp"
#include "winding_text.hpp"

namespace turnwright::job_detail {

using namespace literals;

namespace {

struct tolerance {
  double over, under;
};

// "10 %" either way, or "+6 % -10 %" in either order.
std::optional<tolerance> read_tolerance(page& mains, const std::string& text) {
  const std::string where = mains.place("tolerance");
  const auto part = [&](const std::string& t) { return mains.quantity_in<ratio>(t, where, "-30 %", "30 %"); };
  const std::size_t cut = text.find('%');
  const bool two = cut != std::string::npos && text.find('%', cut + 1) != std::string::npos;
  if (!two) {
    const auto both = part(text);
    if (both && both->value < 0) mains.fault(wording::out_of_range(where, text, "0 %", "30 %"));
    return both ? std::optional(tolerance{both->value, both->value}) : std::nullopt;
  }
  const auto a = part(text.substr(0, cut + 1)), b = part(text.substr(cut + 1));
  if (!a || !b) return std::nullopt;
  if ((a->value < 0) == (b->value < 0)) {
    mains.fault(wording::other("wrong-sort", where, wording::quoted(text),
                               "one figure up and one down, such as \"+6 % -10 %\""));
    return std::nullopt;
  }
  return tolerance{std::max(a->value, b->value), -std::min(a->value, b->value)};
}

void read_frequency(reading_desk& desk, page& mains) {
  desk.out.mains.frequency = 50_Hz;
  const auto text = mains.text("frequency");
  const std::string where = mains.place("frequency");
  if (!text) {
    if (!mains.has("frequency")) {
      desk.faults.push_back(wording::missing(where, "the frequency of the mains, such as \"50 Hz\" or \"50-60 Hz\"",
                                             "60 Hz iron on 50 Hz has 20 % more flux"));
    }
    return;
  }
  // "50-60 Hz": the lower rules the flux
  const std::size_t dash = text->find('-');
  std::string lower = *text, upper = *text;
  if (dash != std::string::npos && dash > 0) {
    upper = text->substr(dash + 1);
    const std::size_t unit = upper.find_first_not_of("0123456789. ");
    lower = text->substr(0, dash) + (unit == std::string::npos ? "" : " " + upper.substr(unit));
  }
  const auto f = mains.quantity_in<hertz>(lower, where, "16 Hz", "450 Hz");
  const auto g = f && upper != lower ? mains.quantity_in<hertz>(upper, where, "16 Hz", "450 Hz") : f;
  if (f && g) desk.out.mains.frequency = std::min(*f, *g);
}

// Band of the supply with that nominal voltage and frequency, from the table of mains.
std::optional<tolerance> usual_band(const catalogue& tables, volts on, hertz f, std::string& region) {
  for (const row& r : tables.named("mains").rows) {
    const auto over = r.number("plus_ratio"), under = r.number("minus_ratio");
    if (!over || !under || r.needed("nominal_v") != plain(on) || r.needed("frequency_hz") != plain(f)) continue;
    region = r.text("region");
    return tolerance{*over, *under};
  }
  return std::nullopt;
}

std::vector<volts> read_taps(page& owner, const json& list, const std::string& where) {
  std::vector<volts> taps;
  if (!list.is_array() || list.empty()) {
    owner.fault(
        wording::wrong_sort(where, as_written(list), "a list of volts such as [\"220 V\", \"230 V\", \"240 V\"]"));
    return taps;
  }
  for (std::size_t i = 0; i < list.size(); ++i) {
    const std::string here = where + "/" + std::to_string(i);
    const auto v = owner.quantity_of<volts>(list[i], here, "10 V", "500 V");
    if (!v) continue;
    if (!taps.empty() && *v <= taps.back()) {
      owner.fault(wording::other(
          "tap-order", here,
          wording::quoted(list[i].get<std::string>()) + " after " + wording::quoted(written(taps.back())),
          "taps in rising order from the common start"));
      continue;
    }
    taps.push_back(*v);
  }
  if (list.size() > 12)
    owner.fault(wording::other("out-of-range", where, std::to_string(list.size()) + " taps", "twelve at most"));
  return taps;
}

void read_two_windings(reading_desk& desk, page& primary, const json& list) {
  const std::string where = primary.place("windings");
  if (!list.is_array() || list.size() != 2) {
    desk.faults.push_back(wording::wrong_sort(
        where, as_written(list), "two equal windings, such as [[\"100 V\", \"120 V\"], [\"100 V\", \"120 V\"]]"));
    return;
  }
  const auto a = read_taps(primary, list[0], where + "/0"), b = read_taps(primary, list[1], where + "/1");
  if (a != b) {
    desk.faults.push_back(wording::other("unequal", where, "two windings that differ",
                                         "two equal windings: only such may be linked in parallel"));
  }
  desk.out.primary.two_windings = true;
  desk.out.primary.taps = a;
}

void choose_on(reading_desk& desk, const std::optional<volts>& wall, const std::string& path) {
  primary_wish& p = desk.out.primary;
  const auto positions = selector_positions(p);
  // What the wall says, else 230 V or 120 V where they are, else the highest.
  std::vector<volts> wishes{230_V, 120_V, positions.back().at};
  if (wall) wishes.insert(wishes.begin(), *wall);
  for (const volts& v : wishes) {
    p.on = v;
    if (has_nominal_position(p)) break;
  }
  if (positions.size() > 1) desk.assume(path, written(p.on), "the nominal mains among the positions");
}

void read_primary(reading_desk& desk, page& root, const std::optional<volts>& wall) {
  primary_wish& p = desk.out.primary;
  auto primary = root.object("primary");
  if (!primary) {
    if (wall) p.taps = {*wall};
    if (!wall && !root.has("primary")) {
      desk.faults.push_back(wording::missing(root.place("primary"), "the primary, such as {\"taps\": [\"230 V\"]}"));
    }
    if (wall) p.on = *wall;
    return;
  }
  const std::size_t faults_before = desk.faults.size();
  const json* taps = primary->value("taps");
  const json* two = primary->value("windings");
  if (taps && two) {
    desk.faults.push_back(wording::other("either-or", primary->where(), "both taps and windings", "one of them"));
  } else if (taps) {
    p.taps = read_taps(*primary, *taps, primary->place("taps"));
  } else if (two) {
    read_two_windings(desk, *primary, *two);
  } else if (wall) {
    p.taps = {*wall};
  } else {
    desk.faults.push_back(wording::missing(primary->place("taps"), "the volts of the primary, such as [\"230 V\"]"));
  }
  const auto on = primary->quantity<volts>("on", "10 V", "1000 V");
  p.fixed = read_wishes(desk, *primary);
  if (p.fixed.tolerance_ratio)
    desk.faults.push_back(wording::not_yet(primary->place("tolerance"), "a tolerance of the primary",
                                           "its taps are whole turns, within one of their ratio"));
  if (p.fixed.n && p.fixed.n->count() < static_cast<int>(p.taps.size())) {
    desk.faults.push_back(wording::other("out-of-range", primary->place("turns"),
                                         std::to_string(p.fixed.n->count()) + " turns",
                                         "at least a turn for each tap"));
  }
  primary->finish();
  if (p.taps.empty() || desk.faults.size() > faults_before)
    return;  // nothing to be said of `on` before the taps are right
  if (!on) return choose_on(desk, wall, "/primary/on");
  p.on = *on;
  if (!has_nominal_position(p)) {
    std::vector<std::string> known;
    for (const selector_position& s : selector_positions(p)) known.push_back(written(s.at));
    desk.faults.push_back(wording::unknown_word(primary->place("on"), written(*on), known));
  }
}

void read_volts(reading_desk& desk, page& w, secondary_wish& out) {
  const auto on_load = w.text("voltage"), no_load = w.text("no_load_voltage");
  if (!w.has("voltage") && !w.has("no_load_voltage")) {
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

// One fault for a rectified load, whatever keys it is written with.
void refuse_rails(page& w) {
  const char* first = nullptr;
  for (const char* key : {"dc_current", "circuit", "rail", "rectifier", "target", "polarity", "series_capacitor"}) {
    if (w.has(key) && !first) first = key;
  }
  if (first) {
    w.not_yet(
        first, "a rectified load, which needs the supply solver",
        "give the winding's own r.m.s. amperes as \"current\" (on the command line: write rms after the current)");
  }
  w.not_yet("load", "a load of a known transformer");
  w.not_yet("leakage_inductance", "the leakage of a known transformer");
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
  refuse_rails(w);
  const auto current = w.quantity<amperes>("current", "10 uA", "300 A");
  const bool rectified = w.has("circuit") || w.has("rail") || w.has("dc_current");
  if (!current && !w.has("current") && !rectified) {
    desk.faults.push_back(wording::missing(w.place("current"), "the r.m.s. current in the winding, such as \"3.1 A\""));
  }
  out.current = amperes_rms{current.value_or(1_A)};
  out.floats_on = w.text("floats_on");
  out.tap_of = w.text("tap_of");
  out.fixed = read_wishes(desk, w);
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
    if (host && (host->tap_of || s.voltage >= host->voltage)) {
      desk.faults.push_back(wording::other("tap", here,
                                           wording::quoted(s.name) + " as a tap of " + wording::quoted(host->name),
                                           "fewer volts than the half it is a tap of, which is no tap itself"));
    }
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

void read_mains_and_primary(reading_desk& desk, page& root) {
  std::optional<volts> wall;
  std::optional<tolerance> band;
  std::optional<ohms> source;
  bool has_band = false;
  if (auto mains = root.object("mains")) {
    read_frequency(desk, *mains);
    wall = mains->quantity<volts>("voltage", "10 V", "1000 V");
    source = mains->quantity<ohms>("source_resistance", "0 ohm", "1 kohm");
    has_band = mains->has("tolerance");
    if (const auto text = mains->text("tolerance")) band = read_tolerance(*mains, *text);
    mains->finish();
  } else if (!root.has("mains")) {
    desk.faults.push_back(wording::missing(root.place("mains"),
                                           "the mains, such as {\"frequency\": \"50 Hz\", \"tolerance\": \"10 %\"}"));
  }
  read_primary(desk, root, wall);
  if (desk.out.primary.taps.empty()) return;
  mains_wish& m = desk.out.mains;
  if (!has_band) {
    std::string region = "no supply of the table fits";
    band = usual_band(desk.tables, desk.out.primary.on, m.frequency, region).value_or(tolerance{0.1, 0.1});
    desk.assume("/mains/tolerance", "+" + written(ratio{band->over}) + " -" + written(ratio{band->under}),
                "band of the supply: " + region);
  }
  if (band) {
    m.over_ratio = band->over;
    m.under_ratio = band->under;
  }
  m.source_resistance = source.value_or(desk.out.primary.on < 160_V ? 0.2_ohm : 0.5_ohm);
  if (!source) desk.assume("/mains/source_resistance", written(m.source_resistance), "a usual outlet (memory)");
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
