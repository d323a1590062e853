#include <turnwright/iron/body.hpp>

#include <array>
#include <cmath>
#include <numbers>

#include <turnwright/measure/constants.hpp>

namespace turnwright {

std::string_view word_of(stacking s) {
  switch (s) {
    case stacking::interleaved:
      return "interleaved";
    case stacking::in_pairs:
      return "in pairs";
    case stacking::butt:
      return "butt";
  }
  return "";
}

double usual_stacking_factor(const steel& s) {
  if (s.kind == steel_kind::old) return 0.88;
  return plain(s.sheet) > 0.42e-3 ? 0.92 : 0.91;
}

core_body::core_body(core_choice choice)
    : choice_(std::move(choice)),
      curve_(choice_.grade.magnetisation, choice_.grade.polarisation),
      loss_(choice_.grade),
      net_area_(choice_.pattern.tongue * choice_.stack * choice_.stacking_factor),
      path_(mean_path(choice_.pattern)),
      mass_(face_area(choice_.pattern) * choice_.stack * choice_.stacking_factor * choice_.grade.density) {}

int core_body::sheets() const {
  return static_cast<int>(std::lround(plain(choice_.stack) * choice_.stacking_factor / plain(choice_.grade.sheet)));
}

square_metres core_body::exposed_surface() const {
  const lamination& l = choice_.pattern;
  const double windows = is_shell(l) ? 2 : 1;
  const square_metres covered_limb = l.tongue * l.window_length;
  const square_metres face = l.width * l.height - windows * l.window_width * l.window_length - covered_limb;
  return 2.0 * (l.width + l.height) * choice_.stack + 2.0 * face;
}

watts core_body::loss(teslas b, hertz f) const { return loss_.at(b, f).value * mass_ * building_factor(); }

double core_body::building_factor() const {
  const bool oriented = choice_.grade.kind == steel_kind::oriented;
  if (choice_.pattern.family == pattern_family::m) return oriented ? 1.4 : 1.15;
  return oriented ? 1.5 : 1.2;
}

metres core_body::joint_gap() const {
  if (choice_.pattern.family == pattern_family::m) return as<metres>(0.01e-3);
  switch (choice_.style) {
    case stacking::interleaved:
      return as<metres>(0.02e-3);
    case stacking::in_pairs:
      return as<metres>(0.03e-3);
    case stacking::butt:
      return as<metres>(0.20e-3);  // two joints in the loop
  }
  return as<metres>(0.0);
}

amperes_rms core_body::magnetising_current(teslas b, turns n) const {
  constexpr int samples = 48;  // midpoints of a quarter cycle
  static const auto sines = [] {
    std::array<double, samples> s{};
    for (int i = 0; i < samples; ++i)
      s[static_cast<std::size_t>(i)] = std::sin((i + 0.5) * std::numbers::pi / (2 * samples));
    return s;
  }();
  const double l_m = plain(path_), gap_m = plain(joint_gap());
  double squares = 0;
  for (const double sine : sines) {
    const double now = plain(b) * sine;
    const double ampere_turns = plain(curve_.field(as<teslas>(now))) * l_m + now * gap_m / mu0_H_per_m;
    squares += ampere_turns * ampere_turns;
  }
  return amperes_rms{as<amperes>(std::sqrt(squares / samples) / n.count())};
}

}  // namespace turnwright
