#include <turnwright/plan/plan.hpp>
#include <turnwright/wire/gauge.hpp>
int main() { return turnwright::shop(turnwright::catalogue::bundled()).wire.look_up("0.5 mm", "here").exact ? 0 : 1; }
