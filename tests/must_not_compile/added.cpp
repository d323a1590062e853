// Volts and amperes do not add.
#include <turnwright/measure/literals.hpp>

using namespace turnwright;
using namespace turnwright::literals;

#ifdef TURNWRIGHT_MISTAKE
double sum() { return plain(230_V + 2_A); }
#else
double sum() { return plain(230_V + 2_V); }
#endif
