#include "page.hpp"

#include <algorithm>
#include <set>

namespace turnwright::job_detail {
namespace {

constexpr std::size_t deepest = 32;

// Follows the parser to find repeated keys and absurd depth, with the pointer of the place.
class watch {
 public:
  watch(std::string origin, std::vector<remark>& faults) : origin_(std::move(origin)), faults_(faults) {}

  bool operator()(int, json::parse_event_t event, json& parsed) {
    using e = json::parse_event_t;
    if (event == e::key) {
      const std::string key = parsed.get<std::string>();
      frames_.back().at = key;
      if (!frames_.back().keys.insert(key).second) {
        faults_.push_back(wording::other("repeated-key", origin_ + " " + pointer(),
                                         "the key " + wording::quoted(key) + " a second time", "each key once",
                                         "the earlier one would have been lost"));
      }
    } else if (event == e::object_start || event == e::array_start) {
      step();
      frames_.push_back({event == e::array_start, -1, {}, {}});
      if (frames_.size() > deepest) {
        throw refused(wording::other("too-deep", origin_, "more than " + std::to_string(deepest) + " levels of nesting",
                                     "a job"));
      }
    } else if (event == e::object_end || event == e::array_end) {
      frames_.pop_back();
    } else {
      step();
    }
    return true;
  }

 private:
  struct frame {
    bool list;
    int index;
    std::string at;
    std::set<std::string> keys;
  };
  void step() {
    if (!frames_.empty() && frames_.back().list) frames_.back().at = std::to_string(++frames_.back().index);
  }
  std::string pointer() const {
    std::string p;
    for (const frame& f : frames_) p += "/" + f.at;
    return p;
  }
  std::string origin_;
  std::vector<remark>& faults_;
  std::vector<frame> frames_;
};

// The parser's own sentence without its number, one line.
std::string syntax_words(const std::string& what) {
  const std::size_t from = what.find("] ");
  std::string words = from == std::string::npos ? what : what.substr(from + 2);
  for (char& c : words) c = static_cast<unsigned char>(c) < 32 ? ' ' : c;
  return words.substr(0, 240);
}

}  // namespace

std::string as_written(const json& value) {
  switch (value.type()) {
    case json::value_t::object:
      return "an object";
    case json::value_t::array:
      return "a list";
    case json::value_t::string:
      return wording::quoted(value.get_ref<const std::string&>());
    case json::value_t::null:
      return "null";
    case json::value_t::boolean:
      return value.get<bool>() ? "true" : "false";
    default:
      return "the number " + value.dump();
  }
}

json parse(std::string_view text, const std::string& origin) {
  if (text.starts_with("\xEF\xBB\xBF")) text.remove_prefix(3);
  if (text.find_first_not_of(" \t\r\n") == std::string_view::npos) {
    throw refused(wording::other("empty", origin, "an empty file",
                                 "a job in JSON, beginning with {\"format\": \"turnwright-job/1\", ..."));
  }
  std::vector<remark> faults;
  json node;
  try {
    node = json::parse(text.begin(), text.end(), json::parser_callback_t(watch(origin, faults)), true, true);
  } catch (const nlohmann::json::exception& why) {
    throw refused(wording::other(
        "syntax", origin, "text that is no JSON: " + syntax_words(why.what()), "a job in JSON",
        "look at the line and column named; a comma, a bracket or a quotation mark is most often what is missing"));
  }
  if (!faults.empty()) throw refused(std::move(faults));
  if (!node.is_object()) throw refused(wording::wrong_sort(origin, as_written(node), "an object, beginning with {"));
  return node;
}

page::page(const json& node, std::string where, std::vector<remark>& faults)
    : node_(node), where_(std::move(where)), faults_(faults) {}

bool page::has(const std::string& key) { return value(key) != nullptr; }

const json* page::value(const std::string& key) {
  if (std::find(known_.begin(), known_.end(), key) == known_.end()) known_.push_back(key);
  const auto at = node_.find(key);
  return at == node_.end() ? nullptr : &*at;
}

std::string page::place(const std::string& key) const { return where_ + "/" + key; }

std::optional<std::string> page::text(const std::string& key) {
  const json* v = value(key);
  if (!v) return std::nullopt;
  if (!v->is_string()) {
    fault(wording::wrong_sort(place(key), as_written(*v), "a text in quotation marks"));
    return std::nullopt;
  }
  return v->get<std::string>();
}

std::optional<std::string> page::word(const std::string& key, const std::vector<std::string>& words) {
  const auto t = text(key);
  if (!t) return std::nullopt;
  if (std::find(words.begin(), words.end(), *t) == words.end()) {
    fault(wording::unknown_word(place(key), *t, words));
    return std::nullopt;
  }
  return t;
}

std::optional<bool> page::flag(const std::string& key) {
  const json* v = value(key);
  if (!v) return std::nullopt;
  if (!v->is_boolean()) {
    fault(wording::wrong_sort(place(key), as_written(*v), "true or false"));
    return std::nullopt;
  }
  return v->get<bool>();
}

std::optional<int> page::whole(const std::string& key, int most) {
  const json* v = value(key);
  if (!v) return std::nullopt;
  if (!v->is_number_integer() || v->get<std::int64_t>() < 1 || v->get<std::int64_t>() > most) {
    fault(wording::wrong_sort(place(key), as_written(*v), "a whole number from 1 to " + std::to_string(most)));
    return std::nullopt;
  }
  return v->get<int>();
}

std::optional<page> page::object(const std::string& key) {
  const json* v = value(key);
  if (!v) return std::nullopt;
  if (!v->is_object()) {
    fault(wording::wrong_sort(place(key), as_written(*v), "an object in braces"));
    return std::nullopt;
  }
  return page(*v, place(key), faults_);
}

void page::each(const std::string& key, const std::function<void(const json&, const std::string&)>& visit) {
  const json* v = value(key);
  if (!v) return;
  if (!v->is_array()) {
    fault(wording::wrong_sort(place(key), as_written(*v), "a list in brackets"));
    return;
  }
  for (std::size_t i = 0; i < v->size(); ++i) visit((*v)[i], place(key) + "/" + std::to_string(i));
}

void page::not_yet(const std::string& key, const std::string& what, const std::string& hint) {
  if (has(key)) fault(wording::not_yet(place(key), what, hint));
}

void page::finish() {
  for (const auto& [key, unused] : node_.items()) {
    if (std::find(known_.begin(), known_.end(), key) == known_.end())
      fault(wording::unknown_key(place(key), key, known_));
  }
}

}  // namespace turnwright::job_detail
