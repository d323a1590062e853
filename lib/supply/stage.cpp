#include "stage.hpp"

#include <stdexcept>

namespace turnwright::supply::kernel {
namespace {

using Eigen::MatrixXd;
using row_of = Eigen::RowVectorXd;

// Columns of the right-hand sides: states, mains, one, junction currents.
struct columns {
  explicit columns(const elements& e)
      : mains(e.states),
        one(e.states + 1),
        first_current(e.states + 2),
        all(e.states + 2 + static_cast<int>(e.diodes.size())) {}
  int mains, one, first_current, all;
};

// Nodal equations, filled element by element.
struct equations {
  MatrixXd g, rhs;

  void conduct(int a, int b, double siemens) {
    if (a != ground) g(a, a) += siemens;
    if (b != ground) g(b, b) += siemens;
    if (a != ground && b != ground) {
      g(a, b) -= siemens;
      g(b, a) -= siemens;
    }
  }
  // A current that flows out of a and into b.
  void drive(int a, int b, int column, double amps) {
    if (a != ground) rhs(a, column) -= amps;
    if (b != ground) rhs(b, column) += amps;
  }
};

MatrixXd port_admittance(const elements& e, double h) {
  const auto all = static_cast<Eigen::Index>(e.ports.size());
  if (all == 0) return {};
  MatrixXd z(all, all);
  for (Eigen::Index k = 0; k < all; ++k) {
    for (Eigen::Index m = 0; m < all; ++m) {
      const auto at = static_cast<std::size_t>(k * all + m);
      z(k, m) = e.r[at] + e.l[at] / h;
    }
  }
  return z.partialPivLu().inverse();
}

// What drives each port beside node p: the history of the leakage currents, port by column of the right-hand sides.
MatrixXd port_history(const elements& e, double h, const columns& col) {
  const std::size_t all = e.ports.size();
  MatrixXd history = MatrixXd::Zero(static_cast<Eigen::Index>(all), col.all);
  for (std::size_t k = 0; k < all; ++k) {
    for (std::size_t m = 0; m < all; ++m) {
      if (e.ports[m].current >= 0) history(static_cast<Eigen::Index>(k), e.ports[m].current) += e.l[k * all + m] / h;
    }
  }
  return history;
}

void add_ports(const elements& e, double h, const columns& col, const MatrixXd& y, equations& eq) {
  const auto all = static_cast<Eigen::Index>(e.ports.size());
  if (all == 0) return;
  // Each port's current over the node volts: y (n v_p - v_hot + v_ret + history).
  MatrixXd incidence_of_ports = MatrixXd::Zero(all, e.nodes);
  for (Eigen::Index k = 0; k < all; ++k) {
    const si_port& p = e.ports[static_cast<std::size_t>(k)];
    incidence_of_ports(k, 0) = p.n;
    incidence_of_ports(k, p.hot) = -1;
    if (p.ret != ground) incidence_of_ports(k, p.ret) = 1;
    eq.conduct(p.hot, p.ret, p.load_g + leak);
  }
  eq.g += incidence_of_ports.transpose() * y * incidence_of_ports;
  eq.rhs -= incidence_of_ports.transpose() * (y * port_history(e, h, col));
}

equations fill(const elements& e, double h, const columns& col, const MatrixXd& y) {
  equations eq{MatrixXd::Zero(e.nodes, e.nodes), MatrixXd::Zero(e.nodes, col.all)};
  const double line = 1 / (e.r1 + e.l1 / h);
  eq.conduct(0, ground, line + e.core_g + (e.lm > 0 ? h / e.lm : 0));
  eq.rhs(0, col.mains) += line;
  if (e.line_current >= 0) eq.rhs(0, e.line_current) += line * e.l1 / h;
  if (e.magnetising >= 0) eq.rhs(0, e.magnetising) -= 1;
  add_ports(e, h, col, y, eq);
  for (const si_capacitor& c : e.capacitors) {
    const double g = 1 / (c.esr + h / c.c);
    eq.conduct(c.top, c.bottom, g);
    eq.drive(c.top, c.bottom, c.volts_state, -g);
  }
  for (const si_choke& l : e.chokes) {
    const double g = 1 / (l.r + l.l / h);
    eq.conduct(l.from, l.to, g);
    eq.drive(l.from, l.to, l.current_state, g * l.l / h);
  }
  for (const si_link& l : e.links) eq.conduct(l.from, l.to, l.g);
  for (const si_rail& r : e.rails) {
    for (const si_node& n : r.nodes) {
      eq.conduct(n.at, ground, n.load_g);
      eq.drive(n.at, ground, col.one, n.sink);
    }
  }
  for (std::size_t j = 0; j < e.diodes.size(); ++j) {
    const incidence& a = e.diodes[j].across;
    for (int i = 0; i < a.count; ++i) {
      eq.rhs(a.node[i], col.first_current + static_cast<int>(j)) -= a.c[i];
      for (int k = 0; k < a.count; ++k) eq.g(a.node[i], a.node[k]) += leak * a.c[i] * a.c[k];
    }
  }
  return eq;
}

row_of across(const stage& s, int a, int b) {
  row_of row = row_of::Zero(s.nodes.cols());
  if (a != ground) row += s.nodes.row(a);
  if (b != ground) row -= s.nodes.row(b);
  return row;
}

}  // namespace

stage stage_of(const elements& e, double h) {
  const columns col(e);
  stage s;
  s.states = e.states;
  s.junctions = static_cast<int>(e.diodes.size());
  s.rows = (s.states + s.junctions + 3) / 4 * 4;
  s.h = h;
  s.port_y = port_admittance(e, h);
  const equations eq = fill(e, h, col, s.port_y);
  const Eigen::LLT<MatrixXd> solved(eq.g);
  if (solved.info() != Eigen::Success) throw std::logic_error("a network that is not passive");
  s.nodes = solved.solve(eq.rhs);

  MatrixXd map = MatrixXd::Zero(s.rows, col.all);
  for (const si_capacitor& c : e.capacitors) {
    map.row(c.volts_state) = h / c.c * capacitor_current_row(e, s, static_cast<int>(&c - e.capacitors.data()));
    map(c.volts_state, c.volts_state) += 1;
  }
  for (const si_choke& l : e.chokes)
    map.row(l.current_state) = choke_current_row(e, s, static_cast<int>(&l - e.chokes.data()));
  for (std::size_t k = 0; k < e.ports.size(); ++k) {
    if (e.ports[k].current >= 0) map.row(e.ports[k].current) = port_current_row(e, s, static_cast<int>(k));
  }
  if (e.line_current >= 0) map.row(e.line_current) = line_current_row(e, s);
  if (e.magnetising >= 0) {
    map.row(e.magnetising) = h / e.lm * s.nodes.row(0);
    map(e.magnetising, e.magnetising) += 1;
  }
  for (int j = 0; j < s.junctions; ++j) {
    const si_diode& d = e.diodes[static_cast<std::size_t>(j)];
    for (int i = 0; i < d.across.count; ++i) map.row(s.states + j) += d.across.c[i] * s.nodes.row(d.across.node[i]);
    map(s.states + j, col.first_current + j) -= d.j.series;
  }
  const auto keep = [&](int from, int count) {
    return std::vector<double>(map.data() + static_cast<std::ptrdiff_t>(from) * s.rows,
                               map.data() + static_cast<std::ptrdiff_t>(from + count) * s.rows);
  };
  s.m = keep(0, s.states);
  s.by_mains = keep(col.mains, 1);
  s.by_one = keep(col.one, 1);
  s.c = keep(col.first_current, s.junctions);
  return s;
}

row_of node_volts_row(const elements&, const stage& s, int node) { return across(s, node, ground); }

row_of port_volts_row(const elements& e, const stage& s, int port) {
  const si_port& p = e.ports[static_cast<std::size_t>(port)];
  return across(s, p.hot, p.ret);
}

row_of port_current_row(const elements& e, const stage& s, int port) {
  const std::size_t all = e.ports.size();
  row_of row = row_of::Zero(s.nodes.cols());
  for (std::size_t m = 0; m < all; ++m) {
    const double y = s.port_y(port, static_cast<Eigen::Index>(m));
    row += y * (e.ports[m].n * s.nodes.row(0) - port_volts_row(e, s, static_cast<int>(m)));
    for (std::size_t n = 0; n < all; ++n) {
      if (e.ports[n].current >= 0) row(e.ports[n].current) += y * e.l[m * all + n] / s.h;
    }
  }
  return row;
}

row_of line_current_row(const elements& e, const stage& s) {
  const double y = 1 / (e.r1 + e.l1 / s.h);
  row_of row = -y * s.nodes.row(0);
  row(e.states) += y;
  if (e.line_current >= 0) row(e.line_current) += y * e.l1 / s.h;
  return row;
}

row_of capacitor_current_row(const elements& e, const stage& s, int capacitor) {
  const si_capacitor& c = e.capacitors[static_cast<std::size_t>(capacitor)];
  row_of row = across(s, c.top, c.bottom);
  row(c.volts_state) -= 1;
  return row / (c.esr + s.h / c.c);
}

row_of choke_current_row(const elements& e, const stage& s, int choke) {
  const si_choke& l = e.chokes[static_cast<std::size_t>(choke)];
  row_of row = across(s, l.from, l.to);
  row(l.current_state) += l.l / s.h;
  return row / (l.r + l.l / s.h);
}

row_of link_current_row(const elements& e, const stage& s, int link) {
  const si_link& l = e.links[static_cast<std::size_t>(link)];
  return across(s, l.from, l.to) * l.g;
}

}  // namespace turnwright::supply::kernel
