#include <algorithm>
#include <ostream>

#include <turnwright/job/job.hpp>
#include <turnwright/job/result.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/remark/figure.hpp>
#include <turnwright/sheet/report.hpp>

#include "files.hpp"
#include "orders.hpp"

namespace turnwright::cli {
namespace {

struct question {
  amplifier_supply supply;
  std::vector<assumption> assumed;
  bool windable = true;      ///< of a transformer that was planned
  std::vector<check> stops;  ///< what stands in its way
};

// The transformer of a job: a known one, or the one that is planned for it.
question asked_of(const supply_order& order, const catalogue& tables, const shop& s) {
  const std::string text = read_whole(*order.job), origin = spoken(*order.job);
  if (is_known(text, origin)) {
    known_supply k = read_known(text, origin, s, tables);
    return {std::move(k.supply), std::move(k.assumed), true, {}};
  }
  const design p = plan(read_job(text, origin, s, tables), s);
  question q{p.supply.of, p.assumed, p.windable, {}};
  const std::vector<check> own = rail_checks(p.supply);
  for (const check& c : p.checks) {
    const bool of_rails =
        std::any_of(own.begin(), own.end(), [&](const check& o) { return o.code == c.code && o.text == c.text; });
    if (c.weight == level::stop && !of_rails) q.stops.push_back(c);
  }
  q.assumed.insert(q.assumed.begin(),
                   {"transformer", p.made.coil.core.choice().pattern.name, "planned from the job, hot, at full load"});
  return q;
}

// "HT=silicon": what stands before the sign, or nothing.
struct change {
  std::string of, to;
};
change split(const std::string& text) {
  const std::size_t sign = text.find('=');
  if (sign == std::string::npos) return {"", text};
  return {text.substr(0, sign), text.substr(sign + 1)};
}

rail_wish& rail_of(amplifier_supply& a, const std::string& name, const std::string& where) {
  std::vector<std::string> known;
  rail_wish* found = nullptr;
  for (supplied_winding& w : a.windings) {
    if (!w.rail) continue;
    if (name.empty() || w.name == name) found = &*w.rail;
    known.push_back(w.name);
  }
  if (found && (!name.empty() || known.size() == 1)) return *found;
  throw refused(wording::unknown_word(where, name, known));
}

template <class Q>
Q figure_of(const std::string& text, const char* where, const char* least, const char* most) {
  std::vector<remark> faults;
  const auto q = read_within<Q>(text, where, least, most, faults);
  if (!q) throw refused(std::move(faults));
  return *q;
}

void change_load(amplifier_supply& a, const std::string& text) {
  const change c = split(text);
  const std::size_t cut = c.of.rfind('/');
  const std::string winding = cut == std::string::npos ? "" : c.of.substr(0, cut),
                    name = cut == std::string::npos ? c.of : c.of.substr(cut + 1);
  rail_wish& rail = rail_of(a, winding, "--load");
  std::vector<std::string> known;
  for (node_wish& n : rail.nodes) {
    known.push_back(n.name);
    if (!name.empty() && n.name != name) continue;
    if (read<ohms>(c.to).value)
      n.full = {amperes_dc{}, figure_of<ohms>(c.to, "--load", "1 mohm", "1 Gohm")};
    else if (n.shunt || !std::holds_alternative<std::monostate>(n.through))
      n.full = {amperes_dc{figure_of<amperes>(c.to, "--load", "0 A", "100 A")}, std::nullopt};
    else
      throw refused(
          wording::other("wrong-sort", "--load", "a constant current at a node without a capacitor", "a resistance"));
    n.idle = n.full;  // all that hangs on the node, at full load and at idle
    return;
  }
  throw refused(wording::unknown_word("--load", name, known));
}

void ask_what_if(const supply_order& order, const shop& s, question& q) {
  const auto changed = [&](const std::string& option, const std::string& value) {
    q.assumed.push_back({option, value, "asked for on the command line"});
  };
  if (order.mains) {
    const double before = plain(q.supply.base.mains.plain());
    q.supply.base.mains = volts_rms{figure_of<volts>(*order.mains, "--mains", "10 V", "1000 V")};
    const double now = plain(q.supply.base.mains.plain());
    // The ends of the band stay where they are.
    q.supply.over_ratio = std::max(0.0, before * (1 + q.supply.over_ratio) / now - 1);
    q.supply.under_ratio = std::max(0.0, 1 - before * (1 - q.supply.under_ratio) / now);
    changed("--mains", *order.mains);
  }
  for (const std::string& text : order.rectifiers) {
    const change c = split(text);
    rectifier_wish& r = rail_of(q.supply, c.of, "--rectifier").rectifier;
    const rectifier_type& t = s.valves.rectifier(c.to, "--rectifier");
    if (!t.law)
      throw refused(
          wording::other("unknown-name", "--rectifier", wording::quoted(c.to), "a rectifier whose drop is known"));
    r = {t, {law_of(t), r.each.series}};
    changed("--rectifier", text);
  }
  for (const std::string& text : order.reservoirs) {
    const change c = split(text);
    node_wish& first = rail_of(q.supply, c.of, "--reservoir").nodes.front();
    const farads value = figure_of<farads>(c.to, "--reservoir", "1 nF", "1 F");
    if (!first.shunt)
      throw refused(
          wording::other("circuit", "--reservoir", "a rail whose first node has no capacitor", "one that has"));
    first.shunt->value = value;
    changed("--reservoir", text);
  }
  for (const std::string& text : order.loads) {
    change_load(q.supply, text);
    changed("--load", text);
  }
}

}  // namespace

status run_supply(const supply_order& order, const catalogue& tables, const shop& s, std::ostream& out) {
  const bool json_file = order.output.json && *order.output.json != "-";
  if (order.waveform) check_target(*order.waveform, order.output.force);  // all targets before any is written
  if (json_file) check_target(*order.output.json, order.output.force);
  question q = asked_of(order, tables, s);
  ask_what_if(order, s, q);
  const supply_study done_study = study(q.supply);
  if (order.waveform && done_study.rails.empty())
    throw refused(
        wording::other("circuit", "--waveform", "a job without a rectified winding", "a job with a rail to draw"));
  std::vector<check> all = rail_checks(done_study);
  all.insert(all.end(), q.stops.begin(), q.stops.end());
  const std::vector<check> checks = in_order(std::move(all));
  const std::vector<std::string> cautions = supply_cautions();
  const std::string json = order.output.json ? json_of(done_study, checks, q.assumed, cautions) : "";
  if (order.waveform) write_whole(*order.waveform, waveform_svg(done_study), order.output.force);
  if (json_file) write_whole(*order.output.json, json, order.output.force);
  out << (order.output.json && !json_file ? json : report_of(done_study, checks, q.assumed, cautions, order.workings));
  return q.windable ? done : cannot_be_met;
}

}  // namespace turnwright::cli
