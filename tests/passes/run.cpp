// The runner: every pass runs once, in order, is logged, and is held to its promises.
#include "passes/run.hpp"

#include <doctest/doctest.h>

#include <farrier/diagnostic.hpp>
#include <string>
#include <vector>

#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using passes::Request;

namespace {

Request request(double time, double tolerance) {
  Request result;
  result.time = time;
  result.budget.tolerance = tolerance;
  return result;
}

template <typename... Kinds>
std::vector<std::string> names() {
  std::vector<std::string> result;
  for (const passes::Pass& pass : passes::pass_table())
    if ((std::holds_alternative<Kinds>(pass.run) || ...)) result.emplace_back(pass.name);
  return result;
}

std::vector<std::string> logged(const std::vector<PassEntry>& log) {
  std::vector<std::string> result;
  for (const PassEntry& entry : log) result.push_back(entry.name);
  return result;
}

/// The message of the fault that `body` throws; empty where it throws none.
template <typename Body>
std::string fault(Body&& body) {
  try {
    body();
  } catch (const InternalFault& error) {
    return error.what();
  }
  return "";
}

}  // namespace

TEST_CASE("every pass is run and logged in the order of the table") {
  Hamiltonian h = test::heisenberg(4, test::Ends::joined, 0.3);
  std::vector<PassEntry> log;
  passes::run_hamiltonian_passes(h, log);
  CHECK(logged(log) == names<passes::HamiltonianPass>());
  log.clear();
  const Plan plan = passes::run_plan_passes(h, request(1.0, 1e-2), log);
  CHECK(logged(log) == names<passes::PlanPass>());
  log.clear();
  passes::run_circuit_passes(h, request(1.0, 1e-2), plan, log);
  CHECK(logged(log) == names<passes::BuildPass, passes::CircuitPass>());
  for (const PassEntry& entry : log) {
    CHECK(entry.counts);
    CHECK_FALSE(entry.notes.empty());
    CHECK(entry.seconds >= 0.0);
  }
}

TEST_CASE("the counts of a pass start where those of the last one end") {
  const Hamiltonian h = test::heisenberg(4, test::Ends::joined, 0.3);
  std::vector<PassEntry> log;
  const Plan plan = passes::run_plan_passes(h, request(1.0, 1e-2), log);
  log.clear();
  const Circuit circuit = passes::run_circuit_passes(h, request(1.0, 1e-2), plan, log);
  for (std::size_t k = 1; k < log.size(); ++k) {
    CHECK(log[k].counts->before.gates() == log[k - 1].counts->after.gates());
    CHECK(log[k].counts->before.depth == log[k - 1].counts->after.depth);
  }
  CHECK(log.back().counts->after.gates() == count(circuit).gates());
}

TEST_CASE("the finished circuit is the product of the plan within its rounding") {
  test::Random random(1);
  const Hamiltonian h = test::random_two_local(3, random);
  std::vector<PassEntry> log;
  const Plan plan = passes::run_plan_passes(h, request(0.5, 1e-2), log);
  const Circuit circuit = passes::run_circuit_passes(h, request(0.5, 1e-2), plan, log);
  passes::Notes notes;
  const Circuit raw = passes::synthesise_layers(h, plan, notes);
  CHECK(unitary::distance(unitary::circuit_matrix(circuit), unitary::circuit_matrix(raw)) <=
        circuit.rounding - raw.rounding + 1e-16L);
}

TEST_CASE("offer_layerings offers without choosing") {
  const Hamiltonian h = test::heisenberg(6, test::Ends::joined, 0.3);
  const Plan plan = passes::offer_layerings(h);
  REQUIRE(plan.parts.size() == 1);
  REQUIRE(plan.parts.front().layerings.size() == 2);
  CHECK(plan.parts.front().layerings[0].name == "commuting sets");
  CHECK(plan.parts.front().layerings[1].name == "pair blocks");
  CHECK(plan.candidates.empty());
}

TEST_CASE("a string beyond the qubits is a fault that names the pass") {
  Hamiltonian h = test::heisenberg(4, test::Ends::open);
  h.qubits = 3;
  std::vector<PassEntry> log;
  CHECK(fault([&] { passes::run_hamiltonian_passes(h, log); }) ==
        "pass merge_terms broke an invariant: every string acts on qubits of the Hamiltonian");
}

TEST_CASE("a gate beyond the qubits is a fault that names the pass") {
  const Hamiltonian h = test::heisenberg(2, test::Ends::open);
  std::vector<PassEntry> log;
  Plan plan = passes::run_plan_passes(h, request(1.0, 1e-2), log);
  plan.parts.front().layerings.front().layers.front().blocks.front().b = 7;
  CHECK(fault([&] { passes::run_circuit_passes(h, request(1.0, 1e-2), plan, log); }) ==
        "pass synthesise_layers broke an invariant: gates act on qubits of the circuit");
}

TEST_CASE("a pair block on one qubit is a fault that names the pass") {
  const Hamiltonian h = test::heisenberg(2, test::Ends::open);
  std::vector<PassEntry> log;
  Plan plan = passes::run_plan_passes(h, request(1.0, 1e-2), log);
  plan.parts.front().layerings.front().layers.front().blocks.front().b = 0;
  CHECK(fault([&] { passes::run_circuit_passes(h, request(1.0, 1e-2), plan, log); }) ==
        "pass synthesise_layers broke an invariant: a gate has as many operands as its kind");
}
