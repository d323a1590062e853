/// A plain line drawing as SVG: black on white, lines told apart by weight and dashes, text as text. Private to the
/// sheet layer.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace turnwright::sheet_detail {

struct point {
  double x, y;
};
enum class anchor { start, middle, end };
enum class stroke { thin, thick, dashed };

/// Text safe inside an element or an attribute; control characters, which XML has no place for, become blanks.
std::string escaped(std::string_view text);

class drawing {
 public:
  /// A sheet of so many units; title and description are for those who cannot see it.
  drawing(double wide, double high, std::string_view title, std::string_view description);

  void text(double x, double y, std::string_view words, anchor a, bool strong = false);
  void box(double x, double y, double wide, double high);
  void rule(double x1, double y1, double x2, double y2);
  void curve(const std::vector<point>& points, stroke look);
  /// A short piece of a line, for a key.
  void sample(double x, double y, stroke look);
  /// The whole file.
  std::string svg() const;

 private:
  std::string body_, head_;
};

}  // namespace turnwright::sheet_detail
