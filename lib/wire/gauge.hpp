/// Round enamelled copper wire: sizes of the three systems, bare and over enamel.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/measure/quantity.hpp>

#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

enum class wire_system { metric, awg, swg };

/// The word for a wire system in a job: "metric", "awg", "swg".
std::string_view word_of(wire_system s);

/// Greatest diameter over one grade of enamel.
struct film {
  std::string grade;  ///< "1" "2" "3", or "single" "heavy" of the AWG system
  metres overall;
};

struct gauge {
  std::string size;  ///< "0.5 mm", "24 AWG", "33 SWG"
  std::vector<std::string> also;
  wire_system system = wire_system::metric;
  metres bare;                                     ///< nominal; AWG: the formula diameter of ASTM B258
  std::optional<metres> listed;                    ///< AWG: the rounded inch figure
  std::vector<film> films;                         ///< thinnest first; empty where the table has no figures
  std::optional<ohms_per_metre> resistance_least;  ///< limits of the standard at 20 degC
  std::optional<ohms_per_metre> resistance_most;
  standing known_how = standing::estimate;
  std::string source;
};

/// Cross-section of the bare wire [m2].
square_metres bare_area(const gauge& g);

/// Resistance of a metre of wire at 20 degC [ohm/m]: resistivity over nominal area, the design figure.
/// Source: IEC 60028 (1925), 1/58 ohm mm2/m (read). Checked: tests/wire/gauge.cpp.
ohms_per_metre resistance_at_20(const gauge& g);

/// Mass of a metre of bare wire [kg/m], at 8890 kg/m3.
kilograms_per_metre mass_per_metre(const gauge& g);

/// Diameter over the enamel of a grade, or nothing where the table has none. "single" and "heavy" stand for grades 1
/// and 2 in every system.
std::optional<metres> overall(const gauge& g, std::string_view grade);

/// The film of a grade, else the thickest that the table has for this size, or nothing where it has none.
const film* film_of(const gauge& g, std::string_view grade);

/// Diameter of an AWG number [m]: 0.127 mm x 92^((36 - n) / 39). Source: ASTM B258 (formula, read).
metres awg_diameter(double number);

/// The size a text names, or the nearest.
struct looked_up_gauge {
  gauge wire;
  bool exact = false;
};

/// The wire table of all systems.
class wire_book {
 public:
  /// Builds the book and checks every row. Throws `refused` with all faults: a film no thicker than the bare wire, a
  /// grade no thicker than the one before it, a bad number.
  explicit wire_book(const catalogue& tables);

  /// Sizes of a system, thinnest first.
  std::span<const gauge> sizes(wire_system s) const;
  /// The size a text names ("0.5 mm", "24 AWG", "33 SWG"), else the nearest of that system. Throws `refused` naming
  /// `where` for a text that is no wire size.
  looked_up_gauge look_up(std::string_view text, const std::string& where) const;
  /// The size of a system whose bare diameter is nearest by ratio.
  const gauge& nearest(wire_system s, metres bare) const;
  /// The thinnest size with film data and at least that area, or nothing.
  const gauge* at_least(wire_system s, square_metres area) const;
  /// The thickest size with film data. Throws std::logic_error where no size has any.
  const gauge& thickest(wire_system s) const;

 private:
  std::vector<gauge> metric_, awg_, swg_;
};

}  // namespace turnwright
