// What a layer costs before it is synthesised.
#include "compiler/synthesis/cost.hpp"

#include <cmath>

#include "compiler/synthesis/block.hpp"

namespace farrier::synthesis {
namespace {

/// Block exponentials are looked at where the sum of |coefficients| is this: no symmetric angle.
constexpr double generic_angle = 0.37;

std::uint64_t block_cost(const Hamiltonian& hamiltonian, const Block& block) {
  if (block.kind == BlockKind::one_qubit) return 0;
  if (block.kind == BlockKind::string)
    return 2 * (hamiltonian.sum.factors(block.terms.front()).size() - 1);
  double norm = 0.0;
  for (const std::uint32_t term : block.terms) norm += std::abs(hamiltonian.sum.coefficient(term));
  const Sequence sequence = block_sequence(hamiltonian, block, generic_angle / norm);
  for (const Gate& gate : sequence.gates)
    if (gate.kind == GateKind::canonical)
      return static_cast<std::uint64_t>(
          entanglers({gate.parameters[0], gate.parameters[1], gate.parameters[2]}, Native::cx));
  return 0;
}

}  // namespace

std::uint64_t layer_cost(const Hamiltonian& hamiltonian, const Layer& layer) {
  std::uint64_t cost = 0;
  for (const Block& block : layer.blocks) cost += block_cost(hamiltonian, block);
  return cost;
}

}  // namespace farrier::synthesis
