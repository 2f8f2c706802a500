// What the hunts for counterexamples draw: Hamiltonians of many kinds, split into layers.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <string>

namespace farrier::test {

struct Draw {
  Hamiltonian hamiltonian;
  Layering layering;  ///< 1 to 5 layers
  double time = 0.0;  ///< of either sign; between 0.1 and 10 over the 1-norm of H
  std::string kind;
};

/// The draw of a seed. Two to six qubits, rarely many; strings of any weight, couplings of pairs with
/// fields, rings and chains with equal coefficients, sums that commute, sums that anticommute, all
/// strings of two qubits; coefficients of one size or over six decades. Layers of commuting terms in
/// random order, as the passes group them or at random, or blocks of pairs whose terms need not
/// commute.
Draw draw(std::uint64_t seed);

}  // namespace farrier::test
