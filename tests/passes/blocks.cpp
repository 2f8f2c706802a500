// Layers out of commuting terms: which blocks, and in which order.
#include "passes/blocks.hpp"

#include <doctest/doctest.h>

#include <numeric>
#include <set>
#include <utility>
#include <vector>

#include "tests/support/hamiltonians.hpp"

using namespace farrier;
using passes::layer_of;
using test::Random;

namespace {

std::vector<std::uint32_t> all_terms(const Hamiltonian& h) {
  std::vector<std::uint32_t> terms(h.sum.size());
  std::iota(terms.begin(), terms.end(), 0U);
  return terms;
}

}  // namespace

TEST_CASE("pair_of names the two qubits in rising order") {
  const Hamiltonian h = test::hamiltonian(5, {{"X1 Z4", 1}});
  CHECK(passes::pair_of(h, 0) == std::pair(1U, 4U));
}

TEST_CASE("terms on one pair share a block - strings stand alone - fields go by their qubit") {
  const Hamiltonian h = test::hamiltonian(
      6, {{"X0 X1", 1}, {"Z0 Z1", 1}, {"Y0 Y1", 1}, {"Z2 Z3 Z4", 1}, {"X5", 1}, {"X2 X3", 1}});
  const Layer layer = layer_of(h, all_terms(h));
  REQUIRE(layer.blocks.size() == 4);
  CHECK(layer.blocks[0].kind == BlockKind::pair);
  CHECK(layer.blocks[0].terms.size() == 3);
  CHECK(layer.blocks[1].kind == BlockKind::pair);
  CHECK(layer.blocks[1].a == 2);
  CHECK(layer.blocks[1].b == 3);
  CHECK(layer.blocks[2].kind == BlockKind::string);
  CHECK(layer.blocks[2].a == 2);
  CHECK(layer.blocks[2].b == 4);
  CHECK(layer.blocks[3].kind == BlockKind::one_qubit);
  CHECK(layer.blocks[3].a == 5);
}

TEST_CASE("no term gives an empty layer") {
  CHECK(layer_of(test::hamiltonian(2, {}), {}).blocks.empty());
}

TEST_CASE("pairs that can run side by side follow each other") {
  // Ising ring: two colours, so the first half of the blocks covers every qubit once.
  std::vector<test::Term> terms;
  for (int k = 0; k < 8; ++k)
    terms.push_back({"Z" + std::to_string(std::min(k, (k + 1) % 8)) + " Z" +
                         std::to_string(std::max(k, (k + 1) % 8)),
                     1.0});
  const Hamiltonian h = test::hamiltonian(8, terms);
  const Layer layer = layer_of(h, all_terms(h));
  REQUIRE(layer.blocks.size() == 8);
  for (std::size_t half = 0; half < 2; ++half) {
    std::set<std::uint32_t> qubits;
    for (std::size_t k = 0; k < 4; ++k) {
      qubits.insert(layer.blocks[4 * half + k].a);
      qubits.insert(layer.blocks[4 * half + k].b);
    }
    CHECK(qubits.size() == 8);
  }
}

TEST_CASE("every term stands in one block that acts on its qubits") {
  Random random(1);
  for (int k = 0; k < 50; ++k) {
    const Hamiltonian h = test::random_strings(6, 30, 4, random);
    std::vector<int> seen(h.sum.size(), 0);
    for (const Block& block : layer_of(h, all_terms(h)).blocks) {
      for (const std::uint32_t term : block.terms) {
        ++seen[term];
        const auto factors = h.sum.factors(term);
        CHECK(factors.front().qubit() >= block.a);
        CHECK(factors.back().qubit() <= block.b);
        CHECK((block.kind != BlockKind::string || factors.size() > 2));
        CHECK((block.kind != BlockKind::pair || factors.size() == 2));
        CHECK((block.kind != BlockKind::one_qubit || factors.size() == 1));
      }
      CHECK((block.kind != BlockKind::string || block.terms.size() == 1));
    }
    CHECK(seen == std::vector<int>(h.sum.size(), 1));
  }
}
