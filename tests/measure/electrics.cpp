#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>

#include <near.hpp>

#include <numbers>
#include <random>
#include <type_traits>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;
using std::numbers::pi;

TEST_CASE("the law of induction gives the turns of printed examples", "[published][turns]") {
  for (const row& r : published("turns")) {
    INFO(r.place());
    const volts_rms emf{as<volts>(r.needed("volts"))};
    const hertz f = as<hertz>(r.needed("frequency_hz"));
    const teslas b = as<teslas>(r.needed("flux_density_t"));
    const square_metres area = as<square_metres>(r.needed("area_cm2") * 1e-4);
    const double tolerance = r.needed("tolerance_percent");
    CHECK(turns_for(emf, f, b, area) == within_percent(r.needed("turns"), tolerance));
    if (r.needed("turns") > 100) {  // the other way about; whole turns hide the flux density of fewer
      CHECK(plain(peak_flux_density(emf, f, nearest(r.needed("turns")), area)) == within_percent(plain(b), tolerance));
    }
  }
}

TEST_CASE("a winding carried to other mains keeps its flux density by the printed factor", "[published][turns_scale]") {
  for (const row& r : published("turns_scale")) {
    INFO(r.place());
    const square_metres area = as<square_metres>(9e-4);
    const auto needed = [&](const char* v, const char* f) {
      return turns_for(volts_rms{as<volts>(r.needed(v))}, as<hertz>(r.needed(f)), 1.1_T, area);
    };
    CHECK(needed("to_v", "to_hz") / needed("from_v", "from_hz") ==
          within_percent(r.needed("factor"), r.needed("tolerance_percent")));
  }
}

TEST_CASE("a capacitor has the reactance that a worked example asks for", "[published][reactance]") {
  for (const row& r : published("reactance")) {
    INFO(r.place());
    const hertz f = as<hertz>(r.needed("frequency_hz"));
    const double load =
        std::hypot(r.needed("resistance_ohm"), plain(reactance(f, as<henries>(r.needed("inductance_mh") * 1e-3))));
    CHECK(plain(reactance(f, as<farads>(r.needed("capacitance_uf") * 1e-6))) ==
          within_percent(load / r.needed("part_of_impedance"), r.needed("tolerance_percent")));
  }
}

TEST_CASE("a 230 V winding on 60 Hz has less flux than on 50 Hz") {
  const volts_rms mains{230_V};
  const square_metres area = as<square_metres>(9e-4);
  const double at_50 = plain(peak_flux_density(mains, 50_Hz, turns{880}, area));
  const double at_60 = plain(peak_flux_density(mains, 60_Hz, turns{880}, area));
  CHECK(at_60 < at_50);
  CHECK(at_50 / at_60 == Approx(1.2).epsilon(1e-12));
}

TEST_CASE("turns for a flux density give that flux density again", "[property]") {
  std::mt19937 random(444);
  std::uniform_real_distribution<double> part(0.1, 1);
  for (int i = 0; i < 2000; ++i) {
    const volts_rms emf{as<volts>(500 * part(random))};
    const hertz f = as<hertz>(80 * part(random));
    const square_metres area = as<square_metres>(3e-3 * part(random));
    const turns n{static_cast<int>(2000 * part(random))};
    const teslas b = peak_flux_density(emf, f, n, area);
    if (std::abs(turns_for(emf, f, b, area) / n.count() - 1) > 1e-12) FAIL(plain(b));
    if (!(peak_flux_density(emf, f, n + turns{1}, area) < b)) FAIL("more turns, more flux");
  }
}

TEST_CASE("a choke and a capacitor have one reactance at their resonance", "[property]") {
  std::mt19937 random(1893);
  std::uniform_real_distribution<double> exponent(-2, 2);
  for (int i = 0; i < 1000; ++i) {
    const henries l = as<henries>(std::pow(10.0, exponent(random)));
    const farads c = as<farads>(1e-5 * std::pow(10.0, exponent(random)));
    const hertz f = as<hertz>(1 / (2 * pi * std::sqrt(plain(l) * plain(c))));
    const double x_l = plain(reactance(f, l)), x_c = plain(reactance(f, c));
    if (std::abs(x_l / x_c - 1) > 1e-12) FAIL(x_l);
    if (std::abs(x_l / std::sqrt(plain(l) / plain(c)) - 1) > 1e-12) FAIL(x_l);
    if (std::abs(plain(inductance_of(reactance(f, l), f)) / plain(l) - 1) > 1e-12) FAIL(x_l);
  }
}

TEST_CASE("frequency times inductance looks like a resistance but lacks the 2 pi") {
  STATIC_REQUIRE(
      std::is_same_v<decltype(50_Hz * 5_H), ohms>);  // no compiler can tell: so the product is never written openly
  CHECK(plain(reactance(50_Hz, 5_H)) == Approx(2 * pi * plain(50_Hz * 5_H)).epsilon(1e-15));
}
