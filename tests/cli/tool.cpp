/// The built binary, run for real.
#include <filesystem>
#include <fstream>

#include <nlohmann/json.hpp>

#include <run_tool.hpp>

using nlohmann::json;
using namespace turnwright::testing;

namespace {

std::string example(const std::string& name) { return std::string("'") + TURNWRIGHT_EXAMPLES + "/" + name + ".json'"; }

std::string scratch(const std::string& name) { return std::string(TURNWRIGHT_SCRATCH) + "/tool/" + name; }

}  // namespace

TEST_CASE("each example can be wound, and says so", "[cli]") {
  for (const char* name : {"single-ended", "two-el34", "world-mains", "practice-amplifier"}) {
    const ran text = run_tool("plan " + example(name)), result = run_tool("plan --json " + example(name));
    INFO(name << text.aside);
    CHECK(text.status == 0);
    CHECK(text.out.find("can be wound") != std::string::npos);
    CHECK(text.out.find("Winding, from the core outwards") != std::string::npos);
    CHECK(text.out.find("Mains and HT kill") != std::string::npos);
    CHECK(result.status == 0);
    CHECK(json::parse(result.out)["format"] == "turnwright-plan/1");
    CHECK(json::parse(result.out)["windable"] == true);
  }
}

TEST_CASE("wrong input leaves standard output empty, exits with 2 and names the place", "[cli]") {
  const std::string job = turnwright::testing::file_text(std::string(TURNWRIGHT_EXAMPLES) + "/two-el34.json");
  const auto with = [&](const std::string& from, const std::string& to) {
    std::string text = job;
    const std::size_t at = text.find(from);
    REQUIRE(at != std::string::npos);
    return text.replace(at, from.size(), to);
  };
  const std::vector<std::pair<std::string, std::string>> list{
      {with("\"current\": \"4.2 A\"", "\"curent\": \"4.2 A\""), "/secondaries/3/curent"},
      {with("175 mA", "175 mV"), "/secondaries/0/rail/0/load/full"},
      {with("175 mA", "175"), "/secondaries/0/rail/0/load/full"},
      {with("175 mA", "-175 mA"), "/secondaries/0/rail/0/load/full"},
      {with("53 mm", "53 km"), "/core/stack"},
      {"", "standard input"},
      {job.substr(0, job.size() / 2), "line"},
      {with("\"name\": \"bias\"", "\"name\": \"HT\""), "/secondaries/1/name"},
      {with("\"220 V\", \"230 V\", \"240 V\"", "\"240 V\", \"230 V\", \"220 V\""), "/primary/taps/1"},
      {with("EI 120", "EI 121"), "/core/lamination"},
  };
  for (const auto& [text, place] : list) {
    const ran r = run_tool("plan - --json", text);
    INFO(r.aside);
    CHECK(r.status == 2);
    CHECK(r.out.empty());
    CHECK(r.aside.find(place) != std::string::npos);
  }
}

TEST_CASE("a job that cannot be met exits with 1 and still gives the whole result", "[cli]") {
  std::string job = turnwright::testing::file_text(std::string(TURNWRIGHT_EXAMPLES) + "/two-el34.json");
  job.replace(job.find("53 mm"), 5, "22 mm");
  const ran r = run_tool("plan - --json", job);
  CHECK(r.status == 1);
  CHECK(json::parse(r.out)["windable"] == false);
  CHECK(r.aside.find("cure: ") != std::string::npos);
  CHECK(run_tool("plan - --accept window-fit --accept heat --accept dc-in-iron", job).status == 0);
}

TEST_CASE("a wrong command line exits with 2 and says what to do", "[cli]") {
  for (const char* words :
       {"", "plam x.json", "plan", "plan no-such-file.json", "plan x.json --mains \"230 V 50 Hz\"", "wire '24'",
        "wire 'xyz'", "core 'EI 75'", "steel 'M400-50A' --at '1.3'", "steel 'M400-50A' --at '13 T'",
        "plan --winding 'a: 6 V 1 A'", "--nonsense", "core 'EI 96' --tables /no/such/folder", "valve GZ35", "valve 5U4",
        "valve EL84 --csv=valve", "steel M-19 --standing", "supply", "supply no-such-file.json"}) {
    const ran r = run_tool(words);
    INFO(words << ": " << r.aside);
    CHECK(r.status == 2);
    CHECK(r.out.empty());
    CHECK_FALSE(r.aside.empty());
  }
}

TEST_CASE("commands that come later say so", "[cli]") {
  for (const char* words : {"survey x.json", "rewind x.json", "convert x.json", "proof a b"}) {
    const ran r = run_tool(words);
    CHECK(r.status == 2);
    CHECK(r.aside.find("not-yet") != std::string::npos);
  }
}

TEST_CASE("help and version exit with 0", "[cli]") {
  for (const char* words : {"--help", "plan --help", "--version", "wire --help"}) CHECK(run_tool(words).status == 0);
  CHECK(run_tool("--version").out.rfind("turnwright ", 0) == 0);
}

TEST_CASE("no file is overwritten without being told to", "[cli]") {
  std::filesystem::create_directories(scratch(""));
  const std::string kept = scratch("kept.json");
  std::ofstream(kept) << "mine";
  const std::string job =
      "--mains '230 V 50 Hz' --winding 'heaters: 6.3 V 4 A ct' --winding 'rectifier heater: 5 V 2 A'";
  const ran r = run_tool("plan " + job + " --json='" + kept + "'");
  CHECK(r.status == 2);
  CHECK(r.out.empty());
  CHECK(turnwright::testing::file_text(kept) == "mine");
  CHECK(run_tool("plan " + job + " --force --json='" + kept + "'").status == 0);
  CHECK(json::parse(turnwright::testing::file_text(kept))["windable"] == true);
  std::filesystem::remove(kept);
}

TEST_CASE("a job from the command line can be kept and planned again to the same bytes", "[cli]") {
  const std::string kept = scratch("short.json");
  std::filesystem::create_directories(scratch(""));
  std::filesystem::remove(kept);
  const ran first = run_tool(
      "plan --json --mains '230 V 50 Hz' --winding 'HT: 250-0-250 V 80 mA rms' --winding 'heaters: 6.3 V 3 A ct' "
      "--write-job '" +
      kept + "'");
  INFO(first.aside);
  REQUIRE(first.status == 0);
  CHECK(run_tool("plan --json '" + kept + "'").out == first.out);
  std::filesystem::remove(kept);
}

TEST_CASE("the shop's own rows stand in front, and the result names their source", "[cli]") {
  const std::string folder = scratch("shop-tables");
  std::filesystem::create_directories(folder);
  std::ofstream(folder + "/laminations.csv") << "name,aliases,family,tongue_mm,outer_limb_mm,window_width_mm,window_"
                                                "length_mm,yoke_mm,width_mm,height_mm,standing,source\n"
                                             << "EI 96,,ei,32,16,16,50,16,96,82,read,measured in the shop\n";
  const json core = json::parse(run_tool("core 'EI 96' --json --tables '" + folder + "'").out)["core"];
  CHECK(core["window_length_mm"] == 50.0);
  CHECK(core["source"].get<std::string>().rfind("measured in the shop (the shop's ", 0) == 0);
  CHECK(json::parse(run_tool("core 'EI 96' --json").out)["core"]["window_length_mm"] == 48.0);
  std::filesystem::remove_all(folder);
}

TEST_CASE("gauges are compared across the systems", "[cli]") {
  const json r = json::parse(run_tool("wire '33 SWG' --json").out);
  CHECK(r["exact"] == true);
  CHECK(r["wire"]["bare_mm"].get<double>() == Approx(0.254).margin(1e-6));  // BS 3737, 0.0100 in
  bool awg = false;
  for (const json& n : r["nearest"]) awg = awg || n["size"] == "30 AWG";  // 0.2546 mm by ASTM B258
  CHECK(awg);
}

TEST_CASE("what the README shows is what the tool prints", "[cli]") {
  const std::string readme = turnwright::testing::file_text(std::string(TURNWRIGHT_EXAMPLES) + "/../README.md");
  const auto block = [&](const std::string& fence) {
    const std::size_t from = readme.find(fence) + fence.size();
    return readme.substr(from, readme.find("```", from) - from);
  };
  const std::string job = turnwright::testing::file_text(std::string(TURNWRIGHT_EXAMPLES) + "/practice-amplifier.json");
  CHECK(block("```json\n") == job);
  CHECK(run_tool("plan " + example("practice-amplifier")).out.find(block("```text\n")) != std::string::npos);
}
