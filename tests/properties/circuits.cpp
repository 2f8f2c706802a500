// A hunt for a circuit that is farther from the exact evolution than its certificate says: random
// Hamiltonians through the whole of compile(), with random settings.
#include <doctest/doctest.h>

#include <array>
#include <farrier/compile.hpp>
#include <farrier/diagnostic.hpp>
#include <farrier/formula.hpp>
#include <numbers>

#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using test::Random;

namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Native, 6> natives = {Native::cx,    Native::cz,  Native::ecr,
                                           Native::iswap, Native::rzz, Native::rxx};

/// Coefficients of every kind: generic, equal, multiples of the Clifford angle, of any size.
double coefficient(Random& random) {
  switch (test::below(random, 5)) {
    case 0:
      return test::pick(random, std::array{1.0, -1.0, 0.5, 2.0});
    case 1:
      return test::pick(random, std::array{pi / 4, -pi / 4, pi / 2, pi / 8, pi});
    case 2:
      return random.between(-1e-6, 1e-6);
    default:
      return random.between(-1, 1);
  }
}

Hamiltonian random_hamiltonian(Random& random) {
  const std::uint32_t qubits = 2 + test::below(random, 4);
  const std::uint32_t weight = 1 + test::below(random, qubits);
  const std::uint32_t count = 1 + test::below(random, 4 * qubits);
  PauliSum sum;
  for (std::uint32_t k = 0; k < count; ++k)
    sum.add(test::random_string_of_weight(random, qubits, 1 + test::below(random, weight)),
            coefficient(random));
  if (random.chance(0.3)) sum.add_constant(coefficient(random));
  sum.merge();
  return {qubits, std::move(sum), {}, {}};
}

Job random_job(Random& random) {
  Job job;
  job.name = "hunt";
  job.hamiltonian = random_hamiltonian(random);
  job.times = {test::pick(random, std::array{1.0, -1.0, 0.1, 3.0, 0.01}) *
               (random.chance(0.5) ? 1.0 : random.between(0.5, 1.5))};
  // On few qubits the formula is free now and then; on more that takes long.
  if (job.hamiltonian.qubits > 4 || random.chance(0.9))
    job.restriction.formulas.emplace_back(test::pick(random, formula_table()).name);
  if (random.chance(0.6))
    job.restriction.steps = 1 + test::below(random, random.chance(0.2) ? 5000 : 6);
  else if (random.chance(0.2))
    job.budget.max_two_qubit_gates = 1 + test::below(random, 400);
  else
    job.budget.tolerance = test::pick(random, std::array{0.3, 1e-2, 1e-3, 1e-5});
  job.budget.minimise =
      test::pick(random, std::array{Objective::gates, Objective::depth, Objective::rotations});
  job.budget.assurance = random.chance(0.2) ? Assurance::average : Assurance::certified;
  job.output.native = test::pick(random, natives);
  job.output.style = Style::looped;
  job.search.effort = Effort::low;
  return job;
}

}  // namespace

TEST_CASE("no circuit is farther from the exact evolution than its certificate says") {
  int refused = 0;
  for (std::uint64_t seed = 1; seed <= 100; ++seed) {
    INFO("seed " << seed);
    Random random(seed);
    const Job job = random_job(random);
    Result result;
    try {
      result = compile(job);
    } catch (const UserError& error) {
      // A limit that is too low, or a tolerance out of reach: a true "no".
      CHECK(error.code() == ExitCode::refused);
      ++refused;
      continue;
    }
    const Point& point = result.points.front();
    const Hamiltonian& h = result.hamiltonian;
    const unitary::Matrix made = unitary::circuit_matrix(point.circuit);
    const unitary::Matrix exact =
        unitary::evolution(unitary::sum_matrix(h.qubits, h.sum), point.plan.time);
    const unitary::Real distance = job.budget.assurance == Assurance::average
                                       ? unitary::average_distance(made, exact)
                                       : unitary::distance(made, exact);
    CHECK(distance <= point.plan.certificate.bound);
    if (job.budget.tolerance) CHECK(point.plan.certificate.bound <= *job.budget.tolerance);
    if (job.budget.max_two_qubit_gates)
      CHECK(point.counts.two_qubit_gates <= *job.budget.max_two_qubit_gates);
  }
  CHECK(refused < 20);
}
