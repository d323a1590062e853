#include "drawing.hpp"

#include <turnwright/measure/written.hpp>

namespace turnwright::sheet_detail {
namespace {

std::string at(double x) { return fixed(x, 1); }

std::string_view class_of(stroke s) { return s == stroke::thin ? "thin" : s == stroke::thick ? "thick" : "dashed"; }

}  // namespace

std::string escaped(std::string_view text) {
  std::string out;
  for (const char c : text) {
    switch (c) {
      case '&':
        out += "&amp;";
        break;
      case '<':
        out += "&lt;";
        break;
      case '>':
        out += "&gt;";
        break;
      case '"':
        out += "&quot;";
        break;
      case '\'':
        out += "&#39;";
        break;
      default:
        out += static_cast<unsigned char>(c) < 32 || c == 127 ? ' ' : c;
    }
  }
  return out;
}

drawing::drawing(double wide, double high, std::string_view title, std::string_view description) {
  head_ = "<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 " + at(wide) + " " + at(high) + "\" width=\"" +
          at(wide) + "\" height=\"" + at(high) +
          "\" role=\"img\" aria-labelledby=\"title description\">\n<title id=\"title\">" + escaped(title) +
          "</title>\n<desc id=\"description\">" + escaped(description) +
          "</desc>\n<style>text{font:12px sans-serif;fill:#111}.strong{font-weight:bold}"
          ".box{fill:none;stroke:#777;stroke-width:1}.rule{stroke:#ccc;stroke-width:1}"
          ".thin{fill:none;stroke:#0b5a8f;stroke-width:1.2}.thick{fill:none;stroke:#111;stroke-width:2}"
          ".dashed{fill:none;stroke:#a34700;stroke-width:2;stroke-dasharray:6 4}</style>\n"
          "<rect width=\"100%\" height=\"100%\" fill=\"#fff\"/>\n";
}

void drawing::text(double x, double y, std::string_view words, anchor a, bool strong) {
  const std::string_view side = a == anchor::start ? "start" : a == anchor::middle ? "middle" : "end";
  body_ += "<text x=\"" + at(x) + "\" y=\"" + at(y) + "\" text-anchor=\"" + std::string(side) + "\"" +
           (strong ? " class=\"strong\"" : "") + ">" + escaped(words) + "</text>\n";
}

void drawing::box(double x, double y, double wide, double high) {
  body_ += "<rect class=\"box\" x=\"" + at(x) + "\" y=\"" + at(y) + "\" width=\"" + at(wide) + "\" height=\"" +
           at(high) + "\"/>\n";
}

void drawing::rule(double x1, double y1, double x2, double y2) {
  body_ += "<line class=\"rule\" x1=\"" + at(x1) + "\" y1=\"" + at(y1) + "\" x2=\"" + at(x2) + "\" y2=\"" + at(y2) +
           "\"/>\n";
}

void drawing::curve(const std::vector<point>& points, stroke look) {
  body_ += "<polyline class=\"" + std::string(class_of(look)) + "\" points=\"";
  for (const point& p : points) body_ += at(p.x) + "," + at(p.y) + " ";
  body_.back() = '"';
  body_ += "/>\n";
}

void drawing::sample(double x, double y, stroke look) { curve({{x, y}, {x + 24, y}}, look); }

std::string drawing::svg() const { return head_ + body_ + "</svg>\n"; }

}  // namespace turnwright::sheet_detail
