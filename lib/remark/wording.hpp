/// All wording of refused input, in one place.
#pragma once

#include <turnwright/measure/read.hpp>
#include <turnwright/remark/remark.hpp>

#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace turnwright::wording {

/// The text was not the quantity that was wanted.
remark quantity(std::string where, std::string_view text, const misread& why);
/// A JSON value of another sort stands where a quantity belongs; `found` is how it is written.
remark not_a_quantity(std::string where, std::string found, kind wanted, bool number);
/// The figure is outside what could be meant.
remark out_of_range(std::string where, std::string_view text, std::string least, std::string most);
/// A key that nobody reads; the hint is the nearest known one.
remark unknown_key(std::string where, std::string_view key, std::span<const std::string> known);
/// A key that has to be there.
remark missing(std::string where, std::string wanted, std::string hint = {});
/// A value of another sort: `wanted` says which.
remark wrong_sort(std::string where, std::string found, std::string wanted);
/// A word that is none of the known ones.
remark unknown_word(std::string where, std::string_view word, std::span<const std::string> known);
/// A name that no table has; the hint lists the nearest.
remark unknown_name(std::string where, std::string_view name, std::string what, std::span<const std::string> known);
/// A name that fits more than one row.
remark ambiguous_name(std::string where, std::string_view name, std::span<const std::string> fits);
/// A part of the contract that this version does not do.
remark not_yet(std::string where, std::string what, std::string hint = {});
/// Anything else.
remark other(std::string code, std::string where, std::string found, std::string wanted, std::string hint = {});

/// Up to `count` of the known words nearest to `word`, best first; only those that a slip of the pen could explain.
std::vector<std::string> nearest(std::string_view word, std::span<const std::string> known, std::size_t count = 1);

/// A text in quotation marks, cut at 60 characters, control characters shown as dots.
std::string quoted(std::string_view text);

}  // namespace turnwright::wording
