#include <turnwright/catalogue/table.hpp>

#include <near.hpp>

#include <random>

using namespace turnwright;
using namespace turnwright::testing;

namespace {

std::string in_quotes(const std::string& cell) {
  std::string out = "\"";
  for (const char c : cell) out += c == '"' ? std::string("\"\"") : std::string(1, c);
  return out + "\"";
}

}  // namespace

TEST_CASE("a table has a head of remarks, a header row and rows") {
  const auto rows = read_csv("# title\n# more\nsize,bare_mm\n\n0.5 mm,0.5\n# between\n1 mm,1\n", "x.csv");
  REQUIRE(rows.size() == 2);
  CHECK(rows[0].text("size") == "0.5 mm");
  CHECK(rows[1].needed("bare_mm") == 1.0);
  CHECK(rows[1].text("no such column").empty());
  CHECK_FALSE(rows[1].number("no such column"));
}

TEST_CASE("a cell in quotation marks may hold commas and doubled quotation marks") {
  const auto rows = read_csv("a,b\n\"one, two\",\"say \"\"3\"\"\"\n,\" x \"\n", "x.csv");
  REQUIRE(rows.size() == 2);
  CHECK(rows[0].text("a") == "one, two");
  CHECK(rows[0].text("b") == "say \"3\"");
  CHECK(rows[1].text("a").empty());
}

TEST_CASE("a table saved on another machine reads the same") {
  const std::string plain_text = "# title\na,b\n1,2\n3,4\n";
  const std::string windows = "\xEF\xBB\xBF# title\r\na,b\r\n1,2\r\n3,4";
  const auto one = read_csv(plain_text, "x.csv"), other = read_csv(windows, "x.csv");
  REQUIRE(one.size() == other.size());
  for (std::size_t i = 0; i < one.size(); ++i) {
    CHECK(one[i].text("a") == other[i].text("a"));
    CHECK(one[i].text("b") == other[i].text("b"));
    CHECK(one[i].place("b") == other[i].place("b"));
  }
}

TEST_CASE("blanks about a cell do not count") {
  const auto rows = read_csv("a , b\n 1 ,\t2 \n", "x.csv");
  CHECK(rows.at(0).text("a") == "1");
  CHECK(rows.at(0).text("b") == "2");
}

TEST_CASE("a row knows its line and column") {
  const auto rows = read_csv("# title\na,b\n\n1,2\n", "shop/x.csv");
  CHECK(rows.at(0).place() == "shop/x.csv:4");
  CHECK(rows.at(0).place("b") == "shop/x.csv:4:b");
}

TEST_CASE("rows with cells too few or too many are refused, all of them, with their lines", "[refusal]") {
  const auto faults = faults_of([] { read_csv("a,b\n1,2\n1\n1,2,3\n1,2\n", "x.csv"); });
  REQUIRE(faults.size() == 2);
  CHECK(faults[0].code == "bad-row");
  CHECK(faults[0].where == "x.csv:3");
  CHECK(faults[0].found == "1 cells");
  CHECK(faults[0].wanted == "2 cells, as in the header row");
  CHECK(faults[1].where == "x.csv:4");
  CHECK(faults[1].found == "3 cells");
}

TEST_CASE("a quotation mark left open is refused and not told as a wrong count of cells", "[refusal]") {
  const auto faults = faults_of([] { read_csv("a,b\n1,\"2\n", "x.csv"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].where == "x.csv:2");
  CHECK(faults[0].found != "2 cells");
}

TEST_CASE("a table without a header row is refused", "[refusal]") {
  for (const char* text : {"", "\n\n", "# title alone\n", "\xEF\xBB\xBF"}) {
    const auto faults = faults_of([&] { read_csv(text, "x.csv"); });
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == "missing");
    CHECK(faults[0].wanted == "a header row");
  }
}

TEST_CASE("a figure that is no finite number is refused with its cell", "[refusal]") {
  for (const char* bad : {"1,5", "abc", "inf", "nan", "1e999", "0x10", "5 mm", "1.2.3"}) {
    const auto rows = read_csv("a,b\n1," + in_quotes(bad) + "\n", "x.csv");
    const auto faults = faults_of([&] { rows.at(0).number("b"); });
    INFO(bad);
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == "bad-number");
    CHECK(faults[0].where == "x.csv:2:b");
  }
  const auto rows = read_csv("a,b\n1,\n", "x.csv");
  CHECK_FALSE(rows.at(0).number("b"));
  const auto faults = faults_of([&] { rows.at(0).needed("b"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "missing");
  CHECK(faults[0].where == "x.csv:2:b");
}

TEST_CASE("a list stands in one cell, parted by semicolons") {
  const auto rows = read_csv("a\nAWG 24; 24 gauge;;x\n;\n", "x.csv");
  CHECK(rows.at(0).list("a") == std::vector<std::string>{"AWG 24", "24 gauge", "x"});
  CHECK(rows.at(1).list("a").empty());
  CHECK(rows.at(1).list("none").empty());
}

TEST_CASE("a standing that is none of the four words is refused", "[refusal]") {
  const auto rows = read_csv("a,standing\n1,read\n2,seen\n3,\n", "x.csv");
  CHECK(rows.at(0).known_how() == standing::read);
  for (const std::size_t i : {std::size_t{1}, std::size_t{2}}) {
    const auto faults = faults_of([&] { rows.at(i).known_how(); });
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == "unknown-standing");
  }
}

TEST_CASE("standings rise from estimate over memory and derived to read") {
  CHECK(standing::estimate < standing::memory);
  CHECK(standing::memory < standing::derived);
  CHECK(standing::derived < standing::read);
  CHECK(std::min({standing::read, standing::memory, standing::derived}) == standing::memory);
  for (const standing s : {standing::estimate, standing::memory, standing::derived, standing::read}) {
    CHECK(standing_named(word_of(s)) == s);
  }
  CHECK_FALSE(standing_named("Read"));
  CHECK_FALSE(standing_named(""));
}

TEST_CASE("names are compared without case, blanks and hyphens") {
  CHECK(name_key("EI 96") == name_key("ei-96"));
  CHECK(name_key("24 AWG") == name_key("24awg"));
  CHECK(name_key("M400-50A") == name_key("m400 50a"));
  CHECK(name_key("EI 96") != name_key("EI 66"));
}

TEST_CASE("any cells put in quotation marks are read back as they were", "[property]") {
  std::mt19937 random(4180);
  const std::vector<std::string> letters{"a", "b", " ", ",", "\"", ";", "#", "'", "\xC2\xB5"};
  for (int i = 0; i < 3000; ++i) {
    std::vector<std::string> cells;
    std::string line;
    for (int c = 0; c < 3; ++c) {
      std::string cell = "x";  // a letter at each end: blanks about a cell do not count
      for (auto n = random() % 8; n > 0; --n) cell += letters[random() % letters.size()];
      cell += "x";
      cells.push_back(cell);
      line += (c == 0 ? "" : ",") + in_quotes(cell);
    }
    const auto rows = read_csv("a,b,c\n" + line + "\n", "x.csv");
    if (rows.size() != 1 || rows[0].text("a") != cells[0] || rows[0].text("b") != cells[1] ||
        rows[0].text("c") != cells[2]) {
      FAIL(line);
    }
  }
}

TEST_CASE("no text does worse than be refused", "[property]") {
  std::mt19937 random(65536);
  const std::string letters = "ab,,\"\"\n\n\r# \xEF\xBB\xBF;1.\t";
  for (int i = 0; i < 30000; ++i) {
    std::string text;
    for (auto n = random() % 40; n > 0; --n) text += letters[random() % letters.size()];
    try {
      for (const row& r : read_csv(text, "x.csv")) {
        r.text("a");
        r.list("b");
      }
    } catch (const refused& why) {
      if (why.remarks().empty()) FAIL(text);
    }
  }
}
