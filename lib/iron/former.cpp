#include <turnwright/iron/former.hpp>

#include <algorithm>

#include <turnwright/measure/literals.hpp>

namespace turnwright {

using namespace literals;

namespace {

metres usual_wall(former_kind kind, const lamination& l) {
  if (kind == former_kind::layers) return 1.2_mm;
  if (l.tongue <= 22_mm) return 0.9_mm;
  return l.tongue <= 40_mm ? 1.25_mm : 1.8_mm;
}

}  // namespace

std::string_view word_of(former_kind k) { return k == former_kind::layers ? "layers" : "bobbin"; }

former former_for(const former_wishes& wishes, const pattern_book& patterns, const lamination& l, metres stack) {
  former f;
  f.kind = wishes.kind;
  f.wall = wishes.wall.value_or(usual_wall(wishes.kind, l));
  f.cheek = wishes.kind == former_kind::bobbin ? f.wall : 0_mm;
  f.clearance = 0.6_mm;
  f.winding_width = l.window_length - 2.0 * f.cheek - 1.0_mm;
  f.winding_height = l.window_width - f.wall - f.clearance;
  const moulded_former* moulded = wishes.kind == former_kind::bobbin ? patterns.former_for(l, stack) : nullptr;
  if (moulded && !wishes.wall) {
    f.winding_width = moulded->winding_width;
    f.winding_height = moulded->winding_height;
    f.known_how = moulded->known_how;
  }
  if (wishes.winding_width) f.winding_width = *wishes.winding_width;
  if (wishes.winding_height) f.winding_height = *wishes.winding_height;
  f.winding_width = std::max(f.winding_width, 0_mm);
  f.winding_height = std::max(f.winding_height, 0_mm);
  return f;
}

}  // namespace turnwright
