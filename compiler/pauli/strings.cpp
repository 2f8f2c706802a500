// Operations on Pauli strings in sparse form.
#include "compiler/pauli/strings.hpp"

#include <cstddef>

namespace farrier::pauli {
namespace {

/// Power of i in the product of two letters; rows and columns I, X, Z, Y. XY = iZ, YZ = iX, ZX =
/// iY.
constexpr unsigned letter_turns[4][4] = {{0, 0, 0, 0}, {0, 0, 3, 1}, {0, 1, 0, 3}, {0, 3, 1, 0}};

}  // namespace

bool commute(std::span<const Factor> a, std::span<const Factor> b) {
  bool odd = false;
  for (std::size_t i = 0, j = 0; i < a.size() && j < b.size();) {
    if (a[i].qubit() < b[j].qubit()) {
      ++i;
    } else if (b[j].qubit() < a[i].qubit()) {
      ++j;
    } else {
      odd ^= a[i++].letter() != b[j++].letter();
    }
  }
  return !odd;
}

SparseProduct multiply(std::span<const Factor> a, std::span<const Factor> b) {
  SparseProduct result;
  std::size_t i = 0;
  std::size_t j = 0;
  while (i < a.size() || j < b.size()) {
    if (j == b.size() || (i < a.size() && a[i].qubit() < b[j].qubit())) {
      result.factors.push_back(a[i++]);
    } else if (i == a.size() || b[j].qubit() < a[i].qubit()) {
      result.factors.push_back(b[j++]);
    } else {
      const auto left = static_cast<unsigned>(a[i].letter());
      const auto right = static_cast<unsigned>(b[j].letter());
      result.quarter_turns = (result.quarter_turns + letter_turns[left][right]) & 3U;
      if (left != right)
        result.factors.emplace_back(a[i].qubit(), static_cast<Pauli>(left ^ right));
      ++i;
      ++j;
    }
  }
  return result;
}

}  // namespace farrier::pauli
