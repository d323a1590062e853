#include <turnwright/plan/wire_choice.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include <turnwright/measure/literals.hpp>
#include <turnwright/remark/wording.hpp>

namespace turnwright {

using namespace literals;

namespace {

const winding_wishes& wishes_of(const demand& d, const coil_role& r) {
  return r.primary ? d.primary.fixed : d.secondaries[r.which].fixed;
}

wire_pick pick_of(const demand& d, const gauge& g, int strands) {
  const film* f = film_of(g, d.wire.grade);
  return {g, f->overall, strands, f->grade};
}

wire_pick fixed_wire(const demand& d, const shop& s, const coil_role& r, const std::string& size) {
  const std::string where = r.primary ? "/primary/wire" : "/secondaries/" + std::to_string(r.which) + "/wire";
  const looked_up_gauge found = s.wire.look_up(size, where);
  if (!found.exact || found.wire.films.empty()) {
    throw refused(wording::other("unknown-name", where, wording::quoted(size),
                                 "a size of the wire table whose enamel is known",
                                 "the nearest is " + wording::quoted(found.wire.size)));
  }
  return pick_of(d, found.wire, wishes_of(d, r).strands.value_or(1));
}

wire_pick chosen_wire(const demand& d, const shop& s, const coil_role& r, metres tongue, square_metres area) {
  constexpr int most_strands = 12;  // more in hand than anyone can lay (judgement)
  const metres stiffest = std::min(1.25_mm, tongue / 20.0);
  const square_metres frailest =
      std::numbers::pi / 4 * (0.1_mm * 0.1_mm);  // finer wire breaks in a hand winder's fingers (practice)
  const auto wished = wishes_of(d, r).strands;
  const gauge* best = nullptr;
  int best_strands = wished.value_or(most_strands);
  for (int strands = wished.value_or(1); strands <= wished.value_or(most_strands); ++strands) {
    const gauge* g =
        s.wire.at_least(d.wire.system, std::max(square_metres(area / static_cast<double>(strands)), frailest));
    if (!g) continue;
    best = g;
    best_strands = strands;
    if (g->bare <= stiffest) break;
  }
  // Beyond every wire of the table the thickest is taken; the heat then says what is wrong.
  return pick_of(d, best ? *best : s.wire.thickest(d.wire.system), best_strands);
}

}  // namespace

std::vector<amperes> currents_of_job(const demand& d) {
  std::vector<amperes> all;
  for (const secondary_wish& w : d.secondaries) {
    amperes sum = w.current.plain();
    for (const secondary_wish& t : d.secondaries) {
      if (t.tap_of == w.name) sum += t.current.plain();
    }
    all.push_back(sum);
  }
  return all;
}

std::vector<coil_amperes> sizing_currents(const demand& d, amperes line_at_nominal,
                                          const std::vector<amperes>& secondaries, bool stepped) {
  const auto positions = selector_positions(d.primary);
  std::vector<coil_amperes> all;
  for (const coil_role& r : coils_of(d)) {
    if (!r.primary) {
      all.push_back({secondaries[r.which]});
      continue;
    }
    coil_amperes sections(d.primary.taps.size(), 0_A);
    for (const selector_position& p : positions) {
      const amperes line = line_at_nominal * (plain(d.primary.on) / plain(p.at));
      const primary_share share = share_of(p, 1_ohm, 1_ohm);
      const std::size_t tap = r.which == 0 ? p.tap_a : p.tap_b.value_or(0);
      const amperes here = line * (r.which == 0 ? share.a : share.b);
      for (std::size_t k = 0; k <= tap; ++k) sections[k] = std::max(sections[k], here);
    }
    all.push_back(stepped ? sections : coil_amperes{sections.front()});
  }
  return all;
}

volt_amperes rating_of(const demand& d) {
  volt_amperes sum = 0_VA;
  for (const secondary_wish& w : d.secondaries) {
    const volts both = w.second_half ? w.voltage + *w.second_half : w.voltage;
    sum += apparent_power(volts_rms{both}, w.current);
  }
  return sum;
}

amperes_per_square_metre usual_density(volt_amperes rating) {
  return as<amperes_per_square_metre>(std::clamp(5.2 * std::pow(std::max(1.0, plain(rating)), -1.0 / 7), 1.8, 4.5) *
                                      1e6);
}

std::vector<double> density_weights(const draft& f) {
  std::vector<double> weights;
  for (const coil_draft& c : f.coils) {
    double copper_m2 = 0;
    for (const laid_block& b : c.laid.blocks) {
      copper_m2 += b.of.n.count() * b.of.strands * plain(bare_area(b.of.wire));
    }
    const double room_m2 = plain(c.laid.build) * plain(f.shape.width);
    weights.push_back(1 / std::sqrt(plain(mean_turn(c.laid)) * copper_m2 / room_m2));
  }
  double mean = 0;
  for (const double w : weights) mean += w / static_cast<double>(weights.size());
  for (double& w : weights) w = std::clamp(w / mean, 0.85, 1.18);
  // Two equal primaries are wound of one wire.
  double primaries = 0;
  int count = 0;
  for (std::size_t i = 0; i < f.coils.size(); ++i) {
    if (f.coils[i].role.primary) primaries += weights[i], ++count;
  }
  for (std::size_t i = 0; i < f.coils.size(); ++i) {
    if (f.coils[i].role.primary) weights[i] = primaries / count;
  }
  return weights;
}

wire_set pick_wires(const demand& d, const shop& s, metres tongue, const std::vector<coil_amperes>& currents,
                    amperes_per_square_metre density, const std::vector<double>& weights) {
  wire_set all;
  const auto roles = coils_of(d);
  for (std::size_t i = 0; i < roles.size(); ++i) {
    const winding_wishes& wishes = wishes_of(d, roles[i]);
    std::vector<wire_pick> picks;
    for (const amperes& a : currents[i]) {
      picks.push_back(wishes.wire ? fixed_wire(d, s, roles[i], *wishes.wire)
                                  : chosen_wire(d, s, roles[i], tongue, a / (density * weights[i])));
    }
    const bool all_same = std::all_of(picks.begin(), picks.end(), [&](const wire_pick& p) {
      return p.wire.size == picks.front().wire.size && p.strands == picks.front().strands;
    });
    if (all_same) picks.resize(1);
    all.push_back(std::move(picks));
  }
  return all;
}

}  // namespace turnwright
