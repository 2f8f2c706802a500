// pair_blocks
//
// Does: where no term acts on more than two qubits, puts all terms of a pair of qubits into one
// block, whether they commute or not, folds each one-qubit term into a block on its qubit, and
// splits the blocks into layers by an edge colouring of the interaction graph. Each block is
// exponentiated exactly. Does not choose a layering; it offers one.
//
//   X0 X1 + Y0 Y1 + Z1 + X1 X2   becomes   {[0,1]: X0 X1 + Y0 Y1, Z1}, {[1,2]: X1 X2}   (say)
//
// Promises: the same operator; blocks of a layer act on disjoint pairs.
// Stands after merge_terms; before order_layers.
// Source: edge colouring as grouping: Barthel, Zhang 2020, Ann. Phys. 418, 168165
// (arXiv:1901.04974).
#include <algorithm>
#include <cstdint>
#include <map>
#include <string>
#include <utility>

#include "compiler/synthesis/edge_colouring.hpp"
#include "passes/blocks.hpp"
#include "passes/table.hpp"

namespace farrier::passes {
namespace {

std::vector<Block> coupling_blocks(const Hamiltonian& hamiltonian) {
  std::map<std::pair<std::uint32_t, std::uint32_t>, std::vector<std::uint32_t>> pairs;
  for (std::uint32_t term = 0; term < hamiltonian.sum.size(); ++term)
    if (hamiltonian.sum.factors(term).size() == 2)
      pairs[pair_of(hamiltonian, term)].push_back(term);
  std::vector<Block> blocks;
  for (auto& [pair, terms] : pairs)
    blocks.push_back({BlockKind::pair, pair.first, pair.second, std::move(terms)});
  return blocks;
}

/// Gives the one-qubit terms of each qubit to the block on it that holds the fewest qubits' terms
/// so far; terms of a qubit without a block get one of their own.
std::vector<Block> fold_fields(const Hamiltonian& hamiltonian, std::vector<Block>& blocks) {
  std::vector<std::vector<std::uint32_t>> blocks_on(hamiltonian.qubits);
  for (std::uint32_t k = 0; k < blocks.size(); ++k) {
    blocks_on[blocks[k].a].push_back(k);
    blocks_on[blocks[k].b].push_back(k);
  }
  std::vector<std::vector<std::uint32_t>> fields(hamiltonian.qubits);
  for (std::uint32_t term = 0; term < hamiltonian.sum.size(); ++term) {
    const auto factors = hamiltonian.sum.factors(term);
    if (factors.size() == 1) fields[factors[0].qubit()].push_back(term);
  }
  std::vector<std::uint32_t> held(blocks.size(), 0);
  std::vector<Block> alone;
  for (std::uint32_t qubit = 0; qubit < hamiltonian.qubits; ++qubit) {
    if (fields[qubit].empty()) continue;
    if (blocks_on[qubit].empty()) {
      alone.push_back({BlockKind::one_qubit, qubit, qubit, std::move(fields[qubit])});
      continue;
    }
    const std::uint32_t home =
        *std::ranges::min_element(blocks_on[qubit], {}, [&](std::uint32_t k) { return held[k]; });
    ++held[home];
    blocks[home].terms.insert(blocks[home].terms.end(), fields[qubit].begin(), fields[qubit].end());
  }
  return alone;
}

}  // namespace

void pair_blocks(const Hamiltonian& hamiltonian, const Request&, Plan& plan, Notes& notes) {
  if (hamiltonian.sum.max_weight() > 2) {
    notes.push_back("not offered: a term acts on more than two qubits");
    return;
  }
  std::vector<Block> blocks = coupling_blocks(hamiltonian);
  std::vector<synthesis::Edge> edges;
  for (const Block& block : blocks) edges.emplace_back(block.a, block.b);
  const std::vector<std::uint32_t> colours = synthesis::colour_edges(hamiltonian.qubits, edges);
  std::vector<Block> alone = fold_fields(hamiltonian, blocks);

  Layering layering{"pair blocks", "as coloured", {}};
  if (hamiltonian.sum.empty()) {
    notes.push_back("not offered: no terms");
    return;
  }
  layering.layers.resize(colours.empty() ? 1 : std::ranges::max(colours) + 1);
  for (std::size_t k = 0; k < blocks.size(); ++k)
    layering.layers[colours[k]].blocks.push_back(std::move(blocks[k]));
  std::ranges::move(alone, std::back_inserter(layering.layers.front().blocks));
  notes.push_back(std::to_string(edges.size()) + " pairs in " +
                  std::to_string(layering.layers.size()) + " layers");
  plan.parts.front().layerings.push_back(std::move(layering));
}

}  // namespace farrier::passes
