// The midpoint frame against dense matrices in long double, and against values of a prototype in NumPy
// that shares no code with the program.
#include <doctest/doctest.h>

#include <cmath>
#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "compiler/bounds/models.hpp"
#include "compiler/formulas/expand.hpp"
#include "tests/compiler/bounds/systems.hpp"
#include "tests/support/random.hpp"

using farrier::Assurance;
using farrier::Formula;
using farrier::bounds::ErrorModel;
using farrier::bounds::ErrorTerm;
using farrier::bounds::midpoint_model;
using farrier::bounds::Question;
using farrier::test::ask;
using farrier::test::coefficient;
using farrier::test::error_generator;
using farrier::test::error_generator_at;
using farrier::test::Matrix;
using farrier::test::normalised_frobenius_norm;
using farrier::test::spectral_norm;
using farrier::test::System;

namespace {

/// One formula of each order and make; all of them would take long.
std::vector<const Formula*> symmetric_formulas() {
  std::vector<const Formula*> result;
  for (const char* name : {"strang", "omelyan-2", "suzuki-4", "blanes-moan-4", "secular-4-6",
                           "suzuki-6", "blanes-moan-6", "kahan-li-8"})
    result.push_back(farrier::find_formula(name));
  return result;
}

ErrorModel midpoint(const Question& question, int degree) {
  const auto model = midpoint_model(question, degree);
  REQUIRE(model.has_value());
  return *model;
}

/// rho with ||E(s) - its powers below s^q|| <= rho s^q, whose integral is rho tau^(q+1) / (q+1).
double rho(const System& system, std::string_view formula, int degree) {
  return coefficient(midpoint(ask(system, formula), degree), "remainder") * (degree + 1);
}

double leading(const System& system, const char* formula,
               Assurance assurance = Assurance::certified) {
  const Question question = ask(system, formula, assurance);
  return coefficient(midpoint(question, question.formula.order + 2), "leading");
}

/// The term of a power of the time whose coefficient is a norm, or nullptr.
const ErrorTerm* norm_term(const ErrorModel& model, int time_power) {
  for (const ErrorTerm& term : model.terms)
    if (term.time_power == time_power && term.name != "rounding" && term.name != "remainder")
      return &term;
  return nullptr;
}

double rounding(const ErrorModel& model, int time_power) {
  for (const ErrorTerm& term : model.terms)
    if (term.time_power == time_power && term.name == "rounding") return term.coefficient;
  return 0.0;
}

/// Layers of random strings that need not commute, coefficients over some decades.
System random_system(std::uint64_t seed) {
  farrier::test::Random random(seed);
  System system;
  system.hamiltonian.qubits = random.integer(1, 3);
  const std::uint32_t qubits = system.hamiltonian.qubits;
  for (std::uint32_t k = random.integer(4, 14); k > 0; --k) {
    const auto string = farrier::test::random_string(random, qubits);
    if (!string.empty())
      system.hamiltonian.sum.add(string, random.between(-1.0, 1.0) *
                                             std::pow(10.0, random.integer(0, 4)));
  }
  system.hamiltonian.sum.merge();
  system.layering.layers.resize(random.integer(2, 4));
  for (std::uint32_t term = 0; term < system.hamiltonian.sum.size(); ++term)
    system.layering.layers[term % system.layering.layers.size()].blocks.push_back(
        {farrier::BlockKind::string, 0, 0, {term}});
  return system;
}

}  // namespace

TEST_CASE("remainders of the Heisenberg ring") {
  const System system = farrier::test::heisenberg_ring();
  CHECK(rho(system, "strang", 4) == doctest::Approx(59.0466666667).epsilon(1e-9));
  CHECK(rho(system, "strang", 6) == doctest::Approx(43.1380388889).epsilon(1e-9));
  CHECK(rho(system, "suzuki-4", 6) == doctest::Approx(140.057552989).epsilon(1e-9));
  CHECK(rho(system, "suzuki-4", 8) == doctest::Approx(179.772893208).epsilon(1e-9));
  CHECK(rho(system, "suzuki-4", 4) == doctest::Approx(5 * 14.9323420295).epsilon(1e-9));
}

TEST_CASE("remainders of other systems") {
  CHECK(rho(farrier::test::ising_chain(), "strang", 4) ==
        doctest::Approx(19.4166666667).epsilon(1e-9));
  CHECK(rho(farrier::test::ising_chain(), "suzuki-4", 6) ==
        doctest::Approx(80.0977377752).epsilon(1e-9));
  CHECK(rho(farrier::test::disordered_ring(), "strang", 4) ==
        doctest::Approx(1179.98489371).epsilon(1e-9));
}

TEST_CASE("leading norms lie between the exact norm and the 1-norm") {
  struct Case {
    System system;
    const char* formula;
    double exact;
    double one_norm;
  };
  const std::vector<Case> cases = {
      {farrier::test::heisenberg_ring(), "strang", 3.13403872917, 6.13333333333},
      {farrier::test::heisenberg_ring(), "suzuki-4", 0.34838776148, 0.649705123698},
      {farrier::test::ising_chain(), "strang", 3.16625427932, 5.66666666667},
      {farrier::test::ising_chain(), "suzuki-4", 0.511800903383, 1.19677918918},
      {farrier::test::disordered_ring(), "strang", 24.3475282241, 54.3429372123},
  };
  for (const Case& item : cases) {
    const Formula& formula = *farrier::find_formula(item.formula);
    const auto powers = error_generator(item.system, formula, formula.order + 1);
    const double exact =
        static_cast<double>(spectral_norm<long double>(powers.back()) / (formula.order + 1));
    CHECK(exact == doctest::Approx(item.exact).epsilon(1e-10));
    CHECK(leading(item.system, item.formula) >= exact);
    CHECK(leading(item.system, item.formula) <= item.one_norm * (1.0 + 1e-10));
  }
}

TEST_CASE("leading norms of one qubit are exact") {
  // h_2 = -0.16333 X + 0.11666 Z by hand; h_4 from the prototype. X and Z anticommute.
  const System system = farrier::test::two_letters();
  CHECK(leading(system, "strang") ==
        doctest::Approx(std::hypot(4 * 0.49 / 12, 4 * 0.7 / 24)).epsilon(1e-12));
  CHECK(leading(system, "suzuki-4") ==
        doctest::Approx(std::hypot(0.00464222814663, 0.00362944348101)).epsilon(1e-10));
}

TEST_CASE("leading norms on average are roots of the sums of squares") {
  CHECK(leading(farrier::test::heisenberg_ring(), "strang", Assurance::average) ==
        doctest::Approx(1.75627130276).epsilon(1e-10));
  CHECK(leading(farrier::test::heisenberg_ring(), "suzuki-4", Assurance::average) ==
        doctest::Approx(0.198393011447).epsilon(1e-10));
  CHECK(leading(farrier::test::ising_chain(), "strang", Assurance::average) ==
        doctest::Approx(1.77951304201).epsilon(1e-10));
  CHECK(leading(farrier::test::ising_chain(), "suzuki-4", Assurance::average) ==
        doctest::Approx(0.343795662589).epsilon(1e-10));
}

TEST_CASE("every power of the generator is bounded from above") {
  for (std::uint64_t seed = 1; seed <= 10; ++seed) {
    const System system = random_system(seed);
    for (const Formula* row : symmetric_formulas()) {
      const Formula& formula = *row;
      const int degree = formula.order + 4;
      const auto powers = error_generator(system, formula, degree);
      const ErrorModel model = midpoint(ask(system, formula.name), degree);
      const ErrorModel average = midpoint(ask(system, formula.name, Assurance::average), degree);
      for (int j = 0; j < degree; j += 2) {
        const auto& power = powers[static_cast<std::size_t>(j)];
        const long double weight = 1.0L / (j + 1);
        INFO(formula.name, ", power ", j, ", seed ", seed);
        const ErrorTerm* term = norm_term(model, j + 1);
        const ErrorTerm* mean = norm_term(average, j + 1);
        const long double exact = weight * spectral_norm<long double>(power);
        const long double exact_mean = weight * normalised_frobenius_norm<long double>(power);
        REQUIRE(term != nullptr);
        REQUIRE(mean != nullptr);
        CHECK(term->step_power == j);
        CHECK(term->coefficient + rounding(model, j + 1) >= exact);
        CHECK(mean->coefficient + rounding(average, j + 1) >= exact_mean);
        // Nor far above, where the norm is exact: the rounding is what was charged for it.
        if (j >= formula.order)
          CHECK(mean->coefficient - rounding(average, j + 1) <= exact_mean * (1.0L + 1e-12L));
      }
    }
  }
}

TEST_CASE("the remainder bounds what the powers leave of the generator") {
  for (std::uint64_t seed = 1; seed <= 6; ++seed) {
    const System system = random_system(seed);
    const double scale = 1.0 / system.hamiltonian.sum.one_norm();
    for (const Formula* row : symmetric_formulas()) {
      const Formula& formula = *row;
      for (int degree = 2; degree <= formula.order + 4; degree += 2) {
        const auto powers = error_generator(system, formula, degree);
        const double bound = rho(system, formula.name, degree);
        for (const double s : {0.1 * scale, scale, 4.0 * scale, 30.0 * scale}) {
          Matrix<long double> rest = error_generator_at(system, formula, s);
          for (int j = 0; j < degree; j += 2)
            rest -= powers[static_cast<std::size_t>(j)] *
                    std::complex<long double>(std::pow(static_cast<long double>(s), j));
          INFO(formula.name, ", degree ", degree, ", seed ", seed);
          // The rounding of 100 exponentials of dimension 8 in long double.
          const long double rounding = 1e-16L * system.hamiltonian.sum.one_norm();
          CHECK(spectral_norm<long double>(rest) <=
                bound * std::pow(static_cast<long double>(s), degree) + rounding);
        }
      }
    }
  }
}

TEST_CASE("powers below the order are rounding only") {
  for (std::uint64_t seed = 1; seed <= 10; ++seed) {
    const System system = random_system(seed);
    for (const Formula* row : symmetric_formulas()) {
      const Formula& formula = *row;
      const ErrorModel model = midpoint(ask(system, formula.name), formula.order + 2);
      for (const ErrorTerm& term : model.terms) {
        if (term.name != "order conditions") continue;
        const double scale = 50 * system.hamiltonian.sum.one_norm();
        CHECK(term.coefficient <= 1e-14 * std::pow(scale, term.time_power));
      }
    }
  }
}

TEST_CASE("the error of one step of the Heisenberg ring") {
  // From the prototype with the exact leading norm: 0.00847394978632 for order 2 to degree 6 in 100
  // steps, 8.478503046e-07 for order 4 to degree 8; here with the leading norm from above.
  const System system = farrier::test::heisenberg_ring();
  const auto check = [&](const char* formula, int degree, std::uint64_t steps, double exact,
                         double error_with_exact_norm) {
    const ErrorModel model = midpoint(ask(system, formula), degree);
    const int order = ask(system, formula).formula.order;
    const double tau = 3.0 / static_cast<double>(steps);
    const double surplus = (coefficient(model, "leading") - exact) * std::pow(tau, order + 1) *
                           static_cast<double>(steps);
    CHECK(coefficient(model, "leading") >= exact * (1.0 - 1e-11));
    // The prototype takes 1-norms for the powers above the leading one, so that its value is not
    // below this one.
    CHECK(model.error(3.0, steps) - surplus <= error_with_exact_norm * (1.0 + 1e-9));
    CHECK(model.error(3.0, steps) - surplus >= 0.95 * error_with_exact_norm);
  };
  check("strang", 6, 100, 3.13403872917, 0.00847394978632);
  check("suzuki-4", 8, 100, 0.34838776148, 8.478503046e-07);
}

TEST_CASE("up to a global phase half the spread of the spectrum counts") {
  for (const System& system : {farrier::test::heisenberg_ring(), farrier::test::ising_chain(),
                               farrier::test::disordered_ring()})
    for (const char* name : {"strang", "suzuki-4"}) {
      const Question question = ask(system, name, Assurance::certified, true);
      const int order = question.formula.order;
      const auto operator_of_order = error_generator(system, question.formula, order + 1).back();
      const Eigen::SelfAdjointEigenSolver<Matrix<long double>> solver(operator_of_order);
      const long double spread =
          solver.eigenvalues().maxCoeff() - solver.eigenvalues().minCoeff();
      const ErrorModel model = midpoint(question, order + 2);
      CHECK(coefficient(model, "leading") >= spread / 2 / (order + 1));
      CHECK(model.error(1.0, 10) <= midpoint(ask(system, name), order + 2).error(1.0, 10));
    }
}

TEST_CASE("the midpoint frame is for symmetric formulas and even degrees") {
  const System system = farrier::test::heisenberg_ring();
  CHECK_FALSE(midpoint_model(ask(system, "lie"), 4).has_value());
  CHECK_FALSE(midpoint_model(ask(system, "strang"), 3).has_value());
  CHECK_FALSE(midpoint_model(ask(system, "strang"), 0).has_value());
  CHECK(midpoint_model(ask(system, "strang"), 2).has_value());
}

TEST_CASE("a midpoint frame that costs too much is not made") {
  const System system = farrier::test::heisenberg_ring();
  Question question = ask(system, "suzuki-4");
  question.work_limit = 100;
  CHECK_FALSE(midpoint_model(question, 6).has_value());
}

TEST_CASE("the midpoint frame is the same wherever a system stands on a long chain") {
  const System home = farrier::test::heisenberg_ring();
  for (const std::uint32_t shift : {62U, 64U, 126U, 3000U}) {
    System moved = home;
    moved.hamiltonian.qubits = 4000;
    moved.hamiltonian.sum = {};
    for (std::size_t k = 0; k < home.hamiltonian.sum.size(); ++k) {
      const auto factors = home.hamiltonian.sum.factors(k);
      moved.hamiltonian.sum.add(farrier::test::shifted({factors.begin(), factors.end()}, shift),
                                home.hamiltonian.sum.coefficient(k));
    }
    const ErrorModel expected = midpoint(ask(home, "suzuki-4"), 8);
    const ErrorModel model = midpoint(ask(moved, "suzuki-4"), 8);
    CHECK(model.error(1.0, 7) == expected.error(1.0, 7));
  }
}
