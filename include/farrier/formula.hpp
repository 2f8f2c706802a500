// Product formulas: one table, a row each.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace farrier {

/// A product formula as ramps: the layers H_1 ... H_m are run through forwards with the first
/// coefficient, backwards with the second, forwards with the third, and so on; the last exponential
/// of a ramp and the first of the next belong to one layer and are merged. The coefficients of a
/// formula of at least first order add up to 1.
struct Formula {
  std::string_view name;
  int order = 1;
  bool symmetric = true;      ///< time-symmetric: the ramps read the same backwards
  std::vector<double> ramps;  ///< 1 for Lie-Trotter, else 2 * stages of them
  std::string_view source;    ///< paper and equation, or how it was found
  bool by_default = true;     ///< considered where no formula is named

  [[nodiscard]] std::size_t stages() const { return symmetric ? ramps.size() / 2 : 1; }
};

/// Every formula that farrier knows, by order.
const std::vector<Formula>& formula_table();
/// The row of that name, or nullptr.
const Formula* find_formula(std::string_view name);

}  // namespace farrier
