/// Amplifying valves: heaters, typical currents, and what output stages draw.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/measure/stated.hpp>
#include <turnwright/valve/known_figure.hpp>
#include <turnwright/valve/rectifier.hpp>

#include <optional>
#include <string>
#include <vector>

namespace turnwright {

struct amplifying_valve {
  std::string name;
  std::vector<std::string> also;
  std::string function;  ///< "double triode", "output pentode"
  known_figure<heating> heated;
  known_figure<volts> heater_volts;
  known_figure<amperes> heater_current;
  known_figure<volts> other_heater_volts;  ///< the same heater connected the other way
  known_figure<amperes> other_heater_current;
  known_figure<volts> heater_cathode;       ///< greatest of the cathode over the heater
  known_figure<volts> heater_positive;      ///< greatest of the heater over the cathode
  known_figure<amperes_dc> anode_current;   ///< typical, class A, of each section
  known_figure<amperes_dc> screen_current;  ///< typical, class A
  int sections = 1;                         ///< how many of them draw the typical current
  std::string condition;                    ///< of the typical currents
  std::string note;
  standing known_how = standing::estimate;
  std::string source;
};

enum class confidence { low, medium, high };

/// The word for a confidence.
std::string_view word_of(confidence c);

/// What an output stage draws.
struct output_stage {
  std::string type;
  std::string operation;  ///< "A1", "AB1", "AB2", "B"
  int valves = 2;         ///< how many the currents and the power are for
  std::string how;        ///< bias and connection
  std::optional<volts_dc> anode_volts, screen_volts;
  std::optional<amperes_dc> anode_idle, anode_full, screen_idle, screen_full;
  std::optional<watts> power;
  std::optional<ohms> load;
  confidence trust = confidence::low;
  std::string note;
  standing known_how = standing::estimate;
  std::string source;
};

/// An amplifying valve from a row of its table. Throws `refused`.
amplifying_valve amplifier_of_row(const row& r);
/// An output stage from a row of its table. Throws `refused`.
output_stage stage_of_row(const row& r);

}  // namespace turnwright
