// Networks that are no circuit: our own fault, never the winder's.
#include <stdexcept>

#include <turnwright/supply/solver.hpp>

#include <catch2/catch.hpp>

#include "circuits.hpp"

using namespace turnwright;
using namespace turnwright::testing;
using supply::circuit;

namespace {

std::vector<supply::rail_node> reservoir() { return {node_of(direct(), 47e-6, 0, 0.05)}; }

supply::network one_rail(circuit sort, std::vector<supply::rail_node> nodes) {
  supply::network net = mains_of(230, 50, 20);
  add_single(net, sort, 250, 50, line_diode(0.8, 0.2), std::move(nodes));
  return net;
}

void is_refused(const supply::network& net) {
  CHECK_THROWS_AS(supply::solve_periodic(net), std::logic_error);
  CHECK_THROWS_AS(supply::solve(net), std::logic_error);
  CHECK_THROWS_AS(supply::switch_on(net, as<seconds>(0.1)), std::logic_error);
}

}  // namespace

TEST_CASE("a rail without nodes is refused", "[refusal]") { is_refused(one_rail(circuit::bridge, {})); }

TEST_CASE("two rails on one winding are refused", "[refusal]") {
  supply::network net = one_rail(circuit::bridge, reservoir());
  net.rails.push_back(net.rails.front());
  is_refused(net);
}

TEST_CASE("a centre-tapped winding whose halves are one and the same is refused", "[refusal]") {
  supply::network net = mains_of(230, 50, 20);
  add_centre_tap(net, 250, 50, 50, valve_diode(1e-3), reservoir()).second = 0;
  is_refused(net);
}

TEST_CASE("a rail on a winding that does not exist is refused", "[refusal]") {
  supply::network net = one_rail(circuit::bridge, reservoir());
  net.rails.front().first = 1;
  is_refused(net);
}

TEST_CASE("a centre-tap circuit needs its second half, and no other circuit has one", "[refusal]") {
  is_refused(one_rail(circuit::full_wave_centre_tap, reservoir()));
  supply::network net = one_rail(circuit::bridge, reservoir());
  net.rails.front().second = add_port(net, 250, 50);
  is_refused(net);
}

TEST_CASE("a doubler begins with its capacitors", "[refusal]") {
  is_refused(one_rail(circuit::full_wave_doubler, {node_of(direct(), 0, 0, 0, 10e3)}));
  is_refused(one_rail(circuit::full_wave_doubler, {node_of(resistor(100), 47e-6, 0, 0.05)}));
}

TEST_CASE("a half-wave doubler needs its series capacitor", "[refusal]") {
  is_refused(one_rail(circuit::half_wave_doubler, reservoir()));
}

TEST_CASE("a tap of a winding that does not exist is refused", "[refusal]") {
  supply::network net = one_rail(circuit::bridge, reservoir());
  net.ports.front().inside = 1;
  is_refused(net);
  net.ports.front().inside = 0;  // nor of itself
  is_refused(net);
}

TEST_CASE("a leakage matrix of another size than the windings is refused", "[refusal]") {
  supply::network net = one_rail(circuit::bridge, reservoir());
  net.leakage.push_back(as<henries>(0));
  is_refused(net);
}

TEST_CASE("a second node with nothing that leads to it is refused", "[refusal]") {
  std::vector<supply::rail_node> nodes = reservoir();
  nodes.push_back(nodes.front());
  is_refused(one_rail(circuit::bridge, nodes));
}
