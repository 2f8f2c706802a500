// The summary as XML, and the words that it shares with the text.
#include "compiler/back/summary.hpp"

#include <algorithm>
#include <cmath>

#include "compiler/back/text.hpp"
#include "compiler/back/xml.hpp"
#include "compiler/base/numbers.hpp"

namespace farrier::back {
namespace {

std::uint64_t term_count(const Part& part) {
  std::uint64_t count = 0;
  if (part.layerings.empty()) return count;
  for (const Layer& layer : part.layerings.front().layers) {
    for (const Block& block : layer.blocks) count += block.terms.size();
  }
  return count;
}

void add_hamiltonian(pugi::xml_node root, const Result& result) {
  const Hamiltonian& hamiltonian = result.hamiltonian;
  double time = 0.0;
  for (const Point& point : result.points) time = std::max(time, std::abs(point.plan.time));
  pugi::xml_node node = root.append_child("hamiltonian");
  set_count(node, "qubits", hamiltonian.qubits);
  set_count(node, "terms", hamiltonian.sum.size());
  set_count(node, "max-weight", hamiltonian.sum.max_weight());
  set_number(node, "norm1-time", hamiltonian.sum.one_norm() * time);
  if (result.commuting_groups > 0) set_count(node, "groups", result.commuting_groups);
}

void add_parts(pugi::xml_node point, const Plan& plan) {
  if (plan.parts.size() < 2) return;
  for (const Part& part : plan.parts) {
    pugi::xml_node node = point.append_child("part");
    set(node, "qubits", joined(part.qubits));
    set_count(node, "terms", term_count(part));
    set(node, "formula", part.formula);
    set_count(node, "steps", part.steps);
    if (part.formula == "exact" && !part.layerings.empty()) {
      set(node, "reason", part.layerings.front().name);
    }
    set(node, "bound", base::rounded_up(part.certificate.bound));
  }
}

void add_plan(pugi::xml_node point, const Plan& plan, const std::optional<double>& tolerance) {
  const Headline words = headline(plan);
  pugi::xml_node node = point.append_child("plan");
  set(node, "formula", words.formula);
  set_count(node, "order", static_cast<std::uint64_t>(words.order));
  set_count(node, "steps", words.steps);
  set_count(node, "layers", words.layers);
  set_count(node, "stages", words.stages);
  add_parts(point, plan);

  const Certificate& certificate = plan.certificate;
  pugi::xml_node error = point.append_child("error");
  set(error, "assurance", assurance_word(certificate.assurance));
  set(error, "metric", metric_words(certificate));
  set(error, "bound", bound_text(certificate.bound, tolerance));
  if (tolerance) set_number(error, "tolerance", *tolerance);
  add_contributions(point, certificate);
  add_yardsticks(point, plan);
}

void set_counts(pugi::xml_node node, const CircuitCounts& counts) {
  set_count(node, "gates", counts.gates());
  set_count(node, "one-qubit-gates", counts.one_qubit_gates);
  set_count(node, "two-qubit-gates", counts.two_qubit_gates);
  set_count(node, "rotations", counts.rotations);
  set_count(node, "t-rotations", counts.t_rotations);
  set_count(node, "depth", counts.depth);
  set_count(node, "two-qubit-depth", counts.two_qubit_depth);
}

void add_circuit(pugi::xml_node parent, const Point& point, const std::string& file) {
  constexpr std::uint64_t swaps = 0;  // nothing is routed without a device
  pugi::xml_node node = parent.append_child("circuit");
  if (!file.empty()) set(node, "file", file);
  set(node, "style", point.style);
  set_counts(node, point.counts);
  set_count(node, "qubits", point.circuit.qubits);
  set_count(node, "swaps", swaps);
  set(node, "layout-in", joined(point.circuit.layout_in));
  set(node, "layout-out", joined(point.circuit.layout_out));
  if (const Candidate* chosen = chosen_candidate(point.plan)) {
    pugi::xml_node step = parent.append_child("step");
    set_count(step, "two-qubit-gates", chosen->step_two_qubit_gates);
    set_count(step, "two-qubit-depth", chosen->step_two_qubit_depth);
  }
  for (const auto& [name, count] : point.counts.by_name) {
    pugi::xml_node gate = parent.append_child("gate");
    set(gate, "name", name);
    set_count(gate, "count", count);
  }
}

void add_candidate(pugi::xml_node point, const Candidate& candidate, std::size_t rank,
                   const std::optional<double>& tolerance) {
  pugi::xml_node node = point.append_child("candidate");
  set_count(node, "rank", rank);
  set(node, "formula", candidate.formula);
  set_count(node, "order", static_cast<std::uint64_t>(candidate.order));
  set_count(node, "stages", candidate.stages);
  set_count(node, "steps", candidate.steps);
  set(node, "layering", candidate.layering);
  set(node, "layer-order", candidate.term_order);
  if (!candidate.ladders.empty()) set(node, "ladders", candidate.ladders);
  set(node, "bound", bound_text(candidate.certificate.bound, tolerance));
  if (was_built(candidate)) set_counts(node, candidate.counts);
  set_count(node, "step-two-qubit-gates", candidate.step_two_qubit_gates);
  set_count(node, "step-two-qubit-depth", candidate.step_two_qubit_depth);
  set(node, "verdict", candidate.verdict);
}

pugi::xml_node add_summary(pugi::xml_document& document, std::string_view verb,
                           const std::string& job, const std::string& digest) {
  pugi::xml_node root = add_root(document, "summary", verb, job);
  set(root, "digest", digest);
  return root;
}

}  // namespace

Headline headline(const Plan& plan) {
  Headline words{.formula = "exact"};
  bool first = true;
  for (const Part& part : plan.parts) {
    if (first) words.formula = part.formula;
    if (part.formula != words.formula) words.formula = "mixed";
    if (part.order > 0)
      words.order = words.order == 0 ? part.order : std::min(words.order, part.order);
    words.steps = std::max(first ? 0 : words.steps, part.steps);
    words.stages = std::max(words.stages, part.stages);
    const std::uint64_t layers = part.layerings.empty() ? 0 : part.layerings.front().layers.size();
    words.layers = std::max(words.layers, layers);
    first = false;
  }
  return words;
}

std::string_view assurance_word(Assurance assurance) {
  return assurance == Assurance::certified ? "certified" : "average";
}

std::string metric_words(const Certificate& certificate) {
  std::string words = certificate.assurance == Assurance::certified
                          ? "spectral norm"
                          : "root mean square over random states";
  if (certificate.up_to_phase) words += " up to a global phase";
  return words;
}

std::string bound_text(double bound, const std::optional<double>& tolerance) {
  return tolerance ? base::rounded_up_within(bound, *tolerance) : base::rounded_up(bound);
}

std::string tolerance_text(const std::optional<double>& tolerance) {
  return tolerance ? base::shortest(*tolerance) : "none";
}

std::string time_text(double time, const std::string& unit) {
  return unit.empty() ? base::shortest(time) : base::shortest(time) + " " + unit;
}

const Candidate* chosen_candidate(const Plan& plan) {
  const auto chosen =
      std::find_if(plan.candidates.begin(), plan.candidates.end(),
                   [](const Candidate& candidate) { return candidate.verdict == "chosen"; });
  return chosen == plan.candidates.end() ? nullptr : &*chosen;
}

bool was_built(const Candidate& candidate) {
  return candidate.counts.gates() > 0 || candidate.verdict == "chosen";
}

std::string summary_xml(const Result& result, const std::vector<std::string>& files) {
  pugi::xml_document document;
  pugi::xml_node root = add_summary(document, "compile", result.job, result.digest);
  add_hamiltonian(root, result);
  for (std::size_t k = 0; k < result.points.size(); ++k) {
    const Point& point = result.points[k];
    pugi::xml_node node = add_point(root, point.index, point.plan.time);
    add_plan(node, point.plan, result.settings.budget.tolerance);
    add_circuit(node, point, k < files.size() ? files[k] : "");
  }
  return document_text(document);
}

std::string survey_xml(const Result& result) {
  pugi::xml_document document;
  pugi::xml_node root = add_summary(document, "survey", result.job, result.digest);
  add_hamiltonian(root, result);
  for (const Point& point : result.points) {
    pugi::xml_node node = add_point(root, point.index, point.plan.time);
    std::size_t rank = 0;
    for (const Candidate& candidate : point.plan.candidates) {
      add_candidate(node, candidate, ++rank, result.settings.budget.tolerance);
    }
  }
  return document_text(document);
}

std::string facts_xml(const Facts& facts) {
  pugi::xml_document document;
  pugi::xml_node root = add_summary(document, "inspect", facts.job, facts.digest);
  pugi::xml_node node = root.append_child("hamiltonian");
  set_count(node, "qubits", facts.qubits);
  set_count(node, "terms", facts.terms);
  set_count(node, "max-weight", facts.terms_by_weight.size());
  set_number(node, "constant", facts.constant);
  set_number(node, "norm1", facts.one_norm);
  set_count(node, "groups", facts.commuting_groups);
  set_count(node, "interacting-pairs", facts.interacting_pairs);
  if (facts.pair_layers > 0) set_count(node, "pair-layers", facts.pair_layers);
  for (std::size_t k = 0; k < facts.terms_by_weight.size(); ++k) {
    pugi::xml_node weight = root.append_child("weight");
    set_count(weight, "letters", k + 1);
    set_count(weight, "terms", facts.terms_by_weight[k]);
  }
  for (const std::vector<std::uint32_t>& qubits : facts.components) {
    set(root.append_child("component"), "qubits", joined(qubits));
  }
  for (const std::string& sentence : facts.structure) {
    set(root.append_child("structure"), "found", sentence);
  }
  return document_text(document);
}

}  // namespace farrier::back
