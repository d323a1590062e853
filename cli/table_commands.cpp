#include <algorithm>
#include <ostream>

#include <turnwright/job/result.hpp>
#include <turnwright/measure/literals.hpp>
#include <turnwright/remark/figure.hpp>
#include <turnwright/sheet/report.hpp>

#include "files.hpp"
#include "orders.hpp"

namespace turnwright::cli {

using namespace literals;

namespace {

// Text to standard output, or JSON there or in a file.
void deliver(const output_wish& wish, const std::string& text, const std::string& json, std::ostream& out) {
  if (wish.json && *wish.json != "-") write_whole(*wish.json, json, wish.force);
  out << (wish.json == "-" ? json : text);
}

bool gave_csv(const table_order& order, const catalogue& tables, const std::string& own, std::ostream& out) {
  if (order.csv.empty()) return false;
  const std::string name = order.csv == "." ? own : order.csv;
  const std::vector<std::string> known = tables.names();
  if (std::find(known.begin(), known.end(), name) == known.end())
    throw refused(wording::unknown_word("--csv", name, known));
  out << tables.named(name).text;
  return true;
}

template <class Q>
std::optional<Q> asked(const std::optional<std::string>& text, const char* option, const char* least,
                       const char* most) {
  if (!text) return std::nullopt;
  std::vector<remark> faults;
  const std::optional<Q> found = read_within<Q>(*text, option, least, most, faults);
  if (!found) throw refused(std::move(faults));
  return found;
}

}  // namespace

status run_wire(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out) {
  if (gave_csv(order, tables, "wire_metric", out)) return done;
  if (order.name) {
    const looked_up_gauge g = s.wire.look_up(*order.name, "wire");
    deliver(order.output, report_of(g, s), json_of(g, s), out);
    return done;
  }
  std::vector<std::string> names;
  for (const wire_system system : {wire_system::metric, wire_system::awg, wire_system::swg}) {
    for (const gauge& g : s.wire.sizes(system)) names.push_back(g.size);
  }
  deliver(order.output, list_of_wires(s), json_of_names("wires", names), out);
  return done;
}

status run_core(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out) {
  if (gave_csv(order, tables, "laminations", out)) return done;
  if (order.name) {
    const lamination& l = s.patterns.named(*order.name, "core");
    deliver(order.output, report_of(l), json_of(l), out);
    return done;
  }
  std::vector<std::string> names;
  for (const lamination& l : s.patterns.all()) names.push_back(l.name);
  deliver(order.output, list_of_cores(s), json_of_names("cores", names), out);
  return done;
}

status run_steel(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out) {
  if (gave_csv(order, tables, "steels", out)) return done;
  const auto b = asked<teslas>(order.at, "--at", "0.01 T", "2.2 T");
  const hertz f = asked<hertz>(order.frequency, "--frequency", "10 Hz", "1 kHz").value_or(50_Hz);
  if (order.name) {
    const steel& g = s.steels.named(*order.name, "steel");
    const std::optional<steel_point> at = b ? std::optional(steel_point{*b, f}) : std::nullopt;
    deliver(order.output, report_of(g, b, f), json_of(g, at), out);
    return done;
  }
  std::vector<std::string> names;
  for (const steel& g : s.steels.all()) names.push_back(g.name);
  deliver(order.output, list_of_steels(s), json_of_names("steels", names), out);
  return done;
}

status run_valve(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out) {
  if (gave_csv(order, tables, "rectifiers", out)) return done;
  if (!order.name) {
    deliver(order.output, list_of_valves(s), json_of_valves(s.valves), out);
    return done;
  }
  const found_valve found = s.valves.named(*order.name, "valve");
  if (found.rectifier) {
    deliver(order.output, report_of(*found.rectifier, order.standing), json_of(*found.rectifier, order.standing), out);
  } else {
    deliver(order.output, report_of(*found.amplifier, s.valves, order.standing),
            json_of(*found.amplifier, s.valves, order.standing), out);
  }
  return done;
}

}  // namespace turnwright::cli
