/// Reading rails, rectifiers and loads. Private to the job layer.
#pragma once

#include "sections.hpp"

namespace turnwright::job_detail {

/// Whether a winding has any key of a rectified load; marks them all as known.
bool asks_for_rail(page& w);

/// The rail of a winding. `halves`: it is written as halves; `tap`: it is a tap, with one end where its host's stays;
/// `winding`: its volts, of a half where it has two; `guessed`: the direct current where neither rail nor dc_current is
/// given.
std::optional<rail_wish> read_rail(reading_desk& desk, page& w, bool halves, bool tap, volts winding,
                                   std::optional<amperes> guessed);

/// Lists the sine at the wall among what is assumed.
void assume_sine(reading_desk& desk);

/// Volts of the winding, or of each half, to begin with where a rail has a target.
volts guessed_winding(const rail_wish& r);

}  // namespace turnwright::job_detail
