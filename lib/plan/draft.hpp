/// A coil on paper: every winding laid in its place in the window, for given turns and wires.
#pragma once

#include <turnwright/plan/demand.hpp>
#include <turnwright/plan/selector.hpp>
#include <turnwright/plan/shop.hpp>
#include <turnwright/winding/coil.hpp>
#include <turnwright/winding/leakage.hpp>

#include <string>
#include <vector>

namespace turnwright {

/// Turns of a secondary: of the whole, or of each half; of the tapped part for a tap of another winding.
struct secondary_turns {
  turns first, second;
  friend auto operator<=>(const secondary_turns&, const secondary_turns&) = default;
};

/// All turns of a transformer.
struct turn_set {
  tap_turns primary;
  std::vector<secondary_turns> secondaries;
  friend bool operator==(const turn_set&, const turn_set&) = default;
};

/// Wire of a winding, or of one section of a tapped primary.
struct wire_pick {
  gauge wire;
  metres overall;
  int strands = 1;
  std::string grade;  ///< of the enamel; another than the job's where the table has no such film for this size
};

/// A winding that takes room of its own: a primary (which = 0 or 1) or the secondary of that number.
struct coil_role {
  std::string name;
  bool primary = false;
  std::size_t which = 0;
};

/// Every winding that takes room, in winding order. A tap of another winding takes none.
std::vector<coil_role> coils_of(const demand& d);

/// Wires of every coil of `coils_of`: one, or one for each tap section of a primary.
using wire_set = std::vector<std::vector<wire_pick>>;

/// Highest volts of a winding against the core: no load, highest mains. A winding that floats on another has direct
/// volts.
struct potential {
  volts_rms ac;
  volts_dc dc;
};
/// Root of the squares of both parts.
volts_rms rms_of(const potential& p);
/// Direct volts and the peak of the alternating ones.
volts_peak peak_of(const potential& p);
/// Between two windings: alternating parts at worst in opposite phase.
potential between(const potential& a, const potential& b);

struct coil_draft {
  coil_role role;
  std::vector<wire_pick> wires;
  laid_winding laid;
  metres wrap_under;  ///< insulation that the winding lies on
  std::string wrap_why;
  metres wrap_usual;  ///< what practice asks for there, where the job fixes the wrap
  std::optional<screen_kind> screen_under;
  metres wrap_under_screen;  ///< insulation that the screen lies on; nothing where there is none
  metres margin, interlayer;
  metres margin_usual;  ///< what gauge and volts ask for, where the job fixes the margin
  std::string margin_why, interlayer_why;
  potential to_core;
};

/// Thickness of a screen's foil.
metres foil_of(screen_kind k);
/// All that lies between a winding and what is under it: wraps and foil.
metres gap_under(const coil_draft& c);
/// Highest current density in the wire of a coil's first turns, as many as are in use [A/m2].
amperes_per_square_metre density_in(const coil_draft& c, amperes current, turns in_use);

struct draft {
  core_body core;
  former room;
  tube shape;
  turn_set n;
  std::vector<coil_draft> coils;
  std::optional<screen_kind> screen_outside;
  metres used;      ///< of the winding height, bulge included
  double fill = 0;  ///< used over height
  bool too_wide = false;
};

/// Highest volts of a coil against the core: no load, highest mains. A winding written as halves has those of its
/// larger half; one that floats on another rides on the direct volts of that one behind a rectifier, which are its
/// peak.
potential working_volts(const demand& d, const turn_set& n, const coil_role& role);

/// Lays out a coil. Wires have to match `coils_of(d)`.
draft lay_out(const demand& d, const shop& s, const core_body& core, const turn_set& n, const wire_set& wires);

/// The radial span of turns [from, to) of a coil, seen from the tongue's face, bulge included.
stray_piece span_of(const draft& f, const coil_draft& c, turns from, turns to);

/// Where the stray field runs.
stray_space stray_space_of(const draft& f);

/// Turns of a coil in all.
turns turns_of(const demand& d, const turn_set& n, const coil_role& role);

/// Outer size of the coil, across the windows and along the stack [m].
struct coil_size {
  metres across, deep;
};
coil_size outside_of(const draft& f);

}  // namespace turnwright
