/// Relations that hide a 2 pi or a root 2: named once, so that no frequency is multiplied in the open elsewhere.
#pragma once

#include <turnwright/measure/stated.hpp>
#include <turnwright/measure/turns.hpp>

namespace turnwright {

/// Reactance of an inductance [ohm]: 2 pi f L.
ohms reactance(hertz f, henries l);
/// Reactance of a capacitance [ohm]: 1 / (2 pi f C). Refuses nothing; zero capacitance gives infinity.
ohms reactance(hertz f, farads c);
/// Inductance whose reactance is x at frequency f [H].
henries inductance_of(ohms x, hertz f);

/// Peak flux density of a core under sine volts [T].
///
///   B = V / (sqrt(2) pi f N A)
///
/// V is the EMF of the winding; A is the net iron area. Source: law of induction for a sine (exact).
/// Checked: tests/measure/electrics.cpp, worked examples of three sources.
teslas peak_flux_density(volts_rms emf, hertz f, turns n, square_metres net_area);

/// Turns, not yet whole, that keep the peak flux density at b: V / (sqrt(2) pi f B A). Source: as above.
double turns_for(volts_rms emf, hertz f, teslas b, square_metres net_area);

}  // namespace turnwright
