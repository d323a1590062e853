#include <turnwright/sheet/columns.hpp>

#include <algorithm>

namespace turnwright {
namespace {

std::string padded(const std::string& text, std::size_t width, bool left) {
  const std::size_t w = shown_width(text);
  const std::string gap(width > w ? width - w : 0, ' ');
  return left ? text + gap : gap + text;
}

void end_line(std::string& out) {
  while (!out.empty() && out.back() == ' ') out.pop_back();
  out += '\n';
}

}  // namespace

std::size_t shown_width(std::string_view text) {
  return static_cast<std::size_t>(
      std::count_if(text.begin(), text.end(), [](char c) { return (static_cast<unsigned char>(c) & 0xC0u) != 0x80u; }));
}

text_table::text_table(std::vector<std::string> heads) : heads_(std::move(heads)) {
  for (std::string& h : heads_) {
    const bool left = !h.empty() && h.front() == '<';
    if (left) h.erase(0, 1);
    left_.push_back(left || left_.empty());
  }
}

void text_table::add(std::vector<std::string> cells) {
  cells.resize(heads_.size());
  rows_.push_back(std::move(cells));
}

std::string text_table::part(std::size_t from, std::size_t to, const std::vector<std::size_t>& widths) const {
  std::string out;
  const auto line = [&](const std::vector<std::string>& cells) {
    out += "  " + padded(cells[0], widths[0], left_[0]);
    for (std::size_t c = from; c < to; ++c) out += "  " + padded(cells[c], widths[c], left_[c]);
    end_line(out);
  };
  line(heads_);
  for (const auto& r : rows_) line(r);
  return out;
}

std::string text_table::text() const {
  std::vector<std::size_t> widths;
  for (std::size_t c = 0; c < heads_.size(); ++c) {
    widths.push_back(shown_width(heads_[c]));
    for (const auto& r : rows_) widths[c] = std::max(widths[c], shown_width(r[c]));
  }
  std::string out;
  for (std::size_t from = 1; from < heads_.size();) {
    std::size_t to = from, used = 2 + widths[0];
    while (to < heads_.size() && (to == from || used + 2 + widths[to] <= paper_width)) used += 2 + widths[to++];
    if (!out.empty()) out += '\n';
    out += part(from, to, widths);
    from = to;
  }
  return out;
}

std::string labelled(std::string_view label, std::string_view text, std::size_t indent) {
  std::string lead(label);
  lead.resize(std::max(indent, lead.size() + 1), ' ');
  return wrapped(text, lead);
}

std::string wrapped(std::string_view text, std::string_view lead) {
  const std::size_t indent = shown_width(lead);
  std::string out(lead);
  std::size_t column = indent;
  bool first = true;
  while (!text.empty()) {
    const std::size_t end = std::min(text.find(' '), text.size());
    const std::string_view word = text.substr(0, end);
    text.remove_prefix(std::min(end + 1, text.size()));
    if (!first && column + 1 + shown_width(word) > paper_width) {
      end_line(out);
      out += std::string(indent, ' ');
      column = indent;
      first = true;
    }
    if (!first) {
      out += ' ';
      ++column;
    }
    out += word;
    column += shown_width(word);
    first = false;
  }
  end_line(out);
  return out;
}

}  // namespace turnwright
