/// Comparing quantities and reading published rows, for tests.
#pragma once

#include <turnwright/catalogue/table.hpp>
#include <turnwright/measure/quantity.hpp>

#include <catch2/catch.hpp>

#include <cmath>
#include <fstream>
#include <sstream>
#include <string>
#include <vector>

namespace turnwright::testing {

/// Whether a figure lies within so many per cent of what was expected.
inline Approx within_percent(double expected, double percent) { return Approx(expected).epsilon(percent / 100).margin(1e-300); }

/// Rows of tests/published/NAME.csv.
inline std::vector<row> published(const std::string& name) {
  const std::string path = std::string(TURNWRIGHT_TEST_FOLDER) + "/published/" + name + ".csv";
  std::ifstream in(path);
  REQUIRE(in);
  std::ostringstream text;
  text << in.rdbuf();
  return read_csv(text.str(), name + ".csv");
}

/// Whole text of a file.
inline std::string file_text(const std::string& path) {
  std::ifstream in(path, std::ios::binary);
  REQUIRE(in);
  std::ostringstream text;
  text << in.rdbuf();
  return text.str();
}

}  // namespace turnwright::testing
