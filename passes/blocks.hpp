// From the terms of a layer to blocks in an order that is good to schedule.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <vector>

namespace farrier::passes {

/// Blocks of mutually commuting terms: terms on one pair of qubits become one pair block, one-qubit
/// terms on one qubit a one_qubit block, and heavier strings blocks of their own. Pair blocks come
/// first, in the order of an edge colouring, so that as many as possible run side by side; then
/// strings in canonical order; then one-qubit blocks.
Layer layer_of(const Hamiltonian& hamiltonian, const std::vector<std::uint32_t>& terms);

/// The two qubits of a string of weight 2.
std::pair<std::uint32_t, std::uint32_t> pair_of(const Hamiltonian& hamiltonian, std::uint32_t term);

}  // namespace farrier::passes
