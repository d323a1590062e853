#include <turnwright/catalogue/table.hpp>

#include <algorithm>
#include <cctype>
#include <charconv>
#include <cmath>

#include <turnwright/remark/wording.hpp>

namespace turnwright {
namespace {

struct split_line {
  std::vector<std::string> cells;
  bool closed = true;  // no quotation mark left open
};

split_line split(std::string_view line) {
  split_line out{{""}, true};
  bool quoted = false;
  for (std::size_t i = 0; i < line.size(); ++i) {
    const char c = line[i];
    if (quoted && c == '"' && i + 1 < line.size() && line[i + 1] == '"') {
      out.cells.back() += '"';
      ++i;
    } else if (c == '"') {
      quoted = !quoted;
    } else if (c == ',' && !quoted) {
      out.cells.emplace_back();
    } else {
      out.cells.back() += c;
    }
  }
  out.closed = !quoted;
  return out;
}

// Whether a line is well-formed UTF-8 as far as lead and following bytes go.
bool is_utf8(std::string_view s) {
  for (std::size_t i = 0; i < s.size();) {
    const auto lead = static_cast<unsigned char>(s[i]);
    const std::size_t length = lead < 0x80                   ? 1
                               : lead >= 0xC2 && lead < 0xE0 ? 2
                               : lead >= 0xE0 && lead < 0xF0 ? 3
                               : lead >= 0xF0 && lead < 0xF5 ? 4
                                                             : 0;
    if (length == 0 || i + length > s.size()) return false;
    for (std::size_t k = 1; k < length; ++k) {
      if ((static_cast<unsigned char>(s[i + k]) & 0xC0u) != 0x80u) return false;
    }
    i += length;
  }
  return true;
}

std::string_view trimmed(std::string_view s) {
  while (!s.empty() && std::isspace(static_cast<unsigned char>(s.front()))) s.remove_prefix(1);
  while (!s.empty() && std::isspace(static_cast<unsigned char>(s.back()))) s.remove_suffix(1);
  return s;
}

// Finds the keys under "# Sources:": "#   key: what it is", going on in lines that stand further in.
class head_reader {
 public:
  explicit head_reader(csv_head& head) : head_(head) {}

  void take(std::string_view line) {
    if (!line.starts_with("#   ")) {
      inside_ = trimmed(line.substr(1)) == "Sources:";
      return;
    }
    if (!inside_) return;
    const std::string_view words = trimmed(line.substr(1));
    const std::size_t colon = words.find(": ");
    const bool key_line = !line.starts_with("#     ") && colon != std::string_view::npos &&
                          words.substr(0, colon).find(' ') == std::string_view::npos;
    if (key_line) {
      last_ = std::string(words.substr(0, colon));
      head_.sources[last_] = std::string(trimmed(words.substr(colon + 2)));
    } else if (!last_.empty()) {
      head_.sources[last_] += " " + std::string(words);
    }
  }

 private:
  csv_head& head_;
  bool inside_ = false;
  std::string last_;
};

}  // namespace

std::string row::text(std::string_view column) const {
  const auto at = std::find(head_->columns.begin(), head_->columns.end(), column);
  if (at == head_->columns.end()) return {};
  return cells_[static_cast<std::size_t>(at - head_->columns.begin())];
}

std::optional<double> row::number(std::string_view column) const {
  const std::string cell = text(column);
  if (cell.empty()) return std::nullopt;
  double value = 0;
  const auto done = std::from_chars(cell.data(), cell.data() + cell.size(), value);
  if (done.ec != std::errc{} || done.ptr != cell.data() + cell.size() || !std::isfinite(value)) {
    throw refused(wording::other("bad-number", place(column), wording::quoted(cell), "a finite decimal number"));
  }
  return value;
}

double row::needed(std::string_view column) const {
  const auto value = number(column);
  if (!value) throw refused(wording::missing(place(column), "a number in column " + std::string(column)));
  return *value;
}

std::vector<std::string> row::list(std::string_view column) const {
  std::vector<std::string> out;
  const std::string cell = text(column);
  for (std::size_t from = 0; from < cell.size();) {
    const std::size_t to = std::min(cell.find(';', from), cell.size());
    const auto item = trimmed(std::string_view(cell).substr(from, to - from));
    if (!item.empty()) out.emplace_back(item);
    from = to + 1;
  }
  return out;
}

standing row::known_how() const {
  const auto s = standing_named(text("standing"));
  if (!s) {
    throw refused(wording::other("unknown-standing", place("standing"), wording::quoted(text("standing")),
                                 "read, memory, derived or estimate"));
  }
  return *s;
}

std::string row::place(std::string_view column) const {
  std::string where = origin_ + ":" + std::to_string(line_);
  if (!column.empty()) where += ":" + std::string(column);
  return where;
}

std::string row::source() const {
  const std::string cell = text("source");
  std::string spelled;
  for (std::size_t from = 0; from <= cell.size();) {
    const std::size_t to = std::min(cell.find(" + ", from), cell.size());
    const std::string key = cell.substr(from, to - from);
    const auto known = head_->sources.find(key);
    spelled += (spelled.empty() ? "" : "; ") + (known == head_->sources.end() ? key : known->second);
    from = to + 3;
  }
  return the_shops_ ? spelled + " (the shop's " + origin_ + ")" : spelled;
}

std::vector<row> read_csv(std::string_view text, const std::string& origin) {
  std::vector<row> rows;
  std::vector<remark> faults;
  csv_head head;
  head_reader comments(head);
  std::shared_ptr<const csv_head> shared;
  if (text.starts_with("\xEF\xBB\xBF")) text.remove_prefix(3);
  int line_number = 0;
  while (!text.empty()) {
    const std::size_t end = std::min(text.find('\n'), text.size());
    std::string_view line = text.substr(0, end);
    text.remove_prefix(std::min(end + 1, text.size()));
    ++line_number;
    const std::string place = origin + ":" + std::to_string(line_number);
    if (line.ends_with('\r')) line.remove_suffix(1);
    if (trimmed(line).empty()) continue;
    if (!is_utf8(line)) {
      faults.push_back(wording::other("bad-row", place, "bytes that are no UTF-8", "a text in UTF-8"));
      continue;
    }
    if (line.starts_with('#')) {
      comments.take(line);
      continue;
    }
    split_line parts = split(line);
    for (std::string& cell : parts.cells) cell = std::string(trimmed(cell));
    if (!shared) {
      head.columns = std::move(parts.cells);
      shared = std::make_shared<const csv_head>(head);
    } else if (!parts.closed) {
      faults.push_back(wording::other("bad-row", place, "a quotation mark left open", "a row on one line"));
    } else if (parts.cells.size() != head.columns.size()) {
      faults.push_back(wording::other("bad-row", place, std::to_string(parts.cells.size()) + " cells",
                                      std::to_string(head.columns.size()) + " cells, as in the header row"));
    } else {
      rows.emplace_back(shared, std::move(parts.cells), origin, line_number);
    }
  }
  if (!shared) faults.push_back(wording::missing(origin, "a header row"));
  if (!faults.empty()) throw refused(std::move(faults));
  return rows;
}

std::string name_key(std::string_view name) {
  const auto digit = [](char c) { return c >= '0' && c <= '9'; };
  // A digit, the mark at i, then digits and a stroke: a whole number with a fraction.
  const auto before_fraction = [&](std::size_t i) {
    std::size_t j = i + 1;
    while (j < name.size() && digit(name[j])) ++j;
    return i > 0 && digit(name[i - 1]) && j > i + 1 && j < name.size() && name[j] == '/';
  };
  std::string key;
  for (std::size_t i = 0; i < name.size(); ++i) {
    const char c = name[i];
    if (c == '-' || c == '_' || std::isspace(static_cast<unsigned char>(c))) {
      if (before_fraction(i)) key += '-';
      continue;
    }
    key += static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
  }
  return key;
}

}  // namespace turnwright
