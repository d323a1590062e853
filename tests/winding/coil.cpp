#include <turnwright/winding/coil.hpp>

#include <random>

#include <turnwright/measure/literals.hpp>
#include <turnwright/wire/copper.hpp>

#include "near.hpp"

using namespace turnwright;
using namespace turnwright::literals;

namespace {

gauge bare_wire(metres bare) {
  gauge g;
  g.size = "test wire";
  g.bare = bare;
  g.films = {{"1", bare * 1.1}};
  return g;
}

block random_block(std::mt19937& dice) {
  const auto pick = [&](double a, double b) { return std::uniform_real_distribution<double>(a, b)(dice); };
  const metres bare = as<metres>(pick(0.1e-3, 1.2e-3));
  block b;
  b.n = turns{std::uniform_int_distribution<int>(1, 3000)(dice)};
  b.wire = bare_wire(bare);
  b.overall = bare * pick(1.03, 1.2);
  b.strands = std::uniform_int_distribution<int>(1, 3)(dice);
  b.lay = pick(0.85, 0.97);
  b.margin = as<metres>(pick(0, 4e-3));
  b.interlayer = as<metres>(pick(0, 0.2e-3));
  return b;
}

constexpr tube plain_tube() { return {34_mm, 38_mm, 46_mm, 1.1}; }

}  // namespace

TEST_CASE("a full layer is never wider than the winding width, the helix included", "[property]") {
  std::mt19937 dice(3);
  for (int i = 0; i < 5000; ++i) {
    const block b = random_block(dice);
    const int n = turns_per_layer(b, 46_mm).count();
    const double pitch = plain(b.overall) * b.strands, free = 46e-3 - 2 * plain(b.margin);
    REQUIRE(n >= 0);
    if (n > 0) REQUIRE((n + 1) * pitch <= free * (1 + 1e-9));
  }
}

TEST_CASE("layers hold exactly the turns that were asked for, one over the other", "[property]") {
  std::mt19937 dice(4);
  for (int i = 0; i < 500; ++i) {
    const std::vector<block> blocks{random_block(dice), random_block(dice)};
    const laid_winding w = lay(blocks, 0.15_mm, plain_tube());
    int turns_laid = 0;
    metres last = 0_m, last_turn = 0_m;
    for (const laid_block& b : w.blocks) {
      for (const layer& l : b.layers) {
        turns_laid += l.n.count();
        REQUIRE(l.n <= b.per_layer);
        REQUIRE(l.middle > last);
        REQUIRE(l.mean_turn > last_turn);
        last = l.middle;
        last_turn = l.mean_turn;
      }
    }
    REQUIRE(turns_laid == blocks[0].n.count() + blocks[1].n.count());
    REQUIRE(total_turns(w).count() == turns_laid);
  }
}

TEST_CASE("the parts of a winding add up to the whole, wherever it is tapped", "[property]") {
  std::mt19937 dice(5);
  for (int i = 0; i < 500; ++i) {
    const laid_winding w = lay({random_block(dice)}, 0.15_mm, plain_tube());
    const turns all = total_turns(w), tap{std::uniform_int_distribution<int>(0, all.count())(dice)};
    REQUIRE(plain(resistance_20(w, turns{0}, tap) + resistance_20(w, tap, all)) ==
            Approx(plain(resistance_20(w, turns{0}, all))).epsilon(1e-12));
    REQUIRE(plain(wire_length(w, turns{0}, all)) == Approx(plain(mean_turn(w)) * all.count()).epsilon(1e-12));
    // mass x R = density x resistivity x length^2 for any gauge and any number of strands
    const double law =
        plain(copper::density) * plain(copper::resistivity_20) * std::pow(plain(wire_length(w, turns{0}, all)), 2);
    REQUIRE(plain(copper_mass(w)) * plain(resistance_20(w, turns{0}, all)) == Approx(law).epsilon(1e-12));
  }
}

TEST_CASE("the outer half of a centre-tapped winding has the more ohms", "[property]") {
  block b = {turns{2000}, bare_wire(0.2_mm), 0.22_mm, 1, 0.9, 4_mm, 0.05_mm, std::nullopt};
  const laid_winding w = lay({b}, 8_mm, plain_tube());
  CHECK(resistance_20(w, turns{1000}, turns{2000}) > resistance_20(w, turns{0}, turns{1000}));
}

TEST_CASE("a counted number of turns per layer overrides the lay factor", "[property]") {
  block b = {turns{300}, bare_wire(0.4_mm), 0.45_mm, 1, 0.9, 4_mm, 0.05_mm, turns{75}};
  const laid_winding w = lay({b}, 0_mm, plain_tube());
  CHECK(layer_count(w) == 4);
  CHECK(w.blocks[0].layers.back().n == turns{75});
}

TEST_CASE("a wire wider than the room is flagged, not wound", "[property]") {
  block b = {turns{10}, bare_wire(3_mm), 3.2_mm, 4, 0.9, 18_mm, 0.05_mm, std::nullopt};
  CHECK(lay({b}, 0_mm, plain_tube()).blocks[0].too_wide);
}

TEST_CASE("a turn's place says layer and side", "[property]") {
  block b = {turns{100}, bare_wire(0.9_mm), 1_mm, 1, 1.0, 0_mm, 0.1_mm, turns{40}};
  const laid_winding w = lay({b}, 0_mm, plain_tube());
  CHECK(place_of(w, turns{40}).layer == 1);
  CHECK(place_of(w, turns{40}).layer_end);
  CHECK_FALSE(place_of(w, turns{40}).at_start_side);
  CHECK(place_of(w, turns{80}).layer == 2);
  CHECK(place_of(w, turns{80}).at_start_side);
  CHECK(place_of(w, turns{100}).layer == 3);
  CHECK_FALSE(place_of(w, turns{60}).layer_end);
}

TEST_CASE("worked example: wire of an M 55 coil by length and resistance", "[published][d01]") {
  // Transformatorberechnung M-Kern (course page, German), whole page, read. It uses 2e-8 ohm m, so its ohms are scaled
  // to copper at 20 degC, 1/58 ohm mm2/m. Turns 2671 and 140, mean turn 80 mm, wires 0.18 and 0.62 mm.
  const double warm = 2e-8 / plain(copper::resistivity_20);
  const auto ohms_of = [&](int n, metres bare) {
    block b = {turns{n}, bare_wire(bare), bare, 1, 1.0, 0_mm, 0_mm, turns{n}};
    const tube flat{20_mm, 20_mm - std::numbers::pi / 2 * bare, 40_mm, 1.0};  // one layer whose mean turn is 80 mm
    return plain(resistance_20(lay({b}, 0_mm, flat), turns{0}, turns{n})) * warm;
  };
  CHECK(ohms_of(2671, 0.18_mm) == testing::within_percent(168, 0.2));  // printed to three figures
  CHECK(ohms_of(140, 0.62_mm) == testing::within_percent(0.73, 2.0));  // its length is rounded to 11 m
}
