#include <turnwright/catalogue/catalogue.hpp>

#include <near.hpp>

#include <cstdlib>
#include <set>

using namespace turnwright;
using namespace turnwright::testing;

namespace {

std::string header_of(const table& t) {
  std::istringstream in(t.text);
  std::string line;
  while (std::getline(in, line) && (line.empty() || line.front() == '#')) {
  }
  return line;
}

std::string line_of(const table& t, const row& r) {
  std::istringstream in(t.text);
  std::string line;
  const std::string place = r.place();
  const int number = std::stoi(place.substr(place.rfind(':') + 1));
  for (int i = 0; i < number; ++i) std::getline(in, line);
  return line;
}

bool one_row_to_a_name(const std::string& table_name) {
  return table_name != "stacks" && table_name != "formers" && table_name != "steel_magnetisation" &&
         table_name != "steel_loss" && table_name != "rectifier_resistances" && table_name != "output_stages";
}

std::vector<std::string> texts(const std::vector<row>& rows, const std::string& column) {
  std::vector<std::string> out;
  for (const row& r : rows) out.push_back(r.text(column));
  return out;
}

}  // namespace

TEST_CASE("every bundled table loads, and its text is its file to the byte") {
  const catalogue tables = catalogue::bundled();
  CHECK(tables.names().size() >= 19);
  for (const std::string& name : tables.names()) {
    INFO(name);
    const table& t = tables.named(name);
    CHECK_FALSE(t.rows.empty());
    CHECK(t.text == file_text(std::string(TURNWRIGHT_TEST_FOLDER) + "/../tables/" + name + ".csv"));
  }
}

TEST_CASE("every bundled row says where it came from and how well it is known") {
  const catalogue tables = catalogue::bundled();
  for (const std::string& name : tables.names()) {
    for (const row& r : tables.named(name).rows) {
      INFO(r.place());
      CHECK_FALSE(r.source().empty());
      CHECK_NOTHROW(r.known_how());
    }
  }
}

TEST_CASE("every source that a bundled row names is spelt out in the head of its table") {
  const catalogue tables = catalogue::bundled();
  for (const std::string& name : tables.names()) {
    const table& t = tables.named(name);
    std::set<std::string> keys;
    for (const row& r : t.rows) {
      std::istringstream words(r.text("source"));
      for (std::string word; words >> word;) {
        if (word != "+") keys.insert(word);
      }
    }
    for (const std::string& key : keys) {
      INFO(name << ": " << key);
      CHECK(t.text.find("\n#   " + key + ": ") != std::string::npos);
    }
  }
}

TEST_CASE("no bundled name stands twice in its table") {
  const catalogue tables = catalogue::bundled();
  for (const std::string& name : tables.names()) {
    if (!one_row_to_a_name(name)) continue;
    const table& t = tables.named(name);
    const std::string first_column = header_of(t).substr(0, header_of(t).find(','));
    std::set<std::string> keys;
    for (const row& r : t.rows) {
      INFO(r.place());
      CHECK(keys.insert(name_key(r.text(first_column))).second);
    }
  }
}

TEST_CASE("a table that is not bundled is our own slip and not the user's") {
  CHECK_THROWS_AS(catalogue::bundled().named("valves of Mars"), std::logic_error);
}

TEST_CASE("no folder of the shop's own leaves the tables as they are") {
  const catalogue bundled = catalogue::bundled(), same = catalogue::with_shop_rows({});
  REQUIRE(same.names() == bundled.names());
  for (const std::string& name : bundled.names())
    CHECK(same.named(name).rows.size() == bundled.named(name).rows.size());
}

TEST_CASE("a row of the shop replaces the bundled row of its name, and a new name is added") {
  const std::string csv =
      "size,aliases,bare_mm,grade1_mm,grade2_mm,grade3_mm,tolerance_mm,resistance_min_ohm_per_m,resistance_max_ohm_per_"
      "m,standing,source\n"
      "0.5-MM,,0.5,0.555,0.57,0.6,,,,read,maker's sheet\n"
      "0.51 mm,,0.51,0.56,0.58,0.6,,,,read,maker's sheet\n";
  const catalogue tables = catalogue::with_shop_rows({shop_folder("replace", "wire_metric.csv", csv)});
  const auto& rows = tables.named("wire_metric").rows;
  CHECK(rows.size() == catalogue::bundled().named("wire_metric").rows.size() + 1);
  int half = 0;
  for (const row& r : rows) {
    if (name_key(r.text("size")) != "0.5mm") continue;
    ++half;
    CHECK(r.needed("grade1_mm") == 0.555);
    CHECK(r.place("grade1_mm").find("shop/replace/wire_metric.csv:2:grade1_mm") != std::string::npos);
  }
  CHECK(half == 1);
  CHECK(rows.back().text("size") == "0.51 mm");
}

TEST_CASE("a curve of the shop replaces the whole bundled curve of its name") {
  const std::string csv =
      "curve,frequency_hz,flux_density_t,loss_w_per_kg,standing,source\nm-19,50,1,1.1,read,own\nm-19,50,1.5,2.6,read,"
      "own\n";
  const catalogue tables = catalogue::with_shop_rows({shop_folder("curve", "steel_loss.csv", csv)});
  int points = 0;
  for (const row& r : tables.named("steel_loss").rows) points += name_key(r.text("curve")) == "m19" ? 1 : 0;
  CHECK(points == 2);
}

TEST_CASE("a later folder goes before an earlier one") {
  const auto csv = [](const char* volts) {
    return std::string("region,aliases,nominal_v,frequency_hz,plus_ratio,minus_ratio,standing,source\nEurope,,") +
           volts + ",50,,,read,own\n";
  };
  const auto first = shop_folder("first", "mains.csv", csv("231")),
             second = shop_folder("second", "mains.csv", csv("232"));
  const catalogue tables = catalogue::with_shop_rows({first, second});
  int seen = 0;
  for (const row& r : tables.named("mains").rows) {
    if (r.text("region") != "Europe") continue;
    ++seen;
    CHECK(r.needed("nominal_v") == 232.0);
  }
  CHECK(seen == 1);
}

TEST_CASE("a bundled table copied into the shop's folder changes nothing", "[property]") {
  const catalogue bundled = catalogue::bundled();
  for (const std::string& name : bundled.names()) {
    INFO(name);
    const table& t = bundled.named(name);
    const catalogue copied = catalogue::with_shop_rows({shop_folder("copy", name + ".csv", t.text)});
    CHECK(copied.named(name).rows.size() == t.rows.size());
    CHECK(texts(copied.named(name).rows, "source") == texts(t.rows, "source"));
  }
}

TEST_CASE("one bundled row in the shop's folder replaces itself and no other", "[property]") {
  const catalogue bundled = catalogue::bundled();
  for (const std::string& name : bundled.names()) {
    if (!one_row_to_a_name(name)) continue;
    INFO(name);
    const table& t = bundled.named(name);
    const std::string csv = header_of(t) + "\n" + line_of(t, t.rows[t.rows.size() / 2]) + "\n";
    const catalogue laid_over = catalogue::with_shop_rows({shop_folder("one", name + ".csv", csv)});
    CHECK(laid_over.named(name).rows.size() == t.rows.size());
  }
}

TEST_CASE("a row's source is written out as its table's head explains it") {
  const auto rows = read_csv(
      "# T\n# Sources:\n#   bs: British Standard 1,\n#     second line\n#   own: own meter\n# standing: "
      "x\na,source\n1,bs + own\n2,none\n",
      "t.csv");
  CHECK(rows.at(0).source() == "British Standard 1, second line; own meter");
  CHECK(rows.at(1).source() == "none");
}

TEST_CASE("a row of the shop names its file as its source") {
  const std::string csv =
      "region,aliases,nominal_v,frequency_hz,plus_ratio,minus_ratio,standing,source\nSealand,,230,50,,,read,own "
      "meter\n";
  const catalogue tables = catalogue::with_shop_rows({shop_folder("sealand", "mains.csv", csv)});
  const std::string source = tables.named("mains").rows.back().source();
  CHECK(source.find("own meter") != std::string::npos);
  CHECK(source.find("mains.csv") != std::string::npos);
}

TEST_CASE("a table of unknown name in the shop's folder is refused with the nearest name", "[refusal]") {
  const auto folder = shop_folder("unknown", "wire_metrik.csv", "size,bare_mm\n1 mm,1\n");
  const auto faults = faults_of([&] { catalogue::with_shop_rows({folder}); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "unknown-name");
  CHECK(faults[0].where == (folder / "wire_metrik.csv").string());
  CHECK(faults[0].hint.find("wire_metric") != std::string::npos);
}

TEST_CASE("files in the shop's folder that are no tables are let alone") {
  const auto folder = shop_folder("notes", "notes.txt", "buy more wire");
  CHECK_NOTHROW(catalogue::with_shop_rows({folder}));
}

TEST_CASE("a folder that is not there is refused by its name", "[refusal]") {
  const auto faults = faults_of([] { catalogue::with_shop_rows({"/no/such/folder"}); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "no-folder");
  CHECK(faults[0].where == "/no/such/folder");
}

TEST_CASE("a bad row of the shop is refused with its file and line", "[refusal]") {
  const auto folder = shop_folder("bad", "mains.csv", "region,nominal_v\nSealand\n");
  const auto faults = faults_of([&] { catalogue::with_shop_rows({folder}); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].where == (folder / "mains.csv").string() + ":2");
}

TEST_CASE("the environment names folders parted by colons") {
  ::setenv("TURNWRIGHT_TABLES", "/a:/b c::/d", 1);
  CHECK(table_folders_of_environment() == std::vector<std::filesystem::path>{"/a", "/b c", "/d"});
  ::setenv("TURNWRIGHT_TABLES", "", 1);
  CHECK(table_folders_of_environment().empty());
  ::unsetenv("TURNWRIGHT_TABLES");
  CHECK(table_folders_of_environment().empty());
}
