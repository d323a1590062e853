/// An amplifier's supply as a whole: a transformer, planned or known, with the rails behind it at every state of load.
#pragma once

#include <turnwright/plan/rail_wish.hpp>
#include <turnwright/remark/remark.hpp>
#include <turnwright/supply/solver.hpp>

#include <functional>
#include <optional>
#include <string>
#include <vector>

namespace turnwright {

/// A winding, or a tap with a load of its own, and the ports it has in the network.
struct supplied_winding {
  std::string name;
  std::size_t first = 0;
  std::optional<std::size_t> second;
  std::optional<std::string> tap_of;
  std::optional<rail_wish> rail;
  bool heater = false;
  std::optional<amperes_rms> rated;  ///< r.m.s. current that the job gives a winding with a rail
};

struct amplifier_supply {
  std::string title;
  supply::network base;  ///< at nominal mains, without rails
  std::vector<supplied_winding> windings;
  double over_ratio = 0.1, under_ratio = 0.1;  ///< how far the mains may lie above and below nominal
};

/// The network at a state of load and at so much of the nominal mains, its resistances and shunt as they are at
/// nominal.
supply::network network_at(const amplifier_supply& a, load_state load, double mains_ratio);

struct planned_node {
  node_wish wish;
  supply::node_state full;  ///< nominal mains
  volts_dc idle;            ///< nominal mains
  volts_peak switch_on;     ///< highest instantaneous, valves cold, highest mains
};

/// A rail with its rectifier. Volts as if it were positive.
struct planned_rail {
  std::string winding;
  rail_wish wish;
  double ripple_per_cycle = 2;
  std::vector<planned_node> nodes;
  supply::diode_state worst;  ///< the worse of its diodes in every figure, full load, nominal mains
  volts_peak inverse_worst;   ///< highest mains, no load
  amperes_peak surge;         ///< charging current when switched on at the crest of the highest mains
  ohms anode_resistance;      ///< winding, reflected primary and series, for each anode
  volts_rms each_anode;       ///< without load, nominal mains
  amperes choke_lowest_idle;  ///< least current of an input choke at idle
  /// Where the job aims at a node's volts: how far off, and what one turn more (of each half) would add.
  std::optional<volts> off_target, one_turn;
};

/// Direct current that the rectifier gives, all its diodes together.
amperes_dc whole_current(const planned_rail& r);
/// How a turn more is spoken of: "one turn more", or "one turn more of each half".
std::string one_turn_words(const planned_rail& r);

/// Volts of everything at one state of load and mains.
struct supplied_state {
  load_state load;
  std::string mains;  ///< "low", "nominal", "high"
  std::vector<std::pair<std::string, volts_rms>> windings;
  std::vector<std::vector<volts_dc>> rails;  ///< of each rail's nodes, as if positive
  bool settled = true;
  double residual_ratio = 0;
};

struct supply_study {
  amplifier_supply of;
  supply::state full;  ///< nominal mains, with the curves of a cycle
  std::vector<planned_rail> rails;
  std::vector<supplied_state> states;
};

/// Solves every state of a supply. `one_turn_ratio` gives for each winding the part that one turn (of each half) is of
/// it, where it is made of turns.
supply_study study(const amplifier_supply& a, const std::function<double(std::size_t)>& one_turn_ratio = {});

/// Checks of rails and rectifiers, each with its cure. Source of the rules: data sheets by the tables, trade practice.
std::vector<check> rail_checks(const supply_study& s);

/// Checks with the gravest first.
std::vector<check> in_order(std::vector<check> all);

/// Cautions for work on a supply. Source: trade practice; own words.
std::vector<std::string> supply_cautions();

/// Whether a current has a direct part that stands above the solver's own noise: over 0.2 % of its r.m.s. value.
bool carries_dc(amperes_dc mean, amperes_rms whole);

/// True r.m.s. volts of a winding, both halves together.
volts_rms volts_of(const supplied_winding& w, const supply::state& s);

}  // namespace turnwright
