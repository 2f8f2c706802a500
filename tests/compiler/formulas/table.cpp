// The table of formulas: each row is what it says, above all of the order that it says.
#include <farrier/formula.hpp>

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <set>
#include <string>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::Formula;
using farrier::formula_table;
using farrier::find_formula;
using farrier::Hamiltonian;
using farrier::Layer;
using farrier::Layering;
using farrier::test::Evolution;
using farrier::test::Random;

namespace {

/// A random Hamiltonian on two qubits, its terms dealt out to layers that do not commute.
struct Sample {
  Hamiltonian hamiltonian;
  Layering layering;
};

Sample random_sample(Random& random, std::size_t layers) {
  Sample sample;
  sample.hamiltonian.qubits = 2;
  sample.hamiltonian.sum = farrier::test::random_sum(random, 2, 40);
  sample.hamiltonian.sum.scale(1.0 / sample.hamiltonian.sum.one_norm());
  sample.layering.layers.resize(layers);
  for (std::uint32_t term = 0; term < sample.hamiltonian.sum.size(); ++term)
    sample.layering.layers[term % layers].blocks.push_back(
        {farrier::BlockKind::string, 0, 1, {term}});
  return sample;
}

/// log2 of the error at tau over that at tau / 2, where the error is about 1e-9: small enough for the
/// leading power of tau, and far above both the rounding of long double and what the formulas'
/// coefficients, rounded to double, leave of lower powers.
double slope(const Formula& formula, const Sample& sample) {
  const Evolution<long double> evolution(sample.hamiltonian, sample.layering);
  const auto step = farrier::test::ramp_by_ramp(formula, sample.layering.layers.size());
  long double tau = 1;
  while (evolution.error(step, tau, 1) > 1e-9L) tau /= 1.25L;
  const long double coarse = evolution.error(step, tau, 1);
  const long double fine = evolution.error(step, tau / 2, 1);
  REQUIRE(fine > 1e-13L);
  return static_cast<double>(std::log2(coarse / fine));
}

const Formula& row(const char* name) {
  const Formula* formula = find_formula(name);
  REQUIRE(formula != nullptr);
  return *formula;
}

}  // namespace

TEST_CASE("names of formulas are unique and found") {
  std::set<std::string> names;
  for (const Formula& formula : formula_table()) {
    CHECK(names.insert(std::string(formula.name)).second);
    CHECK(find_formula(formula.name) == &formula);
    CHECK_FALSE(formula.source.empty());
  }
  for (const char* name : {"lie", "strang", "suzuki-4", "suzuki-6"}) CHECK(names.count(name) == 1);
  CHECK(find_formula("no-such-formula") == nullptr);
  CHECK(find_formula("") == nullptr);
}

TEST_CASE("formulas stand in rising order") {
  CHECK(std::ranges::is_sorted(formula_table(), {}, &Formula::order));
}

TEST_CASE("ramps add up to 1") {
  for (const Formula& formula : formula_table()) {
    long double sum = 0;
    for (const double ramp : formula.ramps) sum += ramp;
    INFO(formula.name);
    CHECK(std::abs(static_cast<double>(sum - 1)) <= 4 * 0x1p-52);
  }
}

TEST_CASE("symmetric formulas are palindromes bit for bit") {
  for (const Formula& formula : formula_table()) {
    INFO(formula.name);
    const std::vector<double> backwards(formula.ramps.rbegin(), formula.ramps.rend());
    if (formula.symmetric) {
      CHECK(formula.ramps == backwards);
      CHECK(formula.ramps.size() % 2 == 0);
      CHECK(formula.stages() == formula.ramps.size() / 2);
      // The error of a time-symmetric formula has odd powers only (Yoshida 1990, Phys. Lett. A 150,
      // 262), so that its order is even.
      CHECK(formula.order % 2 == 0);
    } else {
      CHECK(formula.stages() == formula.ramps.size());
    }
  }
}

TEST_CASE("the error of one step falls with the power that the order says") {
  for (const Formula& formula : formula_table()) {
    Random random(61);
    for (const std::size_t layers : {2U, 2U, 3U, 4U}) {
      INFO(formula.name, " over ", layers, " layers");
      const double measured = slope(formula, random_sample(random, layers));
      CHECK(std::abs(measured - (formula.order + 1)) < 0.1);
    }
  }
}

TEST_CASE("Lie-Trotter runs through the layers once") {
  CHECK(row("lie").ramps == std::vector<double>{1.0});
  CHECK_FALSE(row("lie").symmetric);
  CHECK(row("lie").stages() == 1);
}

TEST_CASE("Strang runs there and back with half steps") {
  CHECK(row("strang").ramps == std::vector<double>{0.5, 0.5});
  CHECK(row("strang").stages() == 1);
}

TEST_CASE("Suzuki 4 has the constant of its closed form") {
  // p_2 = 1 / (4 - 4^(1/3)), Suzuki 1990, Phys. Lett. A 146, 319; digits by the closed form.
  const double p = 0.414490771794375737;
  CHECK(std::abs(p - static_cast<double>(1 / (4 - std::cbrt(4.0L)))) < 1e-16);
  const std::vector<double> weights = {p, p, 1 - 4 * p, p, p};
  const Formula& formula = row("suzuki-4");
  REQUIRE(formula.ramps.size() == 10);
  for (std::size_t k = 0; k < 10; ++k)
    CHECK(std::abs(formula.ramps[k] - weights[k / 2] / 2) <= 0x1p-52);
}

TEST_CASE("Suzuki 6 has the constants of its closed form") {
  // p_3 = 1 / (4 - 4^(1/5)), as above.
  const double p2 = 0.414490771794375737;
  const double p3 = 0.373065827733272825;
  CHECK(std::abs(p3 - static_cast<double>(1 / (4 - std::pow(4.0L, 0.2L)))) < 1e-16);
  const std::vector<double> inner = {p2, p2, 1 - 4 * p2, p2, p2};
  const std::vector<double> outer = {p3, p3, 1 - 4 * p3, p3, p3};
  const Formula& formula = row("suzuki-6");
  REQUIRE(formula.ramps.size() == 50);
  for (std::size_t k = 0; k < 50; ++k)
    CHECK(std::abs(formula.ramps[k] - outer[k / 10] * inner[k / 2 % 5] / 2) <= 0x1p-52);
}
