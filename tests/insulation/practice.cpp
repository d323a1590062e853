#include <turnwright/insulation/practice.hpp>

#include <turnwright/measure/literals.hpp>
#include <turnwright/wire/gauge.hpp>

#include <near.hpp>

#include <random>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const insulation_book& practice() {
  static const insulation_book book(catalogue::bundled());
  return book;
}

volts_rms working(double v) { return volts_rms{as<volts>(v)}; }

double mm(metres x) { return plain(x) * 1e3; }

double plain_v(volts_rms v) { return plain(v.plain()); }

constexpr double hair = 0.04e-3;  // finer than 41 AWG: least margin by gauge

}  // namespace

TEST_CASE("the margin is never under the creepage for its working volts", "[published][creepage]") {
  for (const row& r : published("creepage")) {
    INFO(r.place());
    const double v = r.needed("working_v_rms"), creepage = r.needed("creepage_mm");
    CHECK(mm(practice().end_margin(as<metres>(hair), working(v)).value) == Approx(creepage).epsilon(1e-9));
    CHECK(mm(practice().end_margin(as<metres>(hair), working(v - 0.01)).value) == Approx(creepage).epsilon(1e-4));
  }
}

TEST_CASE("the margin and the paper of a gauge are those of the table", "[published][gauge_margins]") {
  for (const row& r : published("gauge_margins")) {
    INFO(r.place());
    const metres bare = awg_diameter(r.needed("number"));
    const auto near = [&](const char* column) {
      return Approx(r.needed(column)).margin(r.needed("tolerance_in")).epsilon(0);
    };
    const reasoned_length margin = practice().end_margin(bare, working(1));
    // creepage asks for 3 mm even at low volts, so finer gauges take that
    CHECK(plain(margin.value) / 0.0254 ==
          Approx(std::max(r.needed("margin_in"), 3.0 / 25.4)).margin(r.needed("tolerance_in")).epsilon(0));
    CHECK(plain(practice().interlayer(bare, working(1)).value) / 0.0254 == near("paper_in"));
  }
}

TEST_CASE("test volts are those recalled of the standard", "[published][test_volts]") {
  for (const row& r : published("test_volts")) {
    INFO(r.place());
    const volts_rms v = working(r.needed("working_v_rms"));
    CHECK(plain_v(practice().test_basic(v)) == Approx(r.needed("basic_v_rms")).epsilon(1e-12));
    CHECK(plain_v(practice().test_reinforced(v)) == Approx(r.needed("reinforced_v_rms")).epsilon(1e-12));
  }
}

TEST_CASE("enamel breaks down at no less than the printed volts, by size and grade", "[published][enamel_breakdown]") {
  const wire_book wires(catalogue::bundled());
  for (const row& r : published("enamel_breakdown")) {
    INFO(r.place());
    const metres gauge_bare = wires.look_up(r.text("swg") + " SWG", "test").wire.bare;
    for (const metres& bare : {as<metres>(r.needed("bare_mm") * 1e-3), gauge_bare}) {
      for (int grade = 1; grade <= 3; ++grade) {
        const auto printed = r.number("grade" + std::to_string(grade) + "_v_rms");
        const auto found = practice().enamel_breakdown(bare, grade);
        REQUIRE(found.has_value() == printed.has_value());
        if (printed) CHECK(plain_v(*found) == *printed);
      }
    }
  }
}

TEST_CASE("the margin is that for the gauge or that for the volts, whichever is more") {
  const metres thick = 1.6_mm, fine = 0.1_mm;
  const reasoned_length gauge = practice().end_margin(thick, working(230));
  CHECK(mm(gauge.value) == Approx(6.35));
  CHECK(gauge.why.find("gauge") != std::string::npos);
  const reasoned_length creepage = practice().end_margin(fine, working(700));
  CHECK(mm(creepage.value) == Approx(5.5));
  CHECK(creepage.why.find("700 V") != std::string::npos);
  CHECK(mm(practice().end_margin(thick, working(1250)).value) == Approx(12.5));
}

TEST_CASE("the margin never falls with volts nor with thicker wire", "[property]") {
  for (const double bare : {0.05e-3, 0.2e-3, 0.5e-3, 1e-3, 2e-3}) {
    double before = 0;
    for (double v = 0; v <= 6000; v += 5) {
      const double now = plain(practice().end_margin(as<metres>(bare), working(v)).value);
      if (now < before) FAIL("falls at " << v << " V");
      before = now;
    }
  }
  for (const double v : {0.0, 300.0, 900.0, 2000.0}) {
    double before = 0;
    for (double bare = 0.02e-3; bare < 3e-3; bare *= 1.01) {
      const double now = plain(practice().end_margin(as<metres>(bare), working(v)).value);
      if (now < before) FAIL("falls at " << bare);
      before = now;
    }
  }
}

TEST_CASE("paper between layers never falls with thicker wire nor with volts", "[property]") {
  for (const double v : {0.0, 50.0, 101.0, 500.0}) {
    double before = 0;
    for (double bare = 0.02e-3; bare < 3e-3; bare *= 1.01) {
      const double now = plain(practice().interlayer(as<metres>(bare), working(v)).value);
      if (now < before) FAIL("falls at " << bare);
      before = now;
    }
  }
  CHECK(mm(practice().interlayer(0.1_mm, working(99)).value) < 0.05);
  const reasoned_length more = practice().interlayer(0.1_mm, working(150));
  CHECK(mm(more.value) == Approx(0.05));
  CHECK(more.why.find("100 V") != std::string::npos);
}

TEST_CASE("test volts never fall with working volts, and reinforced is tested at least as hard as basic",
          "[property]") {
  double basic = 0, reinforced = 0;
  for (double v = 0; v <= 5000; v += 3) {
    const double b = plain_v(practice().test_basic(working(v))), r = plain_v(practice().test_reinforced(working(v)));
    if (b < basic || r < reinforced || r < b) FAIL(v);
    basic = b;
    reinforced = r;
  }
  CHECK(plain_v(practice().test_basic(working(2000))) == Approx(2 * 2750));  // beyond the table in proportion
}

TEST_CASE("breakdown volts rise with the grade and are unknown where the table is silent", "[property]") {
  for (double bare = 0.03e-3; bare < 5e-3; bare *= 1.02) {
    double before = 0;
    for (int grade = 1; grade <= 3; ++grade) {
      const auto v = practice().enamel_breakdown(as<metres>(bare), grade);
      if (!v) continue;
      if (plain_v(*v) <= before) FAIL(bare);
      before = plain_v(*v);
    }
  }
  CHECK_FALSE(practice().enamel_breakdown(0.5_mm, 0));
  CHECK_FALSE(practice().enamel_breakdown(0.5_mm, 4));
  CHECK_FALSE(practice().enamel_breakdown(6_mm, 1));
  CHECK_FALSE(practice().enamel_breakdown(0.05_mm, 3));
}

TEST_CASE("a shop's own margin for some volts is used") {
  const auto folder =
      shop_folder("margin", "margins_by_volts.csv", "working_v_rms,margin_mm,standing,source\n440,7,read,own rule\n");
  const insulation_book own(catalogue::with_shop_rows({folder}));
  CHECK(mm(own.end_margin(0.1_mm, working(400)).value) == Approx(7));
  CHECK(mm(own.end_margin(0.1_mm, working(200)).value) ==
        Approx(mm(practice().end_margin(0.1_mm, working(200)).value)));
}

TEST_CASE("a shop's own margin for one gauge leaves those of the other gauges") {
  const auto folder = shop_folder("gauge", "margins_by_gauge.csv",
                                  "bare_least_mm,margin_mm,interlayer_mm,standing,source\n0.36,4,0.06,read,own rule\n");
  const insulation_book own(catalogue::with_shop_rows({folder}));
  CHECK(mm(own.end_margin(0.4_mm, working(1)).value) == Approx(4));
  CHECK(mm(own.end_margin(1.6_mm, working(1)).value) == Approx(6.35));
}

TEST_CASE("a bad figure in a shop's insulation table is refused in its place", "[refusal]") {
  const auto folder = shop_folder("bad_test", "test_volts.csv",
                                  "working_v_rms,basic_v_rms,reinforced_v_rms,standing,source\n50,,500,read,own\n");
  const auto faults = faults_of([&] { insulation_book book(catalogue::with_shop_rows({folder})); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "missing");
  CHECK(faults[0].where == (folder / "test_volts.csv").string() + ":2:basic_v_rms");
}
