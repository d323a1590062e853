#include <turnwright/iron/steel.hpp>

#include <turnwright/measure/literals.hpp>

#include <near.hpp>

#include <numbers>
#include <random>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

constexpr double mu0 = 4e-7 * std::numbers::pi;

const steel_book& steels() {
  static const steel_book book(catalogue::bundled());
  return book;
}

double loss(const loss_law& law, double b, double f) { return plain(law.at(as<teslas>(b), as<hertz>(f)).value); }

double field(const magnetisation_curve& curve, double b) { return plain(curve.field(as<teslas>(b))); }

magnetisation_curve curve_of(const steel& s) { return {s.magnetisation, s.polarisation}; }

double end_of_curve(const steel& s) {
  const magnetisation_point& last = s.magnetisation.back();
  return plain(last.value) + (s.polarisation ? mu0 * plain(last.field) : 0.0);
}

void check_field(const std::string& key) {
  for (const row& r : published(key)) {
    INFO(r.place());
    const steel& s = steels().named(r.text("grade"), "test");
    const double h = r.needed("field_a_per_m"), j = r.needed("polarisation_t");
    CHECK(field(curve_of(s), j + mu0 * h) == within_percent(h, r.needed("tolerance_percent")));
  }
}

const char* loss_header = "curve,frequency_hz,flux_density_t,loss_w_per_kg,standing,source\n";

}  // namespace

TEST_CASE("field at a polarisation is that of the data records", "[published][field]") { check_field("field"); }

TEST_CASE("field at a polarisation is near that of another maker's sheet of the grade",
          "[published][field_second_maker]") {
  check_field("field_second_maker");
}

TEST_CASE("loss of sheet is that of the material files", "[published][sheet_loss]") {
  for (const row& r : published("sheet_loss")) {
    INFO(r.place());
    const loss_law law(steels().named(r.text("grade"), "test"));
    CHECK(loss(law, r.needed("flux_density_t"), r.needed("frequency_hz")) ==
          within_percent(r.needed("loss_w_per_kg"), r.needed("tolerance_percent")));
  }
}

TEST_CASE("the 60 Hz loss of M-19 follows from its losses at 50 Hz and 100 Hz", "[published][m19_loss]") {
  steel s;
  const auto rows = published("m19_loss");
  for (const char* column : {"loss_50_hz", "loss_100_hz"}) {
    for (const row& r : rows) {
      s.loss_curve.push_back({std::string(column) == "loss_50_hz" ? 50_Hz : 100_Hz,
                              as<teslas>(r.needed("flux_density_t")), as<watts_per_kilogram>(r.needed(column))});
    }
  }
  const loss_law law(s);
  int predicted = 0;
  for (const row& r : rows) {
    INFO(r.place());
    const double b = r.needed("flux_density_t");
    CHECK(loss(law, b, 50) == Approx(r.needed("loss_50_hz")).epsilon(1e-9));
    if (!r.number("tolerance_percent")) continue;
    CHECK(loss(law, b, 60) == within_percent(r.needed("loss_60_hz"), r.needed("tolerance_percent")));
    ++predicted;
  }
  CHECK(predicted == 11);
}

TEST_CASE("field rises with flux density, without a jump, and is the same both ways round", "[property]") {
  std::mt19937 random(1881);
  for (const steel& s : steels().all()) {
    INFO(s.name);
    const magnetisation_curve curve = curve_of(s);
    const double most = end_of_curve(s) * 1.2;
    double before = 0;
    for (int i = 1; i <= 4000; ++i) {
      const double b = most * i / 4000, now = field(curve, b);
      if (!(now > before)) FAIL("falls at " << b);
      before = now;
    }
    CHECK(field(curve, 0) == 0.0);
    std::uniform_real_distribution<double> any(1e-3, most);
    for (int i = 0; i < 500; ++i) {
      const double b = any(random), h = field(curve, b), step = 1e-9;
      if (field(curve, -b) != -h) FAIL("not odd at " << b);
      if (std::abs(field(curve, b + step) - h) > 1e-5 * h + 2 * step / mu0) FAIL("jumps at " << b);
    }
    for (const magnetisation_point& p : s.magnetisation) {  // and right at the points
      const double b = plain(p.value) + (s.polarisation ? mu0 * plain(p.field) : 0.0);
      CHECK(field(curve, b) == Approx(plain(p.field)).epsilon(1e-9));
      CHECK(field(curve, b * (1 - 1e-10)) == Approx(plain(p.field)).epsilon(1e-5));
      CHECK(field(curve, b * (1 + 1e-10)) == Approx(plain(p.field)).epsilon(1e-5));
    }
  }
}

TEST_CASE("beyond the last point iron gives no more than air does", "[property]") {
  for (const steel& s : steels().all()) {
    INFO(s.name);
    const magnetisation_curve curve = curve_of(s);
    const double end = end_of_curve(s);
    for (const double more : {0.01, 0.1, 1.0}) {
      CHECK((field(curve, end + more) - field(curve, end)) * mu0 == Approx(more).epsilon(1e-6));
    }
  }
}

TEST_CASE("a curve that falls, has too few points or starts below nothing is refused", "[refusal]") {
  const auto point = [](double b, double h) { return magnetisation_point{as<teslas>(b), as<amperes_per_metre>(h)}; };
  const std::vector<magnetisation_point> good{point(0.5, 50), point(1, 100), point(1.3, 250), point(1.5, 1000)};
  CHECK_NOTHROW(magnetisation_curve(good, false));
  CHECK_THROWS_AS(magnetisation_curve({good[0], good[1], good[2]}, false), std::logic_error);
  CHECK_THROWS_AS(magnetisation_curve({good[0], good[1], good[3], good[2]}, false), std::logic_error);
  CHECK_THROWS_AS(magnetisation_curve({point(0, 0), good[1], good[2], good[3]}, false), std::logic_error);
  CHECK_THROWS_AS(magnetisation_curve({good[0], good[0], good[2], good[3]}, false), std::logic_error);
}

TEST_CASE("loss rises with flux density and with frequency", "[property]") {
  for (const steel& s : steels().all()) {
    INFO(s.name);
    const loss_law law(s);
    for (double f = 40; f <= 120; f += 5) {
      double before = 0;
      for (double b = 0.05; b < 2.0; b += 0.01) {
        const double now = loss(law, b, f);
        if (!(now > before)) FAIL("falls with flux density at " << b << " T, " << f << " Hz");
        before = now;
      }
    }
    for (double b = 0.1; b < 2.0; b += 0.1) {
      double before = 0;
      for (double f = 40; f <= 120; f += 1) {
        const double now = loss(law, b, f);
        if (!(now > before)) FAIL("falls with frequency at " << b << " T, " << f << " Hz");
        before = now;
      }
    }
    CHECK(loss(law, 0, 50) == 0.0);
  }
}

TEST_CASE("the loss of a grade with one frequency splits into hysteresis by f and eddy currents by f squared") {
  steel s = steels().named("M400-50A", "test");
  s.hysteresis_ratio = 1;
  CHECK(loss(loss_law(s), 1.2, 100) == Approx(2 * loss(loss_law(s), 1.2, 50)).epsilon(1e-12));
  s.hysteresis_ratio = 0;
  CHECK(loss(loss_law(s), 1.2, 100) == Approx(4 * loss(loss_law(s), 1.2, 50)).epsilon(1e-12));
  s.hysteresis_ratio = 0.7;  // 0.7 x 1.2 + 0.3 x 1.44
  CHECK(loss(loss_law(s), 1.2, 60) == Approx(1.272 * loss(loss_law(s), 1.2, 50)).epsilon(1e-12));
}

TEST_CASE("loss read beyond the curve's ends says so") {
  const loss_law law(steels().named("M400-50A", "test"));
  CHECK_FALSE(law.at(0.5_T, 50_Hz).beyond_curve);
  CHECK_FALSE(law.at(1.5_T, 50_Hz).beyond_curve);
  CHECK(law.at(0.45_T, 50_Hz).beyond_curve);
  CHECK(law.at(1.55_T, 50_Hz).beyond_curve);
  CHECK(law.at(1.55_T, 60_Hz).beyond_curve);
}

TEST_CASE("a borrowed loss curve lies as far under its rated loss as the owner's does", "[property]") {
  int borrowed = 0;
  for (const steel& s : steels().all()) {
    if (s.loss_from == s.name) {
      CHECK(s.loss_scale == 1.0);
      continue;
    }
    INFO(s.name << " from " << s.loss_from);
    const steel& owner = steels().named(s.loss_from, "test");
    const auto typical_over_rated = [](const steel& g) {
      return plain(loss_law(g).at(g.rated_flux_density, g.rated_frequency).value) / plain(g.rated_loss);
    };
    CHECK(typical_over_rated(s) == Approx(typical_over_rated(owner)).epsilon(1e-9));
    CHECK(borrows(s));
    CHECK(s.known_how == standing::estimate);
    ++borrowed;
  }
  CHECK(borrowed > 20);
}

TEST_CASE("every grade works below its high flux density and is in the range of electrical sheet", "[property]") {
  for (const steel& s : steels().all()) {
    INFO(s.name);
    CHECK(s.flux_nominal < s.flux_high);
    CHECK(plain(s.flux_high) < 2.0);
    CHECK(plain(s.density) >= 7500);
    CHECK(plain(s.density) <= 7900);
    CHECK(s.stacking_factor > 0.85);
    CHECK(s.stacking_factor < 1.0);
    CHECK(plain(s.sheet) >= 0.2e-3);
    CHECK(plain(s.sheet) <= 0.7e-3);
    CHECK(s.hysteresis_ratio > 0);
    CHECK(s.hysteresis_ratio < 1);
  }
}

TEST_CASE("every grade is found by its name, and a grade by its other names") {
  for (const steel& s : steels().all()) CHECK(steels().named(s.name, "test").name == s.name);
  CHECK(steels().named("m400 50a", "test").name == "M400-50A");
  CHECK(steels().named("36F155", "test").name == "M-19");
  CHECK(steels().named("Dynamoblech IV", "test").name == "dynamo sheet IV");
}

TEST_CASE("an unknown grade is refused with those near it", "[refusal]") {
  const auto faults = faults_of([] { steels().named("M400-50B", "/core/steel"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "unknown-name");
  CHECK(faults[0].where == "/core/steel");
  CHECK(faults[0].hint.find("M400-50A") != std::string::npos);
}

TEST_CASE("a shop's loss curve that falls is refused at its row", "[refusal]") {
  const auto folder = shop_folder("falling", "steel_loss.csv",
                                  std::string(loss_header) + "M-6,50,1,0.5,read,own\nM-6,50,1.5,0.4,read,own\n");
  const auto faults = faults_of([&] { steel_book book(catalogue::with_shop_rows({folder})); });
  REQUIRE_FALSE(faults.empty());
  CHECK(faults[0].code == "curve");
  CHECK(faults[0].where == (folder / "steel_loss.csv").string() + ":3");
}

TEST_CASE("a shop's loss curve with a lone point at a frequency is refused", "[refusal]") {
  const auto folder =
      shop_folder("lone", "steel_loss.csv",
                  std::string(loss_header) + "M130-30S,50,1.5,0.8,read,own\nM130-30S,60,1.5,1.1,read,own\n");
  CHECK_FALSE(faults_of([&] { steel_book book(catalogue::with_shop_rows({folder})); }).empty());
}

TEST_CASE("a shop's loss curve with its frequencies mixed up is refused or sorted", "[refusal]") {
  const auto folder = shop_folder("mixed", "steel_loss.csv",
                                  std::string(loss_header) +
                                      "M130-30S,50,1,0.4,read,own\nM130-30S,60,1,0.5,read,own\n"
                                      "M130-30S,50,0.5,0.1,read,own\nM130-30S,60,0.5,0.13,read,own\n"
                                      "M130-30S,50,1.5,1.2,read,own\nM130-30S,60,1.5,1.5,read,own\n");
  const auto faults = faults_of([&] {
    const steel_book book(catalogue::with_shop_rows({folder}));
    const loss_law law(book.named("M130-30S", "test"));
    CHECK(loss(law, 0.5, 50) == Approx(0.1));
    CHECK(loss(law, 1, 50) == Approx(0.4));
    CHECK(loss(law, 1.5, 50) == Approx(1.2));
    double before = 0;
    for (double b = 0.3; b < 1.8; b += 0.05) {
      CHECK(loss(law, b, 50) > before);
      before = loss(law, b, 50);
    }
  });
  if (!faults.empty()) CHECK(faults[0].code == "curve");
}

TEST_CASE("a grade whose curves nobody has is refused in its place", "[refusal]") {
  const auto folder = shop_folder(
      "no_curve", "steels.csv",
      "name,aliases,kind,sheet_mm,density_kg_per_m3,stacking_factor_ratio,loss_w_per_kg,loss_at_t,"
      "loss_at_hz,magnetisation_curve,loss_curve,hysteresis_ratio,flux_nominal_t,flux_high_t,standing,source\n"
      "Own 1,,non-oriented,0.5,7700,0.97,4,1.5,50,M-19,Own 1,0.7,1.3,1.5,read,own\n"
      "Own 2,,non-oriented,0.5,7700,0.97,4,1.5,50,Own 2,M-19,0.7,1.3,1.5,read,own\n"
      "Own 3,,magic,0.5,7700,0.97,4,1.5,50,M-19,M-19,0.7,1.3,1.5,read,own\n");
  const auto faults = faults_of([&] { steel_book book(catalogue::with_shop_rows({folder})); });
  const std::string file = (folder / "steels.csv").string();
  REQUIRE(faults.size() == 3);
  CHECK(faults[0].where == file + ":2:loss_curve");
  CHECK(faults[1].where == file + ":3:magnetisation_curve");
  CHECK(faults[2].where == file + ":4:kind");
}
