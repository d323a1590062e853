/// Wrong input: every fault is named with its place.
#include <nlohmann/json.hpp>

#include <turnwright/job/job.hpp>

#include "near.hpp"

using namespace turnwright;
using nlohmann::json;

namespace {

const char* const good = R"({
  "format": "turnwright-job/1", "title": "t",
  "mains": { "frequency": "50 Hz", "tolerance": "10 %" },
  "primary": { "taps": ["220 V", "230 V"], "on": "230 V" },
  "secondaries": [ { "name": "HT", "voltage": "300-0-300 V", "current": "100 mA" },
                   { "name": "heaters", "voltage": "6.3 V", "current": "2 A" } ],
  "core": { "lamination": "EI 96", "stack": "45 mm" } })";

std::vector<remark> faults_of(const std::string& text) {
  static const catalogue tables = catalogue::bundled();
  static const shop tools(tables);
  try {
    read_job(text, "job.json", tools, tables);
  } catch (const refused& why) {
    return why.remarks();
  }
  return {};
}

struct wrong {
  const char* pointer;
  json value;
  const char* code;
  const char* where;
};

}  // namespace

TEST_CASE("a right job is read without fault", "[refusal]") { CHECK(faults_of(good).empty()); }

TEST_CASE("each wrong entry is named with its place and a code", "[refusal]") {
  const std::vector<wrong> list{
      {"/primary/taps/0", "220", "no-unit", "job.json /primary/taps/0"},
      {"/primary/taps/0", 220, "no-unit", "job.json /primary/taps/0"},
      {"/primary/taps/0", "220 A", "wrong-unit", "job.json /primary/taps/0"},
      {"/primary/taps/0", "220 volt", "unknown-unit", "job.json /primary/taps/0"},
      {"/primary/taps/0", "240 V", "tap-order", "job.json /primary/taps/1"},
      {"/primary/on", "235 V", "unknown-word", "job.json /primary/on"},
      {"/primary/tops", "x", "unknown-key", "job.json /primary/tops"},
      {"/secondaries/1/current", "-2 A", "out-of-range", "job.json /secondaries/1/current"},
      {"/secondaries/1/current", "nan A", "no-number", "job.json /secondaries/1/current"},
      {"/secondaries/1/current", "1e999 A", "not-finite", "job.json /secondaries/1/current"},
      {"/secondaries/1/voltage", "6300 kV", "out-of-range", "job.json /secondaries/1/voltage"},
      {"/secondaries/1/name", "HT", "repeated-name", "job.json /secondaries/1/name"},
      {"/secondaries/1/name", "primary", "bad-name", "job.json /secondaries/1/name"},
      {"/secondaries/1/floats_on", "HTT", "unknown-word", "job.json /secondaries/1/floats_on"},
      {"/secondaries/1/rail", json::array(), "missing", "job.json /secondaries/1/rail"},
      {"/secondaries/1/load", "3 ohm", "not-yet", "job.json /secondaries/1/load"},
      {"/secondaries/1/wire", "24", "gauge-system", "job.json /secondaries/1/wire"},
      {"/secondaries/1/wire", "0.51 mm", "unknown-name", "job.json /secondaries/1/wire"},
      {"/secondaries/1/turns", 2.5, "wrong-sort", "job.json /secondaries/1/turns"},
      {"/secondaries/1/tolerance", "90 %", "out-of-range", "job.json /secondaries/1/tolerance"},
      {"/secondaries", json::array(), "missing", "job.json /secondaries"},
      {"/core/lamination", "EI 97", "unknown-name", "job.json /core/lamination"},
      {"/core/lamination", "EI 75", "ambiguous-name", "job.json /core/lamination"},
      {"/core/steel", "unobtainium", "unknown-name", "job.json /core/steel"},
      {"/core/stack", "450 m", "out-of-range", "job.json /core/stack"},
      {"/core/toroid", json::object(), "not-yet", "job.json /core/toroid"},
      {"/mains/frequency", "50", "no-unit", "job.json /mains/frequency"},
      {"/mains/tolerance", "-10 %", "out-of-range", "job.json /mains/tolerance"},
      {"/mains/tolerance", "+6 % +10 %", "wrong-sort", "job.json /mains/tolerance"},
      {"/order", json::array({"primary", "HT"}), "missing", "job.json /order"},
      {"/order", json::array({"primary", "HT", "HT", "heaters"}), "repeated-name", "job.json /order/2"},
      {"/screens", json::array({{{"after", "nothing"}}}), "unknown-word", "job.json /screens/0/after"},
      {"/limits", "hot", "wrong-sort", "job.json /limits"},
      {"/format", "turnwright-job/2", "unknown-word", "job.json /format"},
      {"/valves", json::array({"2 x EL35"}), "unknown-name", "job.json /valves/0"},
      {"/stock", json::object(), "not-yet", "job.json /stock"},
      {"/known", json::object(), "either-or", "job.json /known"},
      {"/secondaries/1/floats_on", "heaters", "unknown-word", "job.json /secondaries/1/floats_on"},
      {"/primary/tolerance", "1 %", "not-yet", "job.json /primary/tolerance"},
      {"/screens", json::array({{{"after", "HT"}}, {{"after", "HT"}}}), "repeated-name", "job.json /screens/1/after"},
      {"/title", "a\nb", "bad-name", "job.json /title"},
      {"/aim", "beauty", "unknown-word", "job.json /aim"},
  };
  for (const wrong& w : list) {
    json job = json::parse(good);
    job[json::json_pointer(w.pointer)] = w.value;
    INFO(w.pointer << " = " << w.value.dump());
    const auto faults = faults_of(job.dump());
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == w.code);
    CHECK(faults[0].where == w.where);
    CHECK_FALSE(faults[0].wanted.empty());
  }
}

TEST_CASE("a ring of windings that ride on each other is refused", "[refusal]") {
  json job = json::parse(good);
  job["secondaries"][0]["floats_on"] = "heaters";
  job["secondaries"][1]["floats_on"] = "HT";
  REQUIRE(faults_of(job.dump()).size() == 2);
  CHECK(faults_of(job.dump())[0].code == "floats");
}

TEST_CASE("a centre tap wants an even number of turns", "[refusal]") {
  json job = json::parse(good);
  job["secondaries"][1]["centre_tap"] = true;
  job["secondaries"][1]["turns"] = 17;
  REQUIRE(faults_of(job.dump()).size() == 1);
  CHECK(faults_of(job.dump())[0].code == "odd-turns");
}

TEST_CASE("what is missing is named", "[refusal]") {
  for (const char* pointer : {"/format", "/mains", "/primary", "/secondaries", "/mains/frequency",
                              "/secondaries/0/name", "/secondaries/0/voltage", "/secondaries/0/current"}) {
    json job = json::parse(good);
    const json::json_pointer at(pointer);
    job[at.parent_pointer()].erase(at.back());
    INFO(pointer);
    const auto faults = faults_of(job.dump());
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == "missing");
    CHECK(faults[0].where == std::string("job.json ") + pointer);
  }
}

TEST_CASE("all faults of a file are told at once", "[refusal]") {
  json job = json::parse(good);
  job["mains"]["frequency"] = "50 V";
  job["secondaries"][0]["voltage"] = "300";
  job["secondaries"][1]["curent"] = "1 A";
  job["secondaries"][1].erase("current");
  CHECK(faults_of(job.dump()).size() == 4);  // the misspelt key, and the one that is missing for it
}

TEST_CASE("an unknown key's hint is the nearest known one", "[refusal]") {
  json job = json::parse(good);
  job["secondaries"][1]["volatge"] = "6.3 V";
  const auto faults = faults_of(job.dump());
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].hint == "did you mean \"voltage\"?");
}

TEST_CASE("text that is no job is refused with its place", "[refusal]") {
  const auto code = [](const std::string& text) { return faults_of(text).at(0).code; };
  CHECK(code("") == "empty");
  CHECK(code("  \n") == "empty");
  CHECK(code("[]") == "wrong-sort");
  CHECK(code("{ \"format\": ") == "syntax");
  CHECK(code(std::string(good).substr(0, 200)) == "syntax");
  CHECK(code("{ \"format\": \"turnwright-job/1\", \"format\": \"turnwright-job/1\" }") == "repeated-key");
  CHECK(code(std::string(100000, '[')) == "too-deep");
  CHECK(code("{\"title\": \"\xff\xfe\"}") == "syntax");
  const auto faults = faults_of("{ \"mains\": { \"frequency\": \"50 Hz\", \"frequency\": \"60 Hz\" } }");
  CHECK(faults.at(0).where == "job.json /mains/frequency");
}

TEST_CASE("comments are allowed, as are a byte-order mark and carriage returns", "[refusal]") {
  CHECK(faults_of("\xEF\xBB\xBF// a job\r\n" + std::string(good) + "\r\n/* end */").empty());
}

TEST_CASE("names match without regard to case, blanks and hyphens, and by alias", "[refusal]") {
  for (const char* name : {"ei 96", "EI96", "EI-96", "EI-125", "EI 1-1/4 in", "EI 75 mm"}) {
    json job = json::parse(good);
    job["core"]["lamination"] = name;
    INFO(name);
    CHECK(faults_of(job.dump()).empty());
  }
  for (const char* name : {"M6", "m-6", "M400 50A", "old iron"}) {
    json job = json::parse(good);
    job["core"]["steel"] = name;
    INFO(name);
    CHECK(faults_of(job.dump()).empty());
  }
}

TEST_CASE("the short form makes a job that is read again", "[refusal]") {
  const auto [text, left_open] =
      job_of({"230 V 50 Hz", {"HT: 300-0-300 V 120 mA rms", "heaters: 6.3 V 4 A ct", "rectifier heater: 5V 2A"}});
  CHECK(left_open.empty());
  CHECK(faults_of(text).empty());
  const json job = json::parse(text);
  CHECK(job["secondaries"][0]["current"] == "120 mA");
  CHECK(job["secondaries"][1]["centre_tap"] == true);
  CHECK(job["secondaries"][2]["voltage"] == "5V");
}

TEST_CASE("above 50 V a current without a word is direct current, and is said to be", "[refusal]") {
  const written_job w =
      job_of({"230 V 50 Hz", {"HT: 300-0-300 V 120 mA GZ34", "bias: 60 V 10 mA dc", "heaters: 6.3 V 4 A"}});
  CHECK(faults_of(w.text).empty());
  const json job = json::parse(w.text);
  CHECK(job["secondaries"][0]["dc_current"] == "120 mA");
  CHECK(job["secondaries"][0]["circuit"] == "full-wave centre-tap");
  CHECK(job["secondaries"][1]["circuit"] == "bridge");
  CHECK(job["secondaries"][2]["current"] == "4 A");
  CHECK(w.kind_left_open == std::vector<std::string>{"HT"});
}

TEST_CASE("a short form that cannot be read says which words", "[refusal]") {
  CHECK_THROWS_AS(job_of({"230 50", {"heaters: 6.3 V 4 A"}}), refused);
  CHECK_THROWS_AS(job_of({"230 V 50 Hz", {}}), refused);
  CHECK_THROWS_AS(job_of({"230 V 50 Hz", {"6.3 V 4 A"}}), refused);
  CHECK_THROWS_AS(job_of({"230 V 50 Hz", {"heaters: 6.3 V"}}), refused);
  CHECK_THROWS_AS(job_of({"230 V 50 Hz", {"heaters: 6.3 V 4 A ct rms dc"}}), refused);
}
