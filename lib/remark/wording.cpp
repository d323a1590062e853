#include <turnwright/remark/wording.hpp>

#include <algorithm>
#include <cctype>
#include <numeric>

namespace turnwright::wording {
namespace {

std::string quantity_wanted(kind k) {
  const kind_words w = words_of(k);
  return std::string(w.name) + " in " + std::string(w.units) + ", such as \"" + std::string(w.example) + "\"";
}

char lower(char c) { return static_cast<char>(std::tolower(static_cast<unsigned char>(c))); }

// Edit distance without regard to case: insertions, deletions, changes, and swaps of neighbours.
std::size_t distance(std::string_view a, std::string_view b) {
  std::vector<std::size_t> before(b.size() + 1), last(b.size() + 1), row(b.size() + 1);
  std::iota(last.begin(), last.end(), std::size_t{0});
  for (std::size_t i = 1; i <= a.size(); ++i) {
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t change = lower(a[i - 1]) == lower(b[j - 1]) ? 0 : 1;
      row[j] = std::min({last[j] + 1, row[j - 1] + 1, last[j - 1] + change});
      if (i > 1 && j > 1 && lower(a[i - 1]) == lower(b[j - 2]) && lower(a[i - 2]) == lower(b[j - 1])) {
        row[j] = std::min(row[j], before[j - 2] + 1);
      }
    }
    before = last;
    last = row;
  }
  return last[b.size()];
}

std::string listed(std::span<const std::string> words) {
  std::string text;
  for (const std::string& w : words) text += (text.empty() ? "" : ", ") + w;
  return text;
}

std::string did_you_mean(std::string_view word, std::span<const std::string> known) {
  const auto near = nearest(word, known);
  return near.empty() ? "" : "did you mean " + quoted(near.front()) + "?";
}

}  // namespace

std::string quoted(std::string_view text) {
  std::string_view shown = text.substr(0, 60);
  if (shown.size() < text.size()) {  // no letter of several bytes is cut in two
    while (!shown.empty() && (static_cast<unsigned char>(text[shown.size()]) & 0xC0u) == 0x80u) shown.remove_suffix(1);
  }
  std::string out;
  for (char c : shown) out += static_cast<unsigned char>(c) < 32 || c == 127 ? '.' : c;
  return "\"" + out + (shown.size() < text.size() ? "..." : "") + "\"";
}

std::vector<std::string> nearest(std::string_view word, std::span<const std::string> known, std::size_t count) {
  if (word.size() > 60) return {};
  std::vector<std::pair<std::size_t, std::string>> ranked;
  for (const std::string& k : known) {
    const std::size_t d = distance(word, k);
    if (d <= std::max<std::size_t>(1, std::max(word.size(), k.size()) / 3 + 1)) ranked.emplace_back(d, k);
  }
  std::stable_sort(ranked.begin(), ranked.end(), [](const auto& a, const auto& b) { return a.first < b.first; });
  std::vector<std::string> best;
  for (std::size_t i = 0; i < std::min(count, ranked.size()); ++i) best.push_back(ranked[i].second);
  return best;
}

remark quantity(std::string where, std::string_view text, const misread& why) {
  const std::string wanted = quantity_wanted(why.wanted);
  const std::string found = quoted(text);
  switch (why.reason) {
    case misread::why::empty:
      return {"empty", std::move(where), "an empty text", wanted, {}};
    case misread::why::no_number:
      return {"no-number", std::move(where), found + ", which holds no number", wanted, {}};
    case misread::why::bare_number:
      return {"no-unit", std::move(where), found + ", a number without its unit", wanted,
              "write the unit after the number"};
    case misread::why::unknown_unit:
      return {"unknown-unit", std::move(where), found + "; " + quoted(why.unit) + " is no unit known here", wanted,
              "units are written as in V, mA, ohm, uF, mm, in, degC; capitals count"};
    case misread::why::other_kind:
      return {
          "wrong-unit", std::move(where), found + ", which is " + std::string(words_of(*why.found).name), wanted, {}};
    case misread::why::not_finite:
      return {"not-finite", std::move(where), found + ", which is no finite figure", wanted, {}};
  }
  return {};
}

remark not_a_quantity(std::string where, std::string found, kind wanted, bool number) {
  return {number ? "no-unit" : "wrong-sort", std::move(where), std::move(found), quantity_wanted(wanted),
          number ? "write it as text with its unit, in quotation marks" : ""};
}

remark out_of_range(std::string where, std::string_view text, std::string least, std::string most) {
  return {"out-of-range", std::move(where), quoted(text), "something from " + least + " to " + most, {}};
}

remark unknown_key(std::string where, std::string_view key, std::span<const std::string> known) {
  std::string hint = did_you_mean(key, known);
  return {"unknown-key", std::move(where), "the key " + quoted(key), "one of: " + listed(known), std::move(hint)};
}

remark missing(std::string where, std::string wanted, std::string hint) {
  return {"missing", std::move(where), "nothing", std::move(wanted), std::move(hint)};
}

remark wrong_sort(std::string where, std::string found, std::string wanted) {
  return {"wrong-sort", std::move(where), std::move(found), std::move(wanted), {}};
}

remark unknown_word(std::string where, std::string_view word, std::span<const std::string> known) {
  return {"unknown-word", std::move(where), quoted(word), "one of: " + listed(known), did_you_mean(word, known)};
}

remark unknown_name(std::string where, std::string_view name, std::string what, std::span<const std::string> known) {
  const auto near = nearest(name, known, 4);
  std::string hint = near.empty() ? "" : "near it stand: " + listed(near);
  return {"unknown-name", std::move(where), quoted(name), std::move(what), std::move(hint)};
}

remark ambiguous_name(std::string where, std::string_view name, std::span<const std::string> fits) {
  return {"ambiguous-name", std::move(where), quoted(name) + ", which fits more than one row",
          "one of: " + listed(fits), "write the name as it stands in this list"};
}

remark not_yet(std::string where, std::string what, std::string hint) {
  return {"not-yet", std::move(where), std::move(what), "something this version does", std::move(hint)};
}

remark other(std::string code, std::string where, std::string found, std::string wanted, std::string hint) {
  return {std::move(code), std::move(where), std::move(found), std::move(wanted), std::move(hint)};
}

}  // namespace turnwright::wording
