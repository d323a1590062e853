#include "figures.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "tap.hpp"

namespace turnwright::supply::kernel {
namespace {

using Eigen::MatrixXd;
using Eigen::VectorXd;
using row_of = Eigen::RowVectorXd;

// Means over a cycle with the step's own weights, for which no capacitor has a mean current. Products are reckoned from
// the first stage's values, so that a ripple of a millionth is not lost beside its mean.
class moments {
 public:
  explicit moments(const record& r, int steps)
      : all_(r.z.data(), r.width, 2 * steps),
        origin_(all_.col(0)),
        first_(VectorXd::Zero(r.width)),
        second_(MatrixXd::Zero(r.width, r.width)) {
    const Eigen::Index n = r.width;
    VectorXd d(n);
    // The two stages of a step have one weight each, so that the sums of both sorts are taken apart and weighed once.
    for (Eigen::Index sort = 0; sort < 2; ++sort) {
      const double weight = (sort == 0 ? 1 - stage_share : stage_share) / steps;
      VectorXd sum = VectorXd::Zero(n);
      MatrixXd squares = MatrixXd::Zero(n, n);
      for (Eigen::Index k = sort; k < 2 * steps; k += 2) {
        d = all_.col(k) - origin_;
        sum += d;
        for (Eigen::Index a = 0; a < n; ++a) {
          if (d(a) != 0) squares.col(a).tail(n - a) += d(a) * d.tail(n - a);
        }
      }
      first_ += weight * sum;
      second_ += weight * squares;
    }
    second_.triangularView<Eigen::StrictlyUpper>() = second_.transpose();
  }
  double mean(const row_of& y) const { return y.dot(first_) + y.dot(origin_); }
  double cross(const row_of& a, const row_of& b) const {
    const double a0 = a.dot(origin_), b0 = b.dot(origin_);
    return a.dot(second_ * b.transpose()) + a0 * b.dot(first_) + b0 * a.dot(first_) + a0 * b0;
  }
  double rms(const row_of& y) const { return std::sqrt(std::max(0.0, cross(y, y))); }
  double ripple(const row_of& y) const {
    const double m = y.dot(first_);
    return std::sqrt(std::max(0.0, y.dot(second_ * y.transpose()) - m * m));
  }
  row_of entry(int i) const {
    row_of y = row_of::Zero(all_.rows());
    y(i) = 1;
    return y;
  }
  // Values at the ends of the steps.
  std::vector<double> at_ends(const row_of& y) const {
    using every_second = Eigen::Map<const MatrixXd, 0, Eigen::OuterStride<>>;
    const every_second ends(all_.data() + all_.rows(), all_.rows(), all_.cols() / 2,
                            Eigen::OuterStride<>(2 * all_.rows()));
    std::vector<double> out(static_cast<std::size_t>(ends.cols()));
    Eigen::Map<row_of>(out.data(), ends.cols()).noalias() = y * ends;
    return out;
  }

 private:
  Eigen::Map<const MatrixXd> all_;
  VectorXd origin_, first_;
  MatrixXd second_;
};

std::vector<double> negative(std::vector<double> y) {
  for (double& v : y) v = -v;
  return y;
}

class reader {
 public:
  reader(const elements& e, const stepper& grid, const shot& s)
      : e_(e), grid_(grid), shot_(s), mean_(s.last, grid.steps()) {}

  state finish(bool with_curves) {
    add_ports();
    add_primary();
    for (std::size_t r = 0; r < e_.rails.size(); ++r) add_rail(r);
    out_.balance_ratio = (plain(out_.wall) - spent_) / std::max(plain(out_.wall), 1e-12);
    out_.residual_ratio = shot_.residual;
    out_.settled = shot_.settled && grid_.failures() == 0;
    out_.cycles = shot_.cycles;
    if (with_curves) add_curves();
    return std::move(out_);
  }

 private:
  const stage& map() const { return grid_.map(); }
  int first_current() const { return e_.states + 2; }

  void add_ports() {
    const std::size_t all = e_.ports.size();
    std::vector<row_of> amps;
    for (std::size_t k = 0; k < all; ++k) amps.push_back(port_current_row(e_, map(), static_cast<int>(k)));
    double output = 0;
    for (std::size_t k = 0; k < all; ++k) {
      const si_port& p = e_.ports[k];
      const row_of v = port_volts_row(e_, map(), static_cast<int>(k));
      const double rms_v = mean_.rms(v);
      const double load = p.load_g > 0 ? rms_v * rms_v * p.load_g : mean_.cross(v, amps[k]);
      double copper = 0;
      row_of through = row_of::Zero(amps[k].size());
      for (std::size_t m = 0; m < all; ++m) {
        const double r = e_.r[k * all + m];
        if (r != 0) copper += r * mean_.cross(amps[k], amps[m]);
        const tap_place a{e_.r[k * all + k], p.inside}, b{e_.r[m * all + m], e_.ports[m].inside};
        if (flows_through(a, static_cast<int>(k), b, static_cast<int>(m)))
          through += (p.n < 0) == (e_.ports[m].n < 0) ? amps[m] : row_of(-amps[m]);
      }
      out_.ports.push_back({volts_rms{as<volts>(std::abs(p.n) * e_.mains_peak / std::numbers::sqrt2)},
                            volts_rms{as<volts>(rms_v)}, amperes_rms{as<amperes>(mean_.rms(amps[k]))},
                            amperes_dc{as<amperes>(mean_.mean(amps[k]) * (p.n < 0 ? -1 : 1))}, as<watts>(load)});
      out_.copper.push_back(as<watts>(copper));
      out_.shared_current.push_back(amperes_rms{as<amperes>(mean_.rms(through))});
      spent_ += copper + rms_v * rms_v * (p.load_g + leak);
      output += load;
    }
    out_.output = as<watts>(output);
  }

  void add_primary() {
    const row_of line = line_current_row(e_, map()), mains = mean_.entry(e_.states);
    const double amps = mean_.rms(line), wall = mean_.cross(mains, line);
    const double terminal = mean_.rms(mains - e_.source_r * line);
    const row_of p = node_volts_row(e_, map(), 0);
    const double core = e_.core_g > 0 ? mean_.cross(p, p) * e_.core_g : 0;
    double area = 0;
    for (const double v : mean_.at_ends(p)) area += std::abs(v);
    out_.primary_current = amperes_rms{as<amperes>(amps)};
    out_.primary_dc = amperes_dc{as<amperes>(mean_.mean(line))};
    out_.terminal = volts_rms{as<volts>(terminal)};
    // Peak flux follows the mean of |volts|; a sine of so many r.m.s. volts has the same mean.
    out_.emf = volts_rms{as<volts>(area / grid_.steps() * std::numbers::pi / (2 * std::numbers::sqrt2))};
    out_.wall = as<watts>(wall);
    out_.input = as<watts>(wall - amps * amps * e_.source_r);
    out_.apparent = as<volt_amperes>(terminal * amps);
    out_.primary_copper = as<watts>(amps * amps * (e_.r1 - e_.source_r));
    out_.core = as<watts>(core);
    spent_ += amps * amps * e_.r1 + core;
  }

  void add_rail(std::size_t number) {
    const si_rail& r = e_.rails[number];
    rail_state out;
    out.ripple_per_cycle = r.ripple_per_cycle;
    for (const si_node& n : r.nodes) out.nodes.push_back(node_of(n));
    for (const int d : r.diodes) out.diodes.push_back(diode_of(d));
    out_.rails.push_back(std::move(out));
    for (const si_capacitor& c : e_.capacitors) spend_series_capacitor(c, r);
  }

  // The series capacitor of a half-wave doubler hangs on no node of the rail.
  void spend_series_capacitor(const si_capacitor& c, const si_rail& r) {
    if (c.top != e_.ports[static_cast<std::size_t>(r.first_port)].hot) return;
    const row_of amps = capacitor_current_row(e_, map(), static_cast<int>(&c - e_.capacitors.data()));
    spent_ += c.esr * mean_.cross(amps, amps);
  }

  node_state node_of(const si_node& n) {
    const row_of v = node_volts_row(e_, map(), n.at);
    const std::vector<double> ends = mean_.at_ends(v);
    const double mean = mean_.mean(v), highest = crest(ends), lowest = -crest(negative(ends));
    const double load_w = n.sink * mean + n.load_g * mean_.cross(v, v);
    node_state out{};
    out.mean = volts_dc{as<volts>(mean)};
    out.ripple = volts_rms{as<volts>(mean_.ripple(v))};
    out.ripple_peak_to_peak = as<volts>(highest - lowest);
    out.highest = as<volts>(highest);
    out.lowest = as<volts>(lowest);
    out.load = amperes_dc{as<amperes>(n.sink + n.load_g * mean)};
    out.load_power = as<watts>(load_w);
    spent_ += load_w;
    double worst = 0, esr_w = 0;
    for (const int c : n.capacitors) {
      const row_of amps = capacitor_current_row(e_, map(), c);
      const double square = mean_.cross(amps, amps);
      worst = std::max(worst, square);
      esr_w += square * e_.capacitors[static_cast<std::size_t>(c)].esr;
    }
    out.capacitor_ripple = amperes_rms{as<amperes>(std::sqrt(std::max(0.0, worst)))};
    out.capacitor_loss = as<watts>(esr_w);
    spent_ += esr_w;
    if (n.choke >= 0)
      add_through(out, choke_current_row(e_, map(), n.choke), e_.chokes[static_cast<std::size_t>(n.choke)].r);
    if (n.link >= 0)
      add_through(out, link_current_row(e_, map(), n.link), 1 / e_.links[static_cast<std::size_t>(n.link)].g);
    return out;
  }

  void add_through(node_state& out, const row_of& amps, double ohm) {
    const double square = mean_.cross(amps, amps);
    out.through = amperes_dc{as<amperes>(mean_.mean(amps))};
    out.through_rms = amperes_rms{as<amperes>(std::sqrt(std::max(0.0, square)))};
    out.through_lowest = as<amperes>(-crest(negative(mean_.at_ends(amps))));
    out.through_loss = as<watts>(square * ohm);
    spent_ += square * ohm;
  }

  diode_state diode_of(int number) {
    const junction& j = e_.diodes[static_cast<std::size_t>(number)].j;
    const record& r = shot_.last;
    const int stages = 2 * grid_.steps(), all = static_cast<int>(e_.diodes.size());
    const double* const first_amps = r.z.data() + first_current() + number;
    const double* const first_volts = r.v.data() + number;
    const auto amps = [&](int k) { return first_amps[k * r.width]; };
    const auto volts_at = [&](int k) { return first_volts[k * all]; };
    std::vector<double> ends, inverse;
    for (int k = 1; k < stages; k += 2) {
      ends.push_back(amps(k));
      inverse.push_back(-volts_at(k));
    }
    const double peak = crest(ends), seen = 0.01 * peak;
    double average = 0, square = 0, loss = 0, drop = 0, time = 0;
    for (int k = 0; k < stages; ++k) {
      const double i = amps(k), w = (k % 2 == 0 ? 1 - stage_share : stage_share) / grid_.steps();
      const double all_v = volts_at(k) + j.series * std::max(i, 0.0);
      spent_ += w * leak * all_v * all_v;
      if (i <= 0) continue;
      const double v = volts_at(k) + j.own_r * i;
      average += w * i;
      square += w * i * i;
      loss += w * i * v;
      if (i < seen) continue;
      drop += w * v;
      time += w;
    }
    const double outside = (j.series - j.own_r) * square;
    spent_ += loss + outside;
    return {amperes_peak{as<amperes>(peak)},
            amperes_dc{as<amperes>(average)},
            amperes_rms{as<amperes>(std::sqrt(square))},
            volts_peak{as<volts>(crest(inverse) / j.halves)},
            as<volts>(time > 0 ? drop / time / j.halves : 0),
            conduction(ends, seen),
            as<watts>(loss / j.halves),
            as<watts>(outside / j.halves)};
  }

  // Part of the cycle over which samples lie above a bound, in degrees, the crossings by straight lines.
  static double conduction(const std::vector<double>& y, double bound) {
    if (bound <= 0) return 0;
    double share = 0;
    for (std::size_t n = 0; n < y.size(); ++n) {
      const double a = y[n], b = y[(n + 1) % y.size()];
      if (a > bound && b > bound) {
        share += 1;
      } else if ((a > bound) != (b > bound)) {
        share += (std::max(a, b) - bound) / std::abs(a - b);
      }
    }
    return 360 * share / static_cast<double>(y.size());
  }

  void add_curves() {
    out_.shape.mains_v = mean_.at_ends(mean_.entry(e_.states));
    out_.shape.primary_a = mean_.at_ends(line_current_row(e_, map()));
    for (const si_rail& r : e_.rails) {
      rail_curves c;
      const double sign = e_.ports[static_cast<std::size_t>(r.first_port)].n < 0 ? -1 : 1;
      c.winding_v = mean_.at_ends(sign * port_volts_row(e_, map(), r.first_port));
      c.reservoir_v = mean_.at_ends(node_volts_row(e_, map(), r.nodes.front().at));
      for (const int d : r.diodes) c.diode_a.push_back(mean_.at_ends(mean_.entry(first_current() + d)));
      out_.shape.rails.push_back(std::move(c));
    }
  }

  const elements& e_;
  const stepper& grid_;
  const shot& shot_;
  moments mean_;
  state out_;
  double spent_ = 0;  // every watt that is accounted for
};

}  // namespace

double crest(const std::vector<double>& y) {
  const auto top = std::max_element(y.begin(), y.end());
  const std::size_t n = y.size(), k = static_cast<std::size_t>(top - y.begin());
  const double before = y[(k + n - 1) % n], after = y[(k + 1) % n];
  const double bend = 2 * *top - before - after;
  if (bend <= 0) return *top;
  const double lift = (after - before) * (after - before) / (8 * bend);
  return *top + std::min(lift, bend / 8);
}

state figures_of(const elements& e, const stepper& grid, const shot& s, bool with_curves) {
  return reader(e, grid, s).finish(with_curves);
}

}  // namespace turnwright::supply::kernel
