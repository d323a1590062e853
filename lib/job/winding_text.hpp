/// Volts of a winding as they are written: "6.3 V", "300-0-300 V", "300-0-288 V no load". Private to the job layer.
#pragma once

#include <turnwright/measure/read.hpp>
#include <turnwright/remark/remark.hpp>

#include <optional>
#include <string>
#include <vector>

namespace turnwright::job_detail {

struct winding_volts {
  volts first;
  std::optional<volts> second;  ///< present where it is written as halves
  bool no_load = false;
};

/// Reads the volts of a winding; faults are noted with the place.
std::optional<winding_volts> read_winding_volts(const std::string& text, const std::string& where,
                                                std::vector<remark>& faults);

}  // namespace turnwright::job_detail
