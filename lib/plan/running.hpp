/// A drafted transformer at work: currents, losses and temperatures at their fixed point.
#pragma once

#include <turnwright/plan/draft.hpp>
#include <turnwright/plan/rails.hpp>
#include <turnwright/thermal/balance.hpp>

#include <vector>

namespace turnwright {

/// Where a loaded port of the network lies in the coil.
struct port_place {
  std::size_t secondary;
  int half;                           ///< 0, or 1 for the second half
  std::size_t coil;                   ///< index in draft.coils
  turns from, to;                     ///< of the coil
  std::optional<std::size_t> inside;  ///< the port it is a tap of
};

/// Every port, in the order of the secondaries.
std::vector<port_place> ports_of(const demand& d, const draft& f);

struct running {
  selector_position at;
  double mains_ratio = 1.0;  ///< mains over nominal of that position
  supply::state electric;
  primary_share share;
  thermal::heat_state heat;
  std::vector<temperature> copper;  ///< average of each coil
  std::vector<watts> coil_loss;
  watts copper_loss, core_loss;
  teslas flux_density;  ///< on load
  amperes_rms magnetising;
  bool loss_beyond_curve = false;
  henries magnetising_inductance;
  ohms core_loss_resistance;  ///< referred to the primary
  int steps = 0;
  double residual_K = 0;  ///< last change of any temperature
};

/// The transformer at a selector position with its nominal volts times `mains_ratio`, at the balance of heat, which is
/// sought from the temperatures `start` where they are given. `rough`: figures behind rectifiers within some 0.3 %.
running run(const demand& d, const draft& f, const selector_position& at, double mains_ratio,
            const std::vector<temperature>& start = {}, bool rough = false);
/// The same with the copper held at given temperatures: no balance of heat is sought.
running run_at(const demand& d, const draft& f, const selector_position& at, double mains_ratio,
               const std::vector<temperature>& copper);

/// The transformer of a running with everything that hangs on it, at the resistances and the shunt it settled at.
amplifier_supply supply_of(const demand& d, const draft& f, const running& r);

/// Leakage of every port against the primary in use, referred to its turns: matrix row by row.
std::vector<henries> leakage_matrix(const draft& f, const selector_position& at, const std::vector<port_place>& ports);

/// No-load current and power at a position, nominal mains.
struct no_load_state {
  amperes_rms current;  ///< magnetising and loss component in quadrature
  watts core_loss;
  watts power;  ///< core loss and the primary's copper at that current, cold
};
no_load_state no_load(const demand& d, const draft& f, const selector_position& at);

/// Resistance at 20 degC of each primary winding as far as it is in use.
struct primary_resistances {
  ohms a, b;
};
primary_resistances primary_ohms_20(const draft& f, const selector_position& at);

}  // namespace turnwright
