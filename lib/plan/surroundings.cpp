#include <algorithm>
#include <cmath>

#include <turnwright/plan/plan.hpp>

namespace turnwright {
namespace {

// Volts between two neighbours: against each other at worst opposite in phase; between primary and secondary, whose
// common end is at earth on one side, the larger of the two.
volts_rms between(const coil_draft& a, const coil_draft& b) {
  if (a.role.primary != b.role.primary) return std::max(a.to_core, b.to_core);
  return volts_rms{a.to_core.plain() + b.to_core.plain()};
}

std::optional<volts_dc> riding(const demand& d, const coil_draft& c) {
  if (c.role.primary || !d.secondaries[c.role.which].floats_on) return std::nullopt;
  return volts_dc{peak_of_sine(c.to_core).plain()};  // of the winding it floats on, no load, highest mains
}

}  // namespace

std::vector<planned_pair> pairs_of(const demand& d, const draft& f, const insulation_book& book) {
  std::vector<planned_pair> all;
  for (std::size_t i = 1; i < f.coils.size(); ++i) {
    const coil_draft &a = f.coils[i - 1], &b = f.coils[i];
    const volts_rms working = between(a, b);
    const bool mains = a.role.primary != b.role.primary;
    all.push_back({a.role.name, b.role.name, working, peak_of_sine(working), std::nullopt, b.wrap_under,
                   mains ? book.test_reinforced(working) : book.test_basic(working)});
  }
  for (const coil_draft& c : f.coils) {
    all.push_back({c.role.name, "core", c.to_core, peak_of_sine(c.to_core), riding(d, c), f.room.wall + wraps::over_former,
                   book.test_basic(c.to_core)});
  }
  return all;
}

std::vector<planned_leakage> leakages_of(const draft& f) {
  const stray_space space = stray_space_of(f);
  std::vector<std::size_t> order;  // primaries first, else winding order
  for (const bool primary : {true, false}) {
    for (std::size_t i = 0; i < f.coils.size(); ++i) {
      if (f.coils[i].role.primary == primary) order.push_back(i);
    }
  }
  const auto stray = [&](std::size_t i) {
    return stray_coil{{span_of(f, f.coils[i], turns{0}, total_turns(f.coils[i].laid))}, f.shape.width - 2.0 * f.coils[i].margin};
  };
  std::vector<planned_leakage> all;
  for (std::size_t a = 0; a < order.size(); ++a) {
    for (std::size_t b = a + 1; b < order.size(); ++b) {
      const coil_draft& first = f.coils[order[a]];
      all.push_back({first.role.name, f.coils[order[b]].role.name,
                     pair_leakage(stray(order[a]), stray(order[b]), space, total_turns(first.laid)),
                     "stray-field energy in one dimension, Rogowski factor"});
    }
  }
  return all;
}

}  // namespace turnwright
