// merge_terms: equal strings add up, what cancels is dropped, the operator stays.
#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <string>
#include <vector>

#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using passes::Notes;

namespace {

const std::array<Factor, 2> both_x = {Factor(0, Pauli::x), Factor(1, Pauli::x)};
const std::array<Factor, 1> only_z0 = {Factor(0, Pauli::z)};
const std::array<Factor, 1> only_y1 = {Factor(1, Pauli::y)};

}  // namespace

TEST_CASE("equal strings add up") {
  Hamiltonian h{2, {}, {}, {}};
  h.sum.add(both_x, 0.5);
  h.sum.add(only_z0, 0.25);
  h.sum.add(both_x, 0.5);
  Notes notes;
  passes::merge_terms(h, notes);
  REQUIRE(h.sum.size() == 2);
  CHECK(to_text(h.sum.factors(0)) == "X0 X1");
  CHECK(h.sum.coefficient(0) == 1.0);
  CHECK(to_text(h.sum.factors(1)) == "Z0");
  CHECK(h.sum.coefficient(1) == 0.25);
  REQUIRE(notes.size() == 2);
  CHECK(notes[0] == "2 distinct strings on 2 qubits, largest weight 2");
  CHECK(notes[1] == "1 terms merged or cancelled");
}

TEST_CASE("what cancels is dropped - the constant stays") {
  Hamiltonian h{2, {}, {}, {}};
  h.sum.add(only_z0, 0.25);
  h.sum.add(only_z0, -0.25);
  h.sum.add({}, 2.0);
  Notes notes;
  passes::merge_terms(h, notes);
  CHECK(h.sum.empty());
  CHECK(h.sum.constant() == 2.0);
}

TEST_CASE("each term keeps the origin of its first occurrence") {
  Hamiltonian h{2, {}, {{0, 1}, {0, 2}, {1, 3}, {1, 4}, {0, 5}}, {"a", "b"}};
  h.sum.add(only_y1, 1.0);
  h.sum.add(only_z0, 1.0);
  h.sum.add(only_y1, 1.0);
  h.sum.add(both_x, 1.0);
  h.sum.add(only_z0, -1.0);
  Notes notes;
  passes::merge_terms(h, notes);
  REQUIRE(h.sum.size() == 2);
  REQUIRE(h.origins.size() == 2);
  CHECK(to_text(h.sum.factors(0)) == "X0 X1");
  CHECK(h.origins[0].file == 1);
  CHECK(h.origins[0].line == 4);
  CHECK(to_text(h.sum.factors(1)) == "Y1");
  CHECK(h.origins[1].line == 1);
}

TEST_CASE("the operator stays up to rounding") {
  test::Random random(1);
  for (int k = 0; k < 30; ++k) {
    Hamiltonian h{3, {}, {}, {}};
    for (int j = 0; j < 60; ++j) h.sum.add(test::random_string(random, 3), random.between(-1, 1));
    const unitary::Matrix before = unitary::sum_matrix(3, h.sum);
    Notes notes;
    passes::merge_terms(h, notes);
    CHECK(h.sum.size() <= 63);
    CHECK(unitary::distance(unitary::sum_matrix(3, h.sum), before) <= 60 * 2e-16L * 60);
  }
}
