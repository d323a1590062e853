/// What is wanted behind a rectifier: the chain of nodes, its loads, and the volts aimed at.
#pragma once

#include <turnwright/supply/network.hpp>
#include <turnwright/valve/rectifier.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// How hard the amplifier works. Cold: no valve draws anything, resistances stay.
enum class load_state { full, idle, cold };

/// The word for a state of load: "full", "idle", "cold".
std::string_view word_of(load_state s);
/// The word of the contract for a circuit: "full-wave centre-tap".
std::string_view word_of(supply::circuit c);

/// What hangs on a node in one state.
struct node_load {
  amperes_dc constant;
  std::optional<ohms> resistance;
};

struct node_wish {
  std::string name;
  std::variant<std::monostate, ohms, supply::choke> through;
  std::optional<supply::capacitor> shunt;
  std::optional<volts> rated;  ///< of the capacitor
  node_load full, idle;
};

struct rectifier_wish {
  rectifier_type type;  ///< nameless where the job writes a law of its own
  supply::diode each;
};

/// Volts that a node is to have at full load, nominal mains.
struct target_wish {
  std::string node;
  volts_dc at;
  double tolerance_ratio = 0.02;  ///< where half a turn's worth is less
};

struct rail_wish {
  supply::circuit kind = supply::circuit::full_wave_centre_tap;
  rectifier_wish rectifier;
  bool negative = false;
  std::optional<supply::capacitor> series;  ///< of a half-wave doubler
  std::vector<node_wish> nodes;
  std::optional<target_wish> target;
  bool centre_tap_left = false;  ///< a bridge on a winding that the job writes with a centre tap
};

/// The law of a rectifier of the tables, for one anode or element. Throws std::bad_optional_access where none is known.
supply::diode_law law_of(const rectifier_type& t);

/// Direct current that leaves the rectifier at a state of load, resistances at so many volts.
amperes_dc direct_current(const rail_wish& w, load_state s, volts_dc at);

/// A first guess at the r.m.s. current in a winding, or in each half, for so much direct current: common practice, to
/// be replaced by the solved one.
amperes_rms first_guess_rms(supply::circuit c, amperes_dc load);

}  // namespace turnwright
