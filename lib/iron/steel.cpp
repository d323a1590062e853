#include <turnwright/iron/steel.hpp>

#include <algorithm>
#include <cmath>

#include <turnwright/remark/wording.hpp>

namespace turnwright {
namespace {

steel_kind kind_of_row(const row& r) {
  const std::string word = r.text("kind");
  if (word == "non-oriented") return steel_kind::non_oriented;
  if (word == "oriented") return steel_kind::oriented;
  if (word == "old") return steel_kind::old;
  throw refused(wording::other("bad-row", r.place("kind"), wording::quoted(word), "non-oriented, oriented or old"));
}

steel read_row(const row& r) {
  return {.name = r.text("name"),
          .also = r.list("aliases"),
          .kind = kind_of_row(r),
          .sheet = as<metres>(r.needed("sheet_mm") * 1e-3),
          .density = as<kilograms_per_cubic_metre>(r.needed("density_kg_per_m3")),
          .stacking_factor = r.needed("stacking_factor_ratio"),
          .rated_loss = as<watts_per_kilogram>(r.needed("loss_w_per_kg")),
          .rated_flux_density = as<teslas>(r.needed("loss_at_t")),
          .rated_frequency = as<hertz>(r.needed("loss_at_hz")),
          .hysteresis_ratio = r.needed("hysteresis_ratio"),
          .flux_nominal = as<teslas>(r.needed("flux_nominal_t")),
          .flux_high = as<teslas>(r.needed("flux_high_t")),
          .magnetisation_from = r.text("magnetisation_curve"),
          .loss_from = r.text("loss_curve"),
          .loss_scale = 1.0,
          .magnetisation = {},
          .polarisation = true,
          .loss_curve = {},
          .known_how = r.known_how(),
          .source = r.source()};
}

struct placed_loss {
  loss_point point;
  std::string place;
};

// The points sorted by frequency and flux density; each frequency needs two or more that rise.
std::vector<loss_point> checked_loss_curve(std::vector<placed_loss> points, const std::string& name) {
  std::stable_sort(points.begin(), points.end(), [](const placed_loss& a, const placed_loss& b) {
    return a.point.frequency != b.point.frequency ? a.point.frequency < b.point.frequency
                                                  : a.point.flux_density < b.point.flux_density;
  });
  std::vector<loss_point> curve;
  for (std::size_t i = 0; i < points.size(); ++i) {
    const loss_point& p = points[i].point;
    const bool first = i == 0 || points[i - 1].point.frequency != p.frequency;
    const bool last = i + 1 == points.size() || points[i + 1].point.frequency != p.frequency;
    const bool rises = first || (curve.back().flux_density < p.flux_density && curve.back().loss < p.loss);
    if (!rises || !(plain(p.loss) > 0) || !(plain(p.flux_density) > 0)) {
      throw refused(wording::other("curve", points[i].place, wording::quoted(name) + ", a loss that does not rise",
                                   "points that rise in flux density and loss"));
    }
    if (first && last) {
      throw refused(wording::other("curve", points[i].place,
                                   wording::quoted(name) + ", one point alone at its frequency",
                                   "two points or more at each frequency"));
    }
    curve.push_back(p);
  }
  return curve;
}

void check_figures(const steel& s, const row& r) {
  const std::pair<const char*, double> over_zero[]{{"sheet_mm", plain(s.sheet)},
                                                   {"density_kg_per_m3", plain(s.density)},
                                                   {"loss_w_per_kg", plain(s.rated_loss)},
                                                   {"loss_at_t", plain(s.rated_flux_density)},
                                                   {"loss_at_hz", plain(s.rated_frequency)},
                                                   {"flux_nominal_t", plain(s.flux_nominal)},
                                                   {"flux_high_t", plain(s.flux_high)}};
  for (const auto& [column, value] : over_zero) {
    if (!(value > 0))
      throw refused(wording::other("bad-row", r.place(column), wording::quoted(r.text(column)), "a figure over zero"));
  }
  for (const auto& [column, value] :
       {std::pair{"stacking_factor_ratio", s.stacking_factor}, std::pair{"hysteresis_ratio", s.hysteresis_ratio}}) {
    if (!(value > 0 && value <= 1))
      throw refused(
          wording::other("bad-row", r.place(column), wording::quoted(r.text(column)), "a ratio over 0, 1 at most"));
  }
}

void read_curves(steel& s, const catalogue& tables, const std::string& place) {
  for (const row& r : tables.named("steel_magnetisation").rows) {
    if (r.text("curve") != s.magnetisation_from) continue;
    s.polarisation = r.text("quantity") == "polarisation";
    s.magnetisation.push_back({as<teslas>(r.needed("value_t")), as<amperes_per_metre>(r.needed("field_a_per_m"))});
  }
  std::vector<placed_loss> points;
  for (const row& r : tables.named("steel_loss").rows) {
    if (r.text("curve") != s.loss_from) continue;
    const loss_point p{as<hertz>(r.needed("frequency_hz")), as<teslas>(r.needed("flux_density_t")),
                       as<watts_per_kilogram>(r.needed("loss_w_per_kg"))};
    points.push_back({p, r.place()});
  }
  if (points.empty())
    throw refused(wording::missing(place + ":loss_curve", "a loss curve named " + wording::quoted(s.loss_from)));
  s.loss_curve = checked_loss_curve(std::move(points), s.loss_from);
  try {
    const magnetisation_curve closes(s.magnetisation, s.polarisation);
  } catch (const std::logic_error& why) {
    throw refused(
        wording::other("curve", place + ":magnetisation_curve", wording::quoted(s.magnetisation_from), why.what()));
  }
}

// A borrowed loss curve is scaled by the ratio of the rated losses, the owner's carried to the borrower's point along
// the owner's curve; so the distance of a typical curve from its limit is kept.
double scale_of(const steel& s, const std::vector<steel>& all) {
  if (s.loss_from == s.name) return 1.0;
  const double here = plain(loss_law(s).at(s.rated_flux_density, s.rated_frequency).value);
  for (const steel& owner : all) {
    if (owner.name != s.loss_from) continue;
    const double there = plain(loss_law(owner).at(owner.rated_flux_density, owner.rated_frequency).value);
    return plain(s.rated_loss) / (plain(owner.rated_loss) * here / there);
  }
  return plain(s.rated_loss) / here;
}

}  // namespace

bool borrows(const steel& s) { return s.loss_from != s.name || s.magnetisation_from != s.name; }

loss_law::loss_law(const steel& s) : hysteresis_ratio_(s.hysteresis_ratio), scale_(s.loss_scale) {
  for (const loss_point& p : s.loss_curve) {
    const double f = plain(p.frequency);
    auto at = std::find_if(curves_.begin(), curves_.end(), [&](const curve& c) { return c.frequency_hz >= f; });
    if (at == curves_.end() || at->frequency_hz != f) at = curves_.insert(at, curve{f, {}, {}});
    at->ln_b.push_back(std::log(plain(p.flux_density)));
    at->ln_p.push_back(std::log(plain(p.loss)));
  }
}

loss_law::found loss_law::on(const curve& c, double b) {
  const double x = std::log(b);
  const std::size_t last = c.ln_b.size() - 1;
  std::size_t i = static_cast<std::size_t>(std::upper_bound(c.ln_b.begin(), c.ln_b.end(), x) - c.ln_b.begin());
  i = std::clamp<std::size_t>(i, 1, last);
  const double t = (x - c.ln_b[i - 1]) / (c.ln_b[i] - c.ln_b[i - 1]);
  return {std::exp(c.ln_p[i - 1] + t * (c.ln_p[i] - c.ln_p[i - 1])), x < c.ln_b[0] - 1e-9 || x > c.ln_b[last] + 1e-9};
}

steel_loss loss_law::at(teslas flux_density, hertz frequency) const {
  const double b = plain(flux_density), f = plain(frequency);
  if (!(b > 0)) return {as<watts_per_kilogram>(0), false};
  auto upper = std::find_if(curves_.begin(), curves_.end(), [&](const curve& c) { return c.frequency_hz >= f; });
  if (upper != curves_.end() && upper->frequency_hz == f) {
    const found p = on(*upper, b);
    return {as<watts_per_kilogram>(p.w_per_kg * scale_), p.beyond};
  }
  if (curves_.size() == 1) {
    const found p = on(curves_.front(), b);
    const auto split = [&](double x) {
      return hysteresis_ratio_ * x / 50 + (1 - hysteresis_ratio_) * (x / 50) * (x / 50);
    };
    return {as<watts_per_kilogram>(p.w_per_kg * scale_ * split(f) / split(curves_.front().frequency_hz)), p.beyond};
  }
  // p_h f + p_e f^2 through the two curves that lie about f, or nearest to it
  if (upper == curves_.end()) --upper;
  if (upper == curves_.begin()) ++upper;
  const auto lower = std::prev(upper);
  const found p1 = on(*lower, b), p2 = on(*upper, b);
  const double q1 = p1.w_per_kg / lower->frequency_hz, q2 = p2.w_per_kg / upper->frequency_hz;
  const double eddy = (q2 - q1) / (upper->frequency_hz - lower->frequency_hz);
  return {as<watts_per_kilogram>(scale_ * f * (q1 + eddy * (f - lower->frequency_hz))), p1.beyond || p2.beyond};
}

steel_book::steel_book(const catalogue& tables) {
  std::vector<remark> faults;
  for (const row& r : tables.named("steels").rows) {
    try {
      steel s = read_row(r);
      check_figures(s, r);
      read_curves(s, tables, r.place());
      grades_.push_back(std::move(s));
    } catch (const refused& why) {
      faults.insert(faults.end(), why.remarks().begin(), why.remarks().end());
    }
  }
  if (!faults.empty()) throw refused(std::move(faults));
  for (steel& s : grades_) {
    s.loss_scale = scale_of(s, grades_);
    if (borrows(s)) s.known_how = standing::estimate;
  }
}

const steel& steel_book::named(std::string_view name, const std::string& where) const {
  const std::string key = name_key(name);
  const steel* found = nullptr;
  std::vector<std::string> known, fitting;
  for (const steel& s : grades_) {
    const auto same = [&](const std::string& n) { return name_key(n) == key; };
    known.push_back(s.name);
    if (!same(s.name) && std::none_of(s.also.begin(), s.also.end(), same)) continue;
    if (!found || same(s.name)) found = &s;
    fitting.push_back(s.name);
  }
  if (!found)
    throw refused(wording::unknown_name(where, name, "a steel grade of the table, such as \"M400-50A\"", known));
  if (fitting.size() > 1 && name_key(found->name) != key) throw refused(wording::ambiguous_name(where, name, fitting));
  return *found;
}

}  // namespace turnwright
