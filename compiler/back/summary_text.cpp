// The summary, the survey and the facts as text for people.
#include <algorithm>
#include <cmath>

#include "compiler/back/summary.hpp"
#include "compiler/back/text.hpp"
#include "compiler/base/numbers.hpp"

namespace farrier::back {
namespace {

// So that a point takes about twenty lines at most, whatever the plan.
constexpr std::size_t most_parts = 3;
constexpr std::size_t most_contributions = 5;
constexpr std::size_t most_yardsticks = 3;
constexpr std::size_t most_components = 6;

std::string counted(std::uint64_t count, const std::string& thing) {
  return std::to_string(count) + " " + thing + (count == 1 ? "" : "s");
}

std::string formula_words(const std::string& formula, int order) {
  return order == 0 ? formula : formula + " of order " + std::to_string(order);
}

void append_parts(std::string& out, const Plan& plan) {
  if (plan.parts.size() < 2) return;
  const std::size_t shown = std::min(plan.parts.size(), most_parts);
  for (std::size_t k = 0; k < shown; ++k) {
    const Part& part = plan.parts[k];
    append_item(out, k == 0 ? "parts" : "",
                formula_words(part.formula, part.order) + ", " + counted(part.steps, "step") +
                    ", error " + base::rounded_up(part.certificate.bound) + " on " +
                    counted(part.qubits.size(), "qubit"));
  }
  const std::size_t rest = plan.parts.size() - shown;
  if (rest > 0) append_item(out, "", "and " + counted(rest, "part") + " more");
}

void append_contributions(std::string& out, const Certificate& certificate) {
  std::vector<const Contribution*> summands;
  for (const Contribution& contribution : certificate.contributions) {
    if (contribution.counts) summands.push_back(&contribution);
  }
  if (summands.size() < 2) return;
  const std::size_t shown =
      summands.size() > most_contributions ? most_contributions - 1 : summands.size();
  for (std::size_t k = 0; k < shown; ++k) {
    const Contribution& one = *summands[k];
    const std::string method = one.method.empty() ? "" : " (" + one.method + ")";
    append_item(out, "", base::rounded_up(one.value) + " " + one.name + method);
  }
  double rest = 0.0;
  for (std::size_t k = shown; k < summands.size(); ++k) rest += summands[k]->value;
  if (shown < summands.size()) {
    append_item(
        out, "",
        base::rounded_up(rest) + " in " + std::to_string(summands.size() - shown) + " more");
  }
}

void append_yardsticks(std::string& out, const Plan& plan) {
  const std::size_t shown = std::min(plan.yardsticks.size(), most_yardsticks);
  for (std::size_t k = 0; k < shown; ++k) {
    append_item(out, k == 0 ? "yardsticks" : "",
                counted(plan.yardsticks[k].steps, "step") + " by the " + plan.yardsticks[k].name);
  }
}

std::string two_qubit_words(const Point& point) {
  std::string words = std::to_string(point.counts.two_qubit_gates);
  if (const Candidate* chosen = chosen_candidate(point.plan)) {
    words += ", " + std::to_string(chosen->step_two_qubit_gates) + " a step";
  }
  return words + "; depth " + std::to_string(point.counts.two_qubit_depth);
}

void append_point(std::string& out, const Result& result, const Point& point,
                  const std::string& file) {
  const std::optional<double>& tolerance = result.settings.budget.tolerance;
  const Headline words = headline(point.plan);
  const Certificate& certificate = point.plan.certificate;
  const CircuitCounts& counts = point.counts;
  append_item(out, "time",
              time_text(point.plan.time, result.settings.time_unit) + " (times the 1-norm of H: " +
                  six_digits(result.hamiltonian.sum.one_norm() * std::abs(point.plan.time)) +
                  " rad)");
  append_item(out, "plan",
              formula_words(words.formula, words.order) + ", " + counted(words.steps, "step") +
                  ", " + counted(words.layers, "layer"));
  append_parts(out, point.plan);
  append_item(out, "error",
              bound_text(certificate.bound, tolerance) + " at most, " +
                  std::string(assurance_word(certificate.assurance)) + " in " +
                  metric_words(certificate) + "; tolerance " + tolerance_text(tolerance));
  append_contributions(out, certificate);
  append_yardsticks(out, point.plan);
  append_item(out, "two-qubit", two_qubit_words(point));
  append_item(out, "gates",
              std::to_string(counts.gates()) + "; depth " + std::to_string(counts.depth));
  append_item(out, "rotations",
              std::to_string(counts.rotations) + ", " + std::to_string(counts.t_rotations) +
                  " of them by no multiple of pi/4");
  append_item(out, "circuit", point.style + (file.empty() ? "" : ", " + one_line(file)));
}

std::string heading(const std::string& job, std::uint64_t qubits, std::uint64_t terms,
                    std::uint64_t weight) {
  std::string line;
  append_wrapped(line, "",
                 one_line(job) + ": " + counted(qubits, "qubit") + ", " + counted(terms, "term") +
                     " of weight up to " + std::to_string(weight));
  return line;
}

std::string heading(const Result& result) {
  const Hamiltonian& hamiltonian = result.hamiltonian;
  return heading(result.job, hamiltonian.qubits, hamiltonian.sum.size(),
                 hamiltonian.sum.max_weight());
}

std::vector<Column> survey_columns(Assurance assurance) {
  const std::string error = std::string(assurance_word(assurance)) + "\nerror";
  return {{"rank", true},
          {"formula"},
          {"layering"},
          {"layer order"},
          {"steps", true},
          {error, true},
          {"two-qubit\ngates", true},
          {"gates", true},
          {"depth", true},
          {"two-qubit\ndepth", true},
          {"rotations", true},
          {"verdict"}};
}

std::vector<std::string> survey_row(const Candidate& candidate, std::size_t rank,
                                    const std::optional<double>& tolerance) {
  const CircuitCounts& counts = candidate.counts;
  const bool built = was_built(candidate);
  const auto shown = [built](std::uint64_t count) { return built ? std::to_string(count) : "-"; };
  return {std::to_string(rank),
          one_line(candidate.formula),
          one_line(candidate.layering),
          one_line(candidate.term_order),
          std::to_string(candidate.steps),
          bound_text(candidate.certificate.bound, tolerance),
          shown(counts.two_qubit_gates),
          shown(counts.gates()),
          shown(counts.depth),
          shown(counts.two_qubit_depth),
          shown(counts.rotations),
          one_line(candidate.verdict)};
}

std::string weight_words(const Facts& facts) {
  std::string words;
  for (std::size_t k = 0; k < facts.terms_by_weight.size(); ++k) {
    if (facts.terms_by_weight[k] == 0) continue;
    if (!words.empty()) words += ", ";
    words += std::to_string(facts.terms_by_weight[k]) + " of weight " + std::to_string(k + 1);
  }
  return words.empty() ? "none" : words;
}

std::string pair_words(const Facts& facts) {
  std::string words = std::to_string(facts.interacting_pairs) + " of qubits that share a term";
  if (facts.pair_layers > 0) words += ", in " + counted(facts.pair_layers, "layer");
  return words;
}

void append_components(std::string& out, const Facts& facts) {
  const std::size_t shown = std::min(facts.components.size(), most_components);
  for (std::size_t k = 0; k < shown; ++k) {
    append_item(out, k == 0 ? "parts" : "", "qubits " + ranges(facts.components[k]));
  }
  const std::size_t rest = facts.components.size() - shown;
  if (rest > 0) append_item(out, "", "and " + counted(rest, "part") + " more");
}

}  // namespace

std::string summary_text(const Result& result, const std::vector<std::string>& files) {
  std::string out = heading(result);
  for (std::size_t k = 0; k < result.points.size(); ++k) {
    if (k > 0) out += '\n';
    append_point(out, result, result.points[k], k < files.size() ? files[k] : "");
  }
  return out;
}

std::string survey_text(const Result& result) {
  std::string out = heading(result);
  const Budget& budget = result.settings.budget;
  for (const Point& point : result.points) {
    std::vector<std::vector<std::string>> rows;
    for (const Candidate& candidate : point.plan.candidates) {
      rows.push_back(survey_row(candidate, rows.size() + 1, budget.tolerance));
    }
    out += "\ntime " + time_text(point.plan.time, result.settings.time_unit) + ", tolerance " +
           tolerance_text(budget.tolerance) + "\n";
    out += table(survey_columns(budget.assurance), rows);
  }
  return out;
}

std::string facts_text(const Facts& facts) {
  std::string out = heading(facts.job, facts.qubits, facts.terms, facts.terms_by_weight.size());
  append_item(out, "digest", facts.digest);
  append_item(out, "constant", base::shortest(facts.constant));
  append_item(out, "1-norm", six_digits(facts.one_norm) + " rad a time unit");
  append_item(out, "terms", weight_words(facts));
  append_item(out, "groups", std::to_string(facts.commuting_groups) + " of commuting terms");
  append_item(out, "pairs", pair_words(facts));
  append_components(out, facts);
  if (facts.structure.empty()) {
    append_item(out, "structure", "none found, which does not mean that there is none");
  }
  for (std::size_t k = 0; k < facts.structure.size(); ++k) {
    append_item(out, k == 0 ? "structure" : "", one_line(facts.structure[k]));
  }
  return out;
}

}  // namespace farrier::back
