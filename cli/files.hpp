/// Files read whole and written whole or not at all.
#pragma once

#include <string>

namespace turnwright::cli {

/// Text of a file, or of standard input for "-". Throws `refused` where it cannot be read or is absurdly large.
std::string read_whole(const std::string& path);

/// How a file is spoken of in messages.
std::string spoken(const std::string& path);

/// Writes a file whole: beside it first, then in its place. Throws `refused` where the file exists and `force` is not
/// given, or where it cannot be written; then nothing is left behind.
void write_whole(const std::string& path, const std::string& text, bool force);

}  // namespace turnwright::cli
