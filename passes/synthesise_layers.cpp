// synthesise_layers
//
// Does: turns the plan into gates: each exponential of a layer becomes its blocks' gates, and the
// last exponential of a step and the first of the next, where they belong to one layer, become one.
// Does not merge one-qubit gates, and leaves two-qubit blocks as canonical gates.
//
//   steps 3, step A/2 B A/2   becomes   A/2, [B A] x 2, B A/2
//
// Promises: the same operator as the plan's product, global phase included; what rounding may
// change is added to the circuit's bound on it. Stands between plan and circuit passes.
#include <cmath>
#include <cstdint>
#include <farrier/diagnostic.hpp>
#include <map>
#include <string>
#include <utility>
#include <vector>

#include "compiler/synthesis/block.hpp"
#include "compiler/synthesis/string.hpp"
#include "passes/table.hpp"

namespace farrier::passes {
namespace {

using synthesis::Sequence;

/// Exponentials and how often they run in a row.
struct Stretch {
  std::vector<Exponential> exponentials;
  std::uint64_t repeats = 1;
};

/// `steps` steps with the seams merged.
std::vector<Stretch> unroll(const std::vector<Exponential>& step, std::uint64_t steps) {
  if (step.size() == 1)
    return {{{{step[0].layer, step[0].fraction * static_cast<double>(steps)}}, 1}};
  if (steps == 1 || step.empty() || step.front().layer != step.back().layer) return {{step, steps}};
  std::vector<Exponential> inner(step.begin() + 1, step.end() - 1);
  std::vector<Exponential> body = inner;
  body.push_back({step.front().layer, step.front().fraction + step.back().fraction});
  inner.push_back(step.back());
  return {{{step.front()}, 1}, {std::move(body), steps - 1}, {std::move(inner), 1}};
}

/// Gates of layer exponentials, each made once.
class LayerGates {
 public:
  LayerGates(const Hamiltonian& hamiltonian, const Part& part)
      : hamiltonian_(hamiltonian), part_(part) {}

  const Sequence& of(std::uint32_t layer, double scale) {
    const auto [place, fresh] = made_.try_emplace({layer, scale});
    if (fresh) place->second = make(part_.layerings.front().layers[layer], scale);
    return place->second;
  }

 private:
  [[nodiscard]] Sequence make(const Layer& layer, double scale) const {
    const auto ladder = part_.tree_ladders ? synthesis::Ladder::tree : synthesis::Ladder::line;
    Sequence all;
    for (const Block& block : layer.blocks) {
      const Sequence one =
          block.kind == BlockKind::string
              ? synthesis::string_sequence(
                    hamiltonian_.sum.factors(block.terms.front()),
                    scale * hamiltonian_.sum.coefficient(block.terms.front()), ladder)
              : synthesis::block_sequence(hamiltonian_, block, scale);
      all.gates.insert(all.gates.end(), one.gates.begin(), one.gates.end());
      all.phase += one.phase;
      all.rounding += one.rounding;
    }
    return all;
  }

  const Hamiltonian& hamiltonian_;
  const Part& part_;
  std::map<std::pair<std::uint32_t, double>, Sequence> made_;
};

}  // namespace

Circuit synthesise_layers(const Hamiltonian& hamiltonian, const Plan& plan, Notes& notes) {
  Circuit circuit;
  circuit.qubits = hamiltonian.qubits;
  for (std::uint32_t q = 0; q < hamiltonian.qubits; ++q) circuit.layout_in.push_back(q);
  circuit.layout_out = circuit.layout_in;
  const double constant_phase = -hamiltonian.sum.constant() * plan.time;
  add_phase(circuit, constant_phase);
  circuit.rounding += 4e-16 * std::abs(constant_phase);
  if (plan.time == 0.0) {
    notes.emplace_back("time 0: the empty evolution");
    return circuit;
  }
  for (const Part& part : plan.parts) {
    if (part.layerings.size() != 1) throw InternalFault("a plan without a chosen layering");
    LayerGates gates(hamiltonian, part);
    const double tau = plan.time / static_cast<double>(part.steps);
    for (const Stretch& stretch : unroll(part.step, part.steps)) {
      Segment segment{{}, stretch.repeats};
      for (const Exponential& exponential : stretch.exponentials) {
        const Sequence& sequence = gates.of(exponential.layer, exponential.fraction * tau);
        segment.gates.insert(segment.gates.end(), sequence.gates.begin(), sequence.gates.end());
        add_phase(circuit, sequence.phase, stretch.repeats);
        circuit.rounding += sequence.rounding * static_cast<double>(stretch.repeats);
      }
      if (!segment.gates.empty()) circuit.segments.push_back(std::move(segment));
    }
    notes.push_back(std::to_string(part.steps) + " steps of " + std::to_string(part.step.size()) +
                    " layer exponentials, seams merged");
  }
  return circuit;
}

}  // namespace farrier::passes
