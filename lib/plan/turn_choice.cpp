#include <turnwright/plan/turn_choice.hpp>

#include <algorithm>
#include <cmath>
#include <limits>

#include <turnwright/measure/electrics.hpp>
#include <turnwright/measure/written.hpp>

namespace turnwright {
namespace {

struct scored {
  turn_set n;
  double score = std::numeric_limits<double>::infinity();
};

// Taps of a primary whose highest tap has n turns, which are no fewer than the taps: no two on one turn.
tap_turns taps_for(const demand& d, turns n) {
  const double per_volt = n.count() / plain(d.primary.taps.back());
  tap_turns taps(d.primary.taps.size(), n);
  for (std::size_t i = taps.size() - 1; i > 0; --i) {
    taps[i - 1] = std::min(nearest(per_volt * plain(d.primary.taps[i - 1])), taps[i] - turns{1});
  }
  for (std::size_t i = 0; i < taps.size(); ++i) taps[i] = std::max(taps[i], turns{static_cast<int>(i) + 1});
  return taps;
}

bool keeps_flux(const demand& d, const core_body& core, const flux_limits& limits, const tap_turns& taps) {
  const double hair = 1 + 1e-9;
  return flux_at(d, core, taps, nominal_position(d.primary), 1.0) <= limits.nominal * hair &&
         worst_flux(d, core, taps) <= limits.high * hair;
}

// The whole number nearest to `wanted`, or a neighbour whose volts suit the winding's tolerance better.
turns best_near(const secondary_wish& w, double wanted, double& error) {
  const int step = w.centre_tap ? 2 : 1, least = step;
  const int middle = step == 2 ? nearest_even(wanted).count() : nearest(wanted).count();
  turns best{std::max(least, middle)};
  error = volts_error(w, best.count() / wanted);
  for (const int n : {middle - step, middle + step}) {
    if (n >= least && volts_error(w, n / wanted) < error - 1e-12) {
      best = turns{n};
      error = volts_error(w, n / wanted);
    }
  }
  return best;
}

secondary_turns halves_near(const secondary_wish& w, double first, double second, double& error) {
  double error_first = 0, error_second = 0;
  secondary_turns n;
  if (plain(*w.second_half) == plain(w.voltage)) {  // equal halves get equal turns
    n.first = n.second = best_near(w, (first + second) / 2, error_first);
    error = std::max(volts_error(w, n.first.count() / first), volts_error(w, n.second.count() / second));
    return n;
  }
  n.first = best_near(w, first, error_first);
  n.second = best_near(w, second, error_second);
  error = std::max(error_first, error_second);
  return n;
}

scored secondaries_for(const demand& d, const tap_turns& taps, const std::vector<load_ratio>& ratios) {
  scored out{{taps, {}}, 0};
  const double in_use = turns_in_use(nominal_position(d.primary), taps).count(), mains = plain(d.primary.on);
  for (std::size_t i = 0; i < d.secondaries.size(); ++i) {
    const secondary_wish& w = d.secondaries[i];
    const double first = plain(w.voltage) / (mains * ratios[i].first) * in_use;
    double error = 0;
    secondary_turns n;
    if (w.fixed.n) {  // kept as the winder says; its volts are checked, not chosen
      n.first = w.second_half ? turns{w.fixed.n->count() / 2} : *w.fixed.n;
      if (w.second_half) n.second = *w.fixed.n - n.first;
    } else if (w.second_half) {
      n = halves_near(w, first, plain(*w.second_half) / (mains * ratios[i].second) * in_use, error);
    } else {
      n.first = best_near(w, first, error);
    }
    out.n.secondaries.push_back(n);
    out.score = std::max(out.score, error);
  }
  return out;
}

}  // namespace

bool is_heater(const secondary_wish& w) {
  const volts whole = w.second_half ? w.voltage + *w.second_half : w.voltage;
  return plain(whole) <= 13 && !w.no_load && !w.tap_of && !w.rail;
}

volts_tolerance tolerance_of(const secondary_wish& w) {
  if (w.fixed.tolerance_ratio) return {*w.fixed.tolerance_ratio, *w.fixed.tolerance_ratio};
  if (w.tap_of) return {0.05, 0.005};
  return is_heater(w) ? volts_tolerance{0.03, 0.03} : volts_tolerance{0.02, 0.02};
}

std::string written(const volts_tolerance& t) {
  if (t.over == t.under) return written(ratio{t.over});
  return "+" + written(ratio{t.over}) + " -" + written(ratio{t.under});
}

double volts_off(const secondary_wish& w, double found_over_wanted) {
  const double off = found_over_wanted - 1;
  return off > 0 ? off / tolerance_of(w).over : -off / tolerance_of(w).under;
}

double volts_error(const secondary_wish& w, double found_over_wanted) {
  const bool hot_heater = is_heater(w) && found_over_wanted > 1;
  return volts_off(w, found_over_wanted) * (hot_heater ? 2 : 1);
}

teslas flux_at(const demand& d, const core_body& core, const tap_turns& taps, const selector_position& at,
               double mains_ratio) {
  return peak_flux_density(volts_rms{at.at * mains_ratio}, d.mains.frequency, turns_in_use(at, taps), core.net_area());
}

teslas worst_flux(const demand& d, const core_body& core, const tap_turns& taps) {
  teslas worst = as<teslas>(0);
  for (const selector_position& s : selector_positions(d.primary)) {
    worst = std::max(worst, flux_at(d, core, taps, s, 1 + d.mains.over_ratio));
  }
  return worst;
}

turn_set choose_turns(const demand& d, const core_body& core, const flux_limits& limits,
                      const std::vector<load_ratio>& ratios) {
  if (d.primary.fixed.n) return secondaries_for(d, taps_for(d, *d.primary.fixed.n), ratios).n;
  const volts top = d.primary.taps.back();
  const double by_nominal = turns_for(volts_rms{top}, d.mains.frequency, limits.nominal, core.net_area());
  const double by_high =
      turns_for(volts_rms{top * (1 + d.mains.over_ratio)}, d.mains.frequency, limits.high, core.net_area());
  const int fewest =
      std::max(static_cast<int>(d.primary.taps.size()), rounded_up(std::max(by_nominal, by_high)).count());
  scored best;
  for (const double stretch : {1.06, 1.25}) {
    for (int n = fewest; n <= std::max(fewest + 3, static_cast<int>(fewest * stretch)); ++n) {
      const tap_turns taps = taps_for(d, turns{n});
      if (!keeps_flux(d, core, limits, taps)) continue;
      scored here = secondaries_for(d, taps, ratios);
      here.score += static_cast<double>(n) / fewest - 1;  // a turn more has to earn its copper
      if (here.score < best.score) best = std::move(here);
    }
    if (best.score <= 1) break;
  }
  return best.n;
}

turn_set choose_secondaries(const demand& d, const tap_turns& primary, const std::vector<load_ratio>& ratios) {
  return secondaries_for(d, primary, ratios).n;
}

}  // namespace turnwright
