// From the ramps of a formula to exponentials of layers.
#include "compiler/formulas/expand.hpp"

#include <cmath>
#include <cstdint>
#include <span>

namespace farrier::formulas {
namespace {

std::vector<Exponential> expand_ramps(std::span<const double> ramps, std::size_t layers) {
  std::vector<Exponential> result;
  const auto append = [&](std::size_t layer, double fraction) {
    if (!result.empty() && result.back().layer == layer)
      result.back().fraction += fraction;
    else
      result.push_back({static_cast<std::uint32_t>(layer), fraction});
  };
  bool forwards = true;
  for (const double ramp : ramps) {
    for (std::size_t k = 0; k < layers; ++k) append(forwards ? k : layers - 1 - k, ramp);
    forwards = !forwards;
  }
  return result;
}

}  // namespace

std::vector<Exponential> expand(const Formula& formula, std::size_t layers) {
  return expand_ramps(formula.ramps, layers);
}

std::vector<Exponential> expand_first_half(const Formula& formula, std::size_t layers) {
  return expand_ramps(std::span(formula.ramps).first(formula.ramps.size() / 2), layers);
}

std::vector<double> absolute_fractions(const Formula& formula, std::size_t layers) {
  std::vector<double> sums(layers, 0.0);
  for (const Exponential& exponential : expand(formula, layers))
    sums[exponential.layer] += std::abs(exponential.fraction);
  return sums;
}

}  // namespace farrier::formulas
