/// The valves of an amplifier, counted: what their heaters take, and a first guess at what they draw from the HT.
#pragma once

#include <turnwright/valve/valve_book.hpp>

#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace turnwright {

/// So many of one type.
struct valve_count {
  int count = 1;
  std::variant<amplifying_valve, rectifier_type> valve;
};

/// The reported name of the type.
const std::string& name_of(const valve_count& v);

/// Reads "2 x EL34", "3xECC83" or "EL84". Nothing, with remarks added to the faults, where there is no count from 1 to
/// 100 or no such valve.
std::optional<valve_count> read_valve_count(std::string_view text, const std::string& where, const valve_book& book,
                                            std::vector<remark>& faults);

/// What the heaters of a list take.
struct heater_load {
  amperes current;                      ///< of all that can be heated at the volts asked for
  std::vector<std::string> others;      ///< those with a heater for other volts, as "2 x 2A3, 2.5 V 5 A"
  standing known_how = standing::read;  ///< weakest of the heater currents added up
};

/// Heater current of a list at a heater voltage [A]: each type by its own connection or the other one, whichever is for
/// these volts within 2 %. Silicon takes none. Source: heater figures of tables/valves.csv and tables/rectifiers.csv.
/// Checked: tests/valve/list.cpp.
heater_load heater_current(std::span<const valve_count> list, volts heater);

/// A first guess at the current that a list draws from the HT: an estimate, for want of a figure by the user.
struct ht_current_guess {
  amperes_dc full, idle;
  std::vector<std::string> reasons;  ///< a line for each type that counts
  std::vector<std::string> unknown;  ///< types for which no current is known
};

/// First guess at the HT current, anodes and screens, at full drive and idle [A dc]. Output valves in an even number
/// are taken as pairs in class AB where the table has such a pair with both currents, the best trusted and of these the
/// one that draws most; all others draw their typical class A current, each section of it. Rectifiers draw none.
/// Source: tables/output_stages.csv, tables/valves.csv. Checked: tests/valve/list.cpp.
ht_current_guess first_guess_ht_current(std::span<const valve_count> list, const valve_book& book);

}  // namespace turnwright
