// pair_blocks: every term in one block, the blocks of a layer on disjoint qubits.
#include <doctest/doctest.h>

#include <set>
#include <string>
#include <vector>

#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"

using namespace farrier;
using passes::Notes;
using test::Random;

namespace {

/// The layering offered, or none.
std::vector<Layering> offered(const Hamiltonian& h, Notes& notes) {
  Plan plan;
  plan.parts.emplace_back();
  passes::pair_blocks(h, {}, plan, notes);
  return plan.parts.front().layerings;
}

Layering layering(const Hamiltonian& h) {
  Notes notes;
  const std::vector<Layering> all = offered(h, notes);
  REQUIRE(all.size() == 1);
  return all.front();
}

void check_blocks(const Hamiltonian& h) {
  std::vector<int> seen(h.sum.size(), 0);
  for (const Layer& layer : layering(h).layers) {
    std::set<std::uint32_t> used;
    for (const Block& block : layer.blocks) {
      CHECK(used.insert(block.a).second);
      if (block.kind == BlockKind::pair) {
        CHECK(block.a < block.b);
        CHECK(used.insert(block.b).second);
      } else {
        CHECK(block.kind == BlockKind::one_qubit);
      }
      CHECK_FALSE(block.terms.empty());
      for (const std::uint32_t term : block.terms) {
        ++seen[term];
        for (const Factor factor : h.sum.factors(term))
          CHECK((factor.qubit() == block.a || factor.qubit() == block.b));
      }
    }
  }
  CHECK(seen == std::vector<int>(h.sum.size(), 1));
}

}  // namespace

TEST_CASE("the example of the pass") {
  const Hamiltonian h = test::hamiltonian(3, {{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z1", 1}, {"X1 X2", 1}});
  const Layering made = layering(h);
  CHECK(made.name == "pair blocks");
  CHECK(made.layers.size() == 2);
  check_blocks(h);
}

TEST_CASE("as many layers as the interaction graph takes colours") {
  // Konig 1916 for the bipartite ones; an odd ring takes three.
  CHECK(layering(test::heisenberg(8, test::Ends::open)).layers.size() == 2);
  CHECK(layering(test::heisenberg(8, test::Ends::joined)).layers.size() == 2);
  CHECK(layering(test::heisenberg(7, test::Ends::joined, 0.4)).layers.size() == 3);
  CHECK(layering(test::ising_grid(4, 5, 1, 1)).layers.size() == 4);
  Random random(1);
  CHECK(layering(test::random_two_local(6, random)).layers.size() == 5);
}

TEST_CASE("a lone pair is one layer whatever acts on it") {
  Random random(2);
  CHECK(layering(test::random_two_local(2, random)).layers.size() == 1);
}

TEST_CASE("fields are folded into blocks - lone ones get their own") {
  const Hamiltonian h = test::hamiltonian(4, {{"X0 X1", 1}, {"Z0", 1}, {"Z3", 1}, {"Y3", 1}});
  const Layering made = layering(h);
  REQUIRE(made.layers.size() == 1);
  REQUIRE(made.layers[0].blocks.size() == 2);
  CHECK(made.layers[0].blocks[0].terms.size() == 2);
  CHECK(made.layers[0].blocks[1].kind == BlockKind::one_qubit);
  CHECK(made.layers[0].blocks[1].a == 3);
  CHECK(made.layers[0].blocks[1].terms.size() == 2);
}

TEST_CASE("not offered where it cannot be") {
  Notes heavy;
  CHECK(offered(test::hamiltonian(3, {{"X0 X1 X2", 1}, {"Z0 Z1", 1}}), heavy).empty());
  REQUIRE(heavy.size() == 1);
  CHECK(heavy[0] == "not offered: a term acts on more than two qubits");
  Notes none;
  CHECK(offered(test::hamiltonian(2, {{"I", 1}}), none).empty());
  REQUIRE(none.size() == 1);
  CHECK(none[0] == "not offered: no terms");
}

TEST_CASE("fields alone are one layer whether they commute or not") {
  const Hamiltonian h = test::hamiltonian(3, {{"X0", 1}, {"Z0", 1}, {"Y2", 1}});
  const Layering made = layering(h);
  CHECK(made.layers.size() == 1);
  CHECK(made.layers.front().blocks.size() == 2);
  check_blocks(h);
}

TEST_CASE("every term in one block and blocks of a layer on disjoint qubits") {
  Random random(3);
  check_blocks(test::heisenberg(9, test::Ends::joined, 0.5));
  check_blocks(test::ising_grid(4, 4, 1.0, 0.8));
  for (int k = 0; k < 80; ++k) {
    check_blocks(test::random_two_local(2 + test::below(random, 6), random));
    Hamiltonian sparse = test::random_strings(9, 12, 2, random);
    if (sparse.sum.max_weight() == 2) check_blocks(sparse);
  }
}
