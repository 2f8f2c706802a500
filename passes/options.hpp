// Product formulas over layerings, with their error models: what choose_formula chooses from.
#pragma once

#include <cstdint>
#include <farrier/formula.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <vector>

#include "compiler/bounds/models.hpp"
#include "passes/pass.hpp"

namespace farrier::passes {

/// A formula over a layering, with its error models and a first estimate of its cost.
struct Option {
  const Layering* layering = nullptr;
  const Formula* formula = nullptr;  ///< none: exact
  std::vector<bounds::ErrorModel> models;
  std::vector<Exponential> step;
  std::uint64_t step_cost = 0;  ///< estimated two-qubit gates a step, seams merged
  int level = -1;               ///< of the sharpest bound asked for
  bool sharpest = false;        ///< the last level brought nothing
};

/// Every allowed formula over every layering, without error models; exact ones where a layering has
/// one layer and nothing is restricted.
std::vector<Option> options(const Hamiltonian& hamiltonian, const Request& request,
                            const std::vector<Layering>& layerings);

/// Bounds the options, the promising ones more sharply, and drops those that were not bounded at
/// all. Low orders go first: they are cheap to bound, and their cost tells which layerings are good
/// and which high orders cannot win.
void certify(const Hamiltonian& hamiltonian, const Request& request, std::vector<Option>& all);

/// The question that the error models of a formula over a layering answer.
bounds::Question question(const Hamiltonian& hamiltonian, const Request& request,
                          const Layering& layering, const Formula& formula);

/// How many steps an option takes: given, or the least for the tolerance less a reserve (0: out of
/// reach), or about the most that the limits allow.
std::uint64_t wanted_steps(const Option& option, const Request& request, double reserve);

/// Two-qubit gates that an option is expected to take; infinite where it is out of reach.
double estimate(const Option& option, const Request& request);

}  // namespace farrier::passes
