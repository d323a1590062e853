#include <algorithm>
#include <cmath>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/plan.hpp>

namespace turnwright {

using namespace literals;

namespace {

std::string percent(double ratio, int decimals = 1) { return fixed(100 * ratio, decimals) + " %"; }

std::string signed_percent(double ratio) { return (ratio > 0 ? "+" : "") + percent(ratio); }

void add_limits(const design& p, const std::string& cure, std::vector<check>& all) {
  for (const limit_test& t : p.made.limits) {
    check c{t.code, t.holds ? level::pass : level::stop, t.what, shown_plain(t.found, t.of, 4), shown_plain(t.bound, t.of, 4), ""};
    const bool tight = t.code == "window-fit" && t.holds && t.found > 0.92;
    if (tight) {
      c.weight = level::caution;
      c.text += ": fits, with less than 8 % left for leads and the last wrap";
      c.cure = "the next thinner wire on the largest winding, or a larger stack";
    }
    if (!t.holds) {
      c.text += p.made.coil.too_wide && t.code == "window-fit" ? ": not even one turn fits between the margins"
                                                               : ": over by " + percent(t.excess());
      if (t.found < t.bound) c.text = t.what + ": under by " + percent(t.excess());
      c.cure = cure;
    }
    all.push_back(std::move(c));
  }
}

void add_volts(const design& p, const std::string& cure, std::vector<check>& all) {
  for (const planned_winding& w : p.windings) {
    if (w.screen || w.primary) continue;
    const auto wish = std::find_if(p.wanted.secondaries.begin(), p.wanted.secondaries.end(), [&](const auto& s) { return s.name == w.name; });
    const bool holds = std::abs(*w.error_ratio) <= w.tolerance_ratio * (1 + 1e-9);
    const bool heater = is_heater(*wish);
    check c{heater ? "heater-turns" : "ht-volts", holds ? level::pass : level::stop,
            "volts of " + w.name + (wish->no_load ? " without load" : " on load"),
            shown((wish->no_load ? w.no_load : w.on_load).plain(), 4) + " (" + signed_percent(*w.error_ratio) + ")",
            "within " + percent(w.tolerance_ratio) + " of what the job says", ""};
    if (!holds) {
      c.cure = wish->fixed.n ? "let the turns of " + w.name + " be chosen; one turn is " + shown(w.one_turn, 3) : cure;
    }
    all.push_back(std::move(c));
  }
}

void add_heaters_over_mains(const design& p, std::vector<check>& all) {
  for (const secondary_wish& w : p.wanted.secondaries) {
    if (!is_heater(w)) continue;
    double worst = 0;
    for (const planned_state& s : p.states) {
      for (const auto& [name, v] : s.on_load) {
        const double off = plain(v.plain()) / plain(w.voltage) - 1;
        if (name == w.name && std::abs(off) > std::abs(worst)) worst = off;
      }
    }
    const double follows = std::max(p.wanted.mains.over_ratio, p.wanted.mains.under_ratio) + tolerance_of(w) + 0.01;
    const bool with_the_wall = std::abs(worst) <= follows;
    all.push_back({"heater-volts", with_the_wall ? level::note : level::caution, w.name + " at the ends of the mains range: a heater follows the wall",
                   signed_percent(worst), "makers' usual limits, recalled: 5 % for long life, 10 % at most",
                   with_the_wall ? "" : "a primary tap for the mains that is really there"});
  }
}

void add_taps(const design& p, std::vector<check>& all) {
  if (p.settings.size() > 1) {
    const auto worst = std::max_element(p.settings.begin(), p.settings.end(), [](const auto& a, const auto& b) { return a.density < b.density; });
    all.push_back({"tap-wire", level::pass, "current density of the primary at its worst position, " + written(worst->at),
                   shown(worst->density), "what the wires were chosen for: " + shown(p.made.density), ""});
  }
  for (const planned_winding& w : p.windings) {
    for (const planned_tap& t : w.taps) {
      const bool end = t.n == w.n && !w.tap_of;
      if (!t.mid_layer || end) continue;
      all.push_back({"lead-exits", level::note, "tap of " + w.name + " at " + std::to_string(t.n.count()) + " turns lies inside layer " +
                     std::to_string(t.layer), "mid-layer", "the end of a layer",
                     "loop the wire out at the " + t.side + " side under its own sleeve; do not cut and joint it"});
    }
  }
}

void add_iron(const design& p, std::vector<check>& all) {
  const core_choice& c = p.made.coil.core.choice();
  const bool weak = c.grade.kind == steel_kind::old;
  all.push_back({"iron-identity", weak ? level::caution : level::note,
                 weak ? "iron of unknown or old grade: measure the no-load current before winding on it"
                      : "the plan holds for this grade; a core of unknown sheet wants a no-load test first",
                 c.grade.name + ", " + std::string(word_of(c.grade.known_how)), "a grade known by its mark or by test", ""});
  if (p.made.nominal.loss_beyond_curve) {
    all.push_back({"iron-identity", level::note, "iron loss was read beyond the ends of the loss curve", shown(p.flux_on_load), "inside the curve", ""});
  }
}

void add_insulation(const design& p, std::vector<check>& all) {
  for (const secondary_wish& w : p.wanted.secondaries) {
    if (!w.floats_on) continue;
    for (const planned_pair& pair : p.pairs) {
      if (pair.b == "core" && pair.a == w.name) {
        all.push_back({"floating-heater", level::note, w.name + " rides on " + *w.floats_on + ": insulate it as that winding, on both sides",
                       shown(pair.dc->plain()) + " dc to the core", "a test at " + shown(pair.test.plain(), 2) + " r.m.s. (guidance)", ""});
      }
    }
  }
  if (!p.wanted.screens.empty()) {
    all.push_back({"closed-turn", level::note, "a screen's ends must overlap insulated, with one lead only: a bare lap is a shorted turn",
                   "foil of one turn", "at least 3 mm of insulated lap", ""});
  }
  if (p.wanted.primary.two_windings) {
    all.push_back({"primary-phasing", level::note, "mark the starts: primaries linked in parallel the wrong way round are a short circuit",
                   "two equal primaries", "like ends proved before linking", ""});
  }
}

void add_regulation(const design& p, std::vector<check>& all) {
  for (const planned_winding& w : p.windings) {
    if (!w.regulation_ratio || *w.regulation_ratio <= 0.15) continue;
    all.push_back({"regulation", level::note, "regulation of " + w.name + " is soft", percent(*w.regulation_ratio),
                   "15 % or less (judgement)", "a larger core, or lower current density"});
  }
}

}  // namespace

std::vector<check> checks_of(const design& p, const std::string& cure) {
  std::vector<check> all;
  add_limits(p, cure, all);
  add_volts(p, cure, all);
  add_heaters_over_mains(p, all);
  add_taps(p, all);
  add_iron(p, all);
  add_insulation(p, all);
  add_regulation(p, all);
  std::stable_sort(all.begin(), all.end(), [](const check& a, const check& b) { return a.weight > b.weight; });
  return all;
}

std::vector<std::string> winding_cautions() {
  return {
      "Mains and HT kill. Wiring and testing are for people trained to do it, under the local code and, where the law asks for it, a licence.",
      "Before power: earth core, frame and screen; prove earth continuity; fit the fuse; insulate every free lead, unused taps too.",
      "First power through a series lamp or a slowly raised isolated supply; an open HT winding gives its full volts.",
      "Insulation and test volts here are guidance from practice, partly recalled; compliance with a safety standard needs the standard "
      "and a competent test house.",
  };
}

}  // namespace turnwright
