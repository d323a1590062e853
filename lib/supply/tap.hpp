/// Where the currents of two ports meet. Private to the supply layer.
#pragma once

#include <algorithm>

namespace turnwright::supply::kernel {

/// What one port has to do with another: its resistance, and the number of the port it is a tap of, or -1.
struct tap_place {
  double r;
  int inside;
};

/// Resistance that the currents of ports k and m meet together: a port's own, a tap's with the half it is a tap of, and
/// of two taps of one half that of the shorter, since both begin at the same end [ohm].
inline double shared_resistance(const tap_place& a, int k, const tap_place& b, int m) {
  if (k == m || a.inside == m) return a.r;
  if (b.inside == k) return b.r;
  return a.inside >= 0 && a.inside == b.inside ? std::min(a.r, b.r) : 0.0;
}

/// Whether the current of port b also flows at the far end of port a: that of a itself, of the half that a is a tap of,
/// and of a longer tap of the same half.
inline bool flows_through(const tap_place& a, int k, const tap_place& b, int m) {
  return m == k || a.inside == m || (a.inside >= 0 && b.inside == a.inside && b.r >= a.r);
}

}  // namespace turnwright::supply::kernel
