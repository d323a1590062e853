/// The quantities of the trade, each an alias of a Boost.Units type that stores the plain SI unit its name tells.
#pragma once

#include <boost/units/absolute.hpp>
#include <boost/units/base_dimension.hpp>
#include <boost/units/base_unit.hpp>
#include <boost/units/quantity.hpp>
#include <boost/units/systems/si/area.hpp>
#include <boost/units/systems/si/base.hpp>
#include <boost/units/systems/si/capacitance.hpp>
#include <boost/units/systems/si/current.hpp>
#include <boost/units/systems/si/dimensionless.hpp>
#include <boost/units/systems/si/electric_potential.hpp>
#include <boost/units/systems/si/energy.hpp>
#include <boost/units/systems/si/frequency.hpp>
#include <boost/units/systems/si/inductance.hpp>
#include <boost/units/systems/si/length.hpp>
#include <boost/units/systems/si/magnetic_field_intensity.hpp>
#include <boost/units/systems/si/magnetic_flux.hpp>
#include <boost/units/systems/si/magnetic_flux_density.hpp>
#include <boost/units/systems/si/mass.hpp>
#include <boost/units/systems/si/mass_density.hpp>
#include <boost/units/systems/si/power.hpp>
#include <boost/units/systems/si/resistance.hpp>
#include <boost/units/systems/si/resistivity.hpp>
#include <boost/units/systems/si/surface_density.hpp>
#include <boost/units/systems/si/temperature.hpp>
#include <boost/units/systems/si/time.hpp>
#include <boost/units/systems/si/volume.hpp>

namespace turnwright {

namespace units = boost::units;

namespace measure_detail {
namespace si = units::si;
template <class A, class B>
using over = typename units::divide_typeof_helper<A, B>::type;
template <class A, class B>
using times = typename units::multiply_typeof_helper<A, B>::type;

// Volt-amperes and watts share a dimension in the SI; a base dimension of their own keeps them apart here.
struct apparent_dimension : units::base_dimension<apparent_dimension, 7301> {};
struct apparent_base_unit : units::base_unit<apparent_base_unit, apparent_dimension::dimension_type, 7302> {
  static std::string name() { return "apparent"; }
  static std::string symbol() { return "apparent"; }
};

using volt_to_three_halves = units::power_typeof_helper<si::electric_potential, units::static_rational<3, 2>>::type;
}  // namespace measure_detail

template <class Unit>
using quantity = units::quantity<Unit, double>;

using volts = quantity<units::si::electric_potential>;
using amperes = quantity<units::si::current>;
using ohms = quantity<units::si::resistance>;
using watts = quantity<units::si::power>;
using volt_amperes = quantity<measure_detail::times<units::si::power, measure_detail::apparent_base_unit::unit_type>>;
using henries = quantity<units::si::inductance>;
using farads = quantity<units::si::capacitance>;
using teslas = quantity<units::si::magnetic_flux_density>;
using webers = quantity<units::si::magnetic_flux>;
using hertz = quantity<units::si::frequency>;
using seconds = quantity<units::si::time>;
using metres = quantity<units::si::length>;
using square_metres = quantity<units::si::area>;
using cubic_metres = quantity<units::si::volume>;
using kilograms = quantity<units::si::mass>;
using joules = quantity<units::si::energy>;
using kelvins = quantity<units::si::temperature>;  ///< a difference; a point on the scale is `temperature`
using amperes_per_metre = quantity<units::si::magnetic_field_intensity>;
using amperes_per_square_metre = quantity<measure_detail::over<units::si::current, units::si::area>>;
using ohm_metres = quantity<units::si::resistivity>;
using ohms_per_metre = quantity<measure_detail::over<units::si::resistance, units::si::length>>;
using kilograms_per_metre = quantity<measure_detail::over<units::si::mass, units::si::length>>;
using kilograms_per_cubic_metre = quantity<units::si::mass_density>;
using watts_per_kilogram = quantity<measure_detail::over<units::si::power, units::si::mass>>;
using watts_per_kelvin = quantity<measure_detail::over<units::si::power, units::si::temperature>>;
using watts_per_metre_kelvin =
    quantity<measure_detail::over<measure_detail::over<units::si::power, units::si::length>, units::si::temperature>>;
using per_kelvin = quantity<measure_detail::over<units::si::dimensionless, units::si::temperature>>;
using per_kilogram = quantity<measure_detail::over<units::si::dimensionless, units::si::mass>>;
using perveance =
    quantity<measure_detail::over<units::si::current, measure_detail::volt_to_three_halves>>;  ///< A V^-1.5

/// A point on the temperature scale. Point minus point is a rise in kelvins, point plus rise is a point.
using temperature = units::quantity<units::absolute<units::si::temperature>, double>;

/// The two doors between quantities and the plain doubles of numeric kernels.
/// Number of SI units in a quantity [the SI unit its type stores].
template <class Unit>
constexpr double plain(const units::quantity<Unit, double>& q) {
  return q.value();
}
/// Quantity of type Q that holds `si` SI units.
template <class Q>
constexpr Q as(double si) {
  return Q::from_value(si);
}

/// Point on the scale for a figure in degrees Celsius.
constexpr temperature celsius(double degrees) { return temperature::from_value(degrees + 273.15); }
/// Degrees Celsius of a point on the scale.
constexpr double in_celsius(const temperature& t) { return t.value() - 273.15; }

}  // namespace turnwright
