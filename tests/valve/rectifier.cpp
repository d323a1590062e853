#include <turnwright/valve/rectifier.hpp>

#include <turnwright/measure/literals.hpp>
#include <turnwright/valve/valve_book.hpp>

#include <near.hpp>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const valve_book& valves() {
  static const valve_book book(catalogue::bundled());
  return book;
}

const rectifier_type& rectifier(const std::string& name) { return valves().rectifier(name, "test"); }

double least(const std::string& name, double v, double f) {
  return plain(least_anode_resistance(rectifier(name), volts_rms{as<volts>(v)}, as<farads>(f)).value());
}

const char* rectifier_header =
    "type,arrangement,heated,heater_v,heater_a,peak_inverse_v,law,perveance_a_per_v1_5,drop_v,slope_ohm,read,derived,"
    "memory,weak,standing,source\n";

std::vector<remark> faults_of_row(const std::string& cells) {
  const auto folder = shop_folder("rectifier", "rectifiers.csv", rectifier_header + cells + "\n");
  return faults_of([&] { const valve_book book(catalogue::with_shop_rows({folder})); });
}

}  // namespace

TEST_CASE("the drop of a rectifier valve is the one its data sheet prints", "[published][valve_drops]") {
  for (const row& r : published("valve_drops")) {
    INFO(r.place());
    const rectifier_type& t = rectifier(r.text("type"));
    CHECK(plain(drop_of(t.law.value(), as<amperes>(r.needed("anode_a")))) ==
          within_percent(r.needed("drop_v"), r.needed("tolerance_percent")));
  }
}

TEST_CASE("the least anode resistance is the one its data sheet prints", "[published][anode_resistances]") {
  for (const row& r : published("anode_resistances")) {
    INFO(r.place());
    CHECK(least(r.text("type"), r.needed("at_v_rms"), r.needed("reservoir_f")) ==
          Approx(r.needed("ohm")).epsilon(1e-12));
  }
}

TEST_CASE("the least anode resistance goes straight from point to point and is held beyond the ends") {
  CHECK(least("EZ40", 262.5, 50e-6) == Approx(150));
  CHECK(least("EZ40", 325, 10e-6) == Approx(257.5));
  CHECK(least("EZ40", 100, 50e-6) == 125.0);
  CHECK(least("EZ40", 900, 50e-6) == 300.0);
  CHECK(least("EZ41", 10, 12e-6) == Approx(200));
  CHECK(least("EZ41", 250, 1e-6) == 150.0);
  CHECK(least("EZ41", 250, 100e-6) == 300.0);
  CHECK(least("GZ37", 300, 4e-6) == least("GZ37", 500, 60e-6));
  CHECK_FALSE(least_anode_resistance(rectifier("GZ33"), volts_rms{350_V}, 32_uF));
  CHECK_FALSE(least_anode_resistance(rectifier("silicon"), volts_rms{350_V}, 32_uF));
}

TEST_CASE("more volts or a larger reservoir never ask for less anode resistance", "[property]") {
  for (const rectifier_type& t : valves().rectifiers()) {
    if (t.least_resistances.empty()) continue;
    INFO(t.name);
    for (double v = 50; v < 1000; v += 13) {
      CHECK(least(t.name, v, 20e-6) <= least(t.name, v + 13, 20e-6) * (1 + 1e-12));
      CHECK(least(t.name, v, v * 1e-7) <= least(t.name, v, (v + 13) * 1e-7) * (1 + 1e-12));
    }
  }
}

TEST_CASE("drop rises with current and there is none without", "[property]") {
  for (const rectifier_type& t : valves().rectifiers()) {
    if (!t.law) continue;
    INFO(t.name);
    CHECK(plain(drop_of(*t.law, 0_A)) == 0.0);
    double before = 0;
    for (double i = 0.001; i < 2; i *= 1.3) {
      const double now = plain(drop_of(*t.law, as<amperes>(i)));
      CHECK(now >= before);
      before = now;
    }
  }
}

TEST_CASE("a three-halves law gives twice the drop at 2.83 times the current", "[property]") {
  for (const rectifier_type& t : valves().rectifiers()) {
    if (!t.law || !std::holds_alternative<three_halves_law>(*t.law)) continue;
    INFO(t.name);
    CHECK(plain(drop_of(*t.law, as<amperes>(0.02 * std::pow(2, 1.5)))) ==
          Approx(2 * plain(drop_of(*t.law, 20_mA))).epsilon(1e-12));
  }
}

TEST_CASE("mercury vapour drops 15 V at any current") {
  const rectifier_type& t = rectifier("83");
  CHECK(plain(drop_of(t.law.value(), 10_mA)) == 15.0);
  CHECK(plain(drop_of(t.law.value(), 1_A)) == 15.0);
  CHECK(t.known_how == standing::read);
}

TEST_CASE("plain silicon is 0.75 V and 0.3 ohm") {
  const rectifier_type& t = rectifier("Silicon");
  CHECK(t.sort == rectifier_sort::diode);
  CHECK(plain(drop_of(t.law.value(), 1_A)) == Approx(1.05));
  CHECK_FALSE(t.peak_inverse);
  CHECK_FALSE(t.heater_volts);
}

TEST_CASE("a silicon type drops what its sheet allows at the current of its sheet", "[property]") {
  for (const rectifier_type& t : valves().rectifiers()) {
    if (t.sort == rectifier_sort::valve || !t.drop) continue;
    INFO(t.name);
    CHECK(plain(drop_of(t.law.value(), *t.drop_at)) == Approx(plain(*t.drop)).epsilon(1e-12));
  }
}

TEST_CASE("the ratings of a rectifier valve hang together", "[property]") {
  for (const rectifier_type& t : valves().rectifiers()) {
    if (t.sort != rectifier_sort::valve) continue;
    INFO(t.name);
    CHECK(t.anodes.value.value() == (t.name.starts_with("6A") || t.name == "6BE3" || t.name == "6D22S" ? 1 : 2));
    if (t.peak_current && t.direct_current) CHECK((*t.peak_current).plain() > (*t.direct_current).plain());
    if (t.transient_peak && t.peak_current) CHECK(*t.transient_peak > *t.peak_current);
    const bool damper = *t.anodes == 1;
    if (t.peak_inverse && t.capacitor_input && !damper) {
      // 2 sqrt 2 times the volts of one anode, unless the volts are for a lower current or an older, milder rating
      CHECK(plain((*t.peak_inverse).plain()) > 2.7 * plain((*t.capacitor_input).plain()));
    }
    for (const standing s : {t.heater_volts.known_how, t.heater_current.known_how, t.anodes.known_how}) {
      CHECK(s >= t.known_how);
    }
  }
}

TEST_CASE("each figure has a standing of its own") {
  const rectifier_type& t = rectifier("GZ34");
  CHECK(t.heater_current.known_how == standing::read);
  CHECK(t.peak_inverse.known_how == standing::memory);
  CHECK(t.transient_peak.weak);
  CHECK_FALSE(t.peak_inverse.weak);
  CHECK(t.law_known_how == standing::read);
  CHECK(t.known_how == standing::memory);
  CHECK(rectifier("EZ41").peak_inverse.known_how == standing::derived);
  CHECK(rectifier("EZ41").law_known_how == standing::estimate);
  CHECK(rectifier("EZ41").law_weak);
}

TEST_CASE("a rectifier of the shop may have a straight drop with a slope") {
  const auto folder = shop_folder(
      "own", "rectifiers.csv",
      std::string(rectifier_header) + "866 class,half-wave,direct,2.5,5,10000,constant,,12,4,,,,,memory,own test\n");
  const valve_book book(catalogue::with_shop_rows({folder}));
  const rectifier_type& t = book.rectifier("866-class", "test");
  CHECK(plain(drop_of(t.law.value(), 500_mA)) == Approx(14));
  CHECK(t.source.find("own test") != std::string::npos);
}

TEST_CASE("rows of rectifiers that cannot be are refused with their cell", "[refusal]") {
  const std::vector<std::pair<std::string, std::string>> list{
      {"X1,full,direct,5,2,1400,,,,,,,,,memory,own", "arrangement"},
      {"X1,full-wave,warm,5,2,1400,,,,,,,,,memory,own", "heated"},
      {"X1,full-wave,direct,,2,1400,,,,,,,,,memory,own", "heater_v"},
      {"X1,full-wave,direct,5,-2,1400,,,,,,,,,memory,own", "heater_a"},
      {"X1,full-wave,direct,5,2,0,,,,,,,,,memory,own", "peak_inverse_v"},
      {"X1,full-wave,direct,5,2,1400,cubic,,,,,,,,memory,own", "law"},
      {"X1,full-wave,direct,5,2,1400,three-halves,,,,,,,,memory,own", "perveance_a_per_v1_5"},
      {"X1,full-wave,direct,5,2,1400,constant,,,,,,,,memory,own", "drop_v"},
      {"X1,full-wave,direct,5,2,1400,,,,,heater_w,,,,memory,own", "read"},
      {"X1,full-wave,direct,5,2,1400,,,,,heater_v,heater_v,,,memory,own", "derived"},
      {"X1,full-wave,direct,5,2,1400,,,,,,,heater_v,,memory,own", "memory"},
      {"X1,full-wave,direct,5,2,1400,,,,,,,,volts,memory,own", "weak"},
  };
  for (const auto& [cells, column] : list) {
    const auto faults = faults_of_row(cells);
    INFO(cells);
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].where.ends_with("rectifiers.csv:2:" + column));
  }
}

TEST_CASE("least resistances of a type are all at volts or all for reservoirs", "[refusal]") {
  const std::string header = "type,at_v_rms,reservoir_f,least_ohm,standing,source\n";
  const auto faults_with = [&](const std::string& rows) {
    const auto folder = shop_folder("resistances", "rectifier_resistances.csv", header + rows);
    return faults_of([&] { const valve_book book(catalogue::with_shop_rows({folder})); });
  };
  CHECK(faults_with("EZ40,250,,125,memory,own\nEZ40,300,,200,memory,own\n").empty());
  CHECK(faults_with("EZ40,250,,125,memory,own\nEZ40,,8e-6,200,memory,own\n").size() == 1);
  CHECK(faults_with("EZ40,250,,125,memory,own\nEZ40,250,,200,memory,own\n").size() == 1);
  CHECK(faults_with("EZ40,,,125,memory,own\nEZ40,,,200,memory,own\n").size() == 1);
  CHECK(faults_with("EZ99,250,,125,memory,own\n").size() == 1);
}
