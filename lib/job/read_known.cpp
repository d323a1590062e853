#include <algorithm>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/turn_choice.hpp>

#include "rails.hpp"
#include "winding_text.hpp"

namespace turnwright {

using namespace job_detail;
using namespace literals;

namespace {

// What a known winding gives beside its rail: of each half where it has two.
struct known_winding {
  std::string name;
  volts first = 0_V;
  std::optional<volts> second;
  std::vector<ohms> resistance;
  std::vector<henries> leakage;
  std::optional<ohms> load;
  std::optional<rail_wish> rail;
  std::optional<std::string> tap_of;
  bool halves_together = false;  ///< halves that one load or bridge takes as a whole
};

template <class Q>
std::vector<Q> one_or_two(page& w, const char* key, const char* least, const char* most, bool halves) {
  const json* v = w.value(key);
  if (!v) return {};
  if (!v->is_array()) {
    const auto q = w.quantity<Q>(key, least, most);
    if (!q) return {};
    // A single figure is that of the whole, shared equally between the halves.
    return halves ? std::vector<Q>{*q / 2.0, *q / 2.0} : std::vector<Q>{*q};
  }
  if (!halves || v->size() != 2) {
    w.fault(wording::wrong_sort(
        w.place(key), as_written(*v),
        halves ? "one figure, or a list of two, one for each half" : "one figure: the winding has no halves"));
    return {};
  }
  std::vector<Q> both;
  for (std::size_t i = 0; i < 2; ++i) {
    if (const auto q = w.quantity_of<Q>((*v)[i], w.place(key) + "/" + std::to_string(i), least, most))
      both.push_back(*q);
  }
  return both;
}

std::optional<ohms> read_ac_load(page& w, volts at) {
  const auto text = w.text("load");
  if (!text) return std::nullopt;
  if (read<ohms>(*text).value) return w.quantity<ohms>("load", "1 mohm", "1 Gohm");
  const auto amps = w.quantity_in<amperes>(*text, w.place("load"), "1 uA", "300 A");
  return amps ? std::optional(at / *amps) : std::nullopt;
}

known_winding read_winding(reading_desk& desk, page& w) {
  known_winding out;
  out.name = w.text("name").value_or("");
  if (out.name.empty() || out.name.size() > 40)
    w.fault(wording::missing(w.place("name"), "a name of 1 to 40 characters, such as \"heaters\""));
  const auto text = w.text("no_load_voltage");
  if (!w.has("no_load_voltage"))
    w.fault(
        wording::missing(w.place("no_load_voltage"), "the volts without load, such as \"6.75 V\" or \"300-0-300 V\""));
  const auto v = text ? read_winding_volts(*text, w.place("no_load_voltage"), desk.faults) : std::nullopt;
  if (v) {
    out.first = v->first;
    out.second = v->second;
  }
  const auto at_text = w.text("voltage");
  const auto at = at_text ? read_winding_volts(*at_text, w.place("voltage"), desk.faults) : std::nullopt;
  w.flag("centre_tap");
  w.text("floats_on");
  out.resistance = one_or_two<ohms>(w, "resistance", "1 uohm", "1 Mohm", out.second.has_value());
  if (!w.has("resistance"))
    w.fault(
        wording::missing(w.place("resistance"), "the winding's resistance, such as \"48 ohm\", or one for each half"));
  out.leakage = one_or_two<henries>(w, "leakage_inductance", "0 H", "100 H", out.second.has_value());
  const bool rectified = asks_for_rail(w);
  if (rectified)
    out.rail = read_rail(desk, w, out.second.has_value() || w.flag("centre_tap").value_or(false), w.has("tap_of"),
                         out.first, std::nullopt);
  const volts whole = out.second ? out.first + *out.second : out.first;
  const volts spoken = at ? (at->second ? at->first + *at->second : at->first) : whole;
  out.load = read_ac_load(w, spoken);
  if (w.has("load") && rectified)
    w.fault(wording::other("either-or", w.where(), "both a load across the winding and a rail", "one of them"));
  if (out.rail && out.rail->target)
    w.fault(wording::other("either-or", w.place("target"), "a target for a known winding",
                           "no target: its turns are what they are"));
  out.tap_of = w.text("tap_of");
  if (out.tap_of && out.second)
    w.fault(wording::other("tap", w.where(), "a tap with halves of its own", "a plain tap"));
  out.halves_together = out.second && !(out.rail && out.rail->kind == supply::circuit::full_wave_centre_tap);
  w.finish();
  return out;
}

class builder {
 public:
  builder(reading_desk& desk, const std::vector<known_winding>& all, volts primary)
      : desk_(desk), all_(all), primary_(primary) {}

  void build(amplifier_supply& out) {
    for (const known_winding& w : all_) {
      if (!w.tap_of) add(out, w, std::nullopt);
    }
    for (const known_winding& w : all_) {
      if (w.tap_of) add(out, w, host_of(out, w));
    }
    // In the order of the job.
    std::stable_sort(out.windings.begin(), out.windings.end(),
                     [&](const auto& a, const auto& b) { return place(a.name) < place(b.name); });
    const std::size_t ports = out.base.ports.size();
    check_taps(out);
    out.base.leakage.assign(ports * ports, 0_H);
    for (std::size_t k = 0; k < ports; ++k) {
      for (std::size_t m = 0; m < ports; ++m) out.base.leakage[k * ports + m] = together(out.base.ports, k, m);
    }
  }

 private:
  std::size_t place(const std::string& name) const {
    return static_cast<std::size_t>(
        std::find_if(all_.begin(), all_.end(), [&](const known_winding& w) { return w.name == name; }) - all_.begin());
  }

  std::optional<std::size_t> host_of(const amplifier_supply& out, const known_winding& w) const {
    for (const supplied_winding& h : out.windings) {
      if (h.name != *w.tap_of || h.tap_of) continue;
      const bool fits = w.first < out.base.ports[h.first].ratio * primary_ && !w.resistance.empty() &&
                        w.resistance.front() < out.base.ports[h.first].resistance &&
                        (w.leakage.empty() || w.leakage.front() <= own_[h.first]);
      if (!fits)
        desk_.faults.push_back(
            wording::other("tap", "/secondaries/" + std::to_string(place(w.name)),
                           wording::quoted(w.name) + " as a tap of " + wording::quoted(h.name),
                           "fewer volts, less resistance and no more leakage than the half it is a tap of"));
      const bool fixed_end = !h.rail || h.rail->kind == supply::circuit::full_wave_centre_tap ||
                             h.rail->kind == supply::circuit::half_wave;
      if (!fixed_end && w.rail)
        desk_.faults.push_back(
            wording::other("tap", "/secondaries/" + std::to_string(place(w.name)) + "/tap_of",
                           "a rectified tap of a winding behind a " + std::string(word_of(h.rail->kind)),
                           "a tap of a centre-tapped or half-wave winding, or a winding of its own"));
      return h.first;
    }
    desk_.faults.push_back(wording::other("unknown-word", "/secondaries/" + std::to_string(place(w.name)) + "/tap_of",
                                          wording::quoted(*w.tap_of),
                                          "another winding of the job that is no tap itself"));
    return std::nullopt;
  }

  // Of two taps of one half the one with more volts holds the other: it has no less resistance and leakage.
  void check_taps(const amplifier_supply& out) const {
    for (const supplied_winding& a : out.windings) {
      for (const supplied_winding& b : out.windings) {
        if (!a.tap_of || a.tap_of != b.tap_of || &a == &b) continue;
        const supply::port &pa = out.base.ports[a.first], &pb = out.base.ports[b.first];
        if (pa.ratio >= pb.ratio && (pa.resistance < pb.resistance || own_[a.first] < own_[b.first]))
          desk_.faults.push_back(wording::other(
              "tap", "/secondaries/" + std::to_string(place(a.name)),
              wording::quoted(a.name) + " with less resistance or leakage than " + wording::quoted(b.name),
              "no less of either: the one with more volts contains the other"));
      }
    }
  }

  void add(amplifier_supply& out, const known_winding& w, std::optional<std::size_t> inside) {
    supplied_winding s{w.name, out.base.ports.size(), std::nullopt, w.tap_of, w.rail, false, std::nullopt};
    const auto sum = [](const auto& list, auto none) {
      auto all = none;
      for (const auto& q : list) all += q;
      return all;
    };
    const volts whole = w.second ? w.first + *w.second : w.first;
    s.heater = !w.rail && plain(whole) <= 13;
    if (w.second && !w.halves_together) {
      s.second = s.first + 1;
      for (std::size_t half = 0; half < 2; ++half) {
        out.base.ports.push_back({plain(half == 0 ? w.first : *w.second) / plain(primary_),
                                  w.resistance.size() == 2 ? w.resistance[half] : 1_ohm, std::nullopt, std::nullopt});
        own_.push_back(w.leakage.size() == 2 ? w.leakage[half] : 0_H);
      }
    } else {
      out.base.ports.push_back(
          {plain(whole) / plain(primary_), w.resistance.empty() ? 1_ohm : sum(w.resistance, 0_ohm), w.load, inside});
      own_.push_back(sum(w.leakage, 0_H));
    }
    out.windings.push_back(std::move(s));
  }

  // Leakage that two ports meet together, referred to the primary: a tap's is contained in that of its half.
  henries together(const std::vector<supply::port>& ports, std::size_t k, std::size_t m) const {
    const bool contained = k != m && (ports[k].inside == m || ports[m].inside == k);
    const bool two_taps = k != m && ports[k].inside && ports[k].inside == ports[m].inside;
    if (k != m && !contained && !two_taps) return 0_H;
    const henries own = k == m      ? own_[k]
                        : contained ? (ports[k].inside == m ? own_[k] : own_[m])
                                    : std::min(own_[k], own_[m]);
    return own / (ports[k].ratio * ports[m].ratio);
  }

  reading_desk& desk_;
  const std::vector<known_winding>& all_;
  volts primary_;
  std::vector<henries> own_;  // of each port
};

void read_transformer(reading_desk& desk, page& root, supply::network& net, volts& primary) {
  auto known = root.object("known");
  if (!known) return;
  const auto v = known->quantity<volts>("primary_voltage", "10 V", "1000 V");
  const auto r = known->quantity<ohms>("primary_resistance", "0 ohm", "10 kohm");
  if (!known->has("primary_voltage"))
    desk.faults.push_back(wording::missing(known->place("primary_voltage"),
                                           "the volts that the no-load volts go with, such as \"230 V\""));
  if (!known->has("primary_resistance"))
    desk.faults.push_back(
        wording::missing(known->place("primary_resistance"), "the primary's resistance, such as \"6.2 ohm\""));
  primary = v.value_or(230_V);
  net.primary_resistance = r.value_or(0_ohm);
  net.primary_leakage = known->quantity<henries>("leakage_inductance", "0 H", "100 H").value_or(0_H);
  net.magnetising_inductance = known->quantity<henries>("magnetising_inductance", "1 mH", "100 kH");
  net.core_loss_resistance = known->quantity<ohms>("core_loss_resistance", "1 ohm", "100 Mohm");
  known->finish();
}

void check_names(reading_desk& desk, const std::vector<known_winding>& all) {
  for (std::size_t i = 0; i < all.size(); ++i) {
    for (std::size_t j = 0; j < i; ++j) {
      if (all[i].name == all[j].name)
        desk.faults.push_back(wording::other("repeated-name", "/secondaries/" + std::to_string(i) + "/name",
                                             wording::quoted(all[i].name) + " a second time",
                                             "a name of its own for every winding"));
    }
  }
}

}  // namespace

bool is_known(std::string_view text, const std::string& origin) { return parse(text, origin).contains("known"); }

known_supply read_known(std::string_view text, const std::string& origin, const shop& s, const catalogue& tables) {
  const json node = parse(text, origin);
  demand scratch;
  std::vector<remark> faults;
  reading_desk desk{s, tables, scratch, faults};
  page root(node, origin + " ", faults);
  read_head(desk, root);
  known_supply out;
  const mains_read mains = read_mains(desk, root);
  volts primary = 230_V;
  read_transformer(desk, root, out.supply.base, primary);
  settle_band(desk, mains, primary);
  std::vector<known_winding> windings;
  if (!root.has("secondaries"))
    faults.push_back(wording::missing(root.place("secondaries"), "a list of secondary windings"));
  root.each("secondaries", [&](const json& w, const std::string& where) {
    if (!w.is_object()) {
      faults.push_back(wording::wrong_sort(where, as_written(w), "a winding as an object in braces"));
      return;
    }
    page p = root.at(w, where);
    windings.push_back(read_winding(desk, p));
  });
  if (root.has("secondaries") && windings.empty() && faults.empty())
    faults.push_back(wording::missing(root.place("secondaries"), "at least one winding"));
  if (windings.size() > 24)
    faults.push_back(wording::other("out-of-range", root.place("secondaries"),
                                    std::to_string(windings.size()) + " windings", "24 at most"));
  for (const char* key : {"primary", "valves", "order", "screens", "core", "former", "insulation", "wire", "limits",
                          "duty", "aim", "prices"}) {
    if (root.has(key))
      faults.push_back(wording::other("either-or", root.place(key), "a section for a transformer to be made",
                                      "none of it beside \"known\""));
  }
  refuse_later_parts(root);
  root.finish();
  check_names(desk, windings);
  if (!faults.empty()) throw refused(std::move(faults));
  builder(desk, windings, primary).build(out.supply);
  if (!faults.empty()) throw refused(std::move(faults));
  out.supply.title = scratch.title;
  // The band lies about the volts that the primary is for; what is at the wall now may stand anywhere in it, or beyond.
  const volts wall = mains.wall.value_or(primary);
  const double nominal_over_wall = plain(primary) / plain(wall);
  out.supply.over_ratio = std::max(0.0, (1 + scratch.mains.over_ratio) * nominal_over_wall - 1);
  out.supply.under_ratio = std::max(0.0, 1 - (1 - scratch.mains.under_ratio) * nominal_over_wall);
  supply::network& net = out.supply.base;
  net.mains = volts_rms{wall};
  net.frequency = scratch.mains.frequency;
  net.source_resistance = mains.source.value_or(0_ohm);
  if (!mains.wall) desk.assume("/mains/voltage", written(primary), "the volts of the known primary");
  if (!mains.source) desk.assume("/mains/source_resistance", "0 ohm", "the known figures are taken as they are");
  assume_sine(desk);
  out.assumed = scratch.assumed;
  return out;
}

}  // namespace turnwright
