#include <turnwright/catalogue/catalogue.hpp>

#include <algorithm>
#include <charconv>
#include <cstddef>
#include <cstdlib>
#include <fstream>
#include <set>
#include <sstream>
#include <stdexcept>
#include <string>

#include <turnwright/measure/written.hpp>
#include <turnwright/remark/wording.hpp>

#include "turnwright_table_arrays.inc"

namespace turnwright {
namespace {

struct embedded {
  std::string_view name;
  std::string_view text;
};

std::vector<embedded> embedded_tables() {
  const auto view = [](const unsigned char* bytes, std::size_t size) {
    return std::string_view(static_cast<const char*>(static_cast<const void*>(bytes)), size);
  };
  std::vector<embedded> all;
#define TURNWRIGHT_TABLE(name) all.push_back({#name, view(turnwright_table_##name, turnwright_table_##name##_size)});
#include "turnwright_tables.inc"
#undef TURNWRIGHT_TABLE
  return all;
}

// A key cell as it is compared: as a number where it is one, so that 250.0 is 250.
std::string row_key(const std::string& cell) {
  double value = 0;
  const auto done = std::from_chars(cell.data(), cell.data() + cell.size(), value);
  const bool number = !cell.empty() && done.ec == std::errc{} && done.ptr == cell.data() + cell.size();
  return number ? shortest(value) : name_key(cell);
}

void lay_over(table& under, std::vector<row> shop_rows, const std::string& key_column) {
  std::set<std::string> replaced;
  for (row& r : shop_rows) {
    r.mark_as_the_shops();
    replaced.insert(row_key(r.text(key_column)));
  }
  std::erase_if(under.rows, [&](const row& r) { return replaced.contains(row_key(r.text(key_column))); });
  under.rows.insert(under.rows.end(), shop_rows.begin(), shop_rows.end());
}

// A shop's table may leave columns out, but not the key, and may have none that nobody reads.
void check_columns(const table& bundled, const std::vector<row>& shop_rows, const std::string& key_column,
                   const std::string& file) {
  if (shop_rows.empty()) return;
  const std::vector<std::string>& known = bundled.rows.front().columns();
  std::vector<remark> faults;
  for (const std::string& column : shop_rows.front().columns()) {
    if (std::find(known.begin(), known.end(), column) == known.end())
      faults.push_back(wording::unknown_word(file + ":1", column, known));
  }
  const auto& given = shop_rows.front().columns();
  if (std::find(given.begin(), given.end(), key_column) == given.end()) {
    faults.push_back(wording::missing(file + ":1", "the column " + key_column + ", by which rows are told apart"));
  }
  if (!faults.empty()) throw refused(std::move(faults));
}

// Rows of one key belong together in these; in all others the first column is the name.
std::string key_column_of(std::string_view table_name) {
  if (table_name == "laminations" || table_name == "steels") return "name";
  if (table_name.starts_with("rectifier") || table_name == "diodes" || table_name == "valves") return "type";
  if (table_name == "output_stages") return "type";
  if (table_name == "stacks" || table_name == "formers") return "lamination";
  if (table_name == "steel_magnetisation" || table_name == "steel_loss") return "curve";
  if (table_name == "mains") return "region";
  if (table_name.starts_with("wire_") && table_name != "wire_breakdown") return "size";
  if (table_name == "margins_by_gauge") return "bare_least_mm";
  return table_name == "wire_breakdown" ? "bare_mm" : "working_v_rms";
}

std::string whole_file(const std::filesystem::path& path) {
  std::ifstream in(path, std::ios::binary);
  std::ostringstream text;
  if (!in || !(text << in.rdbuf())) {
    throw refused(wording::other("unreadable", path.string(), "a file that cannot be read", "a table in CSV"));
  }
  return text.str();
}

}  // namespace

catalogue catalogue::bundled() {
  catalogue c;
  for (const embedded& e : embedded_tables()) {
    c.tables_.push_back({std::string(e.name), std::string(e.text), read_csv(e.text, std::string(e.name) + ".csv")});
  }
  return c;
}

catalogue catalogue::with_shop_rows(const std::vector<std::filesystem::path>& folders) {
  catalogue c = bundled();
  const std::vector<std::string> known = c.names();
  for (const auto& folder : folders) {
    std::error_code trouble;
    if (!std::filesystem::is_directory(folder, trouble)) {
      throw refused(
          wording::other("no-folder", folder.string(), "no such folder", "a folder that holds tables in CSV"));
    }
    std::vector<std::filesystem::path> files;
    for (const auto& entry : std::filesystem::directory_iterator(folder)) {
      if (entry.path().extension() == ".csv") files.push_back(entry.path());
    }
    std::sort(files.begin(), files.end());
    for (const auto& file : files) {
      const std::string name = file.stem().string();
      const auto at = std::find_if(c.tables_.begin(), c.tables_.end(), [&](const table& t) { return t.name == name; });
      if (at == c.tables_.end()) {
        throw refused(wording::unknown_name(file.string(), name, "a table of a known name", known));
      }
      std::vector<row> rows = read_csv(whole_file(file), file.string());
      check_columns(*at, rows, key_column_of(name), file.string());
      lay_over(*at, std::move(rows), key_column_of(name));
    }
  }
  return c;
}

const table& catalogue::named(std::string_view name) const {
  for (const table& t : tables_) {
    if (t.name == name) return t;
  }
  throw std::logic_error("no table named " + std::string(name));
}

std::vector<std::string> catalogue::names() const {
  std::vector<std::string> all;
  for (const table& t : tables_) all.push_back(t.name);
  return all;
}

std::vector<std::filesystem::path> table_folders_of_environment() {
  std::vector<std::filesystem::path> folders;
  const char* value = std::getenv("TURNWRIGHT_TABLES");
  std::istringstream list(value ? value : "");
  for (std::string folder; std::getline(list, folder, ':');) {
    if (!folder.empty()) folders.emplace_back(folder);
  }
  return folders;
}

}  // namespace turnwright
