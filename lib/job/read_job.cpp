#include <turnwright/job/job.hpp>

#include <algorithm>

#include "sections.hpp"

namespace turnwright {

using namespace job_detail;

namespace {

void read_head(reading_desk& desk, page& root) {
  const auto format = root.text("format");
  if (!root.has("format")) {
    desk.faults.push_back(wording::missing(root.place("format"), "\"turnwright-job/1\""));
  } else if (format && *format != "turnwright-job/1") {
    desk.faults.push_back(
        wording::other("unknown-word", root.place("format"), wording::quoted(*format), "\"turnwright-job/1\""));
  }
  desk.out.title = root.text("title").value_or("untitled");
  if (std::any_of(desk.out.title.begin(), desk.out.title.end(),
                  [](char c) { return static_cast<unsigned char>(c) < 32 || c == 127; })) {
    desk.faults.push_back(wording::other("bad-name", root.place("title"), wording::quoted(desk.out.title),
                                         "a title without control characters"));
  }
  if (desk.out.title.size() > 400)
    desk.faults.push_back(wording::other("too-long", root.place("title"), "a title of more than 400 bytes", "a line"));
}

void refuse_later_parts(page& root) {
  root.not_yet("valves", "a list of valves", "give the heater current of each winding");
  root.not_yet("stock", "the shop's stock");
  root.not_yet("known", "a known transformer");
  root.not_yet("measured", "bench measurements");
  root.not_yet("wanted", "what a rewind is wanted for");
  root.not_yet("plate", "a rating plate");
  root.not_yet("to", "a change of mains");
  root.not_yet("parts", "parts on offer");
}

void read_duty(reading_desk& desk, page& root) {
  if (auto duty = root.object("duty")) {
    duty->quantity<seconds>("full", "0 s", "1000 h");
    duty->quantity<seconds>("idle", "0 s", "1000 h");
    duty->finish();
    desk.assume("/duty", "continuous",
                "no winding of this job has an idle load, so full load is reckoned all the time");
  } else {
    desk.assume("/duty", "continuous", "nothing else is said");
  }
}

}  // namespace

demand read_job(std::string_view text, const std::string& origin, const shop& s, const catalogue& tables) {
  const json node = parse(text, origin);
  demand out;
  std::vector<remark> faults;
  reading_desk desk{s, tables, out, faults};
  page root(node, origin + " ", faults);
  read_head(desk, root);
  read_wire(desk, root);  // before the windings, whose wires need its grade
  read_mains_and_primary(desk, root);
  read_secondaries(desk, root);
  read_core(desk, root);
  read_former(desk, root);
  read_insulation(desk, root);
  read_limits(desk, root);
  read_duty(desk, root);
  read_aim_and_prices(desk, root);
  if (!out.primary.taps.empty()) read_screens_and_order(desk, root);
  root.has("screens");
  root.has("order");
  refuse_later_parts(root);
  root.finish();
  if (!faults.empty()) throw refused(std::move(faults));
  return out;
}

}  // namespace turnwright
