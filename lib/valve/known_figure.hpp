/// A figure that may be unknown, with how well it is known.
#pragma once

#include <turnwright/catalogue/standing.hpp>

#include <optional>

namespace turnwright {

template <class Q>
struct known_figure {
  std::optional<Q> value;                   ///< nothing where the table has no figure
  standing known_how = standing::estimate;  ///< of this figure alone
  bool weak = false;                        ///< to be confirmed before use

  explicit operator bool() const { return value.has_value(); }
  const Q& operator*() const { return *value; }
};

}  // namespace turnwright
