/// Whole turns. Getting them from a real number always says how it was rounded.
#pragma once

#include <cmath>
#include <compare>

namespace turnwright {

/// A number of turns of wire, whole.
class turns {
 public:
  constexpr turns() = default;
  constexpr explicit turns(int count) : count_(count) {}
  /// The count itself.
  constexpr int count() const { return count_; }
  friend constexpr auto operator<=>(turns, turns) = default;
  friend constexpr turns operator+(turns a, turns b) { return turns{a.count_ + b.count_}; }
  friend constexpr turns operator-(turns a, turns b) { return turns{a.count_ - b.count_}; }

 private:
  int count_ = 0;
};

/// The least whole number of turns that is not under x.
inline turns rounded_up(double x) { return turns{static_cast<int>(std::ceil(x - 1e-9))}; }
/// The largest whole number of turns that is not over x.
inline turns rounded_down(double x) { return turns{static_cast<int>(std::floor(x + 1e-9))}; }
/// The whole number of turns nearest to x.
inline turns nearest(double x) { return turns{static_cast<int>(std::lround(x))}; }
/// The even number of turns nearest to x, for a centre-tapped winding.
inline turns nearest_even(double x) { return turns{2 * static_cast<int>(std::lround(x / 2))}; }

}  // namespace turnwright
