// Operations on Pauli strings in sparse form.
#pragma once

#include <farrier/pauli.hpp>
#include <span>
#include <vector>

namespace farrier::pauli {

/// Whether two strings (factors in rising order of qubits) commute: they do where the number of
/// qubits on which their letters differ is even.
bool commute(std::span<const Factor> a, std::span<const Factor> b);

/// a * b = i^quarter_turns * factors.
struct SparseProduct {
  std::vector<Factor> factors;
  unsigned quarter_turns = 0;  ///< 0 to 3
};
SparseProduct multiply(std::span<const Factor> a, std::span<const Factor> b);

}  // namespace farrier::pauli
