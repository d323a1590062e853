/// Rails, states, checks and assumptions as JSON, the same in every result. Private to the job layer.
#pragma once

#include <turnwright/plan/rails.hpp>

#include "figures_json.hpp"

namespace turnwright::job_detail {

/// Adds `rails` and `states`.
void add_rails(json& j, const supply_study& s);

json check_json(const check& c);

}  // namespace turnwright::job_detail
