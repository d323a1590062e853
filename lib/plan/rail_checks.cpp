#include <algorithm>
#include <cmath>
#include <numbers>

#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/rails.hpp>

namespace turnwright {

using namespace literals;
using supply::circuit;

namespace {

template <class Stated>
std::string said(const Stated& q) {
  return shown(q.plain());
}

std::string rail_name(const planned_rail& r) { return "rail " + r.winding; }

bool choke_input(const planned_rail& r) { return std::holds_alternative<supply::choke>(r.wish.nodes.front().through); }

// A rating against what was found; what breaks it comes at `weight`.
void against_rating(std::vector<check>& all, const planned_rail& r, const std::string& what, double found, double bound,
                    kind k, level weight, const std::string& cure) {
  const bool holds = found <= bound * (1 + 1e-9);
  all.push_back({"rectifier-limits", holds ? level::pass : weight,
                 r.wish.rectifier.type.name + " in " + rail_name(r) + ": " + what, shown_plain(found, k),
                 "at most " + shown_plain(bound, k), holds ? "" : cure});
}

// To two digits, never below, or never above: a figure that something has to reach, or may not pass.
double up_to_two_digits(double x) {
  const double step = std::pow(10.0, std::floor(std::log10(x)) - 1);
  return std::ceil(x / step - 1e-9) * step;
}
double down_to_two_digits(double x) {
  const double step = std::pow(10.0, std::floor(std::log10(x)) - 1);
  return std::floor(x / step + 1e-9) * step;
}

// A resistor in each anode: what it has to be and what it gets warm with.
std::string series_cure(const planned_rail& r, ohms missing) {
  const double ohm = rounded_to(up_to_two_digits(std::max(plain(missing), 1.0)), 2);
  const double watt = ohm * std::pow(plain(r.worst.rms.plain()), 2);
  return "a resistor of at least " + shortest(ohm) + " ohm in series with each anode; it dissipates " +
         shortest(rounded_to(watt, 2)) + " W, so a part for twice that";
}

void add_rectifier_limits(const planned_rail& r, std::vector<check>& all) {
  const rectifier_type& t = r.wish.rectifier.type;
  if (t.name.empty()) return;
  const bool valve = t.sort == rectifier_sort::valve;
  if (t.peak_current) {
    against_rating(all, r, "peak current, steady", plain(r.worst.peak.plain()), plain((*t.peak_current).plain()),
                   kind::current, level::caution, "more series resistance, or a smaller reservoir");
  }
  if (t.direct_current) {
    const bool one_anode = valve && t.anodes && *t.anodes == 1;
    const bool whole = (valve && !one_anode) || t.sort == rectifier_sort::bridge;
    const double load = plain(whole ? whole_current(r).plain() : r.worst.average.plain());
    against_rating(
        all, r, whole ? "direct current" : "average current", load, plain((*t.direct_current).plain()), kind::current,
        level::stop,
        valve ? "a larger rectifier valve, or two in parallel each with its own series resistors" : "a larger diode");
  }
  if (t.peak_inverse) {
    against_rating(all, r, "peak inverse at the highest mains without load", plain(r.inverse_worst.plain()),
                   plain((*t.peak_inverse).plain()), kind::voltage, level::stop,
                   valve ? "fewer volts, or a rectifier that stands them"
                         : "two or more such diodes in series, or a type that stands them");
  }
  if (t.transient_peak) {
    against_rating(all, r, "charging current, switched on at the crest of the highest mains", plain(r.surge.plain()),
                   plain((*t.transient_peak).plain()), kind::current, level::caution,
                   "more series resistance, a smaller reservoir, or a rectifier that warms up with the valves");
  }
  const known_figure<volts_rms>& most_volts = choke_input(r) ? t.choke_input : t.capacitor_input;
  if (most_volts) {
    against_rating(
        all, r,
        choke_input(r) ? "volts of each anode's supply, choke input" : "volts of each anode's supply, capacitor input",
        plain(r.each_anode.plain()), plain((*most_volts).plain()), kind::voltage, level::caution,
        "fewer volts, or a rectifier for more");
  }
  const auto& reservoir = r.wish.nodes.front().shunt;
  if (!valve || choke_input(r) || !reservoir) return;
  if (t.reservoir_most) {
    against_rating(all, r, "reservoir", plain(reservoir->value), plain(*t.reservoir_most), kind::capacitance,
                   level::caution, "a smaller reservoir, with the rest behind the first choke or resistor");
  }
  const auto least = least_anode_resistance(t, r.each_anode, reservoir->value);
  if (!least) return;
  const bool holds = r.anode_resistance >= *least * (1 - 1e-9);
  all.push_back({"rectifier-limits", holds ? level::pass : level::caution,
                 t.name + " in " + rail_name(r) + ": resistance of each anode's supply at " + said(r.each_anode) +
                     " (winding, reflected primary and series)",
                 shown(r.anode_resistance), "at least " + shown(*least),
                 holds ? "" : series_cure(r, *least - r.anode_resistance)});
}

// Surge over rated volts of wet aluminium electrolytics: 1.15 up to 315 V, 1.10 above (memory; IEC 60384-4).
double surge_over_rated(volts rated) { return plain(rated) <= 315 ? 1.15 : 1.10; }

void add_capacitors(hertz mains, const planned_rail& r, std::vector<check>& all) {
  std::string unrated;
  for (const planned_node& n : r.nodes) {
    if (!n.wish.shunt) continue;
    const bool halved = &n == &r.nodes.front() && r.wish.kind == circuit::full_wave_doubler;
    const volts stands = n.switch_on.plain() * (halved ? 0.5 : 1.0);
    const std::string what =
        "capacitor at node " + n.wish.name + " of " + rail_name(r) + ", valves cold at the highest mains";
    if (!n.wish.rated) {
      unrated += (unrated.empty() ? "" : ", ") + n.wish.name + " " + shown(stands);
      continue;
    }
    const double over = plain(stands) / plain(*n.wish.rated), surge = surge_over_rated(*n.wish.rated);
    const level weight = over <= 1 ? level::pass : over <= surge ? level::caution : level::stop;
    all.push_back({"capacitor-rating", weight, what, shown(stands),
                   shown(*n.wish.rated) + " rated, " + percent(surge - 1, 0) + " more as a surge (recalled)",
                   weight == level::pass
                       ? ""
                       : "a part rated for " + shown(stands, 3) + " or more, or two in series with sharing resistors"});
  }
  if (!unrated.empty())
    all.push_back({"capacitor-rating", level::note,
                   "capacitors of " + rail_name(r) +
                       " without a rating in the job: what each has to stand, valves cold at the highest mains",
                   unrated, "a rating of so many volts or more", ""});
  const planned_node& first = r.nodes.front();
  if (first.wish.shunt) {
    all.push_back({"capacitor-ripple", level::note,
                   "ripple current of the capacitor at node " + first.wish.name + " of " + rail_name(r),
                   said(first.full.capacitor_ripple) + " r.m.s.",
                   "its maker's figure at " + shown(as<hertz>(plain(mains) * r.ripple_per_cycle)), ""});
  }
}

void add_choke_input(const amplifier_supply& a, const planned_rail& r, std::vector<check>& all) {
  if (!choke_input(r) || r.ripple_per_cycle < 2) return;  // half a wave never keeps a choke going
  const auto& l = std::get<supply::choke>(r.wish.nodes.front().through);
  const bool runs_dry = plain(r.choke_lowest_idle) <= 0;
  const volts idle = r.nodes.front().idle.plain();
  const amperes now = direct_current(r.wish, load_state::idle, r.nodes.front().idle).plain();
  // Critical current of a full-wave choke: volts over 3 x 2 pi f L (common practice; the first ripple term of a
  // rectified sine).
  const amperes critical = idle / (3.0 * reactance(a.base.frequency, l.value));
  check c{"choke-input",
          level::pass,
          "least current in the input choke of " + rail_name(r) + " at idle",
          shown(r.choke_lowest_idle),
          "more than nothing: below " + shown(critical) + " of load the volts climb towards the peak",
          ""};
  if (runs_dry) {
    const volts peak = peak_of_sine(r.each_anode).plain() * (1 + a.over_ratio);
    const bool stands = std::all_of(r.nodes.begin(), r.nodes.end(), [&](const planned_node& n) {
      return !n.wish.shunt || (n.wish.rated && *n.wish.rated >= peak);
    });
    c.weight = stands ? level::caution : level::stop;
    const amperes missing = std::max(critical * 1.05 - now, 1_mA);
    c.cure = "a bleeder of " + shown(as<ohms>(down_to_two_digits(plain(idle / missing)))) + " that dissipates " +
             shown(idle * missing, 2) + " (a part for twice that), a larger choke, or capacitors for " + shown(peak);
  }
  all.push_back(std::move(c));
}

// Direct ampere-turns of half-wave windings against the magnetising ones. Source of the bounds: judgement.
void add_dc_in_iron(const supply_study& s, std::vector<check>& all) {
  amperes net = 0_A, gross = 0_A;
  for (std::size_t k = 0; k < s.of.base.ports.size(); ++k) {
    const amperes referred = s.full.ports[k].current_dc.plain() * s.of.base.ports[k].ratio;
    net += referred;
    gross = std::max(gross, as<amperes>(std::abs(plain(referred))));
  }
  if (plain(gross) <= 0) return;
  const amperes dc = as<amperes>(std::abs(plain(net)));
  const std::string what = "direct current in the windings that nothing balances, referred to the primary";
  if (!s.of.base.magnetising_inductance) {
    if (carries_dc(amperes_dc{dc}, s.full.primary_current))
      all.push_back({"dc-in-iron", level::note,
                     what + "; without a magnetising inductance the transformer counts as ideal down to dc", shown(dc),
                     "a magnetising inductance to compare it with", ""});
    return;
  }
  const volts_peak emf = peak_of_sine(s.full.emf);
  const amperes magnetising = emf.plain() / reactance(s.of.base.frequency, *s.of.base.magnetising_inductance);
  const double part = plain(dc) / plain(magnetising);
  if (part <= 0.01) return;
  const level weight = part > 0.5 ? level::stop : part > 0.1 ? level::caution : level::note;
  all.push_back(
      {"dc-in-iron", weight, what + ", against the magnetising current's peak",
       shown(dc) + " (" + percent(part, 0) + ")", shown(magnetising),
       weight == level::note ? "" : "full-wave rectification, or a second half-wave rail of the other polarity"});
}

void add_circuit(const planned_rail& r, std::vector<check>& all) {
  if (!r.wish.centre_tap_left) return;
  all.push_back({"centre-tap-circuit", level::stop,
                 "winding " + r.winding +
                     " has a centre tap and feeds a bridge: the whole winding is rectified, and a tap that is earthed "
                     "shorts half the bridge",
                 "bridge", "full-wave centre-tap, or a winding without a tap",
                 "use the full-wave centre-tap circuit; or leave the tap out, or insulate it for half the HT"});
}

// Volts of a node at a state of load and mains, as if positive [V].
double volts_at(const supply_study& s, load_state load, const char* mains, std::size_t rail, std::size_t node) {
  for (const supplied_state& state : s.states) {
    if (state.load == load && state.mains == mains) return plain(state.rails[rail][node].plain());
  }
  return 0;
}

void add_loads(const supply_study& s, std::vector<check>& all) {
  for (std::size_t k = 0; k < s.rails.size(); ++k) {
    for (std::size_t n = 0; n < s.rails[k].nodes.size(); ++n) {
      const planned_node& node = s.rails[k].nodes[n];
      if (plain(node.wish.full.constant.plain()) <= 0) continue;
      const double open = volts_at(s, load_state::cold, "nominal", k, n),
                   low = volts_at(s, load_state::full, "low", k, n);
      const double now = plain(node.full.mean.plain());
      // A fifth of what it has without load: the bound of judgement for a supply that cannot give what is drawn.
      if (now >= 0.2 * open && low > 0.02 * open) continue;
      all.push_back(
          {"load-beyond-supply", low <= 0.02 * open ? level::stop : level::caution,
           "node " + node.wish.name + " of " + rail_name(s.rails[k]) + " falls to next to nothing under its load",
           said(node.full.mean) + ", " + shown(as<volts>(low)) + " at low mains",
           "a fifth of " + shown(as<volts>(open)), "less load, or less resistance before the node"});
    }
  }
  for (const supplied_state& state : s.states) {
    if (state.settled) continue;
    all.push_back({"load-beyond-supply", level::caution,
                   "no periodic state was found at " + std::string(word_of(state.load)) + " load and " + state.mains +
                       " mains; its figures are not to be trusted",
                   "residual " + shortest(rounded_to(state.residual_ratio, 2)), "0.00005",
                   "look at the loads and values of the rails"});
  }
}

void add_targets(const planned_rail& r, std::vector<check>& all) {
  if (!r.off_target || !r.one_turn) return;  // a known transformer's turns are what they are
  const double wanted = plain(r.wish.target->at.plain()), off = plain(*r.off_target);
  const double turn = r.one_turn ? plain(*r.one_turn) : 0;
  const bool near = turn > 0 ? std::abs(off) <= 0.5 * turn : std::abs(off) <= 0.01 * wanted;
  const bool good = near || std::abs(off) <= r.wish.target->tolerance_ratio * wanted;
  all.push_back({"ht-volts",
                 near   ? level::pass
                 : good ? level::note
                        : level::stop,
                 "volts of node " + r.wish.target->node + " of " + rail_name(r) + " at full load, nominal mains" +
                     (turn > 0 ? "; " + one_turn_words(r) + " would add " + shown(*r.one_turn, 2) : ""),
                 shown(r.wish.target->at.plain() + *r.off_target, 4) + " (" + signed_percent(off / wanted) + ")",
                 shown(r.wish.target->at.plain(), 4) + ", within half a turn's worth",
                 near ? "" : "let the winding's turns be chosen"});
}

// The r.m.s. rating that the job gives a rectified winding against what flows.
void add_ratings(const supply_study& s, std::vector<check>& all) {
  for (const supplied_winding& w : s.of.windings) {
    if (!w.rail || !w.rated) continue;
    const amperes_rms found = std::max(s.full.ports[w.first].current, s.full.ports[w.second.value_or(w.first)].current);
    const bool holds = found <= *w.rated;
    all.push_back({"current-kind", holds ? level::pass : level::stop,
                   "r.m.s. current of " + w.name + " behind its rectifier against the rating that the job gives it",
                   said(found), said(*w.rated),
                   holds ? "" : "a rating of " + said(found) + " r.m.s.; direct milliamperes are no rating"});
  }
}

}  // namespace

std::vector<check> rail_checks(const supply_study& s) {
  std::vector<check> all;
  for (const planned_rail& r : s.rails) {
    add_circuit(r, all);
    add_targets(r, all);
    add_rectifier_limits(r, all);
    add_capacitors(s.of.base.frequency, r, all);
    add_choke_input(s.of, r, all);
  }
  add_ratings(s, all);
  add_dc_in_iron(s, all);
  add_loads(s, all);
  return all;
}

std::vector<check> in_order(std::vector<check> all) {
  std::stable_sort(all.begin(), all.end(), [](const check& a, const check& b) { return a.weight > b.weight; });
  return all;
}

std::vector<std::string> supply_cautions() {
  return {
      "Mains and HT kill. A reservoir holds its charge after switching off: discharge it through a resistor and "
      "measure "
      "before touching.",
      "Wiring and testing are for people trained to do it, under the local code and, where the law asks for it, a "
      "licence.",
      "Figures are computed from the values given and from published ratings, some of them recalled; confirm a rating "
      "that a "
      "part's life hangs on by its data sheet.",
  };
}

}  // namespace turnwright
