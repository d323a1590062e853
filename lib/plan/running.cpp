#include <turnwright/plan/running.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/literals.hpp>
#include <turnwright/plan/turn_choice.hpp>
#include <turnwright/wire/copper.hpp>

namespace turnwright {

using namespace literals;

namespace {

std::size_t coil_index(const draft& f, bool primary, std::size_t which) {
  for (std::size_t i = 0; i < f.coils.size(); ++i) {
    if (f.coils[i].role.primary == primary && f.coils[i].role.which == which) return i;
  }
  throw std::logic_error("no such coil");
}

ohms load_of(const secondary_wish& w, int half) {
  const volts v = half == 1 ? *w.second_half : w.voltage;
  return v / w.current.plain();
}

// Never nothing, so that a coil whose margins leave no room still has finite figures beside its stop.
metres height_of(const draft& f, const coil_draft& c) { return std::max(f.shape.width - 2.0 * c.margin, 1_mm); }

stray_coil primary_coil(const draft& f, const selector_position& at) {
  const coil_draft& a = f.coils[coil_index(f, true, 0)];
  stray_piece piece_a = span_of(f, a, turns{0}, f.n.primary[at.tap_a]);
  if (!at.tap_b) return {{piece_a}, height_of(f, a)};
  const coil_draft& b = f.coils[coil_index(f, true, 1)];
  stray_piece piece_b = span_of(f, b, turns{0}, f.n.primary[*at.tap_b]);
  const primary_resistances r = primary_ohms_20(f, at);
  const primary_share share = share_of(at, r.a, r.b);
  const double n_a = share.a * f.n.primary[at.tap_a].count(), n_b = share.b * f.n.primary[*at.tap_b].count();
  piece_a.share = n_a / (n_a + n_b);
  piece_b.share = n_b / (n_a + n_b);
  return {{piece_a, piece_b}, (height_of(f, a) + height_of(f, b)) / 2.0};
}

// What does not change while the temperatures settle.
struct fixed_parts {
  std::vector<port_place> ports;
  std::vector<ohms> port_20;
  amplifier_supply supply;
  primary_resistances primary_20;
  turns primary_turns;
};

std::vector<supplied_winding> windings_of(const demand& d, const std::vector<port_place>& ports) {
  std::vector<supplied_winding> all;
  for (std::size_t i = 0; i < d.secondaries.size(); ++i) {
    const secondary_wish& wish = d.secondaries[i];
    supplied_winding w{wish.name, 0, std::nullopt, wish.tap_of, wish.rail, is_heater(wish), wish.rated};
    for (std::size_t k = 0; k < ports.size(); ++k) {
      if (ports[k].secondary != i) continue;
      if (ports[k].half == 0) w.first = k;
      if (ports[k].half == 1) w.second = k;
    }
    all.push_back(std::move(w));
  }
  return all;
}

fixed_parts prepare(const demand& d, const draft& f, const selector_position& at) {
  fixed_parts p;
  p.ports = ports_of(d, f);
  p.primary_20 = primary_ohms_20(f, at);
  p.primary_turns = turns_in_use(at, f.n.primary);
  p.supply = {d.title, {}, windings_of(d, p.ports), d.mains.over_ratio, d.mains.under_ratio};
  supply::network& net = p.supply.base;
  net.mains = volts_rms{at.at};
  net.frequency = d.mains.frequency;
  net.source_resistance = d.mains.source_resistance;
  net.leakage = leakage_matrix(f, at, p.ports);
  for (const port_place& place : p.ports) {
    p.port_20.push_back(resistance_20(f.coils[place.coil].laid, place.from, place.to));
    const secondary_wish& wish = d.secondaries[place.secondary];
    const double of_primary = static_cast<double>((place.to - place.from).count()) / p.primary_turns.count();
    net.ports.push_back({of_primary, p.port_20.back(),
                         wish.rail ? std::nullopt : std::optional(load_of(wish, place.half)), place.inside});
  }
  return p;
}

// A drafted transformer on its way to the fixed point: resistances follow the temperatures, the shunt follows the EMF.
class settling {
 public:
  settling(const demand& d, const draft& f, running& r)
      : d_(d),
        f_(f),
        r_(r),
        parts_(prepare(d, f, r.at)),
        solver_(network_at(parts_.supply, load_state::full, r.mains_ratio)),
        emf_(r.at.at * r.mains_ratio) {
    a_ = coil_index(f, true, 0);
    if (r.at.tap_b) b_ = coil_index(f, true, 1);
  }

  bool exact() const { return solver_.exact(); }

  // One step of the electrical side at the copper temperatures of the running; returns the EMF's relative change.
  double step() { return step(rough_steps); }

  // Figures on the full grid at the temperatures that were found.
  void finish(bool rough) {
    if (!exact() && !rough) step(supply::grid{}.steps);
    r_.electric = solver_.all();
    r_.loss_beyond_curve = f_.core.loss_beyond_curve(r_.flux_density, d_.mains.frequency);
  }

  // The supply at the figures of the last step.
  amplifier_supply supplied() {
    supply::network& net = parts_.supply.base;
    net.primary_resistance = r_.share.resistance;
    net.core_loss_resistance = r_.core_loss_resistance;
    net.magnetising_inductance = r_.magnetising_inductance;
    for (std::size_t k = 0; k < port_hot_.size(); ++k) net.ports[k].resistance = port_hot_[k];
    return parts_.supply;
  }

  // Resistances of a running that has settled already.
  void take_over() {
    const auto hot = [&](std::size_t coil, ohms at_20) { return at_20 * copper::over_20(r_.copper[coil]); };
    for (std::size_t k = 0; k < parts_.ports.size(); ++k)
      port_hot_.push_back(hot(parts_.ports[k].coil, parts_.port_20[k]));
  }

 private:
  // While temperatures settle a rough grid does: its currents are within some 0.3 %.
  static constexpr int rough_steps = 64;

  double step(int steps) {
    const auto hot = [&](std::size_t coil, ohms at_20) { return at_20 * copper::over_20(r_.copper[coil]); };
    hot_a_ = hot(a_, parts_.primary_20.a);
    hot_b_ = b_ ? hot(*b_, parts_.primary_20.b) : 0_ohm;
    r_.share = share_of(r_.at, hot_a_, hot_b_);
    port_hot_.clear();
    for (std::size_t k = 0; k < parts_.ports.size(); ++k)
      port_hot_.push_back(hot(parts_.ports[k].coil, parts_.port_20[k]));
    solver_.set_resistances(r_.share.resistance, port_hot_);
    r_.flux_density = peak_flux_density(volts_rms{emf_}, d_.mains.frequency, parts_.primary_turns, f_.core.net_area());
    r_.magnetising = f_.core.magnetising_current(r_.flux_density, parts_.primary_turns);
    r_.core_loss_resistance = emf_ * emf_ / f_.core.loss(r_.flux_density, d_.mains.frequency);
    r_.magnetising_inductance = inductance_of(emf_ / r_.magnetising.plain(), d_.mains.frequency);
    solver_.set_shunt(r_.core_loss_resistance, r_.magnetising_inductance);
    solver_.solve(steps);
    const double change = std::abs(plain(solver_.emf()) / plain(emf_) - 1);
    emf_ = solver_.emf();
    note_losses();
    return change;
  }

  void note_losses() {
    const amperes line = solver_.line();
    r_.core_loss = solver_.core();
    r_.coil_loss.assign(f_.coils.size(), 0_W);
    r_.coil_loss[a_] += line * line * r_.share.a * r_.share.a * hot_a_;
    if (b_) r_.coil_loss[*b_] += line * line * r_.share.b * r_.share.b * hot_b_;
    for (std::size_t k = 0; k < parts_.ports.size(); ++k) r_.coil_loss[parts_.ports[k].coil] += solver_.copper(k);
    r_.copper_loss = 0_W;
    for (const watts& w : r_.coil_loss) r_.copper_loss += w;
  }

  const demand& d_;
  const draft& f_;
  running& r_;
  fixed_parts parts_;
  supply::network_solver solver_;
  volts emf_;
  ohms hot_a_, hot_b_;
  std::vector<ohms> port_hot_;
  std::size_t a_ = 0;
  std::optional<std::size_t> b_;
};

// Conductivities of layer windings, unimpregnated with imperfect contact (judgement): fine wire with much paper low.
watts_per_metre_kelvin radial_conductivity(const coil_draft& c) {
  return c.wires.front().wire.bare < 0.6_mm ? 0.16_W_per_mK : 0.22_W_per_mK;
}
watts_per_metre_kelvin axial_conductivity(const coil_draft& c) {
  return c.wires.front().wire.bare < 0.6_mm ? 0.20_W_per_mK : 0.30_W_per_mK;
}

thermal::heated_coil heated(const demand& d, const draft& f) {
  const lamination& l = f.core.choice().pattern;
  thermal::heated_coil h;
  h.tongue = l.tongue;
  h.stack = f.core.choice().stack;
  h.window_width = l.window_width;
  h.window_length = l.window_length;
  h.former_air = 0.2_mm;
  h.former_wall = f.room.wall;
  h.outer_wrap = f.shape.bulge * wraps::outer;
  h.core_surface = f.core.exposed_surface();
  h.core_height = l.height;
  h.ambient = d.limits.ambient;
  for (const coil_draft& c : f.coils) {
    const stray_piece span = span_of(f, c, turns{0}, total_turns(c.laid));
    // The former sits loosely: what lies on it is that much further out than the drawing says.
    h.windings.push_back({span.inner + h.former_air, span.outer + h.former_air, height_of(f, c),
                          f.room.cheek + c.margin, radial_conductivity(c), axial_conductivity(c)});
  }
  return h;
}

}  // namespace

std::vector<port_place> ports_of(const demand& d, const draft& f) {
  std::vector<port_place> all;
  std::vector<std::size_t> first_port(d.secondaries.size());
  for (std::size_t i = 0; i < d.secondaries.size(); ++i) {
    const secondary_wish& w = d.secondaries[i];
    if (w.tap_of) continue;
    const std::size_t coil = coil_index(f, false, i);
    const secondary_turns& n = f.n.secondaries[i];
    first_port[i] = all.size();
    all.push_back({i, 0, coil, turns{0}, n.first, std::nullopt});
    if (w.second_half) all.push_back({i, 1, coil, n.first, n.first + n.second, std::nullopt});
  }
  for (std::size_t i = 0; i < d.secondaries.size(); ++i) {
    const secondary_wish& w = d.secondaries[i];
    if (!w.tap_of) continue;
    for (std::size_t host = 0; host < d.secondaries.size(); ++host) {
      if (d.secondaries[host].name != *w.tap_of) continue;
      // From the centre tap into the first half; without a centre tap from the start.
      const port_place& half = all[first_port[host]];
      const turns tap = f.n.secondaries[i].first;
      const bool centre = d.secondaries[host].second_half.has_value();
      all.push_back({i, 0, half.coil, centre ? half.to - tap : turns{0}, centre ? half.to : tap, first_port[host]});
    }
  }
  return all;
}

primary_resistances primary_ohms_20(const draft& f, const selector_position& at) {
  const laid_winding& a = f.coils[coil_index(f, true, 0)].laid;
  const ohms r_a = resistance_20(a, turns{0}, f.n.primary[at.tap_a]);
  if (!at.tap_b) return {r_a, 0_ohm};
  return {r_a, resistance_20(f.coils[coil_index(f, true, 1)].laid, turns{0}, f.n.primary[*at.tap_b])};
}

std::vector<henries> leakage_matrix(const draft& f, const selector_position& at, const std::vector<port_place>& ports) {
  std::vector<stray_coil> coils{primary_coil(f, at)};
  for (const port_place& p : ports) {
    coils.push_back({{span_of(f, f.coils[p.coil], p.from, p.to)}, height_of(f, f.coils[p.coil])});
  }
  return leakage_against_first(coils, stray_space_of(f), turns_in_use(at, f.n.primary));
}

amplifier_supply supply_of(const demand& d, const draft& f, const running& r) {
  running copy = r;
  settling electric(d, f, copy);
  electric.take_over();
  return electric.supplied();
}

running run_at(const demand& d, const draft& f, const selector_position& at, double mains_ratio,
               const std::vector<temperature>& copper) {
  running r;
  r.at = at;
  r.mains_ratio = mains_ratio;
  r.copper = copper;
  settling electric(d, f, r);
  const double enough = electric.exact() ? 1e-12 : 1e-5;
  for (r.steps = 1; r.steps <= 60; ++r.steps) {
    if (electric.step() < enough) break;
  }
  electric.finish(false);
  return r;
}

namespace {

// Temperatures at which the coils stand while the currents stay what they are: a loss follows its own resistance.
std::vector<temperature> temperatures_at(const demand& d, const thermal::heat_balance& balance, running& r) {
  std::vector<temperature> now = r.copper;
  for (int k = 0; k < 60; ++k) {
    std::vector<watts> loss = r.coil_loss;
    for (std::size_t i = 0; i < loss.size(); ++i) loss[i] *= copper::over_20(now[i]) / copper::over_20(r.copper[i]);
    r.heat = balance.solve(r.core_loss, loss);
    double change = 0;
    for (std::size_t i = 0; i < now.size(); ++i) {
      // Far beyond any winding's life the figure only has to stay finite and large.
      const temperature next = d.limits.ambient + std::min(r.heat.windings[i], 1000_K);
      change = std::max(change, std::abs(next.value() - now[i].value()));
      now[i] = next;
    }
    if (change < 1e-9) break;
  }
  return now;
}

}  // namespace

running run(const demand& d, const draft& f, const selector_position& at, double mains_ratio,
            const std::vector<temperature>& start, bool rough) {
  running r;
  r.at = at;
  r.mains_ratio = mains_ratio;
  r.copper = start;
  r.copper.resize(f.coils.size(), d.limits.ambient + 40_K);
  settling electric(d, f, r);
  const thermal::heat_balance balance(heated(d, f));
  // Behind rectifiers the solver's own tolerance and its rough grid are worth a twentieth of a kelvin.
  const double enough_K = electric.exact() ? 1e-8 : 0.05, enough_emf = electric.exact() ? 1e-11 : 2e-5;
  for (r.steps = 1; r.steps <= 80; ++r.steps) {
    const double emf_change = electric.step();
    std::vector<temperature> next = temperatures_at(d, balance, r);
    r.residual_K = 0;
    for (std::size_t i = 0; i < next.size(); ++i)
      r.residual_K = std::max(r.residual_K, std::abs(next[i].value() - r.copper[i].value()));
    if (r.residual_K < enough_K && emf_change < enough_emf) break;
    r.copper = std::move(next);
  }
  electric.finish(rough);
  return r;
}

no_load_state no_load(const demand& d, const draft& f, const selector_position& at) {
  const turns n = turns_in_use(at, f.n.primary);
  const volts mains = at.at;
  no_load_state s;
  const teslas flux = peak_flux_density(volts_rms{mains}, d.mains.frequency, n, f.core.net_area());
  s.core_loss = f.core.loss(flux, d.mains.frequency);
  const amperes magnetising = f.core.magnetising_current(flux, n).plain(), active = s.core_loss / mains;
  const primary_resistances r = primary_ohms_20(f, at);
  const amperes total = as<amperes>(std::hypot(plain(magnetising), plain(active)));
  s.current = amperes_rms{total};
  s.power = s.core_loss + total * total * share_of(at, r.a, r.b).resistance;
  return s;
}

}  // namespace turnwright
