#include "junction.hpp"

#include <algorithm>
#include <cmath>

namespace turnwright::supply::kernel {
namespace {

struct point {
  double i, g;
};

// Current and slope at so many volts.
inline point law_at(const junction& j, double v) {
  if (v <= j.threshold) return {0, 0};
  switch (j.kind) {
    case law::line:
      return {(v - j.threshold) * j.a, j.a};
    case law::three_halves: {
      const double root = j.a * std::sqrt(v);
      return {root * v, 1.5 * root};
    }
    case law::exponential: {
      const double e = j.a * std::exp(std::min(v / j.b, 200.0));
      return {e - j.off, e / j.b};
    }
  }
  return {0, 0};
}

// A bound from above for the volts of a junction alone behind a resistance r, with p volts when no current flows.
double alone(const junction& j, double p, double r) {
  switch (j.kind) {
    case law::line:
      return j.threshold + (p - j.threshold) / (1 + r * j.a);
    case law::three_halves: {
      const double share = p / (r * j.a);
      return std::min(p, std::cbrt(share * share));
    }
    case law::exponential:
      return std::min(p, j.b * std::log1p(p / (r * j.a)));
  }
  return p;
}

// Whether a step from v is so short that its linear continuation may count as exact: what is left is of second order,
// below a millivolt for a valve and a thousandth of kT/q for silicon; the straight line has no second order.
inline bool short_enough(const junction& j, double v, double dv) {
  switch (j.kind) {
    case law::line:
      return true;
    case law::three_halves:
      return dv * dv < 4e-3 * v;
    case law::exponential:
      return std::abs(dv) < 0.05 * j.b;
  }
  return false;
}

// A step of an exponential upwards is taken by the logarithm of its current.
inline double stepped(const junction& j, double v, double dv) {
  if (j.kind == law::exponential && dv > 2 * j.b && v + dv > j.threshold)
    return std::max(v, j.threshold) + j.b * std::log1p(dv / j.b);
  return v + dv;
}

constexpr int most_passes = 60;

}  // namespace

junction_solver::junction_solver(const elements& e, const stage& s) : e_(e), s_(s) {
  const auto n = static_cast<std::size_t>(s.junctions);
  for (auto* all : {&v_, &i_, &g_, &r_, &dv_, &from_}) all->assign(n, 0);
  for (std::size_t j = 0; j < n; ++j) v_[j] = e.diodes[j].j.threshold - 1;
  for (past& p : past_) p.last = p.before = v_;
  for (const si_diode& d : e.diodes) threshold_.push_back(d.j.threshold);
  on_.reserve(n);
}

// The straight continuation of the last two stages of the same sort; where nothing conducted, what each would do alone.
void junction_solver::guess(const double* p, const past& then) {
  bool conducted = false;
  for (std::size_t j = 0; j < v_.size(); ++j) conducted = conducted || then.last[j] > e_.diodes[j].j.threshold;
  for (std::size_t j = 0; j < v_.size(); ++j) {
    const junction& d = e_.diodes[j].j;
    if (!conducted) {
      v_[j] = p[j] > d.threshold ? alone(d, p[j], -f(j, j)) : p[j];
      continue;
    }
    const bool on = then.last[j] > d.threshold, was_on = then.before[j] > d.threshold;
    v_[j] = on == was_on ? 2 * then.last[j] - then.before[j] : then.last[j];
    if (on && v_[j] <= d.threshold) v_[j] = d.threshold + (then.last[j] - d.threshold) / 2;
    // Volts that swept up to the threshold do not go on beyond it; an exponential follows no straight line for long.
    if (!on && v_[j] > d.threshold)
      v_[j] = p[j] > d.threshold ? std::min(v_[j], alone(d, p[j], -f(j, j))) : d.threshold;
    if (on && d.kind == law::exponential) v_[j] = std::min(v_[j], then.last[j] + 2 * d.b);
  }
}

bool junction_solver::solve(const double* p, int sort) {
  const std::size_t n = v_.size();
  past& then = past_[sort];
  std::size_t pushed = n;
  int above = 0;
  for (std::size_t j = 0; j < n; ++j) {
    if (p[j] <= threshold_[j]) continue;
    pushed = j;
    ++above;
  }
  if (above == 0) {
    for (std::size_t j = 0; j < n; ++j) {
      then.before[j] = then.last[j];
      then.last[j] = v_[j] = p[j];
    }
    if (!on_.empty()) {
      std::fill(i_.begin(), i_.end(), 0.0);
      std::fill(g_.begin(), g_.end(), 0.0);
      on_.clear();
    }
    return false;
  }
  on_.clear();
  guess(p, then);
  if (above > 1 || !one_alone(p, pushed)) all_together(p);
  for (std::size_t j = 0; j < n; ++j) {
    then.before[j] = then.last[j];
    then.last[j] = v_[j];
  }
  return true;
}

// One junction pushed on, the others left off: a scalar Newton on a convex law. False where another turns out to
// conduct.
bool junction_solver::one_alone(const double* p, std::size_t j) {
  const junction& d = e_.diodes[j].j;
  const double own = f(j, j);
  double v = v_[j] > d.threshold ? v_[j] : alone(d, p[j], -own);
  point at{};
  for (int pass = 0;; ++pass) {
    at = law_at(d, v);
    const double dv = (p[j] + own * at.i - v) / (1 - own * at.g);
    if (v + dv > d.threshold && short_enough(d, v, dv)) {
      at.i += at.g * dv;
      v += dv;
      break;
    }
    if (pass == most_passes) return false;
    v = std::max(stepped(d, v, dv), d.threshold + 1e-9);
  }
  for (std::size_t k = 0; k < v_.size(); ++k) {
    if (k != j && p[k] + f(k, j) * at.i > e_.diodes[k].j.threshold) return false;
  }
  for (std::size_t k = 0; k < v_.size(); ++k) {
    v_[k] = p[k] + f(k, j) * at.i;
    i_[k] = g_[k] = 0;
  }
  v_[j] = v;
  i_[j] = at.i;
  g_[j] = at.g;
  on_.push_back(static_cast<int>(j));
  return true;
}

double junction_solver::miss(const double* p) {
  const std::size_t n = v_.size();
  on_.clear();
  for (std::size_t j = 0; j < n; ++j) {
    const point at = law_at(e_.diodes[j].j, v_[j]);
    i_[j] = at.i;
    g_[j] = at.g;
    r_[j] = v_[j] - p[j];
    if (at.g > 0) on_.push_back(static_cast<int>(j));
  }
  double sum = 0;
  for (const int k : on_) {
    const double amps = i_[static_cast<std::size_t>(k)];
    for (std::size_t j = 0; j < n; ++j) r_[j] -= f(j, static_cast<std::size_t>(k)) * amps;
  }
  for (std::size_t j = 0; j < n; ++j) sum += std::abs(r_[j]);
  return sum;
}

// (1 - F G) dv = -r over the junctions that are on; the others follow.
void junction_solver::newton_step() {
  const std::size_t n = on_.size();
  const auto at = [&](std::size_t a) { return static_cast<std::size_t>(on_[a]); };
  const auto m = [&](std::size_t a, std::size_t b) { return (a == b ? 1.0 : 0.0) - f(at(a), at(b)) * g_[at(b)]; };
  if (n == 1) {
    dv_[at(0)] = -r_[at(0)] / m(0, 0);
  } else if (n == 2) {
    const double a = m(0, 0), b = m(0, 1), c = m(1, 0), d = m(1, 1), det = a * d - b * c;
    dv_[at(0)] = (-r_[at(0)] * d + r_[at(1)] * b) / det;
    dv_[at(1)] = (-r_[at(1)] * a + r_[at(0)] * c) / det;
  } else if (n > 2) {
    const auto size = static_cast<Eigen::Index>(n);
    Eigen::MatrixXd full(size, size);
    Eigen::VectorXd right(size);
    for (Eigen::Index a = 0; a < size; ++a) {
      right(a) = -r_[at(static_cast<std::size_t>(a))];
      for (Eigen::Index b = 0; b < size; ++b) full(a, b) = m(static_cast<std::size_t>(a), static_cast<std::size_t>(b));
    }
    const Eigen::VectorXd step = full.partialPivLu().solve(right);
    for (std::size_t a = 0; a < n; ++a) dv_[at(a)] = step(static_cast<Eigen::Index>(a));
  }
  for (std::size_t j = 0; j < v_.size(); ++j) {
    if (g_[j] > 0) continue;
    dv_[j] = -r_[j];
    for (std::size_t a = 0; a < n; ++a) dv_[j] += f(j, at(a)) * g_[at(a)] * dv_[at(a)];
  }
}

bool junction_solver::close_enough() const {
  for (std::size_t j = 0; j < v_.size(); ++j) {
    const junction& d = e_.diodes[j].j;
    const bool was = g_[j] > 0, is = v_[j] + dv_[j] > d.threshold;
    if (was != is || (was && !short_enough(d, v_[j], dv_[j]))) return false;
  }
  return true;
}

void junction_solver::step_by(double part) {
  for (std::size_t j = 0; j < v_.size(); ++j) v_[j] = stepped(e_.diodes[j].j, from_[j], part * dv_[j]);
}

void junction_solver::all_together(const double* p) {
  constexpr int free_passes = 8;
  double sum = miss(p);
  for (int pass = 0; pass < most_passes; ++pass) {
    newton_step();
    if (close_enough()) {
      for (const int k : on_)
        i_[static_cast<std::size_t>(k)] += g_[static_cast<std::size_t>(k)] * dv_[static_cast<std::size_t>(k)];
      for (std::size_t j = 0; j < v_.size(); ++j) v_[j] += dv_[j];
      return;
    }
    from_ = v_;
    step_by(1);
    double after = miss(p), part = 1;
    while (pass >= free_passes && after > sum && part > 0.2) {
      part /= 2;
      step_by(part);
      after = miss(p);
    }
    sum = after;
  }
  ++failures_;
}

void junction_solver::slopes(std::vector<double>& w) const {
  const auto size = static_cast<Eigen::Index>(on_.size());
  w.resize(on_.size() * on_.size());
  const auto at = [&](Eigen::Index a) { return static_cast<std::size_t>(on_[static_cast<std::size_t>(a)]); };
  const auto m = [&](Eigen::Index a, Eigen::Index b) { return (a == b ? 1.0 : 0.0) - g_[at(a)] * f(at(a), at(b)); };
  if (size == 1) {
    w[0] = g_[at(0)] / m(0, 0);
  } else if (size == 2) {
    const double a = m(0, 0), b = m(0, 1), c = m(1, 0), d = m(1, 1), det = a * d - b * c;
    w[0] = d * g_[at(0)] / det;
    w[1] = -c * g_[at(0)] / det;
    w[2] = -b * g_[at(1)] / det;
    w[3] = a * g_[at(1)] / det;
  } else {
    Eigen::MatrixXd full(size, size), right = Eigen::MatrixXd::Zero(size, size);
    for (Eigen::Index a = 0; a < size; ++a) {
      right(a, a) = g_[at(a)];
      for (Eigen::Index b = 0; b < size; ++b) full(a, b) = m(a, b);
    }
    Eigen::Map<Eigen::MatrixXd>(w.data(), size, size) = full.partialPivLu().solve(right);
  }
}

}  // namespace turnwright::supply::kernel
