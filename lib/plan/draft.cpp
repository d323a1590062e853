#include <turnwright/plan/draft.hpp>

#include <algorithm>
#include <numbers>
#include <stdexcept>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>

namespace turnwright {

using namespace literals;

namespace {

const secondary_wish* named_secondary(const demand& d, const std::string& name, std::size_t& which) {
  for (which = 0; which < d.secondaries.size(); ++which) {
    if (d.secondaries[which].name == name) return &d.secondaries[which];
  }
  return nullptr;
}

double highest_mains(const demand& d) { return plain(d.primary.on) * (1 + d.mains.over_ratio); }

std::optional<screen_kind> screen_after(const demand& d, const std::string& name) {
  for (const screen_wish& s : d.screens) {
    // "primary" names the outer one of two equal primaries as well
    if (s.after == name || (s.after == "primary" && name == "primary B")) return s.kind;
  }
  return std::nullopt;
}

metres foil_of(screen_kind k) { return k == screen_kind::safety ? wraps::safety_screen_foil : wraps::screen_foil; }

bool floats(const demand& d, const coil_role& r) { return !r.primary && d.secondaries[r.which].floats_on.has_value(); }

struct wrap {
  metres thick;
  std::string why;
};

wrap wrap_between(const demand& d, const coil_role* under, const coil_role& over, std::optional<screen_kind> screen) {
  if (!under) return {wraps::over_former, "over the former"};
  if (screen) return {2.0 * wraps::beside_screen + foil_of(*screen), "screen foil with a wrap on either side"};
  if (d.insulation.wrap) return {*d.insulation.wrap, "as the job says"};
  if (floats(d, *under) || floats(d, over)) return {wraps::floating_heater, "beside a heater that rides on the HT"};
  if (under->primary != over.primary) return {wraps::ordinary, "primary to secondary: three layers, any two of which pass the test"};
  return {wraps::ordinary, "three layers of paper"};
}

// Sections of a primary between its taps, each a block where the wires differ; else one block.
std::vector<turns> sections_of(const demand& d, const turn_set& n, const coil_role& role, std::size_t wires) {
  if (wires == 1) return {turns_of(d, n, role)};
  std::vector<turns> parts{n.primary.front()};
  for (std::size_t i = 1; i < n.primary.size(); ++i) parts.push_back(n.primary[i] - n.primary[i - 1]);
  if (parts.size() != wires) throw std::logic_error("a wire for each tap section");
  return parts;
}

void choose_insulation(const demand& d, const shop& s, const draft& f, coil_draft& c) {
  const wire_pick& thickest = *std::max_element(c.wires.begin(), c.wires.end(),
                                                [](const auto& a, const auto& b) { return a.wire.bare < b.wire.bare; });
  if (d.insulation.margin) {
    c.margin = *d.insulation.margin;
    c.margin_why = "as the job says";
  } else if (f.room.kind == former_kind::bobbin) {
    c.margin = 0_mm;
    c.margin_why = "the cheek is the creepage path; tape lapped up it";
  } else {
    const reasoned_length m = s.insulation.end_margin(thickest.wire.bare, c.to_core);
    c.margin = m.value;
    c.margin_why = m.why;
  }
  // Volts from layer to layer at the open end, no load, highest mains.
  const block trial{turns{1}, thickest.wire, thickest.overall, thickest.strands, usual_lay(f.room.kind, thickest.overall),
                    c.margin, 0_mm, std::nullopt};
  const double per_turn = highest_mains(d) / turns_in_use(nominal_position(d.primary), f.n.primary).count();
  const int full = std::min(turns_per_layer(trial, f.shape.width).count(), turns_of(d, f.n, c.role).count());
  const volts_rms between{as<volts>(2 * per_turn * full)};
  const reasoned_length paper = s.insulation.interlayer(thickest.wire.bare, between);
  c.interlayer = paper.value;
  c.interlayer_why = paper.why;
  if (f.room.kind == former_kind::bobbin && plain(between.plain()) <= 25) {
    c.interlayer = 0_mm;
    c.interlayer_why = "under 25 V r.m.s. from layer to layer on a bobbin";
  }
  if (d.insulation.interlayer) {
    c.interlayer = *d.insulation.interlayer;
    c.interlayer_why = "as the job says";
  }
}

}  // namespace

std::vector<coil_role> coils_of(const demand& d) {
  std::vector<coil_role> all;
  for (const std::string& name : d.order) {
    if (is_primary_name(name)) {
      all.push_back({name, true, name == "primary B" ? std::size_t{1} : std::size_t{0}});
      continue;
    }
    std::size_t which = 0;
    const secondary_wish* s = named_secondary(d, name, which);
    if (!s) throw std::logic_error("the order names a winding that is not there: " + name);
    if (!s->tap_of) all.push_back({name, false, which});
  }
  return all;
}

turns turns_of(const demand& d, const turn_set& n, const coil_role& role) {
  if (role.primary) return n.primary.back();
  const secondary_turns& s = n.secondaries[role.which];
  return d.secondaries[role.which].second_half ? s.first + s.second : s.first;
}

volts_rms working_volts(const demand& d, const turn_set& n, const coil_role& role) {
  const double highest = highest_mains(d), per_turn = highest / turns_in_use(nominal_position(d.primary), n.primary).count();
  if (role.primary) {
    const auto positions = selector_positions(d.primary);
    return volts_rms{positions.back().at * (1 + d.mains.over_ratio)};
  }
  const secondary_wish& wish = d.secondaries[role.which];
  const secondary_turns& s = n.secondaries[role.which];
  double v = per_turn * std::max(s.first, s.second).count();
  if (wish.floats_on) {
    std::size_t host = 0;
    if (named_secondary(d, *wish.floats_on, host)) {
      v = std::max(v, plain(working_volts(d, n, {*wish.floats_on, false, host}).plain()));
    }
  }
  return volts_rms{as<volts>(v)};
}

draft lay_out(const demand& d, const shop& s, const core_body& core, const turn_set& n, const wire_set& wires) {
  const core_choice& iron = core.choice();
  const former room = former_for(d.former, s.patterns, iron.pattern, iron.stack);
  draft f{core, room, {}, n, {}, std::nullopt, 0_m, 0, false};
  f.shape = {iron.pattern.tongue + 2.0 * room.wall, iron.stack + 2.0 * room.wall, room.winding_width,
             usual_bulge(iron.pattern.tongue, iron.stack, d.by_hand)};
  const std::vector<coil_role> roles = coils_of(d);
  metres at = 0_m;
  const coil_role* under = nullptr;
  for (std::size_t i = 0; i < roles.size(); ++i) {
    coil_draft c{roles[i], wires[i], {}, {}, {}, {}, {}, {}, {}, {}, working_volts(d, n, roles[i])};
    c.screen_under = under ? screen_after(d, under->name) : std::nullopt;
    const wrap w = wrap_between(d, under, c.role, c.screen_under);
    c.wrap_under = w.thick;
    c.wrap_why = w.why;
    choose_insulation(d, s, f, c);
    std::vector<block> blocks;
    const std::vector<turns> parts = sections_of(d, n, c.role, c.wires.size());
    for (std::size_t k = 0; k < parts.size(); ++k) {
      const wire_pick& p = c.wires[k];
      blocks.push_back({parts[k], p.wire, p.overall, p.strands, usual_lay(room.kind, p.overall), c.margin, c.interlayer, std::nullopt});
    }
    c.laid = lay(blocks, at + c.wrap_under, f.shape);
    for (const laid_block& b : c.laid.blocks) f.too_wide = f.too_wide || b.too_wide;
    at = c.laid.inside + c.laid.build;
    f.coils.push_back(std::move(c));
    under = &roles[i];
  }
  at += wraps::outer;
  f.screen_outside = under ? screen_after(d, under->name) : std::nullopt;
  if (f.screen_outside) at += wraps::beside_screen + foil_of(*f.screen_outside);
  f.used = f.shape.bulge * at;
  f.fill = plain(room.winding_height) > 0 ? plain(f.used) / plain(room.winding_height) : 1e3;
  return f;
}

stray_piece span_of(const draft& f, const coil_draft& c, turns from, turns to) {
  int done = 0;
  std::optional<metres> inner;
  metres outer = 0_m;
  for (const laid_block& b : c.laid.blocks) {
    for (const layer& l : b.layers) {
      const bool meets = done < to.count() && done + l.n.count() > from.count();
      if (meets && !inner) inner = l.middle - b.of.overall / 2.0;
      if (meets) outer = l.middle + b.of.overall / 2.0;
      done += l.n.count();
    }
  }
  return {f.room.wall + f.shape.bulge * inner.value_or(0_m), f.room.wall + f.shape.bulge * outer, 1.0};
}

stray_space stray_space_of(const draft& f) {
  // The turn's length at x from the tongue's face: that of the former's outer face at x = wall.
  return {2.0 * (f.shape.across + f.shape.deep) - 2 * std::numbers::pi * f.room.wall};
}

coil_size outside_of(const draft& f) { return {f.shape.across + 2.0 * f.used, f.shape.deep + 2.0 * f.used}; }

}  // namespace turnwright
