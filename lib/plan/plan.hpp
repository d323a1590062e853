/// The main job: from what is wanted to a transformer that can be wound.
#pragma once

#include <turnwright/plan/design.hpp>
#include <turnwright/plan/shop.hpp>

#include <string>

namespace turnwright {

/// Plans a transformer. Where the job names no core, stack or steel they are chosen by its aim. Where a limit cannot be
/// met, the best attempt comes back with `windable` false and the checks say what stands in the way.
/// Throws `refused` for a lamination, steel or wire that the tables do not have.
design plan(const demand& d, const shop& s);

/// The cores that a demand leaves open, lightest first.
std::vector<core_body> candidate_cores(const demand& d, const shop& s);

/// Cost of iron and copper at the demand's prices.
double cost_of(const demand& d, const draft& f);

/// Figures of an attempt, all that the reports show; without checks and cures.
design figures_of(const demand& d, const shop& s, attempt a);

/// Insulation between neighbours, to screens and to the core, with test volts.
/// Source: trade practice for what stands between what; test volts recalled.
std::vector<planned_pair> pairs_of(const draft& f, const insulation_book& book);
/// Leakage of every pair of windings, a primary first.
std::vector<planned_leakage> leakages_of(const draft& f);
/// What to buy, with waste.
std::vector<material> materials_of(const design& p);
/// What to measure on the finished piece.
std::vector<planned_test> tests_of(const design& p);

/// The checks of a plan, each with what was found, its bound and a cure. `cure` is the smallest change that was tried
/// and clears what stands in the way; empty where nothing does.
std::vector<check> checks_of(const design& d, const std::string& cure);

/// Name of the steel used where the job is silent.
inline constexpr std::string_view usual_steel = "M400-50A";

/// Cautions for winding and testing. Source: trade practice; own words.
std::vector<std::string> winding_cautions();

}  // namespace turnwright
