/// Heat balance of a shell transformer: one node for each winding, one for the core, one for the coil's outer face.
#pragma once

#include <turnwright/measure/quantity.hpp>

#include <memory>
#include <vector>

namespace turnwright::thermal {

/// A winding as heat sees it: a slab round the limb.
struct heated_winding {
  metres inner, outer;            ///< from the tongue's face, with bulge
  metres height;                  ///< along the limb
  metres end_space;               ///< from its end to the yoke: cheek, or margin
  watts_per_metre_kelvin radial;  ///< conductivity across the layers
  watts_per_metre_kelvin axial;   ///< along the limb
};

/// Everything between heat and air. The first winding begins at former_air + former_wall and what is wrapped over them.
struct heated_coil {
  metres tongue, stack;
  metres window_width, window_length;
  metres former_air;  ///< slack between tongue and former
  metres former_wall;
  metres outer_wrap;
  square_metres core_surface;
  metres core_height;
  std::vector<heated_winding> windings;  ///< from the core outwards
  temperature ambient;
};

/// Rises over ambient.
struct heat_state {
  kelvins core;
  std::vector<kelvins> windings;  ///< average of each, as a rise by resistance would show it
  watts to_air;                   ///< heat that leaves; equals the losses where the balance closed
  int steps = 0;
  double residual = 0;  ///< (losses - heat to air) / losses
};

/// The balance of one coil, made ready for many losses. Copper evens the turn out, so each winding is one node.
///
/// Natural convection 1.42 (dT/H)^0.25 W/m2K and radiation at an emissivity of 0.85 from core and coil, conduction
/// through former, wraps and windings (uniformly heated slabs: mean and faces exactly), along the limb to yokes and end
/// faces. All faces in free air; the chassis takes nothing. Holds within 8 % of a rise against a finite-element
/// solution (tests/thermal/balance.cpp). Source: heat-transfer texts for the convection constant (memory); slab
/// formulas (exact).
class heat_balance {
 public:
  explicit heat_balance(const heated_coil& coil);
  /// Rises for a core loss and the loss of each winding. Throws std::logic_error where their count differs from the
  /// coil's.
  heat_state solve(watts core_loss, const std::vector<watts>& winding_losses) const;

 private:
  struct network;
  std::shared_ptr<const network> network_;
};

/// Rise of a laminated transformer in still air by its surface alone [K]: 450 (P / A)^0.826, watts and square
/// centimetres. Cross-check only. Source: Colonel Wm. T. McLyman, Transformer and Inductor Design Handbook, ch. 6
/// (memory).
kelvins surface_rule(watts loss, square_metres surface);

}  // namespace turnwright::thermal
