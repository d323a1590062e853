/// Reports in plain text for a person at the bench.
#pragma once

#include <turnwright/plan/design.hpp>
#include <turnwright/plan/shop.hpp>

#include <optional>
#include <string>

namespace turnwright {

/// The plan: core, fit, winding table, taps, volts at every position, losses and heat, checks, assumptions, cautions.
/// `workings`: the rejected choices and residuals as well.
std::string report_of(const design& p, bool workings);

/// A supply: a table for each rail, its rectifier against its ratings, windings, every state, checks.
std::string report_of(const supply_study& s, const std::vector<check>& checks, const std::vector<assumption>& assumed,
                      const std::vector<std::string>& cautions, bool workings);
/// The part of it on rails and rectifiers, and that on volts at every state of load and mains.
std::string rails_text(const supply_study& s);
std::string states_text(const supply_study& s);
/// One mains cycle of every rail as a drawing, in SVG. Needs the curves of the study's full state.
std::string waveform_svg(const supply_study& s);

/// A wire with what it carries and its nearest sizes in the other systems.
std::string report_of(const looked_up_gauge& g, const shop& s);
/// A lamination with its stacks.
std::string report_of(const lamination& l);
/// A steel with its curves; with `flux_density` the figures at that point alone.
std::string report_of(const steel& s, const std::optional<teslas>& flux_density, hertz frequency);

/// A rectifier or an amplifying valve with all that is known of it; `each_standing` adds the standing of each figure.
std::string report_of(const rectifier_type& t, bool each_standing);
std::string report_of(const amplifying_valve& v, const valve_book& book, bool each_standing);

/// The whole tables, a line each.
std::string list_of_wires(const shop& s);
std::string list_of_cores(const shop& s);
std::string list_of_steels(const shop& s);
std::string list_of_valves(const shop& s);

}  // namespace turnwright
