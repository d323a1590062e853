/// From the stages of a periodic cycle to figures. Private to the supply layer.
#pragma once

#include <turnwright/supply/state.hpp>

#include "shooting.hpp"

namespace turnwright::supply::kernel {

/// All figures of a circuit's periodic state; `curves` too where asked for.
state figures_of(const elements& e, const stepper& grid, const shot& s, bool with_curves);

/// The highest of samples of a closed curve, with the parabola through it and its neighbours.
double crest(const std::vector<double>& y);

}  // namespace turnwright::supply::kernel
