#include <turnwright/wire/gauge.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include <turnwright/measure/read.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/remark/wording.hpp>
#include <turnwright/wire/copper.hpp>

namespace turnwright {
namespace {

struct film_column {
  std::string_view column;
  std::string_view grade;
};
constexpr std::array metric_films{film_column{"grade1_mm", "1"}, film_column{"grade2_mm", "2"},
                                  film_column{"grade3_mm", "3"}};
constexpr std::array awg_films{film_column{"single_mm", "single"}, film_column{"heavy_mm", "heavy"}};

metres mm(double x) { return as<metres>(x * 1e-3); }

gauge read_row(const row& r, wire_system system, std::span<const film_column> films) {
  gauge g{.size = r.text("size"),
          .also = r.list("aliases"),
          .system = system,
          .bare = mm(r.needed("bare_mm")),
          .listed = {},
          .films = {},
          .resistance_least = {},
          .resistance_most = {},
          .known_how = r.known_how(),
          .source = r.source()};
  if (const auto listed = r.number("listed_mm")) g.listed = mm(*listed);
  if (const auto least = r.number("resistance_min_ohm_per_m")) g.resistance_least = as<ohms_per_metre>(*least);
  if (const auto most = r.number("resistance_max_ohm_per_m")) g.resistance_most = as<ohms_per_metre>(*most);
  double under = plain(g.bare);
  if (!(under > 0))
    throw refused(wording::other("bad-row", r.place("bare_mm"), r.text("bare_mm"), "a diameter over zero"));
  for (const film_column& f : films) {
    const auto over = r.number(f.column);
    if (!over) continue;
    const metres overall = mm(*over);
    if (!(plain(overall) > under)) {
      throw refused(wording::other("bad-row", r.place(f.column), r.text(f.column),
                                   "a diameter over that of the bare wire and of the grade before it"));
    }
    under = plain(overall);
    g.films.push_back({std::string(f.grade), overall});
  }
  return g;
}

std::vector<gauge> read_system(const table& t, wire_system system, std::span<const film_column> films,
                               std::vector<remark>& faults) {
  std::vector<gauge> sizes;
  for (const row& r : t.rows) {
    try {
      sizes.push_back(read_row(r, system, films));
    } catch (const refused& why) {
      faults.insert(faults.end(), why.remarks().begin(), why.remarks().end());
    }
  }
  std::stable_sort(sizes.begin(), sizes.end(), [](const gauge& a, const gauge& b) { return a.bare < b.bare; });
  return sizes;
}

// Grade names of one system stand for those of the others.
std::string_view canonical_grade(std::string_view grade) {
  if (grade == "single") return "1";
  if (grade == "heavy") return "2";
  return grade;
}

std::optional<double> gauge_number(std::string_view text, std::string_view system) {
  std::string key = name_key(text);
  const std::size_t at = key.find(system);
  if (at == std::string::npos) return std::nullopt;
  key.erase(at, system.size());
  std::string_view rest = key;
  const auto number = take_number(rest);
  return rest.empty() ? number : std::nullopt;
}

}  // namespace

std::string_view word_of(wire_system s) {
  return s == wire_system::metric ? "metric" : s == wire_system::awg ? "awg" : "swg";
}

square_metres bare_area(const gauge& g) { return std::numbers::pi / 4 * g.bare * g.bare; }

ohms_per_metre resistance_at_20(const gauge& g) { return copper::resistivity_20 / bare_area(g); }

kilograms_per_metre mass_per_metre(const gauge& g) { return copper::density * bare_area(g); }

std::optional<metres> overall(const gauge& g, std::string_view grade) {
  for (const film& f : g.films) {
    if (canonical_grade(f.grade) == canonical_grade(grade)) return f.overall;
  }
  return std::nullopt;
}

const film* film_of(const gauge& g, std::string_view grade) {
  for (const film& f : g.films) {
    if (canonical_grade(f.grade) == canonical_grade(grade)) return &f;
  }
  return g.films.empty() ? nullptr : &g.films.back();
}

metres awg_diameter(double number) { return as<metres>(0.127e-3 * std::pow(92.0, (36 - number) / 39)); }

wire_book::wire_book(const catalogue& tables) {
  std::vector<remark> faults;
  metric_ = read_system(tables.named("wire_metric"), wire_system::metric, metric_films, faults);
  awg_ = read_system(tables.named("wire_awg"), wire_system::awg, awg_films, faults);
  swg_ = read_system(tables.named("wire_swg"), wire_system::swg, metric_films, faults);
  if (!faults.empty()) throw refused(std::move(faults));
}

std::span<const gauge> wire_book::sizes(wire_system s) const {
  return s == wire_system::metric ? metric_ : s == wire_system::awg ? awg_ : swg_;
}

looked_up_gauge wire_book::look_up(std::string_view text, const std::string& where) const {
  const std::string key = text.starts_with('-') ? "" : name_key(text);  // a minus is no hyphen here
  for (const wire_system s : {wire_system::metric, wire_system::awg, wire_system::swg}) {
    for (const gauge& g : sizes(s)) {
      const auto same = [&](const std::string& name) { return name_key(name) == key; };
      if (same(g.size) || std::any_of(g.also.begin(), g.also.end(), same)) return {g, true};
    }
  }
  if (const auto number = gauge_number(text, "awg")) {
    return {nearest(wire_system::awg, awg_diameter(std::clamp(*number, -10.0, 60.0))), false};
  }
  if (gauge_number(text, "swg")) {
    throw refused(wording::other("unknown-name", where, wording::quoted(text),
                                 "an SWG number from " + swg_.back().size + " to " + swg_.front().size,
                                 "the table holds whole numbers only"));
  }
  const reading<metres> length = read<metres>(text);
  if (length.value && plain(*length.value) > 0) {
    const gauge& g = nearest(wire_system::metric, *length.value);
    return {g, std::abs(plain(*length.value) / plain(g.bare) - 1) < 1e-6};
  }
  throw refused(wording::other(length.fault.reason == misread::why::bare_number ? "gauge-system" : "unknown-name",
                               where, wording::quoted(text), "a wire size such as \"0.5 mm\", \"24 AWG\" or \"33 SWG\"",
                               length.fault.reason == misread::why::bare_number
                                   ? "a gauge number means nothing without its system: AWG, SWG or mm"
                                   : ""));
}

const gauge& wire_book::nearest(wire_system s, metres bare) const {
  const auto all = sizes(s);
  return *std::min_element(all.begin(), all.end(), [&](const gauge& a, const gauge& b) {
    return std::abs(std::log(plain(a.bare) / plain(bare))) < std::abs(std::log(plain(b.bare) / plain(bare)));
  });
}

const gauge* wire_book::at_least(wire_system s, square_metres area) const {
  for (const gauge& g : sizes(s)) {
    if (bare_area(g) >= area && !g.films.empty()) return &g;
  }
  return nullptr;
}

const gauge& wire_book::thickest(wire_system s) const {
  const auto all = sizes(s);
  for (std::size_t i = all.size(); i > 0; --i) {
    if (!all[i - 1].films.empty()) return all[i - 1];
  }
  throw std::logic_error("a wire table without any film");
}

}  // namespace turnwright
