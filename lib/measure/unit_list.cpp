#include <turnwright/measure/unit_list.hpp>

#include <array>
#include <numbers>

namespace turnwright::measure_detail {
namespace {

constexpr double circular_mil_m2 = std::numbers::pi / 4 * 25.4e-6 * 25.4e-6;

// symbol, kind, power of ten, factor, takes prefixes, reciprocal
constexpr std::array units_known{
    unit_entry{"V", kind::voltage, 0, 1, true},
    unit_entry{"A", kind::current, 0, 1, true},
    unit_entry{"ohm", kind::resistance, 0, 1, true},
    unit_entry{"Ω", kind::resistance, 0, 1, true},       // U+03A9
    unit_entry{"\u2126", kind::resistance, 0, 1, true},  // the ohm sign
    unit_entry{"ohms", kind::resistance, 0, 1, true},
    unit_entry{"W", kind::power, 0, 1, true},
    unit_entry{"VA", kind::apparent_power, 0, 1, true},
    unit_entry{"H", kind::inductance, 0, 1, true},
    unit_entry{"F", kind::capacitance, 0, 1, true},
    unit_entry{"T", kind::flux_density, 0, 1, true},
    unit_entry{"G", kind::flux_density, -4, 1, true},
    unit_entry{"Wb", kind::flux, 0, 1, true},
    unit_entry{"Hz", kind::frequency, 0, 1, true},
    unit_entry{"c/s", kind::frequency},
    unit_entry{"s", kind::time, 0, 1, true},
    unit_entry{"min", kind::time, 0, 60},
    unit_entry{"h", kind::time, 0, 3600},
    unit_entry{"m", kind::length, 0, 1, true},
    unit_entry{"cm", kind::length, -2},
    unit_entry{"in", kind::length, 0, 0.0254},
    unit_entry{"inch", kind::length, 0, 0.0254},
    unit_entry{"\"", kind::length, 0, 0.0254},
    unit_entry{"mil", kind::length, 0, 25.4e-6},
    unit_entry{"m2", kind::area},
    unit_entry{"mm2", kind::area, -6},
    unit_entry{"cm2", kind::area, -4},
    unit_entry{"in2", kind::area, 0, 0.0254 * 0.0254},
    unit_entry{"cmil", kind::area, 0, circular_mil_m2},
    unit_entry{"g", kind::mass, -3, 1, true},
    unit_entry{"lb", kind::mass, 0, 0.45359237},
    unit_entry{"J", kind::energy, 0, 1, true},
    unit_entry{"degC", kind::temperature_point},
    unit_entry{"°C", kind::temperature_point},
    unit_entry{"K", kind::temperature_rise, 0, 1, true},
    unit_entry{"A/m", kind::field, 0, 1, true},
    unit_entry{"A/m2", kind::current_density},
    unit_entry{"A/mm2", kind::current_density, 6},
    unit_entry{"A/in2", kind::current_density, 0, 1 / (0.0254 * 0.0254)},
    unit_entry{"cmil/A", kind::current_density, 0, 1 / circular_mil_m2, false, true},
    unit_entry{"W/kg", kind::specific_loss, 0, 1, true},
    unit_entry{"A/V^1.5", kind::valve_constant, 0, 1, true},
    unit_entry{"/kg", kind::per_mass},
    unit_entry{"%", kind::ratio, -2},
    unit_entry{"ohm/m", kind::resistance_per_length, 0, 1, true},
    unit_entry{"ohm/km", kind::resistance_per_length, -3},
};

constexpr std::array prefixes_known{
    prefix_entry{"p", -12},     prefix_entry{"n", -9}, prefix_entry{"u", -6}, prefix_entry{"µ", -6},  // U+00B5
    prefix_entry{"\u03bc", -6}, prefix_entry{"m", -3}, prefix_entry{"k", 3},  prefix_entry{"M", 6},
    prefix_entry{"G", 9},
};

}  // namespace

std::span<const unit_entry> unit_list() { return units_known; }
std::span<const prefix_entry> prefix_list() { return prefixes_known; }

}  // namespace turnwright::measure_detail
