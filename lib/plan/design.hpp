/// A finished plan: everything a report, a sheet or a test of it needs, in quantities.
#pragma once

#include <turnwright/plan/attempt.hpp>
#include <turnwright/remark/remark.hpp>

#include <optional>
#include <string>
#include <vector>

namespace turnwright {

struct planned_tap {
  std::string at;  ///< "220 V", "centre tap"
  turns n;         ///< from the start of the winding it is a tap of
  int layer = 0;
  std::string side;  ///< "start" or "far": the end of the coil it comes out at
  bool mid_layer = false;
};

struct planned_half {
  turns n;
  volts_rms no_load, on_load;
  amperes_rms current;
  ohms resistance_20, resistance_hot;
};

struct planned_section {
  turns from, to;
  wire_pick wire;
  metres length;   ///< one strand
  kilograms mass;  ///< all strands
};

struct planned_winding {
  std::string name;
  std::optional<screen_kind> screen;  ///< a screen: only name, build and wrap apply
  std::optional<std::string> tap_of;
  bool primary = false;
  turns n;
  std::vector<planned_tap> taps;
  std::vector<planned_half> halves;
  std::vector<planned_section> sections;  ///< where the wire changes; else one
  int layers = 0;
  turns per_layer, last_layer;
  std::string finish_side;                                          ///< where the last turn comes out
  metres margin, interlayer, build, wrap_under, mean_turn, length;  ///< of a screen: foil and what it lies on
  std::string margin_why, interlayer_why, wrap_why;
  kilograms mass;
  ohms resistance_20, resistance_hot;
  volts_rms no_load, on_load;
  volts_rms on_load_resistive;  ///< into a resistor that draws the same r.m.s. current; the primary's as on load
  amperes_rms current;
  amperes_dc current_dc;
  amperes_per_square_metre density;
  watts loss;
  volt_amperes apparent;
  std::optional<double> regulation_ratio;  ///< secondaries
  std::optional<double> error_ratio;       ///< volts found over wanted, less one
  std::optional<volts_tolerance> tolerance;
  kelvins rise;          ///< high mains
  temperature hot_spot;  ///< high mains
  volts one_turn;
};

struct planned_pair {
  std::string a, b;
  volts_rms working;  ///< of alternating and direct part together
  volts_peak peak;
  std::optional<volts_dc> dc;
  std::optional<metres> wrap;  ///< insulation between, foil not counted; absent where air or the cheek is the path
  volts_rms test;
};

struct planned_setting {
  volts at;
  std::string links;
  turns n;
  amperes_rms current;
  amperes_per_square_metre density;
  teslas flux_density;
  std::vector<std::pair<std::string, volts_rms>> on_load;
};

struct planned_heat {
  volts position;  ///< of the mains selector
  temperature ambient;
  kelvins winding_rise, core_rise;
  temperature hot_spot;
};

struct planned_leakage {
  std::string a, b;
  henries inductance;  ///< referred to a
  std::string method;
};

/// Something to measure on the finished piece.
struct planned_test {
  std::string code, text;
  double expected_si = 0;
  kind of = kind::resistance;
  double tolerance_ratio = 0;
};

struct material {
  std::string what;
  std::optional<metres> length;   ///< wire, all strands one after the other, with waste
  std::optional<kilograms> mass;  ///< with waste
  std::optional<int> count;
};

struct design {
  design(const demand& d, attempt a) : wanted(d), made(std::move(a)), assumed(d.assumed) {}

  bool windable = false;
  demand wanted;
  attempt made;
  double turns_per_volt = 0;
  std::vector<planned_winding> windings;  ///< in winding order, screens among them
  std::vector<planned_pair> pairs;
  std::vector<planned_setting> settings;
  supply_study supply;  ///< rails, and volts at every state of load and mains
  no_load_state idle;   ///< secondaries open, nominal mains
  teslas flux_nominal, flux_on_load, flux_high;
  planned_heat heat_high, heat_nominal;
  kelvins surface_rule;  ///< cross-check of the rise at high mains
  std::vector<planned_leakage> leakage;
  std::vector<planned_test> tests;
  std::vector<material> materials;
  kilograms mass;
  std::optional<double> cost;  ///< in the currency of the job's prices
  std::vector<check> checks;
  std::vector<assumption> assumed;
  std::vector<std::string> cautions;
  std::vector<working> workings;
};

}  // namespace turnwright
