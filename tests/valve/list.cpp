#include <turnwright/valve/valve_list.hpp>

#include <turnwright/measure/literals.hpp>

#include <near.hpp>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const valve_book& valves() {
  static const valve_book book(catalogue::bundled());
  return book;
}

std::vector<valve_count> list_of(const std::vector<std::string>& texts) {
  std::vector<valve_count> list;
  std::vector<remark> faults;
  for (const std::string& text : texts) {
    if (auto v = read_valve_count(text, "test", valves(), faults)) list.push_back(*v);
  }
  if (!faults.empty()) throw refused(faults);
  return list;
}

double heater_a(const std::vector<std::string>& texts, volts heater = 6.3_V) {
  return plain(heater_current(list_of(texts), heater).current);
}

double full_a(const std::vector<std::string>& texts) {
  return plain(first_guess_ht_current(list_of(texts), valves()).full.plain());
}

double idle_a(const std::vector<std::string>& texts) {
  return plain(first_guess_ht_current(list_of(texts), valves()).idle.plain());
}

}  // namespace

TEST_CASE("a count and a type are read however they are spaced") {
  const std::vector<std::pair<std::string, std::pair<int, std::string>>> all{
      {"2 x EL34", {2, "EL34"}},
      {"3xECC83", {3, "ECC83"}},
      {"EL84", {1, "EL84"}},
      {" 4X el84 ", {4, "EL84"}},
      {"2 \xC3\x97 6L6", {2, "6L6-GC"}},
      {"6X4", {1, "EZ90"}},
      {"6X5", {1, "6X5-GT"}},
      {"2x6X4", {2, "EZ90"}},
      {"12AX7", {1, "ECC83"}},
      {"2 x 12AX7", {2, "ECC83"}},
      {"1 x 807", {1, "807"}},
      {"45", {1, "45"}},
  };
  for (const auto& [text, wanted] : all) {
    INFO(text);
    const auto list = list_of({text});
    REQUIRE(list.size() == 1);
    CHECK(list[0].count == wanted.first);
    CHECK(name_of(list[0]) == wanted.second);
  }
}

TEST_CASE("a list that cannot be read is refused with its place", "[refusal]") {
  const std::vector<std::pair<std::string, std::string>> all{
      {"", "empty"},
      {"  ", "empty"},
      {"0 x EL84", "out-of-range"},
      {"101 x EL84", "out-of-range"},
      {"99999999999 x EL84", "out-of-range"},
      {"2 x EL85", "unknown-name"},
      {"2 EL84", "unknown-name"},
      {"-2 x EL84", "unknown-name"},
      {"two x EL84", "unknown-name"},
      {"2 x 5U4", "ambiguous-name"},
      {"6X9", "unknown-name"},
  };
  for (const auto& [text, code] : all) {
    std::vector<remark> faults;
    INFO(text);
    CHECK_FALSE(read_valve_count(text, "/valves/0", valves(), faults));
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == code);
    CHECK(faults[0].where == "/valves/0");
  }
}

TEST_CASE("heaters of a list add up") {
  CHECK(heater_a({"2 x EL84", "2 x ECC83"}) == Approx(2 * 0.76 + 2 * 0.3));  // valve database, data sheets restated
  CHECK(heater_a({"2 x EL34", "3xECC83", "EZ81"}) == Approx(2 * 1.5 + 3 * 0.3 + 1.0));
  CHECK(heater_a({}) == 0.0);
  CHECK(heater_a({"4 x 1N4007", "silicon"}) == 0.0);
}

TEST_CASE("a heater with two halves is reckoned by the volts it gets") {
  CHECK(heater_a({"2 x ECC83"}, 12.6_V) == Approx(0.3));
  CHECK(heater_a({"2 x ECC83", "12BH7"}, 6.3_V) == Approx(1.2));
  const auto list = list_of({"2 x EL84"});
  CHECK(plain(heater_current(list, 12.6_V).current) == 0.0);
  CHECK(heater_current(list, 12.6_V).others == std::vector<std::string>{"2 x EL84, 6.3 V 1.52 A"});
}

TEST_CASE("valves with another heater are told apart and not added") {
  const auto load = heater_current(list_of({"2 x 2A3", "6SN7", "GZ34", "2 x 300B"}), 6.3_V);
  CHECK(plain(load.current) == Approx(0.6));
  CHECK(load.others ==
        std::vector<std::string>{"2 x 2A3, 2.5 V 5 A", "1 x 5AR4, 5.0 V 1.9 A", "2 x 300B, 5.0 V 2.4 A"});
  CHECK(plain(heater_current(list_of({"2 x 2A3"}), 2.5_V).current) == Approx(5));
}

TEST_CASE("a heater current is known no better than the worst of its parts") {
  CHECK(heater_current(list_of({"2 x EL84"}), 6.3_V).known_how == standing::read);
  CHECK(heater_current(list_of({"2 x EL84", "5751"}), 6.3_V).known_how == standing::memory);
}

TEST_CASE("a pair of output valves draws what its class AB stage does") {
  // the stage of two EL84 at 300 V: 92 + 22 mA driven, 72 + 8 mA idle (European data sheets, from memory)
  CHECK(full_a({"2 x EL84"}) == Approx(0.114));
  CHECK(idle_a({"2 x EL84"}) == Approx(0.080));
  CHECK(full_a({"EL84", "EL84"}) == Approx(0.114));
  CHECK(full_a({"4 x EL84"}) == Approx(0.228));
}

TEST_CASE("a double triode draws the current of both sections, a single valve its own") {
  CHECK(full_a({"ECC83"}) == Approx(2 * 0.0012));
  CHECK(full_a({"EL84"}) == Approx(0.048 + 0.0055));
  CHECK(full_a({"2 x 7591"}) == Approx(2 * 0.068));  // its class AB rows have no current at full drive
  CHECK(full_a({"ECC83"}) == idle_a({"ECC83"}));
}

TEST_CASE("rectifiers draw nothing from the HT, and types without a figure are named") {
  const auto guess = first_guess_ht_current(list_of({"GZ34", "6J5", "2 x ECC82"}), valves());
  CHECK(plain(guess.full.plain()) == Approx(4 * 0.0105));
  CHECK(guess.unknown == std::vector<std::string>{"6J5"});
  CHECK(guess.reasons.size() == 1);
}

TEST_CASE("twice the valves draw twice the current, and no list draws more idle than driven", "[property]") {
  for (const amplifying_valve& v : valves().amplifiers()) {
    INFO(v.name);
    CHECK(full_a({"4 x " + v.name}) == Approx(2 * full_a({"2 x " + v.name})).epsilon(1e-12));
    CHECK(heater_a({"4 x " + v.name}, *v.heater_volts) == Approx(4 * plain(*v.heater_current)));
    CHECK(idle_a({"2 x " + v.name}) <= full_a({"2 x " + v.name}));
  }
}
