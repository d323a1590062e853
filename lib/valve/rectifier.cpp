#include <turnwright/valve/rectifier.hpp>

#include <algorithm>
#include <cmath>

#include <turnwright/remark/wording.hpp>

#include "row_figures.hpp"

namespace turnwright {

using valve_detail::row_figures;
using valve_detail::weaker;

namespace {

// The law that a row's `law` names; without the word, three-halves where there is a perveance.
std::optional<rectifier_law> law_of_row(const row& r, const row_figures& figures) {
  const std::string word = r.text("law");
  if (word == "three-halves" || (word.empty() && r.number("perveance_a_per_v1_5")))
    return three_halves_law{*figures.needed<perveance>("perveance_a_per_v1_5")};
  if (word == "constant")
    return straight_law{*figures.needed<volts>("drop_v"), figures.figure<ohms>("slope_ohm").value.value_or(ohms{})};
  if (word.empty()) return std::nullopt;
  throw refused(wording::other("bad-row", r.place("law"), wording::quoted(word), "three-halves, constant or nothing"));
}

struct resistance_at {
  double along, ohm;
};

double on_line(std::vector<resistance_at> points, double along) {
  std::sort(points.begin(), points.end(),
            [](const resistance_at& a, const resistance_at& b) { return a.along < b.along; });
  if (along <= points.front().along) return points.front().ohm;
  for (std::size_t i = 1; i < points.size(); ++i) {
    const resistance_at &low = points[i - 1], &high = points[i];
    if (along <= high.along) return low.ohm + (high.ohm - low.ohm) * (along - low.along) / (high.along - low.along);
  }
  return points.back().ohm;
}

}  // namespace

std::string_view word_of(rectifier_sort s) {
  switch (s) {
    case rectifier_sort::valve:
      return "rectifier valve";
    case rectifier_sort::diode:
      return "silicon diode";
    case rectifier_sort::bridge:
      return "silicon bridge";
  }
  return "";
}

std::string_view word_of(heating h) { return h == heating::direct ? "direct" : "indirect"; }

volts drop_of(const rectifier_law& law, amperes carried) {
  const double i = plain(carried);
  if (!(i > 0)) return as<volts>(0);
  if (const auto* valve = std::get_if<three_halves_law>(&law))
    return as<volts>(std::pow(i / plain(valve->each_anode), 2.0 / 3.0));
  const auto& line = std::get<straight_law>(law);
  return line.drop + line.slope * carried;
}

rectifier_type plain_silicon() {
  rectifier_type t;
  t.name = "silicon";
  t.sort = rectifier_sort::diode;
  t.anodes = {1, standing::read, false};
  t.law = straight_law{silicon_drop, silicon_slope};
  t.note = "Stands for any silicon diode, its ratings left open.";
  t.source = "working figure for a silicon diode";
  return t;
}

std::optional<ohms> least_anode_resistance(const rectifier_type& type, volts_rms each_anode, farads reservoir) {
  const auto& all = type.least_resistances;
  if (all.empty()) return std::nullopt;
  const bool by_volts = all.front().at.has_value(), by_reservoir = all.front().reservoir.has_value();
  std::vector<resistance_at> points;
  for (const anode_resistance_point& p : all) {
    const double along = by_volts ? plain(p.at->plain()) : by_reservoir ? plain(*p.reservoir) : 0.0;
    points.push_back({along, plain(p.least)});
  }
  return as<ohms>(on_line(std::move(points), by_volts ? plain(each_anode.plain()) : plain(reservoir)));
}

rectifier_type rectifier_of_row(const row& r) {
  const row_figures f(r);
  rectifier_type t;
  t.name = r.text("type");
  t.also = r.list("aliases");
  t.anodes = f.word<int>("arrangement", {{"full-wave", 2}, {"half-wave", 1}});
  t.heated = f.word<heating>("heated", {{"direct", heating::direct}, {"indirect", heating::indirect}});
  t.heater_volts = f.needed<volts>("heater_v");
  t.heater_current = f.needed<amperes>("heater_a");
  t.peak_inverse = f.figure<volts_peak>("peak_inverse_v");
  t.capacitor_input = f.figure<volts_rms>("capacitor_input_v_rms");
  t.choke_input = f.figure<volts_rms>("choke_input_v_rms");
  t.direct_current = f.figure<amperes_dc>("direct_a");
  t.peak_current = f.figure<amperes_peak>("peak_a");
  t.transient_peak = f.figure<amperes_peak>("transient_peak_a");
  t.reservoir_most = f.figure<farads>("reservoir_most_f");
  t.law = law_of_row(r, f);
  const bool three_halves = t.law && std::holds_alternative<three_halves_law>(*t.law);
  const auto of_law = three_halves ? std::string("perveance_a_per_v1_5") : std::string("drop_v");
  t.law_known_how = f.known_how(of_law);
  t.law_weak = f.figure<volts>(of_law).weak;
  t.drop = f.figure<volts>("drop_v");
  t.drop_at = f.figure<amperes>("drop_at_a");
  t.heater_cathode = f.figure<volts>("heater_cathode_v");
  t.warm_up = f.figure<seconds>("warm_up_s");
  t.note = r.text("note");
  t.known_how = r.known_how();
  t.source = r.source();
  return t;
}

rectifier_type diode_of_row(const row& r) {
  const row_figures f(r);
  rectifier_type t;
  t.name = r.text("type");
  t.also = r.list("aliases");
  t.sort = *f.word<rectifier_sort>("form", {{"single", rectifier_sort::diode}, {"bridge", rectifier_sort::bridge}});
  t.anodes = {1, standing::read, false};
  t.peak_inverse = f.needed<volts_peak>("peak_inverse_v");
  t.direct_current = f.needed<amperes_dc>("average_a");
  t.transient_peak = f.figure<amperes_peak>("surge_a");
  t.drop = f.figure<volts>("drop_most_v");
  t.drop_at = f.figure<amperes>("drop_at_a");
  ohms slope = silicon_slope;
  if (t.drop && t.drop_at && *t.drop > silicon_drop) slope = (*t.drop - silicon_drop) / *t.drop_at;
  t.law = straight_law{silicon_drop, slope};
  t.package = r.text("package");
  t.note = r.text("note");
  t.known_how = r.known_how();
  t.source = r.source();
  return t;
}

anode_resistance_point resistance_of_row(const row& r) {
  const row_figures f(r);
  return {.at = f.figure<volts_rms>("at_v_rms").value,
          .reservoir = f.figure<farads>("reservoir_f").value,
          .least = *f.needed<ohms>("least_ohm"),
          .known_how = r.known_how(),
          .note = r.text("note"),
          .source = r.source()};
}

}  // namespace turnwright
