/// A coil laid turn by turn, layer by layer: what it takes of the window and what it comes to in copper.
#pragma once

#include <turnwright/iron/former.hpp>
#include <turnwright/measure/turns.hpp>
#include <turnwright/wire/gauge.hpp>

#include <optional>
#include <vector>

namespace turnwright {

/// Turns of one wire, laid in layers one after the other.
struct block {
  turns n;
  gauge wire;
  metres overall;                  ///< over the enamel
  int strands = 1;                 ///< in hand, side by side
  double lay = 0.9;                ///< part of the width that turns really fill
  metres margin;                   ///< free at each end
  metres interlayer;               ///< paper between layers
  std::optional<turns> per_layer;  ///< counted, overrides the lay factor
};

/// One layer as it lies.
struct layer {
  turns n;
  metres middle;     ///< from the former's face, without bulge
  metres mean_turn;  ///< with bulge
};

/// A block as it lies.
struct laid_block {
  block of;
  turns per_layer;
  bool too_wide = false;  ///< not even one turn goes into the width
  std::vector<layer> layers;
};

/// A winding as it lies: its blocks, from the core outwards.
struct laid_winding {
  std::vector<laid_block> blocks;
  metres inside;  ///< from the former's face to the first layer, without bulge
  metres build;   ///< first layer to last, with the paper between, without bulge
};

/// Cross-section that the turns go round.
struct tube {
  metres across;  ///< outer size of the former, tongue direction
  metres deep;    ///< outer size of the former, stack direction
  metres width;   ///< for winding, along the limb
  double bulge;   ///< how much the build bows out: 1.05 to 1.15
};

/// Turns in a full layer: floor(width x lay / pitch), never over floor(width / pitch) - 1, since the helix takes one
/// diameter more. A counted figure overrides both. Nothing where not even one fits.
/// Source: common practice. Checked: tests/winding/coil.cpp.
turns turns_per_layer(const block& b, metres winding_width);

/// Mean turn at a height over the former's face [m]: 2 (across + deep) + 2 pi h, h with bulge. Source: geometry
/// (exact).
metres mean_turn_at(const tube& t, metres height);

/// Lays the blocks of a winding from a height outwards, each block beginning on a layer of its own, with the block's
/// interlayer paper between any two layers.
laid_winding lay(const std::vector<block>& blocks, metres inside, const tube& t);

/// How many turns a winding has.
turns total_turns(const laid_winding& w);
/// How many layers.
int layer_count(const laid_winding& w);
/// Wire length of one strand between two turn counts from the start [m].
metres wire_length(const laid_winding& w, turns from, turns to);
/// Resistance at 20 degC between two turn counts from the start [ohm], strands in parallel.
///   R = rho20 l / A. Source: IEC 60028 for rho20 (read). Checked: tests/winding/coil.cpp, worked example d01.
ohms resistance_20(const laid_winding& w, turns from, turns to);
/// Mass of the copper, all strands [kg].
kilograms copper_mass(const laid_winding& w);
/// Length of all turns over their count [m].
metres mean_turn(const laid_winding& w);

/// Where a turn lies: layer from 1, and the end of the layer that is nearer to it in winding order.
struct turn_place {
  int layer;
  bool at_start_side;  ///< the side where the winding starts
  bool layer_end;      ///< exactly at the end of a layer
};
turn_place place_of(const laid_winding& w, turns count);

/// Bulge of practice: 1.05 + 0.05 (stack / tongue - 1), and 0.05 more by hand; kept from 1.05 to 1.15. Judgement.
double usual_bulge(metres tongue, metres stack, bool by_hand);
/// Lay factor of practice by diameter over enamel: paper 0.90; bobbin 0.95 to 0.4 mm, 0.93 to 1.0 mm; 0.87 over 1 mm.
double usual_lay(former_kind kind, metres overall);

}  // namespace turnwright
