// choose_formula
//
// Does: certifies every allowed product formula over every layering that was offered, finds the
// number of steps that the budget asks for, builds each circuit, and keeps the one that the
// objective likes best. Where all terms of H are in one layer, one exact step beats them all. Does
// not invent layerings or orders.
//
//   {pair blocks, commuting sets} x {lie, strang, suzuki-4, ...}   becomes   strang, 37 steps
//
// Promises: the error of the chosen plan is at most the certificate's bound.
// Stands last among the plan passes.
// Source: the bounds' sources are named in compiler/bounds/models.hpp.
#include <algorithm>
#include <array>
#include <cmath>
#include <cstdint>
#include <farrier/diagnostic.hpp>
#include <farrier/formula.hpp>
#include <optional>
#include <string>
#include <tuple>
#include <utility>
#include <vector>

#include "compiler/base/numbers.hpp"
#include "compiler/bounds/models.hpp"
#include "passes/options.hpp"
#include "passes/run.hpp"
#include "passes/table.hpp"

namespace farrier::passes {
namespace {

/// Circuits that an estimate puts this far above the best one are not built.
constexpr double hopeless = 2.0;

struct Built {
  Part part;
  Candidate candidate;
};

bool within_limits(const CircuitCounts& counts, const Budget& budget) {
  return counts.two_qubit_gates <= budget.max_two_qubit_gates.value_or(~std::uint64_t{0}) &&
         counts.two_qubit_depth <= budget.max_depth.value_or(~std::uint64_t{0});
}

/// Adds up contributions of one name; the first names the method.
std::vector<Contribution> joined(std::vector<Contribution> contributions) {
  std::vector<Contribution> result;
  for (Contribution& contribution : contributions) {
    const auto same = std::ranges::find(result, contribution.name, &Contribution::name);
    if (same == result.end())
      result.push_back(std::move(contribution));
    else
      same->value += contribution.value;
  }
  return result;
}

Certificate certificate(const Option& option, const Request& request, std::uint64_t steps,
                        double rounding) {
  Certificate result;
  result.assurance = request.budget.assurance;
  result.up_to_phase = request.budget.up_to_phase;
  if (request.time != 0.0) {
    const bounds::ErrorModel& model = bounds::tightest(option.models, request.time, steps);
    result.contributions = model.contributions(request.time, steps);
  }
  result.contributions.push_back({"rounding", rounding, "counted operations", true});
  result.contributions = joined(std::move(result.contributions));
  std::ranges::stable_sort(result.contributions, std::ranges::greater{}, &Contribution::value);
  for (const Contribution& contribution : result.contributions)
    if (contribution.counts) result.bound += contribution.value;
  // The unitaries are at most 2 apart, and the sum was rounded.
  result.bound = std::min(result.bound * (1.0 + 1e-14), 2.0);
  if (result.bound == 2.0)
    result.contributions = {
        {"distance of two unitaries", 2.0, "at most 2 whatever the formula", true}};
  return result;
}

/// What one step between its neighbours costs: two steps' circuits apart.
void count_one_step(const Hamiltonian& hamiltonian, const Request& request, Plan plan,
                    Candidate& candidate) {
  std::vector<PassEntry> unlogged;
  const double tau = plan.time / static_cast<double>(plan.parts.front().steps);
  std::array<CircuitCounts, 2> counts;
  for (std::uint64_t k = 0; k < 2; ++k) {
    plan.parts.front().steps = k + 3;
    plan.time = tau * static_cast<double>(k + 3);
    counts[k] = count(run_circuit_passes(hamiltonian, request, plan, unlogged));
  }
  candidate.step_two_qubit_gates = counts[1].two_qubit_gates - counts[0].two_qubit_gates;
  candidate.step_two_qubit_depth = counts[1].two_qubit_depth - counts[0].two_qubit_depth;
}

/// The most steps whose circuit stays within the limits, by bisection up to a first estimate; 1
/// where none does.
std::uint64_t most_within_limits(const Hamiltonian& hamiltonian, const Request& request, Plan plan,
                                 std::uint64_t most) {
  const auto fits = [&](std::uint64_t steps) {
    plan.parts.front().steps = steps;
    std::vector<PassEntry> unlogged;
    return within_limits(count(run_circuit_passes(hamiltonian, request, plan, unlogged)),
                         request.budget);
  };
  std::uint64_t low = 1;
  std::uint64_t high = most + 2;
  while (high - low > 1) {
    const std::uint64_t middle = low + (high - low) / 2;
    (fits(middle) ? low : high) = middle;
  }
  return low;
}

/// Builds the circuit of an option. Rounding of the gates is part of the certificate and known only
/// afterwards; where it breaks the tolerance, steps are sought again with it set aside.
std::optional<Built> build(const Hamiltonian& hamiltonian, const Request& request,
                           const Option& option, bool tree, std::string& refusal) {
  double reserve = 0.0;
  for (int attempt = 0; attempt < 4; ++attempt) {
    std::uint64_t steps = wanted_steps(option, request, reserve);
    if (steps == 0) {
      refusal = "reaches the tolerance";
      return std::nullopt;
    }
    Built built;
    Part& part = built.part;
    part.formula = option.formula != nullptr ? std::string(option.formula->name) : "exact";
    part.order = option.formula != nullptr ? option.formula->order : 0;
    part.stages =
        option.formula != nullptr ? static_cast<std::uint32_t>(option.formula->stages()) : 1;
    part.step = option.step;
    part.tree_ladders = tree;
    part.layerings = {*option.layering};
    for (std::uint32_t q = 0; q < hamiltonian.qubits; ++q) part.qubits.push_back(q);
    Plan plan;
    plan.time = request.time;
    plan.parts = {part};
    if (!request.budget.tolerance && !request.restriction.steps && option.formula != nullptr)
      steps = most_within_limits(hamiltonian, request, plan, steps);
    plan.parts.front().steps = part.steps = steps;
    std::vector<PassEntry> unlogged;
    const Circuit circuit = run_circuit_passes(hamiltonian, request, plan, unlogged);
    built.candidate.counts = count(circuit);
    part.certificate = certificate(option, request, steps, circuit.rounding);
    if (request.budget.tolerance && !request.restriction.steps && option.formula != nullptr &&
        part.certificate.bound > *request.budget.tolerance) {
      reserve = 1.01 * circuit.rounding + reserve;
      continue;
    }
    Candidate& candidate = built.candidate;
    candidate.formula = part.formula;
    candidate.order = part.order;
    candidate.stages = part.stages;
    candidate.steps = steps;
    candidate.layering = option.layering->name;
    candidate.term_order = option.layering->order;
    candidate.ladders = tree ? "tree" : "line";
    candidate.certificate = part.certificate;
    if (request.time != 0.0) count_one_step(hamiltonian, request, plan, candidate);
    return built;
  }
  refusal = "reaches the tolerance, for the rounding of angles alone";
  return std::nullopt;
}

bool has_strings(const Layering& layering) {
  for (const Layer& layer : layering.layers)
    for (const Block& block : layer.blocks)
      if (block.kind == BlockKind::string) return true;
  return false;
}

/// Smaller is better; later entries break ties.
auto rank_key(const Candidate& candidate, Objective objective) {
  const CircuitCounts& counts = candidate.counts;
  double first = static_cast<double>(counts.two_qubit_gates);
  if (objective == Objective::depth) first = static_cast<double>(counts.two_qubit_depth);
  if (objective == Objective::rotations) first = static_cast<double>(counts.rotations);
  if (objective == Objective::error) first = candidate.certificate.bound;
  return std::make_tuple(first, counts.two_qubit_gates, counts.two_qubit_depth, counts.gates(),
                         counts.depth, candidate.certificate.bound);
}

std::string why_lost(const Candidate& candidate, const Candidate& winner, const Budget& budget) {
  if (budget.tolerance && candidate.certificate.bound > *budget.tolerance)
    return "over the tolerance";
  if (!within_limits(candidate.counts, budget)) return "over the limit";
  if (budget.minimise == Objective::gates &&
      candidate.counts.two_qubit_gates == winner.counts.two_qubit_gates)
    return "as many two-qubit gates, deeper or longer";
  const auto times = [](std::uint64_t value, std::uint64_t best) {
    return base::shortest(std::round(100.0 * static_cast<double>(value) /
                                     static_cast<double>(std::max<std::uint64_t>(1, best))) /
                          100.0);
  };
  if (budget.minimise == Objective::depth)
    return times(candidate.counts.two_qubit_depth, winner.counts.two_qubit_depth) + " x the depth";
  if (budget.minimise == Objective::rotations)
    return times(candidate.counts.rotations, winner.counts.rotations) + " x the rotations";
  if (budget.minimise == Objective::error) return "larger error";
  return times(candidate.counts.two_qubit_gates, winner.counts.two_qubit_gates) +
         " x the two-qubit gates";
}

std::vector<Yardstick> yardsticks(const Hamiltonian& hamiltonian, const Request& request,
                                  const Part& part) {
  std::vector<Yardstick> result;
  if (part.order == 0 || !request.budget.tolerance || request.time == 0.0) return result;
  const bounds::Question asked =
      question(hamiltonian, request, part.layerings.front(), *find_formula(part.formula));
  const auto add = [&](const bounds::ErrorModel& model) {
    const std::uint64_t steps =
        model.least_steps(request.time, *request.budget.tolerance, bounds::most_steps);
    if (steps != 0) result.push_back({model.name, steps});
  };
  add(bounds::coarse_model(asked));
  if (const auto published = bounds::published_model(asked)) add(*published);
  return result;
}

[[noreturn]] void refuse(const Request& request, const std::vector<Candidate>& candidates,
                         const std::string& refusal) {
  if (candidates.empty()) {
    const bool only_exact = request.restriction.formulas == std::vector<std::string>{"exact"};
    throw UserError(
        ExitCode::refused,
        only_exact ? "no exact structure was found; allow a product formula"
        : refusal.empty()
            ? "no product formula satisfies the restriction; allow another formula or order"
            : "no product formula " + refusal +
                  "; allow a larger tolerance, a shorter time or another formula");
  }
  const Candidate& best = candidates.front();
  std::string message;
  if (request.budget.tolerance && best.certificate.bound > *request.budget.tolerance)
    message = "the tolerance " + base::shortest(*request.budget.tolerance) +
              " is not met: the least certified error is " +
              base::rounded_up(best.certificate.bound) + " (" + best.formula + ", " +
              std::to_string(best.steps) + " steps)";
  else
    message = "the limit is not met: the best circuit has " +
              std::to_string(best.counts.two_qubit_gates) + " two-qubit gates, two-qubit depth " +
              std::to_string(best.counts.two_qubit_depth) + " (" + best.formula + ", " +
              std::to_string(best.steps) + " steps)";
  throw UserError(ExitCode::refused, message + "; allow more, or a larger error");
}

std::vector<std::string> describe(const Plan& plan) {
  const Part& part = plan.parts.front();
  std::vector<std::string> notes;
  const Candidate& winner = plan.candidates.front();
  notes.push_back("chosen: " + part.formula + " over " + winner.layering + " (" +
                  winner.term_order + "), " + std::to_string(part.steps) +
                  " steps, certified error " + base::rounded_up(part.certificate.bound));
  for (std::size_t k = 1; k < std::min<std::size_t>(plan.candidates.size(), 6); ++k) {
    const Candidate& other = plan.candidates[k];
    notes.push_back("refused: " + other.formula + " over " + other.layering + " (" +
                    other.term_order + "), " + std::to_string(other.steps) +
                    " steps: " + other.verdict);
  }
  for (const Yardstick& yardstick : plan.yardsticks)
    notes.push_back("the " + yardstick.name + " would have asked for " +
                    std::to_string(yardstick.steps) + " steps");
  return notes;
}

}  // namespace

void choose_formula(const Hamiltonian& hamiltonian, const Request& given, Plan& plan,
                    Notes& notes) {
  // Limits without a tolerance ask for the least error within them.
  Request request = given;
  if (!request.budget.tolerance && (request.budget.max_two_qubit_gates || request.budget.max_depth))
    request.budget.minimise = Objective::error;
  Part& part = plan.parts.front();
  const std::vector<Layering> layerings = std::move(part.layerings);
  std::vector<Option> all = options(hamiltonian, request, layerings);
  certify(hamiltonian, request, all);
  // Cheapest estimates first, so that hopeless circuits need not be built.
  const auto cost_of = [&](const Option& option) { return estimate(option, request); };
  std::ranges::stable_sort(all, {}, cost_of);

  std::vector<Built> built;
  std::string refusal;
  double best_estimate = -1.0;
  std::size_t unbuilt = 0;
  for (const Option& option : all) {
    const double cost = cost_of(option);
    if (request.budget.minimise == Objective::gates && best_estimate >= 0.0 &&
        cost > hopeless * best_estimate && !request.restriction.steps) {
      ++unbuilt;
      continue;
    }
    for (const bool tree : {false, true}) {
      if (tree && !has_strings(*option.layering)) continue;
      auto one = build(hamiltonian, request, option, tree, refusal);
      if (!one) continue;
      if (best_estimate < 0.0) best_estimate = cost;
      built.push_back(std::move(*one));
    }
  }
  const auto meets = [&](const Candidate& candidate) {
    return (!request.budget.tolerance ||
            candidate.certificate.bound <= *request.budget.tolerance) &&
           within_limits(candidate.counts, request.budget);
  };
  std::ranges::stable_sort(built, {}, [&](const Built& one) {
    return std::make_pair(!meets(one.candidate), rank_key(one.candidate, request.budget.minimise));
  });
  for (const Built& one : built) plan.candidates.push_back(one.candidate);
  if (built.empty() || !meets(plan.candidates.front())) refuse(request, plan.candidates, refusal);

  for (std::size_t k = 1; k < plan.candidates.size(); ++k)
    plan.candidates[k].verdict =
        why_lost(plan.candidates[k], plan.candidates.front(), request.budget);
  plan.candidates.front().verdict = "chosen";
  part = std::move(built.front().part);
  plan.certificate = part.certificate;
  plan.yardsticks = yardsticks(hamiltonian, request, part);
  for (std::string& note : describe(plan)) notes.push_back(std::move(note));
  if (unbuilt > 0)
    notes.push_back(std::to_string(unbuilt) + " combinations not built: estimated at over " +
                    base::shortest(hopeless) + " x the two-qubit gates of the best");
}

}  // namespace farrier::passes
