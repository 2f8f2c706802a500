// Local rewriting of circuits: one-qubit runs merged, inverse pairs cancelled, also across repeats.
#pragma once

#include <farrier/circuit.hpp>

namespace farrier::synthesis {

/// Rewrites every segment and the seams between repeats:
///   - neighbouring turns on one qubit become one turn, and none where they cancel;
///   - neighbouring canonical gates on one pair, rzz or rxx gates add their angles;
///   - neighbouring equal gates that are their own inverse (cx, cz, ecr) vanish;
///   - gates that a repeated body begins with are moved behind it where they then merge with those
///   it
///     ends with: (A C)^k = A (C A)^(k-1) C.
/// The operator stays the same, global phase included; no count and no depth grows.
void simplify(Circuit& circuit);

}  // namespace farrier::synthesis
