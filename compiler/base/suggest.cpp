// Levenshtein distance, and the nearest of a list of words by it.
#include "compiler/base/suggest.hpp"

#include <algorithm>
#include <cstddef>

namespace farrier::base {
namespace {

std::size_t distance(std::string_view from, std::string_view to) {
  std::vector<std::size_t> row(to.size() + 1);
  for (std::size_t k = 0; k < row.size(); ++k) row[k] = k;
  for (std::size_t i = 0; i < from.size(); ++i) {
    std::size_t diagonal = row[0];
    row[0] = i + 1;
    for (std::size_t k = 0; k < to.size(); ++k) {
      const std::size_t replaced = diagonal + (from[i] == to[k] ? 0 : 1);
      diagonal = row[k + 1];
      row[k + 1] = std::min({replaced, row[k] + 1, row[k + 1] + 1});
    }
  }
  return row.back();
}

bool near_enough(std::size_t edits, std::size_t length) {
  return edits <= 2 || 2 * edits < length;
}

}  // namespace

std::string_view nearest(std::string_view word, const std::vector<std::string_view>& candidates) {
  std::string_view best;
  std::size_t best_edits = static_cast<std::size_t>(-1);
  for (const std::string_view candidate : candidates) {
    const std::size_t longer = std::max(word.size(), candidate.size());
    const std::size_t shorter = std::min(word.size(), candidate.size());
    // The difference in length is a lower bound; it keeps absurdly long words cheap.
    if (!near_enough(longer - shorter, word.size())) continue;
    const std::size_t edits = distance(word, candidate);
    if (edits < best_edits && near_enough(edits, word.size())) {
      best = candidate;
      best_edits = edits;
    }
  }
  return best;
}

}  // namespace farrier::base
