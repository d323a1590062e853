/// Lamination patterns with their usual stacks and moulded formers.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/measure/quantity.hpp>

#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

enum class pattern_family { ei, ei_wide, ei_inch, m, ui };

/// The word for a family, as it stands in the table.
std::string_view word_of(pattern_family f);

struct lamination {
  std::string name;
  std::vector<std::string> also;
  pattern_family family = pattern_family::ei;
  metres tongue;  ///< centre limb; of a UI pattern the limb that is wound
  metres outer_limb;
  metres window_width;   ///< across, from tongue to outer limb
  metres window_length;  ///< along the limb
  metres yoke;
  metres width;                ///< over all, across the limbs
  metres height;               ///< over all, along the limbs
  std::vector<metres> stacks;  ///< usual ones, least first
  standing known_how = standing::estimate;
  std::string source;
};

/// A shell pattern has its winding on a centre limb between two windows.
bool is_shell(const lamination& l);

/// Mean length of the flux path [m], with quarter-circle corners: straight along window, quarter circles in the
/// corners.
///
///   l = 2 (c + e) + pi (r1 + r2),  r1 = (t/4 + y/2) / 2 at the tongue (t/2 in place of t/4 for UI),  r2 = (o/2 + y/2)
///   / 2
///
/// c and e the window across and along, t tongue, o outer limb, y yoke.
///
/// Source: method of IEC 60205, derived from geometry; for a scrapless EI it is 11.14 times the window width.
/// Checked: tests/iron/lamination.cpp.
metres mean_path(const lamination& l);

/// Area of one sheet's face, windows taken off [m2]; holes are not known and not deducted.
square_metres face_area(const lamination& l);

/// A moulded former's room for winding.
struct moulded_former {
  std::string lamination;
  metres stack;
  metres winding_width;
  metres winding_height;
  standing known_how = standing::estimate;
};

/// All patterns.
class pattern_book {
 public:
  /// Builds the book and checks every row: the geometry has to close. Throws `refused` with all faults.
  explicit pattern_book(const catalogue& tables);

  /// All patterns, in the table's order.
  std::span<const lamination> all() const { return patterns_; }
  /// The pattern a name or alias fits, without regard to case, blanks and hyphens. Throws `refused` naming `where` when
  /// none or more than one does.
  const lamination& named(std::string_view name, const std::string& where) const;
  /// The moulded former for a pattern and stack (within 3 %), or nothing.
  const moulded_former* former_for(const lamination& l, metres stack) const;

 private:
  std::vector<lamination> patterns_;
  std::vector<moulded_former> formers_;
};

}  // namespace turnwright
