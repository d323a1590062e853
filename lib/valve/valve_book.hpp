/// All valves and silicon diodes of the tables, by name.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/valve/amplifier.hpp>
#include <turnwright/valve/rectifier.hpp>

#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// What a name stands for: one of the two is there.
struct found_valve {
  const rectifier_type* rectifier = nullptr;
  const amplifying_valve* amplifier = nullptr;
};

class valve_book {
 public:
  /// Builds the book and checks every row. Throws `refused` with all faults.
  explicit valve_book(const catalogue& tables);

  /// Rectifier valves, then silicon diodes and bridges, the plain `silicon` last.
  std::span<const rectifier_type> rectifiers() const { return rectifiers_; }
  std::span<const amplifying_valve> amplifiers() const { return amplifiers_; }
  std::span<const output_stage> stages() const { return stages_; }

  /// The rectifier of a name or alias, `silicon` among them. Throws `refused` naming `where` when there is none or more
  /// than one.
  const rectifier_type& rectifier(std::string_view name, const std::string& where) const;
  /// The rectifier or amplifying valve of a name or alias. Throws `refused` naming `where` when there is none or more
  /// than one.
  found_valve named(std::string_view name, const std::string& where) const;
  /// Whether a name fits one row or more.
  bool knows(std::string_view name) const;

 private:
  std::vector<rectifier_type> rectifiers_;
  std::vector<amplifying_valve> amplifiers_;
  std::vector<output_stage> stages_;
};

}  // namespace turnwright
