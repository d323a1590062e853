#include <algorithm>
#include <cmath>
#include <sstream>

#include <turnwright/measure/written.hpp>
#include <turnwright/sheet/columns.hpp>
#include <turnwright/sheet/report.hpp>

#include "drawing.hpp"
#include "parts.hpp"

namespace turnwright {

using namespace sheet_detail;

namespace {

struct line {
  std::string name;
  const std::vector<double>* y;
  stroke look;
};

constexpr double left = 70, wide = 560, gap = 34, head = 54;

// One field of the drawing: lines over a mains cycle with their scale, each named at its right end.
class field {
 public:
  field(drawing& d, double top, double high, std::string title, kind of, std::vector<line> lines)
      : d_(d), top_(top), high_(high), title_(std::move(title)), of_(of), lines_(std::move(lines)) {
    for (const line& l : lines_) {
      lowest_ = std::min(lowest_, *std::min_element(l.y->begin(), l.y->end()));
      highest_ = std::max(highest_, *std::max_element(l.y->begin(), l.y->end()));
    }
    if (highest_ - lowest_ < 1e-12) highest_ = lowest_ + 1;
  }

  void draw() {
    d_.text(left, top_ - 8, title_, anchor::start, true);
    d_.box(left, top_, wide, high_);
    for (const double part : {0.25, 0.5, 0.75}) d_.rule(left + part * wide, top_, left + part * wide, top_ + high_);
    std::vector<double> marks;
    for (const double v : {lowest_, 0.0, highest_}) {
      const bool crowded = v != 0 && std::abs(height_of(v) - height_of(0)) < 12;
      if (!crowded) marks.push_back(v);
    }
    std::sort(marks.begin(), marks.end());
    marks.erase(std::unique(marks.begin(), marks.end()), marks.end());
    for (const double v : marks) d_.text(left - 6, height_of(v) + 4, v == 0 ? "0" : shown_plain(v, of_), anchor::end);
    d_.rule(left, height_of(0), left + wide, height_of(0));
    std::vector<double> taken;
    for (const line& l : lines_) draw_line(l, taken);
  }

 private:
  double height_of(double v) const { return top_ + high_ * (highest_ - v) / (highest_ - lowest_); }

  void draw_line(const line& l, std::vector<double>& taken) {
    std::vector<point> points;
    const std::size_t n = l.y->size();
    // The samples stand at the ends of the steps; the curve is closed, so the last is the first as well.
    points.push_back({left, height_of(l.y->back())});
    for (std::size_t k = 0; k < n; ++k)
      points.push_back({left + wide * static_cast<double>(k + 1) / static_cast<double>(n), height_of((*l.y)[k])});
    d_.curve(points, l.look);
    double at = points.back().y + 4;
    while (std::any_of(taken.begin(), taken.end(), [&](double t) { return std::abs(t - at) < 13; })) at -= 13;
    taken.push_back(at);
    d_.sample(left + wide + 6, at - 4, l.look);
    d_.text(left + wide + 34, at, l.name, anchor::start);
  }

  drawing& d_;
  double top_, high_;
  std::string title_;
  kind of_;
  std::vector<line> lines_;
  double lowest_ = 0, highest_ = 0;
};

std::vector<double> signed_as(const std::vector<double>& y, bool negative) {
  std::vector<double> out = y;
  if (negative) {
    for (double& v : out) v = -v;
  }
  return out;
}

// Components are never numbered: a diode is called by what it rectifies.
std::string diode_name(const planned_rail& r, std::size_t n) {
  if (r.wish.kind == supply::circuit::half_wave) return "rectifier";
  if (r.wish.kind == supply::circuit::full_wave_centre_tap) return n == 0 ? "first half" : "second half";
  return n == 0 ? "positive half cycle" : "negative half cycle";
}

// A title that fits the sheet, cut at a blank where it is longer; the whole of it stands in the file's own title.
std::string headline(const std::string& title) {
  constexpr std::size_t most = 84;
  if (shown_width(title) <= most) return title;
  std::size_t cut = title.rfind(' ', most);
  if (cut == std::string::npos) cut = most;
  while (cut > 0 && (static_cast<unsigned char>(title[cut]) & 0xC0U) == 0x80U) --cut;  // never inside a character
  return title.substr(0, cut) + " ...";
}

}  // namespace

std::string waveform_svg(const supply_study& s) {
  const supply::curves& c = s.full.shape;
  constexpr double volts_high = 150, amps_high = 90, step = volts_high + amps_high + 2 * gap;
  const double high = head + step * static_cast<double>(s.rails.size()) + amps_high + gap + 40;
  drawing d(780, high, "Waveforms of " + s.of.title,
            "One mains cycle at full load and nominal mains: for each rail the winding's volts with those of its first "
            "node, and the "
            "current of each rectifier; at the foot the line current.");
  d.text(left, 22, headline(s.of.title), anchor::start, true);
  d.text(left, 38,
         "one cycle of " + written(s.of.base.mains.plain()) + " " + written(s.of.base.frequency) +
             " at full load, from the rising zero of the mains",
         anchor::start);
  double top = head + 20;
  std::vector<std::vector<double>> kept;
  kept.reserve(2 * s.rails.size());
  for (std::size_t k = 0; k < s.rails.size(); ++k) {
    const planned_rail& r = s.rails[k];
    const supply::rail_curves& rail = c.rails[k];
    kept.push_back(signed_as(rail.reservoir_v, r.wish.negative));
    const bool half = r.wish.kind == supply::circuit::full_wave_centre_tap;
    field(d, top, volts_high, "Rail " + r.winding + ", volts", kind::voltage,
          {{half ? "first half" : "winding", &rail.winding_v, stroke::thin},
           {"node " + r.wish.nodes.front().name, &kept.back(), stroke::thick}})
        .draw();
    top += volts_high + gap;
    std::vector<line> lines;
    for (std::size_t n = 0; n < rail.diode_a.size(); ++n)
      lines.push_back({diode_name(r, n), &rail.diode_a[n], n == 0 ? stroke::thick : stroke::dashed});
    field(d, top, amps_high, "Rail " + r.winding + ", rectifier current", kind::current, lines).draw();
    top += amps_high + gap;
  }
  field(d, top, amps_high, "Line current", kind::current, {{"line", &c.primary_a, stroke::thick}}).draw();
  const double foot = top + amps_high + 16, cycle_ms = 1e3 / plain(s.of.base.frequency);
  for (const double part : {0.0, 0.25, 0.5, 0.75, 1.0})
    d.text(left + part * wide, foot, number(part * cycle_ms, 3) + " ms", anchor::middle);
  return d.svg();
}

}  // namespace turnwright
