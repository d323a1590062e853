/// Aligned plain text: tables and wrapped paragraphs, at most 100 columns.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

inline constexpr std::size_t paper_width = 100;

/// How many columns a UTF-8 text takes on a terminal, one for each code point.
std::size_t shown_width(std::string_view text);

/// A table in plain text. The first column stands left, others right unless told.
class text_table {
 public:
  /// Heads of the columns; a head that begins with '<' stands left with its column.
  explicit text_table(std::vector<std::string> heads);
  void add(std::vector<std::string> cells);
  /// The table as lines, each indented by two blanks and none with blanks at its end. A table wider than the paper is
  /// cut into parts that repeat the first column.
  std::string text() const;

 private:
  std::string part(std::size_t from, std::size_t to, const std::vector<std::size_t>& widths) const;
  std::vector<std::string> heads_;
  std::vector<bool> left_;
  std::vector<std::vector<std::string>> rows_;
};

/// A paragraph under a label: the label in the first `indent` columns, the text wrapped behind it.
std::string labelled(std::string_view label, std::string_view text, std::size_t indent = 12);

/// A text wrapped to the paper, each line indented, the first led by `lead`.
std::string wrapped(std::string_view text, std::string_view lead);

}  // namespace turnwright
