/// What we say to the user: checks of a result, and faults of the input.
#pragma once

#include <span>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright {

/// One scale for checks and for input faults.
enum class level { pass, note, caution, stop };

/// The word for a level, as it stands in results.
std::string_view word_of(level l);

/// One fault of the input.
struct remark {
  std::string code;    ///< short, stable, kebab-case: "wrong-unit", "missing", "unknown-key"
  std::string where;   ///< file, then JSON pointer "/windings/1/volts" or "table.csv:14:overall_mm"
  std::string found;   ///< as the user wrote it
  std::string wanted;  ///< what was expected, with an example
  std::string hint;    ///< what to do; may be empty
};

/// A remark as lines for a person.
std::string worded(const remark& r);

/// Refused input: carries every remark, never none.
class refused : public std::runtime_error {
 public:
  explicit refused(std::vector<remark> why);
  explicit refused(remark why) : refused(std::vector<remark>{std::move(why)}) {}
  const std::vector<remark>& remarks() const { return remarks_; }

 private:
  std::vector<remark> remarks_;
};

/// Codes of all checks, so that one can be accepted by name.
std::span<const std::string_view> check_codes();

/// One check of a result: the two figures compared, and the smallest change that clears it.
struct check {
  std::string code;
  level weight = level::pass;
  std::string text;
  std::string found;
  std::string bound;
  std::string cure;  ///< empty where nothing has to be cured
};

}  // namespace turnwright
