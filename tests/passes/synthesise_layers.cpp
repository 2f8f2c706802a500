// synthesise_layers: the circuit is the plan's product of exponentials, phase included, within the
// rounding that it states.
#include <doctest/doctest.h>

#include <farrier/diagnostic.hpp>
#include <farrier/formula.hpp>
#include <string>
#include <string_view>
#include <vector>

#include "compiler/formulas/expand.hpp"
#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using passes::Notes;
using test::Random;
using unitary::Matrix;
using unitary::Real;

namespace {

Layering layering_of(const Hamiltonian& h, bool pairs) {
  Plan plan;
  plan.parts.emplace_back();
  Notes notes;
  if (pairs)
    passes::pair_blocks(h, {}, plan, notes);
  else
    passes::group_commuting(h, {}, plan, notes);
  return plan.parts.front().layerings.front();
}

Plan plan_of(const Layering& layering, std::string_view formula, std::uint64_t steps, double time) {
  Plan plan;
  plan.time = time;
  Part& part = plan.parts.emplace_back();
  part.layerings = {layering};
  part.formula = formula;
  part.steps = steps;
  part.step = formulas::expand(*find_formula(formula), layering.layers.size());
  return plan;
}

/// The product by definition: every step, every exponential of it, each from eigenvalues.
Matrix product(const Hamiltonian& h, const Plan& plan) {
  const Part& part = plan.parts.front();
  const Eigen::Index size = Eigen::Index{1} << h.qubits;
  const Real tau = Real{plan.time} / static_cast<Real>(part.steps);
  Matrix step = Matrix::Identity(size, size);
  for (const Exponential& exponential : part.step) {
    std::vector<std::uint32_t> terms;
    for (const Block& block : part.layerings.front().layers[exponential.layer].blocks)
      terms.insert(terms.end(), block.terms.begin(), block.terms.end());
    step = unitary::evolution(unitary::terms_matrix(h, terms), tau * exponential.fraction) * step;
  }
  Matrix all =
      Matrix::Identity(size, size) * std::polar(1.0L, -Real{h.sum.constant()} * Real{plan.time});
  for (std::uint64_t k = 0; k < part.steps; ++k) all = step * all;
  return all;
}

void check_product(const Hamiltonian& h, const Plan& plan) {
  Notes notes;
  const Circuit circuit = passes::synthesise_layers(h, plan, notes);
  CHECK(circuit.qubits == h.qubits);
  CHECK(circuit.layout_in == circuit.layout_out);
  const Real scale = 1.0L + std::abs(Real{plan.time}) * h.sum.one_norm();
  CHECK(unitary::distance(unitary::circuit_matrix(circuit), product(h, plan)) <=
        circuit.rounding + 1e-17L * scale);
  CHECK(circuit.rounding <= 1e-11);
}

}  // namespace

TEST_CASE("the circuit is the product of exponentials of the plan") {
  Random random(1);
  for (const std::string_view formula : {"lie", "strang", "suzuki-4"}) {
    for (const std::uint64_t steps : {1, 2, 3}) {
      INFO(formula << ", " << steps << " steps");
      for (const bool pairs : {false, true}) {
        const Hamiltonian two_local = test::random_two_local(3, random);
        check_product(two_local, plan_of(layering_of(two_local, pairs), formula, steps, 0.7));
        const Hamiltonian chain = test::heisenberg(4, test::Ends::open, 0.4);
        check_product(chain, plan_of(layering_of(chain, pairs), formula, steps, -1.3));
      }
      const Hamiltonian strings = test::random_strings(4, 8, 4, random);
      check_product(strings, plan_of(layering_of(strings, false), formula, steps, 2.1));
    }
  }
}

TEST_CASE("the circuit is the product at extreme times and with trees") {
  Random random(2);
  for (const double time : {1e-9, -1e-3, 300.0}) {
    for (int k = 0; k < 3; ++k) {
      const Hamiltonian h = test::random_strings(4, 6, 4, random);
      Plan plan = plan_of(layering_of(h, false), "strang", 3, time);
      plan.parts.front().tree_ladders = k % 2 == 0;
      check_product(h, plan);
    }
  }
}

TEST_CASE("one layer takes one exponential whatever the steps") {
  const Hamiltonian h = test::ising_chain(4, 0.8, 0.0);
  const Plan plan = plan_of(layering_of(h, false), "lie", 7, 0.9);
  check_product(h, plan);
  Notes notes;
  const Circuit circuit = passes::synthesise_layers(h, plan, notes);
  REQUIRE(circuit.segments.size() == 1);
  CHECK(circuit.segments.front().repeats == 1);
}

TEST_CASE("layers that meet at the seam become one") {
  // A/2 B A/2, three times: A/2, [B A] x 2, B A/2.
  const Hamiltonian h = test::hamiltonian(1, {{"X0", 1}, {"Z0", 0.7}});
  const Plan plan = plan_of(layering_of(h, false), "strang", 3, 0.5);
  REQUIRE(plan.parts.front().step.size() == 3);
  Notes notes;
  const Circuit circuit = passes::synthesise_layers(h, plan, notes);
  REQUIRE(circuit.segments.size() == 3);
  CHECK(circuit.segments[0].gates.size() == 1);
  CHECK(circuit.segments[1].gates.size() == 2);
  CHECK(circuit.segments[1].repeats == 2);
  CHECK(circuit.segments[2].gates.size() == 2);
}

TEST_CASE("time 0 is the empty evolution") {
  const Hamiltonian h = test::heisenberg(3, test::Ends::open);
  Notes notes;
  const Circuit circuit =
      passes::synthesise_layers(h, plan_of(layering_of(h, false), "strang", 2, 0.0), notes);
  CHECK(circuit.segments.empty());
  CHECK(circuit.global_phase == 0.0);
  CHECK(circuit.rounding == 0.0);
  CHECK(notes == Notes{"time 0: the empty evolution"});
}

TEST_CASE("a constant alone is a phase") {
  const Hamiltonian h = test::hamiltonian(2, {{"I", 2.5}});
  Plan plan;
  plan.time = 1.75;
  plan.parts.emplace_back().layerings.emplace_back();
  Notes notes;
  const Circuit circuit = passes::synthesise_layers(h, plan, notes);
  CHECK(circuit.segments.empty());
  CHECK(std::abs(circuit.global_phase - (2 * unitary::pi - 2.5L * 1.75L)) <= circuit.rounding);
}

TEST_CASE("a plan without a chosen layering is a fault") {
  const Hamiltonian h = test::heisenberg(3, test::Ends::open);
  Plan plan = plan_of(layering_of(h, false), "strang", 2, 1.0);
  plan.parts.front().layerings.push_back(layering_of(h, true));
  Notes notes;
  CHECK_THROWS_AS(passes::synthesise_layers(h, plan, notes), InternalFault);
  plan.parts.front().layerings.clear();
  CHECK_THROWS_AS(passes::synthesise_layers(h, plan, notes), InternalFault);
}
