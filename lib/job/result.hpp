/// Results as JSON, with the keys of the contract.
#pragma once

#include <turnwright/plan/design.hpp>
#include <turnwright/plan/shop.hpp>

#include <string>

namespace turnwright {

/// A plan as "turnwright-plan/1".
std::string json_of(const design& p);

/// A supply as "turnwright-supply/1".
std::string json_of(const supply_study& s, const std::vector<check>& checks, const std::vector<assumption>& assumed,
                    const std::vector<std::string>& cautions);

/// A wire as "turnwright-wire/1", with the nearest sizes of the other systems.
std::string json_of(const looked_up_gauge& g, const shop& s);
/// A lamination as "turnwright-core/1".
std::string json_of(const lamination& l);

/// A question to a steel: its figures at a flux density and frequency.
struct steel_point {
  teslas flux_density;
  hertz frequency;
};
/// A steel as "turnwright-steel/1", with `at` where a point is asked for.
std::string json_of(const steel& s, const std::optional<steel_point>& at);

/// A rectifier or an amplifying valve as "turnwright-valve/1"; `each_standing` adds that of each figure.
std::string json_of(const rectifier_type& t, bool each_standing);
std::string json_of(const amplifying_valve& v, const valve_book& book, bool each_standing);
/// All valves and silicon by name, as "turnwright-list/1".
std::string json_of_valves(const valve_book& book);

/// A list of table rows by name, as "turnwright-list/1".
std::string json_of_names(const std::string& what, const std::vector<std::string>& names);

}  // namespace turnwright
