// The layers of a splitting as packed sums, in the narrowest window of qubits that fits.
#pragma once

#include <cstddef>
#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <vector>

#include "compiler/pauli/commutator.hpp"
#include "compiler/pauli/packed.hpp"

namespace farrier::bounds {

template <std::size_t W>
std::vector<pauli::Table<W>> layer_tables(const Hamiltonian& hamiltonian,
                                          const Layering& layering) {
  std::vector<pauli::Table<W>> tables;
  for (const Layer& layer : layering.layers) {
    pauli::Table<W>& table = tables.emplace_back(hamiltonian.qubits);
    for (const Block& block : layer.blocks)
      for (const std::uint32_t term : block.terms)
        table.add(pauli::pack<W>(hamiltonian.sum.factors(term), hamiltonian.qubits),
                  hamiltonian.sum.coefficient(term));
  }
  return tables;
}

}  // namespace farrier::bounds
