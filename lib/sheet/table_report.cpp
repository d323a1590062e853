#include <turnwright/sheet/report.hpp>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/sheet/columns.hpp>

namespace turnwright {

using namespace literals;

namespace {

std::string number(double x, int digits) { return shortest(rounded_to(x, digits)); }
std::string mm(metres l, int digits = 5) { return number(plain(l) * 1e3, digits); }

std::string overall_text(const gauge& g, std::string_view grade) {
  const auto over = overall(g, grade);
  return over ? mm(*over, 4) : "";
}

void add_gauge(text_table& t, const gauge& g) {
  t.add({g.size, mm(g.bare), number(plain(g.bare) / 25.4e-3, 4), number(plain(bare_area(g)) * 1e6, 4),
         number(plain(resistance_at_20(g)), 4), number(plain(mass_per_metre(g)) * 1e3, 4), overall_text(g, "1"),
         overall_text(g, "2"), overall_text(g, "3"), number(plain(bare_area(g)) * 1e6 * 2.5, 3),
         std::string(word_of(g.known_how))});
}

text_table gauge_table() {
  return text_table(
      {"size", "bare mm", "bare in", "mm2", "ohm/m", "g/m", "grade 1", "grade 2", "grade 3", "A at 2.5", "<standing"});
}

constexpr const char* gauge_foot =
    "ohm/m at 20 degC from 1/58 ohm mm2/m and nominal diameter; grades: greatest diameter over enamel in mm (AWG: "
    "single, heavy);"
    " A at 2.5 A/mm2. A row whose standing is not 'read' holds at least one figure that is recalled (memory) or worked "
    "out (derived).";

std::string stacks_text(const lamination& l) {
  std::string text;
  for (const metres& t : l.stacks) text += (text.empty() ? "" : ", ") + mm(t, 4);
  return text;
}

constexpr const char* row_foot =
    "standing of the row: read = seen in print, memory = recalled, derived = worked out, estimate = by a rule of "
    "thumb.";

}  // namespace

std::string report_of(const looked_up_gauge& g, const shop& s) {
  text_table t = gauge_table();
  add_gauge(t, g.wire);
  std::string out = g.exact ? "" : "no such size in the table; the nearest:\n";
  out += t.text();
  out += "nearest in the other systems\n";
  text_table near = gauge_table();
  for (const wire_system system : {wire_system::metric, wire_system::awg, wire_system::swg}) {
    const gauge& n = s.wire.nearest(system, g.wire.bare);
    if (n.size != g.wire.size) add_gauge(near, n);
  }
  out += near.text();
  if (g.wire.films.empty()) out += "no enamel figures are known for this size, so it is never chosen for a winding\n";
  return out + wrapped(gauge_foot, "") + wrapped("source: " + g.wire.source, "");
}

std::string report_of(const lamination& l) {
  std::string also;
  for (const std::string& name : l.also) also += ", " + name;
  std::string out = labelled("pattern", l.name + also + " (" + std::string(word_of(l.family)) + ")");
  out += labelled("tongue", mm(l.tongue) + " mm (" + number(plain(l.tongue) / 25.4e-3, 4) + " in)");
  out += labelled("window", mm(l.window_width) + " mm across, " + mm(l.window_length) + " mm along the limb");
  out += labelled("limbs", "outer limb " + mm(l.outer_limb) + " mm, yoke " + mm(l.yoke) + " mm; over all " +
                               mm(l.width) + " x " + mm(l.height) + " mm");
  out += labelled("path", mm(mean_path(l), 5) + " mm, quarter-circle corners");
  out += labelled("stacks", stacks_text(l) + " mm");
  return out + wrapped("standing: " + std::string(word_of(l.known_how)) + "; source: " + l.source, "") +
         wrapped(row_foot, "");
}

std::string report_of(const steel& s, const std::optional<teslas>& flux_density, hertz frequency) {
  const magnetisation_curve bh(s.magnetisation, s.polarisation);
  const loss_law loss(s);
  std::string also;
  for (const std::string& name : s.also) also += ", " + name;
  std::string out = labelled("grade", s.name + also);
  out += labelled("sheet", shown(s.sheet, 2) + ", " + number(plain(s.density), 4) +
                               " kg/m3, stacking factor of the sheet " + number(s.stacking_factor, 3));
  out += labelled("rated", number(plain(s.rated_loss), 3) + " W/kg at most at " + shown(s.rated_flux_density, 2) +
                               ", " + written(s.rated_frequency));
  out += labelled("working", shown(s.flux_nominal, 3) + " at nominal mains, " + shown(s.flux_high, 3) +
                                 " at the highest, peak, for a quiet transformer");
  out += labelled("curves",
                  "field: " + s.magnetisation_from + (s.magnetisation_from == s.name ? "" : " (borrowed: estimate)") +
                      "; loss: " + s.loss_from +
                      (s.loss_from == s.name ? "" : " (borrowed, times " + number(s.loss_scale, 3) + ": estimate)"));
  text_table t({"peak T", "field A/m", "W/kg at " + written(frequency), "<"});
  const auto add = [&](teslas b) {
    const steel_loss p = loss.at(b, frequency);
    t.add({fixed(plain(b), 2), number(plain(bh.field(b)), 4), number(plain(p.value), 3),
           p.beyond_curve ? "loss beyond its curve" : ""});
  };
  if (flux_density) {
    add(*flux_density);
  } else {
    for (int tenth = 5; tenth <= 18; ++tenth) add(as<teslas>(tenth / 10.0));
  }
  return out + t.text() + wrapped("standing: " + std::string(word_of(s.known_how)) + "; source: " + s.source, "") +
         wrapped(row_foot, "");
}

std::string list_of_wires(const shop& s) {
  std::string out;
  for (const wire_system system : {wire_system::metric, wire_system::awg, wire_system::swg}) {
    text_table t = gauge_table();
    for (const gauge& g : s.wire.sizes(system)) add_gauge(t, g);
    out += t.text() + "\n";
  }
  return out + wrapped(gauge_foot, "");
}

std::string list_of_cores(const shop& s) {
  text_table t({"pattern", "<also", "tongue mm", "window mm", "path mm", "<stacks mm", "<standing"});
  for (const lamination& l : s.patterns.all()) {
    t.add({l.name, l.also.empty() ? "" : l.also.front(), mm(l.tongue, 4),
           mm(l.window_width, 4) + " x " + mm(l.window_length, 4), mm(mean_path(l), 4), stacks_text(l),
           std::string(word_of(l.known_how))});
  }
  return t.text() + wrapped(row_foot, "");
}

std::string list_of_steels(const shop& s) {
  text_table t(
      {"grade", "sheet mm", "rated W/kg", "<at", "nominal T", "highest T", "<field from", "<loss from", "<standing"});
  for (const steel& g : s.steels.all()) {
    t.add({g.name, mm(g.sheet, 3), number(plain(g.rated_loss), 3),
           shown(g.rated_flux_density, 2) + " " + written(g.rated_frequency), shown(g.flux_nominal, 3),
           shown(g.flux_high, 3), g.magnetisation_from, g.loss_from, std::string(word_of(g.known_how))});
  }
  return t.text() + wrapped(row_foot, "");
}

}  // namespace turnwright
