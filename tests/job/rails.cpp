/// Rails in a job: how they are read, what is filled in, what a plan and a known supply make of them.
#include <cmath>

#include <nlohmann/json.hpp>

#include <turnwright/job/job.hpp>
#include <turnwright/job/result.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/sheet/report.hpp>

#include "near.hpp"

using namespace turnwright;
using nlohmann::json;

namespace {

const catalogue& tables() {
  static const catalogue c = catalogue::bundled();
  return c;
}
const shop& tools() {
  static const shop s(tables());
  return s;
}

const char* const to_plan = R"({
  "format": "turnwright-job/1", "title": "t",
  "mains": { "frequency": "50 Hz", "tolerance": "10 %" }, "primary": { "taps": ["230 V"] },
  "secondaries": [
    { "name": "HT", "circuit": "full-wave centre-tap", "rectifier": "GZ34", "target": { "node": "A", "voltage": "330 V" },
      "rail": [
        { "node": "A", "capacitor": { "value": "32 uF", "rated": "500 V", "esr": "1 ohm" }, "load": { "full": "95 mA", "idle": "70 mA" } },
        { "node": "B", "through": { "choke": "5 H", "resistance": "110 ohm" }, "capacitor": "32 uF", "load": "8 mA" },
        { "node": "C", "through": { "resistor": "10 kohm" }, "capacitor": "16 uF", "load": ["4 mA", "220 kohm"] } ] },
    { "name": "heaters", "voltage": "6.3 V", "current": "3 A" } ],
  "core": { "lamination": "EI 96", "stack": "45 mm" } })";

const char* const known = R"({
  "format": "turnwright-job/1", "title": "t", "mains": { "frequency": "50 Hz", "voltage": "230 V" },
  "known": { "primary_voltage": "230 V", "primary_resistance": "9 ohm", "magnetising_inductance": "20 H" },
  "secondaries": [
    { "name": "HT", "no_load_voltage": "300-0-300 V", "resistance": ["75 ohm", "80 ohm"], "circuit": "full-wave centre-tap",
      "rectifier": "EZ81", "rail": [ { "node": "A", "capacitor": { "value": "16 uF", "rated": "500 V" }, "load": "60 mA" } ] },
    { "name": "heaters", "no_load_voltage": "6.75 V", "resistance": "35 mohm", "load": "1.75 ohm" } ] })";

json changed(const char* job, const std::string& pointer, const json& value) {
  json j = json::parse(job);
  j[json::json_pointer(pointer)] = value;
  return j;
}

json without(const char* job, const std::string& pointer, const char* key) {
  json j = json::parse(job);
  j[json::json_pointer(pointer)].erase(key);
  return j;
}

std::vector<remark> faults_of(const json& job) {
  try {
    if (job.contains("known"))
      read_known(job.dump(), "job.json", tools(), tables());
    else
      read_job(job.dump(), "job.json", tools(), tables());
  } catch (const refused& why) {
    return why.remarks();
  }
  return {};
}

demand demand_of(const json& job) { return read_job(job.dump(), "job", tools(), tables()); }
supply_study study_of(const json& job) { return study(read_known(job.dump(), "job", tools(), tables()).supply); }

bool has(const std::vector<check>& all, const std::string& code, level weight) {
  return std::any_of(all.begin(), all.end(), [&](const check& c) { return c.code == code && c.weight == weight; });
}

struct wrong {
  const char* job;
  const char* pointer;
  json value;
  const char* code;
  const char* where;
};

}  // namespace

TEST_CASE("each wrong entry of a rail is named with its place and a code", "[refusal]") {
  const std::vector<wrong> list{
      {to_plan, "/secondaries/0/circuit", "full wave", "unknown-word", "job.json /secondaries/0/circuit"},
      {to_plan, "/secondaries/0/rectifier", "GZ35", "unknown-name", "job.json /secondaries/0/rectifier"},
      {to_plan, "/secondaries/0/rectifier", "GZ37", "unknown-name", "job.json /secondaries/0/rectifier"},
      {to_plan, "/secondaries/0/rectifier", 5, "wrong-sort", "job.json /secondaries/0/rectifier"},
      {to_plan, "/secondaries/0/rectifier", json::object(), "either-or", "job.json /secondaries/0/rectifier"},
      {to_plan,
       "/secondaries/0/rectifier",
       {{"perveance", "1.9 mA"}},
       "wrong-unit",
       "job.json /secondaries/0/rectifier/perveance"},
      {to_plan,
       "/secondaries/0/rectifier",
       {{"type", "GZ34"}, {"series", "47"}},
       "no-unit",
       "job.json /secondaries/0/rectifier/series"},
      {to_plan, "/secondaries/0/target/node", "D", "unknown-word", "job.json /secondaries/0/target/node"},
      {to_plan, "/secondaries/0/target/voltage", "330 A", "wrong-unit", "job.json /secondaries/0/target/voltage"},
      {to_plan, "/secondaries/0/voltage", "300-0-300 V", "either-or", "job.json /secondaries/0"},
      {to_plan, "/secondaries/0/dc_current", "90 mA", "either-or", "job.json /secondaries/0"},
      {to_plan, "/secondaries/0/polarity", "minus", "unknown-word", "job.json /secondaries/0/polarity"},
      {to_plan, "/secondaries/0/series_capacitor", "47 uF", "circuit", "job.json /secondaries/0/series_capacitor"},
      {to_plan, "/secondaries/0/rail/0/capacitor/value", "32 F", "out-of-range",
       "job.json /secondaries/0/rail/0/capacitor/value"},
      {to_plan, "/secondaries/0/rail/0/capacitor", 32, "wrong-sort", "job.json /secondaries/0/rail/0/capacitor"},
      {to_plan, "/secondaries/0/rail/0/load/ful", "1 mA", "unknown-key", "job.json /secondaries/0/rail/0/load/ful"},
      {to_plan, "/secondaries/0/rail/1/load", "8 V", "wrong-unit", "job.json /secondaries/0/rail/1/load"},
      {to_plan, "/secondaries/0/rail/1/node", "A", "repeated-name", "job.json /secondaries/0/rail/1/node"},
      {to_plan, "/secondaries/0/rail/1/through", json::object(), "either-or", "job.json /secondaries/0/rail/1/through"},
      {to_plan, "/secondaries/0/rail/2/load/1", "220 k", "unknown-unit", "job.json /secondaries/0/rail/2/load/1"},
      {to_plan, "/secondaries/0/rail/2", "C", "wrong-sort", "job.json /secondaries/0/rail/2"},
      {known, "/known/primary_resistance", "9 V", "wrong-unit", "job.json /known/primary_resistance"},
      {known, "/known/primary_ohms", "9 ohm", "unknown-key", "job.json /known/primary_ohms"},
      {known, "/secondaries/0/resistance", json::array({"75 ohm"}), "wrong-sort", "job.json /secondaries/0/resistance"},
      {known,
       "/secondaries/0/target",
       {{"node", "A"}, {"voltage", "300 V"}},
       "either-or",
       "job.json /secondaries/0/target"},
      {known, "/secondaries/0/load", "3 ohm", "either-or", "job.json /secondaries/0"},
      {known, "/secondaries/1/load", "1.75 V", "wrong-unit", "job.json /secondaries/1/load"},
      {known, "/secondaries/1/tap_of", "bias", "unknown-word", "/secondaries/1/tap_of"},
      {known, "/secondaries/1/name", "HT", "repeated-name", "/secondaries/1/name"},
      {known, "/core", json::object(), "either-or", "job.json /core"},
  };
  for (const wrong& w : list) {
    INFO(w.pointer << " = " << w.value.dump());
    const auto faults = faults_of(changed(w.job, w.pointer, w.value));
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == w.code);
    CHECK(faults[0].where == w.where);
    CHECK_FALSE(faults[0].wanted.empty());
  }
}

TEST_CASE("what a rail needs and lacks is named", "[refusal]") {
  CHECK(faults_of(without(to_plan, "/secondaries/0", "rail"))[0].code == "missing");
  CHECK(faults_of(without(to_plan, "/secondaries/0/rail/1", "through"))[0].where ==
        "job.json /secondaries/0/rail/1/through");
  CHECK(faults_of(without(to_plan, "/secondaries/0/rail/0", "capacitor"))[0].where ==
        "job.json /secondaries/0/rail/0/load");
  CHECK(faults_of(without(known, "/known", "primary_voltage"))[0].where == "job.json /known/primary_voltage");
  CHECK(faults_of(without(known, "/secondaries/0", "resistance"))[0].where == "job.json /secondaries/0/resistance");
  json doubler = changed(to_plan, "/secondaries/0/circuit", "half-wave doubler");
  CHECK(faults_of(doubler)[0].where == "job.json /secondaries/0/series_capacitor");
  json plain_winding = changed(to_plan, "/secondaries/0/voltage", "300 V");
  plain_winding["secondaries"][0].erase("target");
  CHECK(faults_of(plain_winding)[0].code == "circuit");
  json bridge = changed(to_plan, "/secondaries/0/circuit", "bridge");
  bridge["secondaries"].push_back(
      {{"name", "bias"}, {"tap_of", "HT"}, {"voltage", "50 V"}, {"circuit", "half-wave"}, {"dc_current", "1 mA"}});
  CHECK(faults_of(bridge)[0].code == "tap");
}

TEST_CASE("a job names a rail's parts and gets them back", "[property]") {
  const demand d = demand_of(json::parse(to_plan));
  REQUIRE(d.secondaries[0].rail);
  const rail_wish& r = *d.secondaries[0].rail;
  CHECK(r.nodes.size() == 3);
  CHECK(plain(r.nodes[0].full.constant.plain()) == Approx(0.095));
  CHECK(plain(r.nodes[0].idle.constant.plain()) == Approx(0.070));
  CHECK(plain(*r.nodes[0].rated) == Approx(500));
  CHECK(plain(std::get<supply::choke>(r.nodes[1].through).resistance) == Approx(110));
  CHECK(plain(*r.nodes[2].full.resistance) == Approx(220e3));
  CHECK(plain(direct_current(r, load_state::cold, volts_dc{as<volts>(220)}).plain()) == Approx(1e-3));
  CHECK(d.secondaries[0].second_half);
}

TEST_CASE("a direct current alone gets a usual reservoir, and the job is told", "[property]") {
  json job = without(to_plan, "/secondaries/0", "target");
  json& w = job["secondaries"][0];
  w.erase("rail");
  w["voltage"] = "250-0-250 V";
  w["dc_current"] = "80 mA";
  const demand d = demand_of(job);
  REQUIRE(d.secondaries[0].rail->nodes.size() == 1);
  CHECK(plain(d.secondaries[0].rail->nodes[0].shunt->value) == Approx(40e-6));
  CHECK(std::any_of(d.assumed.begin(), d.assumed.end(),
                    [](const assumption& a) { return a.path == "/secondaries/0/rail"; }));
}

TEST_CASE("listed valves give the heaters their current, and the HT a first guess", "[property]") {
  json job = json::parse(to_plan);
  job["valves"] = {"2 x EL84", "2 x ECC83"};
  job["secondaries"][1].erase("current");
  // 2 x 0.76 + 2 x 0.3 A, the table's own figures
  CHECK(plain(demand_of(job).secondaries[1].current.plain()) == Approx(2.12));
  json guessed = job;
  guessed["secondaries"][0].erase("rail");
  guessed["secondaries"][0].erase("target");
  guessed["secondaries"][0]["voltage"] = "250-0-250 V";
  const demand d = demand_of(guessed);
  CHECK(plain(d.secondaries[0].rail->nodes[0].full.constant.plain()) > 0.08);
  json thin = job;
  thin["secondaries"][1]["current"] = "1.5 A";
  CHECK(has(plan(demand_of(thin), tools()).checks, "open-questions", level::stop));
  CHECK(has(plan(demand_of(job), tools()).checks, "open-questions", level::pass));
  json odd = job;
  odd["secondaries"][1]["voltage"] = "2.5 V";
  CHECK(faults_of(odd)[0].where == "job.json /secondaries/1/current");
}

TEST_CASE("a rail that is aimed at lands within half a turn's worth of volts", "[property]") {
  for (const char* volts : {"280 V", "330 V", "400 V"}) {
    const design p = plan(demand_of(changed(to_plan, "/secondaries/0/target/voltage", volts)), tools());
    REQUIRE(p.supply.rails.size() == 1);
    const planned_rail& r = p.supply.rails[0];
    INFO(volts << ": off by " << plain(*r.off_target) << ", a turn " << plain(*r.one_turn));
    CHECK(std::abs(plain(*r.off_target)) <= 0.5 * plain(*r.one_turn));
    CHECK(plain(r.nodes[0].full.mean.plain()) == Approx(std::stod(volts)).epsilon(0.01));
    CHECK(report_of(p, false).find("node A was to have") != std::string::npos);
  }
}

TEST_CASE("volts of a rectified winding are true r.m.s. on load, and its resistive volts lie beside them",
          "[property]") {
  json job = without(to_plan, "/secondaries/0", "target");
  job["secondaries"][0]["voltage"] = "300-0-300 V";
  const design p = plan(demand_of(job), tools());
  const planned_winding& ht =
      *std::find_if(p.windings.begin(), p.windings.end(), [](const auto& w) { return w.name == "HT"; });
  CHECK(plain(ht.on_load.plain()) == Approx(600).epsilon(0.02));
  CHECK(plain(ht.on_load_resistive.plain()) < plain(ht.no_load.plain()));
  CHECK(plain(ht.on_load_resistive.plain()) == Approx(plain(ht.on_load.plain())).epsilon(0.05));
}

TEST_CASE("a known supply is the planned one when it is given the plan's figures", "[property]") {
  const design p = plan(demand_of(json::parse(to_plan)), tools());
  const supply_study again = study(p.supply.of);
  CHECK(plain(again.full.rails[0].nodes[0].mean.plain()) ==
        Approx(plain(p.made.nominal.electric.rails[0].nodes[0].mean.plain())).epsilon(1e-4));
}

TEST_CASE("capacitors, rectifier and iron are judged, each with its cure", "[property]") {
  const auto checks = [](const json& job) { return rail_checks(study_of(job)); };
  const std::vector<check> good = checks(json::parse(known));
  CHECK(has(good, "capacitor-rating", level::pass));
  CHECK_FALSE(has(good, "rectifier-limits", level::stop));
  CHECK(has(checks(changed(known, "/secondaries/0/rail/0/capacitor/rated", "450 V")), "capacitor-rating",
            level::caution));
  CHECK(has(checks(changed(known, "/secondaries/0/rail/0/capacitor/rated", "350 V")), "capacitor-rating", level::stop));
  CHECK(has(checks(changed(known, "/secondaries/0/rail/0/capacitor/value", "100 uF")), "rectifier-limits",
            level::caution));
  CHECK(has(checks(changed(known, "/secondaries/0/rail/0/load", "200 mA")), "rectifier-limits", level::stop));
  CHECK(has(checks(changed(known, "/secondaries/0/rail/0/load", "3 A")), "load-beyond-supply", level::stop));
  json stiff = changed(known, "/secondaries/0/resistance", json::array({"20 ohm", "20 ohm"}));
  bool cured = false;
  for (const check& c : checks(stiff))
    cured = cured || (c.code == "rectifier-limits" && c.cure.find("in series with each anode") != std::string::npos);
  CHECK(cured);
  json half = json::parse(known);
  half["secondaries"][0] = {
      {"name", "HT"},           {"no_load_voltage", "300 V"},
      {"resistance", "75 ohm"}, {"circuit", "half-wave"},
      {"rectifier", "silicon"}, {"rail", {{{"node", "A"}, {"capacitor", "47 uF"}, {"load", "60 mA"}}}}};
  CHECK(has(checks(half), "dc-in-iron", level::stop));
  half["known"].erase("magnetising_inductance");
  CHECK(has(checks(half), "dc-in-iron", level::note));
  json bridge = changed(known, "/secondaries/0/circuit", "bridge");
  bridge["secondaries"][0]["rectifier"] = "silicon";
  CHECK(has(checks(bridge), "centre-tap-circuit", level::stop));
}

TEST_CASE("a choke input that runs dry at idle is stopped, with the bleeder that cures it", "[property]") {
  json job = json::parse(known);
  job["secondaries"][0]["rail"] = {{{"node", "A"},
                                    {"through", {{"choke", "10 H"}, {"resistance", "100 ohm"}}},
                                    {"capacitor", "40 uF"},
                                    {"load", {{"full", "90 mA"}, {"idle", "10 mA"}}}}};
  const supply_study dry = study_of(job);
  REQUIRE(has(rail_checks(dry), "choke-input", level::stop));
  std::string cure;
  for (const check& c : rail_checks(dry)) cure = c.code == "choke-input" ? c.cure : cure;
  CHECK(cure.find("a bleeder of") == 0);
  // With such a bleeder the choke runs through, and the volts fall back to some 0.9 times the winding's.
  job["secondaries"][0]["rail"][0]["load"] = {{"full", {"90 mA", "12 kohm"}}, {"idle", {"10 mA", "12 kohm"}}};
  const supply_study wet = study_of(job);
  CHECK(has(rail_checks(wet), "choke-input", level::pass));
  CHECK(plain(wet.rails[0].nodes[0].idle.plain()) < plain(dry.rails[0].nodes[0].idle.plain()));
}

TEST_CASE("two bias rails may hang on one tap, and a tap may reach the end of its half", "[past]") {
  json job = without(to_plan, "/secondaries/0", "target");
  job["secondaries"][0]["voltage"] = "300-0-300 V";
  for (const char* name : {"bias", "other bias"})
    job["secondaries"].push_back(
        {{"name", name}, {"tap_of", "HT"}, {"voltage", "48 V"}, {"polarity", "negative"}, {"dc_current", "1 mA"}});
  const design p = plan(demand_of(job), tools());
  REQUIRE(p.supply.rails.size() == 3);
  CHECK(p.made.nominal.electric.settled);
  // Each by itself would give the same but for the other's drop.
  CHECK(plain(p.supply.rails[1].nodes[0].full.mean.plain()) ==
        Approx(plain(p.supply.rails[2].nodes[0].full.mean.plain())).epsilon(1e-3));
  CHECK(p.wanted.secondaries[2].rail->kind == supply::circuit::half_wave);
}

TEST_CASE("taps that cannot be are refused", "[past]") {
  json leaky = json::parse(known);
  leaky["secondaries"].push_back({{"name", "bias"},
                                  {"tap_of", "HT"},
                                  {"no_load_voltage", "50 V"},
                                  {"resistance", "8 ohm"},
                                  {"leakage_inductance", "5 mH"},
                                  {"rail", {{{"node", "A"}, {"capacitor", "47 uF"}, {"load", "1 mA"}}}}});
  CHECK(faults_of(leaky)[0].code == "tap");
  json crossed = leaky;
  crossed["secondaries"][2].erase("leakage_inductance");
  CHECK(faults_of(crossed).empty());
  crossed["secondaries"].push_back(crossed["secondaries"][2]);
  crossed["secondaries"][3]["name"] = "more bias";
  crossed["secondaries"][3]["no_load_voltage"] = "80 V";
  crossed["secondaries"][3]["resistance"] = "4 ohm";
  CHECK(faults_of(crossed)[0].code == "tap");
  json bridge = crossed;
  bridge["secondaries"].erase(3);
  bridge["secondaries"][2]["circuit"] = "bridge";
  CHECK(faults_of(bridge)[0].where == "job.json /secondaries/2/circuit");
}

TEST_CASE("a target that no winding reaches is said to be so, soon", "[past]") {
  const design p =
      plan(demand_of(changed(to_plan, "/secondaries/0/rectifier", {{"type", "GZ34"}, {"series", "20 kohm"}})), tools());
  CHECK_FALSE(p.windable);
  bool said = false;
  for (const check& c : p.checks) said = said || c.cure.find("no winding reaches the target") != std::string::npos;
  CHECK(said);
}

TEST_CASE("the heater of a rectifier valve rides on the HT, whether the job says so or not", "[property]") {
  json job = json::parse(to_plan);
  job["secondaries"].push_back({{"name", "rectifier heater"}, {"voltage", "5 V"}, {"current", "1.9 A"}});
  const demand d = demand_of(job);
  CHECK(d.secondaries[2].floats_on == "HT");
  CHECK_FALSE(d.secondaries[1].floats_on);
}

TEST_CASE("a negative rail has the volts of the positive one with the other sign", "[property]") {
  json job = json::parse(known);
  const auto volts_at = [&] {
    const known_supply k = read_known(job.dump(), "job", tools(), tables());
    const supply_study s = study(k.supply);
    return json::parse(json_of(s, rail_checks(s), k.assumed, supply_cautions()))["rails"][0]["nodes"][0]["voltage_V"]
        .get<double>();
  };
  const double positive = volts_at();
  job["secondaries"][0]["polarity"] = "negative";
  CHECK(volts_at() == Approx(-positive).epsilon(1e-4));
}
