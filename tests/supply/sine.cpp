#include <turnwright/supply/sine.hpp>

#include <complex>
#include <numbers>
#include <random>

#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>

#include "near.hpp"

using namespace turnwright;
using namespace turnwright::literals;

namespace {

// A transformer of so many random windings; leakage as a diagonally heavy symmetric matrix.
supply::network random_network(std::mt19937& dice) {
  const auto pick = [&](double a, double b) { return std::uniform_real_distribution<double>(a, b)(dice); };
  supply::network net;
  net.mains = volts_rms{as<volts>(pick(90, 260))};
  net.frequency = as<hertz>(pick(45, 65));
  net.source_resistance = as<ohms>(pick(0, 1));
  net.primary_resistance = as<ohms>(pick(1, 60));
  net.core_loss_resistance = as<ohms>(pick(5e3, 5e4));
  net.magnetising_inductance = as<henries>(pick(3, 60));
  const std::size_t ports = std::uniform_int_distribution<std::size_t>(1, 5)(dice);
  for (std::size_t k = 0; k < ports; ++k) {
    const double n = pick(0.01, 4);
    const double volts_open = plain(net.mains.plain()) * n;
    const double full = volts_open * volts_open / pick(5, 60);
    net.ports.push_back({n, as<ohms>(full * pick(0.01, 0.1)), as<ohms>(full), std::nullopt});
  }
  net.leakage.assign(ports * ports, 0_H);
  for (std::size_t k = 0; k < ports; ++k) {
    for (std::size_t m = 0; m <= k; ++m) {
      net.leakage[k * ports + m] = net.leakage[m * ports + k] = as<henries>(k == m ? pick(5e-3, 60e-3) : pick(0, 2e-3));
    }
  }
  return net;
}

}  // namespace

TEST_CASE("what goes into the primary comes out of the secondaries or stays as heat", "[property]") {
  std::mt19937 dice(7);
  for (int i = 0; i < 2000; ++i) {
    const supply::state s = supply::solve_sine(random_network(dice));
    double lost = plain(s.primary_copper) + plain(s.core);
    for (const watts& w : s.copper) lost += plain(w);
    REQUIRE(plain(s.input) == Approx(plain(s.output) + lost).epsilon(1e-10));
  }
}

TEST_CASE("one winding without leakage or magnetising branch is a voltage divider", "[property]") {
  std::mt19937 dice(8);
  for (int i = 0; i < 200; ++i) {
    supply::network net = random_network(dice);
    net.ports.resize(1);
    net.leakage.assign(1, 0_H);
    net.core_loss_resistance.reset();
    net.magnetising_inductance.reset();
    const double ratio = net.ports[0].ratio;
    const double seen =
        plain(net.ports[0].resistance) + (plain(net.source_resistance) + plain(net.primary_resistance)) * ratio * ratio;
    const double load = plain(*net.ports[0].load), expected = plain(net.mains.plain()) * ratio * load / (load + seen);
    REQUIRE(plain(supply::solve_sine(net).ports[0].on_load.plain()) == Approx(expected).epsilon(1e-12));
  }
}

TEST_CASE("a series circuit of resistance and leakage gives the textbook current", "[property]") {
  supply::network net{volts_rms{100_V},
                      50_Hz,
                      0_ohm,
                      3_ohm,
                      0_H,
                      std::nullopt,
                      std::nullopt,
                      {{1.0, 1_ohm, 6_ohm, std::nullopt}},
                      {inductance_of(10_ohm, 50_Hz)},
                      {}};
  const supply::state s = supply::solve_sine(net);
  CHECK(plain(s.primary_current.plain()) == Approx(100 / std::hypot(10.0, 10.0)).epsilon(1e-12));
  CHECK(plain(s.ports[0].on_load.plain()) == Approx(600 / std::hypot(10.0, 10.0)).epsilon(1e-12));
}

TEST_CASE("the ampere-turns of load and no-load current make up the primary's", "[property]") {
  // One port behind leakage; everything by hand in complex numbers.
  std::mt19937 dice(10);
  for (int i = 0; i < 200; ++i) {
    supply::network net = random_network(dice);
    const henries l = net.leakage[0];
    net.ports.resize(1);
    net.leakage.assign(1, l);
    const double n = net.ports[0].ratio;
    const std::complex<double> branch(plain(net.ports[0].resistance + *net.ports[0].load) / (n * n),
                                      plain(reactance(net.frequency, l)));
    const std::complex<double> shunt(1 / plain(*net.core_loss_resistance),
                                     -1 / plain(reactance(net.frequency, *net.magnetising_inductance)));
    const double emf = plain(supply::solve_sine(net).emf.plain());
    const supply::state s = supply::solve_sine(net);
    REQUIRE(plain(s.primary_current.plain()) == Approx(std::abs(emf * (1.0 / branch + shunt))).epsilon(1e-12));
    REQUIRE(plain(s.ports[0].current.plain()) * n == Approx(emf / std::abs(branch)).epsilon(1e-12));
  }
}

TEST_CASE("a load on one winding pulls the others down as much as theirs would pull it", "[property]") {
  // Reciprocity: the transfer impedance from winding a to b equals that from b to a. A small extra load draws a current
  // in one; the other's open volts change in proportion.
  std::mt19937 dice(9);
  for (int i = 0; i < 100; ++i) {
    supply::network net = random_network(dice);
    if (net.ports.size() < 2) continue;
    for (supply::port& p : net.ports) p.load.reset();
    const auto change = [&](std::size_t loaded, std::size_t watched) {
      supply::network one = net;
      const double open = plain(supply::solve_sine(one).ports[loaded].no_load.plain());
      one.ports[loaded].load = as<ohms>(open * open / 1e-4);  // a tenth of a milliwatt: small enough to be linear
      const supply::state before = supply::solve_sine(net), after = supply::solve_sine(one);
      return (plain(before.ports[watched].on_load.plain()) - plain(after.ports[watched].on_load.plain())) /
             plain(after.ports[loaded].current.plain());
    };
    REQUIRE(change(0, 1) == Approx(change(1, 0)).epsilon(2e-3));
  }
}

TEST_CASE("a tap carries its own current and that of its half through the shared part", "[property]") {
  supply::network net{volts_rms{100_V},
                      50_Hz,
                      0_ohm,
                      0_ohm,
                      0_H,
                      std::nullopt,
                      std::nullopt,
                      {{1.0, 10_ohm, 90_ohm, std::nullopt}, {0.5, 5_ohm, 45_ohm, std::size_t{0}}},
                      std::vector<henries>(4, 0_H),
                      {}};
  const supply::state s = supply::solve_sine(net);
  // 100 = 10 i + 5 j + 90 i and 50 = 5 (i + j) + 45 j, by hand
  const double i = (100.0 * 50 - 5 * 50) / (100.0 * 50 - 25), j = (50 - 5 * i) / 50;
  CHECK(plain(s.ports[0].current.plain()) == Approx(i).epsilon(1e-12));
  CHECK(plain(s.ports[1].current.plain()) == Approx(j).epsilon(1e-12));
  CHECK(plain(s.shared_current[1].plain()) == Approx(i + j).epsilon(1e-12));
  CHECK(plain(s.copper[0]) + plain(s.copper[1]) == Approx(i * i * 5 + (i + j) * (i + j) * 5).epsilon(1e-12));
}

TEST_CASE("two taps of one half share the shorter one's copper", "[property]") {
  // The half has 10 ohm; the taps 5 and 2 ohm of it. Copper by its three stretches.
  const supply::network net{volts_rms{100_V},
                            50_Hz,
                            0_ohm,
                            0_ohm,
                            0_H,
                            std::nullopt,
                            std::nullopt,
                            {{1.0, 10_ohm, 900_ohm, std::nullopt},
                             {0.5, 5_ohm, 300_ohm, std::size_t{0}},
                             {0.2, 2_ohm, 100_ohm, std::size_t{0}}},
                            std::vector<henries>(9, 0_H),
                            {}};
  const supply::state s = supply::solve_sine(net);
  const double i = plain(s.ports[0].current.plain()), j = plain(s.ports[1].current.plain()),
               k = plain(s.ports[2].current.plain());
  CHECK(plain(s.ports[0].on_load.plain()) == Approx(100 - 5 * i - 3 * (i + j) - 2 * (i + j + k)).epsilon(1e-12));
  CHECK(plain(s.ports[1].on_load.plain()) == Approx(50 - 3 * (i + j) - 2 * (i + j + k)).epsilon(1e-12));
  CHECK(plain(s.ports[2].on_load.plain()) == Approx(20 - 2 * (i + j + k)).epsilon(1e-12));
  const double lost = plain(s.copper[0]) + plain(s.copper[1]) + plain(s.copper[2]);
  CHECK(lost == Approx(5 * i * i + 3 * (i + j) * (i + j) + 2 * (i + j + k) * (i + j + k)).epsilon(1e-12));
  CHECK(plain(s.shared_current[2].plain()) == Approx(i + j + k).epsilon(1e-12));
}

TEST_CASE("the kernel in plain doubles and the door in quantities give the same", "[property]") {
  const supply::network net{volts_rms{230_V},
                            50_Hz,
                            0_ohm,
                            20_ohm,
                            0_H,
                            20e3_ohm,
                            inductance_of(5e3_ohm, 50_Hz),
                            {{20.0 / 700, 35_mohm, 2_ohm, std::nullopt}},
                            {12_mH},
                            {}};
  const supply::kernel::network_si si{230,     2 * std::numbers::pi * 50,    0,      20, 0, 1 / 20e3,
                                      1 / 5e3, {{20.0 / 700, 0.035, 2, -1}}, {0.012}};
  CHECK(plain(supply::solve_sine(net).ports[0].on_load.plain()) ==
        Approx(supply::kernel::solve(si).v[0]).epsilon(1e-14));
}

TEST_CASE("a leakage matrix of another size is our own fault", "[refusal]") {
  supply::network net;
  net.ports.resize(2);
  CHECK_THROWS_AS(supply::solve_sine(net), std::logic_error);
}
