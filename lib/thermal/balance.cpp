#include <turnwright/thermal/balance.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include <Eigen/Dense>

namespace turnwright::thermal {
namespace {

using std::numbers::pi;

constexpr double k_air = 0.028;        // W/mK at 60 degC (memory)
constexpr double k_wall = 0.25;        // W/mK moulded or pressboard former (memory)
constexpr double k_wrap = 0.16;        // W/mK paper (memory)
constexpr double h_gap_radiation = 5;  // W/m2K across a narrow warm gap (estimate)
constexpr double stefan = 5.67e-8;     // W/m2K4
constexpr double emissivity = 0.85;    // varnished iron and paper (memory)

double surface_coefficient(double rise, double height, double ambient_K) {
  const double warm = std::max(rise, 0.01), hot_K = ambient_K + warm;
  return 1.42 * std::pow(warm / height, 0.25) +
         emissivity * stefan * (hot_K * hot_K + ambient_K * ambient_K) * (hot_K + ambient_K);
}

double in_series(std::initializer_list<double> resistances) {
  double sum = 0;
  for (double r : resistances) sum += r;
  return 1 / sum;
}

// Conductances between core (0), coil surface (1), the mean of each winding and its mid-plane, built once: only the
// surfaces change with rise. A slab heated throughout is its two halves t / 2k in series through the mid-plane, with
// -t / 6k from there to its mean: exact for any share of heat to either face.
class network {
 public:
  explicit network(const heated_coil& c) : c_(c), nodes_(2 * static_cast<Eigen::Index>(c.windings.size()) + 2) {
    fixed_ = Eigen::MatrixXd::Zero(nodes_, nodes_);
    heat_ = Eigen::VectorXd::Zero(nodes_);
    heat_(0) = plain(c.core_loss);
    for (std::size_t i = 0; i < c.windings.size(); ++i) {
      heat_(mean(i)) = plain(c.windings[i].loss);
      join(mean(i), middle(i), -3 / half_slab(c.windings[i]));
      along_limb(i);
    }
    across_layers();
    const heated_winding& last = c.windings.back();
    surface_m2_ = end_length(outside_of_coil()) * plain(last.height) + end_faces_m2_;
  }

  heat_state solve() const {
    const double ambient_K = c_.ambient.value();
    double core = 30, surface = 30;
    heat_state out;
    Eigen::VectorXd rise = Eigen::VectorXd::Constant(nodes_, 30.0);
    for (out.steps = 1; out.steps <= 60; ++out.steps) {
      Eigen::MatrixXd g = fixed_;
      g(0, 0) += surface_coefficient(core, plain(c_.core_height), ambient_K) * plain(c_.core_surface);
      g(1, 1) += surface_coefficient(surface, plain(c_.windings.back().height), ambient_K) * surface_m2_;
      rise = g.partialPivLu().solve(heat_);
      const double change = std::abs(rise(0) - core) + std::abs(rise(1) - surface);
      core = rise(0);
      surface = rise(1);
      if (change < 1e-10) break;
    }
    const double away = core * surface_coefficient(core, plain(c_.core_height), ambient_K) * plain(c_.core_surface) +
                        surface * surface_coefficient(surface, plain(c_.windings.back().height), ambient_K) * surface_m2_;
    out.core = as<kelvins>(core);
    out.coil_surface = as<kelvins>(surface);
    for (std::size_t i = 0; i < c_.windings.size(); ++i) out.windings.push_back(as<kelvins>(rise(mean(i))));
    out.to_air = as<watts>(away);
    out.residual = heat_.sum() > 0 ? (heat_.sum() - away) / heat_.sum() : 0.0;
    return out;
  }

 private:
  static Eigen::Index mean(std::size_t winding) { return static_cast<Eigen::Index>(winding) + 2; }
  Eigen::Index middle(std::size_t winding) const { return mean(winding) + static_cast<Eigen::Index>(c_.windings.size()); }
  double window_length() const { return 2 * plain(c_.stack); }
  double end_length(double x) const { return 2 * plain(c_.tongue) + 2 * pi * x; }
  double turn(double x) const { return window_length() + end_length(x); }
  double outside_of_coil() const { return plain(c_.windings.back().outer) + plain(c_.outer_wrap); }

  void join(Eigen::Index a, Eigen::Index b, double conductance) {
    fixed_(a, a) += conductance;
    fixed_(b, b) += conductance;
    fixed_(a, b) -= conductance;
    fixed_(b, a) -= conductance;
  }

  // Half of the winding's thickness, all round.
  double half_slab(const heated_winding& w) const {
    const double area = turn((plain(w.inner) + plain(w.outer)) / 2) * plain(w.height);
    return (plain(w.outer) - plain(w.inner)) / (2 * plain(w.radial) * area);
  }

  void across_layers() {
    const auto& ws = c_.windings;
    const double first_x = plain(ws.front().inner), first_area = turn(first_x) * plain(ws.front().height);
    const double wall = plain(c_.former_air) / k_air + plain(c_.former_wall) / k_wall +
                        std::max(0.0, first_x - plain(c_.former_air) - plain(c_.former_wall)) / k_wrap;
    join(0, middle(0), in_series({half_slab(ws.front()), wall / first_area}));
    for (std::size_t i = 0; i + 1 < ws.size(); ++i) {
      const double x = (plain(ws[i].outer) + plain(ws[i + 1].inner)) / 2;
      const double height = std::min(plain(ws[i].height), plain(ws[i + 1].height));
      const double wrap = std::max(0.0, plain(ws[i + 1].inner) - plain(ws[i].outer)) / (k_wrap * turn(x) * height);
      join(middle(i), middle(i + 1), in_series({half_slab(ws[i]), wrap, half_slab(ws[i + 1])}));
    }
    // Outer face: in the windows across air to the outer limbs, elsewhere to the coil's free surface.
    const heated_winding& last = ws.back();
    const double out = outside_of_coil(), height = plain(last.height);
    const double wrap = plain(c_.outer_wrap) / k_wrap, gap = std::max(0.2e-3, plain(c_.window_width) - out);
    const double share_window = window_length() / turn(out), share_end = 1 - share_window;
    const double slab = half_slab(last);
    join(middle(ws.size() - 1), 0,
         in_series({slab / share_window, wrap / (window_length() * height), 1 / ((k_air / gap + h_gap_radiation) * window_length() * height)}));
    join(middle(ws.size() - 1), 1, in_series({slab / share_end, wrap / (end_length(out) * height)}));
  }

  // Along the limb: in the windows to the yokes, elsewhere to the coil's free end faces.
  void along_limb(std::size_t i) {
    const heated_winding& w = c_.windings[i];
    const double at = (plain(w.inner) + plain(w.outer)) / 2, thick = plain(w.outer) - plain(w.inner);
    const double half = plain(w.height) / 2, to_face = half / (3 * plain(w.axial));
    const double cheek = plain(c_.end_space) / k_wall, gap = 0.5e-3 / k_air;
    const double in_window = 2 * window_length() * thick, at_ends = 2 * end_length(at) * thick;
    join(mean(i), 0, in_window / (to_face + cheek + 1 / (1 / gap + h_gap_radiation)));
    join(mean(i), 1, at_ends / (to_face + cheek));
    end_faces_m2_ += at_ends;
  }

  const heated_coil& c_;
  Eigen::Index nodes_;
  Eigen::MatrixXd fixed_;
  Eigen::VectorXd heat_;
  double end_faces_m2_ = 0, surface_m2_ = 0;
};

}  // namespace

heat_state balance(const heated_coil& coil) { return network(coil).solve(); }

kelvins surface_rule(watts loss, square_metres surface) {
  return as<kelvins>(450 * std::pow(plain(loss) / (plain(surface) * 1e4), 0.826));
}

}  // namespace turnwright::thermal
