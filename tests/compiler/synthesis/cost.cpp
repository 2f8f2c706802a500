// What a layer is said to cost against what its canonical gates and strings take.
#include "compiler/synthesis/cost.hpp"

#include <doctest/doctest.h>

#include <cstdint>
#include <vector>

#include "tests/support/hamiltonians.hpp"

using namespace farrier;
using test::Term;

namespace {

/// All terms as one block.
std::uint64_t cost(BlockKind kind, const std::vector<Term>& terms) {
  const Hamiltonian h = test::hamiltonian(8, terms);
  Block block{kind, 0, kind == BlockKind::pair ? 1U : 0U, {}};
  for (std::uint32_t k = 0; k < h.sum.size(); ++k) block.terms.push_back(k);
  return synthesis::layer_cost(h, {{block}});
}

}  // namespace

TEST_CASE("an empty layer and one-qubit blocks cost nothing") {
  CHECK(synthesis::layer_cost(test::hamiltonian(2, {}), {}) == 0);
  CHECK(cost(BlockKind::one_qubit, {{"X0", 1}, {"Z0", 2}}) == 0);
}

TEST_CASE("a pair block costs the cx of its canonical gate at a generic angle") {
  // Vidal, Dawson 2004, PRA 69, 010301: three coordinates three, two or one coordinate two.
  CHECK(cost(BlockKind::pair, {{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0 Z1", 1}}) == 3);
  CHECK(cost(BlockKind::pair, {{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0 Z1", 1}, {"Z0", 5}}) == 3);
  CHECK(cost(BlockKind::pair, {{"X0 X1", 1}, {"Y0 Y1", 1}}) == 2);
  CHECK(cost(BlockKind::pair, {{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0", 0.3}}) == 2);
  CHECK(cost(BlockKind::pair, {{"X0 Y1", 1}}) == 2);
  CHECK(cost(BlockKind::pair, {{"Z0 Z1", 1}, {"X0", 0.3}, {"X1", 0.3}}) == 2);
  CHECK(cost(BlockKind::pair, {{"Z0 Z1", 1}, {"X0 Z1", 0.3}}) == 2);
}

TEST_CASE("the size of the coefficients does not matter") {
  for (const double scale : {1e-12, 1e-3, 3.14159265358979, 1e9}) {
    CHECK(cost(BlockKind::pair, {{"X0 X1", scale}, {"Y0 Y1", scale}, {"Z0 Z1", -scale}}) == 3);
    CHECK(cost(BlockKind::pair, {{"X0 Z1", scale}}) == 2);
  }
}

TEST_CASE("a string of weight w costs 2 w - 2") {
  CHECK(cost(BlockKind::string, {{"X0 Y3 Z4", 1}}) == 4);
  CHECK(cost(BlockKind::string, {{"X0 Y1 Z4 Z5 X6 X7", 1}}) == 10);
}

TEST_CASE("a layer costs the sum of its blocks") {
  const Hamiltonian h =
      test::hamiltonian(6, {{"X0 X1", 1}, {"Z2 Z3 Z4", 1}, {"Y0 Y1", 1}, {"X5", 1}});
  // Canonical order: X0 X1, Y0 Y1, Z2 Z3 Z4, X5.
  const Layer layer = {{{BlockKind::pair, 0, 1, {0, 1}},
                        {BlockKind::string, 2, 4, {2}},
                        {BlockKind::one_qubit, 5, 5, {3}}}};
  CHECK(synthesis::layer_cost(h, layer) == 6);
}
