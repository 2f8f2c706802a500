// A bound on the error of a product formula as a function of time and steps.
#include "compiler/bounds/error_model.hpp"

#include <algorithm>
#include <cmath>
#include <farrier/diagnostic.hpp>

namespace farrier::bounds {
namespace {

/// Relative margin for the arithmetic of one term: a few powers, a product, a sum.
constexpr double margin = 1.0 + 1e-14;

double value(const ErrorTerm& term, double time, std::uint64_t steps) {
  if (term.coefficient == 0.0) return 0.0;
  // Powers of t/r first, so that neither factor overflows on its own.
  const double r = static_cast<double>(steps);
  const int shared = std::min(term.time_power, term.step_power);
  return term.coefficient * std::pow(time / r, shared) * std::pow(time, term.time_power - shared) *
         std::pow(r, shared - term.step_power) * margin;
}

}  // namespace

double ErrorModel::error(double time, std::uint64_t steps) const {
  double total = 0.0;
  for (const ErrorTerm& term : terms) total += value(term, std::abs(time), steps);
  return total * margin;
}

std::uint64_t ErrorModel::least_steps(double time, double tolerance, std::uint64_t limit) const {
  const auto enough = [&](std::uint64_t steps) { return error(time, steps) <= tolerance; };
  std::uint64_t high = 1;
  while (!enough(high)) {
    if (high >= limit) return 0;
    high = std::min(limit, 2 * high);
  }
  std::uint64_t low = high / 2;
  while (high - low > 1) {
    const std::uint64_t middle = low + (high - low) / 2;
    (enough(middle) ? high : low) = middle;
  }
  return high;
}

std::vector<Contribution> ErrorModel::contributions(double time, std::uint64_t steps) const {
  std::vector<Contribution> result;
  for (const ErrorTerm& term : terms)
    result.push_back({term.name, value(term, std::abs(time), steps), term.method, true});
  return result;
}

const ErrorModel& tightest(const std::vector<ErrorModel>& models, double time,
                           std::uint64_t steps) {
  if (models.empty()) throw InternalFault("no error model to choose from");
  return *std::ranges::min_element(
      models, {}, [&](const ErrorModel& model) { return model.error(time, steps); });
}

std::uint64_t least_steps(const std::vector<ErrorModel>& models, double time, double tolerance) {
  std::uint64_t best = 0;
  for (const ErrorModel& model : models) {
    const std::uint64_t steps = model.least_steps(time, tolerance, best == 0 ? most_steps : best);
    if (steps != 0) best = best == 0 ? steps : std::min(best, steps);
  }
  return best;
}

}  // namespace farrier::bounds
