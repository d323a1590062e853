/// What is wanted of a transformer: the job as plain facts, every default filled in and listed.
#pragma once

#include <turnwright/iron/body.hpp>
#include <turnwright/iron/former.hpp>
#include <turnwright/measure/stated.hpp>
#include <turnwright/measure/turns.hpp>
#include <turnwright/plan/rail_wish.hpp>
#include <turnwright/wire/gauge.hpp>

#include <optional>
#include <string>
#include <vector>

namespace turnwright {

/// A figure the job left out, with the one used and the reason.
struct assumption {
  std::string path;  ///< JSON pointer in the job
  std::string value;
  std::string why;
};

/// What a winder fixes of one winding.
struct winding_wishes {
  std::optional<turns> n;
  std::optional<std::string> wire;
  std::optional<int> strands;
  std::optional<double> tolerance_ratio;
  std::optional<ohms> resistance_most, resistance_least;
};

struct mains_wish {
  hertz frequency;          ///< the lowest of the band: it rules the flux
  double over_ratio = 0.1;  ///< how far the wall may lie above nominal
  double under_ratio = 0.1;
  ohms source_resistance;
};

struct primary_wish {
  bool two_windings = false;
  std::vector<volts> taps;  ///< from the common start, ascending; of each of two equal windings
  volts on;                 ///< the nominal mains
  winding_wishes fixed;
};

struct secondary_wish {
  std::string name;
  volts voltage;  ///< with a target a first guess; of the whole winding, or of the first half of a centre-tapped one
  std::optional<volts> second_half;  ///< present where the winding is written as halves, each with a load of its own
  bool centre_tap = false;           ///< a tap in the middle of a winding loaded as a whole
  bool no_load = false;              ///< the volts are meant without load
  amperes_rms current;               ///< of a winding with a rail a first guess: the solved one replaces it
  std::optional<rail_wish> rail;
  std::optional<amperes_rms> rated;  ///< r.m.s. current that the job gives a winding with a rail
  bool kind_left_open = false;       ///< the job says neither rms nor dc
  std::optional<std::string> floats_on;
  std::optional<std::string> tap_of;  ///< a tap of another winding's first half, with a load of its own
  winding_wishes fixed;
};

enum class screen_kind { noise, safety };
struct screen_wish {
  std::string after;
  screen_kind kind = screen_kind::noise;
};

struct core_wish {
  std::optional<std::string> lamination, grade;
  std::optional<metres> stack;
  std::optional<double> stacking_factor;
  stacking style = stacking::interleaved;
};

struct insulation_wish {
  std::optional<metres> interlayer, wrap, margin;
  char thermal_class = 'A';
};

struct wire_wish {
  wire_system system = wire_system::metric;
  std::string grade = "1";
};

struct limits_wish {
  temperature ambient;
  kelvins temperature_rise;
  std::optional<teslas> flux_density, flux_density_high;  ///< the steel's own where absent
  std::optional<amperes_per_square_metre> current_density;
  std::optional<double> regulation_ratio;
  std::optional<metres> height;
  std::optional<kilograms> mass;
};

enum class aim { cost, mass, loss, volume, height, regulation };

struct prices_wish {
  per_kilogram copper, steel;
};

/// What the listed valves take at a heater voltage, and what the windings for it are to give.
struct heater_need {
  volts at;
  amperes taken, given;
};

struct demand {
  std::string title;
  mains_wish mains;
  primary_wish primary;
  std::vector<secondary_wish> secondaries;
  std::vector<heater_need> heaters;  ///< where the job lists valves
  std::vector<screen_wish> screens;
  std::vector<std::string> order;  ///< names from the core outwards, every winding in it
  core_wish core;
  former_wishes former;
  bool by_hand = true;
  insulation_wish insulation;
  wire_wish wire;
  limits_wish limits;
  aim goal = aim::cost;
  prices_wish prices;
  bool prices_given = false;          ///< at least one of them
  std::vector<std::string> accepted;  ///< codes of stops that the user goes on past
  std::vector<assumption> assumed;
};

/// Name of a winding that stands for the primary in the order: "primary", or "primary A" and "primary B".
bool is_primary_name(std::string_view name);

}  // namespace turnwright
