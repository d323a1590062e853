#include "cycle.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

namespace turnwright::supply::kernel {
namespace {

constexpr double second_base = (1 - stage_share) / stage_share;

// A few doubles: a loop is quicker than a call.
inline void copy_few(const double* from, std::size_t n, double* to) {
  for (std::size_t i = 0; i < n; ++i) to[i] = from[i];
}

// out = m b, `Rows` high, column by column; 0: the height is known at run time alone.
template <int Rows>
inline void times(const double* m, int columns, int rows, const double* b, double* out) {
  const int high = Rows > 0 ? Rows : rows;
  if constexpr (Rows > 0) {
    double sum[static_cast<std::size_t>(Rows)];
    for (int r = 0; r < Rows; ++r) sum[r] = out[r];
    for (int c = 0; c < columns; ++c) {
      const double x = b[c];
      const double* column = m + static_cast<std::ptrdiff_t>(c) * Rows;
      for (int r = 0; r < Rows; ++r) sum[r] += column[r] * x;
    }
    for (int r = 0; r < Rows; ++r) out[r] = sum[r];
  } else {
    for (int c = 0; c < columns; ++c) {
      const double x = b[c];
      const double* column = m + static_cast<std::ptrdiff_t>(c) * high;
      for (int r = 0; r < high; ++r) out[r] += column[r] * x;
    }
  }
}

}  // namespace

stepper::stepper(const elements& e, int steps, double phase)
    : e_(e),
      steps_(steps),
      start_mains_(e.mains_peak * std::sin(phase)),
      s_(stage_of(e, stage_share * e.cycle() / steps)),
      junctions_(e, s_),
      work_(static_cast<std::size_t>(s_.rows)),
      base_(static_cast<std::size_t>(s_.states)),
      next_(static_cast<std::size_t>(s_.states)) {
  mains_.reserve(2 * static_cast<std::size_t>(steps));
  const double step = e.omega * e.cycle() / steps;
  // Turned step by step: two multiplications against a sine's many; the drift over a cycle is some 1e-14.
  const double c = std::cos(step), s = std::sin(step);
  double a_c = std::cos(phase + stage_share * step), a_s = std::sin(phase + stage_share * step);
  double b_c = std::cos(phase + step), b_s = std::sin(phase + step);
  const auto turn = [&](double& x, double& y) {
    const double t = x * c - y * s;
    y = x * s + y * c;
    x = t;
  };
  for (int n = 0; n < steps; ++n) {
    mains_.push_back(e.mains_peak * a_s);
    mains_.push_back(e.mains_peak * b_s);
    turn(a_c, a_s);
    turn(b_c, b_s);
  }
}

template <int Rows>
bool stepper::one_stage(int sort, const double* base, double mains, double* out, double* kept_z, double* kept_v) {
  const int rows = Rows > 0 ? Rows : s_.rows;
  double* const x = work_.data();
  const double *const one = s_.by_one.data(), *const slope = s_.by_mains.data();
  for (int r = 0; r < rows; ++r) x[r] = one[r] + slope[r] * mains;
  times<Rows>(s_.m.data(), s_.states, rows, base, x);
  const bool any = junctions_.solve(x + s_.states, sort);
  if (any) {
    for (const int j : junctions_.on())
      times<Rows>(s_.c.data() + static_cast<std::ptrdiff_t>(j) * rows, 1, rows,
                  &junctions_.amps()[static_cast<std::size_t>(j)], x);
  }
  copy_few(x, static_cast<std::size_t>(s_.states), out);
  if (kept_z) {
    copy_few(base, static_cast<std::size_t>(s_.states), kept_z);
    kept_z[s_.states] = mains;
    kept_z[s_.states + 1] = 1;
    copy_few(junctions_.amps().data(), junctions_.amps().size(), kept_z + s_.states + 2);
    copy_few(junctions_.volts().data(), junctions_.volts().size(), kept_v);
  }
  return any;
}

// The stage's derivative applied to every column of a base.
template <int Rows>
void stepper::sensitivity_stage(const Eigen::MatrixXd& base, Eigen::MatrixXd& out, bool any) {
  const int rows = Rows > 0 ? Rows : s_.rows;
  const std::vector<int>& on = junctions_.on();
  if (any) junctions_.slopes(slopes_);
  double* x = work_.data();
  for (Eigen::Index column = 0; column < base.cols(); ++column) {
    std::fill(x, x + rows, 0.0);
    times<Rows>(s_.m.data(), s_.states, rows, base.col(column).data(), x);
    if (any) {
      const std::size_t n = on.size();
      double amps[64];
      for (std::size_t a = 0; a < n; ++a) {
        amps[a] = 0;
        for (std::size_t b = 0; b < n; ++b) amps[a] += slopes_[b * n + a] * x[s_.states + on[b]];
      }
      for (std::size_t a = 0; a < n; ++a)
        times<Rows>(s_.c.data() + static_cast<std::ptrdiff_t>(on[a]) * rows, 1, rows, &amps[a], x);
    }
    copy_few(x, static_cast<std::size_t>(s_.states), out.col(column).data());
  }
}

void stepper::flush_off_steps(Eigen::MatrixXd& m, int& off) {
  if (off == 0) return;
  const Eigen::Index n = s_.states;
  if (off_powers_.empty()) {
    const Eigen::MatrixXd a = Eigen::Map<const Eigen::MatrixXd>(s_.m.data(), s_.rows, n).topRows(n);
    const Eigen::MatrixXd one = Eigen::MatrixXd::Identity(n, n);
    off_powers_.emplace_back(a * (one + second_base * (a - one)));
  }
  for (std::size_t bit = 0; off != 0; ++bit, off >>= 1) {
    if (bit == off_powers_.size()) off_powers_.emplace_back(off_powers_.back() * off_powers_.back());
    if (off & 1) m = off_powers_[bit] * m;
  }
}

template <int Rows>
void stepper::run(double* x, Eigen::MatrixXd* monodromy, record* kept) {
  const auto states = static_cast<std::size_t>(s_.states);
  const auto junctions = static_cast<std::size_t>(s_.junctions);
  int off = 0;
  junctions_.forget_failures();
  if (monodromy) {
    monodromy->setIdentity(s_.states, s_.states);
    s1_.resize(s_.states, s_.states);
    s2_.resize(s_.states, s_.states);
  }
  if (kept) {
    kept->width = s_.states + 2 + s_.junctions;
    kept->z.resize(2 * static_cast<std::size_t>(steps_) * static_cast<std::size_t>(kept->width));
    kept->v.resize(2 * static_cast<std::size_t>(steps_) * junctions);
  }
  double* z = kept ? kept->z.data() : nullptr;
  double* v = kept ? kept->v.data() : nullptr;
  for (int n = 0; n < steps_; ++n) {
    const auto first = 2 * static_cast<std::size_t>(n);
    const bool any_1 = one_stage<Rows>(0, x, mains_[first], next_.data(), z, v);
    const bool derive_1 = monodromy && any_1;
    if (derive_1) {
      flush_off_steps(*monodromy, off);
      sensitivity_stage<Rows>(*monodromy, s1_, true);
    }
    if (z) z += kept->width, v += junctions;
    for (std::size_t i = 0; i < states; ++i) base_[i] = x[i] + second_base * (next_[i] - x[i]);
    const bool any_2 = one_stage<Rows>(1, base_.data(), mains_[first + 1], x, z, v);
    if (z) z += kept->width, v += junctions;
    if (!monodromy) continue;
    if (!any_1 && !any_2) {
      ++off;
      continue;
    }
    if (!derive_1) {
      flush_off_steps(*monodromy, off);
      sensitivity_stage<Rows>(*monodromy, s1_, false);
    }
    s2_ = *monodromy + second_base * (s1_ - *monodromy);
    sensitivity_stage<Rows>(s2_, *monodromy, any_2);
  }
  if (monodromy) flush_off_steps(*monodromy, off);
}

void stepper::cycle(double* x, Eigen::MatrixXd* monodromy, record* kept) {
  switch (s_.rows) {
    case 4:
      return run<4>(x, monodromy, kept);
    case 8:
      return run<8>(x, monodromy, kept);
    case 12:
      return run<12>(x, monodromy, kept);
    case 16:
      return run<16>(x, monodromy, kept);
    case 20:
      return run<20>(x, monodromy, kept);
    default:
      return run<0>(x, monodromy, kept);
  }
}

std::vector<double> stepper::first_currents(const double* x) {
  // A stage as short as nothing: capacitors and inductors hold, only the resistances speak.
  const stage instant = stage_of(e_, 1e-9);
  junction_solver at_once(e_, instant);
  std::vector<double> out(static_cast<std::size_t>(instant.rows));
  for (std::size_t r = 0; r < out.size(); ++r) out[r] = instant.by_one[r] + instant.by_mains[r] * start_mains_;
  times<0>(instant.m.data(), instant.states, instant.rows, x, out.data());
  at_once.solve(out.data() + instant.states, 0);
  return at_once.amps();
}

}  // namespace turnwright::supply::kernel
