// group_commuting
//
// Does: splits H into layers of mutually commuting terms, by colouring the graph in which
// anticommuting terms are joined: each term, largest coefficients first, takes the least colour
// that no anticommuting term has. Does not choose a layering; it offers one.
//
//   X0 X1 + Y0 Y1 + X1 X2 + Z1   becomes   {X0 X1, Y0 Y1}, {X1 X2}, {Z1}
//
// Promises: the same operator; terms of a layer commute, and so do its blocks.
// Stands after merge_terms; before order_layers.
// Source: greedy colouring; layers of commuting terms as in van den Berg, Temme 2020,
// arXiv:2003.13599.
#include <algorithm>
#include <cmath>
#include <cstdint>
#include <numeric>
#include <string>

#include "compiler/pauli/strings.hpp"
#include "passes/blocks.hpp"
#include "passes/table.hpp"

namespace farrier::passes {
namespace {

std::vector<std::uint32_t> by_magnitude(const PauliSum& sum) {
  std::vector<std::uint32_t> order(sum.size());
  std::iota(order.begin(), order.end(), 0U);
  std::ranges::stable_sort(order, std::ranges::greater{},
                           [&](std::uint32_t k) { return std::abs(sum.coefficient(k)); });
  return order;
}

/// Terms of each colour, in canonical order.
std::vector<std::vector<std::uint32_t>> colour_terms(const Hamiltonian& hamiltonian) {
  const PauliSum& sum = hamiltonian.sum;
  std::vector<std::vector<std::uint32_t>> on_qubit(hamiltonian.qubits);
  std::vector<std::uint32_t> colour(sum.size(), 0);
  std::vector<std::uint32_t> blocked_by;  // for each colour, the last term that it is blocked for
  std::vector<std::uint32_t> seen(sum.size(), ~0U);
  for (const std::uint32_t term : by_magnitude(sum)) {
    for (const Factor factor : sum.factors(term)) {
      for (const std::uint32_t other : on_qubit[factor.qubit()]) {
        if (seen[other] == term) continue;
        seen[other] = term;
        if (blocked_by[colour[other]] == term) continue;
        if (!pauli::commute(sum.factors(term), sum.factors(other)))
          blocked_by[colour[other]] = term;
      }
    }
    const auto free =
        std::ranges::find_if(blocked_by, [&](std::uint32_t by) { return by != term; });
    colour[term] = static_cast<std::uint32_t>(free - blocked_by.begin());
    if (free == blocked_by.end()) blocked_by.push_back(~0U);
    for (const Factor factor : sum.factors(term)) on_qubit[factor.qubit()].push_back(term);
  }
  std::vector<std::vector<std::uint32_t>> groups(blocked_by.size());
  for (std::uint32_t term = 0; term < sum.size(); ++term) groups[colour[term]].push_back(term);
  return groups;
}

}  // namespace

void group_commuting(const Hamiltonian& hamiltonian, const Request&, Plan& plan, Notes& notes) {
  Layering layering{"commuting sets", "as grouped", {}};
  for (const auto& group : colour_terms(hamiltonian))
    layering.layers.push_back(layer_of(hamiltonian, group));
  notes.push_back(std::to_string(hamiltonian.sum.size()) + " terms in " +
                  std::to_string(layering.layers.size()) + " commuting layers");
  if (layering.layers.size() <= 1) notes.push_back("all terms commute: one exact step at any time");
  plan.parts.front().layerings.push_back(std::move(layering));
}

}  // namespace farrier::passes
