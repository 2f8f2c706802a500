// merge_terms
//
// Does: brings the Pauli sum into canonical order, adds up equal strings, and drops those whose sum
// is zero. Does not look for structure.
//
//   0.5 X0 X1 + 0.25 Z0 + 0.5 X0 X1   becomes   1.0 X0 X1 + 0.25 Z0
//
// Promises: the same operator, up to the rounding of the additions.
// Stands first: every later pass takes the strings to be distinct.
#include <string>

#include "passes/table.hpp"

namespace farrier::passes {

void merge_terms(Hamiltonian& hamiltonian, Notes& notes) {
  const std::size_t before = hamiltonian.sum.size();
  const std::vector<std::uint32_t> first = hamiltonian.sum.merge();
  if (!hamiltonian.origins.empty()) {
    std::vector<TermOrigin> origins;
    origins.reserve(first.size());
    for (const std::uint32_t index : first) origins.push_back(hamiltonian.origins[index]);
    hamiltonian.origins = std::move(origins);
  }
  notes.push_back(std::to_string(hamiltonian.sum.size()) + " distinct strings on " +
                  std::to_string(hamiltonian.qubits) + " qubits, largest weight " +
                  std::to_string(hamiltonian.sum.max_weight()));
  if (before != hamiltonian.sum.size())
    notes.push_back(std::to_string(before - hamiltonian.sum.size()) + " terms merged or cancelled");
}

}  // namespace farrier::passes
