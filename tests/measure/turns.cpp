#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/stated.hpp>
#include <turnwright/measure/turns.hpp>

#include <near.hpp>

#include <random>
#include <type_traits>

using namespace turnwright;
using namespace turnwright::literals;

TEST_CASE("a part of a turn is rounded as one asks") {
  CHECK(rounded_up(581.23) == turns{582});
  CHECK(rounded_down(581.23) == turns{581});
  CHECK(nearest(581.23) == turns{581});
  CHECK(nearest(581.5) == turns{582});
  CHECK(nearest_even(581.23) == turns{582});
  CHECK(nearest_even(579.9) == turns{580});
}

TEST_CASE("a whole number of turns that arithmetic left a hair off is that number") {
  CHECK(rounded_up(0.1 * 3 * 1000 / 0.3) == turns{1000});
  CHECK(rounded_up(880 + 1e-10) == turns{880});
  CHECK(rounded_down(880 - 1e-10) == turns{880});
}

TEST_CASE("turns are whole and lie where their rounding says", "[property]") {
  std::mt19937 random(1000);
  std::uniform_real_distribution<double> any(0, 5000);
  for (int i = 0; i < 10000; ++i) {
    const double x = any(random);
    if (rounded_up(x).count() < x - 1e-8 || rounded_up(x).count() >= x + 1) FAIL(x);
    if (rounded_down(x).count() > x + 1e-8 || rounded_down(x).count() <= x - 1) FAIL(x);
    if (std::abs(nearest(x).count() - x) > 0.5) FAIL(x);
    if (nearest_even(x).count() % 2 != 0 || std::abs(nearest_even(x).count() - x) > 1) FAIL(x);
  }
}

TEST_CASE("turns add and compare as counts do") {
  CHECK(turns{30} + turns{12} == turns{42});
  CHECK(turns{30} - turns{12} == turns{18});
  CHECK(turns{30} > turns{12});
  STATIC_REQUIRE_FALSE(std::is_convertible_v<int, turns>);
  STATIC_REQUIRE_FALSE(std::is_convertible_v<double, turns>);
}

TEST_CASE("volts say whether they are r.m.s., peak or direct") {
  STATIC_REQUIRE_FALSE(std::is_convertible_v<volts_rms, volts_peak>);
  STATIC_REQUIRE_FALSE(std::is_convertible_v<volts, volts_rms>);
  STATIC_REQUIRE_FALSE(std::is_constructible_v<volts_peak, volts_rms>);
  STATIC_REQUIRE(std::is_trivially_copyable_v<volts_rms>);
  CHECK(plain(peak_of_sine(volts_rms{230_V}).plain()) == Approx(325.27).margin(0.005));
  CHECK(plain(apparent_power(volts_rms{230_V}, amperes_rms{2_A})) == 460.0);
}

TEST_CASE("a rise in temperature is no point of the scale") {
  CHECK(plain(celsius(100) - celsius(40)) == Approx(60));
  CHECK(in_celsius(celsius(40) + 60_K) == Approx(100));
  CHECK(plain(40_degC) == 313.15);
}

TEST_CASE("a literal in the shop's unit is the SI figure") {
  CHECK(plain(0.5_mm) == 0.5e-3);
  CHECK(plain(1.25_in) == Approx(31.75e-3).epsilon(1e-15));
  CHECK(plain(35_mA) == 35e-3);
  CHECK(plain(2.5_A_per_mm2) == 2.5e6);
  CHECK(plain(2_mm2) == 2e-6);
  STATIC_REQUIRE(std::is_same_v<decltype(230_V * 1_A), watts>);
  STATIC_REQUIRE(std::is_same_v<decltype(230_V / 1_A), ohms>);
}
