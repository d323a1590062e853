#include <turnwright/thermal/balance.hpp>

#include <random>

#include <turnwright/measure/literals.hpp>

#include "near.hpp"

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::thermal;

namespace {

heated_coil small_coil() {
  heated_coil c;
  c.tongue = 20_mm;
  c.stack = 21_mm;
  c.window_width = 10_mm;
  c.window_length = 30_mm;
  c.former_air = 0.2_mm;
  c.former_wall = 1.2_mm;
  c.outer_wrap = 0.6_mm;
  c.core_surface = 8220_mm2;
  c.core_height = 50_mm;
  c.ambient = 25_degC;
  c.windings = {{1.4_mm, 4.2_mm, 27_mm, 1.1_mm, 0.16_W_per_mK, 0.20_W_per_mK},
                {4.5_mm, 7.0_mm, 27_mm, 1.1_mm, 0.14_W_per_mK, 0.18_W_per_mK},
                {7.3_mm, 8.4_mm, 27_mm, 1.1_mm, 0.22_W_per_mK, 0.30_W_per_mK}};
  return c;
}

const std::vector<watts> usual_losses{1.3_W, 1.1_W, 0.75_W};

}  // namespace

TEST_CASE("rises agree with a field solution of a small transformer", "[reference]") {
  // Finite-element solution of the same sections with copper coupling along the turn, mesh error 0.05 % (computed with
  // a general-purpose solver). Eight per cent is what a network of one node for each winding should reach.
  const heat_state s = heat_balance(small_coil()).solve(1.2_W, usual_losses);
  CHECK(plain(s.core) == testing::within_percent(26.07, 8));
  CHECK(plain(s.windings[0]) == testing::within_percent(34.87, 8));
  CHECK(plain(s.windings[1]) == testing::within_percent(35.81, 8));
  CHECK(plain(s.windings[2]) == testing::within_percent(33.45, 8));
}

TEST_CASE("all heat made leaves to the air", "[property]") {
  std::mt19937 dice(21);
  const auto pick = [&](double a, double b) { return std::uniform_real_distribution<double>(a, b)(dice); };
  const heat_balance coil(small_coil());
  for (int i = 0; i < 500; ++i) {
    const watts core = as<watts>(pick(0.1, 8));
    std::vector<watts> losses;
    double made = plain(core);
    for (int k = 0; k < 3; ++k) {
      losses.push_back(as<watts>(pick(0, 5)));
      made += plain(losses.back());
    }
    const heat_state s = coil.solve(core, losses);
    REQUIRE(plain(s.to_air) == Approx(made).epsilon(1e-9));
    REQUIRE(std::abs(s.residual) < 1e-9);
  }
}

TEST_CASE("more loss anywhere never cools anything", "[property]") {
  const heat_balance coil(small_coil());
  const heat_state before = coil.solve(1.2_W, usual_losses);
  for (std::size_t i = 0; i < 3; ++i) {
    std::vector<watts> losses = usual_losses;
    losses[i] += 0.5_W;
    const heat_state after = coil.solve(1.2_W, losses);
    CHECK(after.core > before.core);
    for (std::size_t k = 0; k < 3; ++k) CHECK(after.windings[k] > before.windings[k]);
  }
}

TEST_CASE("without loss nothing warms", "[property]") {
  for (const kelvins& k : heat_balance(small_coil()).solve(0_W, {0_W, 0_W, 0_W}).windings)
    CHECK(plain(k) == Approx(0).margin(1e-9));
}

TEST_CASE("losses of another count than the windings are our own fault", "[refusal]") {
  CHECK_THROWS_AS(heat_balance(small_coil()).solve(1_W, {1_W}), std::logic_error);
}

TEST_CASE("the surface rule gives its two known points", "[published][mclyman]") {
  // Colonel Wm. T. McLyman, Transformer and Inductor Design Handbook, ch. 6, recalled: 0.03 W/cm2 about 25 K, 0.07
  // about 50 K.
  CHECK(plain(surface_rule(0.3_W, as<square_metres>(10e-4))) == Approx(25).margin(0.5));
  CHECK(plain(surface_rule(0.7_W, as<square_metres>(10e-4))) == Approx(50).margin(0.5));
}
