// Which bounds there are at which level, and all of them against true errors of the Heisenberg ring.
#include "compiler/bounds/models.hpp"

#include <doctest/doctest.h>

#include <cstdint>
#include <string>
#include <vector>

#include "compiler/formulas/expand.hpp"
#include "tests/compiler/bounds/systems.hpp"

using farrier::Assurance;
using farrier::Formula;
using farrier::formula_table;
using farrier::find_formula;
using farrier::bounds::deepest_level;
using farrier::bounds::error_models;
using farrier::bounds::ErrorModel;
using farrier::bounds::Question;
using farrier::test::ask;
using farrier::test::Evolution;
using farrier::test::System;

namespace {

std::string names(const std::vector<ErrorModel>& models) {
  std::string text;
  for (const ErrorModel& model : models) text += (text.empty() ? "" : ", ") + model.name;
  return text;
}

/// XX, YY and ZZ between neighbours of an open chain, a layer each.
System heisenberg_chain(std::uint32_t sites) {
  System system;
  system.hamiltonian.qubits = sites;
  system.layering.layers.resize(3);
  for (const farrier::Pauli letter : {farrier::Pauli::x, farrier::Pauli::y, farrier::Pauli::z})
    for (std::uint32_t site = 0; site + 1 < sites; ++site)
      system.hamiltonian.sum.add(
          std::vector<farrier::Factor>{{site, letter}, {site + 1, letter}}, 1.0);
  system.hamiltonian.sum.merge();
  for (std::uint32_t term = 0; term < system.hamiltonian.sum.size(); ++term) {
    const auto factors = system.hamiltonian.sum.factors(term);
    const auto layer = static_cast<std::size_t>(factors[0].letter()) - 1;
    system.layering.layers[layer].blocks.push_back(
        {farrier::BlockKind::pair, factors[0].qubit(), factors[1].qubit(), {term}});
  }
  return system;
}

double true_error(const System& system, const char* formula, double time, std::uint64_t steps) {
  const Evolution<double> evolution(system.hamiltonian, system.layering);
  return evolution.error(
      farrier::formulas::expand(*find_formula(formula), system.layering.layers.size()), time,
      steps);
}

}  // namespace

TEST_CASE("levels of effort for few qubits") {
  const System system = farrier::test::heisenberg_ring();
  REQUIRE(farrier::bounds::dense_fits(system.hamiltonian, system.layering));
  const std::string both = "1-norm, published commutator bound";
  CHECK(names(error_models(ask(system, "lie"), 0)) == both);
  CHECK(names(error_models(ask(system, "strang"), 0)) == both);
  CHECK(names(error_models(ask(system, "suzuki-4"), 0)) == "1-norm");
  for (const char* formula : {"lie", "strang", "suzuki-4", "blanes-moan-6"}) {
    CHECK(names(error_models(ask(system, formula), 1)) == "secular certificate");
    CHECK(names(error_models(ask(system, formula), 2)) == "secular certificate");
    CHECK(error_models(ask(system, formula), 3).empty());
  }
}

TEST_CASE("levels of effort for more qubits than dense matrices take") {
  const System system = heisenberg_chain(12);
  REQUIRE_FALSE(farrier::bounds::dense_fits(system.hamiltonian, system.layering));
  const std::string both = "1-norm, published commutator bound";
  CHECK(names(error_models(ask(system, "lie"), 0)) == both);
  CHECK(names(error_models(ask(system, "strang"), 0)) == both + ", midpoint frame");
  CHECK(names(error_models(ask(system, "suzuki-4"), 0)) == "1-norm, midpoint frame");
  for (int level = 1; level <= deepest_level; ++level) {
    CHECK(error_models(ask(system, "lie"), level).empty());
    CHECK(names(error_models(ask(system, "strang"), level)) == "midpoint frame");
  }
}

TEST_CASE("level 0 is never empty") {
  const System system = heisenberg_chain(12);
  for (const Formula& formula : formula_table()) {
    Question question = ask(system, formula.name);
    question.work_limit = 0;
    CHECK(names(error_models(question, 0)) == "1-norm");
    CHECK(error_models(question, 1).empty());
  }
}

TEST_CASE("a single layer is exact") {
  const System system = farrier::test::layered(2, {{{"XX", 1.0}, {"ZZ", 0.5}}});
  for (const Formula& formula : formula_table()) {
    const auto models = error_models(ask(system, formula.name), 0);
    CHECK(names(models) == "exact");
    CHECK(models.front().error(1e6, 1) == 0.0);
    CHECK(error_models(ask(system, formula.name), 1).empty());
  }
}

TEST_CASE("layers that commute have no error but the coarse one") {
  const System system = farrier::test::layered(3, {{{"XXI", 1.0}}, {{"ZZI", 0.5}}, {{"IIZ", 2.0}}});
  for (const char* formula : {"lie", "strang"}) {
    const auto models = error_models(ask(system, formula), 0);
    CHECK(farrier::bounds::tightest(models, 100.0, 1).name == "published commutator bound");
    CHECK(farrier::bounds::tightest(models, 100.0, 1).error(100.0, 1) == 0.0);
  }
  for (const char* formula : {"lie", "suzuki-4", "secular-4-6"}) {
    const auto models = error_models(ask(system, formula), 1);
    REQUIRE(models.size() == 1);
    CHECK(models.front().error(1.0, 1) < 1e-11);
  }
}

TEST_CASE("true errors of the Heisenberg ring are never above a bound") {
  // Values from a prototype in NumPy that shares no code with the program, at t = 3.
  struct Case {
    const char* formula;
    std::uint64_t steps;
    double error;
    std::uint64_t least_steps;  ///< for 1e-3
  };
  const System system = farrier::test::heisenberg_ring();
  for (const Case& item : {Case{"lie", 1000, 0.0285892580381, 28589},
                           Case{"strang", 100, 0.00632407711055, 252},
                           Case{"suzuki-4", 10, 0.00404954065917, 15}}) {
    INFO(std::string(item.formula));
    CHECK(true_error(system, item.formula, 3.0, item.steps) ==
          doctest::Approx(item.error).epsilon(1e-9));
    CHECK(true_error(system, item.formula, 3.0, item.least_steps) <= 1e-3);
    CHECK(true_error(system, item.formula, 3.0, item.least_steps - 1) > 1e-3);
    for (int level = 0; level <= deepest_level; ++level)
      for (const ErrorModel& model :
           error_models(ask(system, item.formula, Assurance::certified, false, 3.0), level)) {
        INFO(model.name, " at level ", level);
        CHECK(model.error(3.0, item.steps) >= item.error);
        CHECK(model.least_steps(3.0, 1e-3, farrier::bounds::most_steps) >= item.least_steps);
      }
  }
}

TEST_CASE("each level is sharper for small steps") {
  const System system = heisenberg_chain(11);
  for (const char* formula : {"strang", "suzuki-4"}) {
    double last = error_models(ask(system, formula), 0).back().error(1.0, 200);
    for (int level = 1; level <= 2; ++level) {
      const double error = error_models(ask(system, formula), level).front().error(1.0, 200);
      INFO(std::string(formula), " at level ", level);
      CHECK(error < last);
      last = error;
    }
  }
}

TEST_CASE("on average errors are bounded lower than for every state") {
  const System system = farrier::test::heisenberg_ring();
  for (const Formula& formula : formula_table())
    for (int level = 0; level <= 2; ++level) {
      const auto certified = error_models(ask(system, formula.name), level);
      const auto average =
          error_models(ask(system, formula.name, Assurance::average), level);
      REQUIRE(certified.size() == average.size());
      for (std::size_t k = 0; k < certified.size(); ++k)
        CHECK(average[k].error(1.0, 50) <= certified[k].error(1.0, 50) * (1.0 + 1e-9));
    }
}
