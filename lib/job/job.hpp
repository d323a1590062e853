/// Job files: reading them into a demand, making one from the short form, writing one.
#pragma once

#include <turnwright/plan/demand.hpp>
#include <turnwright/plan/shop.hpp>

#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// Reads a job for `plan`. Every default that is filled in is listed in `assumed`.
/// Throws `refused` with all faults of the text at once; `origin` is the file's name.
demand read_job(std::string_view text, const std::string& origin, const shop& s, const catalogue& tables);

/// A job on the command line.
struct short_form {
  std::string mains;                  ///< "230 V 50 Hz"
  std::vector<std::string> windings;  ///< "heaters: 6.3 V 4 A ct"
};

/// The job file that a short form stands for. Throws `refused` with all faults.
std::string job_of(const short_form& s);

}  // namespace turnwright
