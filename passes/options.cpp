// Product formulas over layerings, with their error models.
#include "passes/options.hpp"

#include <algorithm>
#include <array>
#include <iterator>
#include <limits>
#include <map>
#include <set>
#include <string>
#include <utility>

#include "compiler/base/parallel.hpp"
#include "compiler/formulas/expand.hpp"
#include "compiler/synthesis/cost.hpp"

namespace farrier::passes {
namespace {

/// Products of Pauli strings that one error model may cost. A local Hamiltonian takes as many a
/// qubit whatever its size.
std::uint64_t work_limit(Effort effort, std::uint32_t qubits) {
  const std::uint64_t normal = 4'000'000 + std::uint64_t{80'000} * qubits;
  switch (effort) {
    case Effort::low:
      return normal / 8;
    case Effort::normal:
      return normal;
    case Effort::high:
      return normal * 20;
  }
  return 0;
}

/// A bound is sharpened by the next level where the cost that it asks for is at most this many
/// times the least so far: the sharpest bounds save a factor of several over level 0, little
/// beyond.
constexpr std::array<double, bounds::deepest_level> worth_sharpening = {5.0, 2.5, 1.3};
/// and where more than this share of the error is the remainder, which the next level lowers.
constexpr double remainder_share = 0.03;

bool allowed(const Formula& formula, const Restriction& restriction) {
  const auto names = [&](const std::string& name) { return name == formula.name; };
  if (restriction.formulas.empty() ? !formula.by_default
                                   : std::ranges::none_of(restriction.formulas, names))
    return false;
  return restriction.orders.empty() ||
         std::ranges::find(restriction.orders, formula.order) != restriction.orders.end();
}

bool exact_allowed(const Restriction& restriction) {
  return !restriction.any() ||
         std::ranges::find(restriction.formulas, "exact") != restriction.formulas.end();
}

std::uint64_t estimate_step(const Hamiltonian& hamiltonian, const Layering& layering,
                            const std::vector<Exponential>& step) {
  std::vector<std::uint64_t> costs;
  for (const Layer& layer : layering.layers)
    costs.push_back(synthesis::layer_cost(hamiltonian, layer));
  std::uint64_t total = 0;
  for (const Exponential& exponential : step) total += costs[exponential.layer];
  if (step.size() > 1 && step.front().layer == step.back().layer)
    total -= costs[step.front().layer];
  return total;
}

/// The share of the error that the remainder of the series makes.
double share_of_remainder(const Option& option, const Request& request) {
  const std::uint64_t steps = std::max<std::uint64_t>(1, wanted_steps(option, request, 0.0));
  const auto contributions =
      bounds::tightest(option.models, request.time, steps).contributions(request.time, steps);
  double total = 0.0;
  double remainder = 0.0;
  for (const Contribution& contribution : contributions) {
    total += contribution.value;
    if (contribution.name == "remainder") remainder += contribution.value;
  }
  return total > 0.0 ? remainder / total : 0.0;
}

/// Layerings (orders of layers included) that later formulas are tried over: so many at most, and
/// only those that cost at most this many times the cheapest under the first formulas of order 2 or
/// more. How layerings compare depends little on the formula.
constexpr std::size_t kept_layerings = 2;
constexpr double kept_layering_cost = 1.6;
/// On so many qubits a certificate takes seconds, and one layering has to do.
constexpr std::uint32_t many_qubits = 200;

std::vector<const Layering*> promising_layerings(const std::vector<Option>& all, int order,
                                                 const Request& request, std::uint32_t qubits) {
  std::vector<std::pair<double, const Layering*>> costs;
  for (const Option& option : all) {
    if (option.formula == nullptr || option.formula->order != order || option.models.empty())
      continue;
    const double cost = estimate(option, request);
    const auto same =
        std::ranges::find(costs, option.layering, [](const auto& e) { return e.second; });
    if (same == costs.end())
      costs.emplace_back(cost, option.layering);
    else
      same->first = std::min(same->first, cost);
  }
  std::ranges::stable_sort(costs, {}, [](const auto& entry) { return entry.first; });
  std::vector<const Layering*> kept;
  for (const auto& [cost, layering] : costs)
    if (kept.size() < (qubits > many_qubits ? 1 : kept_layerings) &&
        cost <= kept_layering_cost * costs.front().first)
      kept.push_back(layering);
  return kept;
}

/// Orders of the layers of one layering that a formula's bound is sharpened for: the cheapest so
/// far.
constexpr std::size_t sharpened_orders = 2;

void keep_best_orders(std::vector<Option*>& chosen, const Request& request) {
  std::ranges::stable_sort(chosen, {},
                           [&](const Option* option) { return estimate(*option, request); });
  std::vector<Option*> kept;
  for (Option* option : chosen) {
    const auto alike = [&](const Option* other) {
      return other->formula == option->formula && other->layering->name == option->layering->name;
    };
    if (static_cast<std::size_t>(std::ranges::count_if(kept, alike)) < sharpened_orders)
      kept.push_back(option);
  }
  chosen = std::move(kept);
}

/// The options of one formula order whose bound is worth sharpening to a level, `least` being the
/// cost of the best option so far.
std::vector<Option*> worth_certifying(std::vector<Option>& all, int order, int level, double least,
                                      const Request& request,
                                      const std::vector<const Layering*>& promising, bool dense) {
  std::vector<Option*> chosen;
  for (Option& option : all) {
    if (option.sharpest || option.formula->order != order) continue;
    if (!promising.empty() && std::ranges::find(promising, option.layering) == promising.end())
      continue;
    // The first dense certificate is cheap, and nothing below it tells how good it will be.
    const bool gated = level > 0 && !(dense && level == 1);
    if (gated &&
        estimate(option, request) > worth_sharpening[static_cast<std::size_t>(level - 1)] * least)
      continue;
    if (level > 1 && share_of_remainder(option, request) <= remainder_share) continue;
    chosen.push_back(&option);
  }
  if (level > 0) keep_best_orders(chosen, request);
  return chosen;
}

/// What the midpoint frame cost so far, to tell what would run into the work limit for nothing.
class WorkForecast {
 public:
  /// Products of a model of that degree over a step of so many exponentials; 0 where unknown.
  [[nodiscard]] double products(int degree, std::size_t exponentials) const {
    if (const auto known = a_exponential_.find(degree); known != a_exponential_.end())
      return known->second * static_cast<double>(exponentials);
    const auto below = a_exponential_.find(degree - 2);
    return below == a_exponential_.end()
               ? 0.0
               : growth * below->second * static_cast<double>(exponentials);
  }

  /// Products spent so far.
  [[nodiscard]] double spent() const { return spent_; }

  void learn(int degree, std::size_t exponentials, std::uint64_t products) {
    spent_ += static_cast<double>(products);
    double& known = a_exponential_[degree];
    known = std::max(known, static_cast<double>(products) / static_cast<double>(exponentials));
  }

 private:
  static constexpr double growth = 5.0;  ///< of two degrees, at the least
  std::map<int, double> a_exponential_;
  double spent_ = 0.0;
};

/// The least estimate of the options that are bounded, of one formula order or (0) of all.
double least_estimate(const std::vector<Option>& all, const Request& request, int order = 0) {
  double least = std::numeric_limits<double>::infinity();
  for (const Option& option : all)
    if (!option.models.empty() &&
        (order == 0 || (option.formula != nullptr && option.formula->order == order)))
      least = std::min(least, estimate(option, request));
  return least;
}

/// Where the best formula of an order costs this many times the best of the lower ones, higher
/// orders are not tried.
constexpr double hopeless_order = 1.15;

/// Products that all models together may cost.
double total_work_limit(const Hamiltonian& hamiltonian, const Request& request) {
  const std::uint64_t one = work_limit(request.search.effort, hamiltonian.qubits);
  return std::max(3.0 * static_cast<double>(one), 2e8);
}

/// Drops the options at the end of the list that the work limit does not reach; the first one
/// stays.
void keep_affordable(const Hamiltonian& hamiltonian, const Request& request, int level,
                     std::vector<Option*>& chosen, const WorkForecast& forecast) {
  double left = total_work_limit(hamiltonian, request) - forecast.spent();
  std::size_t kept = 0;
  for (; kept < chosen.size(); ++kept) {
    left -= forecast.products(chosen[kept]->formula->order + 2 * level, chosen[kept]->step.size());
    if (kept > 0 && left < 0.0) break;
  }
  chosen.resize(kept);
}

/// Adds the models of one level to options, in parallel.
void sharpen(const Hamiltonian& hamiltonian, const Request& request, int level,
             std::vector<Option*> chosen, WorkForecast& forecast) {
  if (level > 0) keep_affordable(hamiltonian, request, level, chosen, forecast);
  base::parallel_for(chosen.size(), [&](std::size_t k) {
    Option& option = *chosen[k];
    bounds::Question asked = question(hamiltonian, request, *option.layering, *option.formula);
    const int degree = option.formula->order + 2 * level;
    if (forecast.products(degree, option.step.size()) > static_cast<double>(asked.work_limit))
      asked.work_limit = 0;
    auto models = bounds::error_models(asked, level);
    option.sharpest = models.empty();
    option.level = level;
    std::ranges::move(models, std::back_inserter(option.models));
  });
  for (const Option* option : chosen)
    if (!option->sharpest && option->models.back().work > 0)
      forecast.learn(option->formula->order + 2 * level, option->step.size(),
                     option->models.back().work);
}

/// Formulas this near the best one are tried over the other promising layerings too.
constexpr double near_best = 1.05;

void second_chance(const Hamiltonian& hamiltonian, const Request& request, std::vector<Option>& all,
                   const std::vector<const Layering*>& promising, WorkForecast& forecast) {
  const double least = least_estimate(all, request);
  std::set<const Formula*> formulas;
  int deepest = 0;
  for (const Option& option : all) {
    if (option.models.empty() || estimate(option, request) > near_best * least) continue;
    formulas.insert(option.formula);
    deepest = std::max(deepest, option.level);
  }
  for (int level = 0; level <= deepest; ++level) {
    std::vector<Option*> chosen;
    for (Option& option : all)
      if (!option.sharpest && option.level == level - 1 && formulas.contains(option.formula) &&
          std::ranges::find(promising, option.layering) != promising.end())
        chosen.push_back(&option);
    sharpen(hamiltonian, request, level, chosen, forecast);
  }
}

}  // namespace

std::vector<Option> options(const Hamiltonian& hamiltonian, const Request& request,
                            const std::vector<Layering>& layerings) {
  std::vector<Option> result;
  for (const Layering& layering : layerings) {
    const std::size_t layers = layering.layers.size();
    if (layers <= 1 && exact_allowed(request.restriction)) {
      std::vector<Exponential> step;
      if (layers == 1) step.push_back({0, 1.0});
      result.push_back({&layering, nullptr, {{"exact", {}, 0}}, std::move(step), 0, 0, true});
      continue;
    }
    if (layers == 0) continue;
    for (const Formula& formula : formula_table()) {
      if (!allowed(formula, request.restriction)) continue;
      std::vector<Exponential> step = formulas::expand(formula, layers);
      const std::uint64_t cost = estimate_step(hamiltonian, layering, step);
      result.push_back({&layering, &formula, {}, std::move(step), cost, -1, false});
    }
  }
  return result;
}

bounds::Question question(const Hamiltonian& hamiltonian, const Request& request,
                          const Layering& layering, const Formula& formula) {
  return {hamiltonian,
          layering,
          formula,
          request.budget.assurance,
          request.budget.up_to_phase,
          request.time,
          work_limit(request.search.effort, hamiltonian.qubits)};
}

std::uint64_t wanted_steps(const Option& option, const Request& request, double reserve) {
  if (option.formula == nullptr) return 1;
  if (request.restriction.steps) return *request.restriction.steps;
  if (request.budget.tolerance)
    return bounds::least_steps(option.models, request.time, *request.budget.tolerance - reserve);
  const std::uint64_t most =
      request.budget.max_two_qubit_gates.value_or(request.budget.max_depth.value_or(1) * 1000);
  return std::max<std::uint64_t>(1, most / std::max<std::uint64_t>(1, option.step_cost));
}

double estimate(const Option& option, const Request& request) {
  const std::uint64_t steps = wanted_steps(option, request, 0.0);
  if (steps == 0) return std::numeric_limits<double>::infinity();
  return static_cast<double>(steps) * static_cast<double>(option.step_cost);
}

void certify(const Hamiltonian& hamiltonian, const Request& request, std::vector<Option>& all) {
  std::set<int> orders;
  bool dense = true;
  for (const Option& option : all) {
    if (option.formula == nullptr) continue;
    orders.insert(option.formula->order);
    dense = dense && bounds::dense_fits(hamiltonian, *option.layering);
  }
  WorkForecast forecast;
  std::vector<const Layering*> promising;
  const auto run = [&](int order, const std::vector<const Layering*>& layerings) {
    for (int level = 0; level <= bounds::deepest_level; ++level)
      sharpen(hamiltonian, request, level,
              worth_certifying(all, order, level, least_estimate(all, request), request, layerings,
                               dense),
              forecast);
  };
  for (const int order : orders) {
    const double before = least_estimate(all, request);
    run(order, promising.empty() ? promising : std::vector<const Layering*>{promising.front()});
    if (order >= 2 && promising.empty())
      promising = promising_layerings(all, order, request, hamiltonian.qubits);
    if (order >= 4 && least_estimate(all, request, order) > hopeless_order * before) break;
  }
  second_chance(hamiltonian, request, all, promising, forecast);
  std::erase_if(all, [](const Option& option) { return option.models.empty(); });
}

}  // namespace farrier::passes
