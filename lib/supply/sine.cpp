#include <turnwright/supply/sine.hpp>

#include <cmath>
#include <complex>
#include <limits>
#include <numbers>
#include <stdexcept>

#include <Eigen/Dense>

namespace turnwright::supply {

namespace kernel {
namespace {

using complex = std::complex<double>;

// Impedances of the ports referred to the primary, with each load, each shared resistance and the leakage matrix.
// Open ports get no row: their current is nothing.
Eigen::MatrixXcd port_impedances(const network_si& net, const std::vector<std::size_t>& loaded) {
  const auto size = static_cast<Eigen::Index>(loaded.size());
  Eigen::MatrixXcd z(size, size);
  const std::size_t all = net.ports.size();
  for (Eigen::Index a = 0; a < size; ++a) {
    for (Eigen::Index b = 0; b < size; ++b) {
      const std::size_t k = loaded[static_cast<std::size_t>(a)], m = loaded[static_cast<std::size_t>(b)];
      const port_si &pk = net.ports[k], &pm = net.ports[m];
      const double ratio = net.n1 * net.n1 / (pk.n * pm.n);
      double r = 0;
      if (k == m) r = pk.r + pk.load;
      if (pk.inside == static_cast<int>(m)) r = pk.r;
      if (pm.inside == static_cast<int>(k)) r = pm.r;
      z(a, b) = complex(r * ratio, net.omega * net.leakage[k * all + m]);
    }
  }
  return z;
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

  state_si s{std::vector<double>(all), std::vector<double>(all), std::vector<double>(all), std::vector<double>(all),
             std::vector<double>(all), 0, 0, 0, 0, 0, 0, 0};
  std::vector<complex> current(all, 0.0);
  for (Eigen::Index a = 0; a < size; ++a) {
    const std::size_t k = loaded[static_cast<std::size_t>(a)];
    current[k] = emf * per_volt(a) * net.n1 / net.ports[k].n;
  }
  for (std::size_t k = 0; k < all; ++k) {
    const port_si& p = net.ports[k];
    complex drop = current[k] * p.r, through = current[k];
    for (std::size_t m = 0; m < all; ++m) {
      drop += complex(0, net.omega * net.leakage[k * all + m]) * current[m] * (p.n / net.n1) * (net.ports[m].n / net.n1);
      if (net.ports[m].inside == static_cast<int>(k)) drop += current[m] * net.ports[m].r;
    }
    if (p.inside >= 0) {
      through += current[static_cast<std::size_t>(p.inside)];
      drop += current[static_cast<std::size_t>(p.inside)] * p.r;
    }
    double own_r = p.r;  // without the parts that taps share, which are counted with the taps
    for (const port_si& m : net.ports) own_r -= m.inside == static_cast<int>(k) ? m.r : 0.0;
    s.v[k] = std::abs(emf * (p.n / net.n1) - drop);
    s.i[k] = std::abs(current[k]);
    s.shared[k] = std::abs(through);
    s.copper[k] = std::norm(through) * own_r;
    s.load[k] = std::isfinite(p.load) ? std::norm(current[k]) * p.load : 0.0;
  }
  s.i1 = std::abs(i1);
  s.terminal = std::abs(terminal);
  s.emf = std::abs(emf);
  s.input = std::real(terminal * std::conj(i1));
  s.core = std::norm(emf) * net.g_core;
  s.copper1 = std::norm(i1) * net.r1;
  s.apparent = s.terminal * s.i1;
  return s;
}

}  // namespace kernel

namespace {

kernel::network_si in_si(const sine_network& net) {
  kernel::network_si out{plain(net.mains.plain()), 2 * std::numbers::pi * plain(net.frequency),
                         plain(net.source_resistance), static_cast<double>(net.primary_turns.count()),
                         plain(net.primary_resistance), net.core_loss_resistance ? 1 / plain(*net.core_loss_resistance) : 0.0,
                         net.magnetising_reactance ? 1 / plain(*net.magnetising_reactance) : 0.0, {}, {}};
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
  if (net.leakage.size() != net.ports.size() * net.ports.size()) throw std::logic_error("leakage matrix of another size");
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
