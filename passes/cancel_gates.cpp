// cancel_gates
//
// Does: merges neighbouring one-qubit gates into one, cancels neighbouring pairs that are each
// other's inverse, adds up neighbouring canonical gates on one pair, and does the same over the
// seam between the repeats of a body. Does not move gates past each other otherwise.
//
//   [h q0; cx q0 q1; h q0] x 5   becomes   h q0; [cx q0 q1] x 4 with nothing between; cx q0 q1; h
//   q0
//
// Promises: the same operator, global phase included; never more gates, never more depth.
// Stands after synthesise_layers, before lower_to_native, so that whole blocks can still meet.
#include "compiler/synthesis/peephole.hpp"
#include "passes/table.hpp"

namespace farrier::passes {

void cancel_gates(const Request&, Circuit& circuit, Notes& notes) {
  synthesis::simplify(circuit);
  std::size_t repeated = 0;
  for (const Segment& segment : circuit.segments) repeated += segment.repeats > 1 ? 1 : 0;
  notes.push_back(std::to_string(circuit.segments.size()) + " stretches of gates, " +
                  std::to_string(repeated) + " of them repeated");
}

}  // namespace farrier::passes
