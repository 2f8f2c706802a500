// The known word nearest to a misspelt one.
#pragma once

#include <string_view>
#include <vector>

namespace farrier::base {

/// The candidate with the least Levenshtein distance to `word`, the first of equals; empty where
/// none is nearer than half the word's length (at least 2 edits are always allowed).
std::string_view nearest(std::string_view word, const std::vector<std::string_view>& candidates);

}  // namespace farrier::base
