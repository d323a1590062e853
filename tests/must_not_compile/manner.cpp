// Volts r.m.s. do not pass for peak volts.
#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/stated.hpp>

using namespace turnwright;
using namespace turnwright::literals;

#ifdef TURNWRIGHT_MISTAKE
volts_peak crest() { return volts_rms{230_V}; }
#else
volts_peak crest() { return peak_of_sine(volts_rms{230_V}); }
#endif
