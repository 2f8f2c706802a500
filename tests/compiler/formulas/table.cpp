// The table of formulas: each row is what it says, above all of the order that it says.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <farrier/formula.hpp>
#include <set>
#include <string>
#include <tuple>
#include <utility>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::find_formula;
using farrier::Formula;
using farrier::formula_table;
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

/// log2 of the error at tau over that at tau / 2, where the error is about 1e-9 (from order 6 on,
/// whose steps are longer, 1e-11): small enough for the leading power of tau, and far above both
/// the rounding of long double and what the formulas' coefficients, rounded to double, leave of
/// lower powers.
double slope(const Formula& formula, const Sample& sample) {
  const Evolution<long double> evolution(sample.hamiltonian, sample.layering);
  const auto step = farrier::test::ramp_by_ramp(formula, sample.layering.layers.size());
  const long double small = formula.order < 6 ? 1e-9L : 1e-11L;
  long double tau = 4;
  while (evolution.error(step, tau, 1) > small) tau /= 1.25L;
  const long double coarse = evolution.error(step, tau, 1);
  const long double fine = evolution.error(step, tau / 2, 1);
  REQUIRE(fine > 1e-15L);
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
  for (const char* name :
       {"lie", "strang", "suzuki-4", "suzuki-6", "suzuki-8", "blanes-moan-4", "blanes-moan-6",
        "mclachlan-4-5", "kahan-li-8", "secular-4-6", "secular-6-14", "secular-8-21", "plain-4-6"})
    CHECK(names.count(name) == 1);
  CHECK(find_formula("no-such-formula") == nullptr);
  CHECK(find_formula("") == nullptr);
}

TEST_CASE("formulas stand by order and stages - Suzuki first") {
  const auto key = [](const Formula& formula) {
    const bool suzuki = formula.name == "suzuki-" + std::to_string(formula.order);
    return std::tuple(formula.order, !suzuki, formula.stages());
  };
  CHECK(std::ranges::is_sorted(formula_table(), {}, key));
}

TEST_CASE("names say order and stages") {
  for (const Formula& formula : formula_table()) {
    std::vector<std::size_t> numbers;
    std::string word;
    for (const char letter : std::string(formula.name) + '-') {
      if (letter != '-') {
        word += letter;
        continue;
      }
      if (!word.empty() && word.front() >= '0' && word.front() <= '9')
        numbers.push_back(std::stoul(word));
      word.clear();
    }
    INFO(formula.name);
    if (numbers.empty()) {
      CHECK((formula.name == "lie" || formula.name == "strang"));
      continue;
    }
    CHECK(numbers.front() == static_cast<std::size_t>(formula.order));
    if (numbers.size() > 1) CHECK(numbers.back() == formula.stages());
    CHECK(numbers.size() <= 2);
  }
}

TEST_CASE("every order has a formula that is considered by default") {
  for (const Formula& formula : formula_table()) {
    const auto considered = [&](const Formula& other) {
      return other.order == formula.order && other.by_default;
    };
    CHECK(std::ranges::any_of(formula_table(), considered));
  }
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

namespace {

/// Coefficients of two operators in turn, a1 b1 a2 b2 ..., as a formula over two layers has them.
std::vector<double> two_operators(const Formula& formula) {
  std::vector<double> coefficients = {formula.ramps.front()};
  for (std::size_t k = 1; k < formula.ramps.size(); ++k)
    coefficients.push_back(formula.ramps[k - 1] + formula.ramps[k]);
  return coefficients;
}

}  // namespace

TEST_CASE("published schemes have their published coefficients") {
  struct Published {
    const char* name;
    std::vector<double> coefficients;  ///< a1 b1 a2 b2 ... up to the middle
  };
  // The papers that the rows name, digits from memory; the values that consistency gives included.
  const std::vector<Published> table = {
      {"omelyan-2", {0.1931833275037836, 0.5, 0.6136333449924328}},
      {"omelyan-position-4",
       {0.1786178958448091, 0.7123418310626054, -0.06626458266981849, -0.2123418310626054}},
      {"omelyan-velocity-4-4",
       {0.1644986515575760, 0.52094333910398989, 1.235692651138917, -0.02094333910398989}},
      {"mclachlan-4-4",
       {(642 + std::sqrt(471.0)) / 3924, 6.0 / 11, 121 * (12 - std::sqrt(471.0)) / 3924,
        -1.0 / 22}},
      {"mclachlan-4-5",
       {(14 - std::sqrt(19.0)) / 108, 0.4, (20 - 7 * std::sqrt(19.0)) / 108, -0.1,
        (20 + 8 * std::sqrt(19.0)) / 108, 0.4}},
      {"omelyan-velocity-4-5",
       {0.08398315262876693, 0.2539785108410595, 0.6822365335719091, -0.03230286765269967}},
      {"blanes-moan-4",
       {0.0792036964311957, 0.209515106613362, 0.353172906049774, -0.143851773179818,
        -0.0420650803577195, 0.434336666566456, 0.21937695575349958}},
      {"blanes-moan-6",
       {0.0502627644003922, 0.148816447901042, 0.413514300428344, -0.132385865767784,
        0.0450798897943977, 0.067307604692185, -0.188054853819569, 0.432666402578175,
        0.541960678450780}},
  };
  for (const Published& published : table) {
    INFO(published.name);
    const std::vector<double> found = two_operators(row(published.name));
    REQUIRE(found.size() >= published.coefficients.size());
    for (std::size_t k = 0; k < published.coefficients.size(); ++k)
      CHECK(std::abs(found[k] - published.coefficients[k]) < 1e-15);
  }
}

TEST_CASE("compositions of Strang steps have pairs of equal ramps and their published weights") {
  // Weights from the middle outwards are what the papers print; from memory.
  const std::vector<std::pair<const char*, double>> middles = {
      {"forest-ruth-4", -1.702414383919315268}, {"yoshida-6", 1.315186320683906},
      {"kahan-li-6", 0.79854399093482996340},   {"suzuki-umeno-8", -0.79688793935291635402},
      {"kahan-li-8", -0.60550853383003451170},  {"secular-8-17", -0.6167769064724003073},
  };
  for (const auto& [name, middle] : middles) {
    INFO(name);
    const std::vector<double>& ramps = row(name).ramps;
    for (std::size_t k = 0; k + 1 < ramps.size(); k += 2) CHECK(ramps[k] == ramps[k + 1]);
    CHECK(std::abs(2 * ramps[ramps.size() / 2] - middle) < 2e-15);
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

TEST_CASE("Suzuki 8 has 125 stages with the constants of its closed form") {
  // p_4 = 1 / (4 - 4^(1/7)), as above.
  const double p4 = 0.359584649349992253;
  CHECK(std::abs(p4 - static_cast<double>(1 / (4 - std::pow(4.0L, 1 / 7.0L)))) < 1e-16);
  const std::vector<double> outer = {p4, p4, 1 - 4 * p4, p4, p4};
  const std::vector<double>& inner = row("suzuki-6").ramps;
  const std::vector<double>& ramps = row("suzuki-8").ramps;
  REQUIRE(ramps.size() == 250);
  for (std::size_t k = 0; k < 250; ++k)
    CHECK(std::abs(ramps[k] - outer[k / 50] * inner[k % 50]) <= 0x1p-52);
}
