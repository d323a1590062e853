#include <turnwright/plan/plan.hpp>

namespace turnwright {
namespace {

constexpr double wire_waste = 1.05;  // a twentieth more than the turns take, for leads and starts (judgement)

}  // namespace

double cost_of(const demand& d, const draft& f) {
  double cost = plain(f.core.mass()) * plain(d.prices.steel);
  for (const coil_draft& c : f.coils) cost += plain(copper_mass(c.laid)) * wire_waste * plain(d.prices.copper);
  return cost;
}

std::vector<material> materials_of(const design& p) {
  std::vector<material> all;
  for (const planned_winding& w : p.windings) {
    if (w.screen || w.tap_of) continue;
    for (const planned_section& s : w.sections) {
      all.push_back({"wire " + s.wire.wire.size + " for " + w.name,
                     s.length * wire_waste * static_cast<double>(s.wire.strands), s.mass * wire_waste, std::nullopt});
    }
  }
  const core_body& core = p.made.coil.core;
  all.push_back(
      {core.choice().grade.name + " sheets " + core.choice().pattern.name, std::nullopt, core.mass(), core.sheets()});
  return all;
}

}  // namespace turnwright
