/// Reading one object of a job: each key asked for by name, every fault noted with its place, unknown keys found at the
/// end. Private to the job layer.
#pragma once

#include <turnwright/remark/figure.hpp>

#include <nlohmann/json.hpp>

#include <functional>
#include <optional>
#include <string>
#include <vector>

namespace turnwright::job_detail {

using json = nlohmann::ordered_json;

/// A JSON value as a person would write it, short.
std::string as_written(const json& value);

/// Parses a job's text: comments allowed, repeated keys and absurd depth refused. Throws `refused`.
json parse(std::string_view text, const std::string& origin);

/// One object. Faults go to a list shared by all pages of a job.
class page {
 public:
  /// `where`: the file's name and a blank, then the JSON pointer of the node.
  page(const json& node, std::string where, std::vector<remark>& faults);

  /// Whether the key is there; marks it as known.
  bool has(const std::string& key);
  /// The value of a key, or nothing; marks it as known.
  const json* value(const std::string& key);
  /// Place of a key, as a JSON pointer behind the file's name.
  std::string place(const std::string& key) const;

  /// The text of a key.
  std::optional<std::string> text(const std::string& key);
  /// One of the words, or nothing with a fault.
  std::optional<std::string> word(const std::string& key, const std::vector<std::string>& words);
  std::optional<bool> flag(const std::string& key);
  /// A whole number of at least one.
  std::optional<int> whole(const std::string& key, int most);
  /// A quantity within a sane range.
  template <class Q>
  std::optional<Q> quantity(const std::string& key, const char* least, const char* most) {
    const json* v = value(key);
    return v ? quantity_of<Q>(*v, place(key), least, most) : std::nullopt;
  }
  template <class Q>
  std::optional<Q> quantity_of(const json& v, const std::string& where, const char* least, const char* most) {
    if (!v.is_string()) {
      fault(wording::not_a_quantity(where, as_written(v), kind_of<Q>::value, v.is_number()));
      return std::nullopt;
    }
    return quantity_in<Q>(v.get<std::string>(), where, least, most);
  }
  template <class Q>
  std::optional<Q> quantity_in(const std::string& text, const std::string& where, const char* least, const char* most) {
    return read_within<Q>(text, where, least, most, faults_);
  }
  /// The object of a key, or nothing.
  std::optional<page> object(const std::string& key);
  /// A page of another node, whose faults go to the same list.
  page at(const json& node, std::string where) const { return page(node, std::move(where), faults_); }
  /// The place as a JSON pointer, without the file.
  std::string pointer() const { return where_.substr(where_.rfind(' ') + 1); }
  /// Calls for each element of a list.
  void each(const std::string& key, const std::function<void(const json&, const std::string& where)>& visit);

  /// A key of the contract that this version does not do: noted when it is there.
  void not_yet(const std::string& key, const std::string& what, const std::string& hint = {});
  /// Notes every key that nobody asked for.
  void finish();

  void fault(remark r) { faults_.push_back(std::move(r)); }
  const std::string& where() const { return where_; }

 private:
  const json& node_;
  std::string where_;
  std::vector<remark>& faults_;
  std::vector<std::string> known_;
};

}  // namespace turnwright::job_detail
