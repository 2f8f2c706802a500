// What a layer costs before it is synthesised.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>

namespace farrier::synthesis {

/// Two-qubit gates (cx) of exp(-i s H_layer) at a generic s: 2 or 3 a pair block by its canonical
/// coordinates, 2 (w - 1) a string of weight w.
std::uint64_t layer_cost(const Hamiltonian& hamiltonian, const Layer& layer);

}  // namespace farrier::synthesis
