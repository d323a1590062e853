/// Job files: reading them into a demand, making one from the short form, writing one.
#pragma once

#include <turnwright/plan/demand.hpp>
#include <turnwright/plan/rails.hpp>
#include <turnwright/plan/shop.hpp>

#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// Reads a job for `plan`. Every default that is filled in is listed in `assumed`.
/// Throws `refused` with all faults of the text at once; `origin` is the file's name.
demand read_job(std::string_view text, const std::string& origin, const shop& s, const catalogue& tables);

/// A transformer that exists, with its supply, as a job's section `known` and its secondaries give it.
struct known_supply {
  amplifier_supply supply;
  std::vector<assumption> assumed;
};

/// Whether a job has a known transformer. Throws `refused` for a text that is no job.
bool is_known(std::string_view text, const std::string& origin);

/// Reads a job with a known transformer. Throws `refused` with all faults of the text at once.
known_supply read_known(std::string_view text, const std::string& origin, const shop& s, const catalogue& tables);

/// A job on the command line.
struct short_form {
  std::string mains;                  ///< "230 V 50 Hz"
  std::vector<std::string> windings;  ///< "heaters: 6.3 V 4 A ct"
};

/// What a short form stands for.
struct written_job {
  std::string text;  ///< the job file
  std::vector<std::string>
      kind_left_open;  ///< windings whose amperes are called neither rms nor dc, and were taken as dc
};
/// The job that a short form stands for. Throws `refused` with all faults.
written_job job_of(const short_form& s);

}  // namespace turnwright
