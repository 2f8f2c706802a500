// From ramps to exponentials: the same operator, neighbours merged, and halves that make the whole.
#include "compiler/formulas/expand.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <cstddef>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::Exponential;
using farrier::find_formula;
using farrier::Formula;
using farrier::formula_table;
namespace formulas = farrier::formulas;

namespace {

bool same(const std::vector<Exponential>& a, const std::vector<Exponential>& b) {
  if (a.size() != b.size()) return false;
  for (std::size_t k = 0; k < a.size(); ++k)
    if (a[k].layer != b[k].layer || a[k].fraction != b[k].fraction) return false;
  return true;
}

}  // namespace

TEST_CASE("Lie-Trotter over three layers") {
  CHECK(same(formulas::expand(*find_formula("lie"), 3), {{0, 1.0}, {1, 1.0}, {2, 1.0}}));
}

TEST_CASE("Strang over three layers has the first layer outside and the last whole") {
  CHECK(same(formulas::expand(*find_formula("strang"), 3),
             {{0, 0.5}, {1, 0.5}, {2, 1.0}, {1, 0.5}, {0, 0.5}}));
  CHECK(same(formulas::expand_first_half(*find_formula("strang"), 3),
             {{0, 0.5}, {1, 0.5}, {2, 0.5}}));
}

TEST_CASE("Suzuki 4 over two layers") {
  const double p = 0.414490771794375737;  // Suzuki 1990, Phys. Lett. A 146, 319
  const double q = 1 - 4 * p;
  const double fractions[] = {p / 2, p, p, p, (p + q) / 2, q, (p + q) / 2, p, p, p, p / 2};
  const auto step = formulas::expand(*find_formula("suzuki-4"), 2);
  REQUIRE(step.size() == 11);
  for (std::size_t k = 0; k < 11; ++k) {
    CHECK(step[k].layer == k % 2);
    CHECK(std::abs(step[k].fraction - fractions[k]) <= 0x1p-52);
  }
}

TEST_CASE("neighbours on one layer are merged") {
  for (const Formula& formula : formula_table())
    for (std::size_t layers = 2; layers <= 6; ++layers) {
      const auto step = formulas::expand(formula, layers);
      INFO(formula.name, " over ", layers, " layers");
      CHECK(step.size() == formula.ramps.size() * (layers - 1) + 1);
      for (std::size_t k = 0; k < step.size(); ++k) {
        CHECK(step[k].layer < layers);
        if (k > 0) CHECK(step[k].layer != step[k - 1].layer);
      }
    }
}

TEST_CASE("a single layer takes one exponential") {
  for (const Formula& formula : formula_table()) {
    const auto step = formulas::expand(formula, 1);
    REQUIRE(step.size() == 1);
    CHECK(step[0].layer == 0);
    CHECK(std::abs(step[0].fraction - 1.0) < 1e-14);
  }
}

TEST_CASE("the fractions of a layer add up to 1") {
  for (const Formula& formula : formula_table())
    for (std::size_t layers = 1; layers <= 6; ++layers) {
      std::vector<long double> sums(layers, 0);
      for (const Exponential& exponential : formulas::expand(formula, layers))
        sums[exponential.layer] += exponential.fraction;
      INFO(formula.name, " over ", layers, " layers");
      for (const long double sum : sums) CHECK(std::abs(static_cast<double>(sum - 1)) < 1e-14);
    }
}

TEST_CASE("the first half and its mirror image are the whole bit for bit") {
  for (const Formula& formula : formula_table()) {
    if (!formula.symmetric) continue;
    for (std::size_t layers = 2; layers <= 6; ++layers) {
      std::vector<Exponential> whole = formulas::expand_first_half(formula, layers);
      const std::vector<Exponential> second(whole.rbegin(), whole.rend());
      whole.back().fraction += second.front().fraction;
      whole.insert(whole.end(), second.begin() + 1, second.end());
      INFO(formula.name, " over ", layers, " layers");
      CHECK(same(whole, formulas::expand(formula, layers)));
    }
  }
}

TEST_CASE("magnitudes of the fractions of each layer") {
  for (const Formula& formula : formula_table())
    for (std::size_t layers = 1; layers <= 6; ++layers) {
      std::vector<double> sums(layers, 0.0);
      for (const Exponential& exponential : formulas::expand(formula, layers))
        sums[exponential.layer] += std::abs(exponential.fraction);
      const std::vector<double> found = formulas::absolute_fractions(formula, layers);
      REQUIRE(found.size() == layers);
      INFO(formula.name, " over ", layers, " layers");
      for (std::size_t k = 0; k < layers; ++k) {
        CHECK(std::abs(found[k] - sums[k]) < 1e-13);
        CHECK(found[k] > 1.0 - 1e-14);
        if (formula.order <= 2) CHECK(std::abs(found[k] - 1.0) <= 0x1p-52);
      }
    }
}

TEST_CASE("merging leaves the operator as the ramps have it") {
  farrier::test::Random random(62);
  for (const std::size_t layers : {1U, 2U, 3U, 5U}) {
    farrier::Hamiltonian hamiltonian;
    hamiltonian.qubits = 3;
    hamiltonian.sum = farrier::test::random_sum(random, 3, 25);
    farrier::Layering layering;
    layering.layers.resize(layers);
    for (std::uint32_t term = 0; term < hamiltonian.sum.size(); ++term)
      layering.layers[term % layers].blocks.push_back({farrier::BlockKind::string, 0, 2, {term}});
    const farrier::test::Evolution<long double> evolution(hamiltonian, layering);
    for (const Formula& formula : formula_table()) {
      const auto merged = evolution.product(formulas::expand(formula, layers), 0.7L, 1);
      const auto ramps = evolution.product(farrier::test::ramp_by_ramp(formula, layers), 0.7L, 1);
      INFO(formula.name, " over ", layers, " layers");
      CHECK(static_cast<double>((merged - ramps).cwiseAbs().maxCoeff()) < 1e-14);
    }
  }
}
