/// A figure that a person wrote, read within a sane range.
#pragma once

#include <turnwright/remark/wording.hpp>

#include <optional>
#include <string>
#include <vector>

namespace turnwright {

/// The quantity a text holds, if it is one from `least` to `most`; else nothing, with a remark added to the faults.
/// The bounds are texts of the same kind, as they are shown to the person.
template <class Q>
std::optional<Q> read_within(const std::string& text, const std::string& where, const char* least, const char* most,
                             std::vector<remark>& faults) {
  const reading<Q> r = read<Q>(text);
  if (!r.value) {
    faults.push_back(wording::quantity(where, text, r.fault));
    return std::nullopt;
  }
  const Q found = *r.value, low = *read<Q>(least).value, high = *read<Q>(most).value;
  if (found < low || high < found) {
    faults.push_back(wording::out_of_range(where, text, least, most));
    return std::nullopt;
  }
  return found;
}

}  // namespace turnwright
