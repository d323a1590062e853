#include <algorithm>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/selector.hpp>

#include "sections.hpp"

namespace turnwright::job_detail {

using namespace literals;

namespace {

// "10 %" either way, or "+6 % -10 %" in either order.
std::optional<tolerance> read_tolerance(page& mains, const std::string& text) {
  const std::string where = mains.place("tolerance");
  const auto part = [&](const std::string& t) { return mains.quantity_in<ratio>(t, where, "-30 %", "30 %"); };
  const std::size_t cut = text.find('%');
  const bool two = cut != std::string::npos && text.find('%', cut + 1) != std::string::npos;
  if (!two) {
    const auto both = part(text);
    if (both && both->value < 0) mains.fault(wording::out_of_range(where, text, "0 %", "30 %"));
    return both ? std::optional(tolerance{both->value, both->value}) : std::nullopt;
  }
  const auto a = part(text.substr(0, cut + 1)), b = part(text.substr(cut + 1));
  if (!a || !b) return std::nullopt;
  if ((a->value < 0) == (b->value < 0)) {
    mains.fault(wording::other("wrong-sort", where, wording::quoted(text),
                               "one figure up and one down, such as \"+6 % -10 %\""));
    return std::nullopt;
  }
  return tolerance{std::max(a->value, b->value), -std::min(a->value, b->value)};
}

void read_frequency(reading_desk& desk, page& mains) {
  desk.out.mains.frequency = 50_Hz;
  const auto text = mains.text("frequency");
  const std::string where = mains.place("frequency");
  if (!text) {
    if (!mains.has("frequency")) {
      desk.faults.push_back(wording::missing(where, "the frequency of the mains, such as \"50 Hz\" or \"50-60 Hz\"",
                                             "60 Hz iron on 50 Hz has 20 % more flux"));
    }
    return;
  }
  // "50-60 Hz": the lower rules the flux
  const std::size_t dash = text->find('-');
  std::string lower = *text, upper = *text;
  if (dash != std::string::npos && dash > 0) {
    upper = text->substr(dash + 1);
    const std::size_t unit = upper.find_first_not_of("0123456789. ");
    lower = text->substr(0, dash) + (unit == std::string::npos ? "" : " " + upper.substr(unit));
  }
  const auto f = mains.quantity_in<hertz>(lower, where, "16 Hz", "450 Hz");
  const auto g = f && upper != lower ? mains.quantity_in<hertz>(upper, where, "16 Hz", "450 Hz") : f;
  if (f && g) desk.out.mains.frequency = std::min(*f, *g);
}

// Band of the supply with that nominal voltage and frequency, from the table of mains.
std::optional<tolerance> usual_band(const catalogue& tables, volts on, hertz f, std::string& region) {
  for (const row& r : tables.named("mains").rows) {
    const auto over = r.number("plus_ratio"), under = r.number("minus_ratio");
    if (!over || !under || r.needed("nominal_v") != plain(on) || r.needed("frequency_hz") != plain(f)) continue;
    region = r.text("region");
    return tolerance{*over, *under};
  }
  return std::nullopt;
}

std::vector<volts> read_taps(page& owner, const json& list, const std::string& where) {
  std::vector<volts> taps;
  if (!list.is_array() || list.empty()) {
    owner.fault(
        wording::wrong_sort(where, as_written(list), "a list of volts such as [\"220 V\", \"230 V\", \"240 V\"]"));
    return taps;
  }
  for (std::size_t i = 0; i < list.size(); ++i) {
    const std::string here = where + "/" + std::to_string(i);
    const auto v = owner.quantity_of<volts>(list[i], here, "10 V", "500 V");
    if (!v) continue;
    if (!taps.empty() && *v <= taps.back()) {
      owner.fault(wording::other(
          "tap-order", here,
          wording::quoted(list[i].get<std::string>()) + " after " + wording::quoted(written(taps.back())),
          "taps in rising order from the common start"));
      continue;
    }
    taps.push_back(*v);
  }
  if (list.size() > 12)
    owner.fault(wording::other("out-of-range", where, std::to_string(list.size()) + " taps", "twelve at most"));
  return taps;
}

void read_two_windings(reading_desk& desk, page& primary, const json& list) {
  const std::string where = primary.place("windings");
  if (!list.is_array() || list.size() != 2) {
    desk.faults.push_back(wording::wrong_sort(
        where, as_written(list), "two equal windings, such as [[\"100 V\", \"120 V\"], [\"100 V\", \"120 V\"]]"));
    return;
  }
  const auto a = read_taps(primary, list[0], where + "/0"), b = read_taps(primary, list[1], where + "/1");
  if (a != b) {
    desk.faults.push_back(wording::other("unequal", where, "two windings that differ",
                                         "two equal windings: only such may be linked in parallel"));
  }
  desk.out.primary.two_windings = true;
  desk.out.primary.taps = a;
}

void choose_on(reading_desk& desk, const std::optional<volts>& wall, const std::string& path) {
  primary_wish& p = desk.out.primary;
  const auto positions = selector_positions(p);
  // What the wall says, else 230 V or 120 V where they are, else the highest.
  std::vector<volts> wishes{230_V, 120_V, positions.back().at};
  if (wall) wishes.insert(wishes.begin(), *wall);
  for (const volts& v : wishes) {
    p.on = v;
    if (has_nominal_position(p)) break;
  }
  if (positions.size() > 1) desk.assume(path, written(p.on), "the nominal mains among the positions");
}

void read_primary(reading_desk& desk, page& root, const std::optional<volts>& wall) {
  primary_wish& p = desk.out.primary;
  auto primary = root.object("primary");
  if (!primary) {
    if (wall) p.taps = {*wall};
    if (!wall && !root.has("primary")) {
      desk.faults.push_back(wording::missing(root.place("primary"), "the primary, such as {\"taps\": [\"230 V\"]}"));
    }
    if (wall) p.on = *wall;
    return;
  }
  const std::size_t faults_before = desk.faults.size();
  const json* taps = primary->value("taps");
  const json* two = primary->value("windings");
  if (taps && two) {
    desk.faults.push_back(wording::other("either-or", primary->where(), "both taps and windings", "one of them"));
  } else if (taps) {
    p.taps = read_taps(*primary, *taps, primary->place("taps"));
  } else if (two) {
    read_two_windings(desk, *primary, *two);
  } else if (wall) {
    p.taps = {*wall};
  } else {
    desk.faults.push_back(wording::missing(primary->place("taps"), "the volts of the primary, such as [\"230 V\"]"));
  }
  const auto on = primary->quantity<volts>("on", "10 V", "1000 V");
  p.fixed = read_wishes(desk, *primary);
  if (p.fixed.tolerance_ratio)
    desk.faults.push_back(wording::not_yet(primary->place("tolerance"), "a tolerance of the primary",
                                           "its taps are whole turns, within one of their ratio"));
  if (p.fixed.n && p.fixed.n->count() < static_cast<int>(p.taps.size())) {
    desk.faults.push_back(wording::other("out-of-range", primary->place("turns"),
                                         std::to_string(p.fixed.n->count()) + " turns",
                                         "at least a turn for each tap"));
  }
  primary->finish();
  if (p.taps.empty() || desk.faults.size() > faults_before)
    return;  // nothing to be said of `on` before the taps are right
  if (!on) return choose_on(desk, wall, "/primary/on");
  p.on = *on;
  if (!has_nominal_position(p)) {
    std::vector<std::string> known;
    for (const selector_position& s : selector_positions(p)) known.push_back(written(s.at));
    desk.faults.push_back(wording::unknown_word(primary->place("on"), written(*on), known));
  }
}

}  // namespace

mains_read read_mains(reading_desk& desk, page& root) {
  mains_read m;
  if (auto mains = root.object("mains")) {
    read_frequency(desk, *mains);
    m.wall = mains->quantity<volts>("voltage", "10 V", "1000 V");
    m.source = mains->quantity<ohms>("source_resistance", "0 ohm", "1 kohm");
    m.has_band = mains->has("tolerance");
    if (const auto text = mains->text("tolerance")) m.band = read_tolerance(*mains, *text);
    mains->finish();
  } else if (!root.has("mains")) {
    desk.faults.push_back(wording::missing(root.place("mains"),
                                           "the mains, such as {\"frequency\": \"50 Hz\", \"tolerance\": \"10 %\"}"));
  }
  return m;
}

void settle_band(reading_desk& desk, const mains_read& read, volts nominal) {
  mains_wish& m = desk.out.mains;
  std::optional<tolerance> band = read.band;
  if (!read.has_band) {
    std::string region = "no supply of the table fits";
    band = usual_band(desk.tables, nominal, m.frequency, region).value_or(tolerance{0.1, 0.1});
    desk.assume("/mains/tolerance", "+" + written(ratio{band->over}) + " -" + written(ratio{band->under}),
                "band of the supply: " + region);
  }
  if (!band) return;
  m.over_ratio = band->over;
  m.under_ratio = band->under;
}

void read_mains_and_primary(reading_desk& desk, page& root) {
  const mains_read read = read_mains(desk, root);
  read_primary(desk, root, read.wall);
  if (desk.out.primary.taps.empty()) return;
  settle_band(desk, read, desk.out.primary.on);
  mains_wish& m = desk.out.mains;
  m.source_resistance = read.source.value_or(desk.out.primary.on < 160_V ? 0.2_ohm : 0.5_ohm);
  if (!read.source) desk.assume("/mains/source_resistance", written(m.source_resistance), "a usual outlet (memory)");
}

}  // namespace turnwright::job_detail
