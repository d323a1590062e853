#include <algorithm>
#include <ostream>

#include <turnwright/job/job.hpp>
#include <turnwright/job/result.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/remark/wording.hpp>
#include <turnwright/sheet/report.hpp>

#include "files.hpp"
#include "orders.hpp"

namespace turnwright::cli {
namespace {

struct job_text {
  std::string text, origin;
  std::vector<std::string> kind_left_open;
};

job_text text_of(const plan_order& order) {
  const bool on_line = !order.mains.empty() || !order.windings.empty();
  if (order.job && on_line) {
    throw refused(wording::other("either-or", "plan", "both a job file and --mains or --winding", "one of them"));
  }
  if (!order.job && !on_line) {
    throw refused(wording::missing("plan", "a job file, - for standard input, or --mains and --winding",
                                   "turnwright plan --help shows both"));
  }
  if (order.job) return {read_whole(*order.job), spoken(*order.job), {}};
  written_job w = job_of({order.mains, order.windings});
  return {std::move(w.text), "command line", std::move(w.kind_left_open)};
}

void check_codes_of(const plan_order& order) {
  std::vector<std::string> known(check_codes().begin(), check_codes().end());
  for (const std::string& code : order.accept) {
    if (std::find(known.begin(), known.end(), code) == known.end())
      throw refused(wording::unknown_word("--accept", code, known));
  }
}

void refuse_later_parts(const plan_order& order) {
  if (order.sheet) throw refused(wording::not_yet("--sheet", "the winding sheet as a page"));
  if (order.tests)
    throw refused(wording::not_yet("--tests", "a blank test card", "the tests stand in the report and in the JSON"));
}

}  // namespace

status run_plan(const plan_order& order, const catalogue& tables, const shop& s, std::ostream& out,
                std::ostream& aside) {
  refuse_later_parts(order);
  check_codes_of(order);
  const bool json_file = order.output.json && *order.output.json != "-";
  if (order.write_job) check_target(*order.write_job, order.output.force);  // all targets before any is written
  if (json_file) check_target(*order.output.json, order.output.force);
  const job_text job = text_of(order);
  demand d = read_job(job.text, job.origin, s, tables);
  d.accepted = order.accept;
  for (secondary_wish& w : d.secondaries) {
    const auto& open = job.kind_left_open;
    w.kind_left_open = std::find(open.begin(), open.end(), w.name) != open.end();
  }
  const design p = plan(d, s);
  const std::string json = order.output.json ? json_of(p) : "";
  if (order.write_job) write_whole(*order.write_job, job.text, order.output.force);
  if (json_file) write_whole(*order.output.json, json, order.output.force);
  out << (order.output.json && !json_file ? json : report_of(p, order.workings));
  if (!p.windable) {
    for (const check& c : p.checks) {
      if (c.weight != level::stop) continue;
      aside << "cannot be wound: " << c.code << ": " << c.text << "; found " << c.found << ", bound " << c.bound
            << '\n';
      if (!c.cure.empty()) aside << "  cure: " << c.cure << '\n';
    }
  }
  return p.windable ? done : cannot_be_met;
}

}  // namespace turnwright::cli
