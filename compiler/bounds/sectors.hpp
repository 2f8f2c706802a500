// Invariant subspaces of all layers of a splitting: sets of basis states that no layer leaves.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <vector>

namespace farrier::bounds {

/// Basis states (bit k: qubit k) in the product basis of one of the three axes, split into sets
/// that every layer maps to themselves: charges and parities that are diagonal in that basis come
/// out by themselves.
struct Sectors {
  Pauli axis = Pauli::z;
  std::vector<std::vector<std::uint32_t>> states;

  /// Sum of the cubes of the sizes: what dense algebra on them costs.
  [[nodiscard]] double cost() const;
};

/// A string in the basis of an axis: masks, and the sign that the exchange of axes brings.
struct AxisString {
  std::uint32_t x = 0;
  std::uint32_t z = 0;
  double sign = 1.0;
};
AxisString in_basis(std::span<const Factor> factors, Pauli axis);

/// The cheapest of the three axes. Requires at most 16 qubits.
Sectors find_sectors(const Hamiltonian& hamiltonian, const Layering& layering);

}  // namespace farrier::bounds
