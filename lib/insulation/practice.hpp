/// Margins, interlayer, wraps and test volts of a careful winder.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/measure/stated.hpp>

#include <vector>

namespace turnwright {

/// A figure with the reason for it, for the list of assumptions.
struct reasoned_length {
  metres value;
  std::string why;
};

/// The tables of insulation practice.
class insulation_book {
 public:
  /// Builds the book. Throws `refused` with all faults.
  explicit insulation_book(const catalogue& tables);

  /// End margin of a paper-layer winding [m]: the larger of that for the gauge and that for the working volts.
  /// Beyond the last row of the voltage table its last margin grows in proportion.
  reasoned_length end_margin(metres bare, volts_rms working) const;
  /// Paper between layers by gauge [m], at least 0.05 mm where the layer-to-layer volts exceed 100 V r.m.s.
  reasoned_length interlayer(metres bare, volts_rms between_layers) const;
  /// Test volts, one minute, by working volts [V r.m.s.]: guidance, recalled. Beyond the table in proportion.
  volts_rms test_basic(volts_rms working) const;
  volts_rms test_reinforced(volts_rms working) const;
  /// Breakdown volts of a twisted pair of enamelled wire [V r.m.s.] of grade 1, 2 or 3: the acceptance figure of new
  /// wire.
  std::optional<volts_rms> enamel_breakdown(metres bare, int grade) const;

 private:
  struct by_gauge {
    double bare_least_m, margin_m, interlayer_m;
  };
  struct by_volts {
    double working_v, margin_m;
  };
  struct test {
    double working_v, basic_v, reinforced_v;
  };
  struct breakdown {
    double bare_m;
    std::optional<double> grade_v[3];
  };
  std::vector<by_gauge> gauges_;
  std::vector<by_volts> volts_;
  std::vector<test> tests_;
  std::vector<breakdown> breakdowns_;
};

/// Thickness of wraps, from practice (memory).
namespace wraps {
inline constexpr metres over_former = as<metres>(0.15e-3);
inline constexpr metres ordinary = as<metres>(0.3e-3);         ///< three layers of paper
inline constexpr metres floating_heater = as<metres>(0.4e-3);  ///< either side of a heater that rides on the HT
inline constexpr metres outer = as<metres>(0.25e-3);
inline constexpr metres screen_foil = as<metres>(0.05e-3);
inline constexpr metres safety_screen_foil = as<metres>(0.13e-3);
inline constexpr metres beside_screen = as<metres>(0.15e-3);
}  // namespace wraps

}  // namespace turnwright
