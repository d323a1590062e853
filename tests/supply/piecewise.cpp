#include "piecewise.hpp"

#include <algorithm>
#include <cmath>
#include <map>
#include <numbers>
#include <stdexcept>
#include <utility>

#include <Eigen/Dense>
#include <unsupported/Eigen/MatrixFunctions>

#include "wiring.hpp"

namespace turnwright::testing {
namespace {

using Eigen::MatrixXd;
using Eigen::VectorXd;
using namespace wired;

constexpr double open_siemens = 1e-9;  // across a diode, so that an idle winding floats nowhere
constexpr int steps = 512;             // of a cycle, at most so long; shorter where a diode changes
constexpr int halvings = 22;           // of such a step, to where a change is taken as found: 10 ps

// The circuit with each diode either open or closed. The state is the capacitors' volts, the inductors' amperes, sine
// and cosine of the mains, and one.
struct linear_mode {
  MatrixXd out;               // node volts; capacitor, winding, line and port currents from the state
  MatrixXd over;              // volts across each diode above its drop
  MatrixXd rate;              // of the state
  std::vector<MatrixXd> far;  // carries the state over a step, half a step, ...
};

class circuit_in_pieces {
 public:
  explicit circuit_in_pieces(const supply::network& net)
      : w_(net), states_(static_cast<index>(w_.capacitors.size() + w_.inductors.size())), size_(states_ + 3) {
    tick_ = 2 * std::numbers::pi / w_.omega / steps;
  }

  exact_state solve() {
    VectorXd z = VectorXd::Zero(size_);
    restart(z);
    run(z, 30);
    double miss = 1;
    for (int k = 0; k < 60 && miss > 1e-11; ++k) {
      const VectorXd from = z;
      MatrixXd slope = MatrixXd::Identity(size_, size_);
      cycle(z, &slope, nullptr);
      const VectorXd change = (z - from).head(states_);
      const double now = relative(change, z);
      const bool nearer = now < miss;
      miss = now;
      if (miss <= 1e-11) break;
      if (!nearer && k % 3 == 2) {  // some cycles as they come
        restart(z);
        run(z, 20);
        continue;
      }
      const MatrixXd left = MatrixXd::Identity(states_, states_) - slope.topLeftCorner(states_, states_);
      z.head(states_) = from.head(states_) + left.partialPivLu().solve(change);
      restart(z);
    }
    return figures(z);
  }

 private:
  void restart(VectorXd& z) const {
    z(states_) = 0;
    z(states_ + 1) = 1;
    z(states_ + 2) = 1;
  }

  void run(VectorXd& z, int cycles) {
    for (int k = 0; k < cycles; ++k) {
      cycle(z, nullptr, nullptr);
      restart(z);
    }
  }

  double relative(const VectorXd& change, const VectorXd& z) const {
    const auto c = static_cast<index>(w_.capacitors.size());
    double most = 0;
    if (c > 0) most = change.head(c).cwiseAbs().maxCoeff() / std::max(1e-6, z.head(c).cwiseAbs().maxCoeff());
    if (states_ > c) {
      const VectorXd amps = z.segment(c, states_ - c);
      most =
          std::max(most, change.tail(states_ - c).cwiseAbs().maxCoeff() / std::max(1e-6, amps.cwiseAbs().maxCoeff()));
    }
    return most;
  }

  index capacitor_row(std::size_t k) const { return w_.nodes + static_cast<index>(k); }
  index winding_row(index k) const { return w_.nodes + static_cast<index>(w_.capacitors.size()) + k; }
  index port_row(std::size_t k) const { return line_row() + 1 + static_cast<index>(k); }
  index line_row() const { return winding_row(static_cast<index>(w_.windings.size())); }

  static void stamp(MatrixXd& g, index a, index b, double siemens) {
    if (a >= 0) g(a, a) += siemens;
    if (b >= 0) g(b, b) += siemens;
    if (a < 0 || b < 0) return;
    g(a, b) -= siemens;
    g(b, a) -= siemens;
  }
  static void couple(MatrixXd& g, index node, index row, double sign) {
    if (node < 0) return;
    g(node, row) += sign;
    g(row, node) += sign;
  }
  // An unknown current that leaves a and enters b.
  static void branch(MatrixXd& g, index a, index b, index row) {
    couple(g, a, row, 1);
    couple(g, b, row, -1);
  }

  linear_mode made(unsigned closed) const {
    const index unknowns = line_row() + 1;
    const index sine = states_, one = states_ + 2, first_l = static_cast<index>(w_.capacitors.size());
    MatrixXd g = MatrixXd::Zero(unknowns, unknowns), rhs = MatrixXd::Zero(unknowns, size_);
    for (const resistor_part& r : w_.resistors) stamp(g, r.a, r.b, r.siemens);
    for (std::size_t d = 0; d < w_.diodes.size(); ++d) {
      const diode_part& p = w_.diodes[d];
      stamp(g, p.anode, p.cathode, open_siemens);
      if (!(closed >> d & 1U)) continue;
      stamp(g, p.anode, p.cathode, 1 / p.ohm);
      if (p.anode >= 0) rhs(p.anode, one) += p.drop / p.ohm;
      if (p.cathode >= 0) rhs(p.cathode, one) -= p.drop / p.ohm;
    }
    for (std::size_t c = 0; c < w_.capacitors.size(); ++c) {
      branch(g, w_.capacitors[c].a, w_.capacitors[c].b, capacitor_row(c));
      g(capacitor_row(c), capacitor_row(c)) = -w_.capacitors[c].esr;
      rhs(capacitor_row(c), static_cast<index>(c)) = 1;
    }
    for (std::size_t l = 0; l < w_.inductors.size(); ++l) {
      const index amps = first_l + static_cast<index>(l);
      if (w_.inductors[l].a >= 0) rhs(w_.inductors[l].a, amps) -= 1;
      if (w_.inductors[l].b >= 0) rhs(w_.inductors[l].b, amps) += 1;
    }
    for (const source_part& s : w_.sources) rhs(s.a, one) -= s.amps;
    for (std::size_t k = 0; k < w_.windings.size(); ++k) {
      const winding_part& p = w_.windings[k];
      const index row = winding_row(static_cast<index>(k));
      // Its current leaves b and enters a; the ideal transformer takes its part from node 0.
      couple(g, p.a, row, -1);
      couple(g, p.b, row, 1);
      couple(g, 0, row, p.part);
      g(row, row) = -p.ohm;
    }
    g(0, line_row()) = -1;
    g(line_row(), 0) = 1;
    g(line_row(), line_row()) = w_.primary_ohm;
    rhs(line_row(), sine) = w_.mains_peak;

    linear_mode m;
    const MatrixXd known = g.partialPivLu().solve(rhs);
    m.out.resize(unknowns + static_cast<index>(w_.current_in.size()), size_);
    m.out.topRows(unknowns) = known;
    for (std::size_t k = 0; k < w_.current_in.size(); ++k) {
      const auto [near, far] = w_.current_in[k];
      m.out.row(port_row(k)) = known.row(winding_row(near));
      if (far >= 0) m.out.row(port_row(k)) -= known.row(winding_row(far));
    }
    m.over.resize(static_cast<index>(w_.diodes.size()), size_);
    for (std::size_t d = 0; d < w_.diodes.size(); ++d) {
      const auto row = static_cast<index>(d);
      m.over.row(row) = across(m, w_.diodes[d].anode, w_.diodes[d].cathode);
      m.over(row, one) -= w_.diodes[d].drop;
    }
    m.rate = MatrixXd::Zero(size_, size_);
    for (std::size_t c = 0; c < w_.capacitors.size(); ++c)
      m.rate.row(static_cast<index>(c)) = m.out.row(capacitor_row(c)) / w_.capacitors[c].farad;
    for (std::size_t l = 0; l < w_.inductors.size(); ++l) {
      const inductor_part& p = w_.inductors[l];
      const index amps = first_l + static_cast<index>(l);
      m.rate.row(amps) = across(m, p.a, p.b) / p.henry;
      m.rate(amps, amps) -= p.ohm / p.henry;
    }
    m.rate(sine, sine + 1) = w_.omega;
    m.rate(sine + 1, sine) = -w_.omega;
    for (int k = 0; k <= halvings + 1; ++k) m.far.push_back((m.rate * std::ldexp(tick_, -k)).exp());
    return m;
  }

  Eigen::RowVectorXd across(const linear_mode& m, index a, index b) const {
    Eigen::RowVectorXd row = Eigen::RowVectorXd::Zero(size_);
    if (a >= 0) row += m.out.row(a);
    if (b >= 0) row -= m.out.row(b);
    return row;
  }

  const linear_mode& mode(unsigned closed) {
    const auto known = modes_.find(closed);
    return known != modes_.end() ? known->second : modes_.emplace(closed, made(closed)).first->second;
  }

  // The first diode that should be the other way, or -1. A hair either way does not count.
  int wrong_diode(const linear_mode& m, const VectorXd& z) const {
    for (std::size_t d = 0; d < w_.diodes.size(); ++d) {
      const double over = m.over.row(static_cast<index>(d)).dot(z);
      if (closed_ >> d & 1U ? over < -1e-9 : over > 1e-9) return static_cast<int>(d);
    }
    return -1;
  }

  // Which diodes are closed. Always changing the first of the wrong ones comes to an end, since the laws are monotone.
  void set_diodes(const VectorXd& z) {
    for (int pass = 0; pass < 500; ++pass) {
      const int wrong = wrong_diode(mode(closed_), z);
      if (wrong < 0) return;
      closed_ ^= 1U << wrong;
    }
    throw std::runtime_error("no diodes fit");
  }

  // Means over a cycle, by Simpson's rule over each stretch between changes.
  struct sums {
    VectorXd origin, first, square;
    void add(const VectorXd& y, double weight) {
      const VectorXd d = y - origin;
      first += weight * d;
      square += weight * d.cwiseProduct(d);
    }
  };

  void cycle(VectorXd& z, MatrixXd* slope, sums* s) {
    set_diodes(z);
    for (int n = 0; n < steps; ++n) {
      // A step is gone in halves, quarters ... where a diode changes in it; `left` counts the shortest.
      for (long left = 1L << halvings; left > 0;) {
        const linear_mode& m = mode(closed_);
        int k = 0;
        while ((1L << (halvings - k)) > left) ++k;
        VectorXd next = m.far[static_cast<std::size_t>(k)] * z;
        while (k < halvings && wrong_diode(m, next) >= 0) {
          ++k;
          next.noalias() = m.far[static_cast<std::size_t>(k)] * z;
        }
        if (s) {
          const double whole = std::ldexp(1.0, -k) / steps;
          s->add(m.out * z, whole / 6);
          s->add(m.out * (m.far[static_cast<std::size_t>(k) + 1] * z), whole * 4 / 6);
          s->add(m.out * next, whole / 6);
        }
        if (slope) *slope = m.far[static_cast<std::size_t>(k)] * *slope;
        z = next;
        left -= 1L << (halvings - k);
        if (k == halvings) set_diodes(z);
      }
    }
  }

  exact_state figures(VectorXd z) {
    restart(z);
    const VectorXd from = z;
    set_diodes(z);
    const VectorXd y = mode(closed_).out * z;
    sums s{y, VectorXd::Zero(y.size()), VectorXd::Zero(y.size())};
    cycle(z, nullptr, &s);
    exact_state out;
    out.residual = relative((z - from).head(states_), z);
    const auto rms = [&](index k) {
      const double mean = s.first(k) + s.origin(k);
      return std::sqrt(std::max(0.0, s.square(k) - s.first(k) * s.first(k) + mean * mean));
    };
    for (std::size_t r = 0; r < w_.rail_nodes.size(); ++r) {
      out.rails.emplace_back();
      for (const index k : w_.rail_nodes[r]) {
        out.rails.back().push_back(
            {w_.sign[r] * (s.first(k) + s.origin(k)), std::sqrt(std::max(0.0, s.square(k) - s.first(k) * s.first(k)))});
      }
    }
    for (std::size_t k = 0; k < w_.current_in.size(); ++k) out.port_rms.push_back(rms(port_row(k)));
    out.line_rms = rms(line_row());
    return out;
  }

  wiring w_;
  index states_, size_;
  double tick_;
  unsigned closed_ = 0;
  std::map<unsigned, linear_mode> modes_;
};

}  // namespace

bool is_piecewise(const supply::network& net) {
  if (plain(net.primary_leakage) > 0) return false;
  for (const henries& l : net.leakage) {
    if (plain(l) > 0) return false;
  }
  std::vector<int> taps(net.ports.size(), 0);
  for (const supply::port& p : net.ports) {
    if (p.inside && ++taps[*p.inside] > 1) return false;
  }
  for (const supply::rail& r : net.rails) {
    if (!std::holds_alternative<supply::drop_law>(r.anode.law)) return false;
    for (std::size_t n = 0; n < r.nodes.size(); ++n) {
      const bool fed_by_choke = std::holds_alternative<supply::choke>(r.nodes[n].through);
      if (n == 0 && fed_by_choke) return false;
      const bool feeds_choke = n + 1 < r.nodes.size() && std::holds_alternative<supply::choke>(r.nodes[n + 1].through);
      if (!r.nodes[n].shunt && (fed_by_choke || feeds_choke)) return false;
    }
  }
  return true;
}

exact_state solve_piecewise(const supply::network& net) { return circuit_in_pieces(net).solve(); }

}  // namespace turnwright::testing
