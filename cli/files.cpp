#include "files.hpp"

#include <unistd.h>

#include <cstdio>
#include <filesystem>
#include <fstream>
#include <iostream>

#include <turnwright/remark/wording.hpp>

namespace turnwright::cli {
namespace {

constexpr std::size_t largest = 4u << 20;  // no job of a transformer is longer than 4 MiB

}  // namespace

std::string spoken(const std::string& path) { return path == "-" ? "standard input" : path; }

std::string read_whole(const std::string& path) {
  std::ifstream file;
  std::error_code trouble;
  if (path != "-") {
    if (std::filesystem::is_directory(path, trouble)) {
      throw refused(wording::other("unreadable", path, "a folder", "a job file"));
    }
    file.open(path, std::ios::binary);
    if (!file)
      throw refused(
          wording::other("unreadable", path, "no file that can be read", "a job file, or - for standard input"));
  }
  std::istream& in = path == "-" ? std::cin : file;
  std::string text;
  char room[65536];
  while (in.read(room, sizeof room) || in.gcount() > 0) {
    text.append(room, static_cast<std::size_t>(in.gcount()));
    if (text.size() > largest) throw refused(wording::other("too-long", spoken(path), "more than 4 MiB", "a job file"));
  }
  if (in.bad()) throw refused(wording::other("unreadable", spoken(path), "an error while reading", "a job file"));
  return text;
}

void check_target(const std::string& path, bool force) {
  const auto there = std::filesystem::symlink_status(path);
  if (!std::filesystem::exists(there)) return;
  if (!std::filesystem::is_regular_file(there)) {
    throw refused(
        wording::other("unwritable", path, "something that is no ordinary file", "the name of an ordinary file"));
  }
  if (!force)
    throw refused(
        wording::other("exists", path, "a file that is there already", "a new name", "--force overwrites it"));
}

void write_whole(const std::string& path, const std::string& text, bool force) {
  check_target(path, force);
  const std::string beside = path + ".part" + std::to_string(getpid());
  {
    std::ofstream out(beside, std::ios::binary | std::ios::trunc);
    out << text;
    out.flush();
    if (!out) {
      std::remove(beside.c_str());
      throw refused(wording::other("unwritable", path, "a place that cannot be written",
                                   "a folder with room that may be written to"));
    }
  }
  std::error_code trouble;
  std::filesystem::rename(beside, path, trouble);
  if (trouble) {
    std::remove(beside.c_str());
    throw refused(wording::other("unwritable", path, trouble.message(), "a place that may be written to"));
  }
}

}  // namespace turnwright::cli
