// cancel_gates: the same operator with no more gates and no more depth. What it cancels is tested
// in compiler/synthesis/peephole.cpp.
#include <doctest/doctest.h>

#include <farrier/formula.hpp>
#include <string_view>

#include "compiler/formulas/expand.hpp"
#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using passes::Notes;

namespace {

Circuit synthesised(const Hamiltonian& h, std::string_view formula, std::uint64_t steps) {
  Plan plan;
  plan.time = 0.6;
  Part& part = plan.parts.emplace_back();
  Notes notes;
  passes::group_commuting(h, {}, plan, notes);
  part.steps = steps;
  part.step = formulas::expand(*find_formula(formula), part.layerings.front().layers.size());
  return passes::synthesise_layers(h, plan, notes);
}

}  // namespace

TEST_CASE("the operator stays and no count grows") {
  test::Random random(1);
  for (int k = 0; k < 40; ++k) {
    const Hamiltonian h = test::random_strings(4, 7, 4, random);
    Circuit circuit = synthesised(h, k % 2 == 0 ? "lie" : "strang", 1 + test::below(random, 5));
    const CircuitCounts before = count(circuit);
    const unitary::Matrix operator_before = unitary::circuit_matrix(circuit);
    const double rounding_before = circuit.rounding;
    Notes notes;
    passes::cancel_gates({}, circuit, notes);
    const CircuitCounts after = count(circuit);
    CHECK(after.gates() <= before.gates());
    CHECK(after.two_qubit_gates <= before.two_qubit_gates);
    CHECK(after.depth <= before.depth);
    CHECK(after.two_qubit_depth <= before.two_qubit_depth);
    CHECK(unitary::distance(unitary::circuit_matrix(circuit), operator_before) <=
          circuit.rounding - rounding_before + 1e-16L);
    CHECK(notes.size() == 1);
  }
}

TEST_CASE("basis changes between strings of one kind cancel") {
  // X0 X1 X2 and X2 X3 X4 commute; both are taken to Z and back, but for qubit 2 only once.
  Circuit circuit =
      synthesised(test::hamiltonian(5, {{"X0 X1 X2", 1}, {"X2 X3 X4", 0.5}}), "lie", 1);
  const CircuitCounts before = count(circuit);
  Notes notes;
  passes::cancel_gates({}, circuit, notes);
  CHECK(count(circuit).one_qubit_gates == before.one_qubit_gates - 2);
}
