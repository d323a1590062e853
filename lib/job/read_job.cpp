#include <turnwright/job/job.hpp>

#include <algorithm>

#include "sections.hpp"

namespace turnwright {

using namespace job_detail;

void job_detail::read_head(reading_desk& desk, page& root) {
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

void job_detail::refuse_later_parts(page& root) {
  root.not_yet("stock", "the shop's stock");
  root.not_yet("measured", "bench measurements");
  root.not_yet("wanted", "what a rewind is wanted for");
  root.not_yet("plate", "a rating plate");
  root.not_yet("to", "a change of mains");
  root.not_yet("parts", "parts on offer");
}

void job_detail::read_valves(reading_desk& desk, page& root) {
  root.each("valves", [&](const json& v, const std::string& where) {
    if (!v.is_string()) {
      desk.faults.push_back(wording::wrong_sort(where, as_written(v), "so many of a type, such as \"2 x EL34\""));
      return;
    }
    if (const auto found = read_valve_count(v.get<std::string>(), where, desk.tools.valves, desk.faults))
      desk.valves.push_back(*found);
  });
  if (!desk.valves.empty()) desk.draws = first_guess_ht_current(desk.valves, desk.tools.valves);
  if (desk.draws && plain(desk.draws->full.plain()) <= 0) desk.draws.reset();
}

namespace {

void read_duty(reading_desk& desk, page& root) {
  if (auto duty = root.object("duty")) {
    duty->quantity<seconds>("full", "0 s", "1000 h");
    duty->quantity<seconds>("idle", "0 s", "1000 h");
    duty->finish();
    desk.assume("/duty", "continuous", "full load is reckoned all the time: the safe side");
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
  read_valves(desk, root);
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
  if (root.has("known")) {
    faults.push_back(wording::other("either-or", root.place("known"), "a known transformer in a job to be planned",
                                    "turnwright supply, which takes a known one", "or leave the section out"));
  }
  root.finish();
  if (!faults.empty()) throw refused(std::move(faults));
  return out;
}

}  // namespace turnwright
