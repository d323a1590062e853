#include <turnwright/job/job.hpp>

#include <sstream>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>

#include "page.hpp"
#include "winding_text.hpp"

namespace turnwright {

using namespace job_detail;
using namespace literals;

namespace {

std::vector<std::string> words_of_text(const std::string& text) {
  std::istringstream in(text);
  std::vector<std::string> words;
  for (std::string w; in >> w;) words.push_back(w);
  return words;
}

// "6.3 V" is two words, "6.3V" one: takes the figure and its unit from the words at `at`.
std::string take_figure(const std::vector<std::string>& words, std::size_t& at) {
  if (at >= words.size()) return "";
  std::string figure = words[at++];
  const bool bare = figure.find_first_not_of("0123456789.-+/") == std::string::npos;
  if (bare && at < words.size()) figure += " " + words[at++];
  return figure;
}

struct ending {
  bool dc = false, rms = false, centre_tap = false;
  std::string rectifier;
};

ending read_ending(const std::vector<std::string>& words, std::size_t at, const std::string& where,
                   std::vector<remark>& faults) {
  ending e;
  for (; at < words.size(); ++at) {
    const std::string& w = words[at];
    if (w == "dc")
      e.dc = true;
    else if (w == "rms")
      e.rms = true;
    else if (w == "ct")
      e.centre_tap = true;
    else if (e.rectifier.empty() && (w == "silicon" || w.find_first_of("0123456789") != std::string::npos))
      e.rectifier = w;
    else
      faults.push_back(wording::other("unknown-word", where, wording::quoted(w),
                                      "after the current only: rms, dc, ct or a rectifier"));
  }
  if (e.rms && !e.rectifier.empty())
    faults.push_back(wording::other("either-or", where, "a rectifier behind an r.m.s. current",
                                    "dc behind the current, or no rectifier"));
  if (e.dc && e.rms) faults.push_back(wording::other("either-or", where, "both dc and rms", "one of them"));
  return e;
}

std::optional<json> winding_of(const std::string& text, written_job& out, std::vector<remark>& faults) {
  const std::string where = "--winding " + wording::quoted(text);
  const std::size_t colon = text.find(':');
  if (colon == std::string::npos || colon == 0) {
    faults.push_back(wording::other("short-form", where, "no name before a colon",
                                    "NAME: VOLTS CURRENT, such as \"heaters: 6.3 V 4 A ct\""));
    return std::nullopt;
  }
  const auto words = words_of_text(text.substr(colon + 1));
  std::size_t at = 0;
  std::string figure = take_figure(words, at);
  if (at + 1 < words.size() && (words[at] == "no" || words[at] == "on") && words[at + 1] == "load") {
    figure += " " + words[at] + " load";
    at += 2;
  }
  const auto v = read_winding_volts(figure, where, faults);
  const std::string current = take_figure(words, at);
  const reading<amperes> a = read<amperes>(current);
  if (!a.value) faults.push_back(wording::quantity(where, current, a.fault));
  const ending e = read_ending(words, at, where, faults);
  if (!v || !a.value) return std::nullopt;
  // With neither word: rms up to 50 V; above, dc, since that is what the trade means.
  const bool dc = e.dc || (!e.rms && (v->first > 50_V || !e.rectifier.empty()));
  json w{{"name", text.substr(0, colon)}, {"voltage", figure}};
  if (dc && !e.dc) out.kind_left_open.push_back(text.substr(0, colon));
  if (e.centre_tap) w["centre_tap"] = true;
  if (dc) {
    w["dc_current"] = current;
    w["circuit"] = v->second || e.centre_tap ? "full-wave centre-tap" : "bridge";
    if (!e.rectifier.empty()) w["rectifier"] = e.rectifier;
  } else {
    w["current"] = current;
  }
  return w;
}

}  // namespace

written_job job_of(const short_form& s) {
  written_job out;
  std::vector<remark> faults;
  json job{{"format", "turnwright-job/1"}, {"title", "Job from the command line"}};
  const auto words = words_of_text(s.mains);
  std::size_t at = 0;
  const std::string wall = take_figure(words, at);
  const std::string frequency = take_figure(words, at);
  if (wall.empty() || frequency.empty() || at != words.size()) {
    faults.push_back(wording::other("short-form", "--mains", wording::quoted(s.mains),
                                    "volts and frequency, such as \"230 V 50 Hz\""));
  }
  job["mains"] = {{"frequency", frequency}, {"voltage", wall}};
  job["primary"] = {{"taps", json::array({wall})}};
  job["secondaries"] = json::array();
  for (const std::string& text : s.windings) {
    if (const auto w = winding_of(text, out, faults)) job["secondaries"].push_back(*w);
  }
  if (s.windings.empty())
    faults.push_back(wording::missing("--winding", "at least one winding, such as \"heaters: 6.3 V 4 A ct\""));
  if (!faults.empty()) throw refused(std::move(faults));
  out.text = job.dump(2) + "\n";
  return out;
}

}  // namespace turnwright
