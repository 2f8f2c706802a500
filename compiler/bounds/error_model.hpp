// A bound on the error of a product formula as a function of time and steps.
#pragma once

#include <cstdint>
#include <farrier/plan.hpp>
#include <string>
#include <vector>

namespace farrier::bounds {

/// One summand: coefficient * |t|^time_power / r^step_power. Coefficients are not negative.
struct ErrorTerm {
  std::string name;
  std::string method;
  double coefficient = 0.0;
  int time_power = 0;
  int step_power = 0;
};

/// ||S(t/r)^r - exp(-iHt)|| <= the sum of the terms, for every r >= 1, in the norm of the assurance
/// that the model was built for.
struct ErrorModel {
  std::string name;
  std::vector<ErrorTerm> terms;
  std::uint64_t work = 0;  ///< products of Pauli strings that it took to find

  /// The bound, rounded up.
  [[nodiscard]] double error(double time, std::uint64_t steps) const;
  /// The least number of steps with error(time, steps) <= tolerance, at most `limit`; 0 where even
  /// `limit` steps do not do.
  [[nodiscard]] std::uint64_t least_steps(double time, double tolerance, std::uint64_t limit) const;
  /// The terms at one time and number of steps; they add up to error(time, steps) but for rounding.
  [[nodiscard]] std::vector<Contribution> contributions(double time, std::uint64_t steps) const;
};

/// More steps than this are never tried.
inline constexpr std::uint64_t most_steps = std::uint64_t{1} << 52;

/// The model with the least bound; models must not be empty.
const ErrorModel& tightest(const std::vector<ErrorModel>& models, double time, std::uint64_t steps);

/// The least number of steps over the models; 0 where none reaches the tolerance.
std::uint64_t least_steps(const std::vector<ErrorModel>& models, double time, double tolerance);

}  // namespace farrier::bounds
