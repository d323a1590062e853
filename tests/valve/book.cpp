#include <turnwright/valve/valve_book.hpp>

#include <turnwright/measure/literals.hpp>

#include <near.hpp>

#include <set>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const valve_book& valves() {
  static const valve_book book(catalogue::bundled());
  return book;
}

std::string reported(const std::string& name) {
  const found_valve found = valves().named(name, "test");
  return found.rectifier ? found.rectifier->name : found.amplifier->name;
}

}  // namespace

TEST_CASE("names match without regard to case, blanks and hyphens, and by alias") {
  const std::vector<std::pair<std::string, std::string>> list{
      {"5U4GB", "5U4-GB"}, {"gz34", "5AR4"},    {"5ar4", "5AR4"},  {"6L6GC", "6L6-GC"},  {"6l6", "6L6-GC"},
      {"12ax7", "ECC83"},  {"ecc 83", "ECC83"}, {"5Y3", "5Y3-GT"}, {"5R4", "5R4-GY"},    {"6V6", "6V6-GT"},
      {"6SN7", "6SN7-GT"}, {"6SL7", "6SL7-GT"}, {"2a3", "2A3"},    {"GZ32", "5V4-G"},    {"5V4", "5V4-G"},
      {"6X5", "6X5-GT"},   {"5Z4", "5Z4-G"},    {"GZ30", "5Z4-G"}, {"6x4", "EZ90"},      {"6CA4", "EZ81"},
      {"6BQ5", "EL84"},    {"6CA7", "EL34"},    {"6V4", "EZ80"},   {"1n4007", "1N4007"}, {"80", "80"},
  };
  for (const auto& [asked, name] : list) {
    INFO(asked);
    CHECK(reported(asked) == name);
  }
}

TEST_CASE("every row is found by its own name", "[property]") {
  std::set<std::string> seen;
  for (const rectifier_type& t : valves().rectifiers()) {
    CHECK(reported(t.name) == t.name);
    CHECK(seen.insert(name_key(t.name)).second);
  }
  for (const amplifying_valve& v : valves().amplifiers()) {
    CHECK(reported(v.name) == v.name);
    CHECK(seen.insert(name_key(v.name)).second);
  }
  CHECK(valves().amplifiers().size() >= 86);
  for (const output_stage& s : valves().stages()) {
    INFO(s.type);
    CHECK(reported(s.type) == s.type);
  }
}

TEST_CASE("no alias of an amplifying valve stands for two", "[property]") {
  for (const amplifying_valve& v : valves().amplifiers()) {
    for (const std::string& name : v.also) {
      INFO(name);
      CHECK(reported(name) == v.name);
    }
  }
}

TEST_CASE("a name that fits two types is refused with both", "[refusal]") {
  const auto faults = faults_of([] { valves().rectifier("5U4", "/rectifier"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "ambiguous-name");
  CHECK(faults[0].where == "/rectifier");
  CHECK(faults[0].wanted == "one of: 5U4-G, 5U4-GB");
  CHECK(faults_of([] { valves().named("5u4", "x"); }).at(0).code == "ambiguous-name");
}

TEST_CASE("an unknown name is refused with the nearest", "[refusal]") {
  const auto faults = faults_of([] { valves().named("GZ35", "valve"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "unknown-name");
  CHECK(faults[0].hint.find("GZ34") != std::string::npos);
}

TEST_CASE("an amplifying valve is no rectifier, and the refusal says so", "[refusal]") {
  const auto faults = faults_of([] { valves().rectifier("el84", "/rectifier"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "unknown-name");
  CHECK(faults[0].hint == "this is an amplifying valve");
}

TEST_CASE("a heater connected the other way takes the same power", "[property]") {
  int found = 0;
  for (const amplifying_valve& v : valves().amplifiers()) {
    if (!v.other_heater_volts) continue;
    INFO(v.name);
    CHECK(plain(*v.heater_volts * *v.heater_current) ==
          Approx(plain(*v.other_heater_volts * *v.other_heater_current)).epsilon(1e-9));
    ++found;
  }
  CHECK(found == 9);
}

TEST_CASE("no valve draws more at rest than at full drive, but for class A", "[property]") {
  for (const output_stage& s : valves().stages()) {
    INFO(s.type << " " << s.operation);
    if (s.anode_idle && s.anode_full) CHECK(*s.anode_idle <= *s.anode_full);
    if (s.screen_idle && s.screen_full) CHECK(*s.screen_idle <= *s.screen_full);
  }
}

TEST_CASE("the output of a stage is below the power it draws from the HT", "[property]") {
  for (const output_stage& s : valves().stages()) {
    if (!s.power || !s.anode_volts || !s.anode_full) continue;
    INFO(s.type << " " << s.operation);
    CHECK(plain(*s.power) < 0.75 * plain(s.anode_volts->plain() * s.anode_full->plain()));
  }
}
