/// The table of valves, from the built binary.
#include <filesystem>
#include <fstream>
#include <functional>

#include <nlohmann/json.hpp>

#include <run_tool.hpp>

using nlohmann::json;
using namespace turnwright::testing;

namespace {

json valve(const std::string& words) {
  const ran r = run_tool("valve " + words + " --json");
  INFO(words << ": " << r.aside);
  REQUIRE(r.status == 0);
  const json page = json::parse(r.out);
  CHECK(page["format"] == "turnwright-valve/1");
  return page["valve"];
}

}  // namespace

TEST_CASE("a rectifier valve is given with heater, ratings and least anode resistance", "[cli]") {
  const json v = valve("GZ34");
  CHECK(v["type"] == "5AR4");
  CHECK(v["also"] == json::array({"GZ34"}));
  CHECK(v["kind"] == "rectifier valve");
  CHECK(v["heater_V"] == 5.0);
  CHECK(v["heater_A"] == 1.9);
  CHECK(v["average_current_A"] == 0.25);
  CHECK(v["average_current_of"] == "the whole valve, direct current out");
  CHECK(v["peak_current_A"] == 0.75);
  CHECK(v["peak_inverse_V"] == 1500.0);
  CHECK(v["reservoir_most_F"] == 60e-6);
  CHECK(v["anode_resistance_least"].size() == 6);
  CHECK(v["anode_resistance_least"][0]["at_V"] == 300.0);
  CHECK(v["anode_resistance_least"][0]["ohm"] == 50.0);
  CHECK(v["standing"] == "memory");
  CHECK(v["weak"] == json::array({"transient_peak_current_A"}));
  CHECK_FALSE(v.contains("standings"));
}

TEST_CASE("an amplifying valve is given with its heater, connected either way", "[cli]") {
  const json v = valve("12ax7");
  CHECK(v["type"] == "ECC83");
  CHECK(v["kind"] == "amplifying valve");
  CHECK(v["heater_alternative"]["heater_V"] == 12.6);
  CHECK(v["heater_alternative"]["heater_A"] == 0.15);
  CHECK(v["sections"] == 2);
  CHECK_FALSE(v.contains("output_stages"));
  CHECK(valve("EL84")["output_stages"].size() == 4);
}

TEST_CASE("the standing of each figure is added when asked for", "[cli]") {
  const json s = valve("GZ34 --standing")["standings"];
  CHECK(s["heater_A"] == "read");
  CHECK(s["peak_inverse_V"] == "memory");
  CHECK(s["anode_resistance_least"] == "memory");
  const std::string text = run_tool("valve GZ34 --standing").out;
  CHECK(text.find("1.9 A [read]") != std::string::npos);
  CHECK(text.find("[memory, weak]") != std::string::npos);
  CHECK(run_tool("valve GZ34").out.find("[read]") == std::string::npos);
}

TEST_CASE("every valve and diode of the list is given, with nothing null and no line over 100 columns", "[cli]") {
  const json list = json::parse(run_tool("valve --json").out);
  std::size_t seen = 0;
  const std::function<bool(const json&)> whole = [&](const json& j) {
    if (j.is_structured()) return std::all_of(j.begin(), j.end(), whole);
    return !j.is_null();
  };
  for (const char* group : {"rectifiers", "silicon", "valves"}) {
    for (const json& name : list[group]) {
      const std::string words = "'" + name.get<std::string>() + "' --standing";
      const json v = valve(words);
      CHECK(v["type"] == name);
      CHECK(whole(v));
      CHECK_FALSE(v["source"].get<std::string>().empty());
      std::istringstream text(run_tool("valve " + words).out);
      for (std::string line; std::getline(text, line);) CHECK(line.size() <= 100);
      ++seen;
    }
  }
  CHECK(seen >= 24 + 21 + 86);
}

TEST_CASE("what is not known of a valve is absent", "[cli]") {
  const json v = valve("GZ33");
  for (const char* key : {"perveance_A_per_V1_5", "law", "peak_inverse_V", "anode_resistance_least", "drop_V"})
    CHECK_FALSE(v.contains(key));
  const json mercury = valve("83");
  CHECK(mercury["law"] == "constant");
  CHECK(mercury["law_drop_V"] == 15.0);
  CHECK_FALSE(mercury.contains("perveance_A_per_V1_5"));
}

TEST_CASE("silicon is given by type and as such", "[cli]") {
  CHECK(valve("silicon")["law_drop_V"] == 0.75);
  CHECK(valve("silicon")["law_resistance_ohm"] == 0.3);
  CHECK(valve("1N4007")["law_standing"] == "estimate");
  CHECK(valve("1N4007")["peak_inverse_V"] == 1000.0);
  CHECK(valve("b380c800")["kind"] == "silicon bridge");
}

TEST_CASE("an unknown valve is refused with near names, an ambiguous one with both", "[cli]") {
  const ran unknown = run_tool("valve GZ35 --json"), two = run_tool("valve 5U4 --json");
  CHECK(unknown.status == 2);
  CHECK(unknown.out.empty());
  CHECK(unknown.aside.find("GZ34") != std::string::npos);
  CHECK(two.status == 2);
  CHECK(two.aside.find("5U4-G, 5U4-GB") != std::string::npos);
}

TEST_CASE("the tables of valves can be printed, changed and laid over", "[cli]") {
  const std::string tables = std::string(TURNWRIGHT_TEST_FOLDER) + "/../tables/";
  CHECK(run_tool("valve --csv").out == file_text(tables + "rectifiers.csv"));
  for (const char* name : {"valves", "diodes", "output_stages", "rectifier_resistances"})
    CHECK(run_tool(std::string("valve --csv=") + name).out == file_text(tables + name + ".csv"));
  const auto folder = shop_folder("cli-valves", "valves.csv",
                                  "type,function,heated,heater_v,heater_a,standing,source\n"
                                  "EL84,output pentode,indirect,6.3,0.78,read,own meter\n");
  const json v = valve("EL84 --tables '" + folder.string() + "'");
  CHECK(v["heater_A"] == 0.78);
  CHECK(v["source"].get<std::string>().find("own meter") == 0);
}
