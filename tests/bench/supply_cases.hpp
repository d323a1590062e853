/// Four supplies of usual make, for the speed measurements: invented values.
#pragma once

#include <turnwright/supply/periodic.hpp>

namespace supply_cases {

using namespace turnwright;

inline supply::network on_mains(double mains_v, double hz, double source_ohm, double primary_ohm) {
  return {volts_rms{as<volts>(mains_v)},
          as<hertz>(hz),
          as<ohms>(source_ohm),
          as<ohms>(primary_ohm),
          as<henries>(0),
          {},
          {},
          {},
          {},
          {}};
}

inline void add_port(supply::network& net, double part, double ohm, double load_ohm = 0) {
  net.ports.push_back({part, as<ohms>(ohm), load_ohm > 0 ? std::optional(as<ohms>(load_ohm)) : std::nullopt, {}});
  net.leakage.assign(net.ports.size() * net.ports.size(), as<henries>(0));
}

inline supply::rail_node node(double farad, double esr, double amps) {
  supply::rail_node n;
  n.shunt = supply::capacitor{as<farads>(farad), as<ohms>(esr)};
  n.load = amperes_dc{as<amperes>(amps)};
  return n;
}
inline supply::rail_node behind_choke(double henry, double ohm, supply::rail_node n) {
  n.through = supply::choke{as<henries>(henry), as<ohms>(ohm)};
  return n;
}
inline supply::rail_node behind_resistor(double ohm, supply::rail_node n) {
  n.through = as<ohms>(ohm);
  return n;
}
inline supply::rail_node bled(double ohm, supply::rail_node n) {
  n.load_resistance = as<ohms>(ohm);
  return n;
}
inline supply::diode valve(double k) { return {supply::valve_law{as<perveance>(k)}, as<ohms>(0)}; }
inline supply::diode silicon(double v, double ohm) {
  return {supply::drop_law{as<volts>(v), as<ohms>(ohm)}, as<ohms>(0)};
}

/// A two-anode valve into a reservoir, a choke and a second capacitor.
inline supply::network single_ht() {
  supply::network net = on_mains(230, 50, 0, 9);
  add_port(net, 300 / 230.0, 75);
  add_port(net, 300 / 230.0, 80);
  net.rails = {{supply::circuit::full_wave_centre_tap,
                0,
                1,
                valve(1.1e-3),
                false,
                {},
                {node(16e-6, 0, 0.02), behind_choke(8, 180, node(32e-6, 0, 0.065))}}};
  return net;
}

/// HT with four nodes behind a valve, a bias winding, three heaters, leakage and a magnetising branch.
inline supply::network full_amplifier() {
  supply::network net = on_mains(235, 50, 0.5, 6.2);
  net.primary_leakage = as<henries>(0.03);
  net.magnetising_inductance = as<henries>(14);
  net.core_loss_resistance = as<ohms>(22e3);
  add_port(net, 360 / 230.0, 48);
  add_port(net, 360 / 230.0, 52);
  add_port(net, 52 / 230.0, 14);
  add_port(net, 5.2 / 230, 0.045, 2.631578947);
  add_port(net, 6.75 / 230, 0.035, 1.75);
  add_port(net, 6.8 / 230, 0.09, 5.25);
  net.rails = {{supply::circuit::full_wave_centre_tap,
                0,
                1,
                valve(1.9e-3),
                false,
                {},
                {node(32e-6, 1, 0.01), behind_choke(6, 95, node(50e-6, 1, 0.125)),
                 behind_resistor(4700, node(32e-6, 0, 0.006)), behind_resistor(15000, node(16e-6, 0, 0.003))}},
               {supply::circuit::half_wave,
                2,
                {},
                silicon(0.75, 0.3),
                true,
                {},
                {node(47e-6, 0, 0), behind_resistor(2200, bled(27000, node(47e-6, 0, 0)))}}};
  return net;
}

/// A full-wave doubler with silicon.
inline supply::network doubler() {
  supply::network net = on_mains(120, 60, 0.3, 2.2);
  add_port(net, 130 / 120.0, 6.5);
  net.rails = {{supply::circuit::full_wave_doubler,
                0,
                {},
                silicon(0.8, 0.1),
                false,
                {},
                {bled(150e3, node(220e-6, 0.3, 0)), behind_resistor(150, node(100e-6, 0.6, 0.14))}}};
  return net;
}

/// Choke input well above its critical current.
inline supply::network choke_input() {
  supply::network net = on_mains(230, 50, 0, 6);
  add_port(net, 450 / 230.0, 60);
  add_port(net, 450 / 230.0, 64);
  net.rails = {{supply::circuit::full_wave_centre_tap,
                0,
                1,
                valve(2.4e-3),
                false,
                {},
                {behind_choke(12, 110, bled(33e3, node(40e-6, 1, 0.15))), behind_choke(8, 150, node(40e-6, 1, 0.03))}}};
  return net;
}

}  // namespace supply_cases
