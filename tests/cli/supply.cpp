/// The supply command, the built binary run for real.
#include <filesystem>

#include <nlohmann/json.hpp>

#include "near.hpp"
#include "run_tool.hpp"

using nlohmann::json;
using turnwright::testing::ran;
using turnwright::testing::run_tool;

namespace {

const char* const job = R"({
  "format": "turnwright-job/1", "title": "a <known> & tried supply", "mains": { "frequency": "50 Hz", "voltage": "230 V" },
  "known": { "primary_voltage": "230 V", "primary_resistance": "9 ohm" },
  "secondaries": [
    { "name": "HT", "no_load_voltage": "300-0-300 V", "resistance": "155 ohm", "circuit": "full-wave centre-tap",
      "rectifier": "EZ81", "rail": [ { "node": "A", "capacitor": "16 uF", "load": "60 mA" },
                                     { "node": "B", "through": { "resistor": "2 kohm" }, "capacitor": "16 uF", "load": "10 mA" } ] } ] })";

double volts_of(const std::string& words) {
  const ran r = run_tool("supply - --json " + words, job);
  INFO(r.aside);
  REQUIRE(r.status == 0);
  return json::parse(r.out)["rails"][0]["nodes"][0]["voltage_V"];
}

}  // namespace

TEST_CASE("what if is asked on the command line and moves the volts the right way", "[cli]") {
  const double now = volts_of("");
  CHECK(volts_of("--rectifier HT=silicon") > now);
  CHECK(volts_of("--rectifier silicon") == volts_of("--rectifier HT=silicon"));
  CHECK(volts_of("--reservoir '47 uF'") > now);
  CHECK(volts_of("--load HT/A=90mA") < now);
  CHECK(volts_of("--load 'B=20 mA'") < now);
  CHECK(volts_of("--mains '253 V'") == Approx(1.1 * now).epsilon(0.02));
}

TEST_CASE("a question that cannot be answered exits with 2", "[cli]") {
  for (const char* words : {"--rectifier HX=silicon", "--rectifier HT=GZ99", "--reservoir HT=47",
                            "--reservoir 'HT=47 mA'", "--load HT/D=1mA", "--load 'HT/A=1 V'", "--mains '230 A'",
                            "--mains 12", "--waveform /no/such/folder/x.svg", "--nonsense"}) {
    const ran r = run_tool(std::string("supply - ") + words, job);
    INFO(words << ": " << r.aside);
    CHECK(r.status == 2);
    CHECK(r.out.empty());
    CHECK_FALSE(r.aside.empty());
  }
}

TEST_CASE("the waveform is a whole drawing with its text as text", "[cli]") {
  const std::string file = std::string(TURNWRIGHT_SCRATCH) + "/cycle.svg";
  std::filesystem::remove(file);
  REQUIRE(run_tool("supply - --waveform '" + file + "'", job).status == 0);
  const std::string svg = turnwright::testing::file_text(file);
  CHECK(svg.rfind("<svg ", 0) == 0);
  CHECK(svg.find("<title id=\"title\">Waveforms of a &lt;known&gt; &amp; tried supply</title>") != std::string::npos);
  CHECK(svg.find(">second half</text>") != std::string::npos);
  CHECK(svg.find("nan") == std::string::npos);
  CHECK(run_tool("supply - --waveform '" + file + "'", job).status == 2);  // it is there already
  CHECK(run_tool("supply - --force --waveform '" + file + "'", job).status == 0);
  std::filesystem::remove(file);
}

TEST_CASE("a job without a known transformer is planned, and its supply is that of the plan", "[cli]") {
  const std::string example = "'" + std::string(TURNWRIGHT_EXAMPLES) + "/practice-amplifier.json' --json";
  const ran planned = run_tool("plan " + example), supplied = run_tool("supply " + example);
  REQUIRE(planned.status == 0);
  REQUIRE(supplied.status == 0);
  const double a = json::parse(planned.out)["rails"][0]["nodes"][0]["voltage_V"],
               b = json::parse(supplied.out)["rails"][0]["nodes"][0]["voltage_V"];
  CHECK(a == Approx(b).epsilon(1e-6));
  CHECK(json::parse(supplied.out)["format"] == "turnwright-supply/1");
}

TEST_CASE("a supply's report fits the paper", "[cli]") {
  const ran r = run_tool("supply - --workings", job);
  REQUIRE(r.status == 0);
  std::size_t from = 0;
  while (from < r.out.size()) {
    const std::size_t to = r.out.find('\n', from);
    CHECK(to - from <= 100);
    from = to + 1;
  }
}
