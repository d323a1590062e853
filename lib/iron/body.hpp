/// An assembled core: sheets stacked, with its area, path, mass and no-load behaviour.
#pragma once

#include <turnwright/iron/lamination.hpp>
#include <turnwright/iron/steel.hpp>
#include <turnwright/measure/stated.hpp>
#include <turnwright/measure/turns.hpp>

namespace turnwright {

enum class stacking { interleaved, in_pairs, butt };

/// The word for a stacking style: "interleaved", "in pairs", "butt".
std::string_view word_of(stacking s);

/// What a core is made of.
struct core_choice {
  lamination pattern;
  metres stack;
  steel grade;
  double stacking_factor = 0.95;  ///< iron over gross, of the assembled stack
  stacking style = stacking::interleaved;
};

/// Stacking factor of a hand-laid stack by sheet thickness, from practice (memory): 0.92 for 0.5 mm, 0.91 for 0.35 mm,
/// 0.88 for old sheet.
double usual_stacking_factor(const steel& s);

/// An assembled core.
class core_body {
 public:
  explicit core_body(core_choice choice);

  const core_choice& choice() const { return choice_; }
  /// Net iron area of the wound limb [m2].
  square_metres net_area() const { return net_area_; }
  /// Mean flux path [m].
  metres path() const { return path_; }
  /// Mass of iron [kg].
  kilograms mass() const { return mass_; }
  /// Number of sheets, whole: the stack over the sheet, by the stacking factor.
  int sheets() const;
  /// Surface that air can reach, coil window and limb inside the coil left out [m2].
  square_metres exposed_surface() const;

  /// Iron loss at a peak flux density and frequency [W]: specific loss x mass x building factor.
  watts loss(teslas b, hertz f) const;
  /// Whether that loss had to be read beyond the curve's ends.
  bool loss_beyond_curve(teslas b, hertz f) const { return loss_.at(b, f).beyond_curve; }
  /// Magnetising current with n turns at a sine flux of peak b, without the loss component [A r.m.s.].
  ///
  ///   i(t) = (H(B sin wt) l + B sin wt delta / mu0) / N, r.m.s. over a cycle
  ///
  /// delta is the equivalent gap of the loop's joints. Source: circuital law (exact); joints from practice (memory).
  amperes_rms magnetising_current(teslas b, turns n) const;
  /// Equivalent gap of all joints in the loop [m], from practice (memory).
  metres joint_gap() const;
  /// Loss of the assembled core over that of the sheet, from practice (memory): EI non-oriented 1.2, oriented 1.5;
  /// one-piece M patterns 1.15 and 1.4.
  double building_factor() const;

 private:
  core_choice choice_;
  magnetisation_curve curve_;
  loss_law loss_;
  square_metres net_area_;
  metres path_;
  kilograms mass_;
};

}  // namespace turnwright
