// The library's entry points: a reader's job goes in; plan, circuit, certificate, log and text come
// out. No terminal, no environment, no files.
#include <algorithm>
#include <cmath>
#include <farrier/compile.hpp>
#include <farrier/version.hpp>
#include <map>
#include <numeric>
#include <string>
#include <utility>

#include "compiler/back/openqasm.hpp"
#include "compiler/back/summary.hpp"
#include "compiler/base/eigen.hpp"
#include "compiler/base/fnv.hpp"
#include "compiler/base/numbers.hpp"
#include "passes/run.hpp"

namespace farrier {
namespace {

constexpr double default_tolerance = 1e-3;

/// Fills in what depends on several settings at once, and refuses what contradicts itself.
Job resolved(Job job) {
  Budget& budget = job.budget;
  const bool limited = budget.max_two_qubit_gates || budget.max_depth;
  if (budget.minimise == Objective::duration)
    throw UserError(ExitCode::usage,
                    "the objective duration needs a device; give one, or minimise "
                    "gates, depth, rotations or error");
  if (budget.minimise == Objective::error && !limited && !budget.tolerance &&
      !job.restriction.steps)
    throw UserError(ExitCode::usage,
                    "the objective error needs a device, a number of steps or a "
                    "limit on two-qubit gates or depth; without one, more steps "
                    "are always better");
  if (!budget.tolerance && !job.restriction.steps && !limited) budget.tolerance = default_tolerance;
  if (job.times.empty())
    throw UserError(ExitCode::usage,
                    "no time is given; expected --time T or <evolution time=\"T\"/>");
  return job;
}

/// The digest of everything that determines the circuit.
std::string inputs_digest(const Job& job, const std::string& hamiltonian_digest, double time) {
  base::Fnv1a hash;
  const auto optional_word = [&](const std::optional<std::uint64_t>& value) {
    hash.word(value ? 1 : 0);
    hash.word(value.value_or(0));
  };
  hash.field(version);
  hash.field(hamiltonian_digest);
  hash.number(time);
  hash.field(job.time_unit);
  hash.word(job.budget.tolerance ? 1 : 0);
  hash.number(job.budget.tolerance.value_or(0.0));
  hash.word(static_cast<std::uint64_t>(job.budget.assurance));
  hash.word(job.budget.up_to_phase ? 1 : 0);
  hash.word(static_cast<std::uint64_t>(job.budget.minimise));
  optional_word(job.budget.max_two_qubit_gates);
  optional_word(job.budget.max_depth);
  hash.word(job.restriction.formulas.size());
  for (const std::string& name : job.restriction.formulas) hash.field(name);
  hash.word(job.restriction.orders.size());
  for (const int order : job.restriction.orders) hash.word(static_cast<std::uint64_t>(order));
  optional_word(job.restriction.steps);
  hash.word(static_cast<std::uint64_t>(job.output.style));
  hash.word(static_cast<std::uint64_t>(job.output.native));
  hash.word(job.output.relabel ? 1U + (*job.output.relabel ? 1U : 0U) : 0U);
  hash.word(static_cast<std::uint64_t>(job.output.barriers));
  hash.word(static_cast<std::uint64_t>(job.search.effort));
  hash.word(job.search.seed);
  hash.word(job.prepares ? 1 : 0);
  for (const Prepared& prepared : job.preparation) {
    hash.word(prepared.qubit);
    hash.word(static_cast<std::uint64_t>(prepared.state));
  }
  hash.word(job.measurement ? 1 : 0);
  if (job.measurement) {
    hash.word(static_cast<std::uint64_t>(job.measurement->basis));
    for (const std::uint32_t qubit : job.measurement->qubits) hash.word(qubit);
  }
  return hash.hex();
}

std::string_view native_word(Native native) {
  static constexpr std::string_view words[] = {"cx", "cz", "ecr", "iswap", "rzz", "rxx"};
  return words[static_cast<std::size_t>(native)];
}

std::string write_text(const Job& job, const std::string& hamiltonian_digest, const Point& point) {
  const back::Headline headline = back::headline(point.plan);
  back::OpenqasmInput input{
      .circuit = point.circuit,
      .counts = point.counts,
      .version = version,
      .job = job.name,
      .hamiltonian = hamiltonian_digest,
      .command = job.command,
      .inputs = point.inputs,
      .time = back::time_text(point.plan.time, job.time_unit),
      .formula = headline.formula,
      .steps = headline.steps,
      .assurance = std::string(back::assurance_word(point.plan.certificate.assurance)),
      .certified_error = back::bound_text(point.plan.certificate.bound, job.budget.tolerance),
      .tolerance = back::tolerance_text(job.budget.tolerance),
      .native = std::string(native_word(job.output.native)),
      .prepares = job.prepares,
      .preparation = job.preparation,
      .measurement = job.measurement,
      .style = point.style == "looped" ? Style::looped : Style::flat,
      .barriers = job.output.barriers,
  };
  return back::write_openqasm(input);
}

Result run(const Job& given, bool with_text) {
  base::fix_eigen_blocking();
  const Job job = resolved(given);
  Result result;
  result.job = job.name;
  result.hamiltonian = job.hamiltonian;
  std::vector<PassEntry> shared_log;
  passes::run_hamiltonian_passes(result.hamiltonian, shared_log);
  result.digest = digest(result.hamiltonian);
  result.commuting_groups =
      passes::offer_layerings(result.hamiltonian).parts.front().layerings.front().layers.size();
  for (std::size_t k = 0; k < job.times.size(); ++k) {
    Point point;
    point.index = k;
    point.log = shared_log;
    point.inputs = inputs_digest(job, result.digest, job.times[k]);
    const passes::Request request{job.times[k], job.budget, job.restriction, job.output.native,
                                  job.search};
    point.plan = passes::run_plan_passes(result.hamiltonian, request, point.log);
    if (with_text) {
      point.circuit =
          passes::run_circuit_passes(result.hamiltonian, request, point.plan, point.log);
      point.counts = count(point.circuit);
      const Style style = back::chosen_style(job.output.style, point.circuit, point.counts);
      point.style = style == Style::looped ? "looped" : "flat";
      point.text = write_text(job, result.digest, point);
    }
    result.points.push_back(std::move(point));
  }
  result.settings = job;
  result.settings.hamiltonian = {};
  return result;
}

/// The qubits of each connected component of the interaction graph, those without a term left out.
std::vector<std::vector<std::uint32_t>> components(const Hamiltonian& hamiltonian) {
  std::vector<std::uint32_t> parent(hamiltonian.qubits);
  std::iota(parent.begin(), parent.end(), 0U);
  const auto root = [&](std::uint32_t q) {
    while (parent[q] != q) q = parent[q] = parent[parent[q]];
    return q;
  };
  std::vector<bool> used(hamiltonian.qubits, false);
  for (std::size_t k = 0; k < hamiltonian.sum.size(); ++k) {
    const auto factors = hamiltonian.sum.factors(k);
    for (const Factor factor : factors) {
      used[factor.qubit()] = true;
      const std::uint32_t a = root(factors.front().qubit());
      const std::uint32_t b = root(factor.qubit());
      parent[std::max(a, b)] = std::min(a, b);
    }
  }
  std::map<std::uint32_t, std::vector<std::uint32_t>> groups;
  for (std::uint32_t q = 0; q < hamiltonian.qubits; ++q)
    if (used[q]) groups[root(q)].push_back(q);
  std::vector<std::vector<std::uint32_t>> result;
  for (auto& [first, qubits] : groups) result.push_back(std::move(qubits));
  return result;
}

std::vector<std::string> exact_structure(const Facts& facts, const Plan& plan) {
  std::vector<std::string> found;
  if (facts.terms == 0) found.emplace_back("a multiple of the identity: the evolution is a phase");
  if (facts.terms > 0 && facts.commuting_groups == 1)
    found.emplace_back("all terms commute: one exact step at any time");
  for (const Layering& layering : plan.parts.front().layerings)
    if (layering.name == "pair blocks" && layering.layers.size() == 1 && facts.commuting_groups > 1)
      found.emplace_back("no qubit interacts with more than one other: one exact block a pair");
  return found;
}

}  // namespace

Result compile(const Job& job) {
  return run(job, true);
}

Result survey(const Job& job) {
  return run(job, false);
}

Facts inspect(const Job& job) {
  Hamiltonian hamiltonian = job.hamiltonian;
  std::vector<PassEntry> log;
  passes::run_hamiltonian_passes(hamiltonian, log);
  Facts facts;
  facts.job = job.name;
  facts.digest = digest(hamiltonian);
  facts.qubits = hamiltonian.qubits;
  facts.terms = hamiltonian.sum.size();
  facts.constant = hamiltonian.sum.constant();
  facts.one_norm = hamiltonian.sum.one_norm();
  facts.terms_by_weight.resize(hamiltonian.sum.max_weight(), 0);
  for (std::size_t k = 0; k < hamiltonian.sum.size(); ++k)
    ++facts.terms_by_weight[hamiltonian.sum.factors(k).size() - 1];
  facts.components = components(hamiltonian);

  const Plan plan = passes::offer_layerings(hamiltonian);
  for (const Layering& layering : plan.parts.front().layerings) {
    std::uint64_t pairs = 0;
    for (const Layer& layer : layering.layers)
      for (const Block& block : layer.blocks) pairs += block.kind == BlockKind::pair ? 1 : 0;
    if (layering.name == "pair blocks") {
      facts.pair_layers = layering.layers.size();
      facts.interacting_pairs = pairs;
    } else {
      facts.commuting_groups = layering.layers.size();
      facts.interacting_pairs = pairs;
    }
  }
  facts.structure = exact_structure(facts, plan);
  return facts;
}

}  // namespace farrier
