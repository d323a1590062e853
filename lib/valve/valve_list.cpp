#include <turnwright/valve/valve_list.hpp>

#include <algorithm>
#include <charconv>
#include <cmath>

#include <turnwright/measure/written.hpp>
#include <turnwright/remark/wording.hpp>

namespace turnwright {

namespace {

std::string_view trimmed(std::string_view s) {
  while (!s.empty() && s.front() == ' ') s.remove_prefix(1);
  while (!s.empty() && s.back() == ' ') s.remove_suffix(1);
  return s;
}

struct counted_name {
  std::string_view count;  // digits; empty where the text has no count
  std::string_view name;
};

// "2 x EL34" in its two parts; a rest of one letter is no type, so that 6X4 stays whole.
counted_name parted(std::string_view text) {
  std::size_t digits = 0;
  while (digits < text.size() && text[digits] >= '0' && text[digits] <= '9') ++digits;
  std::string_view rest = trimmed(text.substr(digits));
  for (const std::string_view times : {"x", "X", "\xC3\x97"}) {
    if (digits == 0 || !rest.starts_with(times)) continue;
    const std::string_view name = trimmed(rest.substr(times.size()));
    if (name.size() >= 2) return {text.substr(0, digits), name};
  }
  return {{}, text};
}

bool near(volts a, volts b) { return std::abs(plain(a) / plain(b) - 1) <= 0.02; }

// Heater amperes of one valve at these volts, or nothing.
known_figure<amperes> heater_at(const valve_count& v, volts heater) {
  if (const auto* r = std::get_if<rectifier_type>(&v.valve))
    return r->heater_volts && near(*r->heater_volts, heater) ? r->heater_current : known_figure<amperes>{};
  const auto& a = std::get<amplifying_valve>(v.valve);
  if (near(*a.heater_volts, heater)) return a.heater_current;
  return a.other_heater_volts && near(*a.other_heater_volts, heater) ? a.other_heater_current : known_figure<amperes>{};
}

std::string counted(int count, const std::string& name) { return std::to_string(count) + " x " + name; }

// Its volts and amperes as they stand first in the table; empty for silicon.
std::string heater_text(const valve_count& v) {
  const auto text = [&](const auto& t) {
    if (!t.heater_volts) return std::string();
    return counted(v.count, t.name) + ", " + shown(*t.heater_volts, 2) + " " +
           written(as<amperes>(rounded_to(v.count * plain(*t.heater_current), 6)));
  };
  return std::visit(text, v.valve);
}

double sum_of(const std::optional<amperes_dc>& a, const std::optional<amperes_dc>& b) {
  return (a ? plain(a->plain()) : 0) + (b ? plain(b->plain()) : 0);
}

double full_of(const output_stage& s) { return sum_of(s.anode_full, s.screen_full); }

// The class AB pair that is trusted best and of these draws most; nothing where none is known at both ends.
const output_stage* pair_for(const amplifying_valve& v, const valve_book& book) {
  const output_stage* best = nullptr;
  for (const output_stage& s : book.stages()) {
    const bool fit = name_key(s.type) == name_key(v.name) && s.valves == 2 && s.operation.starts_with("AB") &&
                     s.trust != confidence::low && s.anode_idle && s.anode_full;
    if (!fit) continue;
    if (!best || s.trust > best->trust || (s.trust == best->trust && full_of(s) > full_of(*best))) best = &s;
  }
  return best;
}

struct plain_guess {
  double full_a = 0, idle_a = 0;
};

void add_guess(int count, const amplifying_valve& v, const valve_book& book, plain_guess& sum, ht_current_guess& out) {
  const output_stage* pair = count % 2 == 0 ? pair_for(v, book) : nullptr;
  if (pair) {
    const int pairs = count / 2;
    sum.full_a += pairs * full_of(*pair);
    sum.idle_a += pairs * sum_of(pair->anode_idle, pair->screen_idle);
    std::string at = pair->anode_volts ? " at " + shown(pair->anode_volts->plain(), 3) : "";
    out.reasons.push_back(counted(count, v.name) + ": pairs in class " + pair->operation + at + ", " +
                          std::string(word_of(pair->known_how)));
  } else if (v.anode_current) {
    const double each_a = v.sections * plain(v.anode_current.value->plain()) +
                          (v.screen_current ? plain(v.screen_current.value->plain()) : 0);
    sum.full_a += count * each_a;
    sum.idle_a += count * each_a;
    out.reasons.push_back(counted(count, v.name) + ": typical current at " + v.condition + ", " +
                          std::string(word_of(v.anode_current.known_how)));
  } else {
    out.unknown.push_back(v.name);
  }
}

}  // namespace

const std::string& name_of(const valve_count& v) {
  return std::visit([](const auto& t) -> const std::string& { return t.name; }, v.valve);
}

std::optional<valve_count> read_valve_count(std::string_view text, const std::string& where, const valve_book& book,
                                            std::vector<remark>& faults) {
  const std::string_view whole = trimmed(text);
  if (whole.empty()) {
    faults.push_back(wording::other("empty", where, "an empty text", "a count and a type, such as \"2 x EL84\""));
    return std::nullopt;
  }
  const counted_name parts = book.knows(whole) ? counted_name{{}, whole} : parted(whole);
  int count = 1;
  if (!parts.count.empty()) {
    const auto read = std::from_chars(parts.count.data(), parts.count.data() + parts.count.size(), count);
    if (read.ec != std::errc{} || count < 1 || count > 100) {
      faults.push_back(wording::out_of_range(where, text, "1", "100 of a type"));
      return std::nullopt;
    }
  }
  try {
    const found_valve found = book.named(parts.name, where);
    if (found.rectifier) return valve_count{count, *found.rectifier};
    return valve_count{count, *found.amplifier};
  } catch (const refused& why) {
    faults.insert(faults.end(), why.remarks().begin(), why.remarks().end());
    return std::nullopt;
  }
}

heater_load heater_current(std::span<const valve_count> list, volts heater) {
  heater_load load;
  double sum_a = 0;
  for (const valve_count& v : list) {
    if (const auto each = heater_at(v, heater)) {
      sum_a += v.count * plain(*each);
      load.known_how = std::min(load.known_how, each.known_how);
    } else if (const std::string other = heater_text(v); !other.empty()) {
      load.others.push_back(other);
    }
  }
  load.current = as<amperes>(sum_a);
  return load;
}

ht_current_guess first_guess_ht_current(std::span<const valve_count> list, const valve_book& book) {
  std::vector<valve_count> by_type;  // two lines of one type count as one, so that pairs are seen
  for (const valve_count& v : list) {
    const auto same = std::find_if(by_type.begin(), by_type.end(),
                                   [&](const valve_count& other) { return name_of(other) == name_of(v); });
    if (same == by_type.end()) {
      by_type.push_back(v);
    } else {
      same->count += v.count;
    }
  }
  ht_current_guess out;
  plain_guess sum;
  for (const valve_count& v : by_type) {
    if (const auto* a = std::get_if<amplifying_valve>(&v.valve)) add_guess(v.count, *a, book, sum, out);
  }
  out.full = amperes_dc{as<amperes>(sum.full_a)};
  out.idle = amperes_dc{as<amperes>(sum.idle_a)};
  return out;
}

}  // namespace turnwright
