#include <turnwright/sheet/columns.hpp>

#include "near.hpp"

using namespace turnwright;

TEST_CASE("columns line up whatever stands in them", "[sheet]") {
  text_table t({"name", "<left", "right"});
  t.add({"a", "x", "1"});
  t.add({"longer", "yyy", "100"});
  CHECK(t.text() == "  name    left  right\n  a       x         1\n  longer  yyy     100\n");
}

TEST_CASE("a table wider than the paper goes on below with its first column again", "[sheet]") {
  text_table t({"name", std::string(50, 'h'), std::string(50, 'k')});
  t.add({"row", "1", "2"});
  const std::string text = t.text();
  CHECK(text.find("\n\n  name") != std::string::npos);
}

TEST_CASE("paragraphs wrap at the paper's edge and keep their indent", "[sheet]") {
  std::string words;
  for (int i = 0; i < 60; ++i) words += "turns ";
  const std::string text = labelled("Label", words);
  std::size_t from = 0;
  int lines = 0;
  while (from < text.size()) {
    const std::size_t to = text.find('\n', from);
    CHECK(to - from <= paper_width);
    if (lines++ > 0) CHECK(text.substr(from, 12) == std::string(12, ' '));
    from = to + 1;
  }
  CHECK(lines > 2);
}

TEST_CASE("a letter of two bytes takes one column", "[sheet]") { CHECK(shown_width("Ω µ") == 3); }
