#include <turnwright/measure/electrics.hpp>

#include <numbers>

namespace turnwright {

using std::numbers::pi;
using std::numbers::sqrt2;

ohms reactance(hertz f, henries l) { return as<ohms>(2 * pi * plain(f) * plain(l)); }

ohms reactance(hertz f, farads c) { return as<ohms>(1 / (2 * pi * plain(f) * plain(c))); }

henries inductance_of(ohms x, hertz f) { return as<henries>(plain(x) / (2 * pi * plain(f))); }

teslas peak_flux_density(volts_rms emf, hertz f, turns n, square_metres net_area) {
  return as<teslas>(plain(emf.plain()) / (sqrt2 * pi * plain(f) * n.count() * plain(net_area)));
}

double turns_for(volts_rms emf, hertz f, teslas b, square_metres net_area) {
  return plain(emf.plain()) / (sqrt2 * pi * plain(f) * plain(b) * plain(net_area));
}

}  // namespace turnwright
