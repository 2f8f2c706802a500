// The bound from 1-norms alone: always available, seldom tight.
#include <cmath>

#include "compiler/bounds/models.hpp"
#include "compiler/formulas/expand.hpp"
#include "compiler/pauli/norms.hpp"

namespace farrier::bounds {

ErrorModel coarse_model(const Question& question) {
  const int order = question.formula.order;
  const std::vector<double> fractions =
      formulas::absolute_fractions(question.formula, question.layering.layers.size());
  double formula_norm = 0.0;
  std::size_t terms = 0;
  for (std::size_t k = 0; k < fractions.size(); ++k) {
    double layer_norm = 0.0;
    for (const Block& block : question.layering.layers[k].blocks) {
      for (const std::uint32_t term : block.terms)
        layer_norm += std::abs(question.hamiltonian.sum.coefficient(term));
      terms += block.terms.size();
    }
    formula_norm += fractions[k] * layer_norm;
  }
  // Before the powers, which multiply the rounding of the sums.
  formula_norm =
      pauli::summed_up(formula_norm, terms + 2 * fractions.size() + question.formula.ramps.size());
  const double norm = pauli::summed_up(question.hamiltonian.sum.one_norm(), terms);
  const double coefficient =
      (std::pow(formula_norm, order + 1) + std::pow(norm, order + 1)) / std::tgamma(order + 2.0);
  // The fractions of a layer add up to 1 only to rounding; each last bit is worth tau * ||layer||.
  const double order_conditions = 1e-15 * formula_norm;
  return {"1-norm",
          {{"remainder", "1-norms of layers", coefficient * (1.0 + 1e-14), order + 1, order},
           {"order conditions", "rounding of the coefficients", order_conditions, 1, 0}},
          0};
}

}  // namespace farrier::bounds
