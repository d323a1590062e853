/// Running the built binary, for tests.
#pragma once

#include <sys/wait.h>
#include <unistd.h>

#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <string>

#include "near.hpp"

namespace turnwright::testing {

struct ran {
  int status = -1;
  std::string out, aside;
};

/// Runs the tool with shell words; `input` goes to its standard input.
inline ran run_tool(const std::string& words, const std::string& input = "") {
  const std::string folder = std::string(TURNWRIGHT_SCRATCH) + "/tool";
  std::filesystem::create_directories(folder);
  const std::string base =
      folder + "/" + std::to_string(std::hash<std::string>{}(words + input)) + "-" + std::to_string(getpid());
  std::ofstream(base + ".in", std::ios::binary) << input;
  const std::string command =
      "cd " + folder + " && '" TURNWRIGHT_TOOL "' " + words + " <" + base + ".in >" + base + ".out 2>" + base + ".err";
  const int raw = std::system(command.c_str());
  ran r{WIFEXITED(raw) ? WEXITSTATUS(raw) : -1, file_text(base + ".out"), file_text(base + ".err")};
  for (const char* tail : {".in", ".out", ".err"}) std::filesystem::remove(base + tail);
  return r;
}

}  // namespace turnwright::testing
