// The exponential of one Pauli string as gates: basis changes to Z, parity into one qubit, a
// rotation, and back (standard; e.g. Nielsen, Chuang 2000, section 4.7.3).
#include "compiler/synthesis/string.hpp"

#include <cmath>
#include <utility>
#include <vector>

#include "compiler/synthesis/turn.hpp"

namespace farrier::synthesis {
namespace {

using CxList = std::vector<std::pair<std::uint32_t, std::uint32_t>>;

/// cx gates after which the last qubit holds the parity of all.
CxList parity_gates(std::span<const Factor> factors, Ladder ladder) {
  CxList gates;
  if (ladder == Ladder::line) {
    for (std::size_t k = 0; k + 1 < factors.size(); ++k)
      gates.emplace_back(factors[k].qubit(), factors[k + 1].qubit());
    return gates;
  }
  std::vector<std::uint32_t> roots;
  for (const Factor factor : factors) roots.push_back(factor.qubit());
  while (roots.size() > 1) {
    std::vector<std::uint32_t> next;
    // Pairs from the end, so that the last qubit stays a root.
    std::size_t k = roots.size() % 2;
    if (k == 1) next.push_back(roots[0]);
    for (; k < roots.size(); k += 2) {
      gates.emplace_back(roots[k], roots[k + 1]);
      next.push_back(roots[k + 1]);
    }
    roots = std::move(next);
  }
  return gates;
}

}  // namespace

Sequence string_sequence(std::span<const Factor> factors, double value, Ladder ladder) {
  Sequence result;
  const CxList parity = parity_gates(factors, ladder);
  for (const Factor factor : factors)
    result.gates.push_back(turn_gate(factor.qubit(), inverse(from_z(factor.letter()))));
  for (const auto& [control, target] : parity)
    result.gates.push_back({GateKind::cx, control, target, {}});
  result.gates.push_back(turn_gate(factors.back().qubit(), rotation(Pauli::z, 2 * value)));
  for (std::size_t k = parity.size(); k-- > 0;)
    result.gates.push_back({GateKind::cx, parity[k].first, parity[k].second, {}});
  for (const Factor factor : factors)
    result.gates.push_back(turn_gate(factor.qubit(), from_z(factor.letter())));
  result.rounding =
      turn_rounding * (1.0 + static_cast<double>(2 * factors.size())) + 4e-16 * std::abs(value);
  return result;
}

}  // namespace farrier::synthesis
