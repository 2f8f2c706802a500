// From the terms of a layer to blocks in an order that is good to schedule.
#include "passes/blocks.hpp"

#include <algorithm>
#include <map>
#include <utility>

#include "compiler/synthesis/edge_colouring.hpp"

namespace farrier::passes {

std::pair<std::uint32_t, std::uint32_t> pair_of(const Hamiltonian& hamiltonian,
                                                std::uint32_t term) {
  const auto factors = hamiltonian.sum.factors(term);
  return {factors[0].qubit(), factors[1].qubit()};
}

Layer layer_of(const Hamiltonian& hamiltonian, const std::vector<std::uint32_t>& terms) {
  std::map<std::pair<std::uint32_t, std::uint32_t>, std::vector<std::uint32_t>> pairs;
  std::map<std::uint32_t, std::vector<std::uint32_t>> fields;
  Layer layer;
  std::vector<Block> strings;
  for (const std::uint32_t term : terms) {
    const auto factors = hamiltonian.sum.factors(term);
    if (factors.size() == 1) {
      fields[factors[0].qubit()].push_back(term);
    } else if (factors.size() == 2) {
      pairs[pair_of(hamiltonian, term)].push_back(term);
    } else {
      strings.push_back(
          {BlockKind::string, factors.front().qubit(), factors.back().qubit(), {term}});
    }
  }

  std::vector<synthesis::Edge> edges;
  for (const auto& [pair, members] : pairs) edges.push_back(pair);
  const std::vector<std::uint32_t> colours = synthesis::colour_edges(hamiltonian.qubits, edges);
  std::vector<std::pair<std::uint32_t, Block>> coloured;
  std::size_t k = 0;
  for (const auto& [pair, members] : pairs)
    coloured.emplace_back(colours[k++], Block{BlockKind::pair, pair.first, pair.second, members});
  std::ranges::stable_sort(coloured, {}, [](const auto& entry) { return entry.first; });
  for (auto& [colour, block] : coloured) layer.blocks.push_back(std::move(block));
  std::ranges::move(strings, std::back_inserter(layer.blocks));
  for (auto& [qubit, members] : fields)
    layer.blocks.push_back({BlockKind::one_qubit, qubit, qubit, std::move(members)});
  return layer;
}

}  // namespace farrier::passes
