#include <turnwright/thermal/balance.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

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

}  // namespace

// Conductances between core (0), coil surface (1), the mean of each winding and its mid-plane. A slab heated throughout
// is its two halves t / 2k in series through the mid-plane, with -t / 6k from there to its mean: exact for any share of
// heat to either face. Only the two surfaces change with their rise, so the rest is factored once and they are a
// correction of rank two.
struct heat_balance::network {
  explicit network(const heated_coil& c) : c_(c), nodes_(2 * static_cast<Eigen::Index>(c.windings.size()) + 2) {
    fixed_ = Eigen::MatrixXd::Zero(nodes_, nodes_);
    for (std::size_t i = 0; i < c.windings.size(); ++i) {
      join(mean(i), middle(i), -3 / half_slab(c.windings[i]));
      along_limb(i);
    }
    across_layers();
    surface_m2_ = end_length(outside_of_coil()) * plain(c.windings.back().height) + end_faces_m2_;
    fixed_(0, 0) += base_W_per_m2K * plain(c.core_surface);
    fixed_(1, 1) += base_W_per_m2K * surface_m2_;
    factored_ = fixed_.partialPivLu();
    to_surfaces_ = factored_.solve(Eigen::MatrixXd::Identity(nodes_, 2));
  }

  heat_state solve(watts core_loss, const std::vector<watts>& losses) const {
    Eigen::VectorXd heat = Eigen::VectorXd::Zero(nodes_);
    heat(0) = plain(core_loss);
    for (std::size_t i = 0; i < losses.size(); ++i) heat(mean(i)) = plain(losses[i]);
    const Eigen::VectorXd base = factored_.solve(heat);
    heat_state out;
    Eigen::Vector2d at = base.head<2>(), conductance, excess;
    for (out.steps = 1; out.steps <= 80; ++out.steps) {
      conductance = {core_W_per_K(at(0)), surface_W_per_K(at(1))};
      excess = {conductance(0) - base_W_per_m2K * plain(c_.core_surface),
                conductance(1) - base_W_per_m2K * surface_m2_};
      const Eigen::Matrix2d m = Eigen::Matrix2d::Identity() + to_surfaces_.topRows<2>() * excess.asDiagonal();
      const Eigen::Vector2d next = m.inverse() * base.head<2>();
      const double change = (next - at).cwiseAbs().sum();
      at = next;
      if (change < 1e-10) break;
    }
    const Eigen::VectorXd rise = base - to_surfaces_ * (excess.asDiagonal() * at);
    const double away = at(0) * core_W_per_K(at(0)) + at(1) * surface_W_per_K(at(1));
    out.core = as<kelvins>(at(0));
    for (std::size_t i = 0; i < losses.size(); ++i) out.windings.push_back(as<kelvins>(rise(mean(i))));
    out.to_air = as<watts>(away);
    out.residual = heat.sum() > 0 ? (heat.sum() - away) / heat.sum() : 0.0;
    return out;
  }

  double core_W_per_K(double rise) const {
    return surface_coefficient(rise, plain(c_.core_height), c_.ambient.value()) * plain(c_.core_surface);
  }
  double surface_W_per_K(double rise) const {
    return surface_coefficient(rise, plain(c_.windings.back().height), c_.ambient.value()) * surface_m2_;
  }
  static Eigen::Index mean(std::size_t winding) { return static_cast<Eigen::Index>(winding) + 2; }
  Eigen::Index middle(std::size_t winding) const {
    return mean(winding) + static_cast<Eigen::Index>(c_.windings.size());
  }
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
         in_series({slab / share_window, wrap / (window_length() * height),
                    1 / ((k_air / gap + h_gap_radiation) * window_length() * height)}));
    join(middle(ws.size() - 1), 1, in_series({slab / share_end, wrap / (end_length(out) * height)}));
  }

  // Along the limb: in the windows to the yokes, elsewhere to the coil's free end faces.
  void along_limb(std::size_t i) {
    const heated_winding& w = c_.windings[i];
    const double at = (plain(w.inner) + plain(w.outer)) / 2, thick = plain(w.outer) - plain(w.inner);
    const double half = plain(w.height) / 2, to_face = half / (3 * plain(w.axial));
    const double cheek = plain(w.end_space) / k_wall, gap = 0.5e-3 / k_air;
    const double in_window = 2 * window_length() * thick, at_ends = 2 * end_length(at) * thick;
    join(mean(i), 0, in_window / (to_face + cheek + 1 / (1 / gap + h_gap_radiation)));
    join(mean(i), 1, at_ends / (to_face + cheek));
    end_faces_m2_ += at_ends;
  }

  static constexpr double base_W_per_m2K = 12;  // near what surfaces have, so that the correction stays small
  heated_coil c_;
  Eigen::Index nodes_;
  Eigen::MatrixXd fixed_, to_surfaces_;
  Eigen::PartialPivLU<Eigen::MatrixXd> factored_;
  double end_faces_m2_ = 0, surface_m2_ = 0;
};

heat_balance::heat_balance(const heated_coil& coil) : network_(std::make_shared<const network>(coil)) {}

heat_state heat_balance::solve(watts core_loss, const std::vector<watts>& losses) const {
  if (losses.size() != network_->c_.windings.size()) throw std::logic_error("a loss for each winding");
  return network_->solve(core_loss, losses);
}

kelvins surface_rule(watts loss, square_metres surface) {
  return as<kelvins>(450 * std::pow(plain(loss) / (plain(surface) * 1e4), 0.826));
}

}  // namespace turnwright::thermal
