// A frequency is no resistance: the two do not change places.
#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>

using namespace turnwright;
using namespace turnwright::literals;

#ifdef TURNWRIGHT_MISTAKE
henries choke() { return inductance_of(50_Hz, 1570_ohm); }
#else
henries choke() { return inductance_of(1570_ohm, 50_Hz); }
#endif
