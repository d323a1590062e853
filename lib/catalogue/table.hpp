/// A table of the trade as it is read from CSV: rows that know where they came from.
#pragma once

#include <turnwright/catalogue/standing.hpp>
#include <turnwright/remark/remark.hpp>

#include <map>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// What the rows of one file share: names of the columns, and the keys that its head explains under "# Sources:".
struct csv_head {
  std::vector<std::string> columns;
  std::map<std::string, std::string, std::less<>> sources;
};

/// One row. Cells are asked for by column name; every fault found so is noted with its place.
class row {
 public:
  row(std::shared_ptr<const csv_head> head, std::vector<std::string> cells, std::string origin, int line)
      : head_(std::move(head)), cells_(std::move(cells)), origin_(std::move(origin)), line_(line) {}

  /// Names of the columns.
  const std::vector<std::string>& columns() const { return head_->columns; }

  /// The cell as text; empty where the column or the cell is.
  std::string text(std::string_view column) const;
  /// The cell as a number, or nothing where it is empty. Throws `refused` where it is no finite number.
  std::optional<double> number(std::string_view column) const;
  /// The cell as a number. Throws `refused` where it is empty or no finite number.
  double needed(std::string_view column) const;
  /// The cells of a list column, parted by ';'.
  std::vector<std::string> list(std::string_view column) const;
  /// Standing of the row. Throws `refused` where the word is unknown.
  standing known_how() const;
  /// Where the row stands, as "file:line" or "file:line:column".
  std::string place(std::string_view column = {}) const;
  /// Where the row's figures come from: its `source` cell with the keys that the file's head explains written out and,
  /// for a row of the shop's own, its file.
  std::string source() const;
  /// Marks the row as one of the shop's own.
  void mark_as_the_shops() { the_shops_ = true; }

 private:
  std::shared_ptr<const csv_head> head_;
  std::vector<std::string> cells_;
  std::string origin_;
  int line_;
  bool the_shops_ = false;
};

struct table {
  std::string name;
  std::string text;  ///< the bundled file, to the byte
  std::vector<row> rows;
};

/// Rows of a CSV text. Throws `refused` with every malformed line.
std::vector<row> read_csv(std::string_view text, const std::string& origin);

/// A name as it is compared: case, blanks and hyphens dropped, but for the mark between a whole number and its
/// fraction, so that 1-1/16 is not 11/16.
std::string name_key(std::string_view name);

}  // namespace turnwright
