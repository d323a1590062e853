#include <turnwright/winding/leakage.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include <turnwright/measure/constants.hpp>

namespace turnwright {
namespace {

using std::numbers::pi;

struct coil_si {
  struct piece {
    double inner, outer, share;
  };
  std::vector<piece> pieces;
  double height;

  explicit coil_si(const stray_coil& c) : height(plain(c.height)) {
    for (const stray_piece& p : c.pieces) pieces.push_back({plain(p.inner), plain(p.outer), p.share});
  }
  // Part of the ampere-turns that lies inside x.
  double inside(double x) const {
    double sum = 0;
    for (const piece& p : pieces) sum += p.share * std::clamp((x - p.inner) / (p.outer - p.inner), 0.0, 1.0);
    return sum;
  }
  double innermost() const {
    return std::min_element(pieces.begin(), pieces.end(), [](auto& a, auto& b) { return a.inner < b.inner; })->inner;
  }
  double outermost() const {
    return std::max_element(pieces.begin(), pieces.end(), [](auto& a, auto& b) { return a.outer < b.outer; })->outer;
  }
};

double rogowski(double height, double field_width) {
  const double t = pi * height / field_width;
  return 1 - (1 - std::exp(-t)) / t;
}

// Integral of (F_a - F_1)(F_b - F_1) l(x): piecewise cubic, so Simpson's rule is exact on each piece.
double energy_integral(const coil_si& a, const coil_si& b, const coil_si& first, const std::vector<double>& edges,
                       double around) {
  const auto at = [&](double x) {
    return (a.inside(x) - first.inside(x)) * (b.inside(x) - first.inside(x)) * (around + 2 * pi * x);
  };
  double sum = 0;
  for (std::size_t i = 0; i + 1 < edges.size(); ++i) {
    const double from = edges[i], to = edges[i + 1];
    sum += (to - from) / 6 * (at(from) + 4 * at((from + to) / 2) + at(to));
  }
  return sum;
}

}  // namespace

std::vector<henries> leakage_against_first(const std::vector<stray_coil>& coils, const stray_space& space, turns n) {
  std::vector<coil_si> si;
  std::vector<double> edges;
  for (const stray_coil& c : coils) {
    si.emplace_back(c);
    for (const auto& p : si.back().pieces) {
      edges.push_back(p.inner);
      edges.push_back(p.outer);
    }
  }
  std::sort(edges.begin(), edges.end());
  const coil_si& first = si.front();
  const std::size_t loops = coils.size() - 1;
  std::vector<double> factor;  // sqrt(K / b) of each loop
  for (std::size_t j = 0; j < loops; ++j) {
    const coil_si& c = si[j + 1];
    const double height = (c.height + first.height) / 2;
    const double width = std::max(c.outermost(), first.outermost()) - std::min(c.innermost(), first.innermost());
    factor.push_back(std::sqrt(rogowski(height, width) / height));
  }
  std::vector<henries> matrix(loops * loops);
  const double scale = mu0_H_per_m * n.count() * n.count();
  for (std::size_t j = 0; j < loops; ++j) {
    for (std::size_t m = j; m < loops; ++m) {
      const double l =
          scale * factor[j] * factor[m] * energy_integral(si[j + 1], si[m + 1], first, edges, plain(space.around));
      matrix[j * loops + m] = matrix[m * loops + j] = as<henries>(l);
    }
  }
  return matrix;
}

henries pair_leakage(const stray_coil& first, const stray_coil& second, const stray_space& space, turns n) {
  return leakage_against_first({first, second}, space, n).front();
}

}  // namespace turnwright
