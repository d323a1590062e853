/// Literals of the trade: 230_V, 0.5_mm, 50_Hz, 1.2_T. The only other way to make a quantity is a door of quantity.hpp.
#pragma once

#include <turnwright/measure/quantity.hpp>

namespace turnwright::literals {

#define TURNWRIGHT_LITERAL(suffix, type, factor)                                                            \
  constexpr type operator""_##suffix(long double x) { return as<type>(static_cast<double>(x) * (factor)); } \
  constexpr type operator""_##suffix(unsigned long long x) { return as<type>(static_cast<double>(x) * (factor)); }

TURNWRIGHT_LITERAL(V, volts, 1.0)
TURNWRIGHT_LITERAL(mV, volts, 1e-3)
TURNWRIGHT_LITERAL(A, amperes, 1.0)
TURNWRIGHT_LITERAL(mA, amperes, 1e-3)
TURNWRIGHT_LITERAL(ohm, ohms, 1.0)
TURNWRIGHT_LITERAL(mohm, ohms, 1e-3)
TURNWRIGHT_LITERAL(W, watts, 1.0)
TURNWRIGHT_LITERAL(VA, volt_amperes, 1.0)
TURNWRIGHT_LITERAL(H, henries, 1.0)
TURNWRIGHT_LITERAL(mH, henries, 1e-3)
TURNWRIGHT_LITERAL(uF, farads, 1e-6)
TURNWRIGHT_LITERAL(T, teslas, 1.0)
TURNWRIGHT_LITERAL(Hz, hertz, 1.0)
TURNWRIGHT_LITERAL(s, seconds, 1.0)
TURNWRIGHT_LITERAL(m, metres, 1.0)
TURNWRIGHT_LITERAL(mm, metres, 1e-3)
TURNWRIGHT_LITERAL(in, metres, 25.4e-3)
TURNWRIGHT_LITERAL(mm2, square_metres, 1e-6)
TURNWRIGHT_LITERAL(kg, kilograms, 1.0)
TURNWRIGHT_LITERAL(K, kelvins, 1.0)
TURNWRIGHT_LITERAL(A_per_mm2, amperes_per_square_metre, 1e6)
TURNWRIGHT_LITERAL(kg_per_m3, kilograms_per_cubic_metre, 1.0)
TURNWRIGHT_LITERAL(ohm_mm2_per_m, ohm_metres, 1e-6)
TURNWRIGHT_LITERAL(W_per_kg, watts_per_kilogram, 1.0)
TURNWRIGHT_LITERAL(W_per_mK, watts_per_metre_kelvin, 1.0)
TURNWRIGHT_LITERAL(per_K, per_kelvin, 1.0)

#undef TURNWRIGHT_LITERAL

/// Point on the scale, as in 40_degC.
constexpr temperature operator""_degC(long double x) { return celsius(static_cast<double>(x)); }
constexpr temperature operator""_degC(unsigned long long x) { return celsius(static_cast<double>(x)); }

}  // namespace turnwright::literals
