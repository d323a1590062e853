#include <turnwright/supply/sine.hpp>

#include <algorithm>
#include <cmath>
#include <complex>
#include <limits>
#include <stdexcept>

#include <Eigen/Dense>

#include <turnwright/measure/electrics.hpp>

#include "tap.hpp"

namespace turnwright::supply {

namespace kernel {
namespace {

using complex = std::complex<double>;

tap_place place(const network_si& net, std::size_t k) { return {net.ports[k].r, net.ports[k].inside}; }

double met_together(const network_si& net, std::size_t k, std::size_t m) {
  return shared_resistance(place(net, k), static_cast<int>(k), place(net, m), static_cast<int>(m));
}

// Impedances of the loaded ports referred to the primary. Open ports get no row: their current is nothing.
Eigen::MatrixXcd port_impedances(const network_si& net, const std::vector<std::size_t>& loaded) {
  const auto size = static_cast<Eigen::Index>(loaded.size());
  Eigen::MatrixXcd z(size, size);
  const std::size_t all = net.ports.size();
  for (Eigen::Index a = 0; a < size; ++a) {
    for (Eigen::Index b = 0; b < size; ++b) {
      const std::size_t k = loaded[static_cast<std::size_t>(a)], m = loaded[static_cast<std::size_t>(b)];
      const double ratio = 1 / (net.ports[k].n * net.ports[m].n);
      const double r = met_together(net, k, m) + (k == m ? net.ports[k].load : 0.0);
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
    resistive += met_together(net, k, m) * current[m];
    reactive += complex(0, net.omega * net.leakage[k * all + m]) * current[m] * p.n * other.n;
    if (flows_through(place(net, k), static_cast<int>(k), place(net, m), static_cast<int>(m))) through += current[m];
  }
  s.v[k] = std::abs(emf * p.n - resistive - reactive);
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
  const complex emf = net.mains / (1.0 + complex(net.source + net.r1, net.omega * net.l1) * admittance);
  const complex i1 = emf * admittance;
  const complex terminal = net.mains - i1 * net.source;

  std::vector<complex> current(all, 0.0);
  for (Eigen::Index a = 0; a < size; ++a) {
    const std::size_t k = loaded[static_cast<std::size_t>(a)];
    current[k] = emf * per_volt(a) / net.ports[k].n;
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
             std::real(net.mains * std::conj(i1)),
             std::norm(emf) * net.g_core,
             std::norm(i1) * net.r1,
             std::abs(terminal) * std::abs(i1)};
  for (std::size_t k = 0; k < all; ++k) note_port(net, k, current, emf, s);
  return s;
}

}  // namespace kernel

namespace {

kernel::network_si in_si(const network& net) {
  if (!net.rails.empty()) throw std::logic_error("a network with rails is no sine network");
  if (net.leakage.size() != net.ports.size() * net.ports.size())
    throw std::logic_error("leakage matrix of another size");
  const double omega = plain(reactance(net.frequency, as<henries>(1)));
  kernel::network_si out{plain(net.mains.plain()),
                         omega,
                         plain(net.source_resistance),
                         plain(net.primary_resistance),
                         plain(net.primary_leakage),
                         net.core_loss_resistance ? 1 / plain(*net.core_loss_resistance) : 0.0,
                         net.magnetising_inductance ? 1 / (omega * plain(*net.magnetising_inductance)) : 0.0,
                         {},
                         {}};
  for (const port& p : net.ports) {
    out.ports.push_back({p.ratio, plain(p.resistance),
                         p.load ? plain(*p.load) : std::numeric_limits<double>::infinity(),
                         p.inside ? static_cast<int>(*p.inside) : -1});
  }
  for (const henries& l : net.leakage) out.leakage.push_back(plain(l));
  return out;
}

}  // namespace

sine_solver::sine_solver(const network& net) : net_(in_si(net)), last_{} {}

void sine_solver::set_resistances(ohms primary, const std::vector<ohms>& ports) {
  net_.r1 = plain(primary);
  for (std::size_t k = 0; k < ports.size(); ++k) net_.ports[k].r = plain(ports[k]);
}

void sine_solver::set_shunt(ohms core_loss, henries magnetising) {
  net_.g_core = 1 / plain(core_loss);
  net_.b_mag = 1 / (net_.omega * plain(magnetising));
}

void sine_solver::solve() { last_ = kernel::solve(net_); }

state sine_solver::all() const {
  const kernel::state_si& s = last_;
  state out;
  double output_w = 0, copper_w = s.copper1 + s.core;
  for (std::size_t k = 0; k < net_.ports.size(); ++k) {
    out.ports.push_back({volts_rms{as<volts>(net_.mains * net_.ports[k].n)}, volts_rms{as<volts>(s.v[k])},
                         amperes_rms{as<amperes>(s.i[k])}, amperes_dc{}, as<watts>(s.load[k])});
    out.copper.push_back(as<watts>(s.copper[k]));
    out.shared_current.push_back(amperes_rms{as<amperes>(s.shared[k])});
    output_w += s.load[k];
    copper_w += s.copper[k];
  }
  out.primary_current = amperes_rms{as<amperes>(s.i1)};
  out.terminal = volts_rms{as<volts>(s.terminal)};
  out.emf = volts_rms{as<volts>(s.emf)};
  out.input = as<watts>(s.input);
  out.wall = as<watts>(s.wall);
  out.apparent = as<volt_amperes>(s.apparent);
  out.primary_copper = as<watts>(s.copper1);
  out.core = as<watts>(s.core);
  out.output = as<watts>(output_w);
  out.balance_ratio = s.input > 0 ? (s.input - output_w - copper_w) / s.input : 0;
  return out;
}

state solve_sine(const network& net) {
  sine_solver solver(net);
  solver.solve();
  return solver.all();
}

}  // namespace turnwright::supply
