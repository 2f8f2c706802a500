// Hamiltonians that several tests are about, fixed and random.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <string>
#include <vector>

#include "tests/support/random.hpp"

namespace farrier::test {

/// From 0 to below `count`.
inline std::uint32_t below(Random& random, std::uint32_t count) {
  return random.integer(0, count - 1);
}
/// One of the values.
template <typename Values>
auto pick(Random& random, const Values& values) {
  return values[below(random, static_cast<std::uint32_t>(values.size()))];
}

struct Term {
  std::string text;  ///< "X0 Z3", or "I" for the constant
  double coefficient = 0.0;
};

/// A Hamiltonian with a merged sum.
Hamiltonian hamiltonian(std::uint32_t qubits, const std::vector<Term>& terms);

enum class Ends { open, joined };

/// sum over neighbours of XX + YY + ZZ, plus `field` times Z on every site.
Hamiltonian heisenberg(std::uint32_t sites, Ends ends, double field = 0.0);
/// sum over neighbours of `coupling` ZZ, plus `field` times X on every site.
Hamiltonian ising_chain(std::uint32_t sites, double coupling, double field);
Hamiltonian ising_grid(std::uint32_t width, std::uint32_t height, double coupling, double field);
/// Every pair of qubits with every pair of letters, every qubit with every letter; coefficients
/// uniform in (-1, 1).
Hamiltonian random_two_local(std::uint32_t qubits, Random& random);
/// So many random strings of weight 1 to `weight`, and a constant; coefficients uniform in (-1, 1).
Hamiltonian random_strings(std::uint32_t qubits, std::uint32_t count, std::uint32_t weight,
                           Random& random);
/// The hydrogen molecule near its equilibrium on four qubits (STO-3G, Jordan-Wigner): the form of
/// Whitfield, Biamonte, Aspuru-Guzik 2011, Mol. Phys. 109, 735, and Seeley, Richard, Love 2012,
/// J. Chem. Phys. 137, 224109; coefficients recomputed, from memory.
Hamiltonian hydrogen();

}  // namespace farrier::test
