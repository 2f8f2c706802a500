// A seeded hunt for counterexamples to the error bounds: every bound against the true error of the
// dense matrices, over many kinds of Hamiltonian, layering and formula.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <limits>
#include <map>
#include <string>
#include <vector>

#include "compiler/bounds/models.hpp"
#include "compiler/formulas/expand.hpp"
#include "tests/properties/cases.hpp"
#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::Assurance;
using farrier::Formula;
using farrier::formula_table;
using farrier::bounds::deepest_level;
using farrier::bounds::error_models;
using farrier::bounds::ErrorModel;
using farrier::bounds::Question;
using farrier::test::Draw;
using farrier::test::Evolution;
using farrier::test::Matrix;
using farrier::test::Random;

namespace {

/// Errors below this are not told from the rounding of long double.
constexpr double least_error = 1e-12;

enum class Metric { spectral, average, up_to_phase };

/// A true error and what the arithmetic may have got wrong in it: a product of n unitaries of
/// dimension d is off by a modest multiple of n d units in the last place, and the angles by those of
/// the phase that they add up to.
struct Truth {
  long double error = 0;
  long double uncertainty = 0;
};

template <typename Real>
Truth true_error(const Draw& draw, const Formula& formula, std::uint64_t steps, Metric metric) {
  const Evolution<Real> evolution(draw.hamiltonian, draw.layering);
  const auto step = farrier::formulas::expand(formula, draw.layering.layers.size());
  const auto time = static_cast<Real>(draw.time);
  const Matrix<Real> product = evolution.product(step, time, steps);
  const Matrix<Real> exact = evolution.exact(time);
  Truth truth;
  switch (metric) {
    case Metric::spectral:
      truth.error = farrier::test::spectral_norm<Real>(product - exact);
      break;
    case Metric::average:
      truth.error = farrier::test::normalised_frobenius_norm<Real>(product - exact);
      break;
    case Metric::up_to_phase:
      truth.error = farrier::test::distance_up_to_phase<Real>(product, exact);
      break;
  }
  const double exponentials = static_cast<double>(step.size()) * static_cast<double>(steps);
  const double phase = draw.hamiltonian.sum.one_norm() * std::abs(draw.time);
  truth.uncertainty = 4 * static_cast<long double>(std::numeric_limits<Real>::epsilon()) *
                      static_cast<long double>(product.rows()) *
                      static_cast<long double>(exponentials + phase + 1.0);
  return truth;
}

/// What a hunt has seen, so that a test can tell whether it looked at anything.
struct Tally {
  std::size_t hamiltonians = 0;
  std::size_t checks = 0;
  std::map<std::string, std::size_t> by_model;  ///< formula, level and model
  long double least_ratio = 1e300L;             ///< of a bound to the true error
};

Question question(const Draw& draw, const Formula& formula, Metric metric, std::uint64_t work) {
  return {draw.hamiltonian,
          draw.layering,
          formula,
          metric == Metric::average ? Assurance::average : Assurance::certified,
          metric == Metric::up_to_phase,
          work};
}

/// Checks all models of all levels against the truth, in double where that decides it, else in long
/// double.
void check_bounds(const Draw& draw, const Formula& formula, std::uint64_t steps, Metric metric,
                  const std::vector<std::vector<ErrorModel>>& levels, Tally& tally) {
  double least = std::numeric_limits<double>::infinity();
  for (const auto& models : levels)
    for (const ErrorModel& model : models) least = std::min(least, model.error(draw.time, steps));
  Truth truth = true_error<double>(draw, formula, steps, metric);
  if (truth.error < 1e-8L || least < truth.error + truth.uncertainty)
    truth = true_error<long double>(draw, formula, steps, metric);
  if (truth.error < least_error) return;
  for (std::size_t level = 0; level < levels.size(); ++level)
    for (const ErrorModel& model : levels[level]) {
      const double bound = model.error(draw.time, steps);
      ++tally.checks;
      ++tally.by_model[std::string(formula.name) + " " + std::to_string(level) + " " + model.name];
      tally.least_ratio = std::min(tally.least_ratio, bound / truth.error);
      if (bound >= truth.error - truth.uncertainty) continue;
      FAIL_CHECK(std::string(formula.name), ", level ", level, ", ", model.name, ", ", draw.kind,
                 ", ", draw.hamiltonian.qubits, " qubits, ", draw.layering.layers.size(),
                 " layers ", draw.layering.name, ", ", steps, " steps: bound ", bound,
                 " is below the true error ", static_cast<double>(truth.error));
    }
}

std::vector<std::vector<ErrorModel>> all_levels(const Draw& draw, const Formula& formula,
                                                Metric metric, int deepest) {
  // Deep levels of many-qubit systems cost too much for a test; they come out empty.
  const std::uint64_t work = draw.hamiltonian.qubits <= 3 ? 1'500'000 : 300'000;
  std::vector<std::vector<ErrorModel>> levels;
  for (int level = 0; level <= deepest; ++level)
    levels.push_back(error_models(question(draw, formula, metric, work), level));
  return levels;
}

void hunt(std::uint64_t first_seed, std::size_t count, Metric metric, int deepest, Tally& tally) {
  static constexpr std::uint64_t step_counts[] = {1, 2, 3, 7, 20, 60, 300};
  for (std::uint64_t seed = first_seed; seed < first_seed + count; ++seed) {
    const Draw draw = farrier::test::draw(seed);
    Random random(seed);
    INFO("seed ", seed);
    ++tally.hamiltonians;
    for (const Formula& formula : formula_table()) {
      // The matrices of large systems take long.
      if (draw.hamiltonian.qubits >= 5 && formula.stages() > 5 && !random.chance(0.25)) continue;
      const auto levels = all_levels(draw, formula, metric, deepest);
      for (int k = 0; k < 2; ++k)
        check_bounds(draw, formula, step_counts[random.integer(0, 6)], metric, levels, tally);
    }
  }
}

/// Every formula was seen with every model that it has.
void check_coverage(const Tally& tally, int deepest) {
  for (const Formula& formula : formula_table())
    for (int level = 0; level <= deepest; ++level) {
      if (level > 0 && !formula.symmetric) continue;
      const std::string prefix = std::string(formula.name) + " " + std::to_string(level) + " ";
      std::size_t seen = 0;
      for (const auto& [name, number] : tally.by_model)
        if (name.starts_with(prefix)) seen += number;
      INFO(prefix);
      CHECK(seen >= 20);
    }
}

/// All bounds of a draw at one time and number of steps, in order.
std::vector<double> bounds_at(const Draw& draw, Metric metric, std::uint64_t steps) {
  std::vector<double> bounds;
  for (const Formula& formula : formula_table())
    for (const auto& models : all_levels(draw, formula, metric, 1))
      for (const ErrorModel& model : models) bounds.push_back(model.error(draw.time, steps));
  return bounds;
}

}  // namespace

TEST_CASE("no bound is below the true error - first hunt") {
  Tally tally;
  hunt(1000, 160, Metric::spectral, deepest_level, tally);
  check_coverage(tally, deepest_level);
  MESSAGE(tally.checks, " checks, least ratio ", static_cast<double>(tally.least_ratio));
}

TEST_CASE("no bound is below the true error - second hunt") {
  Tally tally;
  hunt(2000, 160, Metric::spectral, deepest_level, tally);
  check_coverage(tally, deepest_level);
  MESSAGE(tally.checks, " checks, least ratio ", static_cast<double>(tally.least_ratio));
}

TEST_CASE("no bound on average is below the root mean square") {
  Tally tally;
  hunt(3000, 120, Metric::average, 2, tally);
  check_coverage(tally, 2);
  MESSAGE(tally.checks, " checks, least ratio ", static_cast<double>(tally.least_ratio));
}

TEST_CASE("no bound up to a phase is below the least distance over all phases") {
  Tally tally;
  hunt(4000, 120, Metric::up_to_phase, 2, tally);
  check_coverage(tally, 2);
  MESSAGE(tally.checks, " checks, least ratio ", static_cast<double>(tally.least_ratio));
}

TEST_CASE("bounds fall with the steps and rise with the time") {
  for (std::uint64_t seed = 5000; seed < 5040; ++seed) {
    const Draw draw = farrier::test::draw(seed);
    for (const Formula& formula : formula_table())
      for (const auto& models : all_levels(draw, formula, Metric::spectral, 1))
        for (const ErrorModel& model : models) {
          INFO("seed ", seed, ", ", formula.name, ", ", model.name);
          double last = std::numeric_limits<double>::infinity();
          for (std::uint64_t steps = 1; steps < 100'000; steps += 1 + steps / 3) {
            const double bound = model.error(draw.time, steps);
            CHECK(bound <= last);
            last = bound;
          }
          last = 0.0;
          for (double scale = 0.01; scale < 100.0; scale *= 1.5) {
            const double bound = model.error(scale * draw.time, 10);
            CHECK(bound >= last);
            last = bound;
          }
        }
  }
}

TEST_CASE("a longer time and a smaller Hamiltonian have the same bounds bit for bit") {
  // Powers of two scale every number without rounding it.
  for (std::uint64_t seed = 6000; seed < 6030; ++seed)
    for (const Metric metric : {Metric::spectral, Metric::average, Metric::up_to_phase}) {
      Draw draw = farrier::test::draw(seed);
      const std::vector<double> bounds = bounds_at(draw, metric, 7);
      for (const double factor : {0x1p-9, 0.5, 0x1p12}) {
        Draw scaled = draw;
        scaled.hamiltonian.sum.scale(factor);
        scaled.time /= factor;
        INFO("seed ", seed, ", factor ", factor);
        CHECK(bounds_at(scaled, metric, 7) == bounds);
      }
    }
}

TEST_CASE("a constant changes neither bounds nor errors") {
  for (std::uint64_t seed = 7000; seed < 7030; ++seed) {
    const Draw draw = farrier::test::draw(seed);
    Draw shifted = draw;
    shifted.hamiltonian.sum.add_constant(0.7 * draw.hamiltonian.sum.one_norm());
    INFO("seed ", seed);
    CHECK(bounds_at(shifted, Metric::spectral, 5) == bounds_at(draw, Metric::spectral, 5));
    const Formula& strang = *farrier::find_formula("strang");
    const Truth with = true_error<double>(shifted, strang, 5, Metric::spectral);
    const Truth without = true_error<double>(draw, strang, 5, Metric::spectral);
    CHECK(std::abs(with.error - without.error) <= with.uncertainty + without.uncertainty);
  }
}
