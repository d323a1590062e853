/// Electrical steel: magnetisation and loss of a grade.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/measure/quantity.hpp>

#include <memory>
#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// A point of a magnetisation curve as it was read.
struct magnetisation_point {
  teslas value;
  amperes_per_metre field;
};

/// Field against flux density: monotone, through the origin, with slope mu0 beyond the last point.
class magnetisation_curve {
 public:
  /// `polarisation`: the points give J = B - mu0 H. Four points or more, rising in both; throws std::logic_error
  /// otherwise.
  magnetisation_curve(const std::vector<magnetisation_point>& points, bool polarisation);

  /// Field at a flux density [A/m]: monotone cubic in ln H over B between the points (Fritsch and Butland 1984),
  /// straight to the origin below the first, slope mu0 beyond the last.
  amperes_per_metre field(teslas b) const;

 private:
  struct inside;
  std::shared_ptr<const inside> inside_;
};

/// A point of a loss curve.
struct loss_point {
  hertz frequency;
  teslas flux_density;
  watts_per_kilogram loss;
};

struct steel_loss {
  watts_per_kilogram value;
  bool beyond_curve = false;  ///< the flux density lies outside the points that were read
};

enum class steel_kind { non_oriented, oriented, old };

struct steel {
  std::string name;
  std::vector<std::string> also;
  steel_kind kind = steel_kind::non_oriented;
  metres sheet;
  kilograms_per_cubic_metre density;
  double stacking_factor = 0.95;  ///< least of the sheet, not of a stack
  watts_per_kilogram rated_loss;  ///< greatest, at rated_flux_density and rated_frequency
  teslas rated_flux_density;
  hertz rated_frequency;
  double hysteresis_ratio = 0.7;   ///< share of the loss at 50 Hz
  teslas flux_nominal;             ///< quiet working peak at nominal mains
  teslas flux_high;                ///< just under the knee, for the highest mains
  std::string magnetisation_from;  ///< name of the curve; another than the grade's is borrowed
  std::string loss_from;
  double loss_scale = 1.0;  ///< of a borrowed loss curve, to the rated loss
  std::vector<magnetisation_point> magnetisation;
  bool polarisation = true;
  std::vector<loss_point> loss_curve;  ///< as read, not scaled
  standing known_how = standing::estimate;
  std::string source;
};

/// Whether the grade borrows a curve from another.
bool borrows(const steel& s);

/// Specific loss of a sheet under sine flux, made ready for many questions.
///
/// Log-log between the points of a curve at its frequency; between frequencies by the two-term split p_h f + p_e f^2,
/// from two curves where there are two, else with the grade's hysteresis share at 50 Hz. Beyond a curve's ends the last
/// piece goes on, flagged. Source: two-term split, derived from the loss curves. Checked: tests/iron/steel.cpp, M-19 at
/// 60 Hz.
class loss_law {
 public:
  explicit loss_law(const steel& s);
  /// Specific loss at a peak flux density and frequency [W/kg].
  steel_loss at(teslas b, hertz f) const;

 private:
  struct curve {
    double frequency_hz;
    std::vector<double> ln_b, ln_p;
  };
  struct found {
    double w_per_kg;
    bool beyond;
  };
  static found on(const curve& c, double b);
  double hysteresis_ratio_;
  double scale_;
  std::vector<curve> curves_;  // by frequency, lowest first
};

/// All grades.
class steel_book {
 public:
  /// Builds the book and checks every row and curve. Throws `refused` with all faults.
  explicit steel_book(const catalogue& tables);

  std::span<const steel> all() const { return grades_; }
  /// The grade of a name or alias. Throws `refused` naming `where` when there is none or more than one.
  const steel& named(std::string_view name, const std::string& where) const;

 private:
  std::vector<steel> grades_;
};

}  // namespace turnwright
