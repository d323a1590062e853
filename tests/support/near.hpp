/// Comparing quantities and reading published rows, for tests.
#pragma once

#include <turnwright/catalogue/table.hpp>
#include <turnwright/measure/quantity.hpp>

#include <catch2/catch.hpp>

#include <cmath>
#include <filesystem>
#include <fstream>
#include <sstream>
#include <string>
#include <vector>

namespace turnwright::testing {

/// Whether a figure lies within so many per cent of what was expected.
inline Approx within_percent(double expected, double percent) {
  return Approx(expected).epsilon(percent / 100).margin(1e-300);
}

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

/// Faults with which an action is refused; none when it is not.
template <class Action>
std::vector<remark> faults_of(Action action) {
  try {
    action();
  } catch (const refused& why) {
    return why.remarks();
  }
  return {};
}

/// A fresh folder of the shop's own tables below the scratch folder, with one file in it.
inline std::filesystem::path shop_folder(const std::string& name, const std::string& file, const std::string& text) {
  const std::filesystem::path folder = std::filesystem::path(TURNWRIGHT_SCRATCH) / "shop" / name;
  std::filesystem::remove_all(folder);
  std::filesystem::create_directories(folder);
  std::ofstream(folder / file, std::ios::binary) << text;
  return folder;
}

}  // namespace turnwright::testing
