// A made-up result and facts with every field filled, for the tests of the writers.
#pragma once

#include <cstddef>
#include <farrier/compile.hpp>
#include <sstream>
#include <string>
#include <vector>

namespace sample {

inline std::vector<std::string> lines(const std::string& text) {
  std::vector<std::string> result;
  std::istringstream in(text);
  for (std::string line; std::getline(in, line);) result.push_back(line);
  return result;
}

inline farrier::Hamiltonian hamiltonian() {
  using farrier::Factor;
  using farrier::Pauli;
  farrier::Hamiltonian h;
  h.qubits = 3;
  h.sum.add(std::vector<Factor>{{0, Pauli::x}, {1, Pauli::x}}, 0.5);
  h.sum.add(std::vector<Factor>{{1, Pauli::z}, {2, Pauli::z}}, -0.25);
  h.sum.add(std::vector<Factor>{{2, Pauli::z}}, 1.0);
  h.sum.merge();
  return h;
}

inline farrier::CircuitCounts counts() {
  farrier::CircuitCounts c;
  c.one_qubit_gates = 20;
  c.two_qubit_gates = 16;
  c.rotations = 12;
  c.t_rotations = 11;
  c.depth = 30;
  c.two_qubit_depth = 14;
  c.by_name = {{"h", 8}, {"rz", 12}, {"cx", 16}};
  return c;
}

inline farrier::Candidate candidate(const std::string& formula, int order,
                                    const std::string& verdict) {
  farrier::Candidate c;
  c.formula = formula;
  c.order = order;
  c.stages = 1;
  c.steps = 4;
  c.layering = "pairs";
  c.term_order = "as given";
  c.ladders = "line";
  c.certificate.bound = 9.87654321e-4;
  c.step_two_qubit_gates = 4;
  c.step_two_qubit_depth = 3;
  c.verdict = verdict;
  if (verdict == "chosen") c.counts = counts();
  return c;
}

inline farrier::Part part(const std::string& formula, int order, std::uint64_t steps,
                          const std::vector<std::uint32_t>& qubits) {
  farrier::Part p;
  p.qubits = qubits;
  p.formula = formula;
  p.order = order;
  p.steps = steps;
  p.stages = order == 0 ? 0 : 1;
  farrier::Layer layer;
  layer.blocks.push_back({farrier::BlockKind::pair, qubits.front(), qubits.back(), {0, 1}});
  farrier::Layering layering;
  layering.name = order == 0 ? "commuting" : "pairs";
  layering.layers = {layer, layer};
  p.layerings = {layering};
  p.certificate.bound = order == 0 ? 0.0 : 9.87654321e-4;
  return p;
}

/// A certificate whose four contributions that count add up to 9.87654321e-4.
inline farrier::Certificate certificate() {
  farrier::Certificate c;
  c.contributions = {
      {"leading", 7e-4, "windows of 8 qubits", true},
      {"bulk", 6e-4, "shift-invariant", false},
      {"edges", 1e-4, "", false},
      {"next order", 2e-4, "1-norm", true},
      {"remainder", 8.7e-5, "anticommuting sets", true},
      {"rounding", 6.54321e-7, "", true},
  };
  for (const farrier::Contribution& one : c.contributions) {
    if (one.counts) c.bound += one.value;
  }
  return c;
}

inline farrier::Result result() {
  farrier::Result r;
  r.job = "ladder-quench";
  r.digest = "0123456789abcdef";
  r.hamiltonian = hamiltonian();
  r.commuting_groups = 2;
  r.settings.time_unit = "us";
  r.settings.budget.tolerance = 1e-3;
  farrier::Point p;
  p.index = 1;
  p.plan.time = -2.0;
  p.plan.parts = {part("strang", 2, 4, {0, 1, 2})};
  p.plan.certificate = certificate();
  p.plan.yardsticks = {{"published commutator bound", 12}};
  p.plan.candidates = {candidate("strang", 2, "chosen"), candidate("lie", 1, "more gates")};
  p.circuit.qubits = 3;
  p.circuit.layout_in = {0, 1, 2};
  p.circuit.layout_out = {1, 0, 2};
  p.counts = counts();
  p.style = "flat";
  p.inputs = "fedcba9876543210";
  farrier::CountsChange change{counts(), counts()};
  change.before.two_qubit_gates = 18;
  p.log = {{"merge_terms", "adds up equal terms", {"3 terms, none of them twice"}, {}, 0.00012},
           {"cancel_gates", "removes gates that undo each other", {}, change, 1.5}};
  r.points = {p};
  return r;
}

inline farrier::Facts facts() {
  farrier::Facts f;
  f.job = "ladder-quench";
  f.digest = "0123456789abcdef";
  f.qubits = 6;
  f.terms = 7;
  f.constant = -0.5;
  f.one_norm = 1.75;
  f.terms_by_weight = {3, 4};
  f.commuting_groups = 2;
  f.interacting_pairs = 4;
  f.pair_layers = 2;
  f.components = {{0, 1, 2, 3}, {5}};
  return f;
}

}  // namespace sample
