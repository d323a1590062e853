// A real number does not pass for turns without its rounding.
#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>

using namespace turnwright;
using namespace turnwright::literals;

#ifdef TURNWRIGHT_MISTAKE
teslas working_point(square_metres area) { return peak_flux_density(volts_rms{230_V}, 50_Hz, 581.2, area); }
#else
teslas working_point(square_metres area) { return peak_flux_density(volts_rms{230_V}, 50_Hz, nearest(581.2), area); }
#endif
