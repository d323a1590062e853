#include <turnwright/sheet/report.hpp>

#include <algorithm>

#include <turnwright/measure/written.hpp>
#include <turnwright/sheet/columns.hpp>

namespace turnwright {

namespace {

std::string number(double x, int digits) { return shortest(rounded_to(x, digits)); }

// A figure as the table has it, without the last bits of its double.
template <class Q>
std::string text_of(const Q& q) {
  if constexpr (requires { Q::from_value(0.0); }) {
    return written(as<Q>(rounded_to(plain(q), 6)));
  } else {
    return text_of(q.plain());
  }
}

// Lines under labels; figures that are known, each with its standing where that is asked for.
class lines {
 public:
  explicit lines(bool each_standing) : each_standing_(each_standing) {}

  std::string marked(const std::string& text, standing known_how, bool weak) const {
    std::string mark = each_standing_ ? std::string(word_of(known_how)) : "";
    if (weak) mark += mark.empty() ? "weak" : ", weak";
    return mark.empty() ? text : text + " [" + mark + "]";
  }
  template <class Q>
  std::string said(const known_figure<Q>& f, const std::string& before = "", const std::string& after = "") const {
    return f ? marked(before + text_of(*f) + after, f.known_how, f.weak) : "";
  }
  // Parts that are not empty, parted by ", ".
  void add(std::string_view label, const std::vector<std::string>& parts) {
    std::string text;
    for (const std::string& part : parts) {
      if (!part.empty()) text += (text.empty() ? "" : ", ") + part;
    }
    if (!text.empty()) out_ += labelled(label, text);
  }
  const std::string& text() const { return out_; }

 private:
  bool each_standing_;
  std::string out_;
};

std::string names_of(const std::string& name, const std::vector<std::string>& also) {
  std::string text = name;
  for (const std::string& other : also) text += ", " + other;
  return text;
}

std::string law_text(const rectifier_type& t) {
  if (!t.law) return "not known";
  if (const auto* valve = std::get_if<three_halves_law>(&*t.law))
    return "I = K V^1.5, K " + shown(valve->each_anode, 4) + " each anode";
  const auto& line = std::get<straight_law>(*t.law);
  const ohms slope = as<ohms>(rounded_to(plain(line.slope), 3));
  return text_of(line.drop) + (plain(slope) > 0 ? " + " + text_of(slope) : " at any current");
}

std::string resistance_text(const rectifier_type& t) {
  std::string text;
  for (const anode_resistance_point& p : t.least_resistances) {
    text += (text.empty() ? "" : "; ") + text_of(p.least);
    if (p.at) text += " at " + text_of(*p.at);
    if (p.reservoir) text += (p.at ? " (" : " for ") + text_of(*p.reservoir) + (p.at ? ")" : "");
  }
  return text;
}

standing resistance_standing(const rectifier_type& t) {
  standing weakest = standing::read;
  for (const anode_resistance_point& p : t.least_resistances) weakest = std::min(weakest, p.known_how);
  return weakest;
}

std::string sort_text(const rectifier_type& t, const lines& l) {
  if (t.sort != rectifier_sort::valve) return std::string(word_of(t.sort));
  return std::string(word_of(t.sort)) + ", " +
         l.marked(t.anodes.value == 2 ? "full-wave" : "half-wave", t.anodes.known_how, t.anodes.weak) + ", " +
         l.marked(std::string(word_of(*t.heated)) + "ly heated", t.heated.known_how, t.heated.weak);
}

std::string foot(const std::string& note, standing known_how, const std::string& source) {
  return (note.empty() ? "" : labelled("note", note)) +
         wrapped("standing: " + std::string(word_of(known_how)) + "; source: " + source, "") +
         wrapped(
             "standing of the row: its weakest figure; read = seen in print, memory = recalled, derived = worked out, "
             "estimate = by a rule of thumb; weak = confirm before use. --standing gives that of each figure.",
             "");
}

std::string stages_text(const amplifying_valve& v, const valve_book& book) {
  text_table t({"class", "<of", "anode V", "screen V", "idle mA", "full mA", "W out", "load ohm", "<standing, trust"});
  const auto si = [](const auto& value) { return value ? number(plain(*value), 5) : std::string(); };
  const auto of_stated = [](const auto& value) { return value ? number(plain(value->plain()), 4) : std::string(); };
  const auto both = [](const auto& anode, const auto& screen) {
    if (!anode) return std::string();
    return number(plain(anode->plain()) * 1e3, 4) + (screen ? " + " + number(plain(screen->plain()) * 1e3, 3) : "");
  };
  bool any = false;
  for (const output_stage& s : book.stages()) {
    if (name_key(s.type) != name_key(v.name)) continue;
    any = true;
    t.add({s.operation + (s.how.empty() ? "" : ", " + s.how), std::to_string(s.valves), of_stated(s.anode_volts),
           of_stated(s.screen_volts), both(s.anode_idle, s.screen_idle), both(s.anode_full, s.screen_full), si(s.power),
           si(s.load), std::string(word_of(s.known_how)) + ", " + std::string(word_of(s.trust))});
  }
  return any ? "output stages (mA: anode + screen, of all valves of the stage)\n" + t.text() : "";
}

std::string milliamperes(const known_figure<amperes_dc>& f) { return f ? number(plain((*f).plain()) * 1e3, 4) : ""; }
template <class Q>
std::string in_plain(const known_figure<Q>& f) {
  return f ? number(plain((*f).plain()), 4) : "";
}

std::string valves_list(const valve_book& book) {
  text_table t({"rectifier valve", "<also", "<heated", "heater", "V rms", "mA dc", "V inverse", "uF most", "mA/V^1.5",
                "<standing"});
  for (const rectifier_type& r : book.rectifiers()) {
    if (r.sort != rectifier_sort::valve) continue;
    const auto* law = r.law ? std::get_if<three_halves_law>(&*r.law) : nullptr;
    t.add({r.name, r.also.empty() ? "" : r.also.back(), std::string(word_of(*r.heated)),
           text_of(*r.heater_volts) + " " + number(plain(*r.heater_current), 4) + " A", in_plain(r.capacitor_input),
           milliamperes(r.direct_current), in_plain(r.peak_inverse),
           r.reservoir_most ? number(plain(*r.reservoir_most) * 1e6, 4) : "",
           law ? number(plain(law->each_anode) * 1e3, 3) : "", std::string(word_of(r.known_how))});
  }
  return t.text();
}

std::string silicon_list(const valve_book& book) {
  text_table t({"silicon", "<", "V inverse", "A mean", "A surge", "<drop", "<standing"});
  for (const rectifier_type& r : book.rectifiers()) {
    if (r.sort == rectifier_sort::valve) continue;
    t.add({r.name, r.sort == rectifier_sort::bridge ? "bridge" : "diode", in_plain(r.peak_inverse),
           in_plain(r.direct_current), in_plain(r.transient_peak), law_text(r), std::string(word_of(r.known_how))});
  }
  return t.text();
}

std::string amplifiers_list(const valve_book& book) {
  text_table t({"amplifying valve", "<also", "<function", "<heater", "<or", "<standing"});
  for (const amplifying_valve& v : book.amplifiers()) {
    const std::string other =
        v.other_heater_volts ? text_of(*v.other_heater_volts) + " " + text_of(*v.other_heater_current) : "";
    t.add({v.name, v.also.empty() ? "" : v.also.front(), v.function,
           text_of(*v.heater_volts) + " " + text_of(*v.heater_current), other, std::string(word_of(v.known_how))});
  }
  return t.text();
}

}  // namespace

std::string report_of(const rectifier_type& t, bool each_standing) {
  lines l(each_standing);
  const bool valve = t.sort == rectifier_sort::valve;
  l.add("type", {names_of(t.name, t.also) + " (" + sort_text(t, l) + ")", t.package});
  l.add("heater",
        {l.said(t.heater_volts), l.said(t.heater_current),
         l.said(t.heater_cathode, "", " at most of cathode over heater"), l.said(t.warm_up, "", " to warm up")});
  l.add("drop",
        {t.law ? l.marked((valve ? "" : "reckoned as ") + law_text(t), t.law_known_how, t.law_weak) : law_text(t),
         l.said(t.drop, valve ? "printed " : "greatest ", t.drop_at ? " at " + text_of(*t.drop_at) : "")});
  l.add("volts", {l.said(t.capacitor_input, "", " r.m.s. each anode with capacitor input"),
                  l.said(t.choke_input, "", " r.m.s. with choke input"), l.said(t.peak_inverse, "", " peak inverse")});
  l.add("current", {l.said(t.direct_current, "",
                           valve || t.sort == rectifier_sort::bridge ? " dc, the whole of it" : " mean, one diode"),
                    l.said(t.peak_current, "", " peak each anode"),
                    l.said(t.transient_peak, "", valve ? " peak each anode at switch-on" : " surge")});
  l.add("reservoir", {l.said(t.reservoir_most, "", " at most")});
  if (!t.least_resistances.empty())
    l.add("anode", {l.marked("at least " + resistance_text(t) + ", in each", resistance_standing(t), false)});
  return l.text() + foot(t.note, t.known_how, t.source);
}

std::string report_of(const amplifying_valve& v, const valve_book& book, bool each_standing) {
  lines l(each_standing);
  l.add("type", {names_of(v.name, v.also) + " (" + v.function + ", " +
                 l.marked(std::string(word_of(*v.heated)) + "ly heated", v.heated.known_how, v.heated.weak) + ")"});
  l.add("heater", {l.said(v.heater_volts), l.said(v.heater_current)});
  l.add("or", {l.said(v.other_heater_volts), l.said(v.other_heater_current)});
  l.add("insulation", {l.said(v.heater_cathode, "", " at most of cathode over heater"),
                       l.said(v.heater_positive, "", " of heater over cathode")});
  if (v.anode_current) {
    l.add("typical", {l.said(v.anode_current, "", v.sections > 1 ? " anode of each section" : " anode"),
                      l.said(v.screen_current, "", " screen"), "at " + v.condition});
  }
  return l.text() + stages_text(v, book) + foot(v.note, v.known_how, v.source);
}

std::string list_of_valves(const shop& s) {
  return valves_list(s.valves) + "\n" + silicon_list(s.valves) + "\n" + amplifiers_list(s.valves) +
         wrapped(
             "V rms: greatest for each anode with capacitor input; mA dc: of the whole valve; K in mA/V^1.5 for each "
             "anode, none where no drop is known. A row's standing is that of its weakest figure.",
             "");
}

}  // namespace turnwright
