// Six supplies that another program has solved: valve and silicon, capacitor and choke input, a doubler, a half-wave
// supply, and a whole amplifier's transformer.
#include "circuits.hpp"
#include "near.hpp"

using namespace turnwright;
using namespace turnwright::testing;
using supply::circuit;

namespace {

supply::network valve_and_choke() {
  supply::network net = mains_of(230, 50, 9);
  add_centre_tap(net, 300, 75, 80, valve_diode(1.1e-3),
                 {node_of(direct(), 16e-6, 0, 0.02), node_of(choke_of(8, 180), 32e-6, 0, 0.065)});
  return net;
}

supply::network silicon_and_three_resistors() {
  supply::network net = mains_of(120, 60, 1.6);
  net.source_resistance = as<ohms>(0.2);
  add_centre_tap(net, 310, 42, 42, line_diode(0.75, 0.3),
                 {node_of(direct(), 47e-6, 1.2, 0.09), node_of(resistor(1000), 22e-6, 2, 0.008),
                  node_of(resistor(10e3), 22e-6, 0, 0.003, 220e3)});
  return net;
}

supply::network choke_input() {
  supply::network net = mains_of(230, 50, 6);
  add_centre_tap(net, 450, 60, 64, valve_diode(2.4e-3),
                 {node_of(choke_of(12, 110), 40e-6, 1, 0.15, 33e3), node_of(choke_of(8, 150), 40e-6, 1, 0.03)});
  return net;
}

supply::network doubler() {
  supply::network net = mains_of(120, 60, 2.2);
  net.source_resistance = as<ohms>(0.3);
  add_single(net, circuit::full_wave_doubler, 130, 6.5, line_diode(0.8, 0.1),
             {node_of(direct(), 220e-6, 0.3, 0, 150e3), node_of(resistor(150), 100e-6, 0.6, 0.14)});
  return net;
}

// A primary for 230 V on mains of 235 V, with leakage before and a magnetising branch across the ideal transformer.
supply::network valve_amplifier() {
  supply::network net = mains_of(230, 50, 6.2);
  net.source_resistance = as<ohms>(0.5);
  net.primary_leakage = as<henries>(0.03);
  net.magnetising_inductance = as<henries>(14);
  net.core_loss_resistance = as<ohms>(22e3);
  add_centre_tap(net, 360, 48, 52, valve_diode(1.9e-3),
                 {node_of(direct(), 32e-6, 1, 0.01), node_of(choke_of(6, 95), 50e-6, 1, 0.125),
                  node_of(resistor(4700), 32e-6, 0, 0.006), node_of(resistor(15e3), 16e-6, 0, 0.003)});
  supply::rail& bias = add_single(net, circuit::half_wave, 52, 14, line_diode(0.75, 0.3),
                                  {node_of(direct(), 47e-6, 0, 0), node_of(resistor(2200), 47e-6, 0, 0, 27e3)});
  bias.negative = true;
  add_port(net, 5.2, 0.045, 2.631578947);
  add_port(net, 6.75, 0.035, 1.75);
  add_port(net, 6.8, 0.09, 5.25);
  net.mains = volts_rms{as<volts>(235)};
  return net;
}

supply::network half_wave() {
  supply::network net = mains_of(230, 50, 45);
  net.magnetising_inductance = as<henries>(18);
  add_single(net, circuit::half_wave, 210, 120, line_diode(0.75, 0.3, 47),
             {node_of(direct(), 50e-6, 1.5, 0.025), node_of(resistor(1500), 50e-6, 0, 0.01),
              node_of(resistor(22e3), 22e-6, 0, 0.0015)});
  add_port(net, 6.6, 0.15, 5.25);
  return net;
}

supply::network named(const std::string& name) {
  if (name == "valve and choke") return valve_and_choke();
  if (name == "silicon and three resistors") return silicon_and_three_resistors();
  if (name == "choke input") return choke_input();
  if (name == "doubler") return doubler();
  if (name == "valve amplifier") return valve_amplifier();
  REQUIRE(name == "half-wave");
  return half_wave();
}

// The larger of the two anodes, of all of a rail's.
template <class Figure>
double larger(const supply::rail_state& r, Figure of) {
  double most = 0;
  for (const supply::diode_state& d : r.diodes) most = std::max(most, of(d));
  return most;
}

double figure(const supply::network& net, const supply::state& s, const row& r) {
  const std::string what = r.text("what");
  const auto whole = [&](const char* column) { return static_cast<std::size_t>(r.needed(column)); };
  if (what == "line current") return plain(s.primary_current.plain());
  if (what == "port volts") return plain(s.ports[whole("number")].on_load.plain());
  if (what == "port current") {
    double most = port_amps(s, whole("number"));
    for (const supply::rail& other : net.rails)
      if (other.first == whole("number") && other.second) most = std::max(most, port_amps(s, *other.second));
    return most;
  }
  const supply::rail_state& of = s.rails[whole("of")];
  if (what == "diode peak") return larger(of, [](const supply::diode_state& d) { return plain(d.peak.plain()); });
  if (what == "diode inverse") return larger(of, [](const supply::diode_state& d) { return plain(d.inverse.plain()); });
  const supply::node_state& n = of.nodes[whole("number")];
  if (what == "node volts") return plain(n.mean.plain());
  if (what == "node ripple") return plain(n.ripple.plain());
  REQUIRE(what == "node ripple peak to peak");
  return plain(n.ripple_peak_to_peak);
}

}  // namespace

TEST_CASE("six supplies agree with a circuit simulator", "[published][circuit_simulator]") {
  for (const row& r : published("circuit_simulator")) {
    const supply::network net = named(r.text("circuit"));
    const supply::state s = supply::solve_periodic(net);
    INFO(r.place() << " " << r.text("circuit") << ", " << r.text("what"));
    CHECK(s.settled);
    CHECK(figure(net, s, r) == within_percent(r.needed("expected"), r.needed("tolerance_percent")));
  }
}
