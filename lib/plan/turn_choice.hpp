/// Whole turns for all windings at once, so that the volts on load land best.
#pragma once

#include <turnwright/plan/draft.hpp>

#include <string>
#include <vector>

namespace turnwright {

/// Volts on load over volts without load, per half of each secondary; 1 where the job means volts without load.
struct load_ratio {
  double first = 1.0, second = 1.0;
};

/// Flux limits of a design.
struct flux_limits {
  teslas nominal;  ///< at nominal supply, no load
  teslas high;     ///< highest mains, lowest frequency, worst tap
};

/// Whether a secondary feeds heaters: up to 13 V on load as a whole, no tap of another.
bool is_heater(const secondary_wish& w);

/// How far volts may lie over and under what is wanted, as ratios.
struct volts_tolerance {
  double over, under;
};
/// Tolerance of a secondary's volts: the job's either way, else 3 % for heaters, 2 % for the rest, and for a tap (a
/// bias must not fall short) 5 % over and half a per cent under. Practice and judgement.
volts_tolerance tolerance_of(const secondary_wish& w);
/// "3 %" or "+5 % -0.5 %".
std::string written(const volts_tolerance& t);

/// How far volts lie from what was wanted, as a share of the tolerance; 1 is just at its edge.
double volts_off(const secondary_wish& w, double found_over_wanted);
/// The same as the choice of turns weighs it: a heater is aimed at or below its volts, so an excess counts double
/// (common practice: a heater wears faster hot than cool).
double volts_error(const secondary_wish& w, double found_over_wanted);

/// Peak flux density at a position's nominal volts times a ratio.
teslas flux_at(const demand& d, const core_body& core, const tap_turns& taps, const selector_position& at,
               double mains_ratio);
/// Highest of any position at the highest mains.
teslas worst_flux(const demand& d, const core_body& core, const tap_turns& taps);

/// The least worst volts error over all whole numbers of primary turns from the fewest that the flux allows to 6 %
/// more, to 25 % more where the best of those lies beyond a tolerance (half of it for a heater that would run hot).
/// Turns that the job fixes are kept.
turn_set choose_turns(const demand& d, const core_body& core, const flux_limits& limits,
                      const std::vector<load_ratio>& ratios);
/// The secondaries alone, for a primary that stands.
turn_set choose_secondaries(const demand& d, const tap_turns& primary, const std::vector<load_ratio>& ratios);

}  // namespace turnwright
