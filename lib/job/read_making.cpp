#include <algorithm>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/plan/turn_choice.hpp>

#include "sections.hpp"

namespace turnwright::job_detail {

using namespace literals;

namespace {

std::vector<std::string> winding_names(const demand& d) {
  std::vector<std::string> names =
      d.primary.two_windings ? std::vector<std::string>{"primary A", "primary B"} : std::vector<std::string>{"primary"};
  for (const secondary_wish& s : d.secondaries) {
    if (!s.tap_of) names.push_back(s.name);
  }
  return names;
}

// HT on the flat bed over the primary, then what feeds heaters, heavier wire further out, small windings outermost.
int usual_rank(const secondary_wish& s) {
  const volts whole = s.second_half ? s.voltage + *s.second_half : s.voltage;
  return whole > 100_V ? 0 : is_heater(s) ? 1 : 2;
}

std::vector<std::string> usual_order(const demand& d) {
  std::vector<const secondary_wish*> list;
  for (const secondary_wish& s : d.secondaries) {
    if (!s.tap_of) list.push_back(&s);
  }
  std::stable_sort(list.begin(), list.end(), [](const auto* a, const auto* b) {
    return usual_rank(*a) != usual_rank(*b) ? usual_rank(*a) < usual_rank(*b) : a->current < b->current;
  });
  std::vector<std::string> order = winding_names(d);
  order.resize(d.primary.two_windings ? 2 : 1);
  const auto follows_host = [&](const secondary_wish& s) {  // a heater that rides on a winding lies next to it
    return s.floats_on && std::any_of(list.begin(), list.end(),
                                      [&](const auto* o) { return o->name == *s.floats_on && !o->floats_on; });
  };
  for (const secondary_wish* s : list) {
    if (follows_host(*s)) continue;
    order.push_back(s->name);
    for (const secondary_wish* rider : list) {
      if (follows_host(*rider) && *rider->floats_on == s->name) order.push_back(rider->name);
    }
  }
  return order;
}

void check_order(reading_desk& desk, page& root) {
  const auto known = winding_names(desk.out);
  for (std::size_t i = 0; i < desk.out.order.size(); ++i) {
    const std::string& name = desk.out.order[i];
    const std::string where = root.place("order") + "/" + std::to_string(i);
    if (std::find(known.begin(), known.end(), name) == known.end())
      desk.faults.push_back(wording::unknown_word(where, name, known));
    if (std::count(desk.out.order.begin(), desk.out.order.begin() + static_cast<std::ptrdiff_t>(i), name) > 0) {
      desk.faults.push_back(
          wording::other("repeated-name", where, wording::quoted(name) + " a second time", "each winding once"));
    }
  }
  for (const std::string& name : known) {
    if (std::find(desk.out.order.begin(), desk.out.order.end(), name) == desk.out.order.end()) {
      desk.faults.push_back(wording::missing(root.place("order"), "every winding, " + wording::quoted(name) + " too"));
    }
  }
}

std::optional<metres> length(page& p, const char* key, const char* least, const char* most) {
  return p.quantity<metres>(key, least, most);
}

}  // namespace

void read_screens_and_order(reading_desk& desk, page& root) {
  root.each("order", [&](const json& node, const std::string& where) {
    if (!node.is_string()) {
      desk.faults.push_back(wording::wrong_sort(where, as_written(node), "a winding's name"));
    } else if (node == "primary" && desk.out.primary.two_windings) {
      desk.out.order.insert(desk.out.order.end(), {"primary A", "primary B"});
    } else {
      desk.out.order.push_back(node.get<std::string>());
    }
  });
  if (root.has("order")) {
    check_order(desk, root);
  } else {
    desk.out.order = usual_order(desk.out);
    std::string text;
    for (const std::string& name : desk.out.order) text += (text.empty() ? "" : ", ") + name;
    desk.assume("/order", text, "from the core outwards: HT on the primary, heaters over it, small windings outermost");
  }
  root.each("screens", [&](const json& node, const std::string& where) {
    if (!node.is_object()) {
      desk.faults.push_back(wording::wrong_sort(where, as_written(node),
                                                "an object such as {\"after\": \"primary\", \"kind\": \"noise\"}"));
      return;
    }
    page s(node, where, desk.faults);
    screen_wish wish;
    auto known = winding_names(desk.out);
    known.emplace_back("primary");
    const auto after = s.word("after", known);
    if (!s.has("after")) desk.faults.push_back(wording::missing(s.place("after"), "the winding it lies on"));
    wish.after = after.value_or("primary");
    wish.kind =
        s.word("kind", {"noise", "safety"}).value_or("noise") == "safety" ? screen_kind::safety : screen_kind::noise;
    s.finish();
    for (const screen_wish& other : desk.out.screens) {
      if (other.after == wish.after)
        desk.faults.push_back(wording::other("repeated-name", s.place("after"),
                                             "a second screen on " + wording::quoted(wish.after),
                                             "one screen on a winding"));
    }
    desk.out.screens.push_back(wish);
  });
}

void read_core(reading_desk& desk, page& root) {
  core_wish& c = desk.out.core;
  if (auto core = root.object("core")) {
    core->not_yet("toroid", "a toroid", "name a lamination such as \"EI 96\"");
    core->not_yet("cut_core", "a cut core", "name a lamination such as \"EI 96\"");
    c.lamination = core->text("lamination");
    c.grade = core->text("steel");
    c.stack = length(*core, "stack", "5 mm", "300 mm");
    if (const auto f = core->quantity<ratio>("stacking_factor", "60 %", "98.5 %")) c.stacking_factor = f->value;
    const auto style = core->word("stacking", {"interleaved", "in pairs", "butt"});
    if (style == "in pairs") c.style = stacking::in_pairs;
    if (style == "butt") c.style = stacking::butt;
    if (!style) desk.assume("/core/stacking", "interleaved", "one by one, the usual way for mains");
    try {
      if (c.lamination) {
        const lamination& l = desk.tools.patterns.named(*c.lamination, core->place("lamination"));
        if (!is_shell(l))
          desk.faults.push_back(wording::not_yet(core->place("lamination"),
                                                 "the pattern " + wording::quoted(l.name) + " without a centre limb",
                                                 "EI and M patterns can be planned"));
      }
    } catch (const refused& why) {
      for (const remark& r : why.remarks()) desk.faults.push_back(r);
    }
    try {
      if (c.grade) desk.tools.steels.named(*c.grade, core->place("steel"));
    } catch (const refused& why) {
      for (const remark& r : why.remarks()) desk.faults.push_back(r);
    }
    core->finish();
  }
  if (!c.grade) desk.assume("/core/steel", std::string(usual_steel), "a good non-oriented sheet that is easily bought");
}

void read_former(reading_desk& desk, page& root) {
  if (auto f = root.object("former")) {
    const auto kind_word = f->word("kind", {"layers", "bobbin", "random", "chambers"});
    if (kind_word == "random" || kind_word == "chambers") {
      desk.faults.push_back(wording::not_yet(f->place("kind"), "a former of the kind " + wording::quoted(*kind_word),
                                             "\"layers\" and \"bobbin\" can be planned"));
    }
    if (kind_word == "bobbin") desk.out.former.kind = former_kind::bobbin;
    if (!kind_word) desk.assume("/former/kind", "layers", "paper between layers, the old and repairable way");
    desk.out.former.wall = length(*f, "wall", "0.2 mm", "10 mm");
    desk.out.former.winding_width = length(*f, "winding_width", "3 mm", "400 mm");
    desk.out.former.winding_height = length(*f, "winding_height", "1 mm", "200 mm");
    const auto wound = f->word("wound", {"hand", "machine"});
    desk.out.by_hand = wound.value_or("hand") == "hand";
    if (!wound) desk.assume("/former/wound", "hand", "it bows out more than a machine's work");
    f->finish();
  } else {
    desk.assume("/former", "layers, wound by hand", "paper between layers, the old and repairable way");
  }
}

void read_insulation(reading_desk& desk, page& root) {
  insulation_wish& i = desk.out.insulation;
  bool has_class = false;
  if (auto p = root.object("insulation")) {
    i.interlayer = length(*p, "interlayer", "0 mm", "2 mm");
    i.wrap = length(*p, "wrap", "0.02 mm", "5 mm");
    i.margin = length(*p, "margin", "0 mm", "30 mm");
    const auto letter = p->word("class", {"A", "E", "B", "F", "H"});
    if (letter) i.thermal_class = letter->front();
    has_class = letter.has_value();
    p->finish();
  }
  if (!has_class) desk.assume("/insulation/class", "A", "paper makes a class A coil whatever the wire");
  if (!i.margin) desk.assume("/insulation/margin", "by gauge and volts", "the larger of the two, see each winding");
  if (!i.interlayer) desk.assume("/insulation/interlayer", "by gauge and volts", "see each winding");
  if (!i.wrap)
    desk.assume("/insulation/wrap", "0.3 mm; 0.4 mm beside a floating heater",
                "three layers, any two of which pass the test");
}

void read_wire(reading_desk& desk, page& root) {
  wire_wish& w = desk.out.wire;
  std::optional<std::string> system, grade;
  if (auto p = root.object("wire")) {
    system = p->word("system", {"metric", "awg", "swg"});
    if (system == "awg") w.system = wire_system::awg;
    if (system == "swg") w.system = wire_system::swg;
    grade = w.system == wire_system::awg ? p->word("grade", {"single", "heavy", "1", "2"})
                                         : p->word("grade", {"1", "2", "3"});
    p->finish();
  }
  const bool bobbin = root.has("former") && root.value("former")->is_object() &&
                      root.value("former")->value("kind", json("")) == "bobbin";
  const bool heavy = bobbin;  // crossed wires press on each other without paper
  w.grade = grade.value_or(w.system == wire_system::awg ? (heavy ? "heavy" : "single") : (heavy ? "2" : "1"));
  if (!system) desk.assume("/wire/system", "metric", "IEC 60317 sizes");
  if (!grade)
    desk.assume("/wire/grade", w.grade, heavy ? "without paper the heavier enamel" : "paper keeps the layers apart");
}

void read_limits(reading_desk& desk, page& root) {
  limits_wish& l = desk.out.limits;
  std::optional<temperature> ambient;
  std::optional<kelvins> rise;
  if (auto p = root.object("limits")) {
    ambient = p->quantity<temperature>("ambient", "-20 degC", "90 degC");
    rise = p->quantity<kelvins>("temperature_rise", "5 K", "150 K");
    l.flux_density = p->quantity<teslas>("flux_density", "0.2 T", "1.9 T");
    l.flux_density_high = p->quantity<teslas>("flux_density_high", "0.2 T", "2.0 T");
    l.current_density = p->quantity<amperes_per_square_metre>("current_density", "0.5 A/mm2", "12 A/mm2");
    if (const auto r = p->quantity<ratio>("regulation", "0.5 %", "60 %")) l.regulation_ratio = r->value;
    l.height = length(*p, "height", "10 mm", "500 mm");
    l.mass = p->quantity<kilograms>("mass", "20 g", "100 kg");
    p->finish();
  }
  l.ambient = ambient.value_or(45_degC);
  if (!ambient) desk.assume("/limits/ambient", "45 degC", "air inside a valve chassis (memory)");
  // Average of a winding by class in normal use (memory): A 100, E 115, B 120, F 140, H 165 degC.
  const char letter = desk.out.insulation.thermal_class;
  const double average = letter == 'A' ? 100 : letter == 'E' ? 115 : letter == 'B' ? 120 : letter == 'F' ? 140 : 165;
  l.temperature_rise = rise.value_or(as<kelvins>(average - in_celsius(l.ambient)));
  if (!rise) {
    desk.assume("/limits/temperature_rise", shown(l.temperature_rise, 2),
                std::string("class ") + letter + " average " + fixed(average, 0) + " degC less ambient (memory)");
  }
}

void read_aim_and_prices(reading_desk& desk, page& root) {
  const auto aim_word = root.word("aim", {"cost", "mass", "loss", "volume", "height", "regulation"});
  const std::string word = aim_word.value_or("cost");
  desk.out.goal = word == "mass"         ? aim::mass
                  : word == "loss"       ? aim::loss
                  : word == "volume"     ? aim::volume
                  : word == "height"     ? aim::height
                  : word == "regulation" ? aim::regulation
                                         : aim::cost;
  const bool open = !desk.out.core.lamination || !desk.out.core.stack;
  if (!aim_word && open) desk.assume("/aim", "cost", "the cheapest core that meets every limit");
  std::optional<per_kilogram> copper, steel;
  if (auto p = root.object("prices")) {
    copper = p->quantity<per_kilogram>("copper", "0 /kg", "100000 /kg");
    steel = p->quantity<per_kilogram>("steel", "0 /kg", "100000 /kg");
    p->finish();
  }
  desk.out.prices = {copper.value_or(as<per_kilogram>(14)), steel.value_or(as<per_kilogram>(4))};
  desk.out.prices_given = copper || steel;
  const bool matters = desk.out.prices_given || (open && desk.out.goal == aim::cost);
  const std::string why = "only the ratio of prices matters for a choice (judgement)";
  if (!copper && matters) desk.assume("/prices/copper", written(desk.out.prices.copper), why);
  if (!steel && matters) desk.assume("/prices/steel", written(desk.out.prices.steel), why);
}

}  // namespace turnwright::job_detail
