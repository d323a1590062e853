/// What a network does in its periodic state.
#pragma once

#include <turnwright/measure/stated.hpp>

#include <vector>

namespace turnwright::supply {

struct port_state {
  volts_rms no_load;    ///< ratio times mains
  volts_rms on_load;    ///< true r.m.s. at the terminals
  amperes_rms current;  ///< in the port's own load; with `inside` the shared part carries more
  amperes_dc current_dc;
  watts load;  ///< real power that leaves the terminals
};

/// A node of a rail; volts as if the rail were positive.
struct node_state {
  volts_dc mean;
  volts_rms ripple;
  volts ripple_peak_to_peak;
  volts highest, lowest;
  amperes_dc load;               ///< all that hangs on the node
  amperes_rms capacitor_ripple;  ///< nothing where there is no capacitor
  watts capacitor_loss;          ///< in its series resistance
  amperes_dc through;            ///< mean in what leads to the node
  amperes_rms through_rms;
  amperes through_lowest;  ///< least instantaneous current in what leads to the node
  watts through_loss;      ///< in the resistor or the choke's resistance
  watts load_power;
};

/// One anode, or one diode of a bridge.
struct diode_state {
  amperes_peak peak;
  amperes_dc average;
  amperes_rms rms;
  volts_peak inverse;
  volts mean_drop;        ///< mean over the time of conduction, the series resistor not counted
  double conduction_deg;  ///< over which the current is more than a hundredth of its peak [degrees of a mains cycle]
  watts loss;             ///< in the diode itself
  watts series_loss;      ///< in the resistor in series with it
};

struct rail_state {
  std::vector<node_state> nodes;
  std::vector<diode_state> diodes;  ///< two, or one of a half-wave rail
  double ripple_per_cycle;          ///< periods of the ripple in a mains cycle: 1 or 2
};

/// A curve over one mains cycle, at equal steps that begin after the rising zero crossing of the mains.
struct rail_curves {
  std::vector<double> winding_v;             ///< volts of the first port's terminals [V]
  std::vector<double> reservoir_v;           ///< volts of the first node, as if positive [V]
  std::vector<std::vector<double>> diode_a;  ///< current in each diode [A]
};
struct curves {
  std::vector<double> mains_v;    ///< at the wall [V]
  std::vector<double> primary_a;  ///< line current [A]
  std::vector<rail_curves> rails;
};

struct state {
  std::vector<port_state> ports;
  amperes_rms primary_current;
  amperes_dc primary_dc;
  volts_rms terminal;     ///< at the primary's terminals, behind the source resistance
  volts_rms emf;          ///< across p: of the sine that takes the core to the same peak flux
  watts input;            ///< into the primary's terminals
  watts wall;             ///< from the wall, the loss in the source resistance included
  volt_amperes apparent;  ///< at the primary's terminals
  watts primary_copper;
  std::vector<watts>
      copper;  ///< per port; what a shared part loses is divided by the currents' shares, the sum is right
  std::vector<amperes_rms> shared_current;  ///< per port: at the far end of a tap's part, with all that flows there
  watts core;
  watts output;  ///< sum of all ports' loads
  std::vector<rail_state> rails;
  double residual_ratio = 0;  ///< change over the last cycle by the largest of any state against its scale
  double balance_ratio = 0;   ///< (power in - losses - loads) / power in
  bool settled = true;        ///< whether the periodic state was found
  int cycles = 0;             ///< mains cycles that were stepped through, on any grid
  curves shape;               ///< filled where asked for
};

}  // namespace turnwright::supply
