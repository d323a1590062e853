#include <turnwright/plan/plan.hpp>

#include <algorithm>
#include <functional>

#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>

namespace turnwright {

using namespace literals;

namespace {

core_body core_of(const demand& d, const lamination& l, metres stack, const steel& grade) {
  return core_body({l, stack, grade, d.core.stacking_factor.value_or(usual_stacking_factor(grade)), d.core.style});
}

const steel& grade_of(const demand& d, const shop& s) {
  return s.steels.named(d.core.grade.value_or(std::string(usual_steel)), "/core/steel");
}

bool offered(const demand& d, const lamination& l) {
  const bool inch = l.family == pattern_family::ei_inch;
  const bool metric = l.family == pattern_family::ei || l.family == pattern_family::ei_wide;
  return d.wire.system == wire_system::awg ? inch : metric;
}

// The wanted patterns in the wanted stack, else in each of their usual ones; lightest first.
std::vector<core_body> cores_where(const demand& d, const shop& s,
                                   const std::function<bool(const lamination&)>& wanted) {
  const steel& grade = grade_of(d, s);
  std::vector<core_body> all;
  for (const lamination& l : s.patterns.all()) {
    if (!wanted(l)) continue;
    if (d.core.stack) {
      all.push_back(core_of(d, l, *d.core.stack, grade));
      continue;
    }
    for (const metres& stack : l.stacks) all.push_back(core_of(d, l, stack, grade));
    if (l.stacks.empty()) all.push_back(core_of(d, l, l.tongue, grade));
  }
  std::stable_sort(all.begin(), all.end(), [](const core_body& a, const core_body& b) { return a.mass() < b.mass(); });
  return all;
}

// Copper that the ampere-turns need at the highest density any winder would use, over the room there is: above 0.75 no
// enamel and paper would leave it that.
bool hopelessly_small(const demand& d, const shop& s, const core_body& core) {
  const teslas b = d.limits.flux_density.value_or(core.choice().grade.flux_nominal);
  const double per_volt = turns_for(volts_rms{1_V}, d.mains.frequency, b, core.net_area());
  const double densest = plain(d.limits.current_density.value_or(usual_highest_density));
  const double copper_m2 = 2 * plain(rating_of(d)) * per_volt / std::max(densest, plain(usual_highest_density));
  const former room = former_for(d.former, s.patterns, core.choice().pattern, core.choice().stack);
  return copper_m2 > 0.75 * plain(room.winding_width) * plain(room.winding_height);
}

// A wire for each tap section only where one gauge throughout does not do.
attempt wind_either_way(const demand& d, const shop& s, const core_body& core, std::vector<working>& workings) {
  attempt one = wind(d, s, core, false, workings);
  const bool sections = d.primary.taps.size() > 1 && !d.primary.fixed.wire;
  if (one.windable() || !sections) return one;
  attempt stepped = wind(d, s, core, true, workings);
  return stepped.windable() || stepped.excess() < one.excess() ? stepped : one;
}

double merit(const demand& d, const attempt& a) {
  const core_choice& c = a.coil.core.choice();
  switch (d.goal) {
    case aim::cost:
      return cost_of(d, a.coil);
    case aim::mass:
      return plain(total_mass(a.coil));
    case aim::loss:
      return plain(a.nominal.copper_loss + a.nominal.core_loss);
    case aim::volume:
      return plain(c.pattern.width) * plain(c.pattern.height) * plain(c.stack + 2.0 * (a.coil.room.wall + a.coil.used));
    case aim::height:
      return plain(c.pattern.height) + 1e-3 * plain(total_mass(a.coil));
    case aim::regulation:
      return worst_regulation(a.nominal);
  }
  return 0;
}

// No core heavier than this one can win once the iron alone costs or weighs more than the best.
bool beaten_by_iron_alone(const demand& d, const core_body& core, double best) {
  if (d.goal == aim::cost) return plain(core.mass()) * plain(d.prices.steel) > best;
  if (d.goal == aim::mass) return plain(core.mass()) > best;
  return false;
}

// 2: with room to spare; 1: can be wound; 0: cannot.
int rank(const attempt& a) { return a.comfortable() ? 2 : a.windable() ? 1 : 0; }

bool better(const demand& d, const attempt& a, const attempt& b) {
  if (rank(a) != rank(b)) return rank(a) > rank(b);
  return a.windable() ? merit(d, a) < merit(d, b) : a.excess() < b.excess();
}

attempt best_of(const demand& d, const shop& s, const std::vector<core_body>& cores, std::vector<working>& workings) {
  if (cores.size() == 1) return wind_either_way(d, s, cores.front(), workings);
  std::optional<attempt> best;
  int passed_over = 0;
  for (const core_body& core : cores) {
    if (best && best->comfortable() && beaten_by_iron_alone(d, core, merit(d, *best))) break;
    if (&core != &cores.back() && hopelessly_small(d, s, core)) {
      ++passed_over;
      continue;
    }
    // With the choice of cores open one gauge is kept to: the next core does what stepping would.
    attempt a = wind(d, s, core, false, workings);
    if (!best || better(d, a, *best)) best = std::move(a);
  }
  workings.push_back({std::to_string(passed_over) + " cores passed over: their copper alone would fill the window"});
  return std::move(*best);
}

std::string named(const core_body& c) {
  return c.choice().pattern.name + " with a stack of " + shown(c.choice().stack) + " of " + c.choice().grade.name;
}

// The job with something freed that it fixes of its windings: `release` does it for one, and says whether it had to.
// Winds that; where it can be wound, the cure is what `said` says of each coil.
std::optional<std::string> cure_by_freeing(const demand& d, const shop& s, const core_body& core,
                                           const std::function<bool(winding_wishes&)>& release, std::string text,
                                           const std::function<std::string(const coil_draft&)>& said) {
  demand freed = d;
  bool had_to = release(freed.primary.fixed);
  for (secondary_wish& w : freed.secondaries) had_to = release(w.fixed) || had_to;
  if (!had_to) return std::nullopt;  // what is free has been tried already
  std::vector<working> unused;
  const attempt a = wind_either_way(freed, s, core, unused);
  if (!a.windable()) return std::nullopt;
  for (const coil_draft& c : a.coil.coils) {
    text += (&c == &a.coil.coils.front() ? " " : ", ") + c.role.name + " " + said(c);
  }
  return text;
}

std::optional<std::string> cure_by_wire(const demand& d, const shop& s, const core_body& core) {
  const auto release = [](winding_wishes& w) {
    const bool had_to = w.wire || w.strands;
    w.wire.reset();
    w.strands.reset();
    return had_to;
  };
  return cure_by_freeing(d, s, core, release, "other wire:", [](const coil_draft& c) {
    const wire_pick& w = c.wires.front();
    return (w.strands > 1 ? std::to_string(w.strands) + " x " : "") + w.wire.size;
  });
}

std::optional<std::string> cure_by_turns(const demand& d, const shop& s, const core_body& core) {
  const auto release = [](winding_wishes& w) {
    const bool had_to = w.n.has_value();
    w.n.reset();
    return had_to;
  };
  return cure_by_freeing(d, s, core, release, "other turns:", [](const coil_draft& c) {
    return std::to_string(total_turns(c.laid).count());
  });
}

std::optional<std::string> cure_by_stack(const demand& d, const shop& s, const core_body& core) {
  const core_choice& c = core.choice();
  std::vector<metres> stacks;
  for (const metres& t : c.pattern.stacks) {
    if (t > c.stack) stacks.push_back(t);
  }
  for (const double more : {1.1, 1.2, 1.35, 1.5, 1.75, 2.0}) {
    if (c.stack * more <= 2.0 * c.pattern.tongue) stacks.push_back(as<metres>(rounded_to(plain(c.stack) * more, 3)));
  }
  std::sort(stacks.begin(), stacks.end());
  std::vector<working> unused;
  for (const metres& stack : stacks) {
    if (wind_either_way(d, s, core_of(d, c.pattern, stack, c.grade), unused).windable()) {
      return "a stack of " + shown(stack) + " instead of " + shown(c.stack);
    }
  }
  return std::nullopt;
}

std::optional<std::string> cure_by_flux(const demand& d, const shop& s, const core_body& core) {
  const steel& grade = core.choice().grade;
  const teslas now = d.limits.flux_density.value_or(grade.flux_nominal);
  const teslas knee = grade.flux_high / (1 + d.mains.over_ratio);
  std::vector<working> unused;
  for (const teslas& b : {grade.flux_nominal, knee}) {
    if (b <= now) continue;
    demand more = d;
    more.limits.flux_density = b;
    more.limits.flux_density_high.reset();
    if (wind_either_way(more, s, core, unused).windable())
      return "a flux density of " + shown(b) + " instead of " + shown(now);
  }
  return std::nullopt;
}

// Other cores: of the same family first and the next heavier before all others.
std::optional<std::string> cure_by_core(const demand& d, const shop& s, const core_body& core) {
  demand open = d;
  open.core.lamination.reset();
  open.core.stack.reset();
  std::vector<core_body> others = cores_where(open, s, [](const lamination& l) { return is_shell(l); });
  const auto turn = [&](const core_body& c) {
    return (c.choice().pattern.family == core.choice().pattern.family ? 0 : 2) + (c.mass() > core.mass() ? 0 : 1);
  };
  std::stable_sort(others.begin(), others.end(),
                   [&](const core_body& a, const core_body& b) { return turn(a) < turn(b); });
  std::vector<working> unused;
  for (const core_body& other : others) {
    if (hopelessly_small(d, s, other)) continue;
    if (wind(open, s, other, false, unused).windable())
      return (other.mass() > core.mass() ? "the next core: " : "another core: ") + named(other);
  }
  return std::nullopt;
}

// The smallest change that clears everything, tried in the order wire, turns that are fixed, stack, flux, next core.
std::string cure_for(const demand& d, const shop& s, const core_body& core, const attempt& made) {
  const bool rail_out_of_reach =
      made.volts_score > 4 && std::any_of(d.secondaries.begin(), d.secondaries.end(),
                                          [](const secondary_wish& w) { return w.rail && w.rail->target; });
  if (rail_out_of_reach)
    return "no winding reaches the target: less resistance before the node, another rectifier, less load, or another "
           "target";
  const std::vector<std::function<std::optional<std::string>()>> ways{
      [&] { return cure_by_wire(d, s, core); }, [&] { return cure_by_turns(d, s, core); },
      [&] { return cure_by_stack(d, s, core); }, [&] { return cure_by_flux(d, s, core); },
      [&] { return cure_by_core(d, s, core); }};
  for (const auto& way : ways) {
    if (const auto cure = way()) return *cure;
  }
  return "nothing that was tried clears it: wire, turns, stack, flux, and every core of the tables in this steel; "
         "relax a limit or what is fixed";
}

}  // namespace

std::vector<core_body> candidate_cores(const demand& d, const shop& s) {
  if (!d.core.lamination) return cores_where(d, s, [&](const lamination& l) { return offered(d, l); });
  const lamination& named = s.patterns.named(*d.core.lamination, "/core/lamination");
  return cores_where(d, s, [&](const lamination& l) { return l.name == named.name; });
}

namespace {

// What was chosen where the job left it open.
void add_choices(const demand& d, design& p) {
  const core_choice& c = p.made.coil.core.choice();
  const auto assume = [&](bool open, std::string path, std::string value, std::string why) {
    if (open) p.assumed.push_back({std::move(path), std::move(value), std::move(why)});
  };
  assume(!d.core.lamination, "/core/lamination", c.pattern.name,
         std::string("chosen by the aim from the ") + (d.wire.system == wire_system::awg ? "inch" : "metric") +
             " E-I patterns that meet every limit with room to spare");
  assume(!d.core.stack, "/core/stack", shown(c.stack, 4), "chosen by the aim among the usual stacks");
  assume(!d.core.stacking_factor, "/core/stacking_factor", written(ratio{c.stacking_factor}),
         "a stack laid by hand, by sheet (memory)");
  assume(!d.limits.flux_density, "/limits/flux_density", written(p.made.flux.nominal),
         "quiet working peak of " + c.grade.name + " (memory)");
  assume(!d.limits.flux_density_high, "/limits/flux_density_high", written(p.made.flux.high),
         "just under the knee of " + c.grade.name);
  assume(!d.former.wall, "/former/wall", shown(p.made.coil.room.wall, 3), "practice");
  assume(d.screens.empty(), "/screens", "none", "the job asks for none");
  const draft& f = p.made.coil;
  assume(true, "bulge", fixed(f.shape.bulge, 2),
         std::string("of a coil wound by ") + (d.by_hand ? "hand" : "machine") + " (judgement)");
  assume(true, "clearance", shown(f.room.clearance, 2), "from coil to outer limb (practice)");
  assume(true, "outer wrap", shown(wraps::outer, 2), "abrasion and label (practice)");
  assume(true, "lay",
         f.room.kind == former_kind::layers ? "90 %, 87 % over 1 mm" : "95 %, 93 % over 0.4 mm, 87 % over 1 mm",
         "part of the width that turns fill (practice)");
  assume(true, "building factor", fixed(f.core.building_factor(), 2),
         "loss of the stacked core over that of the sheet (memory)");
  assume(true, "joint gap", shown(f.core.joint_gap(), 2), "equivalent gap of the joints in the loop (memory)");
}

}  // namespace

design plan(const demand& d, const shop& s) {
  std::vector<working> workings;
  attempt made = best_of(d, s, candidate_cores(d, s), workings);
  const core_body core = made.coil.core;
  const std::string cure = made.windable() ? "" : cure_for(d, s, core, made);
  design out = figures_of(d, s, std::move(made));
  out.workings = std::move(workings);
  add_choices(d, out);
  out.checks = checks_of(out, cure);
  // Only what really stands in the way counts as gone past.
  std::erase_if(out.wanted.accepted, [&](const std::string& code) {
    return std::none_of(out.checks.begin(), out.checks.end(),
                        [&](const check& c) { return c.weight == level::stop && c.code == code; });
  });
  out.windable = std::none_of(out.checks.begin(), out.checks.end(), [&](const check& c) {
    return c.weight == level::stop && std::find(d.accepted.begin(), d.accepted.end(), c.code) == d.accepted.end();
  });
  out.cautions = winding_cautions();
  return out;
}

}  // namespace turnwright
