#include <turnwright/iron/lamination.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>

#include <turnwright/remark/wording.hpp>

namespace turnwright {
namespace {

using std::numbers::pi;

constexpr std::array families{pattern_family::ei, pattern_family::ei_wide, pattern_family::ei_inch, pattern_family::m,
                              pattern_family::ui};

metres mm(double x) { return as<metres>(x * 1e-3); }

pattern_family family_of(const row& r) {
  for (const pattern_family f : families) {
    if (word_of(f) == r.text("family")) return f;
  }
  throw refused(
      wording::other("bad-row", r.place("family"), wording::quoted(r.text("family")), "ei, ei-wide, ei-inch, m or ui"));
}

void check_geometry(const lamination& l, const row& r) {
  for (const metres& part : {l.tongue, l.outer_limb, l.window_width, l.window_length, l.yoke}) {
    if (!(plain(part) > 0))
      throw refused(wording::other("bad-row", r.place(), "a dimension of zero or less", "lengths over zero"));
  }
  const int windows = l.family == pattern_family::ui ? 1 : 2;
  const metres across =
      (windows == 2 ? l.tongue : mm(0)) + 2.0 * l.outer_limb + static_cast<double>(windows) * l.window_width;
  const metres along = l.window_length + 2.0 * l.yoke;
  if (std::abs(plain(across - l.width)) > 0.06e-3 || std::abs(plain(along - l.height)) > 0.06e-3) {
    throw refused(wording::other("geometry", r.place(), "limbs and windows that do not add up to width and height",
                                 "width = tongue + 2 windows + 2 outer limbs, height = window + 2 yokes"));
  }
}

lamination read_row(const row& r) {
  lamination l{.name = r.text("name"),
               .also = r.list("aliases"),
               .family = family_of(r),
               .tongue = mm(r.needed("tongue_mm")),
               .outer_limb = mm(r.needed("outer_limb_mm")),
               .window_width = mm(r.needed("window_width_mm")),
               .window_length = mm(r.needed("window_length_mm")),
               .yoke = mm(r.needed("yoke_mm")),
               .width = mm(r.needed("width_mm")),
               .height = mm(r.needed("height_mm")),
               .stacks = {},
               .known_how = r.known_how(),
               .source = r.source()};
  check_geometry(l, r);
  return l;
}

bool fits(const lamination& l, const std::string& key) {
  const auto same = [&](const std::string& name) { return name_key(name) == key; };
  return same(l.name) || std::any_of(l.also.begin(), l.also.end(), same);
}

}  // namespace

std::string_view word_of(pattern_family f) {
  switch (f) {
    case pattern_family::ei:
      return "ei";
    case pattern_family::ei_wide:
      return "ei-wide";
    case pattern_family::ei_inch:
      return "ei-inch";
    case pattern_family::m:
      return "m";
    case pattern_family::ui:
      return "ui";
  }
  return "";
}

bool is_shell(const lamination& l) { return l.family != pattern_family::ui; }

metres mean_path(const lamination& l) {
  // Each corner is a quarter circle whose radius is the mean of the two half-widths that meet in it.
  const metres inner_half = is_shell(l) ? l.tongue / 4.0 : l.tongue / 2.0;
  const metres inner_corner = (inner_half + l.yoke / 2.0) / 2.0;
  const metres outer_corner = (l.outer_limb / 2.0 + l.yoke / 2.0) / 2.0;
  return 2.0 * (l.window_width + l.window_length) + pi * (inner_corner + outer_corner);
}

square_metres face_area(const lamination& l) {
  const double windows = is_shell(l) ? 2 : 1;
  return l.width * l.height - windows * l.window_width * l.window_length;
}

pattern_book::pattern_book(const catalogue& tables) {
  std::vector<remark> faults;
  const auto note = [&](const refused& why) {
    faults.insert(faults.end(), why.remarks().begin(), why.remarks().end());
  };
  for (const row& r : tables.named("laminations").rows) {
    try {
      patterns_.push_back(read_row(r));
    } catch (const refused& why) {
      note(why);
    }
  }
  for (const row& r : tables.named("stacks").rows) {
    try {
      const std::string key = name_key(r.text("lamination"));
      const auto at = std::find_if(patterns_.begin(), patterns_.end(),
                                   [&](const lamination& l) { return name_key(l.name) == key; });
      if (at == patterns_.end())
        throw refused(wording::other("unknown-name", r.place("lamination"), wording::quoted(r.text("lamination")),
                                     "a lamination of the table"));
      if (!(r.needed("stack_mm") > 0))
        throw refused(wording::other("bad-row", r.place("stack_mm"), r.text("stack_mm"), "a stack over zero"));
      at->stacks.push_back(mm(r.needed("stack_mm")));
    } catch (const refused& why) {
      note(why);
    }
  }
  for (lamination& l : patterns_) std::sort(l.stacks.begin(), l.stacks.end());
  for (const row& r : tables.named("formers").rows) {
    try {
      formers_.push_back({r.text("lamination"), mm(r.needed("stack_mm")), mm(r.needed("winding_width_mm")),
                          mm(r.needed("winding_height_mm")), r.known_how()});
    } catch (const refused& why) {
      note(why);
    }
  }
  if (!faults.empty()) throw refused(std::move(faults));
}

const lamination& pattern_book::named(std::string_view name, const std::string& where) const {
  const std::string key = name_key(name);
  std::vector<const lamination*> found;
  std::vector<std::string> known;
  for (const lamination& l : patterns_) {
    if (fits(l, key)) found.push_back(&l);
    known.push_back(l.name);
  }
  if (found.size() == 1) return *found.front();
  if (found.empty())
    throw refused(wording::unknown_name(where, name, "a lamination of the table, such as \"EI 96\"", known));
  std::vector<std::string> names;
  for (const lamination* l : found) {
    // The first of its names that fits no other pattern.
    std::vector<std::string> own{l->name};
    own.insert(own.end(), l->also.begin(), l->also.end());
    const auto only = std::find_if(own.begin(), own.end(), [&](const std::string& n) {
      return std::count_if(patterns_.begin(), patterns_.end(),
                           [&](const lamination& p) { return fits(p, name_key(n)); }) == 1;
    });
    names.push_back(only == own.end() ? l->name : *only);
  }
  throw refused(wording::ambiguous_name(where, name, names));
}

const moulded_former* pattern_book::former_for(const lamination& l, metres stack) const {
  for (const moulded_former& f : formers_) {
    if (name_key(f.lamination) == name_key(l.name) && std::abs(plain(f.stack) / plain(stack) - 1) < 0.03) return &f;
  }
  return nullptr;
}

}  // namespace turnwright
