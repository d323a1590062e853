/// The figures of a row whose columns `read`, `derived` and `memory` list those that are known better than the row.
/// Private to the valve layer.
#pragma once

#include <turnwright/catalogue/table.hpp>
#include <turnwright/measure/quantity.hpp>
#include <turnwright/valve/known_figure.hpp>

#include <map>
#include <set>
#include <string>
#include <utility>

namespace turnwright::valve_detail {

/// Quantity of type Q, plain or stated, that holds `si` SI units.
template <class Q>
Q quantity_of(double si) {
  if constexpr (requires { Q::from_value(si); }) {
    return as<Q>(si);
  } else {
    return Q{as<decltype(std::declval<Q>().plain())>(si)};
  }
}

class row_figures {
 public:
  /// Throws `refused` where a list names no column, names one twice, or one that is no better than the row.
  explicit row_figures(const row& r);

  /// Standing of a column's cell: that of the list it is in, else the row's.
  standing known_how(const std::string& column) const;
  /// A figure over zero, or none. Throws `refused` for anything else.
  template <class Q>
  known_figure<Q> figure(const std::string& column) const {
    const auto si = over_zero(column);
    if (!si) return {};
    return {quantity_of<Q>(*si), known_how(column), weak_.contains(column)};
  }
  /// A figure over zero that has to be there. Throws `refused` where it is not.
  template <class Q>
  known_figure<Q> needed(const std::string& column) const {
    row_.needed(column);
    return figure<Q>(column);
  }
  /// A word of the cell with its standing: the value that stands beside it in `words`. Throws `refused` for another.
  template <class T>
  known_figure<T> word(const std::string& column, const std::map<std::string, T>& words) const {
    const auto at = words.find(row_.text(column));
    if (at != words.end()) return {at->second, known_how(column), weak_.contains(column)};
    std::string wanted;
    for (const auto& [text, value] : words) wanted += (wanted.empty() ? "" : " or ") + text;
    refuse(column, wanted);
  }

 private:
  void take_list(const std::string& column, standing of_list);
  std::optional<double> over_zero(const std::string& column) const;
  [[noreturn]] void refuse(const std::string& column, const std::string& wanted) const;

  const row& row_;
  std::map<std::string, standing> better_;
  std::set<std::string> weak_;
};

/// The weaker of two standings.
inline standing weaker(standing a, standing b) { return a < b ? a : b; }

}  // namespace turnwright::valve_detail
