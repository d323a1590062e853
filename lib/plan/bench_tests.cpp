#include <turnwright/measure/written.hpp>
#include <turnwright/plan/plan.hpp>

namespace turnwright {
namespace {

// Lower case, words joined by hyphens: how a test's code speaks of a winding.
std::string coded(const std::string& name) {
  std::string code;
  for (const char c : name) code += c == ' ' ? '-' : static_cast<char>(c >= 'A' && c <= 'Z' ? c - 'A' + 'a' : c);
  return code;
}

void add_resistances(const planned_winding& w, std::vector<planned_test>& all) {
  const std::string code = "dc-" + coded(w.name), text = "ohms of " + w.name + " at 20 degC, ";
  if (w.halves.size() == 2) {
    all.push_back({code + "-1", text + "start to centre tap", plain(w.halves[0].resistance_20), kind::resistance, 0.1});
    all.push_back(
        {code + "-2", text + "centre tap to finish", plain(w.halves[1].resistance_20), kind::resistance, 0.1});
  } else {
    all.push_back({code, text + "end to end", plain(w.resistance_20), kind::resistance, 0.1});
  }
}

}  // namespace

std::vector<planned_test> tests_of(const design& p) {
  std::vector<planned_test> all;
  const std::string mains = written(p.wanted.primary.on);
  for (const planned_winding& w : p.windings) {
    if (!w.screen && !w.tap_of) add_resistances(w, all);
  }
  // Joints, punching and sheet vary from stack to stack: a third either way (judgement).
  all.push_back({"no-load-current", "current at " + mains + ", secondaries open", plain(p.idle.current.plain()),
                 kind::current, 0.35});
  all.push_back({"no-load-power", "power at " + mains + ", secondaries open", plain(p.idle.power), kind::power, 0.35});
  for (const planned_winding& w : p.windings) {
    if (w.screen || w.primary) continue;
    all.push_back({"open-" + coded(w.name), "volts of " + w.name + " unloaded, " + mains + " on the primary",
                   plain(w.no_load.plain()), kind::voltage, 0.01});
  }
  for (const planned_pair& pair : p.pairs) {
    all.push_back(
        {"flash-" + coded(pair.a) + "-" + coded(pair.b),
         "insulation " + pair.a + " to " + pair.b + ", r.m.s. volts for one minute; a recalled figure, guidance only",
         plain(pair.test.plain()), kind::voltage, 0.0});
  }
  return all;
}

}  // namespace turnwright
