// From the ramps of a formula to exponentials of layers.
#pragma once

#include <cstddef>
#include <farrier/formula.hpp>
#include <farrier/plan.hpp>
#include <vector>

namespace farrier::formulas {

/// One step as exponentials in time order, neighbours on one layer merged. Requires layers >= 1.
std::vector<Exponential> expand(const Formula& formula, std::size_t layers);

/// The first half of a time-symmetric formula, in time order: what acts before the middle of the
/// step. The exponential that crosses the middle is cut in two.
std::vector<Exponential> expand_first_half(const Formula& formula, std::size_t layers);

/// The exponentials of one step, counted with the sum of |fraction| a layer.
std::vector<double> absolute_fractions(const Formula& formula, std::size_t layers);

}  // namespace farrier::formulas
