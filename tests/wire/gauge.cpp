#include <turnwright/wire/copper.hpp>
#include <turnwright/wire/gauge.hpp>

#include <near.hpp>

#include <random>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const wire_book& wires() {
  static const wire_book book(catalogue::bundled());
  return book;
}

constexpr wire_system all_systems[] = {wire_system::metric, wire_system::awg, wire_system::swg};

const gauge named(const std::string& size) {
  const looked_up_gauge found = wires().look_up(size, "test");
  REQUIRE(found.exact);
  return found.wire;
}

double mm(metres x) { return plain(x) * 1e3; }

gauge bare_wire(double bare_mm) {
  gauge g;
  g.bare = as<metres>(bare_mm * 1e-3);
  return g;
}

void check_film(const row& r, const gauge& g, const char* column, const char* grade) {
  if (!r.number(column)) return;
  REQUIRE(overall(g, grade));
  CHECK(mm(*overall(g, grade)) == Approx(r.needed(column)).margin(r.needed("tolerance_mm")).epsilon(0));
}

remark only_fault(const std::string& size) {
  const auto faults = faults_of([&] { wires().look_up(size, "/windings/0/wire"); });
  INFO("size: " << size);
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].where == "/windings/0/wire");
  return faults[0];
}

}  // namespace

TEST_CASE("metric wire is over its enamel as thick as the standard lets it be", "[published][iec60317_films]") {
  for (const row& r : published("iec60317_films")) {
    INFO(r.place());
    const gauge g = named(r.text("bare_mm") + " mm");
    CHECK(mm(g.bare) == Approx(r.needed("bare_mm")).epsilon(1e-12));
    check_film(r, g, "grade1_mm", "1");
    check_film(r, g, "grade2_mm", "2");
    check_film(r, g, "grade3_mm", "3");
  }
}

TEST_CASE("metric wire has the limits of resistance that are printed", "[published][iec60317_resistance]") {
  for (const row& r : published("iec60317_resistance")) {
    INFO(r.place());
    const gauge g = named(r.text("bare_mm") + " mm");
    const double tolerance = r.needed("tolerance_percent");
    REQUIRE(g.resistance_least);
    REQUIRE(g.resistance_most);
    CHECK(plain(*g.resistance_least) == within_percent(r.needed("resistance_min_ohm_per_m"), tolerance));
    CHECK(plain(*g.resistance_most) == within_percent(r.needed("resistance_max_ohm_per_m"), tolerance));
    // The printed nominal is by 1/58.5, our design figure by 1/58; the roundings of both tables are within 0.2 %.
    CHECK(plain(resistance_at_20(g)) == within_percent(r.needed("resistance_nominal_ohm_per_m") * 58.5 / 58, 0.2));
  }
}

TEST_CASE("imperial wire has the legal diameters and the printed enamel", "[published][swg]") {
  for (const row& r : published("swg")) {
    INFO(r.place());
    const gauge g = named(r.text("number") + " SWG");
    CHECK(plain(g.bare) == Approx(r.needed("bare_in") * 0.0254).epsilon(1e-12));
    CHECK(mm(g.bare) == Approx(r.needed("bare_mm")).margin(r.needed("tolerance_mm")).epsilon(0));
    check_film(r, g, "grade1_mm", "1");
    check_film(r, g, "grade2_mm", "2");
    check_film(r, g, "grade3_mm", "3");
  }
}

TEST_CASE("American wire has the printed diameters, by the rule and by the list", "[published][awg_bare]") {
  for (const row& r : published("awg_bare")) {
    INFO(r.place());
    const gauge g = named(r.text("number") + " AWG");
    const double printed_in = r.needed("bare_in"), tolerance_in = r.needed("tolerance_in");
    CHECK(plain(g.bare) / 0.0254 == Approx(printed_in).margin(tolerance_in).epsilon(0));
    CHECK(plain(awg_diameter(r.needed("number"))) / 0.0254 == Approx(printed_in).margin(tolerance_in).epsilon(0));
    REQUIRE(g.listed);
    CHECK(plain(*g.listed) == Approx(printed_in * 0.0254).epsilon(1e-4));
  }
}

TEST_CASE("American wire is over its film as thick as the list lets it be", "[published][awg_films]") {
  for (const row& r : published("awg_films")) {
    INFO(r.place());
    const auto over = overall(named(r.text("number") + " AWG"), r.text("grade"));
    REQUIRE(over);
    CHECK(plain(*over) / 0.0254 == Approx(r.needed("overall_in")).margin(r.needed("tolerance_in")).epsilon(0));
  }
}

TEST_CASE("American wire weighs and resists as its list says", "[published][awg_resistance]") {
  for (const row& r : published("awg_resistance")) {
    INFO(r.place());
    gauge g = named(r.text("number") + " AWG");
    REQUIRE(g.listed);
    g.bare = *g.listed;
    CHECK(plain(resistance_at_20(g)) * 1e3 ==
          within_percent(r.needed("resistance_ohm_per_km"), r.needed("resistance_tolerance_percent")));
    CHECK(plain(mass_per_metre(g)) * 1e3 ==
          within_percent(r.needed("mass_kg_per_km"), r.needed("mass_tolerance_percent")));
  }
}

TEST_CASE("a worked M55 transformer has our wire areas and resistance", "[published][m55]") {
  for (const row& r : published("m55")) {
    INFO(r.place());
    const gauge g = bare_wire(r.needed("bare_mm"));
    CHECK(plain(bare_area(g)) * 1e6 == within_percent(r.needed("area_mm2"), 0.1));
    if (!r.number("resistance_ohm")) continue;
    const double page_over_ours = 2e-8 / plain(copper::resistivity_20);
    CHECK(plain(resistance_at_20(g)) * r.needed("length_m") * page_over_ours ==
          within_percent(r.needed("resistance_ohm"), r.needed("tolerance_percent")));
  }
}

TEST_CASE("hot copper resists more by the known factors", "[published][copper]") {
  for (const row& r : published("copper")) {
    INFO(r.place());
    CHECK(copper::over_20(celsius(r.needed("temperature_c"))) ==
          within_percent(r.needed("factor"), r.needed("tolerance_percent")));
  }
  CHECK(copper::over_20(celsius(20)) == Approx(1).epsilon(1e-15));
}

TEST_CASE("the design resistance of every metric wire lies within the limits of the standard", "[property]") {
  int sizes = 0;
  for (const gauge& g : wires().sizes(wire_system::metric)) {
    INFO(g.size);
    REQUIRE(g.resistance_least);
    REQUIRE(g.resistance_most);
    CHECK(*g.resistance_least < resistance_at_20(g));
    CHECK(resistance_at_20(g) < *g.resistance_most);
    ++sizes;
  }
  CHECK(sizes == 85);
}

TEST_CASE("every wire is thicker over each enamel than over the one before, and thinnest sizes stand first",
          "[property]") {
  for (const wire_system s : all_systems) {
    const gauge* before = nullptr;
    for (const gauge& g : wires().sizes(s)) {
      INFO(g.size);
      CHECK(g.system == s);
      if (before) CHECK(before->bare < g.bare);
      metres under = g.bare;
      for (const film& f : g.films) {
        CHECK(under < f.overall);
        under = f.overall;
      }
      before = &g;
    }
  }
}

// Printed charts have had 2.772 mm for 2.722 mm and 0.232 mm for 0.323 mm; such slips stand out here.
TEST_CASE("the film grows smoothly from size to size", "[property]") {
  const double allowance_mm[] = {0.002, 0.003, 0.002};  // three decimals; AWG tenths of a mil
  const double part[] = {0.02, 0.06, 0.02};
  for (const wire_system s : all_systems) {
    const auto at = static_cast<std::size_t>(s);
    for (const char* grade : {"1", "2", "3"}) {
      std::vector<const gauge*> filmed;
      for (const gauge& g : wires().sizes(s)) {
        if (overall(g, grade)) filmed.push_back(&g);
      }
      const auto increase = [&](std::size_t i) { return mm(*overall(*filmed[i], grade)) - mm(filmed[i]->bare); };
      for (std::size_t i = 1; i + 1 < filmed.size(); ++i) {
        INFO(filmed[i]->size << " grade " << grade);
        CHECK(std::abs(increase(i) - (increase(i - 1) + increase(i + 1)) / 2) <
              allowance_mm[at] + part[at] * increase(i));
      }
    }
  }
}

// The rule for sizes between those of the R20 series, seen at work in the charts of imperial wire; a chart that had
// 0.417 mm for 0.415 mm and 2.018 mm for 2.108 mm broke it.
TEST_CASE("an in-between size has the film of the next larger size of the main series", "[property]") {
  const double main_series[] = {0.04, 0.045, 0.05, 0.056, 0.063, 0.071, 0.08, 0.09,  0.1,   0.112, 0.125,
                                0.14, 0.16,  0.18, 0.2,   0.224, 0.25,  0.28, 0.315, 0.355, 0.4,   0.45,
                                0.5,  0.56,  0.63, 0.71,  0.8,   0.9,   1,    1.12,  1.25,  1.4,   1.6,
                                1.8,  2,     2.24, 2.5,   2.8,   3.15,  3.55, 4,     4.5,   5};
  for (const wire_system s : {wire_system::metric, wire_system::swg}) {
    for (const gauge& g : wires().sizes(s)) {
      // Bare and overall are rounded to 0.001 mm; fine sizes have rows of their own, up to 0.002 mm off the rule.
      const double tolerance_mm = mm(g.bare) > 0.195 ? 0.0011 : 0.0022;
      const double* next = std::find_if(std::begin(main_series), std::end(main_series),
                                        [&](double x) { return x > mm(g.bare) - 0.0005; });
      REQUIRE(next != std::end(main_series));
      const gauge& larger = wires().nearest(wire_system::metric, as<metres>(*next * 1e-3));
      REQUIRE(mm(larger.bare) == Approx(*next));
      for (const char* grade : {"1", "2", "3"}) {
        if (!overall(g, grade) || !overall(larger, grade)) continue;
        INFO(g.size << " grade " << grade);
        CHECK(mm(*overall(g, grade)) - mm(g.bare) ==
              Approx(mm(*overall(larger, grade)) - *next).margin(tolerance_mm).epsilon(0));
      }
    }
  }
}

TEST_CASE("ten American gauges finer is ten times the resistance") {
  const double ratio = plain(resistance_at_20(named("34 AWG"))) / plain(resistance_at_20(named("24 AWG")));
  CHECK(ratio == Approx(10).epsilon(0.02));  // 92^(20/39) = 10.16
}

TEST_CASE("a size is known by each of its names") {
  for (const char* text : {"0.5 mm", "0.50 mm", "0.500 mm", "0.5mm", "0.5 MM"}) CHECK(named(text).size == "0.5 mm");
  for (const char* text : {"24 AWG", "AWG 24", "24awg", "AWG-24"}) CHECK(named(text).size == "24 AWG");
  for (const char* text : {"33 SWG", "SWG 33", "swg33"}) CHECK(named(text).size == "33 SWG");
  for (const wire_system s : all_systems) {
    for (const gauge& g : wires().sizes(s)) {
      INFO(g.size);
      CHECK(named(g.size).size == g.size);
      for (const std::string& other : g.also) CHECK(named(other).size == g.size);
    }
  }
}

TEST_CASE("a diameter between two sizes is the nearer one, and says that it is not exact") {
  const auto nearest_to = [](const char* text) {
    const looked_up_gauge found = wires().look_up(text, "test");
    CHECK_FALSE(found.exact);
    return found.wire.size;
  };
  CHECK(nearest_to("0.51 mm") == "0.5 mm");
  CHECK(nearest_to("0.52 mm") == "0.53 mm");
  CHECK(nearest_to("0.02 in") == "0.5 mm");
  CHECK(nearest_to("20 mil") == "0.5 mm");
  CHECK(nearest_to("24.4 AWG") == "24.5 AWG");
  CHECK(nearest_to("7 AWG") == "8 AWG");
  CHECK(nearest_to("99 AWG") == "44 AWG");
}

TEST_CASE("the nearest size has no other nearer", "[property]") {
  std::mt19937 random(1884);
  std::uniform_real_distribution<double> exponent(-1.6, 0.8);
  for (int i = 0; i < 1000; ++i) {
    const metres bare = as<metres>(1e-3 * std::pow(10.0, exponent(random)));
    for (const wire_system s : all_systems) {
      const auto off = [&](const gauge& g) { return std::abs(std::log(plain(g.bare) / plain(bare))); };
      const double best = off(wires().nearest(s, bare));
      for (const gauge& g : wires().sizes(s)) {
        if (off(g) < best) FAIL(g.size);
      }
    }
  }
}

TEST_CASE("the thinnest wire that is thick enough has enamel, and the next thinner would not do", "[property]") {
  std::mt19937 random(60317);
  std::uniform_real_distribution<double> exponent(-3, 1.2);
  for (int i = 0; i < 1000; ++i) {
    const square_metres area = as<square_metres>(1e-6 * std::pow(10.0, exponent(random)));
    for (const wire_system s : all_systems) {
      const gauge* wanted = nullptr;
      for (const gauge& g : wires().sizes(s)) {
        if (wanted || g.films.empty() || bare_area(g) < area) continue;
        wanted = &g;
      }
      if (wires().at_least(s, area) != wanted) FAIL(plain(area) * 1e6 << " mm2");
    }
  }
  CHECK(wires().at_least(wire_system::metric, as<square_metres>(100e-6)) == nullptr);
  for (const wire_system s : all_systems) {
    const gauge& thickest = wires().thickest(s);
    CHECK_FALSE(thickest.films.empty());
    CHECK(wires().at_least(s, bare_area(thickest)) == &thickest);
    CHECK(wires().at_least(s, bare_area(thickest) * 1.0001) == nullptr);
  }
}

TEST_CASE("a grade that a size has not gives way to the thickest it has") {
  const gauge awg = named("24 AWG");
  REQUIRE(film_of(awg, "single"));
  CHECK(film_of(awg, "1")->grade == "single");
  REQUIRE(film_of(awg, "3"));
  CHECK(film_of(awg, "3")->grade == "heavy");
  CHECK(film_of(named("24.5 AWG"), "1") == nullptr);
}

TEST_CASE("single and heavy are grades 1 and 2 in every system") {
  CHECK(overall(named("0.5 mm"), "heavy") == overall(named("0.5 mm"), "2"));
  CHECK(overall(named("24 AWG"), "1") == overall(named("24 AWG"), "single"));
  CHECK_FALSE(overall(named("24 AWG"), "3"));
  CHECK_FALSE(overall(named("24.5 AWG"), "1"));
}

TEST_CASE("a gauge number without its system is refused", "[refusal]") {
  const remark bare = only_fault("24");
  CHECK(bare.code == "gauge-system");
  CHECK(bare.found == "\"24\"");
  CHECK(bare.hint == "a gauge number means nothing without its system: AWG, SWG or mm");
  CHECK(only_fault("0.5").code == "gauge-system");
}

TEST_CASE("a text that is no wire size is refused", "[refusal]") {
  for (const char* text : {"", "thin", "AWG", "SWG", "4/0 AWG", "0 mm", "5 V", "24 BWG"})
    CHECK(only_fault(text).code == "unknown-name");
}

TEST_CASE("an imperial number that the table lacks is refused with the table's ends", "[refusal]") {
  for (const char* text : {"33.5 SWG", "51 SWG", "7 SWG"}) {
    const remark r = only_fault(text);
    CHECK(r.code == "unknown-name");
    CHECK(r.wanted == "an SWG number from 8 SWG to 50 SWG");
  }
}

TEST_CASE("a wire of less than no thickness is refused", "[refusal]") {
  for (const char* text : {"-0.5 mm", "-1 mm"}) CHECK(faults_of([&] { wires().look_up(text, "test"); }).size() == 1);
}

TEST_CASE("a shop's wire with enamel no thicker than the copper is refused, each fault in its place", "[refusal]") {
  const auto folder = shop_folder("thin_film", "wire_swg.csv",
                                  "size,aliases,bare_mm,grade1_mm,grade2_mm,grade3_mm,tolerance_mm,standing,source\n"
                                  "24 SWG,,0.5588,0.5588,,,,read,own\n"
                                  "25 SWG,,0.508,0.56,0.55,,,read,own\n"
                                  "26 SWG,,0,0.5,,,,read,own\n"
                                  "27 SWG,,0.4,x,,,,read,own\n"
                                  "28 SWG,,0.37,0.4,,,,perhaps,own\n");
  const auto faults = faults_of([&] { wire_book book(catalogue::with_shop_rows({folder})); });
  const std::string file = (folder / "wire_swg.csv").string();
  REQUIRE(faults.size() == 5);
  CHECK(faults[0].where == file + ":2:grade1_mm");
  CHECK(faults[1].where == file + ":3:grade2_mm");
  CHECK(faults[2].where == file + ":4:bare_mm");
  CHECK(faults[3].code == "bad-number");
  CHECK(faults[4].code == "unknown-standing");
}

TEST_CASE("a shop's own size is found and chosen") {
  const auto folder =
      shop_folder("own_size", "wire_metric.csv",
                  "size,aliases,bare_mm,grade1_mm,grade2_mm,grade3_mm,tolerance_mm,resistance_min_ohm_per_m,"
                  "resistance_max_ohm_per_m,standing,source\n0.51 mm,half and a bit,0.51,0.555,,,,,,read,own reel\n");
  const wire_book book(catalogue::with_shop_rows({folder}));
  CHECK(book.look_up("half and a bit", "test").wire.size == "0.51 mm");
  const gauge* chosen = book.at_least(wire_system::metric, bare_area(bare_wire(0.505)));
  REQUIRE(chosen);
  CHECK(chosen->size == "0.51 mm");
}
