/// The state that a mains cycle brings back to itself. Private to the supply layer.
#pragma once

#include "cycle.hpp"

namespace turnwright::supply::kernel {

struct shot {
  std::vector<double> x;  // the state at the mains' rising zero crossing
  record last;            // of the cycle from x, on the fine grid
  double residual;        // largest change over that cycle, each state against its scale
  bool settled;
  int cycles;  // stepped through on any grid
};

/// Finds the periodic state. `fine` steps the grid that the figures are taken from.
shot shoot(const elements& e, stepper& fine);

}  // namespace turnwright::supply::kernel
