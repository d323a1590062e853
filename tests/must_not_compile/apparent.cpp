// Watts are no volt-amperes.
#include <turnwright/measure/literals.hpp>

using namespace turnwright;
using namespace turnwright::literals;

#ifdef TURNWRIGHT_MISTAKE
volt_amperes rating() { return 80_W; }
#else
volt_amperes rating() { return 80_VA; }
#endif
