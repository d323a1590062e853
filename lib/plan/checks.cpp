#include <algorithm>
#include <cmath>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/plan.hpp>

namespace turnwright {

using namespace literals;

namespace {

void add_limits(const design& p, const std::string& cure, std::vector<check>& all) {
  for (const limit_test& t : p.made.limits) {
    check c{t.code,
            t.holds ? level::pass : level::stop,
            t.what,
            shown_plain(t.found, t.of, 4),
            shown_plain(t.bound, t.of, 4),
            ""};
    const bool build = t.code == "window-fit" && t.of == kind::ratio;
    const bool tight = build && t.holds && t.found > comfortable_fill;
    const bool no_turn = build && p.made.coil.too_wide;
    if (no_turn) c.found = "no room for a turn";
    if (tight) {
      c.weight = level::caution;
      c.text += ": fits, with less than 8 % left for leads and the last wrap";
      c.cure = "the next thinner wire on the largest winding, or a larger stack";
    }
    if (!t.holds) {
      c.text += no_turn ? ": not even one turn fits between the margins" : ": over by " + percent(t.excess());
      if (t.found < t.bound && !no_turn) c.text = t.what + ": under by " + percent(t.excess());
      c.cure = cure;
    }
    all.push_back(std::move(c));
  }
}

void add_volts(const design& p, const std::string& cure, std::vector<check>& all) {
  for (const planned_winding& w : p.windings) {
    if (w.screen || w.primary) continue;
    const auto wish = std::find_if(p.wanted.secondaries.begin(), p.wanted.secondaries.end(),
                                   [&](const auto& s) { return s.name == w.name; });
    if (wish->rail && wish->rail->target) continue;  // the rail's own check says it
    const bool holds = volts_off(*wish, 1 + *w.error_ratio) <= 1 + 1e-9;
    const bool heater = is_heater(*wish);
    check c{heater ? "heater-turns" : "ht-volts",
            holds ? level::pass : level::stop,
            "volts of " + w.name + (wish->no_load ? " without load" : " on load"),
            shown((wish->no_load ? w.no_load : w.on_load).plain(), 4) + " (" + signed_percent(*w.error_ratio) + ")",
            "within " + written(*w.tolerance) + " of what the job says",
            ""};
    if (!holds) {
      c.cure = wish->fixed.n ? "let the turns of " + w.name + " be chosen; one turn is " + shown(w.one_turn, 3) : cure;
    }
    all.push_back(std::move(c));
  }
}

// The heaters of the listed valves against the windings for them.
void add_heater_needs(const design& p, std::vector<check>& all) {
  for (const heater_need& n : p.wanted.heaters) {
    const bool holds = n.given >= n.taken * 0.99;
    all.push_back(
        {"open-questions", holds ? level::pass : level::stop,
         "heaters of the listed valves at " + written(n.at) + " against the current of the windings for them",
         shown(n.given), "at least " + shown(n.taken),
         holds ? ""
               : "a heater current of " + shown(n.taken) + ", or the list of valves as this transformer feeds them"});
  }
}

// Amperes that the job calls neither direct nor r.m.s.
// Heat and wire rest on the states at nominal and at high mains.
void add_unsettled(const design& p, std::vector<check>& all) {
  for (const running* r : {&p.made.nominal, &p.made.high}) {
    if (r->electric.settled) continue;
    all.push_back({"load-beyond-supply", level::caution, "wire and heat were reckoned from a state that did not settle",
                   "residual " + shortest(rounded_to(r->electric.residual_ratio, 2)), "0.00005",
                   "look at the loads and values of the rails"});
  }
}

void add_current_kinds(const design& p, std::vector<check>& all) {
  for (const secondary_wish& w : p.wanted.secondaries) {
    if (!w.kind_left_open) continue;
    all.push_back({"current-kind", level::caution,
                   "the current of " + w.name +
                       " is called neither dc nor rms; behind a rectifier or over 50 V the trade means the direct "
                       "current of the load, and so it was taken",
                   "no word", "dc or rms behind the current", "write dc or rms"});
  }
}

void add_heaters_over_mains(const design& p, std::vector<check>& all) {
  for (const secondary_wish& w : p.wanted.secondaries) {
    if (!is_heater(w)) continue;
    double worst = 0;
    for (const supplied_state& s : p.supply.states) {
      if (s.load != load_state::full) continue;
      for (const auto& [name, v] : s.windings) {
        const double off = plain(v.plain()) / plain(w.voltage) - 1;
        if (name == w.name && std::abs(off) > std::abs(worst)) worst = off;
      }
    }
    const double follows = std::max(p.wanted.mains.over_ratio, p.wanted.mains.under_ratio) + tolerance_of(w).over;
    const bool with_the_wall =
        std::abs(worst) <= follows * 1.02;  // the drop under load is a little larger at high mains
    all.push_back({"heater-volts", with_the_wall ? level::note : level::caution,
                   w.name + " at the ends of the mains range: a heater follows the wall; makers' usual limits are 5 % "
                            "for long life, 10 % at most (recalled)",
                   signed_percent(worst), "mains range and tolerance together: " + percent(follows),
                   with_the_wall ? "" : "a primary tap for the mains that is really there"});
  }
}

// A coil is made for one position; on the others the turns are a little other and the drop is another.
void add_other_positions(const design& p, std::vector<check>& all) {
  for (const planned_setting& s : p.settings) {
    for (std::size_t i = 0; i < p.wanted.secondaries.size(); ++i) {
      const secondary_wish& w = p.wanted.secondaries[i];
      const volts wanted = w.second_half ? w.voltage + *w.second_half : w.voltage;
      const double ratio = plain(s.on_load[i].second.plain()) / plain(wanted);
      const bool by_rail = w.rail && w.rail->target;
      if (by_rail || w.no_load || w.fixed.n || s.at == p.wanted.primary.on || volts_off(w, ratio) <= 1 + 1e-9) continue;
      all.push_back({is_heater(w) ? "heater-turns" : "ht-volts", level::caution,
                     "volts of " + w.name + " with the selector on " + written(s.at),
                     shown(s.on_load[i].second.plain(), 4) + " (" + signed_percent(ratio - 1) + ")",
                     "within " + written(tolerance_of(w)) + " of what the job says",
                     "a thicker primary, or plan for that position"});
    }
  }
}

void add_taps(const design& p, std::vector<check>& all) {
  if (p.settings.size() > 1) {
    const auto worst = std::max_element(p.settings.begin(), p.settings.end(),
                                        [](const auto& a, const auto& b) { return a.density < b.density; });
    const amperes_per_square_metre most = p.wanted.limits.current_density.value_or(usual_highest_density);
    const bool holds = worst->density <= most;
    all.push_back({"tap-wire", holds ? level::pass : level::caution,
                   "current density of the primary at its worst position, " + written(worst->at), shown(worst->density),
                   shown(most), holds ? "" : "a thicker wire below that tap, or two equal primaries"});
  }
  for (const planned_winding& w : p.windings) {
    for (const planned_tap& t : w.taps) {
      const bool end = t.n == w.n && !w.tap_of;
      if (!t.mid_layer || end) continue;
      all.push_back({"lead-exits", level::note,
                     (t.at == "centre tap" ? "centre tap of " : "tap of ") + w.name + " at " +
                         std::to_string(t.n.count()) + " turns lies inside layer " + std::to_string(t.layer),
                     "mid-layer", "the end of a layer",
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
                 c.grade.name + ", " + std::string(word_of(c.grade.known_how)), "a grade known by its mark or by test",
                 ""});
  if (p.made.nominal.loss_beyond_curve) {
    all.push_back({"iron-identity", level::note, "iron loss was read beyond the ends of the loss curve",
                   shown(p.flux_on_load), "inside the curve", ""});
  }
}

void add_insulation(const design& p, std::vector<check>& all) {
  for (const coil_draft& c : p.made.coil.coils) {
    const bool floating = !c.role.primary && p.wanted.secondaries[c.role.which].floats_on;
    const bool wrap_short = c.wrap_under < c.wrap_usual, margin_short = c.margin < c.margin_usual;
    if (floating) {
      all.push_back({"floating-heater", wrap_short || margin_short ? level::stop : level::note,
                     c.role.name + " rides on " + *p.wanted.secondaries[c.role.which].floats_on +
                         ": insulate it as that winding, on both sides",
                     shown(c.to_core.dc.plain()) + " dc to the core; wrap " + shown(c.wrap_under, 2) + ", margin " +
                         shown(c.margin, 2),
                     "wrap " + shown(c.wrap_usual, 2) + ", margin " + shown(c.margin_usual, 2) + " (practice)",
                     wrap_short || margin_short ? "leave wrap and margin to the plan" : ""});
    } else if (wrap_short || margin_short) {
      all.push_back({"lead-exits", level::caution,
                     "insulation that the job fixes for " + c.role.name + " is less than practice",
                     "wrap " + shown(c.wrap_under, 2) + ", margin " + shown(c.margin, 2),
                     "wrap " + shown(c.wrap_usual, 2) + ", margin " + shown(c.margin_usual, 2),
                     "leave wrap and margin to the plan"});
    }
  }
  if (!p.wanted.screens.empty()) {
    all.push_back({"closed-turn", level::note,
                   "a screen's ends must overlap insulated, with one lead only: a bare lap is a shorted turn",
                   "foil of one turn", "at least 3 mm of insulated lap", ""});
  }
  if (p.wanted.primary.two_windings) {
    all.push_back({"primary-phasing", level::note,
                   "mark the starts: primaries linked in parallel the wrong way round are a short circuit",
                   "two equal primaries", "like ends proved before linking", ""});
  }
}

// Hot spot of each class of insulation (IEC 60085, read); five kelvins kept from it (practice).
void add_hot_spot(const design& p, std::vector<check>& all) {
  const char letter = p.wanted.insulation.thermal_class;
  const double top = letter == 'A' ? 105 : letter == 'E' ? 120 : letter == 'B' ? 130 : letter == 'F' ? 155 : 180;
  const temperature bound = celsius(top - 5);
  const bool holds = p.heat_high.hot_spot <= bound;
  all.push_back({"heat", holds ? level::pass : level::caution,
                 std::string("hot spot at the highest mains, class ") + letter + " less 5 K",
                 shown(p.heat_high.hot_spot), shown(bound),
                 holds ? "" : "thicker wire, a larger stack, or insulation of a higher class throughout"});
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
  for (check& c : rail_checks(p.supply)) {
    if (c.weight == level::stop && c.code == "ht-volts") c.cure = cure;
    all.push_back(std::move(c));
  }
  add_current_kinds(p, all);
  add_unsettled(p, all);
  add_heater_needs(p, all);
  add_other_positions(p, all);
  add_heaters_over_mains(p, all);
  add_taps(p, all);
  add_iron(p, all);
  add_insulation(p, all);
  add_hot_spot(p, all);
  add_regulation(p, all);
  return in_order(std::move(all));
}

std::vector<std::string> winding_cautions() {
  return {
      "Mains and HT kill. Wiring and testing are for people trained to do it, under the local code and, where the law "
      "asks for it, a licence.",
      "Before power: earth core, frame and screen; prove earth continuity; fit the fuse; insulate every free lead, "
      "unused taps too.",
      "First power through a series lamp or a slowly raised isolated supply; an open HT winding gives its full volts.",
      "Insulation and test volts here are guidance from practice, partly recalled; compliance with a safety standard "
      "needs the standard "
      "and a competent test house.",
  };
}

}  // namespace turnwright
