/// One core wound as well as it can be: turns, wires and temperatures at their fixed point, and what stands in the way.
#pragma once

#include <turnwright/measure/kind.hpp>
#include <turnwright/plan/running.hpp>
#include <turnwright/plan/turn_choice.hpp>
#include <turnwright/plan/wire_choice.hpp>

#include <string>
#include <vector>

namespace turnwright {

/// A limit, what was found, and whether it holds.
struct limit_test {
  std::string code;             ///< of the check it belongs to
  std::string what;             ///< "rise of the hottest winding"
  double found = 0, bound = 0;  ///< in the SI unit of `of`
  kind of = kind::ratio;
  bool holds = true;
  /// How far over the bound, as a ratio; 0 where it holds.
  double excess() const;
};

struct attempt {
  draft coil;
  running nominal;
  running high;  ///< highest mains, at the selector position where a winding gets hottest
  flux_limits flux;
  amperes_per_square_metre density;  ///< the common one that the wires were picked for
  std::vector<limit_test> limits;
  double volts_score = 0;  ///< worst volts error over its tolerance
  int rounds = 0;          ///< of turns and wires until they stood still
  bool stood_still = false;
  /// Whether every limit holds and every winding's volts are within its tolerance.
  bool windable() const;
  /// Windable, with room for leads and the last wrap: build no more than 92 % of the height (common practice).
  bool comfortable() const;
  /// Sum of all excesses.
  double excess() const;
};

/// Highest current density in any wire at any selector position [A/m2].
amperes_per_square_metre worst_density(const demand& d, const draft& f, const running& nominal);
/// Regulation of the worst secondary: (no load - on load) / on load.
double worst_regulation(const running& r);
/// Iron and copper, and a twentieth for former, paper, varnish and leads (judgement) [kg].
kilograms total_mass(const draft& f);
/// Average rise of the hottest winding.
kelvins hottest_winding(const running& r);
/// Part of the winding height up to which a coil is comfortable to finish (common practice).
inline constexpr double comfortable_fill = 0.92;
/// The highest density any winding is given where the job names no limit [A/m2] (judgement).
inline constexpr amperes_per_square_metre usual_highest_density = as<amperes_per_square_metre>(4.5e6);

/// A line of the search, for --workings.
struct working {
  std::string what;
};

/// Winds a core as well as it can be. `stepped`: a wire for each tap section.
/// Throws `refused` for a wire the tables do not have.
attempt wind(const demand& d, const shop& s, const core_body& core, bool stepped, std::vector<working>& workings);

}  // namespace turnwright
