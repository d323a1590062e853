#include <turnwright/sheet/report.hpp>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/sheet/columns.hpp>

#include "parts.hpp"

namespace turnwright {

using namespace literals;
using namespace sheet_detail;

namespace {

std::string mm(metres l, int decimals = 1) { return fixed(plain(l) * 1e3, decimals); }
std::string volts_text(volts_rms v) {
  const double x = plain(v.plain());
  return fixed(x, x < 20 ? 2 : 1);
}

// Inches beside millimetres where the pattern is an inch one.
std::string with_inches(const design& p, metres l) {
  const std::string text = number(plain(l) * 1e3, 4) + " mm";
  if (p.made.coil.core.choice().pattern.family != pattern_family::ei_inch) return text;
  return text + " (" + number(plain(l) / 25.4e-3, 4) + " in)";
}

std::string wire_text(const wire_pick& w) {
  std::string text = w.wire.size;
  if (w.strands > 1) text = std::to_string(w.strands) + " x " + text;
  return text;
}

std::string head(const design& p) {
  std::string out = wrapped(p.wanted.title, "");
  std::string past;
  for (const std::string& code : p.wanted.accepted) past += (past.empty() ? "" : ", ") + code;
  if (!p.windable) {
    out += "CANNOT BE WOUND as it stands: see the checks marked STOP\n";
  } else {
    out += past.empty() ? "can be wound\n" : "NOT RIGHT: gone on past these stops, as asked: " + past + "\n";
  }
  return out + "\n";
}

std::string core_part(const design& p) {
  const core_body& core = p.made.coil.core;
  const core_choice& c = core.choice();
  std::string out = labelled(
      "Core", c.pattern.name + ", tongue " + with_inches(p, c.pattern.tongue) + ", stack " + with_inches(p, c.stack) +
                  ", " + c.grade.name + ", " + std::string(word_of(c.style)) + ", " + std::to_string(core.sheets()) +
                  " sheets of " + shown(c.grade.sheet, 2) + ", " + fixed(plain(core.mass()), 2) + " kg");
  out += labelled("", "net iron " + number(plain(core.net_area()) * 1e6, 4) + " mm2 (stacking factor " +
                          percent(c.stacking_factor, 0) + "), path " + number(plain(core.path()) * 1e3, 4) + " mm");
  out +=
      labelled("Flux", fixed(plain(p.flux_nominal), 3) + " T at " + written(p.wanted.primary.on) + " without load, " +
                           fixed(plain(p.flux_on_load), 3) + " T on load; " + fixed(plain(p.flux_high), 3) +
                           " T at the highest mains (" + signed_percent(p.wanted.mains.over_ratio) +
                           ") on the worst tap, " + written(p.wanted.mains.frequency));
  out += labelled("No load", shown(p.idle.current.plain()) + ", " + shown(p.idle.power));
  out += labelled(
      "Turns", number(p.turns_per_volt, 4) + " per volt, " + shown(as<volts>(1 / p.turns_per_volt), 3) + " per turn");
  const draft& f = p.made.coil;
  const coil_size outside = outside_of(f);
  out += labelled("Former", std::string(f.room.kind == former_kind::layers ? "tube for paper layers" : "bobbin") +
                                ", wall " + shown(f.room.wall, 2) + "; room for winding " + mm(f.room.winding_width) +
                                " mm along, " + mm(f.room.winding_height) + " mm high");
  out += labelled("Fit", mm(f.used, 2) + " mm of " + mm(f.room.winding_height, 2) + " mm used, " + percent(f.fill) +
                             ", bulge " + fixed(f.shape.bulge, 2) + " included; coil outside " + mm(outside.across) +
                             " x " + mm(outside.deep) + " mm");
  return out + "\n";
}

std::string winding_table(const design& p) {
  text_table t({"winding", "turns", "<wire", "bare", "over", "layers", "last", "margin", "paper", "wrap", "build"});
  for (const planned_winding& w : p.windings) {
    if (w.screen) {
      t.add({"screen", "1 open", std::string("foil"), mm(w.build, 2), "", "", "", "", "", mm(w.wrap_under, 2),
             mm(w.build, 2)});
    } else if (w.tap_of) {
      t.add({w.name, std::to_string(w.n.count()), "tap of " + *w.tap_of});
    } else {
      const planned_section& first = w.sections.front();
      t.add({w.name, std::to_string(w.n.count()), wire_text(first.wire), mm(first.wire.wire.bare, 3),
             mm(first.wire.overall, 3), std::to_string(w.layers) + " x " + std::to_string(w.per_layer.count()),
             std::to_string(w.last_layer.count()), mm(w.margin, 1), mm(w.interlayer, 3), mm(w.wrap_under, 2),
             mm(w.build, 2)});
      for (std::size_t k = 1; k < w.sections.size(); ++k) {
        const planned_section& s = w.sections[k];
        t.add({"  from turn " + std::to_string(s.from.count()), "", wire_text(s.wire), mm(s.wire.wire.bare, 3),
               mm(s.wire.overall, 3)});
      }
    }
  }
  return "Winding, from the core outwards; all in one direction, every start at the same end (mm)\n" + t.text() +
         wrapped(
             "bare and over the enamel: diameter; layers x turns in each, and in the last; margin at each end; paper "
             "between layers; wrap "
             "that it lies on; build without bulge. A layer that is not full is spread over the whole width",
             "  ") +
         "\n";
}

std::string ends_part(const design& p) {
  std::string out =
      "Starts, finishes and taps (counted from the start; the far side is the end away from the starts)\n";
  for (const planned_winding& w : p.windings) {
    if (w.screen) continue;
    std::string text;
    if (w.tap_of) {
      const planned_tap& t = w.taps.front();
      out += wrapped("at " + std::to_string(t.n.count()) + " turns of " + *w.tap_of + ", " +
                         std::to_string(w.n.count()) + " turns from its centre tap or common end (layer " +
                         std::to_string(t.layer) + ", " + t.side + " side" + (t.mid_layer ? ", mid-layer" : "") + ")",
                     "  " + w.name + ": ");
      continue;
    }
    text = "start 0";
    for (const planned_tap& t : w.taps) {
      text += "; " + t.at + " at " + std::to_string(t.n.count()) + " (layer " + std::to_string(t.layer) + ", " +
              t.side + " side" + (t.mid_layer && t.n < w.n ? ", mid-layer" : "") + ")";
    }
    if (!w.primary)
      text += "; finish at " + std::to_string(w.n.count()) + " (layer " + std::to_string(w.layers) + ", " +
              w.finish_side + " side)";
    out += wrapped(text, "  " + w.name + ": ");
  }
  return out + "\n";
}

std::string electric_table(const design& p) {
  text_table t({"winding", "ohm cold", "ohm hot", "V open", "V loaded", "off", "A rms", "A/mm2", "W", "K"});
  for (const planned_winding& w : p.windings) {
    if (w.screen) continue;
    const auto ohm = [](ohms r) { return number(plain(r), 3); };
    t.add({w.name, ohm(w.resistance_20), ohm(w.resistance_hot), volts_text(w.no_load), volts_text(w.on_load),
           w.error_ratio ? signed_percent(*w.error_ratio) : "", number(plain(w.current.plain()), 3),
           fixed(plain(w.density) * 1e-6, 2), w.tap_of ? "" : fixed(plain(w.loss), 2), fixed(plain(w.rise), 0)});
    for (std::size_t h = 0; h < w.halves.size(); ++h) {
      const planned_half& half = w.halves[h];
      t.add({h == 0 ? "  inner half" : "  outer half", ohm(half.resistance_20), ohm(half.resistance_hot),
             volts_text(half.no_load), volts_text(half.on_load), "", number(plain(half.current.plain()), 3)});
    }
  }
  return "Electrical at full load, " + written(p.wanted.primary.on) + "\n" + t.text() +
         wrapped(
             "ohm cold at 20 degC; volts without and with load; off: from what was wanted; W lost in it; K: its "
             "average rise at the highest "
             "mains",
             "  ") +
         "\n";
}

std::string settings_part(const design& p) {
  std::vector<std::string> heads{"position", "turns", "line A", "A/mm2", "T"};
  for (const auto& [name, v] : p.settings.front().on_load) heads.push_back(name + " V");
  text_table t(heads);
  for (const planned_setting& s : p.settings) {
    std::vector<std::string> cells{written(s.at), std::to_string(s.n.count()), number(plain(s.current.plain()), 3),
                                   fixed(plain(s.density) * 1e-6, 2), fixed(plain(s.flux_density), 3)};
    for (const auto& [name, v] : s.on_load) cells.push_back(volts_text(v));
    t.add(cells);
  }
  std::string out = "Mains selector: each position at its nominal volts, full load\n" + t.text();
  for (const planned_setting& s : p.settings) out += wrapped(s.links, "  " + written(s.at) + ": ");
  return out + "\n";
}

std::string power_part(const design& p) {
  const running& r = p.made.nominal;
  std::string out = labelled("Power", shown(r.electric.output, 4) + " out, " + shown(r.electric.input, 4) + " in (" +
                                          shown(r.electric.apparent, 4) + "); copper " + shown(r.copper_loss) +
                                          ", iron " + shown(r.core_loss) + "; efficiency " +
                                          percent(plain(r.electric.output) / plain(r.electric.input)));
  const auto heat = [](const planned_heat& h) {
    return "hottest winding " + fixed(plain(h.winding_rise), 0) + " K over " + shown(h.ambient) +
           " on average (hot spot " + shown(h.hot_spot) + "), core " + fixed(plain(h.core_rise), 0) + " K";
  };
  const std::string where = p.settings.size() > 1 ? " on " + written(p.heat_high.position) : "";
  out += labelled("Heat", "at the highest mains" + where + ": " + heat(p.heat_high));
  out += labelled("", "at nominal mains: " + heat(p.heat_nominal));
  out += labelled(
      "Mass", fixed(plain(p.mass), 2) + " kg in all" + (p.cost ? "; copper and iron cost " + fixed(*p.cost, 2) : ""));
  return out + "\n";
}

std::string pairs_part(const design& p) {
  text_table t({"between", "<and", "working V rms", "peak V", "dc V", "wrap mm", "test V rms"});
  for (const planned_pair& pair : p.pairs) {
    t.add({pair.a, pair.b, fixed(plain(pair.working.plain()), 0), fixed(plain(pair.peak.plain()), 0),
           pair.dc ? fixed(plain(pair.dc->plain()), 0) : "", pair.wrap ? mm(*pair.wrap, 2) : "",
           fixed(plain(pair.test.plain()), 0)});
  }
  return "Insulation at the highest mains without load\n" + t.text() +
         wrapped("test volts are recalled figures: guidance, not a standard's requirement", "  ") + "\n";
}

std::string materials_part(const design& p) {
  std::string out = "Materials, with a twentieth for waste on wire\n";
  for (const material& m : p.materials) {
    std::string text = m.what;
    if (m.count) text += ", " + std::to_string(*m.count);
    if (m.length) text += ", " + fixed(plain(*m.length), 1) + " m";
    if (m.mass) text += ", " + fixed(plain(*m.mass), 3) + " kg";
    out += wrapped(text, "  ");
  }
  return out + "\n";
}

std::string tests_part(const design& p) {
  text_table t({"code", "<measure", "expected", "within"});
  for (const planned_test& test : p.tests) {
    if (test.code.starts_with("flash-")) continue;  // they stand in the insulation table
    t.add({test.code, test.text, shown_plain(test.expected_si, test.of), percent(test.tolerance_ratio, 0)});
  }
  return "Tests of the finished piece\n" + t.text() + "\n";
}

std::string checks_part(const design& p) {
  std::string out = "Checks\n";
  for (const check& c : p.checks) out += check_lines(c);
  return out + "\n";
}

std::string assumed_part(const design& p) {
  std::string out = "Assumed where the job is silent\n";
  for (const assumption& a : p.assumed) out += wrapped(a.path + " = " + a.value + " (" + a.why + ")", "  ");
  return out + "\n";
}

std::string standing_part(const design& p) {
  const core_choice& c = p.made.coil.core.choice();
  std::string weak;
  const auto note = [&](const std::string& what, standing s) {
    if (s != standing::read) weak += (weak.empty() ? "" : "; ") + what + ": " + std::string(word_of(s));
  };
  note(c.pattern.name, c.pattern.known_how);
  note(c.grade.name, c.grade.known_how);
  for (const planned_winding& w : p.windings) {
    if (w.screen || w.tap_of) continue;
    for (const planned_section& part : w.sections) note(part.wire.wire.size, part.wire.wire.known_how);
  }
  note("margins, paper and wraps", standing::memory);
  if (p.made.coil.room.kind == former_kind::bobbin) note("room in the bobbin", p.made.coil.room.known_how);
  return wrapped(
             "Standing of table rows that were not read in print (memory = recalled, derived = worked out, "
             "estimate): " +
                 weak,
             "") +
         "\n";
}

std::string workings_part(const design& p) {
  std::string out = "Workings\n";
  for (const working& w : p.workings) out += wrapped(w.what, "  ");
  const running& r = p.made.nominal;
  const double closes = plain(r.electric.input) - plain(r.electric.output) - plain(r.copper_loss) - plain(r.core_loss);
  out += wrapped("power in less power out less losses: " + number(closes, 2) +
                     " W; balance of heat: " + number(r.heat.residual, 2) +
                     " of the losses; last change of a temperature: " + number(r.residual_K, 2) + " K",
                 "  ");
  out += wrapped("cross-check of the rise at the highest mains by surface alone, 450 (W/cm2)^0.826 (recalled): " +
                     shown(p.surface_rule, 2),
                 "  ");
  for (const planned_leakage& l : p.leakage) {
    out += wrapped(
        "leakage " + l.a + " to " + l.b + ", referred to " + l.a + ": " + shown(l.inductance) + " (" + l.method + ")",
        "  ");
  }
  for (const planned_winding& w : p.windings) {
    if (w.screen || w.tap_of) continue;
    out += wrapped(
        w.name + ": margin " + w.margin_why + "; paper " + w.interlayer_why + "; wrap under it " + w.wrap_why, "  ");
  }
  return out + "\n";
}

}  // namespace

std::string report_of(const design& p, bool workings) {
  std::string out = head(p) + core_part(p) + winding_table(p) + ends_part(p) + electric_table(p);
  out += settings_part(p) + rails_text(p.supply) + states_text(p.supply) + power_part(p) + pairs_part(p) +
         tests_part(p) + materials_part(p) + checks_part(p);
  if (workings) out += workings_part(p);
  out += assumed_part(p) + standing_part(p) + "Cautions\n";
  for (const std::string& c : p.cautions) out += wrapped(c, "  ");
  return out;
}

}  // namespace turnwright
