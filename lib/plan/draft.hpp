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

struct coil_draft {
  coil_role role;
  std::vector<wire_pick> wires;
  laid_winding laid;
  metres wrap_under;            ///< all that lies between this winding and what is under it, screen included
  std::string wrap_why;
  std::optional<screen_kind> screen_under;
  metres margin, interlayer;
  std::string margin_why, interlayer_why;
  volts_rms to_core;            ///< highest working volts against the core, no load, highest mains
};

struct draft {
  core_body core;
  former room;
  tube shape;
  turn_set n;
  std::vector<coil_draft> coils;
  std::optional<screen_kind> screen_outside;
  metres used;       ///< of the winding height, bulge included
  double fill = 0;   ///< used over height
  bool too_wide = false;
};

/// Highest volts of a coil against the core [V r.m.s.]: no load, highest mains; a winding that floats on another has the
/// other's, a centre-tapped one that of its larger half.
volts_rms working_volts(const demand& d, const turn_set& n, const coil_role& role);

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
