#include <turnwright/valve/valve_book.hpp>

#include <algorithm>

#include <turnwright/remark/wording.hpp>

#include "row_figures.hpp"

namespace turnwright {

namespace {

template <class Read>
void each_row(const table& t, std::vector<remark>& faults, Read read) {
  for (const row& r : t.rows) {
    try {
      read(r);
    } catch (const refused& why) {
      faults.insert(faults.end(), why.remarks().begin(), why.remarks().end());
    }
  }
}

template <class Item>
bool fits(const Item& item, const std::string& key) {
  const auto same = [&](const std::string& n) { return name_key(n) == key; };
  return same(item.name) || std::any_of(item.also.begin(), item.also.end(), same);
}

template <class Item>
void add_names(const std::vector<Item>& items, std::vector<std::string>& names) {
  for (const Item& item : items) {
    names.push_back(item.name);
    names.insert(names.end(), item.also.begin(), item.also.end());
  }
}

// Items whose name or alias fits; the one of that very name alone where there is one.
template <class Item>
std::vector<const Item*> fitting(const std::vector<Item>& items, std::string_view name) {
  const std::string key = name_key(name);
  std::vector<const Item*> found;
  for (const Item& item : items) {
    if (name_key(item.name) == key) return {&item};
    if (fits(item, key)) found.push_back(&item);
  }
  return found;
}

// A point of a type's least resistance: all of them at volts, or none.
void add_resistance(std::vector<rectifier_type>& all, const row& r) {
  const std::string key = name_key(r.text("type"));
  const auto at = std::find_if(all.begin(), all.end(), [&](const rectifier_type& t) { return fits(t, key); });
  if (at == all.end()) {
    throw refused(wording::other("unknown-name", r.place("type"), wording::quoted(r.text("type")),
                                 "a type of the table of rectifiers"));
  }
  anode_resistance_point p = resistance_of_row(r);
  const auto alike = [&](const anode_resistance_point& q) {
    return q.at.has_value() == p.at.has_value() && (p.at || q.reservoir.has_value() == p.reservoir.has_value()) &&
           (p.at ? *q.at != *p.at : q.reservoir != p.reservoir);
  };
  if (!std::all_of(at->least_resistances.begin(), at->least_resistances.end(), alike)) {
    throw refused(wording::other("bad-row", r.place(), "a second way to tell the least resistance of " + at->name,
                                 "points at different volts, or for different reservoirs, or one for all"));
  }
  at->known_how = valve_detail::weaker(at->known_how, p.known_how);
  at->least_resistances.push_back(std::move(p));
}

}  // namespace

valve_book::valve_book(const catalogue& tables) {
  std::vector<remark> faults;
  each_row(tables.named("rectifiers"), faults, [&](const row& r) { rectifiers_.push_back(rectifier_of_row(r)); });
  each_row(tables.named("rectifier_resistances"), faults, [&](const row& r) { add_resistance(rectifiers_, r); });
  each_row(tables.named("diodes"), faults, [&](const row& r) { rectifiers_.push_back(diode_of_row(r)); });
  each_row(tables.named("valves"), faults, [&](const row& r) { amplifiers_.push_back(amplifier_of_row(r)); });
  each_row(tables.named("output_stages"), faults, [&](const row& r) { stages_.push_back(stage_of_row(r)); });
  if (!faults.empty()) throw refused(std::move(faults));
  rectifiers_.push_back(plain_silicon());
}

const rectifier_type& valve_book::rectifier(std::string_view name, const std::string& where) const {
  const auto found = fitting(rectifiers_, name);
  if (found.size() == 1) return *found.front();
  std::vector<std::string> names;
  if (found.size() > 1) {
    for (const rectifier_type* t : found) names.push_back(t->name);
    throw refused(wording::ambiguous_name(where, name, names));
  }
  add_names(rectifiers_, names);
  remark none = wording::unknown_name(where, name, "a rectifier of the table, such as \"GZ34\", or \"silicon\"", names);
  if (!fitting(amplifiers_, name).empty()) none.hint = "this is an amplifying valve";
  throw refused(std::move(none));
}

found_valve valve_book::named(std::string_view name, const std::string& where) const {
  const auto rectifying = fitting(rectifiers_, name);
  const auto amplifying = fitting(amplifiers_, name);
  if (rectifying.size() == 1 && amplifying.empty()) return {rectifying.front(), nullptr};
  if (amplifying.size() == 1 && rectifying.empty()) return {nullptr, amplifying.front()};
  std::vector<std::string> names;
  for (const rectifier_type* t : rectifying) names.push_back(t->name);
  for (const amplifying_valve* v : amplifying) names.push_back(v->name);
  if (!names.empty()) throw refused(wording::ambiguous_name(where, name, names));
  add_names(rectifiers_, names);
  add_names(amplifiers_, names);
  throw refused(
      wording::unknown_name(where, name, "a valve or diode of the tables, such as \"GZ34\" or \"EL84\"", names));
}

bool valve_book::knows(std::string_view name) const {
  return !fitting(rectifiers_, name).empty() || !fitting(amplifiers_, name).empty();
}

}  // namespace turnwright
