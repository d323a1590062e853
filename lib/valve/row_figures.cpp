#include "row_figures.hpp"

#include <algorithm>

#include <turnwright/remark/wording.hpp>

namespace turnwright::valve_detail {

row_figures::row_figures(const row& r) : row_(r) {
  take_list("read", standing::read);
  take_list("derived", standing::derived);
  take_list("memory", standing::memory);
  const std::vector<std::string>& columns = row_.columns();
  for (const std::string& name : row_.list("weak")) {
    if (std::find(columns.begin(), columns.end(), name) == columns.end()) refuse("weak", "names of columns");
    weak_.insert(name);
  }
}

void row_figures::take_list(const std::string& column, standing of_list) {
  const std::vector<std::string>& columns = row_.columns();
  for (const std::string& name : row_.list(column)) {
    if (std::find(columns.begin(), columns.end(), name) == columns.end()) refuse(column, "names of columns");
    if (!better_.emplace(name, of_list).second) refuse(column, "each column in one list");
    if (of_list <= row_.known_how()) refuse(column, "figures that are known better than the row's standing");
  }
}

standing row_figures::known_how(const std::string& column) const {
  const auto at = better_.find(column);
  return at == better_.end() ? row_.known_how() : at->second;
}

std::optional<double> row_figures::over_zero(const std::string& column) const {
  const auto value = row_.number(column);
  if (value && !(*value > 0)) refuse(column, "a figure over zero, or an empty cell");
  return value;
}

void row_figures::refuse(const std::string& column, const std::string& wanted) const {
  throw refused(wording::other("bad-row", row_.place(column), wording::quoted(row_.text(column)), wanted));
}

}  // namespace turnwright::valve_detail
