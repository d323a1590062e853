/// A transformer with all that hangs on it, as one circuit.
///
///   wall - source resistance - primary resistance - primary leakage - node p;  across p: magnetising branch, core
///   loss; on p every port in its exact ratio, behind the leakage matrix and its own resistance, with its load or its
///   rail
///
/// Every load shares the primary's drop: that is computed, not estimated.
#pragma once

#include <turnwright/measure/stated.hpp>

#include <cstddef>
#include <optional>
#include <variant>
#include <vector>

namespace turnwright::supply {

/// One coil with a load of its own: a winding, a half of a centre-tapped one, or a tapped part of a half.
struct port {
  double ratio;              ///< its turns over those of the primary
  ohms resistance;           ///< of the whole port at working temperature
  std::optional<ohms> load;  ///< a resistor across it; a port with neither load nor rail is open
  std::optional<std::size_t>
      inside;  ///< the port that contains this one: its current flows through this resistance too
};

/// Straight line: volts = drop + resistance x amperes, blocking below the drop.
struct drop_law {
  volts drop;
  ohms resistance;
};
/// Space charge: amperes = k x volts^1.5, for each anode.
struct valve_law {
  perveance k;
};
/// Junction at 300.15 K: amperes = saturation x (exp(volts / (ideality x kT/q)) - 1), with a resistance in series.
struct exponential_law {
  amperes saturation;
  double ideality;
  ohms resistance;
};
using diode_law = std::variant<drop_law, valve_law, exponential_law>;

/// One anode, or one of a bridge's four diodes, with the resistor in series with it.
struct diode {
  diode_law law;
  ohms series;
};

enum class circuit { full_wave_centre_tap, bridge, half_wave, full_wave_doubler, half_wave_doubler };

struct capacitor {
  farads value;
  ohms esr;
};

struct choke {
  henries value;
  ohms resistance;
};

/// One node of a rail: what leads to it, and what hangs on it. The first node may have nothing leading to it.
struct rail_node {
  std::variant<std::monostate, ohms, choke> through;
  std::optional<capacitor> shunt;       ///< in a full-wave doubler's first node each of the two
  amperes_dc load;                      ///< drawn whatever the volts
  std::optional<ohms> load_resistance;  ///< across the node
};

/// A rectifier with its chain of nodes. Volts of a rail are reckoned as if it were positive.
struct rail {
  circuit kind;
  std::size_t first;                  ///< the port that feeds it
  std::optional<std::size_t> second;  ///< the other half of a centre-tapped winding
  diode anode;
  bool negative;
  std::optional<capacitor> series;  ///< of a half-wave doubler
  std::vector<rail_node> nodes;     ///< from the rectifier on
};

struct network {
  volts_rms mains;
  hertz frequency;
  ohms source_resistance;
  ohms primary_resistance;
  henries primary_leakage;                        ///< between the primary's resistance and node p
  std::optional<ohms> core_loss_resistance;       ///< across p, referred to the primary
  std::optional<henries> magnetising_inductance;  ///< across p; without it the transformer is ideal down to dc
  std::vector<port> ports;
  std::vector<henries>
      leakage;  ///< ports x ports, row by row, of each port against the primary, referred to the primary
  std::vector<rail> rails;
};

}  // namespace turnwright::supply
