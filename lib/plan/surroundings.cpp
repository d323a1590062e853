#include <algorithm>
#include <numbers>

#include <turnwright/plan/plan.hpp>

namespace turnwright {
namespace {

std::optional<volts_dc> dc_in(const potential& p) {
  return plain(p.dc.plain()) > 0 ? std::optional(p.dc) : std::nullopt;
}

// The test follows the peak: a winding at direct volts is tested like one whose sine has that peak.
planned_pair pair_of(std::string a, std::string b, const potential& volts_between, std::optional<metres> wrap,
                     bool mains_to_secondary, const insulation_book& book) {
  const volts_rms by_peak{peak_of(volts_between).plain() / std::numbers::sqrt2};
  return {std::move(a),
          std::move(b),
          rms_of(volts_between),
          peak_of(volts_between),
          dc_in(volts_between),
          wrap,
          mains_to_secondary ? book.test_reinforced(by_peak) : book.test_basic(by_peak)};
}

}  // namespace

std::vector<planned_pair> pairs_of(const draft& f, const insulation_book& book) {
  std::vector<planned_pair> all;
  for (std::size_t i = 1; i < f.coils.size(); ++i) {
    const coil_draft &a = f.coils[i - 1], &b = f.coils[i];
    // Two primaries hang on one supply: no more than its volts can stand between them.
    const bool both_primary = a.role.primary && b.role.primary;
    const potential apart = both_primary ? a.to_core : between(a.to_core, b.to_core);
    const metres wrap = b.screen_under ? b.wrap_under + b.wrap_under_screen : b.wrap_under;
    all.push_back(pair_of(a.role.name, b.role.name, apart, wrap, a.role.primary != b.role.primary, book));
    if (b.screen_under) {
      all.push_back(pair_of(a.role.name, "screen", a.to_core, b.wrap_under_screen, false, book));
      all.push_back(pair_of(b.role.name, "screen", b.to_core, b.wrap_under, false, book));
    }
  }
  for (const coil_draft& c : f.coils) {
    const bool innermost = &c == &f.coils.front();
    all.push_back(pair_of(c.role.name, "core", c.to_core,
                          innermost ? std::optional(f.room.wall + c.wrap_under) : std::nullopt, false, book));
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
    return stray_coil{{span_of(f, f.coils[i], turns{0}, total_turns(f.coils[i].laid))},
                      std::max(f.shape.width - 2.0 * f.coils[i].margin, as<metres>(1e-3))};
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
