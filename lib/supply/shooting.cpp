#include "shooting.hpp"

#include <algorithm>
#include <cmath>

namespace turnwright::supply::kernel {
namespace {

using Eigen::MatrixXd;
using Eigen::VectorXd;

constexpr int coarse_steps = 32;
constexpr double coarse_enough = 1e-3, fine_enough = 2e-5, periodic_enough = 5e-5, stalled = 0.7;

// One search on one grid. The map x - P(x) is monotone in the norm of the stored energy, since the circuit is
// incrementally passive; so a step that makes that norm grow is refused and a more careful one tried.
class search {
 public:
  search(const elements& e, stepper& grid) : e_(e), grid_(grid), n_(e.states) {}

  // x after a cycle less x, with the derivative where asked for.
  VectorXd change(const VectorXd& x, MatrixXd* monodromy, record* kept) {
    VectorXd after = x;
    grid_.cycle(after.data(), monodromy, kept);
    ++cycles;
    return after - x;
  }

  double against_scale(const VectorXd& d, const VectorXd& x) const {
    double most = 0;
    for (Eigen::Index i = 0; i < n_; ++i) {
      const double size = std::max(e_.scale[static_cast<std::size_t>(i)], std::abs(x(i)));
      most = std::max(most, std::abs(d(i)) / size);
    }
    return std::isfinite(d.sum()) ? most : 1e300;
  }

  double energy(const VectorXd& d) const {
    double sum = 0;
    for (Eigen::Index i = 0; i < n_; ++i) sum += e_.weight[static_cast<std::size_t>(i)] * d(i) * d(i);
    return std::isfinite(sum) ? sum : 1e300;
  }

  // A step no longer than three times the state's scale.
  VectorXd limited(VectorXd d, const VectorXd& x) const {
    const double most = against_scale(d, x);
    if (most > 3 && most < 1e290) d *= 3 / most;
    return d;
  }

  // Newton with the derivative of a whole cycle, until a step falls below `enough`. Leaves the inverse behind.
  bool newton(VectorXd& x, double enough, int most_steps, MatrixXd& inverse, record* kept) {
    MatrixXd m;
    const MatrixXd one = MatrixXd::Identity(n_, n_);
    double damping = 0;
    VectorXd f = change(x, &m, kept);
    double size = energy(f);
    for (int k = 0; k < most_steps; ++k) {
      inverse = (one * (1 + damping) - m).partialPivLu().inverse();
      const VectorXd step = limited(inverse * f, x);
      if (against_scale(step, x) < enough && damping < 1e-3) {
        x += step;
        return true;
      }
      VectorXd next = x + step;
      MatrixXd m_next;
      VectorXd f_next = change(next, &m_next, kept);
      const double size_next = energy(f_next);
      constexpr int free_steps = 5;
      if (k >= free_steps && size_next > size) {
        damping = std::max(0.02, damping * 4);
        if (damping > 1e6) return false;
        continue;
      }
      damping = damping > 1e-3 ? damping * 0.2 : 0;
      x = std::move(next);
      f = std::move(f_next);
      m = std::move(m_next);
      size = size_next;
    }
    return false;
  }

  int cycles = 0;

 private:
  const elements& e_;
  stepper& grid_;
  Eigen::Index n_;
};

// Chord iterations: the inverse of another grid, plain cycles of this one.
bool chord(search& s, VectorXd& x, const MatrixXd& inverse, shot& out) {
  double before = 1e300;
  for (int k = 0; k < 12; ++k) {
    const VectorXd f = s.change(x, nullptr, &out.last);
    const VectorXd step = s.limited(inverse * f, x);
    const double size = s.against_scale(step, x);
    out.residual = s.against_scale(f, x);
    out.x.assign(x.data(), x.data() + x.size());
    if (size < fine_enough && out.residual < periodic_enough) return true;
    if (k > 2 && size > stalled * before) return false;
    before = size;
    x += step;
  }
  return false;
}

}  // namespace

shot shoot(const elements& e, stepper& fine) {
  shot out{e.start, {}, 1e300, false, 0};
  const VectorXd start = Eigen::Map<const VectorXd>(e.start.data(), e.states);
  VectorXd x = start;
  stepper coarse(e, coarse_steps);
  search on_coarse(e, coarse), on_fine(e, fine);
  MatrixXd inverse;
  constexpr int newton_steps = 40, plain_cycles = 50, rounds = 3;
  for (int round = 0; round < rounds && !out.settled; ++round) {
    const bool near = on_coarse.newton(x, coarse_enough, newton_steps, inverse, nullptr);
    if (!x.allFinite()) x = start;
    if (near) out.settled = chord(on_fine, x, inverse, out);
    if (!out.settled && x.allFinite()) {  // the derivative of the fine grid itself
      out.settled = on_fine.newton(x, fine_enough, newton_steps, inverse, nullptr) && chord(on_fine, x, inverse, out);
    }
    if (out.settled) break;
    // What the circuit itself does from where the search stands, then again.
    if (!x.allFinite()) x = start;
    for (int k = 0; k < plain_cycles; ++k) x += on_fine.change(x, nullptr, &out.last);
    const VectorXd f = on_fine.change(x, nullptr, &out.last);
    out.residual = on_fine.against_scale(f, x);
    out.x.assign(x.data(), x.data() + x.size());
  }
  out.cycles = on_coarse.cycles + on_fine.cycles;
  return out;
}

}  // namespace turnwright::supply::kernel
