// The exact exponential of all terms on one or two qubits as one block of gates.
#pragma once

#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <vector>

#include "compiler/synthesis/canonical.hpp"

namespace farrier::synthesis {

/// exp(-i scale * sum of the block's terms) for a block of kind one_qubit or pair, as turns around
/// at most one canonical gate. The phase is a multiple of pi/2 here, for the sum has no trace.
Sequence block_sequence(const Hamiltonian& hamiltonian, const Block& block, double scale);

/// Two turns, a canonical gate and two turns whose product is a special unitary 4x4 matrix, given
/// row by row with the first qubit as the more significant one (the canonical decomposition:
/// Khaneja, Glaser 2001, Chem. Phys. 267, 11; Kraus, Cirac 2001, PRA 63, 062309).
struct PairMatrix {
  double real[4][4];
  double imag[4][4];
};
Sequence decompose(std::uint32_t first, std::uint32_t second, const PairMatrix& matrix);

/// The operator of gates on two qubits (turns, canonical gates, cx), as a matrix like the above.
/// Requires that every gate acts on the same two qubits, `first` being the more significant.
PairMatrix pair_matrix(std::uint32_t first, const std::vector<Gate>& gates);

}  // namespace farrier::synthesis
