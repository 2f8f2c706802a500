// lower_to_native
//
// Does: replaces canonical gates and cx by the native two-qubit gate with one-qubit gates around
// it, merges those, and gives every one-qubit gate its name: h, s, sx and the like where the angle
// allows, rx, ry or rz about one axis, U for the rest. Does not route or schedule.
//
//   canonical(a, 0, 0) q0 q1   becomes   cx q0 q1; rx(2a) q0; cx q0 q1
//
// Promises: the same operator, global phase included.
// Stands last among the circuit passes: the back end writes named gates only.
// Source: the decompositions in compiler/synthesis/canonical.cpp.
#include <string>
#include <utility>

#include "compiler/synthesis/canonical.hpp"
#include "compiler/synthesis/peephole.hpp"
#include "compiler/synthesis/turn.hpp"
#include "passes/table.hpp"

namespace farrier::passes {
namespace {

void expand_two_qubit_gates(Circuit& circuit, Native native) {
  for (Segment& segment : circuit.segments) {
    std::vector<Gate> gates;
    for (const Gate& gate : segment.gates) {
      if (!gate.two_qubit()) {
        gates.push_back(gate);
        continue;
      }
      const synthesis::Sequence sequence =
          gate.kind == GateKind::canonical
              ? synthesis::canonical_sequence(
                    gate.a, gate.b, {gate.parameters[0], gate.parameters[1], gate.parameters[2]},
                    native)
              : synthesis::cx_sequence(gate.a, gate.b, native);
      gates.insert(gates.end(), sequence.gates.begin(), sequence.gates.end());
      add_phase(circuit, sequence.phase, segment.repeats);
      circuit.rounding += sequence.rounding * static_cast<double>(segment.repeats);
    }
    segment.gates = std::move(gates);
  }
}

void name_turns(Circuit& circuit) {
  for (Segment& segment : circuit.segments) {
    std::vector<Gate> gates;
    for (const Gate& gate : segment.gates) {
      if (gate.kind != GateKind::turn) {
        gates.push_back(gate);
        continue;
      }
      const synthesis::NamedTurn named = synthesis::name_turn(gate.a, synthesis::turn_of(gate));
      gates.insert(gates.end(), named.gates.begin(), named.gates.end());
      add_phase(circuit, named.phase, segment.repeats);
      circuit.rounding += named.rounding * static_cast<double>(segment.repeats);
    }
    segment.gates = std::move(gates);
  }
  std::erase_if(circuit.segments, [](const Segment& segment) { return segment.gates.empty(); });
}

}  // namespace

void lower_to_native(const Request& request, Circuit& circuit, Notes& notes) {
  expand_two_qubit_gates(circuit, request.native);
  synthesis::simplify(circuit);
  name_turns(circuit);
  static constexpr const char* names[] = {"cx", "cz", "ecr", "iswap", "rzz", "rxx"};
  notes.push_back(std::string("two-qubit gate: ") +
                  names[static_cast<std::size_t>(request.native)]);
}

}  // namespace farrier::passes
