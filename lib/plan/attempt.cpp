#include <turnwright/plan/attempt.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>

namespace turnwright {

using namespace literals;

namespace {

std::vector<load_ratio> first_guess(const demand& d) {
  // Volts on load over no load by size, from practice (memory); the fixed point replaces it.
  const double va = plain(rating_of(d)), ratio = 1 / (va < 30 ? 1.08 : va > 200 ? 1.04 : 1.06);
  std::vector<load_ratio> all;
  for (const secondary_wish& w : d.secondaries) all.push_back(w.no_load ? load_ratio{} : load_ratio{ratio, ratio});
  return all;
}

// Number of a secondary's rail among all rails of a solved network.
std::size_t rail_number(const demand& d, std::size_t secondary) {
  std::size_t number = 0;
  for (std::size_t i = 0; i < secondary; ++i) number += d.secondaries[i].rail.has_value();
  return number;
}

// Volts found at the node that a winding's rail aims at.
volts at_target(const demand& d, std::size_t secondary, const running& r) {
  const rail_wish& wish = *d.secondaries[secondary].rail;
  for (std::size_t n = 0; n < wish.nodes.size(); ++n) {
    if (wish.nodes[n].name == wish.target->node)
      return r.electric.rails[rail_number(d, secondary)].nodes[n].mean.plain();
  }
  throw std::logic_error("no such node");
}

bool has_target(const secondary_wish& w) { return w.rail && w.rail->target; }

std::vector<load_ratio> ratios_of(const demand& d, const draft& f, const running& r) {
  std::vector<load_ratio> all(d.secondaries.size());
  const auto ports = ports_of(d, f);
  for (std::size_t k = 0; k < ports.size(); ++k) {
    const secondary_wish& w = d.secondaries[ports[k].secondary];
    if (w.no_load) continue;
    const volts open = r.electric.ports[k].no_load.plain();
    double found = plain(r.electric.ports[k].on_load.plain()) / plain(open);
    if (has_target(w)) {
      // Rail volts rise with the winding's, less a part lost in rectifier and chain: some 8 % of them for a start,
      // which only sets how fast the rounds close in. Beyond two and a half times the first guess a core is hopeless.
      const double wanted = plain(w.rail->target->at.plain()), lost = 0.08 * wanted;
      const double there = std::max(plain(at_target(d, ports[k].secondary, r)), 0.2 * wanted);
      const double needed = plain(open) * ((wanted + lost) / (there + lost));
      const double guess = plain(ports[k].half == 1 ? *w.second_half : w.voltage);
      found = guess / std::clamp(needed, 0.4 * guess, 2.5 * guess);
      (ports[k].half == 0 ? all[ports[k].secondary].first : all[ports[k].secondary].second) = found;
      continue;
    }
    // Where half the volts are lost the core is hopeless; more turns would only lose more.
    (ports[k].half == 0 ? all[ports[k].secondary].first : all[ports[k].secondary].second) = std::max(0.5, found);
  }
  return all;
}

// Currents that size the secondaries: the job's own, and behind or beside a rectifier what the solver found.
std::vector<amperes> currents_of(const demand& d, const draft& f, const running& r) {
  std::vector<amperes> all = currents_of_job(d);
  const auto ports = ports_of(d, f);
  for (std::size_t i = 0; i < d.secondaries.size(); ++i) {
    const bool rectified_tap = std::any_of(d.secondaries.begin(), d.secondaries.end(), [&](const secondary_wish& t) {
      return t.tap_of == d.secondaries[i].name && t.rail;
    });
    if (!d.secondaries[i].rail && !rectified_tap) continue;
    amperes most = 0_A;
    for (std::size_t k = 0; k < ports.size(); ++k) {
      const bool own = ports[k].secondary == i, tap = ports[k].inside && ports[*ports[k].inside].secondary == i;
      if (own) most = std::max(most, r.electric.ports[k].current.plain());
      if (own || tap) most = std::max(most, r.electric.shared_current[k].plain());
    }
    all[i] = most;
  }
  return all;
}

double score_of(const demand& d, const draft& f, const running& r) {
  double worst = 0;
  const auto ports = ports_of(d, f);
  for (std::size_t k = 0; k < ports.size(); ++k) {
    const secondary_wish& w = d.secondaries[ports[k].secondary];
    if (has_target(w)) {
      // Half a turn's worth is as near as whole turns come, whatever the tolerance.
      const double wanted = plain(w.rail->target->at.plain()), found = plain(at_target(d, ports[k].secondary, r));
      const double half_a_turn = 0.6 * wanted / f.n.secondaries[ports[k].secondary].first.count();
      worst = std::max(worst, std::abs(found - wanted) / std::max(half_a_turn, tolerance_of(w).over * wanted));
      continue;
    }
    const supply::port_state& s = r.electric.ports[k];
    const double wanted = plain(ports[k].half == 1 ? *w.second_half : w.voltage);
    worst = std::max(worst, volts_off(w, plain((w.no_load ? s.no_load : s.on_load).plain()) / wanted));
  }
  return worst;
}

bool same_wires(const wire_set& a, const wire_set& b) {
  return std::equal(a.begin(), a.end(), b.begin(), b.end(), [](const auto& x, const auto& y) {
    return std::equal(x.begin(), x.end(), y.begin(), y.end(), [](const wire_pick& p, const wire_pick& q) {
      return p.wire.size == q.wire.size && p.strands == q.strands;
    });
  });
}

struct settled_round {
  draft f;
  running r;
  wire_set wires;
  double score;
  bool rough;
};

// Rails that are aimed at are closed in on by an estimate of what a turn does; where that leaves one more than half a
// turn's worth off, the turn next to it is wound and the nearer of the two kept.
void move_to_targets(const demand& d, const shop& s, const core_body& core, const selector_position& at,
                     settled_round& kept) {
  for (std::size_t i = 0; i < d.secondaries.size(); ++i) {
    const secondary_wish& w = d.secondaries[i];
    if (!has_target(w) || w.fixed.n) continue;
    const auto off = [&](const running& r) { return plain(at_target(d, i, r)) - plain(w.rail->target->at.plain()); };
    for (int tries = 0; tries < 4; ++tries) {
      const double now = off(kept.r), a_turn = plain(at_target(d, i, kept.r)) / kept.f.n.secondaries[i].first.count();
      if (std::abs(now) <= 0.4 * a_turn) break;
      turn_set n = kept.f.n;
      const turns step{now > 0 ? -1 : 1};
      n.secondaries[i].first = n.secondaries[i].first + step;
      if (w.second_half) n.secondaries[i].second = n.secondaries[i].second + step;
      draft f = lay_out(d, s, core, n, kept.wires);
      running r = run(d, f, at, 1.0, kept.r.copper);
      if (std::abs(off(r)) >= std::abs(now)) break;
      kept.f = std::move(f);
      kept.r = std::move(r);
    }
  }
}

// Turns and wires at one density until both stand still. They are whole numbers, so left alone they may wander: after
// three rounds the primary and the sizing currents are held, and only the secondaries still follow their volts. Those
// may end in a ring; then the member whose volts are best is kept.
attempt settle(const demand& d, const shop& s, const core_body& core, const flux_limits& flux,
               amperes_per_square_metre density, bool stepped) {
  constexpr int free_rounds = 3, most_rounds = 12;
  std::vector<load_ratio> ratios = first_guess(d);
  std::vector<double> weights(coils_of(d).size(), 1.0);
  std::vector<amperes> amps = currents_of_job(d);
  amperes line = as<amperes>(1.15 * plain(rating_of(d)) / plain(d.primary.on));
  const selector_position at = nominal_position(d.primary);
  std::vector<settled_round> seen;
  attempt out{draft{core, {}, {}, {}, {}, {}, 0_m, 0, false}, {}, {}, flux, density, {}, 0, 0, false};
  while (out.rounds < most_rounds) {
    ++out.rounds;
    const bool held = out.rounds > free_rounds;
    const turn_set n =
        held ? choose_secondaries(d, seen.back().f.n.primary, ratios) : choose_turns(d, core, flux, ratios);
    const wire_set wires =
        pick_wires(d, s, core.choice().pattern.tongue, sizing_currents(d, line, amps, stepped), density, weights);
    const auto again = std::find_if(seen.begin(), seen.end(),
                                    [&](const settled_round& o) { return o.f.n == n && same_wires(o.wires, wires); });
    if (again != seen.end()) {
      seen.erase(seen.begin(), again);  // what is left is the fixed point, or the ring
      out.stood_still = true;
      break;
    }
    draft f = lay_out(d, s, core, n, wires);
    running r = run(d, f, at, 1.0, seen.empty() ? std::vector<temperature>{} : seen.back().r.copper, !held);
    ratios = ratios_of(d, f, r);
    if (!held) {
      line = r.electric.primary_current.plain();
      weights = density_weights(f);
      amps = currents_of(d, f, r);
    }
    const double score = score_of(d, f, r);
    seen.push_back({std::move(f), std::move(r), wires, score, !held});
  }
  settled_round& kept =
      *std::min_element(seen.begin(), seen.end(), [](const auto& a, const auto& b) { return a.score < b.score; });
  if (kept.rough) kept.r = run(d, kept.f, at, 1.0, kept.r.copper);
  move_to_targets(d, s, core, at, kept);
  out.volts_score = score_of(d, kept.f, kept.r);
  out.coil = std::move(kept.f);
  out.nominal = std::move(kept.r);
  return out;
}

limit_test at_most(std::string code, std::string what, double found, double bound, kind k) {
  return {std::move(code), std::move(what), found, bound, k, found <= bound * (1 + 1e-9)};
}

void test_resistances(const demand& d, attempt& a) {
  const auto test = [&](const winding_wishes& w, const std::string& name, ohms found) {
    if (w.resistance_most) {
      a.limits.push_back(at_most("regulation", "resistance of " + name + " at 20 degC", plain(found),
                                 plain(*w.resistance_most), kind::resistance));
    }
    if (w.resistance_least) {
      a.limits.push_back({"rectifier-limits", "resistance of " + name + " at 20 degC, at least", plain(found),
                          plain(*w.resistance_least), kind::resistance, found >= *w.resistance_least});
    }
  };
  for (const coil_draft& c : a.coil.coils) {
    const winding_wishes& w = c.role.primary ? d.primary.fixed : d.secondaries[c.role.which].fixed;
    test(w, c.role.name, resistance_20(c.laid, turns{0}, total_turns(c.laid)));
  }
}

// A room for winding that the job fixes has to be inside the window.
void test_former(const demand& d, attempt& a) {
  const lamination& l = a.coil.core.choice().pattern;
  if (d.former.winding_width) {
    a.limits.push_back(at_most("window-fit", "winding width that the job fixes, in the window's length",
                               plain(*d.former.winding_width), plain(l.window_length), kind::length));
  }
  if (d.former.winding_height) {
    a.limits.push_back(at_most("window-fit", "winding height that the job fixes, in the window less the wall",
                               plain(*d.former.winding_height), std::max(0.0, plain(l.window_width - a.coil.room.wall)),
                               kind::length));
  }
}

void test_limits(const demand& d, attempt& a) {
  const draft& f = a.coil;
  const limits_wish& l = d.limits;
  limit_test fit = at_most("window-fit", "build over winding height", f.fill, 1.0, kind::ratio);
  fit.holds = fit.holds && !f.too_wide;
  a.limits.push_back(fit);
  test_former(d, a);
  a.limits.push_back(at_most("heat", "rise of the hottest winding at the highest mains", plain(hottest_winding(a.high)),
                             plain(l.temperature_rise), kind::temperature_rise));
  a.limits.push_back(at_most("flux-high", "flux density at nominal mains, no load",
                             plain(flux_at(d, f.core, f.n.primary, a.nominal.at, 1.0)), plain(a.flux.nominal),
                             kind::flux_density));
  a.limits.push_back(at_most("flux-high", "flux density at highest mains on the worst tap",
                             plain(worst_flux(d, f.core, f.n.primary)), plain(a.flux.high), kind::flux_density));
  if (l.current_density) {
    a.limits.push_back(at_most("heat", "current density", plain(worst_density(d, f, a.nominal)),
                               plain(*l.current_density), kind::current_density));
  }
  if (l.regulation_ratio) {
    a.limits.push_back(at_most("regulation", "regulation of the worst winding", worst_regulation(a.nominal),
                               *l.regulation_ratio, kind::ratio));
  }
  if (l.height)
    a.limits.push_back(at_most("height-limit", "height over the yokes", plain(f.core.choice().pattern.height),
                               plain(*l.height), kind::length));
  if (l.mass) a.limits.push_back(at_most("mass-limit", "mass", plain(total_mass(f)), plain(*l.mass), kind::mass));
  test_resistances(d, a);
}

bool holds(const attempt& a, std::string_view code) {
  return std::all_of(a.limits.begin(), a.limits.end(), [&](const limit_test& t) { return t.code != code || t.holds; });
}

flux_limits limits_of(const demand& d, const steel& grade) {
  return {d.limits.flux_density.value_or(grade.flux_nominal), d.limits.flux_density_high.value_or(grade.flux_high)};
}

std::string summary(const attempt& a) {
  return a.coil.core.choice().pattern.name + " x " + shown(a.coil.core.choice().stack) + ", " + shown(a.density) +
         ": fill " + fixed(100 * a.coil.fill, 1) + " %, rise " + fixed(plain(hottest_winding(a.high)), 1) +
         " K, volts " + fixed(100 * a.volts_score, 0) + " % of tolerance, rounds " + std::to_string(a.rounds) +
         (a.stood_still ? "" : " (no fixed point)") + ", heat steps " + std::to_string(a.nominal.steps) +
         ", residual " + shortest(rounded_to(a.nominal.residual_K, 2)) + " K";
}

}  // namespace

double limit_test::excess() const {
  if (holds) return 0;
  return found > bound ? found / bound - 1 : bound / found - 1;
}

bool attempt::comfortable() const { return windable() && coil.fill <= comfortable_fill; }

bool attempt::windable() const {
  return volts_score <= 1 + 1e-9 &&
         std::all_of(limits.begin(), limits.end(), [](const limit_test& t) { return t.holds; });
}

double attempt::excess() const {
  double sum = std::max(0.0, volts_score - 1) * 0.1;
  for (const limit_test& t : limits) sum += t.excess();
  return sum;
}

amperes_per_square_metre worst_density(const demand& d, const draft& f, const running& nominal) {
  amperes_per_square_metre worst = as<amperes_per_square_metre>(0);
  for (const selector_position& p : selector_positions(d.primary)) {
    const primary_resistances r = primary_ohms_20(f, p);
    const primary_share share = share_of(p, r.a, r.b);
    const amperes line = nominal.electric.primary_current.plain() * (plain(d.primary.on) / plain(p.at));
    for (const coil_draft& c : f.coils) {
      if (!c.role.primary) continue;
      const bool second = c.role.which == 1;
      worst =
          std::max(worst, density_in(c, line * (second ? share.b : share.a), f.n.primary[second ? *p.tap_b : p.tap_a]));
    }
  }
  const auto ports = ports_of(d, f);
  for (std::size_t k = 0; k < ports.size(); ++k) {
    const coil_draft& c = f.coils[ports[k].coil];
    worst = std::max(worst, density_in(c, nominal.electric.shared_current[k].plain(), total_turns(c.laid)));
  }
  return worst;
}

kelvins hottest_winding(const running& r) {
  kelvins hottest = 0_K;
  for (const kelvins& k : r.heat.windings) hottest = std::max(hottest, k);
  return hottest;
}

double worst_regulation(const running& r) {
  double worst = 0;
  for (const supply::port_state& p : r.electric.ports) {
    worst = std::max(worst, plain(p.no_load.plain()) / plain(p.on_load.plain()) - 1);
  }
  return worst;
}

kilograms total_mass(const draft& f) {
  kilograms m = f.core.mass();
  for (const coil_draft& c : f.coils) m += copper_mass(c.laid);
  return m * 1.05;  // former, paper, varnish and leads: a twentieth (judgement)
}

attempt wind(const demand& d, const shop& s, const core_body& core, bool stepped, std::vector<working>& workings) {
  const flux_limits flux = limits_of(d, core.choice().grade);
  const selector_position at = nominal_position(d.primary);
  const double start = d.limits.current_density
                           ? std::min(plain(usual_density(rating_of(d))), plain(*d.limits.current_density))
                           : plain(usual_density(rating_of(d)));
  const auto try_density = [&](double si) {
    attempt a = settle(d, s, core, flux, as<amperes_per_square_metre>(si), stepped);
    a.high = run(d, a.coil, at, 1 + d.mains.over_ratio, a.nominal.copper);
    for (const selector_position& p : selector_positions(d.primary)) {
      if (p.at == at.at) continue;
      running r = run(d, a.coil, p, 1 + d.mains.over_ratio, a.high.copper);
      if (hottest_winding(r) > hottest_winding(a.high)) a.high = std::move(r);
    }
    test_limits(d, a);
    workings.push_back({summary(a)});
    return a;
  };
  const auto better = [](const attempt& a, const attempt& b) {
    if (a.windable() != b.windable()) return a.windable();
    if (!a.windable()) return a.excess() < b.excess();
    return a.coil.fill < b.coil.fill;  // both can be wound: the one with more room, since only tight ones are retried
  };
  attempt best = try_density(start);
  const bool tight = !holds(best, "window-fit") || best.coil.fill > comfortable_fill;
  const bool thinner = tight || !holds(best, "rectifier-limits");
  const bool thicker =
      !holds(best, "heat") || !holds(best, "regulation") || (best.volts_score > 1 && best.volts_score < 4);
  if (!thinner && !thicker) return best;
  const double step = thinner ? 1.06 : 1 / 1.06,
               end = thinner ? plain(d.limits.current_density.value_or(usual_highest_density)) : 1.0e6;
  // Copper shrinks no faster than the density grows, and insulation not at all.
  if (tight && best.coil.fill * start / end > 1.0) return best;
  for (double si = start * step; thinner ? si <= end : si >= end; si *= step) {
    attempt next = try_density(si);
    const bool done = next.comfortable();
    const bool hopeless = thinner ? !holds(next, "heat") && next.coil.fill <= 1.0 : next.coil.fill > 1.0;
    if (better(next, best)) best = std::move(next);
    if (done || hopeless) break;
  }
  return best;
}

}  // namespace turnwright
