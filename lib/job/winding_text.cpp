#include "winding_text.hpp"

#include <turnwright/remark/figure.hpp>

namespace turnwright::job_detail {

namespace {

std::string without(std::string text, const std::string& tail, bool& found) {
  if (text.size() >= tail.size() && text.compare(text.size() - tail.size(), tail.size(), tail) == 0) {
    text.resize(text.size() - tail.size());
    found = true;
  }
  while (!text.empty() && text.back() == ' ') text.pop_back();
  return text;
}

std::optional<volts> in_range(const std::string& text, const std::string& where, std::vector<remark>& faults) {
  return read_within<volts>(text, where, "0.2 V", "5000 V", faults);
}

}  // namespace

std::optional<winding_volts> read_winding_volts(const std::string& text, const std::string& where,
                                                std::vector<remark>& faults) {
  winding_volts out;
  bool on_load = false;
  const std::string figure = without(without(text, "no load", out.no_load), "on load", on_load);
  const std::size_t middle = figure.find("-0-");
  if (middle == std::string::npos) {
    const auto v = in_range(figure, where, faults);
    if (!v) return std::nullopt;
    out.first = *v;
    return out;
  }
  // "300-0-300 V": the unit behind the second half is that of both
  const std::string second = figure.substr(middle + 3);
  const std::size_t unit = second.find_first_not_of("0123456789.");
  const std::string first = figure.substr(0, middle) + (unit == std::string::npos ? "" : second.substr(unit));
  const auto a = in_range(first, where, faults);
  if (!a) return std::nullopt;
  const auto b = in_range(second, where, faults);
  if (!b) return std::nullopt;
  out.first = *a;
  out.second = *b;
  return out;
}

}  // namespace turnwright::job_detail
