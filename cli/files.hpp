/// Files read whole and written whole or not at all.
#pragma once

#include <string>

namespace turnwright::cli {

/// Text of a file, or of standard input for "-". Throws `refused` where it cannot be read or is absurdly large.
std::string read_whole(const std::string& path);

/// How a file is spoken of in messages.
std::string spoken(const std::string& path);

/// Throws `refused` where a file may not be written: it exists and `force` is not given, or it is no ordinary file.
void check_target(const std::string& path, bool force);

/// Writes a file whole: beside it first, then in its place. Throws `refused` like `check_target`, and where
/// it cannot be written; then nothing is left behind.
void write_whole(const std::string& path, const std::string& text, bool force);

}  // namespace turnwright::cli
