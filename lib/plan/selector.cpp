#include <turnwright/plan/selector.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <turnwright/measure/written.hpp>

namespace turnwright {
namespace {

bool same(volts a, volts b) { return std::abs(plain(a) - plain(b)) < 1e-6 * plain(a); }

std::string tap_name(volts v) { return shortest(rounded_to(plain(v), 6)) + " V"; }

}  // namespace

bool is_primary_name(std::string_view name) { return name == "primary" || name == "primary A" || name == "primary B"; }

std::vector<selector_position> selector_positions(const primary_wish& p) {
  std::vector<selector_position> all;
  const auto add = [&](const selector_position& s) {
    const bool there =
        std::any_of(all.begin(), all.end(), [&](const selector_position& o) { return same(o.at, s.at); });
    if (!there) all.push_back(s);
  };
  for (std::size_t i = 0; i < p.taps.size(); ++i) {
    add({p.taps[i], i, p.two_windings ? std::optional(i) : std::nullopt, false});
  }
  if (p.two_windings) {
    for (std::size_t i = 0; i < p.taps.size(); ++i) {
      for (std::size_t j = i; j < p.taps.size(); ++j) add({p.taps[i] + p.taps[j], j, i, true});
    }
  }
  std::stable_sort(all.begin(), all.end(), [](const auto& a, const auto& b) { return a.at < b.at; });
  return all;
}

bool has_nominal_position(const primary_wish& p) {
  const auto all = selector_positions(p);
  return std::any_of(all.begin(), all.end(), [&](const selector_position& s) { return same(s.at, p.on); });
}

selector_position nominal_position(const primary_wish& p) {
  for (const selector_position& s : selector_positions(p)) {
    if (same(s.at, p.on)) return s;
  }
  throw std::logic_error("no selector position for the nominal mains");
}

turns turns_in_use(const selector_position& s, const tap_turns& taps) {
  return s.series ? taps[s.tap_a] + taps[*s.tap_b] : taps[s.tap_a];
}

primary_share share_of(const selector_position& s, ohms ra, ohms rb) {
  if (!s.tap_b) return {1.0, 0.0, ra};
  if (s.series) return {1.0, 1.0, ra + rb};
  return {rb / (ra + rb), ra / (ra + rb), ra * rb / (ra + rb)};
}

std::string links_of(const selector_position& s, const primary_wish& p) {
  const std::string tap_a = tap_name(p.taps[s.tap_a]);
  if (!s.tap_b) return "line to start, neutral to " + tap_a;
  const std::string tap_b = tap_name(p.taps[*s.tap_b]);
  if (s.series) return "line to A start, A " + tap_a + " to B start, neutral to B " + tap_b;
  return "line to A start and B start, neutral to A " + tap_a + " and B " + tap_b;
}

}  // namespace turnwright
