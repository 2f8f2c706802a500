// The bound from 1-norms: its value by hand, and never below the true error.
#include <doctest/doctest.h>

#include <cmath>

#include "compiler/bounds/models.hpp"
#include "compiler/formulas/expand.hpp"
#include "tests/compiler/bounds/systems.hpp"

using farrier::Assurance;
using farrier::Exponential;
using farrier::Formula;
using farrier::formula_table;
using farrier::bounds::coarse_model;
using farrier::bounds::ErrorModel;
using farrier::test::ask;
using farrier::test::coefficient;
using farrier::test::System;

TEST_CASE("the bound from 1-norms by hand") {
  const System system = farrier::test::two_letters();
  // Both L_S and L_H are 1.7 where no fraction is negative: 2 L^(p+1) / (p+1)!.
  const ErrorModel lie = coarse_model(ask(system, "lie"));
  CHECK(coefficient(lie, "remainder") == doctest::Approx(2 * 1.7 * 1.7 / 2).epsilon(1e-13));
  CHECK(lie.terms[0].time_power == 2);
  CHECK(lie.terms[0].step_power == 1);
  const ErrorModel strang = coarse_model(ask(system, "strang"));
  CHECK(coefficient(strang, "remainder") ==
        doctest::Approx(2 * std::pow(1.7, 3) / 6).epsilon(1e-13));
  // Suzuki 4 over two layers, p = p_2 and q = 1 - 4p: |fractions| of the outer layer p/2 four times,
  // |p + q|/2 twice ... as expand.cpp of the tests lists them.
  const double p = 0.414490771794375737;
  const double q = 1 - 4 * p;
  const double outer = p / 2 * 2 + p * 2 + std::abs(p + q);
  const double inner = 4 * p + std::abs(q);
  const double norm = outer + 0.7 * inner;
  CHECK(coefficient(coarse_model(ask(system, "suzuki-4")), "remainder") ==
        doctest::Approx((std::pow(norm, 5) + std::pow(1.7, 5)) / 120).epsilon(1e-13));
}

TEST_CASE("the bound from 1-norms is never below the true error") {
  for (const System& system :
       {farrier::test::heisenberg_ring(), farrier::test::two_letters()}) {
    const farrier::test::Evolution<long double> evolution(system.hamiltonian, system.layering);
    for (const Formula& formula : formula_table()) {
      const ErrorModel model = coarse_model(ask(system, formula.name));
      const auto step =
          farrier::formulas::expand(formula, system.layering.layers.size());
      for (const double time : {-1.0, 0.1, 2.0})
        for (const std::uint64_t steps : {1U, 20U}) {
          INFO(formula.name, " at time ", time, " in ", steps, " steps");
          CHECK(model.error(time, steps) >= evolution.error(step, time, steps));
        }
    }
  }
}

TEST_CASE("the rounding of a formula's coefficients is covered") {
  // To first order in tau the error is sum over layers of |sum of fractions - 1| ||layer||.
  const System system = farrier::test::heisenberg_ring();
  for (const Formula& formula : formula_table())
    for (std::size_t layers = 2; layers <= 6; ++layers) {
      std::vector<long double> sums(layers, 0);
      for (const Exponential& exponential : farrier::formulas::expand(formula, layers))
        sums[exponential.layer] += exponential.fraction;
      const auto fractions = farrier::formulas::absolute_fractions(formula, layers);
      for (std::size_t k = 0; k < layers; ++k)
        CHECK(std::abs(static_cast<double>(sums[k] - 1)) <= 1e-15 * fractions[k]);
    }
  // With short steps little else is left of the error: one step in long double, whose own rounding is
  // far below.
  const farrier::test::Evolution<long double> evolution(system.hamiltonian, system.layering);
  for (const Formula& formula : formula_table()) {
    const auto step = farrier::formulas::expand(formula, 3);
    for (const double time : {1e-4, 1e-3, 1e-2, 3e-2, 0.1}) {
      INFO(formula.name, " at time ", time);
      CHECK(coarse_model(ask(system, formula.name)).error(time, 1) >=
            evolution.error(step, time, 1) - 1e-18L * static_cast<long double>(step.size()));
    }
  }
  const ErrorModel model = coarse_model(ask(system, "suzuki-6"));
  CHECK(coefficient(model, "order conditions") > 0.0);
  CHECK(model.terms[1].time_power == 1);
  CHECK(model.terms[1].step_power == 0);
}

TEST_CASE("the bound from 1-norms serves every assurance") {
  const System system = farrier::test::heisenberg_ring();
  const double certified = coarse_model(ask(system, "strang")).error(1.0, 10);
  CHECK(coarse_model(ask(system, "strang", Assurance::average)).error(1.0, 10) == certified);
  CHECK(coarse_model(ask(system, "strang", Assurance::certified, true)).error(1.0, 10) ==
        certified);
}
