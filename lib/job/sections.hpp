/// The sections of a job, each read by a function of its own. Private to the job layer.
#pragma once

#include <turnwright/job/job.hpp>

#include "page.hpp"

namespace turnwright::job_detail {

/// What the sections share.
struct reading_desk {
  const shop& tools;
  const catalogue& tables;
  demand& out;
  std::vector<remark>& faults;

  /// Notes a default that was filled in.
  void assume(std::string path, std::string value, std::string why) {
    out.assumed.push_back({std::move(path), std::move(value), std::move(why)});
  }
};

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
