/// How well a figure is known.
#pragma once

#include <optional>
#include <string_view>

namespace turnwright {

/// Weakest first, so that the weakest of several is their minimum.
enum class standing { estimate, memory, derived, read };

/// The word for a standing.
constexpr std::string_view word_of(standing s) {
  switch (s) {
    case standing::estimate:
      return "estimate";
    case standing::memory:
      return "memory";
    case standing::derived:
      return "derived";
    case standing::read:
      return "read";
  }
  return "";
}

/// The standing a word names, or nothing.
constexpr std::optional<standing> standing_named(std::string_view word) {
  for (standing s : {standing::estimate, standing::memory, standing::derived, standing::read}) {
    if (word_of(s) == word) return s;
  }
  return std::nullopt;
}

}  // namespace turnwright
