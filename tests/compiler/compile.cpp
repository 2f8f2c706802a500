// The main job: a Hamiltonian, a time and a tolerance go in, a circuit comes out whose distance
// from the exact evolution is at most what its certificate says. The exact evolution and the
// circuit's operator are computed in tests/support/unitary.cpp, apart from everything that farrier
// computes.
#include <doctest/doctest.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <farrier/compile.hpp>
#include <farrier/diagnostic.hpp>
#include <numbers>
#include <optional>
#include <string>
#include <utility>
#include <vector>

#include "compiler/base/parallel.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using test::Ends;
using unitary::Real;

namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Native, 6> natives = {Native::cx,    Native::cz,  Native::ecr,
                                           Native::iswap, Native::rzz, Native::rxx};

/// Searches little, for the certificate must hold whatever was searched.
Job job_of(Hamiltonian h, double time, std::optional<double> tolerance = 1e-3) {
  Job job;
  job.name = "test";
  job.hamiltonian = std::move(h);
  job.times = {time};
  job.budget.tolerance = tolerance;
  job.search.effort = Effort::low;
  return job;
}

/// One formula with so many steps, its error reported.
Job stepped(Hamiltonian h, double time, const std::string& formula, std::uint64_t steps) {
  Job job = job_of(std::move(h), time, std::nullopt);
  job.restriction.formulas = {formula};
  job.restriction.steps = steps;
  return job;
}

Real error_of(const Hamiltonian& h, const Point& point) {
  return unitary::distance(
      unitary::circuit_matrix(point.circuit),
      unitary::evolution(unitary::sum_matrix(h.qubits, h.sum), point.plan.time));
}

/// The exact evolution is itself wrong by this, for its eigenvalues are rounded.
constexpr Real reference_error = 1e-17L;

/// Compiles and holds the certificate against the exact evolution, global phase included.
Point check_certificate(const Job& job) {
  const Result result = compile(job);
  REQUIRE(result.points.size() == 1);
  const Point& point = result.points.front();
  const double bound = point.plan.certificate.bound;
  CHECK(error_of(result.hamiltonian, point) <= bound + reference_error);
  CHECK(point.circuit.rounding <= bound);
  if (job.budget.tolerance) CHECK(bound <= *job.budget.tolerance);
  CHECK_FALSE(point.text.empty());
  return point;
}

std::vector<std::pair<std::string, Hamiltonian>> models() {
  test::Random random(1);
  return {
      {"Heisenberg ring of 6 with a field", test::heisenberg(6, Ends::joined, 0.5)},
      {"Ising grid of 2 by 3", test::ising_grid(2, 3, 1.0, 0.8)},
      {"all pairs of 4", test::random_two_local(4, random)},
      {"strings of weight up to 3", test::random_strings(5, 8, 3, random)},
      {"strings of weight up to 4", test::random_strings(5, 6, 4, random)},
      {"one-body terms",
       test::hamiltonian(3, {{"X0", 0.7}, {"Z0", 0.4}, {"Y2", -1.1}, {"I", 0.3}})},
      {"two parts",
       test::hamiltonian(
           6, {{"X0 X1", 1}, {"Y1 Y2", 0.7}, {"Z2", 0.3}, {"X4 Z5", 0.9}, {"Z4 X5", -0.6}})},
      {"hydrogen", test::hydrogen()},
  };
}

std::string text_of(const Job& job) {
  return compile(job).points.front().text;
}

std::string body_of(const std::string& text) {
  return text.substr(text.find("include "));
}

}  // namespace

TEST_CASE("the circuit is within its certificate - and that within the tolerance") {
  for (const auto& [name, h] : models()) {
    for (const double tolerance : {1e-2, 1e-5}) {
      // Small tolerances on many qubits take long to plan and show nothing else.
      if (tolerance < 1e-3 && h.qubits > 4) continue;
      INFO(name << ", tolerance " << tolerance);
      check_certificate(job_of(h, 1.0, tolerance));
    }
  }
}

TEST_CASE("the certificate holds for negative times") {
  for (const auto& [name, h] : models()) {
    INFO(name);
    Job job = job_of(h, -0.6, 1e-3);
    job.restriction.orders = {1, 2};
    check_certificate(job);
  }
}

TEST_CASE("the certificate holds in every native gate set") {
  for (const Native native : natives) {
    for (const Hamiltonian& h : {test::heisenberg(4, Ends::joined, 0.5), test::hydrogen()}) {
      INFO("native " << static_cast<int>(native));
      Job job = job_of(h, 0.9, 1e-3);
      job.restriction.orders = {2};
      job.output.native = native;
      check_certificate(job);
    }
  }
}

TEST_CASE("the certificate holds for every formula at given steps") {
  for (const std::string formula : {"lie", "strang", "suzuki-4", "suzuki-6"}) {
    for (const std::uint64_t steps : {1, 2, 7}) {
      INFO(formula << ", " << steps << " steps");
      check_certificate(stepped(test::heisenberg(5, Ends::joined, 0.5), 0.3, formula, steps));
      check_certificate(stepped(test::hydrogen(), 1.1, formula, steps));
    }
  }
}

TEST_CASE("the certificate holds down to tolerances near rounding") {
  check_certificate(job_of(test::heisenberg(4, Ends::open, 0.3), 1.0, 1e-8));
  check_certificate(job_of(test::ising_chain(5, 1.0, 0.7), 1.0, 1e-10));
}

TEST_CASE("an average bound is kept in the root mean square") {
  Job job = job_of(test::heisenberg(5, Ends::joined, 0.5), 1.0, 1e-3);
  job.budget.assurance = Assurance::average;
  const Result result = compile(job);
  const Point& point = result.points.front();
  const Hamiltonian& h = result.hamiltonian;
  CHECK(unitary::average_distance(
            unitary::circuit_matrix(point.circuit),
            unitary::evolution(unitary::sum_matrix(h.qubits, h.sum), point.plan.time)) <=
        point.plan.certificate.bound);
  CHECK(point.plan.certificate.bound <= 1e-3);
}

TEST_CASE("commuting terms and lone pairs and one-body terms are exact") {
  test::Random random(2);
  const std::vector<Hamiltonian> exact = {
      test::ising_chain(6, 1.3, 0.0), test::random_two_local(2, random),
      test::hamiltonian(4, {{"X0", 1}, {"Z0", 0.5}, {"Y3", 2}}),
      test::hamiltonian(4, {{"X0 Y1", 1}, {"Z0", 0.5}, {"Y2 Y3", 2}, {"X2", 0.1}})};
  for (const Hamiltonian& h : exact) {
    const Point point = check_certificate(job_of(h, 37.0, 1e-9));
    CHECK(point.plan.parts.front().formula == "exact");
  }
}

TEST_CASE("time 0 is the empty circuit - certified at 0") {
  const Point point = check_certificate(job_of(test::heisenberg(4, Ends::joined, 0.5), 0.0));
  CHECK(point.counts.gates() == 0);
  CHECK(point.plan.certificate.bound == 0.0);
  CHECK(point.circuit.global_phase == 0.0);
}

TEST_CASE("each time of a job is compiled on its own") {
  Job job = job_of(test::ising_chain(4, 1.0, 0.7), 0.0);
  job.times = {0.5, 1.0, -2.0};
  const Result result = compile(job);
  REQUIRE(result.points.size() == 3);
  for (std::size_t k = 0; k < 3; ++k) {
    CHECK(result.points[k].index == k);
    CHECK(result.points[k].plan.time == job.times[k]);
    CHECK(error_of(result.hamiltonian, result.points[k]) <=
          result.points[k].plan.certificate.bound);
    CHECK(body_of(result.points[k].text) ==
          body_of(text_of(job_of(job.hamiltonian, job.times[k]))));
  }
}

TEST_CASE("one Lie-Trotter step on an even Heisenberg ring takes 3 n gates in depth 6") {
  // A bond takes three gates (Vidal, Dawson 2004, PRA 69, 010301), and the bonds of an even ring
  // two colours.
  for (const std::uint32_t n : {4U, 6U, 10U, 50U}) {
    const Result result = compile(stepped(test::heisenberg(n, Ends::joined), 0.1, "lie", 1));
    CHECK(result.points.front().counts.two_qubit_gates == 3 * n);
    CHECK(result.points.front().counts.two_qubit_depth == 6);
  }
}

TEST_CASE("one Lie-Trotter step on an Ising chain takes 2 n - 2 gates in depth 4") {
  // A bond takes two gates (Vidal, Dawson 2004), and a chain has n - 1 bonds in two colours.
  for (const std::uint32_t n : {4U, 7U, 12U, 40U}) {
    const Result result = compile(stepped(test::ising_chain(n, 1.0, 0.7), 0.1, "lie", 1));
    CHECK(result.points.front().counts.two_qubit_gates == 2 * (n - 1));
    CHECK(result.points.front().counts.two_qubit_depth == 4);
  }
}

TEST_CASE("one step of kicked Ising at the Clifford angle takes one gate a bond") {
  // exp(-i pi/4 ZZ) is one cx up to turns (Vidal, Dawson 2004). With the coupling alone in a layer
  // of its own, since folding a field into a block would make the angle generic.
  for (const std::uint32_t n : {4U, 9U}) {
    const Result result = compile(stepped(test::ising_chain(n, pi / 4, 0.3), 1.0, "lie", 1));
    CHECK(result.points.front().counts.two_qubit_gates == n - 1);
    CHECK(result.points.front().counts.two_qubit_depth == 2);
  }
}

TEST_CASE("looped text does not grow with the steps") {
  Job few = stepped(test::heisenberg(6, Ends::joined, 0.5), 1.0, "strang", 10);
  Job many = stepped(test::heisenberg(6, Ends::joined, 0.5), 1.0, "strang", 1'000'000);
  few.output.style = many.output.style = Style::looped;
  const std::string short_text = text_of(few);
  const std::string long_text = text_of(many);
  const auto lines = [](const std::string& text) {
    return std::count(text.begin(), text.end(), '\n');
  };
  CHECK(lines(long_text) <= lines(short_text));
  // Every statement holds at most three angles, each longer by at most 24 characters.
  CHECK(long_text.size() <= short_text.size() + static_cast<std::size_t>(lines(short_text)) * 24);
  CHECK(lines(short_text) < 300);
}

TEST_CASE("a million steps keep to their certificate") {
  check_certificate(stepped(test::heisenberg(4, Ends::joined, 0.5), 1.0, "strang", 1'000'000));
}

TEST_CASE("the same bytes on every run and for every number of threads") {
  test::Random random(3);
  for (const Hamiltonian& h : {test::heisenberg(5, Ends::joined, 0.5), test::hydrogen(),
                               test::random_two_local(3, random)}) {
    const Job job = job_of(h, 0.7, 1e-3);
    const unsigned former = base::set_threads(1);
    const std::string first = text_of(job);
    const std::string again = text_of(job);
    base::set_threads(2);
    const std::string two = text_of(job);
    base::set_threads(former);
    CHECK(first == again);
    CHECK(first == two);
  }
}

TEST_CASE("the order in which terms are given does not matter") {
  const std::vector<test::Term> terms = {{"X0 X1", 0.5}, {"Z1 Z2", 1.0}, {"Y0", 0.3}, {"X2", 0.25}};
  const std::vector<test::Term> reversed(terms.rbegin(), terms.rend());
  CHECK(text_of(job_of(test::hamiltonian(3, terms), 1.0)) ==
        text_of(job_of(test::hamiltonian(3, reversed), 1.0)));
}

TEST_CASE("inputs digests tell jobs apart") {
  const Job job = job_of(test::ising_chain(4, 1.0, 0.7), 1.0);
  const auto inputs = [](const Job& one) { return compile(one).points.front().inputs; };
  const std::string first = inputs(job);
  CHECK(first.size() == 16);
  CHECK(inputs(job) == first);
  Job other = job;
  other.times = {1.5};
  CHECK(inputs(other) != first);
  other = job;
  other.budget.tolerance = 2e-3;
  CHECK(inputs(other) != first);
  other = job;
  other.output.native = Native::cz;
  CHECK(inputs(other) != first);
}

TEST_CASE("the default tolerance is a thousandth") {
  const Result result = compile(job_of(test::ising_chain(4, 1.0, 0.7), 1.0, std::nullopt));
  CHECK(result.points.front().plan.certificate.bound <= 1e-3);
  REQUIRE(result.settings.budget.tolerance);
  CHECK(*result.settings.budget.tolerance == 1e-3);
}

TEST_CASE("jobs that contradict themselves are refused as wrong usage") {
  const auto code = [](const Job& job) {
    try {
      compile(job);
    } catch (const UserError& error) {
      return error.code();
    }
    return ExitCode::done;
  };
  Job job = job_of(test::ising_chain(4, 1.0, 0.7), 1.0);
  job.budget.minimise = Objective::duration;
  CHECK(code(job) == ExitCode::usage);
  job.budget.minimise = Objective::error;
  job.budget.tolerance.reset();
  CHECK(code(job) == ExitCode::usage);
  job.budget.max_two_qubit_gates = 100;
  CHECK(code(job) == ExitCode::done);
  job.times.clear();
  CHECK(code(job) == ExitCode::usage);
  Job tight = job_of(test::ising_chain(4, 1.0, 0.7), 1.0, 1e-6);
  tight.budget.max_two_qubit_gates = 3;
  CHECK(code(tight) == ExitCode::refused);
}

TEST_CASE("the first row of a survey is what compile writes") {
  const Job job = job_of(test::heisenberg(5, Ends::open, 0.3), 1.0, 1e-3);
  const Result surveyed = survey(job);
  const Result compiled = compile(job);
  const Candidate& best = surveyed.points.front().plan.candidates.front();
  CHECK(best.counts.two_qubit_gates == compiled.points.front().counts.two_qubit_gates);
  CHECK(best.counts.depth == compiled.points.front().counts.depth);
  CHECK(best.certificate.bound == compiled.points.front().plan.certificate.bound);
  CHECK(surveyed.points.front().text.empty());
}

TEST_CASE("inspect tells the facts of a Hamiltonian") {
  Job job;
  job.hamiltonian =
      test::hamiltonian(7, {{"X0 X1", 1}, {"Y1 Y2", -2}, {"Z4", 0.5}, {"I", 3}, {"X5 Y6", 1}});
  const Facts facts = inspect(job);
  CHECK(facts.qubits == 7);
  CHECK(facts.terms == 4);
  CHECK(facts.constant == 3.0);
  CHECK(facts.one_norm == 4.5);
  CHECK(facts.terms_by_weight == std::vector<std::uint64_t>{1, 3});
  CHECK(facts.interacting_pairs == 3);
  CHECK(facts.pair_layers == 2);
  CHECK(facts.commuting_groups == 2);
  CHECK(facts.components == std::vector<std::vector<std::uint32_t>>{{0, 1, 2}, {4}, {5, 6}});
}

TEST_CASE("a chain of a thousand sites compiles") {
  Job job = job_of(test::heisenberg(1000, Ends::open), 1.0, 1e-3);
  job.restriction.orders = {2};
  const Result result = compile(job);
  const Point& point = result.points.front();
  CHECK(point.plan.certificate.bound <= 1e-3);
  CHECK(point.counts.two_qubit_gates > 0);
}
