#include <turnwright/remark/remark.hpp>

#include <array>
#include <string_view>

namespace turnwright {
namespace {

std::string summary(const std::vector<remark>& why) {
  if (why.empty()) throw std::logic_error("refused without a remark");
  std::string text = worded(why.front());
  if (why.size() > 1) text += "\nand " + std::to_string(why.size() - 1) + " more";
  return text;
}

}  // namespace

std::string_view word_of(level l) {
  switch (l) {
    case level::pass:
      return "pass";
    case level::note:
      return "note";
    case level::caution:
      return "caution";
    case level::stop:
      return "stop";
  }
  return "";
}

std::span<const std::string_view> check_codes() {
  static constexpr std::array<std::string_view, 32> codes{
      "current-kind",       "ht-volts",         "flux-at-frequency",
      "primary-alone",      "window-fit",       "wire-identity",
      "heater-turns",       "heater-volts",     "primary-phasing",
      "tap-wire",           "lead-exits",       "floating-heater",
      "centre-tap-circuit", "iron-identity",    "dc-in-iron",
      "step-down",          "bucking-phase",    "fuse",
      "closed-turn",        "rectifier-limits", "rectifier-swap",
      "choke-input",        "shorted-turn",     "heat",
      "open-questions",     "flux-high",        "capacitor-rating",
      "regulation",         "capacitor-ripple", "load-beyond-supply",
      "height-limit",       "mass-limit"};
  return codes;
}

std::string worded(const remark& r) {
  std::string text = r.where.empty() ? "" : r.where + ": ";
  if (!r.found.empty()) text += "found " + r.found;
  if (!r.wanted.empty()) text += (r.found.empty() ? "wanted " : "; wanted ") + r.wanted;
  text += " [" + r.code + "]";
  if (!r.hint.empty()) text += "\n  hint: " + r.hint;
  return text;
}

refused::refused(std::vector<remark> why) : std::runtime_error(summary(why)), remarks_(std::move(why)) {}

}  // namespace turnwright
