#include <algorithm>
#include <cmath>

#include <turnwright/measure/written.hpp>
#include <turnwright/sheet/columns.hpp>
#include <turnwright/sheet/report.hpp>

#include "parts.hpp"

namespace turnwright {

using namespace sheet_detail;
using supply::circuit;

namespace {

std::string volts_text(double v) { return fixed(v, std::abs(v) < 20 ? 2 : 1); }
// In thousandths; what is smaller than a thousandth of those is not worth its digits.
std::string milli(double x) { return std::abs(x) < 1e-6 ? "0" : number(x * 1e3, 3); }

std::string type_of(const planned_rail& r) {
  const rectifier_type& t = r.wish.rectifier.type;
  std::string text = t.name.empty() ? "a rectifier as written in the job" : t.name;
  const ohms series = r.wish.rectifier.each.series;
  if (plain(series) > 0) text += " with " + shown(series) + " in each anode";
  return text;
}

std::string nodes_table(const supply_study& s, const planned_rail& r) {
  const double sign = r.wish.negative ? -1 : 1;
  text_table t({"node", "V full", "V idle", "V at most", "ripple mV", "mV p-p", "hum dB", "load mA", "cap mA",
                "choke mA", "W lost"});
  for (const planned_node& n : r.nodes) {
    const double mean = plain(n.full.mean.plain()), ripple = plain(n.full.ripple.plain());
    const bool led = !std::holds_alternative<std::monostate>(n.wish.through);
    const bool choke = std::holds_alternative<supply::choke>(n.wish.through);
    t.add({n.wish.name, volts_text(sign * mean), volts_text(sign * plain(n.idle.plain())),
           volts_text(sign * plain(n.switch_on.plain())), milli(ripple), milli(plain(n.full.ripple_peak_to_peak)),
           ripple > 0 && mean != 0 ? fixed(20 * std::log10(ripple / std::abs(mean)), 0) : "",
           milli(plain(n.full.load.plain())), n.wish.shunt ? milli(plain(n.full.capacitor_ripple.plain())) : "",
           choke ? milli(plain(n.full.through.plain())) : "", led ? number(plain(n.full.through_loss), 2) : ""});
  }
  const double hz = plain(s.of.base.frequency) * r.ripple_per_cycle;
  return t.text() +
         wrapped("ripple at " + number(hz, 3) +
                     " Hz, r.m.s. and peak to peak; hum: ripple below the node's volts; V at most: valves cold, "
                     "highest mains; "
                     "cap: r.m.s. current of the node's capacitor; W lost: in the resistor or choke before the node",
                 "  ");
}

std::string rectifier_table(const planned_rail& r) {
  const rectifier_type& rating = r.wish.rectifier.type;
  const bool diode = rating.sort == rectifier_sort::diode;  // rated each for itself; a valve or a bridge as a whole
  text_table t({"rectifier", "found", "rating"});
  const auto row = [&](const std::string& what, const std::string& found, const std::string& bound) {
    t.add({what, found, bound});
  };
  const bool anodes = rating.sort == rectifier_sort::valve && r.wish.kind != circuit::bridge;
  const std::string each = r.wish.kind == circuit::half_wave ? "the diode" : anodes ? "each anode" : "each diode";
  row("peak current, " + each, shown(r.worst.peak.plain()),
      rating.peak_current ? shown((*rating.peak_current).plain()) : "");
  const std::string rated_dc = rating.direct_current ? shown((*rating.direct_current).plain()) : "";
  row("average current, " + each, shown(r.worst.average.plain()), diode ? rated_dc : "");
  if (!diode && rating.direct_current) row("direct current, all", shown(whole_current(r).plain()), rated_dc);
  row("r.m.s. current, " + each, shown(r.worst.rms.plain()), "");
  row("peak inverse at this load", shown(r.worst.inverse.plain()), "");
  row("peak inverse, highest mains, no load", shown(r.inverse_worst.plain()),
      rating.peak_inverse ? shown((*rating.peak_inverse).plain()) : "");
  row("charging current, switched on at the crest", shown(r.surge.plain()),
      rating.transient_peak ? shown((*rating.transient_peak).plain()) : "");
  const auto& reservoir = r.wish.nodes.front().shunt;
  const bool direct = std::holds_alternative<std::monostate>(r.wish.nodes.front().through);
  const auto least =
      reservoir && direct ? least_anode_resistance(rating, r.each_anode, reservoir->value) : std::nullopt;
  row("resistance that feeds " + each, shown(r.anode_resistance), least ? "at least " + shown(*least) : "");
  if (reservoir && direct && rating.reservoir_most)
    row("reservoir", shown(reservoir->value), "at most " + shown(*rating.reservoir_most));
  row("mean drop while conducting", shown(r.worst.mean_drop), "");
  row("conduction in a cycle", fixed(r.worst.conduction_deg, 0) + " deg", "");
  return t.text();
}

std::string windings_table(const supply_study& s) {
  text_table t({"winding", "V open", "V loaded", "A rms", "A dc", "VA", "W lost"});
  const auto line = [&](const std::string& name, std::size_t port) {
    const supply::port_state& p = s.full.ports[port];
    t.add({name, volts_text(plain(p.no_load.plain())), volts_text(plain(p.on_load.plain())),
           number(plain(p.current.plain()), 4),
           carries_dc(p.current_dc, p.current) ? number(plain(p.current_dc.plain()), 3) : "",
           number(plain(apparent_power(p.on_load, p.current)), 3), number(plain(s.full.copper[port]), 3)});
  };
  for (const supplied_winding& w : s.of.windings) {
    line(w.second ? w.name + ", first half" : w.name, w.first);
    if (w.second) line(w.name + ", second half", *w.second);
  }
  const supply::state& f = s.full;
  std::string out = "Windings at full load, " + written(s.of.base.mains.plain()) + " at the wall\n" + t.text();
  out += wrapped("volts are true r.m.s.; a peaky current flattens the wave", "  ");
  return out + labelled("Primary", shown(f.primary_current.plain(), 4) + " r.m.s., " + shown(f.wall, 4) + ", " +
                                       shown(apparent_power(s.of.base.mains, f.primary_current), 4));
}

std::string checks_text(const std::vector<check>& checks) {
  std::string out = "Checks\n";
  for (const check& c : checks) out += check_lines(c);
  return out + "\n";
}

}  // namespace

std::string rails_text(const supply_study& s) {
  std::string out;
  for (const planned_rail& r : s.rails) {
    out += wrapped("Rail " + r.winding + ": " + std::string(word_of(r.wish.kind)) + ", " + type_of(r) +
                       (r.wish.negative ? ", negative" : "") + "; " + written(s.of.base.mains.plain()) + " at the wall",
                   "");
    out += nodes_table(s, r);
    if (r.off_target) {
      out += wrapped("node " + r.wish.target->node + " was to have " + shown(r.wish.target->at.plain(), 4) +
                         ": it is off by " + shown(*r.off_target, 2) +
                         (r.one_turn ? "; " + one_turn_words(r) + " adds " + shown(*r.one_turn, 2) : ""),
                     "  ");
    }
    out += "\n" + rectifier_table(r) + "\n";
  }
  return out;
}

std::string states_text(const supply_study& s) {
  std::vector<std::string> heads{"load, mains"};
  for (const auto& [name, v] : s.states.front().windings) heads.push_back(name + " V");
  for (const planned_rail& r : s.rails) {
    for (const planned_node& n : r.nodes) heads.push_back(r.winding + " " + n.wish.name + " V");
  }
  text_table t(heads);
  for (const supplied_state& state : s.states) {
    std::vector<std::string> cells{(s.rails.empty() ? "" : std::string(word_of(state.load)) + ", ") + state.mains};
    for (const auto& [name, v] : state.windings) cells.push_back(volts_text(plain(v.plain())));
    for (std::size_t k = 0; k < s.rails.size(); ++k) {
      for (const volts_dc& v : state.rails[k])
        cells.push_back(volts_text((s.rails[k].wish.negative ? -1 : 1) * plain(v.plain())));
    }
    t.add(cells);
  }
  return "Volts over the mains range (" + signed_percent(s.of.over_ratio) + " -" + percent(s.of.under_ratio) + ")" +
         (s.rails.empty() ? ", full load" : "; cold: valves draw nothing yet, resistances stay") + "\n" + t.text() +
         "\n";
}

std::string report_of(const supply_study& s, const std::vector<check>& checks, const std::vector<assumption>& assumed,
                      const std::vector<std::string>& cautions, bool workings) {
  std::string out = wrapped(s.of.title, "") + "\n" + rails_text(s) + windings_table(s) + "\n" + states_text(s);
  if (workings) {
    out += "Workings\n" +
           wrapped("change over a cycle " + shortest(rounded_to(s.full.residual_ratio, 2)) +
                       " of the states' size; power in less losses and loads " +
                       shortest(rounded_to(s.full.balance_ratio, 2)) + " of it; " + std::to_string(s.full.cycles) +
                       " mains cycles stepped through",
                   "  ") +
           "\n";
  }
  out += checks_text(checks) + "Assumed where the job is silent\n";
  for (const assumption& a : assumed) out += wrapped(a.path + " = " + a.value + " (" + a.why + ")", "  ");
  out += "\nCautions\n";
  for (const std::string& c : cautions) out += wrapped(c, "  ");
  return out;
}

}  // namespace turnwright
