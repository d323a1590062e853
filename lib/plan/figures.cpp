#include <algorithm>
#include <cmath>

#include <turnwright/measure/literals.hpp>
#include <turnwright/measure/written.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/wire/copper.hpp>

namespace turnwright {

using namespace literals;

namespace {

// Hot spot over average of a winding, as rises: 1.10 (estimate; field solutions of such coils gave 1.06 to 1.14).
constexpr double hot_spot_over_average = 1.10;

std::string side_word(bool start) { return start ? "start" : "far"; }

double quotient(volts_rms a, volts_rms b) { return plain(a.plain()) / plain(b.plain()); }

// Volts of every port with its rail replaced by the resistor that draws the same r.m.s. current: a few rounds of the
// phasor network, since the volts set the resistor.
std::vector<volts_rms> resistive_volts(supply::network net, const supply::state& full) {
  std::vector<volts_rms> volts_of_ports;
  for (const supply::port_state& p : full.ports) volts_of_ports.push_back(p.on_load);
  const bool rectified = !net.rails.empty();
  net.rails.clear();
  for (int round = 0; rectified && round < 6; ++round) {
    for (std::size_t k = 0; k < net.ports.size(); ++k)
      net.ports[k].load = volts_of_ports[k].plain() / std::max(full.ports[k].current.plain(), as<amperes>(1e-9));
    const supply::state s = supply::solve_sine(net);
    for (std::size_t k = 0; k < net.ports.size(); ++k) volts_of_ports[k] = s.ports[k].on_load;
  }
  return volts_of_ports;
}

class assembly {
 public:
  assembly(const demand& d, const shop& s, attempt a)
      : d_(d), s_(s), out_(d, std::move(a)), ports_(ports_of(d, out_.made.coil)) {}

  design finish() {
    out_.supply = study(supply_of(d_, coil(), nominal()),
                        [&](std::size_t i) { return 1.0 / coil().n.secondaries[i].first.count(); });
    resistive_ = resistive_volts(network_at(out_.supply.of, load_state::full, 1.0), nominal().electric);
    out_.turns_per_volt = turns_in_use(at(), coil().n.primary).count() / plain(d_.primary.on);
    for (std::size_t i = 0; i < coil().coils.size(); ++i) {
      if (coil().coils[i].screen_under)
        out_.windings.push_back(screen(*coil().coils[i].screen_under, coil().coils[i].wrap_under_screen));
      out_.windings.push_back(winding(i));
      add_taps_of(i);
    }
    if (coil().screen_outside) out_.windings.push_back(screen(*coil().screen_outside, wraps::beside_screen));
    add_core();
    add_heat();
    add_settings();
    out_.pairs = pairs_of(coil(), s_.insulation);
    out_.leakage = leakages_of(coil());
    out_.materials = materials_of(out_);
    out_.tests = tests_of(out_);
    return std::move(out_);
  }

 private:
  const draft& coil() const { return out_.made.coil; }
  const running& nominal() const { return out_.made.nominal; }
  const selector_position& at() const { return out_.made.nominal.at; }

  planned_winding screen(screen_kind k, metres lies_on) const {
    planned_winding w;
    w.name = "screen";
    w.screen = k;
    w.build = foil_of(k);
    w.wrap_under = lies_on;
    return w;
  }

  planned_winding winding(std::size_t i) const {
    const coil_draft& c = coil().coils[i];
    planned_winding w;
    w.name = c.role.name;
    w.primary = c.role.primary;
    w.n = total_turns(c.laid);
    w.layers = layer_count(c.laid);
    w.per_layer = c.laid.blocks.front().per_layer;
    for (const laid_block& b : c.laid.blocks) w.per_layer = std::max(w.per_layer, b.per_layer);
    w.last_layer = c.laid.blocks.back().layers.back().n;
    w.finish_side = side_word(place_of(c.laid, w.n).at_start_side);
    w.margin = c.margin;
    w.margin_why = c.margin_why;
    w.interlayer = c.interlayer;
    w.interlayer_why = c.interlayer_why;
    w.build = c.laid.build;
    w.wrap_under = c.wrap_under;
    w.wrap_why = c.wrap_why;
    w.mean_turn = mean_turn(c.laid);
    w.length = wire_length(c.laid, turns{0}, w.n);
    w.mass = copper_mass(c.laid);
    turns done{0};
    for (const laid_block& b : c.laid.blocks) {
      const wire_pick& wire = c.wires[w.sections.size()];
      const metres length = wire_length(c.laid, done, done + b.of.n);
      w.sections.push_back(
          {done, done + b.of.n, wire, length, length * mass_per_metre(wire.wire) * static_cast<double>(wire.strands)});
      done = done + b.of.n;
    }
    w.resistance_20 = resistance_20(c.laid, turns{0}, w.n);
    w.resistance_hot = w.resistance_20 * copper::over_20(nominal().copper[i]);
    w.loss = nominal().coil_loss[i];
    w.rise = out_.made.high.heat.windings[i];
    w.hot_spot = d_.limits.ambient + w.rise * hot_spot_over_average;
    if (c.role.primary) {
      primary_figures(w, c);
    } else {
      secondary_figures(w, i);
    }
    return w;
  }

  void primary_figures(planned_winding& w, const coil_draft& c) const {
    const bool second = c.role.which == 1;
    for (std::size_t k = 0; k < d_.primary.taps.size(); ++k) {
      const turn_place p = place_of(c.laid, coil().n.primary[k]);
      w.taps.push_back(
          {written(d_.primary.taps[k]), coil().n.primary[k], p.layer, side_word(p.at_start_side), !p.layer_end});
    }
    const double in_use = turns_in_use(at(), coil().n.primary).count();
    const turns own = coil().n.primary[second ? *at().tap_b : at().tap_a];
    const volts terminal = nominal().electric.terminal.plain() * (own.count() / in_use);
    w.one_turn = nominal().electric.emf.plain() / in_use;
    w.no_load = volts_rms{at().at * (w.n.count() / in_use)};
    w.on_load = volts_rms{terminal + static_cast<double>((w.n - own).count()) *
                                         w.one_turn};  // beyond the tap in use no current flows
    w.current =
        amperes_rms{nominal().electric.primary_current.plain() * (second ? nominal().share.b : nominal().share.a)};
    w.density = density_in(c, w.current.plain(), own);
    w.apparent = apparent_power(volts_rms{terminal}, w.current);
  }

  void secondary_figures(planned_winding& w, std::size_t coil_number) const {
    const secondary_wish& wish = d_.secondaries[coil().coils[coil_number].role.which];
    volts no_load = 0_V, on_load = 0_V, resistive = 0_V;
    amperes through = 0_A;
    double error = 0;
    w.apparent = 0_VA;
    for (std::size_t k = 0; k < ports_.size(); ++k) {
      const port_place& p = ports_[k];
      if (p.coil != coil_number || p.inside) continue;
      const supply::port_state& s = nominal().electric.ports[k];
      no_load += s.no_load.plain();
      on_load += s.on_load.plain();
      resistive += resistive_[k].plain();
      through = std::max(through, current_through(k));
      if (std::abs(plain(s.current_dc.plain())) > std::abs(plain(w.current_dc.plain()))) w.current_dc = s.current_dc;
      w.apparent += apparent_power(s.on_load, s.current);
      const volts wanted = p.half == 1 ? *wish.second_half : wish.voltage;
      const double off = off_wanted(wish, s, wanted);
      if (std::abs(off) > std::abs(error)) error = off;
    }
    add_halves(w, wish, coil_number);
    if (w.halves.size() == 2) {
      const laid_winding& laid = coil().coils[coil_number].laid;
      const turn_place place = place_of(laid, w.halves[0].n);
      w.taps.push_back({"centre tap", w.halves[0].n, place.layer, side_word(place.at_start_side), !place.layer_end});
    }
    w.no_load = volts_rms{no_load};
    w.on_load = volts_rms{on_load};
    w.on_load_resistive = volts_rms{resistive};
    w.current = amperes_rms{through};
    w.density = density_in(coil().coils[coil_number], through, w.n);
    w.regulation_ratio = quotient(w.no_load, w.on_load) - 1;
    w.error_ratio = error;
    w.tolerance = tolerance_of(wish);
    w.one_turn = on_load / static_cast<double>(w.n.count());
  }

  // How far a port's volts lie from what the job says; with a target how far the rail does.
  double off_wanted(const secondary_wish& wish, const supply::port_state& s, volts wanted) const {
    if (wish.rail && wish.rail->target) {
      for (const planned_rail& r : out_.supply.rails) {
        if (r.winding == wish.name) return plain(*r.off_target) / plain(wish.rail->target->at.plain());
      }
    }
    return plain((wish.no_load ? s.no_load : s.on_load).plain()) / plain(wanted) - 1;
  }

  // Largest current in any part of a port: with that of the taps inside it.
  amperes current_through(std::size_t port) const {
    amperes most = nominal().electric.ports[port].current.plain();
    for (std::size_t m = 0; m < ports_.size(); ++m) {
      if (ports_[m].inside == port) most = std::max(most, nominal().electric.shared_current[m].plain());
    }
    return most;
  }

  void add_halves(planned_winding& w, const secondary_wish& wish, std::size_t i) const {
    const laid_winding& laid = coil().coils[i].laid;
    const double hot = copper::over_20(nominal().copper[i]);
    const auto half = [&](turns from, turns to, const supply::port_state& s, double share) {
      const ohms r = resistance_20(laid, from, to);
      w.halves.push_back({to - from, volts_rms{s.no_load.plain() * share}, volts_rms{s.on_load.plain() * share},
                          s.current, r, r * hot});
    };
    for (std::size_t k = 0; k < ports_.size(); ++k) {
      if (ports_[k].coil != i || ports_[k].inside) continue;
      const supply::port_state& s = nominal().electric.ports[k];
      if (wish.second_half) {
        half(ports_[k].from, ports_[k].to, s, 1.0);
      } else if (wish.centre_tap) {
        const turns middle{w.n.count() / 2};
        half(turns{0}, middle, s, 0.5);
        half(middle, w.n, s, 0.5);
      }
    }
  }

  // A tap with a load of its own is an element of its own, beside its host.
  void add_taps_of(std::size_t coil_number) {
    const planned_winding host = out_.windings.back();
    for (std::size_t k = 0; k < ports_.size(); ++k) {
      const port_place& p = ports_[k];
      if (p.coil != coil_number || !p.inside) continue;
      const secondary_wish& wish = d_.secondaries[p.secondary];
      const laid_winding& laid = coil().coils[coil_number].laid;
      const supply::port_state& s = nominal().electric.ports[k];
      planned_winding w;
      w.name = wish.name;
      w.tap_of = host.name;
      w.n = p.to - p.from;
      const turns out = p.from.count() > 0 ? p.from : p.to;
      const turn_place place = place_of(laid, out);
      w.taps.push_back({written(wish.voltage), out, place.layer, side_word(place.at_start_side), !place.layer_end});
      w.sections = host.sections;
      w.layers = place_of(laid, p.to).layer - place_of(laid, turns{p.from.count() + 1}).layer + 1;
      w.per_layer = host.per_layer;
      w.last_layer = w.n;
      w.length = wire_length(laid, p.from, p.to);
      w.mean_turn = w.length / static_cast<double>(w.n.count());
      w.resistance_20 = resistance_20(laid, p.from, p.to);
      w.resistance_hot = w.resistance_20 * copper::over_20(nominal().copper[coil_number]);
      w.no_load = s.no_load;
      w.on_load = s.on_load;
      w.current = s.current;
      w.density = density_in(coil().coils[coil_number], w.current.plain(), p.to);
      w.loss = 0_W;
      w.apparent = apparent_power(s.on_load, s.current);
      w.regulation_ratio = quotient(s.no_load, s.on_load) - 1;
      w.error_ratio = off_wanted(wish, s, wish.voltage);
      w.on_load_resistive = resistive_[k];
      w.current_dc = s.current_dc;
      w.tolerance = tolerance_of(wish);
      w.rise = host.rise;
      w.hot_spot = host.hot_spot;
      w.one_turn = s.on_load.plain() / static_cast<double>(w.n.count());
      out_.windings.push_back(std::move(w));
    }
  }

  void add_core() {
    out_.flux_nominal = flux_at(d_, coil().core, coil().n.primary, at(), 1.0);
    out_.flux_on_load = nominal().flux_density;
    out_.flux_high = worst_flux(d_, coil().core, coil().n.primary);
    out_.idle = no_load(d_, coil(), at());
    out_.mass = total_mass(coil());
    if (d_.prices_given) out_.cost = cost_of(d_, coil());
  }

  planned_heat heat_of(const running& r) const {
    const kelvins hottest = hottest_winding(r);
    return {r.at.at, d_.limits.ambient, hottest, r.heat.core, d_.limits.ambient + hottest * hot_spot_over_average};
  }

  void add_heat() {
    out_.heat_high = heat_of(out_.made.high);
    out_.heat_nominal = heat_of(nominal());
    const coil_size size = outside_of(coil());
    const lamination& l = coil().core.choice().pattern;
    const square_metres ends = 2.0 * (size.across + 2.0 * coil().used) * l.window_length;
    out_.surface_rule = thermal::surface_rule(out_.made.high.copper_loss + out_.made.high.core_loss,
                                              coil().core.exposed_surface() + ends);
  }

  void add_settings() {
    for (const selector_position& p : selector_positions(d_.primary)) {
      const running r = run_at(d_, coil(), p, 1.0, nominal().copper);
      planned_setting s{p.at,
                        links_of(p, d_.primary),
                        turns_in_use(p, coil().n.primary),
                        r.electric.primary_current,
                        as<amperes_per_square_metre>(0),
                        flux_at(d_, coil().core, coil().n.primary, p, 1.0),
                        on_load(r)};
      for (const coil_draft& c : coil().coils) {
        if (!c.role.primary) continue;
        const bool second = c.role.which == 1;
        const amperes own = r.electric.primary_current.plain() * (second ? r.share.b : r.share.a);
        s.density = std::max(s.density, density_in(c, own, coil().n.primary[second ? *p.tap_b : p.tap_a]));
      }
      out_.settings.push_back(std::move(s));
    }
  }

  std::vector<std::pair<std::string, volts_rms>> on_load(const running& r) const {
    std::vector<std::pair<std::string, volts_rms>> all;
    for (const secondary_wish& w : d_.secondaries) {
      volts sum = 0_V;
      for (std::size_t k = 0; k < ports_.size(); ++k) {
        if (d_.secondaries[ports_[k].secondary].name == w.name) sum += r.electric.ports[k].on_load.plain();
      }
      all.emplace_back(w.name, volts_rms{sum});
    }
    return all;
  }

  const demand& d_;
  const shop& s_;
  design out_;
  std::vector<port_place> ports_;
  std::vector<volts_rms> resistive_;  ///< of each port
};

}  // namespace

design figures_of(const demand& d, const shop& s, attempt a) { return assembly(d, s, std::move(a)).finish(); }

}  // namespace turnwright
