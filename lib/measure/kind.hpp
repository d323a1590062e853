/// What sort of quantity a text may hold, for reading and for telling a person what was expected.
#pragma once

#include <turnwright/measure/quantity.hpp>

#include <string_view>

namespace turnwright {

enum class kind {
  voltage,
  current,
  resistance,
  power,
  apparent_power,
  inductance,
  capacitance,
  flux_density,
  flux,
  frequency,
  time,
  length,
  area,
  mass,
  energy,
  temperature_point,
  temperature_rise,
  field,
  current_density,
  specific_loss,
  valve_constant,
  per_mass,
  ratio,
  resistance_per_length
};

/// How a kind is spoken of: "a voltage", "volts (V)", "230 V".
struct kind_words {
  std::string_view name;
  std::string_view units;
  std::string_view example;
};

/// Words for a kind.
kind_words words_of(kind k);

/// A ratio, read from "5 %", as its own type so that it is not mistaken for any other double.
struct ratio {
  double value = 0.0;
  friend constexpr auto operator<=>(const ratio&, const ratio&) = default;
};

template <class Q>
struct kind_of;
#define TURNWRIGHT_KIND(type, k)           \
  template <>                              \
  struct kind_of<type> {                   \
    static constexpr kind value = kind::k; \
  };
TURNWRIGHT_KIND(volts, voltage)
TURNWRIGHT_KIND(amperes, current)
TURNWRIGHT_KIND(ohms, resistance)
TURNWRIGHT_KIND(watts, power)
TURNWRIGHT_KIND(volt_amperes, apparent_power)
TURNWRIGHT_KIND(henries, inductance)
TURNWRIGHT_KIND(farads, capacitance)
TURNWRIGHT_KIND(teslas, flux_density)
TURNWRIGHT_KIND(webers, flux)
TURNWRIGHT_KIND(hertz, frequency)
TURNWRIGHT_KIND(seconds, time)
TURNWRIGHT_KIND(metres, length)
TURNWRIGHT_KIND(square_metres, area)
TURNWRIGHT_KIND(kilograms, mass)
TURNWRIGHT_KIND(joules, energy)
TURNWRIGHT_KIND(temperature, temperature_point)
TURNWRIGHT_KIND(kelvins, temperature_rise)
TURNWRIGHT_KIND(amperes_per_metre, field)
TURNWRIGHT_KIND(amperes_per_square_metre, current_density)
TURNWRIGHT_KIND(watts_per_kilogram, specific_loss)
TURNWRIGHT_KIND(perveance, valve_constant)
TURNWRIGHT_KIND(per_kilogram, per_mass)
TURNWRIGHT_KIND(ratio, ratio)
TURNWRIGHT_KIND(ohms_per_metre, resistance_per_length)
#undef TURNWRIGHT_KIND

}  // namespace turnwright
