#include <turnwright/measure/kind.hpp>

namespace turnwright {

kind_words words_of(kind k) {
  switch (k) {
    case kind::voltage:
      return {"a voltage", "volts (V)", "230 V"};
    case kind::current:
      return {"a current", "amperes (A)", "120 mA"};
    case kind::resistance:
      return {"a resistance", "ohms (ohm)", "110 ohm"};
    case kind::power:
      return {"a power", "watts (W)", "5 W"};
    case kind::apparent_power:
      return {"an apparent power", "volt-amperes (VA)", "80 VA"};
    case kind::inductance:
      return {"an inductance", "henries (H)", "5 H"};
    case kind::capacitance:
      return {"a capacitance", "farads (F)", "47 uF"};
    case kind::flux_density:
      return {"a flux density", "teslas (T) or gauss (G)", "1.3 T"};
    case kind::flux:
      return {"a flux", "webers (Wb)", "2 mWb"};
    case kind::frequency:
      return {"a frequency", "hertz (Hz)", "50 Hz"};
    case kind::time:
      return {"a time", "seconds (s), min or h", "3 min"};
    case kind::length:
      return {"a length", "millimetres (mm) or inches (in)", "32 mm"};
    case kind::area:
      return {"an area", "mm2 or cm2", "0.2 mm2"};
    case kind::mass:
      return {"a mass", "kilograms (kg)", "1.5 kg"};
    case kind::energy:
      return {"an energy", "joules (J)", "10 J"};
    case kind::temperature_point:
      return {"a temperature", "degrees Celsius (degC)", "40 degC"};
    case kind::temperature_rise:
      return {"a temperature rise", "kelvins (K)", "55 K"};
    case kind::field:
      return {"a magnetising field", "amperes per metre (A/m)", "300 A/m"};
    case kind::current_density:
      return {"a current density", "A/mm2 or cmil/A", "2.5 A/mm2"};
    case kind::specific_loss:
      return {"a specific loss", "watts per kilogram (W/kg)", "1.5 W/kg"};
    case kind::valve_constant:
      return {"a perveance", "A/V^1.5", "1.9 mA/V^1.5"};
    case kind::per_mass:
      return {"a price per mass", "per kilogram (/kg)", "14 /kg"};
    case kind::ratio:
      return {"a ratio", "per cent (%)", "5 %"};
    case kind::resistance_per_length:
      return {"a resistance per length", "ohm/m", "0.088 ohm/m"};
  }
  return {};
}

}  // namespace turnwright
