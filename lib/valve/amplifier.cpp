#include <turnwright/valve/amplifier.hpp>

#include <turnwright/remark/wording.hpp>

#include "row_figures.hpp"

namespace turnwright {

using valve_detail::row_figures;

namespace {

// A whole count from one; `absent` where the cell is empty.
int count_of(const row& r, const char* column, int absent) {
  const auto value = r.number(column);
  if (!value) return absent;
  for (int n = 1; n <= 4; ++n) {
    if (*value == n) return n;
  }
  throw refused(wording::other("bad-row", r.place(column), wording::quoted(r.text(column)), "a count from 1 to 4"));
}

}  // namespace

std::string_view word_of(confidence c) {
  switch (c) {
    case confidence::low:
      return "low";
    case confidence::medium:
      return "medium";
    case confidence::high:
      return "high";
  }
  return "";
}

amplifying_valve amplifier_of_row(const row& r) {
  const row_figures f(r);
  amplifying_valve v;
  v.name = r.text("type");
  v.also = r.list("aliases");
  v.function = r.text("function");
  v.heated = f.word<heating>("heated", {{"direct", heating::direct}, {"indirect", heating::indirect}});
  v.heater_volts = f.needed<volts>("heater_v");
  v.heater_current = f.needed<amperes>("heater_a");
  v.other_heater_volts = f.figure<volts>("other_heater_v");
  v.other_heater_current = f.figure<amperes>("other_heater_a");
  if (v.other_heater_volts && !v.other_heater_current) f.needed<amperes>("other_heater_a");
  v.heater_cathode = f.figure<volts>("heater_cathode_v");
  v.heater_positive = f.figure<volts>("heater_positive_v");
  v.anode_current = f.figure<amperes_dc>("anode_a");
  v.screen_current = f.figure<amperes_dc>("screen_a");
  v.sections = count_of(r, "sections", 1);
  v.condition = r.text("condition");
  v.note = r.text("note");
  v.known_how = r.known_how();
  v.source = r.source();
  return v;
}

output_stage stage_of_row(const row& r) {
  const row_figures f(r);
  return {.type = r.text("type"),
          .operation = r.text("class"),
          .valves = count_of(r, "valves", 2),
          .how = r.text("how"),
          .anode_volts = f.figure<volts_dc>("anode_v").value,
          .screen_volts = f.figure<volts_dc>("screen_v").value,
          .anode_idle = f.figure<amperes_dc>("anode_idle_a").value,
          .anode_full = f.figure<amperes_dc>("anode_full_a").value,
          .screen_idle = f.figure<amperes_dc>("screen_idle_a").value,
          .screen_full = f.figure<amperes_dc>("screen_full_a").value,
          .power = f.figure<watts>("power_w").value,
          .load = f.figure<ohms>("load_ohm").value,
          .trust = *f.word<confidence>(
              "confidence", {{"low", confidence::low}, {"medium", confidence::medium}, {"high", confidence::high}}),
          .note = r.text("note"),
          .known_how = r.known_how(),
          .source = r.source()};
}

}  // namespace turnwright
