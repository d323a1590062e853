#include <turnwright/remark/wording.hpp>

#include <near.hpp>

#include <random>

using namespace turnwright;
using namespace turnwright::testing;

namespace {

const std::vector<std::string> keys{"volts", "amperes", "kind", "name", "frequency", "core", "mains"};

remark misread_of(std::string_view text, kind k) {
  return wording::quantity("/windings/1/volts", text, read_plain(text, k).fault);
}

bool whole_utf8(std::string_view s) {
  for (std::size_t i = 0; i < s.size();) {
    const auto c = static_cast<unsigned char>(s[i]);
    const std::size_t more = c < 0x80 ? 0 : c >= 0xF0 ? 3 : c >= 0xE0 ? 2 : c >= 0xC0 ? 1 : 9;
    if (more == 9 || i + more >= s.size()) return false;
    for (std::size_t j = 1; j <= more; ++j) {
      if ((static_cast<unsigned char>(s[i + j]) & 0xC0) != 0x80) return false;
    }
    i += more + 1;
  }
  return true;
}

}  // namespace

TEST_CASE("a slip of the pen is set right by the nearest word", "[refusal]") {
  const auto nearest_to = [](std::string_view word) { return wording::nearest(word, keys); };
  CHECK(nearest_to("votls") == std::vector<std::string>{"volts"});   // neighbours swapped
  CHECK(nearest_to("volt") == std::vector<std::string>{"volts"});    // a letter left out
  CHECK(nearest_to("vvolts") == std::vector<std::string>{"volts"});  // a letter twice
  CHECK(nearest_to("vilts") == std::vector<std::string>{"volts"});   // another letter
  CHECK(nearest_to("VOLTS") == std::vector<std::string>{"volts"});   // capitals
  CHECK(nearest_to("freqency") == std::vector<std::string>{"frequency"});
  CHECK(nearest_to("thermocouple").empty());
  CHECK(nearest_to("").empty());
  CHECK(nearest_to(std::string(61, 'v')).empty());
}

TEST_CASE("the nearest words stand in order, no more than were asked for") {
  const std::vector<std::string> sizes{"EI 60", "EI 66", "EI 96", "M 102", "UI 30"};
  const auto found = wording::nearest("EI 66", sizes, 2);
  REQUIRE(found.size() == 2);
  CHECK(found.front() == "EI 66");
  CHECK(found.back() == "EI 60");
}

TEST_CASE("a known word is its own nearest, and a nearest word is always a known one", "[property]") {
  std::mt19937 random(26);
  for (const std::string& k : keys) CHECK(wording::nearest(k, keys).front() == k);
  for (int i = 0; i < 3000; ++i) {
    std::string word;
    for (auto n = random() % 10; n > 0; --n) word += static_cast<char>('a' + random() % 26);
    for (const std::string& near : wording::nearest(word, keys, 3)) {
      if (std::find(keys.begin(), keys.end(), near) == keys.end()) FAIL(word);
    }
  }
}

TEST_CASE("a quoted text is cut at 60 characters and shows control characters as dots", "[refusal]") {
  CHECK(wording::quoted("230 V") == "\"230 V\"");
  CHECK(wording::quoted("") == "\"\"");
  CHECK(wording::quoted("a\nb\tc\x7F"
                        "d\x1B[2J") == "\"a.b.c.d.[2J\"");
  CHECK(wording::quoted(std::string("a\0b", 3)) == "\"a.b\"");
  CHECK(wording::quoted(std::string(60, 'x')) == "\"" + std::string(60, 'x') + "\"");
  CHECK(wording::quoted(std::string(61, 'x')) == "\"" + std::string(60, 'x') + "...\"");
  CHECK(wording::quoted("47 µF") == "\"47 µF\"");
}

TEST_CASE("a quoted text that is cut keeps its last letter whole", "[refusal]") {
  for (std::size_t n = 55; n < 62; ++n) CHECK(whole_utf8(wording::quoted(std::string(n, 'x') + "µµµµ")));
  for (std::size_t n = 55; n < 62; ++n) CHECK(whole_utf8(wording::quoted(std::string(n, 'x') + "ΩΩ℧℧")));
}

TEST_CASE("a misread quantity is told with what was found and what was wanted", "[refusal]") {
  const remark current = misread_of("275 A", kind::voltage);
  CHECK(current.code == "wrong-unit");
  CHECK(current.where == "/windings/1/volts");
  CHECK(current.found == "\"275 A\", which is a current");
  CHECK(current.wanted == "a voltage in volts (V), such as \"230 V\"");
  CHECK(current.hint.empty());

  const remark bare = misread_of("5", kind::voltage);
  CHECK(bare.code == "no-unit");
  CHECK(bare.found == "\"5\", a number without its unit");
  CHECK(bare.hint == "write the unit after the number");

  const remark unknown = misread_of("1,5 V", kind::voltage);
  CHECK(unknown.code == "unknown-unit");
  CHECK(unknown.found == "\"1,5 V\"; \",5 V\" is no unit known here");

  CHECK(misread_of("", kind::mass).code == "empty");
  CHECK(misread_of("", kind::mass).found == "an empty text");
  CHECK(misread_of("V", kind::voltage).code == "no-number");
  CHECK(misread_of("1e999 V", kind::voltage).code == "not-finite");
  CHECK(misread_of("1e999 V", kind::voltage).found == "\"1e999 V\", which is no finite figure");
}

TEST_CASE("a number where a text with a unit belongs is told apart from any other sort", "[refusal]") {
  const remark number = wording::not_a_quantity("/mains/volts", "230", kind::voltage, true);
  CHECK(number.code == "no-unit");
  CHECK(number.hint == "write it as text with its unit, in quotation marks");
  const remark list = wording::not_a_quantity("/mains/volts", "a list", kind::voltage, false);
  CHECK(list.code == "wrong-sort");
  CHECK(list.hint.empty());
}

TEST_CASE("unknown keys, words and names are refused with the nearest known ones", "[refusal]") {
  const remark key = wording::unknown_key("/windings/0", "votls", keys);
  CHECK(key.code == "unknown-key");
  CHECK(key.found == "the key \"votls\"");
  CHECK(key.wanted == "one of: volts, amperes, kind, name, frequency, core, mains");
  CHECK(key.hint == "did you mean \"volts\"?");
  const remark word = wording::unknown_word("/core", "cor", keys);
  CHECK(word.code == "unknown-word");
  CHECK(word.hint == "did you mean \"core\"?");
  const remark name = wording::unknown_name("/core", "manes", "a table of a known name", keys);
  CHECK(name.code == "unknown-name");
  CHECK(name.hint == "near it stand: mains");
  const remark far = wording::unknown_name("/core", "qqqqqqqqqqqq", "a table of a known name", keys);
  CHECK(far.hint.empty());
}

TEST_CASE("the other refusals carry their place, code and text", "[refusal]") {
  CHECK(wording::missing("/mains", "a voltage").code == "missing");
  CHECK(wording::missing("/mains", "a voltage").found == "nothing");
  CHECK(wording::wrong_sort("/mains", "a list", "an object").code == "wrong-sort");
  CHECK(wording::not_yet("/mains", "three phases").code == "not-yet");
  const remark range = wording::out_of_range("/mains", "1 kHz", "10 Hz", "500 Hz");
  CHECK(range.code == "out-of-range");
  CHECK(range.wanted == "something from 10 Hz to 500 Hz");
  const remark two = wording::ambiguous_name("/core", "EI 75", std::vector<std::string>{"EI 75 mm", "EI 3/4 in"});
  CHECK(two.code == "ambiguous-name");
  CHECK(two.wanted == "one of: EI 75 mm, EI 3/4 in");
}

TEST_CASE("a remark is worded in place, found, wanted, code and hint", "[refusal]") {
  CHECK(worded({"no-unit", "/mains/volts", "\"5\"", "a voltage", "write the unit"}) ==
        "/mains/volts: found \"5\"; wanted a voltage [no-unit]\n  hint: write the unit");
  CHECK(worded({"missing", "", "", "a voltage", ""}) == "wanted a voltage [missing]");
  CHECK(worded({"empty", "x.csv:3", "nothing", "", ""}) == "x.csv:3: found nothing [empty]");
}

TEST_CASE("a refusal carries every remark, tells the first and counts the rest", "[refusal]") {
  const remark first{"missing", "/a", "nothing", "this", ""}, second{"empty", "/b", "nothing", "that", ""};
  CHECK(refused(first).what() == worded(first));
  const refused both(std::vector<remark>{first, second});
  CHECK(both.remarks().size() == 2);
  CHECK(both.what() == worded(first) + "\nand 1 more");
  CHECK_THROWS_AS(refused(std::vector<remark>{}), std::logic_error);
}

TEST_CASE("levels rise from pass to stop, each with its word") {
  CHECK(level::pass < level::note);
  CHECK(level::note < level::caution);
  CHECK(level::caution < level::stop);
  CHECK(word_of(level::pass) == "pass");
  CHECK(word_of(level::note) == "note");
  CHECK(word_of(level::caution) == "caution");
  CHECK(word_of(level::stop) == "stop");
}
