// Two points of the scale do not add; a point and a rise do.
#include <turnwright/measure/literals.hpp>

using namespace turnwright;
using namespace turnwright::literals;

#ifdef TURNWRIGHT_MISTAKE
temperature hot() { return 40_degC + 60_degC; }
#else
temperature hot() { return 40_degC + 60_K; }
#endif
