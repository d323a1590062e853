#include <turnwright/plan/draft.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include <turnwright/measure/literals.hpp>

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

bool floats(const demand& d, const coil_role& r) { return !r.primary && d.secondaries[r.which].floats_on.has_value(); }

struct wrap {
  metres usual;
  std::string why;
};

// What practice puts between two windings, or between a winding and a screen.
wrap usual_wrap(const demand& d, const coil_role* under, const coil_role& over, bool screen) {
  if (!under) return {wraps::over_former, "over the former"};
  if (floats(d, *under) || floats(d, over)) return {wraps::floating_heater, "beside a heater that rides on the HT"};
  if (screen) return {wraps::beside_screen, "beside a screen"};
  if (under->primary != over.primary)
    return {wraps::ordinary, "primary to secondary: three layers, any two of which pass the test"};
  return {wraps::ordinary, "three layers of paper"};
}

void choose_wraps(const demand& d, const coil_role* under, coil_draft& c) {
  const wrap w = usual_wrap(d, under, c.role, c.screen_under.has_value());
  c.wrap_usual = w.usual;
  c.wrap_why = w.why;
  c.wrap_under = under && d.insulation.wrap ? *d.insulation.wrap : w.usual;
  if (under && d.insulation.wrap) c.wrap_why = "as the job says";
  c.wrap_under_screen = c.screen_under ? c.wrap_under : 0_mm;
}

// Sections of a primary between its taps, each a block where the wires differ; else one block.
std::vector<turns> sections_of(const demand& d, const turn_set& n, const coil_role& role, std::size_t wires) {
  if (wires == 1) return {turns_of(d, n, role)};
  std::vector<turns> parts{n.primary.front()};
  for (std::size_t i = 1; i < n.primary.size(); ++i) parts.push_back(n.primary[i] - n.primary[i - 1]);
  if (parts.size() != wires) throw std::logic_error("a wire for each tap section");
  return parts;
}

int film_number(const std::string& grade) { return grade == "1" || grade == "single" ? 1 : grade == "3" ? 3 : 2; }

// Without paper the enamel alone stands between layers: up to 25 V r.m.s., and up to a fortieth of what new wire of
// that film breaks down at (judgement).
bool enamel_is_enough(const shop& s, const wire_pick& w, volts_rms between_layers) {
  const auto breakdown = s.insulation.enamel_breakdown(w.wire.bare, film_number(w.grade));
  const double enamel_v = breakdown ? plain(breakdown->plain()) / 40 : 0;
  return plain(between_layers.plain()) <= std::min(25.0, enamel_v);
}

void choose_insulation(const demand& d, const shop& s, const draft& f, coil_draft& c) {
  const wire_pick& thickest = *std::max_element(c.wires.begin(), c.wires.end(),
                                                [](const auto& a, const auto& b) { return a.wire.bare < b.wire.bare; });
  const bool bobbin = f.room.kind == former_kind::bobbin;
  const reasoned_length usual = bobbin ? reasoned_length{0_mm, "the cheek is the creepage path; tape lapped up it"}
                                       : s.insulation.end_margin(thickest.wire.bare, rms_of(c.to_core));
  c.margin_usual = usual.value;
  c.margin = d.insulation.margin.value_or(usual.value);
  c.margin_why = d.insulation.margin ? "as the job says" : usual.why;
  // Volts from layer to layer at the open end, no load, highest mains.
  const block trial{
      turns{1}, thickest.wire, thickest.overall, thickest.strands, usual_lay(f.room.kind, thickest.overall),
      c.margin, 0_mm,          std::nullopt};
  const double per_turn = highest_mains(d) / turns_in_use(nominal_position(d.primary), f.n.primary).count();
  const int full = std::min(turns_per_layer(trial, f.shape.width).count(), turns_of(d, f.n, c.role).count());
  const volts_rms between_layers{as<volts>(2 * per_turn * full)};
  const reasoned_length paper = s.insulation.interlayer(thickest.wire.bare, between_layers);
  c.interlayer = paper.value;
  c.interlayer_why = paper.why;
  if (bobbin && enamel_is_enough(s, thickest, between_layers)) {
    c.interlayer = 0_mm;
    c.interlayer_why = "so few volts from layer to layer that the enamel bears them";
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

volts_rms rms_of(const potential& p) {
  return volts_rms{as<volts>(std::hypot(plain(p.ac.plain()), plain(p.dc.plain())))};
}

volts_peak peak_of(const potential& p) { return volts_peak{p.dc.plain() + peak_of_sine(p.ac).plain()}; }

potential between(const potential& a, const potential& b) {
  return {volts_rms{a.ac.plain() + b.ac.plain()},
          volts_dc{as<volts>(std::abs(plain(a.dc.plain()) - plain(b.dc.plain())))}};
}

metres foil_of(screen_kind k) { return k == screen_kind::safety ? wraps::safety_screen_foil : wraps::screen_foil; }

metres gap_under(const coil_draft& c) {
  return c.screen_under ? c.wrap_under + foil_of(*c.screen_under) + c.wrap_under_screen : c.wrap_under;
}

amperes_per_square_metre density_in(const coil_draft& c, amperes current, turns in_use) {
  amperes_per_square_metre worst = as<amperes_per_square_metre>(0);
  turns from{0};
  for (std::size_t k = 0; k < c.laid.blocks.size(); ++k) {
    const wire_pick& w = c.wires[k];
    if (from < in_use)
      worst = std::max(worst, amperes_per_square_metre(current / (bare_area(w.wire) * static_cast<double>(w.strands))));
    from = from + c.laid.blocks[k].of.n;
  }
  return worst;
}

potential working_volts(const demand& d, const turn_set& n, const coil_role& role) {
  const double highest = highest_mains(d),
               per_turn = highest / turns_in_use(nominal_position(d.primary), n.primary).count();
  if (role.primary)
    return {volts_rms{selector_positions(d.primary).back().at * (1 + d.mains.over_ratio)}, volts_dc{0_V}};
  const secondary_wish& wish = d.secondaries[role.which];
  const secondary_turns& s = n.secondaries[role.which];
  potential p{volts_rms{as<volts>(per_turn * std::max(s.first, s.second).count())}, volts_dc{0_V}};
  // A bridge lifts its winding by half the HT, a full-wave doubler one end of it by half of twice that.
  const bool bridged = wish.rail && wish.rail->kind == supply::circuit::bridge;
  const bool doubled = wish.rail && (wish.rail->kind == supply::circuit::full_wave_doubler ||
                                     wish.rail->kind == supply::circuit::half_wave_doubler);
  if (bridged || doubled) p.dc = volts_dc{peak_of_sine(p.ac).plain() * (bridged ? 0.5 : 1.0)};
  std::size_t host = 0;
  if (wish.floats_on && named_secondary(d, *wish.floats_on, host)) {
    const secondary_turns& h = n.secondaries[host];
    const auto& rail = d.secondaries[host].rail;
    const bool twice =
        rail && (rail->kind == supply::circuit::full_wave_doubler || rail->kind == supply::circuit::half_wave_doubler);
    p.dc = volts_dc{peak_of_sine(volts_rms{as<volts>(per_turn * std::max(h.first, h.second).count())}).plain() *
                    (twice ? 2.0 : 1.0)};
  }
  return p;
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
    coil_draft c{roles[i], wires[i], {}, {}, {}, {}, {}, {}, {}, {}, {}, {}, {}, working_volts(d, n, roles[i])};
    c.screen_under = under ? screen_after(d, under->name) : std::nullopt;
    choose_wraps(d, under, c);
    choose_insulation(d, s, f, c);
    std::vector<block> blocks;
    const std::vector<turns> parts = sections_of(d, n, c.role, c.wires.size());
    for (std::size_t k = 0; k < parts.size(); ++k) {
      const wire_pick& p = c.wires[k];
      blocks.push_back({parts[k], p.wire, p.overall, p.strands, usual_lay(room.kind, p.overall), c.margin, c.interlayer,
                        std::nullopt});
    }
    c.laid = lay(blocks, at + gap_under(c), f.shape);
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
