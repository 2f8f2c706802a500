// choose_formula: the best of what is allowed, certified within the tolerance, or a refusal.
#include <doctest/doctest.h>

#include <algorithm>
#include <farrier/diagnostic.hpp>
#include <optional>
#include <string>
#include <vector>

#include "compiler/base/parallel.hpp"
#include "passes/run.hpp"
#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using passes::Request;

namespace {

Request request(double time, std::optional<double> tolerance) {
  Request result;
  result.time = time;
  result.budget.tolerance = tolerance;
  return result;
}

Plan planned(const Hamiltonian& h, const Request& asked) {
  std::vector<PassEntry> log;
  return passes::run_plan_passes(h, asked, log);
}

/// The refusal that planning ends in.
std::string refusal(const Hamiltonian& h, const Request& asked) {
  try {
    planned(h, asked);
  } catch (const UserError& error) {
    CHECK(error.code() == ExitCode::refused);
    return error.what();
  }
  return "";
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

/// What holds for every plan.
void check_plan(const Plan& plan, const Request& asked) {
  REQUIRE(plan.parts.size() == 1);
  REQUIRE_FALSE(plan.candidates.empty());
  const Part& part = plan.parts.front();
  const Candidate& chosen = plan.candidates.front();
  CHECK(chosen.verdict == "chosen");
  CHECK(chosen.formula == part.formula);
  CHECK(chosen.steps == part.steps);
  CHECK(chosen.certificate.bound == plan.certificate.bound);
  REQUIRE(part.layerings.size() == 1);
  CHECK(part.layerings.front().name == chosen.layering);
  CHECK(part.layerings.front().order == chosen.term_order);
  if (asked.budget.tolerance) CHECK(plan.certificate.bound <= *asked.budget.tolerance);
  double sum = 0.0;
  for (const Contribution& contribution : plan.certificate.contributions)
    if (contribution.counts) sum += contribution.value;
  CHECK(sum <= plan.certificate.bound);
  CHECK(plan.certificate.bound <= sum * (1 + 1e-12));
  for (std::size_t k = 1; k < plan.candidates.size(); ++k) {
    CHECK_FALSE(plan.candidates[k].verdict.empty());
    CHECK(plan.candidates[k].verdict != "chosen");
  }
}

unitary::Real measured(const Hamiltonian& h, const Request& asked, const Plan& plan) {
  std::vector<PassEntry> log;
  const Circuit circuit = passes::run_circuit_passes(h, asked, plan, log);
  return unitary::distance(unitary::circuit_matrix(circuit),
                           unitary::evolution(unitary::sum_matrix(h.qubits, h.sum), asked.time));
}

}  // namespace

TEST_CASE("the chosen plan keeps the tolerance and the exact evolution agrees") {
  for (const Hamiltonian& h :
       {test::heisenberg(4, test::Ends::joined, 0.3), test::ising_chain(5, 1.0, 0.7)}) {
    for (const double tolerance : {1e-1, 1e-3, 1e-6}) {
      const Request asked = request(0.8, tolerance);
      const Plan plan = planned(h, asked);
      check_plan(plan, asked);
      CHECK(measured(h, asked, plan) <= plan.certificate.bound);
    }
  }
}

TEST_CASE("the first candidate has the fewest of what is minimised") {
  const Hamiltonian h = test::heisenberg(5, test::Ends::open, 0.3);
  Request asked = request(1.0, 1e-3);
  for (const Objective objective : {Objective::gates, Objective::depth, Objective::rotations}) {
    asked.budget.minimise = objective;
    const Plan plan = planned(h, asked);
    check_plan(plan, asked);
    const auto figure = [&](const Candidate& candidate) {
      if (objective == Objective::depth) return candidate.counts.two_qubit_depth;
      if (objective == Objective::rotations) return candidate.counts.rotations;
      return candidate.counts.two_qubit_gates;
    };
    for (const Candidate& candidate : plan.candidates)
      if (candidate.certificate.bound <= 1e-3)
        CHECK(figure(candidate) >= figure(plan.candidates.front()));
  }
}

TEST_CASE("no smaller number of steps would do") {
  const Hamiltonian h = test::ising_chain(5, 1.0, 0.7);
  Request asked = request(1.0, 1e-4);
  asked.restriction.formulas = {"strang"};
  const Plan plan = planned(h, asked);
  REQUIRE(plan.parts.front().steps > 1);
  Request fewer = request(1.0, std::nullopt);
  fewer.restriction.formulas = {"strang"};
  fewer.restriction.steps = plan.parts.front().steps - 1;
  // Of all layerings and orders: none reaches the tolerance with fewer steps and gates.
  for (const Candidate& candidate : planned(h, fewer).candidates)
    if (candidate.certificate.bound <= 1e-4)
      CHECK(candidate.counts.two_qubit_gates >= plan.candidates.front().counts.two_qubit_gates);
}

TEST_CASE("restrictions are honoured") {
  const Hamiltonian h = test::heisenberg(4, test::Ends::open, 0.3);
  Request asked = request(0.5, 1e-2);
  asked.restriction.formulas = {"suzuki-4"};
  Plan plan = planned(h, asked);
  check_plan(plan, asked);
  for (const Candidate& candidate : plan.candidates) CHECK(candidate.formula == "suzuki-4");

  asked.restriction.formulas = {"lie", "strang"};
  asked.restriction.orders = {2};
  plan = planned(h, asked);
  check_plan(plan, asked);
  for (const Candidate& candidate : plan.candidates) CHECK(candidate.formula == "strang");

  asked.restriction.formulas.clear();
  asked.restriction.orders = {1, 4};
  plan = planned(h, asked);
  for (const Candidate& candidate : plan.candidates)
    CHECK((candidate.order == 1 || candidate.order == 4));
}

TEST_CASE("given steps are taken and the error is reported") {
  const Hamiltonian h = test::heisenberg(4, test::Ends::open, 0.3);
  Request asked = request(0.5, std::nullopt);
  asked.restriction.formulas = {"lie"};
  asked.restriction.steps = 3;
  const Plan plan = planned(h, asked);
  check_plan(plan, asked);
  for (const Candidate& candidate : plan.candidates) CHECK(candidate.steps == 3);
  CHECK(measured(h, asked, plan) <= plan.certificate.bound);
}

TEST_CASE("a hopeless bound is cut at the distance of any two unitaries") {
  const Hamiltonian h = test::heisenberg(4, test::Ends::open, 0.3);
  Request asked = request(50.0, std::nullopt);
  asked.restriction.formulas = {"lie"};
  asked.restriction.steps = 1;
  CHECK(planned(h, asked).certificate.bound == 2.0);
}

TEST_CASE("commuting terms are exact at any time in one step") {
  const Hamiltonian h = test::ising_chain(5, 1.0, 0.0);
  for (const double time : {0.3, -7.0, 1e3}) {
    const Request asked = request(time, 1e-9);
    const Plan plan = planned(h, asked);
    check_plan(plan, asked);
    CHECK(plan.parts.front().formula == "exact");
    CHECK(plan.parts.front().order == 0);
    CHECK(plan.parts.front().steps == 1);
    CHECK(measured(h, asked, plan) <= plan.certificate.bound);
  }
}

TEST_CASE("a lone pair is exact though its terms do not commute") {
  test::Random random(1);
  const Hamiltonian h = test::random_two_local(2, random);
  const Request asked = request(3.0, 1e-9);
  const Plan plan = planned(h, asked);
  CHECK(plan.parts.front().formula == "exact");
  CHECK(plan.candidates.front().counts.two_qubit_gates <= 3);
  CHECK(measured(h, asked, plan) <= plan.certificate.bound);
}

TEST_CASE("a restriction rules exact parts out unless it names them") {
  const Hamiltonian h = test::ising_chain(5, 1.0, 0.0);
  Request asked = request(0.3, 1e-9);
  asked.restriction.formulas = {"strang"};
  CHECK(planned(h, asked).parts.front().formula == "strang");
  asked.restriction.formulas = {"exact"};
  CHECK(planned(h, asked).parts.front().formula == "exact");
}

TEST_CASE("time 0 is certified at 0") {
  const Request asked = request(0.0, 1e-3);
  const Plan plan = planned(test::heisenberg(4, test::Ends::open, 0.3), asked);
  check_plan(plan, asked);
  CHECK(plan.certificate.bound == 0.0);
  CHECK(plan.candidates.front().counts.gates() == 0);
}

TEST_CASE("negative time is planned as positive time is") {
  const Hamiltonian h = test::heisenberg(4, test::Ends::open, 0.3);
  const Plan forwards = planned(h, request(0.7, 1e-3));
  const Request asked = request(-0.7, 1e-3);
  const Plan backwards = planned(h, asked);
  check_plan(backwards, asked);
  CHECK(backwards.parts.front().formula == forwards.parts.front().formula);
  CHECK(backwards.parts.front().steps == forwards.parts.front().steps);
  CHECK(measured(h, asked, backwards) <= backwards.certificate.bound);
}

TEST_CASE("a constant alone needs no gate") {
  const Request asked = request(2.0, 1e-6);
  const Plan plan = planned(test::hamiltonian(2, {{"I", 1.5}}), asked);
  check_plan(plan, asked);
  CHECK(plan.candidates.front().counts.gates() == 0);
}

TEST_CASE("without a tolerance a limit on gates buys the least error") {
  const Hamiltonian h = test::ising_chain(5, 1.0, 0.7);
  Request asked = request(1.0, std::nullopt);
  double last = 3.0;
  for (const std::uint64_t limit : {20, 60, 200, 1000}) {
    asked.budget.max_two_qubit_gates = limit;
    const Plan plan = planned(h, asked);
    check_plan(plan, asked);
    CHECK(plan.candidates.front().counts.two_qubit_gates <= limit);
    for (const Candidate& candidate : plan.candidates)
      if (candidate.counts.two_qubit_gates <= limit)
        CHECK(plan.certificate.bound <= candidate.certificate.bound);
    CHECK(plan.certificate.bound <= last);
    CHECK(measured(h, asked, plan) <= plan.certificate.bound);
    last = plan.certificate.bound;
  }
  CHECK(last <= 1e-3);
}

TEST_CASE("without a tolerance a limit on depth buys the least error") {
  const Hamiltonian h = test::ising_chain(5, 1.0, 0.7);
  Request asked = request(1.0, std::nullopt);
  for (const std::uint64_t limit : {10, 100, 3000}) {
    asked.budget.max_depth = limit;
    const Plan plan = planned(h, asked);
    check_plan(plan, asked);
    CHECK(plan.candidates.front().counts.two_qubit_depth <= limit);
    for (const Candidate& candidate : plan.candidates)
      if (candidate.counts.two_qubit_depth <= limit)
        CHECK(plan.certificate.bound <= candidate.certificate.bound);
  }
}

TEST_CASE("a limit that is used up leaves no room for a step more") {
  const Hamiltonian h = test::ising_chain(5, 1.0, 0.7);
  Request asked = request(1.0, std::nullopt);
  asked.restriction.formulas = {"strang"};
  asked.budget.max_two_qubit_gates = 101;
  const Plan plan = planned(h, asked);
  const Candidate& chosen = plan.candidates.front();
  CHECK(chosen.counts.two_qubit_gates + chosen.step_two_qubit_gates > 101);
}

TEST_CASE("an exact step is one step under limits too") {
  Request asked = request(1.0, std::nullopt);
  asked.budget.max_two_qubit_gates = 100;
  const Plan plan = planned(test::ising_chain(5, 1.0, 0.0), asked);
  check_plan(plan, asked);
  CHECK(plan.parts.front().formula == "exact");
  CHECK(plan.parts.front().steps == 1);
}

TEST_CASE("a tolerance and a limit that exclude each other are refused") {
  const Hamiltonian h = test::heisenberg(5, test::Ends::open, 0.3);
  Request asked = request(1.0, 1e-6);
  asked.budget.max_two_qubit_gates = 20;
  CHECK(contains(refusal(h, asked), "the limit is not met"));
  asked.budget.max_two_qubit_gates = 100'000;
  const Plan plan = planned(h, asked);
  check_plan(plan, asked);
  asked.budget.max_depth = 3;
  CHECK(contains(refusal(h, asked), "the limit is not met"));
}

TEST_CASE("given steps that miss the tolerance are refused with the error that they have") {
  Request asked = request(1.0, 1e-6);
  asked.restriction.formulas = {"strang"};
  asked.restriction.steps = 2;
  const std::string text = refusal(test::heisenberg(5, test::Ends::open, 0.3), asked);
  CHECK(contains(text, "the tolerance 1e-06 is not met: the least certified error is"));
  CHECK(contains(text, "strang, 2 steps"));
}

TEST_CASE("a tolerance below what rounding allows is refused") {
  CHECK(contains(refusal(test::heisenberg(5, test::Ends::open, 0.3), request(1.0, 1e-17)),
                 "tolerance"));
}

TEST_CASE("exact where nothing is exact and formulas that do not exist are refused") {
  Request asked = request(1.0, 1e-3);
  asked.restriction.formulas = {"exact"};
  CHECK(refusal(test::heisenberg(5, test::Ends::open), asked) ==
        "no exact structure was found; allow a product formula");
  asked.restriction.formulas = {"strang"};
  asked.restriction.orders = {4};
  CHECK(refusal(test::heisenberg(5, test::Ends::open), asked) ==
        "no product formula satisfies the restriction; allow another formula or order");
}

TEST_CASE("the plan does not depend on the number of threads") {
  test::Random random(2);
  const Hamiltonian h = test::random_two_local(4, random);
  const Request asked = request(0.4, 1e-3);
  const unsigned former = base::set_threads(1);
  const Plan one = planned(h, asked);
  base::set_threads(3);
  const Plan three = planned(h, asked);
  base::set_threads(former);
  REQUIRE(one.candidates.size() == three.candidates.size());
  for (std::size_t k = 0; k < one.candidates.size(); ++k) {
    CHECK(one.candidates[k].formula == three.candidates[k].formula);
    CHECK(one.candidates[k].steps == three.candidates[k].steps);
    CHECK(one.candidates[k].certificate.bound == three.candidates[k].certificate.bound);
  }
}
