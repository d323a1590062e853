#include <turnwright/iron/steel.hpp>

#include <cmath>
#include <stdexcept>

#include <turnwright/measure/constants.hpp>

#include <math.h>  // pchip of Boost 1.74 asks for the global isnan

#include <boost/math/interpolators/pchip.hpp>

namespace turnwright {

struct magnetisation_curve::inside {
  double first_b, first_h, last_b, last_h;
  boost::math::interpolators::pchip<std::vector<double>> ln_h;
};

magnetisation_curve::magnetisation_curve(const std::vector<magnetisation_point>& points, bool polarisation) {
  std::vector<double> b, ln_h;
  for (const magnetisation_point& p : points) {
    const double h = plain(p.field);
    b.push_back(plain(p.value) + (polarisation ? mu0_H_per_m * h : 0.0));
    ln_h.push_back(std::log(h));
    const std::size_t n = b.size();
    if (!(h > 0) || !(b.back() > 0) || (n > 1 && (b[n - 1] <= b[n - 2] || ln_h[n - 1] <= ln_h[n - 2]))) {
      throw std::logic_error("a magnetisation curve that rises from above zero");
    }
  }
  if (b.size() < 4) throw std::logic_error("a magnetisation curve of four points or more");
  const double first_h = std::exp(ln_h.front()), last_h = std::exp(ln_h.back()), first_b = b.front(), last_b = b.back();
  inside_ = std::make_shared<const inside>(
      inside{first_b, first_h, last_b, last_h,
             boost::math::interpolators::pchip<std::vector<double>>(std::move(b), std::move(ln_h))});
}

amperes_per_metre magnetisation_curve::field(teslas flux_density) const {
  const double b = std::abs(plain(flux_density));
  const double h = b <= inside_->first_b  ? inside_->first_h * b / inside_->first_b
                   : b >= inside_->last_b ? inside_->last_h + (b - inside_->last_b) / mu0_H_per_m
                                          : std::exp(inside_->ln_h(b));
  return as<amperes_per_metre>(std::copysign(h, plain(flux_density)));
}

}  // namespace turnwright
