#include <turnwright/supply/sine.hpp>

#include <algorithm>
#include <cmath>
#include <complex>
#include <limits>
#include <stdexcept>

#include <Eigen/Dense>

#include <turnwright/measure/electrics.hpp>

namespace turnwright::supply {

namespace kernel {
namespace {

using complex = std::complex<double>;

// Resistance that the currents of two ports meet together: a port's own, a tap's with the half it is a tap of, and of
// two taps of one half that of the shorter, since both begin at the same end.
double shared_resistance(const network_si& net, std::size_t k, std::size_t m) {
  const port_si &a = net.ports[k], &b = net.ports[m];
  if (k == m) return a.r;
  if (a.inside == static_cast<int>(m)) return a.r;
  if (b.inside == static_cast<int>(k)) return b.r;
  return a.inside >= 0 && a.inside == b.inside ? std::min(a.r, b.r) : 0.0;
}

// Impedances of the loaded ports referred to the primary. Open ports get no row: their current is nothing.
Eigen::MatrixXcd port_impedances(const network_si& net, const std::vector<std::size_t>& loaded) {
  const auto size = static_cast<Eigen::Index>(loaded.size());
  Eigen::MatrixXcd z(size, size);
  const std::size_t all = net.ports.size();
  for (Eigen::Index a = 0; a < size; ++a) {
    for (Eigen::Index b = 0; b < size; ++b) {
      const std::size_t k = loaded[static_cast<std::size_t>(a)], m = loaded[static_cast<std::size_t>(b)];
      const double ratio = net.n1 * net.n1 / (net.ports[k].n * net.ports[m].n);
      const double r = shared_resistance(net, k, m) + (k == m ? net.ports[k].load : 0.0);
      z(a, b) = complex(r * ratio, net.omega * net.leakage[k * all + m]);
    }
  }
  return z;
}

// Figures of one port from all currents.
void note_port(const network_si& net, std::size_t k, const std::vector<complex>& current, complex emf, state_si& s) {
  const port_si& p = net.ports[k];
  const std::size_t all = net.ports.size();
  complex resistive = 0, reactive = 0, through = 0;
  for (std::size_t m = 0; m < all; ++m) {
    const port_si& other = net.ports[m];
    resistive += shared_resistance(net, k, m) * current[m];
    reactive += complex(0, net.omega * net.leakage[k * all + m]) * current[m] * (p.n / net.n1) * (other.n / net.n1);
    const bool longer_tap = p.inside >= 0 && other.inside == p.inside && other.r >= p.r;
    if (m == k || p.inside == static_cast<int>(m) || longer_tap) through += current[m];
  }
  s.v[k] = std::abs(emf * (p.n / net.n1) - resistive - reactive);
  s.i[k] = std::abs(current[k]);
  s.shared[k] = std::abs(through);
  s.copper[k] = std::real(std::conj(current[k]) * resistive);
  s.load[k] = std::isfinite(p.load) ? std::norm(current[k]) * p.load : 0.0;
}

}  // namespace

state_si solve(const network_si& net) {
  const std::size_t all = net.ports.size();
  std::vector<std::size_t> loaded;
  for (std::size_t k = 0; k < all; ++k) {
    if (std::isfinite(net.ports[k].load)) loaded.push_back(k);
  }
  const auto size = static_cast<Eigen::Index>(loaded.size());
  Eigen::VectorXcd per_volt = Eigen::VectorXcd::Zero(size);  // referred current of each port for one volt across p
  if (size > 0) per_volt = port_impedances(net, loaded).partialPivLu().solve(Eigen::VectorXcd::Ones(size));
  const complex admittance = per_volt.sum() + complex(net.g_core, -net.b_mag);
  const complex emf = net.mains / (1.0 + (net.source + net.r1) * admittance);
  const complex i1 = emf * admittance;
  const complex terminal = net.mains - i1 * net.source;

  std::vector<complex> current(all, 0.0);
  for (Eigen::Index a = 0; a < size; ++a) {
    const std::size_t k = loaded[static_cast<std::size_t>(a)];
    current[k] = emf * per_volt(a) * net.n1 / net.ports[k].n;
  }
  const std::vector<double> none(all, 0.0);
  state_si s{none,
             none,
             none,
             none,
             none,
             std::abs(i1),
             std::abs(terminal),
             std::abs(emf),
             std::real(terminal * std::conj(i1)),
             std::norm(emf) * net.g_core,
             std::norm(i1) * net.r1,
             std::abs(terminal) * std::abs(i1)};
  for (std::size_t k = 0; k < all; ++k) note_port(net, k, current, emf, s);
  return s;
}

}  // namespace kernel

namespace {

kernel::network_si in_si(const sine_network& net) {
  kernel::network_si out{plain(net.mains.plain()),
                         plain(reactance(net.frequency, as<henries>(1))),
                         plain(net.source_resistance),
                         static_cast<double>(net.primary_turns.count()),
                         plain(net.primary_resistance),
                         net.core_loss_resistance ? 1 / plain(*net.core_loss_resistance) : 0.0,
                         net.magnetising_reactance ? 1 / plain(*net.magnetising_reactance) : 0.0,
                         {},
                         {}};
  for (const port& p : net.ports) {
    out.ports.push_back({static_cast<double>(p.n.count()), plain(p.resistance),
                         p.load ? plain(*p.load) : std::numeric_limits<double>::infinity(),
                         p.inside ? static_cast<int>(*p.inside) : -1});
  }
  for (const henries& l : net.leakage) out.leakage.push_back(plain(l));
  return out;
}

}  // namespace

sine_solver::sine_solver(const sine_network& net) : net_(in_si(net)), last_{} {
  if (net.leakage.size() != net.ports.size() * net.ports.size())
    throw std::logic_error("leakage matrix of another size");
}

void sine_solver::set_resistances(ohms primary, const std::vector<ohms>& ports) {
  net_.r1 = plain(primary);
  for (std::size_t k = 0; k < ports.size(); ++k) net_.ports[k].r = plain(ports[k]);
}

void sine_solver::set_shunt(ohms core_loss, ohms magnetising) {
  net_.g_core = 1 / plain(core_loss);
  net_.b_mag = 1 / plain(magnetising);
}

void sine_solver::solve() { last_ = kernel::solve(net_); }

sine_state sine_solver::state() const {
  const kernel::state_si& s = last_;
  sine_state out;
  double output_w = 0;
  for (std::size_t k = 0; k < net_.ports.size(); ++k) {
    out.ports.push_back({volts_rms{as<volts>(net_.mains * net_.ports[k].n / net_.n1)}, volts_rms{as<volts>(s.v[k])},
                         amperes_rms{as<amperes>(s.i[k])}, as<watts>(s.load[k])});
    out.copper.push_back(as<watts>(s.copper[k]));
    out.shared_current.push_back(amperes_rms{as<amperes>(s.shared[k])});
    output_w += s.load[k];
  }
  out.primary_current = amperes_rms{as<amperes>(s.i1)};
  out.terminal = volts_rms{as<volts>(s.terminal)};
  out.emf = volts_rms{as<volts>(s.emf)};
  out.input = as<watts>(s.input);
  out.apparent = as<volt_amperes>(s.apparent);
  out.primary_copper = as<watts>(s.copper1);
  out.core = as<watts>(s.core);
  out.output = as<watts>(output_w);
  return out;
}

sine_state solve(const sine_network& net) {
  sine_solver solver(net);
  solver.solve();
  return solver.state();
}

}  // namespace turnwright::supply
