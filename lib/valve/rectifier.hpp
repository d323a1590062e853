/// Rectifiers: valves, silicon diodes and bridges, with their ratings and drop.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/measure/stated.hpp>
#include <turnwright/valve/known_figure.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace turnwright {

enum class rectifier_sort { valve, diode, bridge };

/// The word for a sort: "rectifier valve", "silicon diode", "silicon bridge".
std::string_view word_of(rectifier_sort s);

enum class heating { direct, indirect };

/// The word for a manner of heating.
std::string_view word_of(heating h);

/// I = K V^1.5 for each anode of a valve.
struct three_halves_law {
  perveance each_anode;
};
/// V = drop + slope I for each anode or element.
struct straight_law {
  volts drop;
  ohms slope;
};
using rectifier_law = std::variant<three_halves_law, straight_law>;

/// Drop of one anode or element that carries a current [V]; none at no current.
///
///   V = (I / K)^(2/3), or V = drop + slope I
///
/// Source: three-halves law, as the listings of `tables/rectifiers.csv` have it (read).
/// Checked: tests/valve/rectifier.cpp, printed drops of three types.
volts drop_of(const rectifier_law& law, amperes carried);

/// Least resistance in each anode as the table has it: at volts, for a reservoir, or for all.
struct anode_resistance_point {
  std::optional<volts_rms> at;  ///< for each anode; nothing where the figure holds for all volts
  std::optional<farads> reservoir;
  ohms least;
  standing known_how = standing::estimate;
  std::string note;
  std::string source;
};

struct rectifier_type {
  std::string name;
  std::vector<std::string> also;
  rectifier_sort sort = rectifier_sort::valve;
  known_figure<int> anodes;  ///< 1 or 2 of a valve; of silicon 1, a bridge being four of them
  known_figure<heating> heated;
  known_figure<volts> heater_volts;
  known_figure<amperes> heater_current;
  known_figure<volts_peak> peak_inverse;      ///< of each anode or element
  known_figure<volts_rms> capacitor_input;    ///< greatest for each anode
  known_figure<volts_rms> choke_input;        ///< greatest for each anode
  known_figure<amperes_dc> direct_current;    ///< that the whole valve gives; of one diode; that a bridge gives
  known_figure<amperes_peak> peak_current;    ///< of each anode, steady
  known_figure<amperes_peak> transient_peak;  ///< of each anode or element, switching on
  known_figure<farads> reservoir_most;        ///< at the least anode resistance
  std::vector<anode_resistance_point> least_resistances;
  std::optional<rectifier_law> law;  ///< nothing where no drop is known
  standing law_known_how = standing::estimate;
  bool law_weak = false;
  known_figure<volts> drop;  ///< printed, of one anode; of silicon the greatest of one element. Need not lie on the law
  known_figure<amperes> drop_at;
  known_figure<volts> heater_cathode;  ///< greatest of the cathode over the heater
  known_figure<seconds> warm_up;
  std::string package;
  std::string note;
  standing known_how = standing::estimate;  ///< weakest of the figures of the table; the law has its own
  std::string source;
};

/// Drop and slope that `silicon` alone stands for, a working figure for any silicon diode (estimate).
inline constexpr volts silicon_drop = as<volts>(0.75);
inline constexpr ohms silicon_slope = as<ohms>(0.3);

/// The rectifier that is called `silicon`: a drop and nothing else.
rectifier_type plain_silicon();

/// Least resistance in each anode [ohm]: linear between the points of the table, held beyond its ends; nothing where
/// none is known. By volts where the points are at volts, by the reservoir where they are for reservoirs alone.
/// Source: tables/rectifier_resistances.csv. Checked: tests/valve/rectifier.cpp.
std::optional<ohms> least_anode_resistance(const rectifier_type& type, volts_rms each_anode, farads reservoir);

/// A rectifier valve from a row of its table, without its least resistances. Throws `refused`.
rectifier_type rectifier_of_row(const row& r);
/// A silicon diode or bridge from a row of its table. Its law is the line from `silicon_drop` through the greatest drop
/// (estimate). Throws `refused`.
rectifier_type diode_of_row(const row& r);
/// A point of least resistance from a row of its table. Throws `refused`.
anode_resistance_point resistance_of_row(const row& r);

}  // namespace turnwright
