// The exponential of one Pauli string as gates.
#pragma once

#include <farrier/pauli.hpp>
#include <span>

#include "compiler/synthesis/canonical.hpp"

namespace farrier::synthesis {

/// How the parity of the qubits of a string is gathered: along a line of cx (2(w-1) cx, depth
/// 2(w-1)), or in a balanced tree (as many, depth 2 ceil(log2 w)).
enum class Ladder { line, tree };

/// exp(-i value P) for a string P of weight w >= 1, as turns and cx.
Sequence string_sequence(std::span<const Factor> factors, double value, Ladder ladder);

}  // namespace farrier::synthesis
