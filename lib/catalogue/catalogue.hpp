/// The bundled tables with the shop's own rows in front.
#pragma once

#include <turnwright/catalogue/table.hpp>

#include <filesystem>
#include <vector>

namespace turnwright {

/// All tables. Given to whoever looks things up as `const catalogue&`; there is no global one.
class catalogue {
 public:
  /// The bundled tables alone.
  static catalogue bundled();
  /// The bundled tables with those of the folders in front: a row of a known name (first column) replaces the bundled
  /// rows of that name, others add. Throws `refused` where a folder or a file cannot be read or holds a table of
  /// unknown name.
  static catalogue with_shop_rows(const std::vector<std::filesystem::path>& folders);

  /// A table by its file stem. Throws std::logic_error for a name that is not bundled.
  const table& named(std::string_view name) const;
  /// Names of all tables.
  std::vector<std::string> names() const;

 private:
  std::vector<table> tables_;
};

/// Folders named by the environment variable TURNWRIGHT_TABLES, a list parted by ':'. The library's only look at the
/// environment.
std::vector<std::filesystem::path> table_folders_of_environment();

}  // namespace turnwright
