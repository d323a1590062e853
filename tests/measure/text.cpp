#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/read.hpp>
#include <turnwright/measure/written.hpp>

#include <near.hpp>

#include <array>
#include <limits>
#include <random>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

constexpr std::array every_kind{kind::voltage,
                                kind::current,
                                kind::resistance,
                                kind::power,
                                kind::apparent_power,
                                kind::inductance,
                                kind::capacitance,
                                kind::flux_density,
                                kind::flux,
                                kind::frequency,
                                kind::time,
                                kind::length,
                                kind::area,
                                kind::mass,
                                kind::energy,
                                kind::temperature_point,
                                kind::temperature_rise,
                                kind::field,
                                kind::current_density,
                                kind::specific_loss,
                                kind::valve_constant,
                                kind::per_mass,
                                kind::ratio,
                                kind::resistance_per_length};

double si_of(std::string_view text, kind k) {
  const plain_reading r = read_plain(text, k);
  INFO("text: " << text);
  REQUIRE(r.si);
  return *r.si;
}

// Any magnitude from 1e-30 to 1e30, either sign, all the digits of a double.
double of_any_magnitude(std::mt19937& random) {
  const double mantissa = std::uniform_real_distribution<double>(1, 10)(random);
  const double value = mantissa * std::pow(10.0, std::uniform_int_distribution<int>(-30, 29)(random));
  return random() % 2 == 0 ? value : -value;
}

template <class Q>
int not_the_same_again(std::mt19937& random, int count) {
  int failures = 0;
  for (int i = 0; i < count; ++i) {
    const Q before = as<Q>(of_any_magnitude(random));
    const reading<Q> after = read<Q>(written(before));
    if (!after.value || after.value->value() != before.value()) ++failures;
  }
  return failures;
}

template <class... Q>
int not_the_same_again_of_all(std::mt19937& random, int count) {
  return (not_the_same_again<Q>(random, count) + ...);
}

misread fault(std::string_view text, kind k) {
  const plain_reading r = read_plain(text, k);
  INFO("text: " << text);
  REQUIRE_FALSE(r.si);
  return r.fault;
}

}  // namespace

TEST_CASE("a text is read as the quantity it names") {
  CHECK(si_of("230 V", kind::voltage) == 230.0);
  CHECK(si_of("120 mA", kind::current) == 0.120);
  CHECK(si_of("2.2 kohm", kind::resistance) == 2200.0);
  CHECK(si_of("110 ohm", kind::resistance) == 110.0);
  CHECK(si_of("5 W", kind::power) == 5.0);
  CHECK(si_of("80 VA", kind::apparent_power) == 80.0);
  CHECK(si_of("1.5 kVA", kind::apparent_power) == 1500.0);
  CHECK(si_of("5 H", kind::inductance) == 5.0);
  CHECK(si_of("47 uF", kind::capacitance) == 47e-6);
  CHECK(si_of("470 pF", kind::capacitance) == 470e-12);
  CHECK(si_of("1.3 T", kind::flux_density) == 1.3);
  CHECK(si_of("13 kG", kind::flux_density) == 1.3);
  CHECK(si_of("11000 G", kind::flux_density) == 1.1);
  CHECK(si_of("2 mWb", kind::flux) == 0.002);
  CHECK(si_of("50 Hz", kind::frequency) == 50.0);
  CHECK(si_of("60 c/s", kind::frequency) == 60.0);
  CHECK(si_of("3 min", kind::time) == 180.0);
  CHECK(si_of("20 ms", kind::time) == 0.02);
  CHECK(si_of("2 h", kind::time) == 7200.0);
  CHECK(si_of("32 mm", kind::length) == 0.032);
  CHECK(si_of("3.2 cm", kind::length) == 0.032);
  CHECK(si_of("0.2 mm2", kind::area) == 0.2e-6);
  CHECK(si_of("5.3 cm2", kind::area) == 5.3e-4);
  CHECK(si_of("1.5 kg", kind::mass) == 1.5);
  CHECK(si_of("330 g", kind::mass) == 0.33);
  CHECK(si_of("10 J", kind::energy) == 10.0);
  CHECK(si_of("40 degC", kind::temperature_point) == 40.0);
  CHECK(si_of("-10 °C", kind::temperature_point) == -10.0);
  CHECK(si_of("60 K", kind::temperature_rise) == 60.0);
  CHECK(si_of("300 A/m", kind::field) == 300.0);
  CHECK(si_of("2.5 A/mm2", kind::current_density) == 2.5e6);
  CHECK(si_of("1.5 W/kg", kind::specific_loss) == 1.5);
  CHECK(si_of("1.9 mA/V^1.5", kind::valve_constant) == 0.0019);
  CHECK(si_of("14 /kg", kind::per_mass) == 14.0);
  CHECK(si_of("10 %", kind::ratio) == 0.10);
  CHECK(si_of("0.088 ohm/m", kind::resistance_per_length) == 0.088);
  CHECK(si_of("88 ohm/km", kind::resistance_per_length) == 0.088);
}

TEST_CASE("inches are read in decimals and in fractions") {
  const auto inches = [](double x) { return Approx(x * 0.0254).epsilon(1e-15).margin(0); };
  CHECK(si_of("1.25 in", kind::length) == inches(1.25));
  CHECK(si_of("1-1/4 in", kind::length) == inches(1.25));
  CHECK(si_of("1 1/4 in", kind::length) == inches(1.25));
  CHECK(si_of("9/16 in", kind::length) == inches(0.5625));
  CHECK(si_of("1-3/8\"", kind::length) == inches(1.375));
  CHECK(si_of("2 inch", kind::length) == inches(2));
  CHECK(si_of("22 mil", kind::length) == inches(0.022));
  CHECK(si_of("1 in2", kind::area) == Approx(645.16e-6).epsilon(1e-15).margin(0));
  CHECK(si_of("1200 A/in2", kind::current_density) == Approx(1200 / 645.16e-6).epsilon(1e-15).margin(0));
  CHECK(si_of("1 lb", kind::mass) == 0.45359237);
}

TEST_CASE("micro is u or either of the two Greek letters, ohm is a word or either of the two signs") {
  CHECK(si_of("47 \u00B5F", kind::capacitance) == 47e-6);
  CHECK(si_of("47 \u03BCF", kind::capacitance) == 47e-6);
  CHECK(si_of("22 k\u03A9", kind::resistance) == 22e3);
  CHECK(si_of("22 k\u2126", kind::resistance) == 22e3);
}

TEST_CASE("the blank before the unit and those about the text do not matter") {
  for (const char* text : {"5V", "5 V", " 5 V ", "\t5  V", "+5 V", "5. V", "5.0e0 V", "0.5e1 V", "50E-1 V"}) {
    CHECK(si_of(text, kind::voltage) == 5.0);
  }
  CHECK(si_of(".5 mm", kind::length) == 0.0005);
}

TEST_CASE("circular mils to the ampere and amperes to the square millimetre are one thing turned over",
          "[published][units]") {
  const auto kind_named = [](const std::string& word) { return word == "area" ? kind::area : kind::current_density; };
  for (const row& r : published("units")) {
    INFO(r.place());
    const kind k = kind_named(r.text("kind"));
    CHECK(si_of(r.text("text"), k) == within_percent(si_of(r.text("same_as"), k), r.needed("tolerance_percent")));
  }
}

TEST_CASE("more circular mils to the ampere are fewer amperes to the square millimetre", "[property]") {
  double before = std::numeric_limits<double>::infinity();
  for (int cmil = 100; cmil <= 2000; cmil += 50) {
    const double now = si_of(std::to_string(cmil) + " cmil/A", kind::current_density);
    CHECK(now < before);
    before = now;
  }
}

TEST_CASE("the example given for a kind of quantity is of that kind", "[property]") {
  for (const kind k : every_kind) {
    INFO(words_of(k).name);
    CHECK(read_plain(words_of(k).example, k).si);
  }
}

TEST_CASE("what is written reads back as the same number to the last bit", "[property]") {
  std::mt19937 random(19590614);
  for (const kind k : every_kind) {
    if (k == kind::temperature_point) continue;
    int failures = 0;
    std::string first;
    for (int i = 0; i < 20000; ++i) {
      const double before = of_any_magnitude(random);
      const std::string text = written_plain(before, k);
      const plain_reading after = read_plain(text, k);
      if (after.si && *after.si == before) continue;
      if (failures++ == 0) first = text;
    }
    INFO(words_of(k).name << ", the first is " << first);
    CHECK(failures == 0);
  }
}

TEST_CASE("every type of quantity is written and read back as the same number", "[property]") {
  std::mt19937 random(5881);
  CHECK(
      (not_the_same_again_of_all<volts, amperes, ohms, watts, volt_amperes, henries, farads, teslas, webers, hertz,
                                 seconds, metres, square_metres, kilograms, joules, kelvins, amperes_per_metre,
                                 amperes_per_square_metre, watts_per_kilogram, perveance, per_kilogram, ohms_per_metre>(
          random, 1000)) == 0);
  for (int i = 0; i < 1000; ++i) {
    const ratio before{of_any_magnitude(random)};
    const reading<ratio> after = read<ratio>(written(before));
    if (!after.value || after.value->value != before.value) FAIL(written(before));
  }
}

TEST_CASE("a temperature that a transformer meets is written and read back as the same point", "[property]") {
  std::mt19937 random(27315);
  std::uniform_real_distribution<double> from_frost_to_fire(-60, 240);
  int failures = 0;
  for (int i = 0; i < 20000; ++i) {
    const temperature before = celsius(from_frost_to_fire(random));
    const reading<temperature> after = read<temperature>(written(before));
    if (!after.value || after.value->value() != before.value()) ++failures;
  }
  CHECK(failures == 0);
  for (int tenths = -600; tenths <= 2400; ++tenths) {  // and a round figure stays short
    const std::string text = written(celsius(tenths / 10.0));
    if (text.size() > std::string("-60.0 degC").size()) FAIL(text);
  }
}

TEST_CASE("what is shown is the number rounded to so many figures", "[property]") {
  std::mt19937 random(577);
  for (const kind k : every_kind) {
    if (k == kind::temperature_point) continue;
    for (int i = 0; i < 500; ++i) {
      const double before = of_any_magnitude(random);
      const std::string text = shown_plain(before, k, 4);
      const plain_reading after = read_plain(text, k);
      if (!after.si || std::abs(*after.si / before - 1) > 0.5000001e-3) {
        FAIL(text << " for " << shortest(before));
      }
    }
  }
}

TEST_CASE("what is shown between a thousandth and a million has one to three figures before the point", "[property]") {
  std::mt19937 random(47);
  std::uniform_real_distribution<double> exponent(-12, 11.9);
  for (const kind k :
       {kind::resistance, kind::current, kind::power, kind::inductance, kind::capacitance, kind::field}) {
    for (int i = 0; i < 1000; ++i) {
      const std::string text = shown_plain(std::pow(10.0, exponent(random)), k);
      const std::size_t before_point = std::min(text.find('.'), text.find(' '));
      if (before_point < 1 || before_point > 3 || text.front() == '0') FAIL(text);
    }
  }
}

TEST_CASE("a report shows quantities with engineering prefixes") {
  CHECK(shown(as<ohms>(0.0352)) == "35.2 mohm");
  CHECK(shown(120_mA) == "120 mA");
  CHECK(shown(47_uF) == "47.0 uF");
  CHECK(shown(as<ohms>(2200)) == "2.20 kohm");
  CHECK(shown(as<ohms>(999.7)) == "1.00 kohm");
  CHECK(shown(as<amperes>(0.9996)) == "1.00 A");
  CHECK(shown(as<amperes>(-0.5)) == "-500 mA");
  CHECK(shown(as<webers>(0.0017053)) == "1.71 mWb");
  CHECK(shown(as<volt_amperes>(1500), 2) == "1.5 kVA");
  CHECK(shown(0_A) == "0.00 A");
}

TEST_CASE("lengths stay in millimetres, volts in volts, and so by the shop's habit") {
  CHECK(shown(32_mm) == "32.0 mm");
  CHECK(shown(1.5_m, 4) == "1500 mm");
  CHECK(shown(as<volts>(0.35)) == "0.350 V");
  CHECK(shown(1100_V, 4) == "1100 V");
  CHECK(shown(as<square_metres>(5.3e-4)) == "530 mm2");
  CHECK(shown(2.5_A_per_mm2) == "2.50 A/mm2");
  CHECK(shown(as<kilograms>(0.33)) == "0.330 kg");
  CHECK(shown(1.3_T) == "1.30 T");
  CHECK(shown(50_Hz) == "50.0 Hz");
  CHECK(shown_plain(0.1, kind::ratio) == "10.0 %");
  CHECK(shown(as<kelvins>(55.4)) == "55.4 K");
  CHECK(shown(celsius(104.6)) == "105 degC");
}

TEST_CASE("a file holds quantities as a person would write them") {
  CHECK(written(230_V) == "230 V");
  CHECK(written(120_mA) == "120 mA");
  CHECK(written(as<farads>(47e-6)) == "47 uF");
  CHECK(written(as<metres>(0.0005)) == "0.5 mm");
  CHECK(written(1.3_T) == "1.3 T");
  CHECK(written(40_degC) == "40 degC");
  CHECK(written(celsius(22.5)) == "22.5 degC");
  CHECK(written(as<amperes_per_square_metre>(2.5e6)) == "2.5 A/mm2");
  CHECK(written(as<perveance>(0.0019)) == "1.9 mA/V^1.5");
  CHECK(written(as<per_kilogram>(14)) == "14 /kg");
  CHECK(written(ratio{0.1}) == "10 %");
  CHECK(written(0_V) == "0 V");
}

TEST_CASE("numbers are written with a fixed count of decimals, or as short as they may be") {
  CHECK(fixed(12.5, 2) == "12.50");
  CHECK(fixed(-0.001, 1) == "0.0");
  CHECK(fixed(-0.06, 1) == "-0.1");
  CHECK(shortest(0.1) == "0.1");
  CHECK(rounded_to(1234.5678, 3) == 1230.0);
  CHECK(rounded_to(-0.00098765, 2) == -0.00099);
  CHECK(rounded_to(0.0, 3) == 0.0);
}

TEST_CASE("a text that is no quantity says why", "[refusal]") {
  using why = misread::why;
  CHECK(fault("", kind::voltage).reason == why::empty);
  CHECK(fault("   ", kind::voltage).reason == why::empty);
  for (const char* text :
       {"V", "volts", "NaN", "NaN V", "inf", "inf V", "-inf V", "nan(1) V", "- 5 V", ". V", "e5 V"}) {
    CHECK(fault(text, kind::voltage).reason == why::no_number);
  }
  for (const char* text : {"230", "230 ", "-5", "1e3", "1/2", "1-1/4"}) {
    CHECK(fault(text, kind::voltage).reason == why::bare_number);
  }
  for (const char* text : {"1e999 V", "-1e999 V", "1e99999999999999999999 V", "1e308 kV"}) {
    CHECK(fault(text, kind::voltage).reason == why::not_finite);
  }
  CHECK(fault("0 cmil/A", kind::current_density).reason == why::not_finite);
}

TEST_CASE("a comma in place of the point is no unit, and the text after the number is named", "[refusal]") {
  const misread comma = fault("1,5 V", kind::voltage);
  CHECK(comma.reason == misread::why::unknown_unit);
  CHECK(comma.unit == ",5 V");
  for (const char* text :
       {"5 v", "5 VV", "0x10 V", "1/0 in", "1.2.3 V", "5 V V", "--5 V 2", "1--1/4 in", "5 mmin", "5 kmin", "5 k%"}) {
    const plain_reading r = read_plain(text, kind::voltage);
    INFO(text);
    CHECK_FALSE(r.si);
    CHECK((r.fault.reason == misread::why::unknown_unit || r.fault.reason == misread::why::no_number));
  }
  CHECK(fault("5 furlong", kind::length).unit == "furlong");
}

TEST_CASE("a unit of another kind is told by its kind", "[refusal]") {
  const misread amperes_for_volts = fault("275 A", kind::voltage);
  CHECK(amperes_for_volts.reason == misread::why::other_kind);
  CHECK(amperes_for_volts.wanted == kind::voltage);
  CHECK(amperes_for_volts.found == kind::current);
  CHECK(fault("80 W", kind::apparent_power).found == kind::power);
  CHECK(fault("80 VA", kind::power).found == kind::apparent_power);
  CHECK(fault("60 degC", kind::temperature_rise).found == kind::temperature_point);
  CHECK(fault("60 K", kind::temperature_point).found == kind::temperature_rise);
  CHECK(fault("0.5 mm", kind::area).found == kind::length);
}

TEST_CASE("no text stops the reader", "[property]") {
  std::mt19937 random(8128);
  const std::string letters = "0123456789.,-+/eE %VAmkuW\xC2\xB5hGTin\"^\t\n";
  for (int i = 0; i < 50000; ++i) {
    std::string text;
    for (auto n = random() % 12; n > 0; --n) text += letters[random() % letters.size()];
    const kind k = every_kind[random() % every_kind.size()];
    const plain_reading r = read_plain(text, k);
    if (r.si && !std::isfinite(*r.si)) FAIL(text);
  }
}

TEST_CASE("an exponent past all counting does not stop the reader") {
  for (const char* text : {"0e9223372036854775807 kV", "0e-9223372036854775808 mV", "0e999999999999999999999 V"}) {
    const plain_reading r = read_plain(text, kind::voltage);  // nought or refused, but a reading
    CHECK((!r.si || *r.si == 0.0));
  }
}
