#include <turnwright/iron/body.hpp>

#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>

#include <near.hpp>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const pattern_book& patterns() {
  static const pattern_book book(catalogue::bundled());
  return book;
}

const steel_book& steels() {
  static const steel_book book(catalogue::bundled());
  return book;
}

core_body core(const char* pattern, metres stack, const char* grade, stacking style = stacking::interleaved,
               double factor = 0.95) {
  return core_body({.pattern = patterns().named(pattern, "test"),
                    .stack = stack,
                    .grade = steels().named(grade, "test"),
                    .stacking_factor = factor,
                    .style = style});
}

}  // namespace

TEST_CASE("the iron of a stack is its gross area by the stacking factor") {
  const core_body c = core("EI 96", 40_mm, "M400-50A", stacking::interleaved, 0.92);
  CHECK(plain(c.net_area()) == Approx(32e-3 * 40e-3 * 0.92).epsilon(1e-12));
}

TEST_CASE("iron without waste weighs six tongues squared by stack, stacking factor and density") {
  const core_body c = core("EI 96", 40_mm, "M400-50A");
  CHECK(plain(c.mass()) == Approx(6 * 0.032 * 0.032 * 0.040 * 0.95 * 7700).epsilon(1e-9));
}

TEST_CASE("a stack has as many whole sheets as its iron is thick") {
  CHECK(core("EI 96", 40_mm, "M400-50A", stacking::interleaved, 0.95).sheets() == 76);  // 38 mm of 0.5 mm
  CHECK(core("EI 96", 35_mm, "M330-35A", stacking::interleaved, 0.90).sheets() == 90);  // 31.5 mm of 0.35 mm
  CHECK(core("EI 96", 40_mm, "M400-50A", stacking::interleaved, 0.92).sheets() == 74);  // 73.6, to the nearest
}

TEST_CASE("sheets grow with the stack and with the stacking factor", "[property]") {
  int before = 0;
  for (double stack = 10; stack <= 80; stack += 0.5) {
    const int now = core("EI 120", as<metres>(stack * 1e-3), "M-19").sheets();
    CHECK(now > before);
    before = now;
  }
  CHECK(core("EI 96", 40_mm, "M-19", stacking::interleaved, 0.9).sheets() < core("EI 96", 40_mm, "M-19").sheets());
}

TEST_CASE("a hand-laid stack holds less iron than the sheet's own factor") {
  for (const steel& s : steels().all()) {
    INFO(s.name);
    CHECK(usual_stacking_factor(s) < s.stacking_factor + 1e-12);
    CHECK(usual_stacking_factor(s) >= 0.85);
  }
}

TEST_CASE("magnetising current falls as turns are added at one flux density, and more so at one voltage",
          "[property]") {
  const core_body c = core("EI 96", 40_mm, "M400-50A");
  const volts_rms mains{230_V};
  double at_one_flux = 1e9, at_one_voltage = 1e9;
  for (int n = 600; n <= 1400; n += 50) {
    const double fixed_flux = plain(c.magnetising_current(1.2_T, turns{n}).plain());
    const double fixed_volts =
        plain(c.magnetising_current(peak_flux_density(mains, 50_Hz, turns{n}, c.net_area()), turns{n}).plain());
    CHECK(fixed_flux < at_one_flux);
    CHECK(fixed_volts < at_one_voltage);
    if (n > 600) CHECK(fixed_volts / at_one_voltage < fixed_flux / at_one_flux);
    at_one_flux = fixed_flux;
    at_one_voltage = fixed_volts;
  }
}

TEST_CASE("magnetising current rises with flux density and lies under the crest factor of its peak", "[property]") {
  const core_body c = core("EI 96", 40_mm, "M800-50A");
  const magnetisation_curve curve(c.choice().grade.magnetisation, c.choice().grade.polarisation);
  constexpr double mu0 = 1.25663706e-6;
  double before = 0;
  for (double b = 0.1; b < 1.9; b += 0.05) {
    const double now = plain(c.magnetising_current(as<teslas>(b), turns{500}).plain());
    const double peak = (plain(curve.field(as<teslas>(b))) * plain(c.path()) + b * plain(c.joint_gap()) / mu0) / 500;
    CHECK(now > before);
    CHECK(now < peak);
    CHECK(now > peak / 4);
    before = now;
  }
}

TEST_CASE("a core that is nearly all gap draws the sine current of the gap") {
  // Far below the first point the curve is straight, so the current is a sine: r.m.s. is peak over the root of two.
  const core_body c = core("EI 96", 40_mm, "M800-50A", stacking::butt);
  const double b = 0.01, n = 500, mu0 = 1.25663706e-6;
  const magnetisation_curve curve(c.choice().grade.magnetisation, c.choice().grade.polarisation);
  const double peak = (plain(curve.field(as<teslas>(b))) * plain(c.path()) + b * plain(c.joint_gap()) / mu0) / n;
  CHECK(plain(c.magnetising_current(as<teslas>(b), turns{500}).plain()) == Approx(peak / std::sqrt(2.0)).epsilon(1e-3));
}

TEST_CASE("worse joints draw more magnetising current") {
  const auto current = [](stacking s) { return core("EI 96", 40_mm, "M-6", s).magnetising_current(1.3_T, turns{800}); };
  CHECK(current(stacking::interleaved) < current(stacking::in_pairs));
  CHECK(current(stacking::in_pairs) < current(stacking::butt));
  CHECK(word_of(stacking::in_pairs) == "in pairs");
}

TEST_CASE("the loss of a core is the sheet's loss by its mass and the factor of building") {
  const core_body c = core("EI 96", 40_mm, "M800-50A");
  CHECK(plain(c.loss(1.2_T, 50_Hz)) ==
        Approx(4.2 * plain(c.mass()) * c.building_factor()).epsilon(1e-6));  // 4.2 W/kg read
  CHECK(c.building_factor() >= 1.1);  // stacked non-oriented cores 1.1 to 1.3, from memory
  CHECK(c.building_factor() <= 1.3);
  CHECK(core("EI 96", 40_mm, "M-6").building_factor() >= 1.3);  // stacked oriented cores 1.3 to 1.8, from memory
  CHECK(core("M 85", 32_mm, "M-6").building_factor() < core("EI 96", 40_mm, "M-6").building_factor());
}

TEST_CASE("loss and iron both grow with the stack", "[property]") {
  double loss = 0, mass = 0, area = 0, surface = 0;
  for (double stack = 20; stack <= 80; stack += 5) {
    const core_body c = core("EI 96", as<metres>(stack * 1e-3), "M400-50A");
    CHECK(plain(c.loss(1.2_T, 50_Hz)) > loss);
    CHECK(plain(c.mass()) > mass);
    CHECK(plain(c.net_area()) > area);
    CHECK(plain(c.exposed_surface()) > surface);
    loss = plain(c.loss(1.2_T, 50_Hz));
    mass = plain(c.mass());
    area = plain(c.net_area());
    surface = plain(c.exposed_surface());
  }
}
