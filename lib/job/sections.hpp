/// The sections of a job, each read by a function of its own. Private to the job layer.
#pragma once

#include <turnwright/job/job.hpp>
#include <turnwright/valve/valve_list.hpp>

#include "page.hpp"

namespace turnwright::job_detail {

/// What the sections share.
struct reading_desk {
  const shop& tools;
  const catalogue& tables;
  demand& out;
  std::vector<remark>& faults;
  std::vector<valve_count> valves = {};        ///< the job's list
  std::optional<ht_current_guess> draws = {};  ///< what they draw, roughly

  /// Notes a default that was filled in.
  void assume(std::string path, std::string value, std::string why) {
    out.assumed.push_back({std::move(path), std::move(value), std::move(why)});
  }
};

/// How far the mains may lie from nominal, as ratios.
struct tolerance {
  double over, under;
};
/// The section `mains` as far as it does not hang on the primary.
struct mains_read {
  std::optional<volts> wall;
  std::optional<tolerance> band;
  std::optional<ohms> source;
  bool has_band = false;
};
mains_read read_mains(reading_desk& desk, page& root);
/// The band of the mains into the demand, that of the usual supply where the job is silent.
void settle_band(reading_desk& desk, const mains_read& read, volts nominal);

/// Format and title of a job.
void read_head(reading_desk& desk, page& root);
/// Parts of the contract that this version does not do.
void refuse_later_parts(page& root);

void read_valves(reading_desk& desk, page& root);
void read_mains_and_primary(reading_desk& desk, page& root);
void read_secondaries(reading_desk& desk, page& root);
void read_screens_and_order(reading_desk& desk, page& root);
void read_core(reading_desk& desk, page& root);
void read_former(reading_desk& desk, page& root);
void read_insulation(reading_desk& desk, page& root);
void read_wire(reading_desk& desk, page& root);
void read_limits(reading_desk& desk, page& root);
void read_aim_and_prices(reading_desk& desk, page& root);

/// Turns, wire, strands, tolerance and resistance that a winding may fix.
winding_wishes read_wishes(reading_desk& desk, page& winding);

}  // namespace turnwright::job_detail
