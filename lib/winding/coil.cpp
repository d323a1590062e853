#include <turnwright/winding/coil.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include <turnwright/measure/literals.hpp>
#include <turnwright/wire/copper.hpp>

namespace turnwright {

using namespace literals;

namespace {

// Walks over the stretches of turns [from, to) that lie in each layer.
template <class Visit>
void each_stretch(const laid_winding& w, turns from, turns to, Visit visit) {
  int done = 0;
  for (const laid_block& b : w.blocks) {
    for (const layer& l : b.layers) {
      const int first = std::max(done, from.count()), last = std::min(done + l.n.count(), to.count());
      if (last > first) visit(b, l, last - first);
      done += l.n.count();
    }
  }
}

}  // namespace

turns turns_per_layer(const block& b, metres winding_width) {
  if (b.per_layer) return *b.per_layer;
  const metres free = winding_width - 2.0 * b.margin;
  const double pitches = free / (b.overall * static_cast<double>(b.strands));
  const int by_lay = static_cast<int>(std::floor(pitches * b.lay + 1e-9));
  const int by_helix = static_cast<int>(std::floor(pitches + 1e-9)) - 1;
  return turns{std::max(0, std::min(by_lay, by_helix))};
}

metres mean_turn_at(const tube& t, metres height) {
  return 2.0 * (t.across + t.deep) + 2 * std::numbers::pi * t.bulge * height;
}

laid_winding lay(const std::vector<block>& blocks, metres inside, const tube& t) {
  laid_winding w{{}, inside, 0_m};
  metres at = inside;
  for (const block& b : blocks) {
    laid_block out{b, turns_per_layer(b, t.width), false, {}};
    if (out.per_layer.count() < 1) {
      out.too_wide = true;  // laid as one layer, so that whoever asks gets finite figures with the flag
      out.per_layer = b.n;
    }
    for (int left = b.n.count(); left > 0;) {
      const int here = std::min(left, out.per_layer.count());
      if (at > inside) at += b.interlayer;
      const metres middle = at + b.overall / 2.0;
      out.layers.push_back({turns{here}, middle, mean_turn_at(t, middle)});
      at += b.overall;
      left -= here;
    }
    w.blocks.push_back(std::move(out));
  }
  w.build = at - inside;
  return w;
}

turns total_turns(const laid_winding& w) {
  int n = 0;
  for (const laid_block& b : w.blocks) n += b.of.n.count();
  return turns{n};
}

int layer_count(const laid_winding& w) {
  std::size_t n = 0;
  for (const laid_block& b : w.blocks) n += b.layers.size();
  return static_cast<int>(n);
}

metres wire_length(const laid_winding& w, turns from, turns to) {
  metres length = 0_m;
  each_stretch(w, from, to,
               [&](const laid_block&, const layer& l, int n) { length += static_cast<double>(n) * l.mean_turn; });
  return length;
}

ohms resistance_20(const laid_winding& w, turns from, turns to) {
  ohms r = 0_ohm;
  each_stretch(w, from, to, [&](const laid_block& b, const layer& l, int n) {
    r += static_cast<double>(n) * l.mean_turn * resistance_at_20(b.of.wire) / static_cast<double>(b.of.strands);
  });
  return r;
}

kilograms copper_mass(const laid_winding& w) {
  kilograms m = 0_kg;
  each_stretch(w, turns{0}, total_turns(w), [&](const laid_block& b, const layer& l, int n) {
    m += static_cast<double>(n) * l.mean_turn * mass_per_metre(b.of.wire) * static_cast<double>(b.of.strands);
  });
  return m;
}

metres mean_turn(const laid_winding& w) {
  return wire_length(w, turns{0}, total_turns(w)) / static_cast<double>(std::max(1, total_turns(w).count()));
}

turn_place place_of(const laid_winding& w, turns count) {
  int done = 0, number = 0;
  for (const laid_block& b : w.blocks) {
    for (const layer& l : b.layers) {
      ++number;
      const int here = count.count() - done;
      if (here <= l.n.count()) {
        const bool far_end = 2 * here >= l.n.count();       // nearer to where this layer ends
        const bool runs_from_start_side = number % 2 == 1;  // layers go to and fro
        return {number, runs_from_start_side != far_end, here == l.n.count() || here == 0};
      }
      done += l.n.count();
    }
  }
  return {number, number % 2 == 0, true};
}

double usual_bulge(metres tongue, metres stack, bool by_hand) {
  const double stretch = stack / tongue;
  return std::clamp(1.05 + 0.05 * (stretch - 1) + (by_hand ? 0.05 : 0.0), 1.05, 1.15);
}

double usual_lay(former_kind kind, metres overall) {
  if (overall > 1.0_mm) return 0.87;
  if (kind == former_kind::layers) return 0.90;
  return overall <= 0.4_mm ? 0.95 : 0.93;
}

}  // namespace turnwright
