#include <turnwright/iron/former.hpp>
#include <turnwright/iron/lamination.hpp>

#include <turnwright/measure/literals.hpp>

#include <near.hpp>

#include <numbers>

using namespace turnwright;
using namespace turnwright::literals;
using namespace turnwright::testing;

namespace {

const pattern_book& patterns() {
  static const pattern_book book(catalogue::bundled());
  return book;
}

double mm(metres x) { return plain(x) * 1e3; }

bool scrapless(const lamination& l) {
  const metres u = l.window_width;
  const auto is = [](metres a, metres b) { return std::abs(plain(a) / plain(b) - 1) < 1e-3; };
  return is(l.outer_limb, u) && is(l.yoke, u) && is(l.window_length, 3.0 * u) &&
         is(l.tongue, is_shell(l) ? 2.0 * u : u);
}

}  // namespace

TEST_CASE("laminations without waste have the proportions of the standard", "[published][scrapless]") {
  for (const row& r : published("scrapless")) {
    INFO(r.place());
    const lamination& l = patterns().named(r.text("name"), "test");
    const auto as_printed = [&](const char* column) {
      return Approx(r.needed(column)).margin(r.needed("tolerance_mm")).epsilon(0);
    };
    CHECK(mm(l.width) == as_printed("width_mm"));
    CHECK(mm(l.height) == as_printed("height_mm"));
    CHECK(mm(l.tongue) == as_printed("tongue_mm"));
    CHECK(mm(l.outer_limb) == as_printed("outer_limb_mm"));
    CHECK(mm(l.window_width) == as_printed("window_width_mm"));
    CHECK(mm(l.window_length) == as_printed("window_length_mm"));
    CHECK(mm(l.yoke) == as_printed("yoke_mm"));
    CHECK(mm(mean_path(l)) == as_printed("mean_path_mm"));
  }
}

TEST_CASE("the mean path of every lamination without waste is 11.14 window widths", "[property]") {
  int found = 0;
  for (const lamination& l : patterns().all()) {
    if (!scrapless(l)) continue;
    INFO(l.name);
    CHECK(plain(mean_path(l)) / plain(l.window_width) == Approx(8 + std::numbers::pi).epsilon(1e-3));
    ++found;
  }
  CHECK(found >= 50);
}

TEST_CASE("every pattern closes: limbs and windows make its width, window and yokes its height", "[property]") {
  for (const lamination& l : patterns().all()) {
    INFO(l.name);
    const double across = is_shell(l) ? mm(l.tongue) + 2 * mm(l.window_width) + 2 * mm(l.outer_limb)
                                      : mm(l.tongue) + mm(l.window_width) + mm(l.outer_limb);
    CHECK(across == Approx(mm(l.width)).margin(0.06));
    CHECK(mm(l.window_length) + 2 * mm(l.yoke) == Approx(mm(l.height)).margin(0.06));
    CHECK_FALSE(l.stacks.empty());
    CHECK(std::is_sorted(l.stacks.begin(), l.stacks.end()));
    CHECK(l.stacks.front() > 0_mm);
  }
}

TEST_CASE("the mean path lies between the window's edge and the square-cornered path through the middles",
          "[property]") {
  for (const lamination& l : patterns().all()) {
    INFO(l.name);
    const metres inner_half = is_shell(l) ? l.tongue / 4.0 : l.tongue / 2.0;
    const metres square = 2.0 * (l.window_width + l.window_length + inner_half + l.outer_limb / 2.0 + l.yoke);
    CHECK(mean_path(l) > 2.0 * (l.window_width + l.window_length));
    CHECK(mean_path(l) < square);
  }
}

TEST_CASE("the face of a lamination without waste is four fifths of its outline") {
  const lamination& l = patterns().named("EI 96", "test");  // 30 u2 less two windows of 3 u2
  CHECK(plain(face_area(l)) == Approx(plain(l.width * l.height) * 0.8).epsilon(1e-12));
}

TEST_CASE("inch sizes are named by the tongue") {
  CHECK(mm(patterns().named("EI 1-1/4 in", "test").tongue) == Approx(31.75).margin(0.01));
  CHECK(mm(patterns().named("EI-125", "test").tongue) == Approx(31.75).margin(0.01));
  CHECK(mm(patterns().named("ei 7/8 IN", "test").tongue) == Approx(22.225).margin(0.01));
}

TEST_CASE("every pattern is found by its own name or by one of its aliases", "[property]") {
  for (const lamination& l : patterns().all()) {
    INFO(l.name);
    std::vector<std::string> names = l.also;
    names.push_back(l.name);
    CHECK(std::any_of(names.begin(), names.end(), [&](const std::string& n) {
      return faults_of([&] { patterns().named(n, "test"); }).empty() && patterns().named(n, "test").name == l.name;
    }));
  }
}

TEST_CASE("a name that fits a metric and an inch size is refused, with names that fit one alone", "[refusal]") {
  for (const char* name : {"EI 75", "EI-75", "EI 150", "EI-150", "EI 162"}) {
    const auto faults = faults_of([&] { patterns().named(name, "/core/lamination"); });
    INFO(name);
    REQUIRE(faults.size() == 1);
    CHECK(faults[0].code == "ambiguous-name");
    CHECK(faults[0].where == "/core/lamination");
    const std::string prefix = "one of: ";
    REQUIRE(faults[0].wanted.substr(0, prefix.size()) == prefix);
    std::string list = faults[0].wanted.substr(prefix.size());
    std::vector<std::string> tongues;
    while (!list.empty()) {
      const std::size_t comma = std::min(list.find(", "), list.size());
      const std::string one = list.substr(0, comma);
      list.erase(0, std::min(comma + 2, list.size()));
      REQUIRE(faults_of([&] { patterns().named(one, "test"); }).empty());
      tongues.push_back(patterns().named(one, "test").name);
    }
    REQUIRE(tongues.size() == 2);
    CHECK(tongues[0] != tongues[1]);
  }
}

TEST_CASE("an unknown lamination is refused with those near it", "[refusal]") {
  const auto faults = faults_of([] { patterns().named("EI 97", "/core/lamination"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "unknown-name");
  CHECK(faults[0].hint.find("EI 96") != std::string::npos);
}

TEST_CASE("one and a sixteenth of an inch is not eleven sixteenths", "[refusal]") {
  const auto faults = faults_of([] { patterns().named("EI 1-1/16 in", "/core/lamination"); });
  REQUIRE(faults.size() == 1);
  CHECK(faults[0].code == "unknown-name");
}

TEST_CASE("a shop's pattern that does not close is refused in its place", "[refusal]") {
  const std::string header =
      "name,aliases,family,tongue_mm,outer_limb_mm,window_width_mm,window_length_mm,yoke_mm,width_mm,height_mm,"
      "standing,source\n";
  const auto folder = shop_folder("open", "laminations.csv",
                                  header +
                                      "Own 1,,ei,30,15,15,45,15,91,75,read,own\n"
                                      "Own 2,,ei,30,15,0,45,15,60,75,read,own\n"
                                      "Own 3,,ie,30,15,15,45,15,90,75,read,own\n"
                                      "Own 4,,ei,30,15,15,45,15,90,75,read,own\n");
  const auto faults = faults_of([&] { pattern_book book(catalogue::with_shop_rows({folder})); });
  const std::string file = (folder / "laminations.csv").string();
  REQUIRE(faults.size() == 3);
  CHECK(faults[0].code == "geometry");
  CHECK(faults[0].where == file + ":2");
  CHECK(faults[1].where == file + ":3");
  CHECK(faults[2].where == file + ":4:family");
}

TEST_CASE("a coil's room is never more than the window and never less than nothing", "[property]") {
  for (const lamination& l : patterns().all()) {
    for (const former_kind k : {former_kind::layers, former_kind::bobbin}) {
      INFO(l.name << ", " << word_of(k));
      former_wishes wishes;
      wishes.kind = k;
      for (const metres& stack : l.stacks) {
        const former f = former_for(wishes, patterns(), l, stack);
        CHECK(f.winding_width >= 0_mm);
        CHECK(f.winding_height >= 0_mm);
        CHECK(f.winding_width < l.window_length);
        CHECK(f.winding_height < l.window_width);
      }
    }
  }
}

TEST_CASE("a thicker wall leaves less room, and what the job fixes is kept") {
  const lamination& l = patterns().named("EI 96", "test");
  former_wishes thin, thick, fixed_room;
  thin.wall = 1_mm;
  thick.wall = 2_mm;
  fixed_room.winding_width = 40_mm;
  fixed_room.winding_height = 11_mm;
  CHECK(former_for(thick, patterns(), l, 35.7_mm).winding_height <
        former_for(thin, patterns(), l, 35.7_mm).winding_height);
  CHECK(former_for(fixed_room, patterns(), l, 35.7_mm).winding_width == 40_mm);
  CHECK(former_for(fixed_room, patterns(), l, 35.7_mm).winding_height == 11_mm);
}

TEST_CASE("a moulded former of the table is used for its pattern and stack") {
  const lamination& l = patterns().named("M 55", "test");
  const moulded_former* moulded = patterns().former_for(l, 20_mm);
  REQUIRE(moulded);
  former_wishes wishes;
  wishes.kind = former_kind::bobbin;
  CHECK(former_for(wishes, patterns(), l, 20_mm).winding_width == moulded->winding_width);
  CHECK(patterns().former_for(l, 20.4_mm) == moulded);
  CHECK(patterns().former_for(l, 25_mm) == nullptr);
}
