// The only runner of passes: times, counts, checks and logs each of them.
//
// Invariants checked after each pass, besides its promises:
//   Hamiltonian  every string on qubits below the number of qubits
//   Plan         every term of H in exactly one block of each layering; blocks well formed
//   Circuit      operands below the number of qubits, two-qubit gates on two qubits, phase reduced
#include "passes/run.hpp"

#include <chrono>
#include <cmath>
#include <farrier/diagnostic.hpp>
#include <numbers>
#include <string>
#include <utility>

#include "passes/table.hpp"

namespace farrier::passes {
namespace {

[[noreturn]] void broken(const Pass& pass, const std::string& invariant) {
  throw InternalFault("pass " + std::string(pass.name) + " broke an invariant: " + invariant);
}

void check(const Pass& pass, const Hamiltonian& hamiltonian) {
  if (hamiltonian.sum.qubit_span() > hamiltonian.qubits)
    broken(pass, "every string acts on qubits of the Hamiltonian");
}

void check(const Pass& pass, const Hamiltonian& hamiltonian, const Plan& plan) {
  for (const Part& part : plan.parts) {
    for (const Layering& layering : part.layerings) {
      std::vector<bool> seen(hamiltonian.sum.size(), false);
      std::size_t count = 0;
      for (const Layer& layer : layering.layers) {
        for (const Block& block : layer.blocks) {
          if (block.kind == BlockKind::pair && block.a >= block.b)
            broken(pass, "a pair block names two qubits in rising order");
          for (const std::uint32_t term : block.terms) {
            if (term >= seen.size() || seen[term]) broken(pass, "a term stands in one block only");
            seen[term] = true;
            ++count;
          }
        }
      }
      if (count != seen.size()) broken(pass, "every term stands in a block");
    }
  }
}

void check(const Pass& pass, const Circuit& circuit) {
  if (!(std::abs(circuit.global_phase) <= std::numbers::pi))
    broken(pass, "the global phase is within (-pi, pi]");
  for (const Segment& segment : circuit.segments) {
    if (segment.repeats == 0) broken(pass, "no segment runs zero times");
    for (const Gate& gate : segment.gates) {
      if (gate.a >= circuit.qubits || gate.b >= circuit.qubits)
        broken(pass, "gates act on qubits of the circuit");
      const bool two = gate.kind == GateKind::canonical || gate.kind >= GateKind::cx;
      if (two != gate.two_qubit()) broken(pass, "a gate has as many operands as its kind");
    }
  }
}

void check_promises(const Pass& pass, const CountsChange& counts) {
  if (pass.promises.never_more_gates &&
      (counts.after.two_qubit_gates > counts.before.two_qubit_gates ||
       counts.after.gates() > counts.before.gates()))
    broken(pass, "it promised never to add a gate");
  if (pass.promises.never_more_depth &&
      (counts.after.two_qubit_depth > counts.before.two_qubit_depth ||
       counts.after.depth > counts.before.depth))
    broken(pass, "it promised never to add depth");
}

/// Runs `body` with its time taken and the entry appended to the log.
template <typename Body>
void logged(const Pass& pass, std::vector<PassEntry>& log, Body&& body) {
  PassEntry entry{std::string(pass.name), std::string(pass.description), {}, {}, 0.0};
  const auto start = std::chrono::steady_clock::now();
  body(entry);
  entry.seconds = std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
  log.push_back(std::move(entry));
}

}  // namespace

void run_hamiltonian_passes(Hamiltonian& hamiltonian, std::vector<PassEntry>& log) {
  for (const Pass& pass : pass_table()) {
    if (const auto* run = std::get_if<HamiltonianPass>(&pass.run)) {
      logged(pass, log, [&](PassEntry& entry) {
        (*run)(hamiltonian, entry.notes);
        check(pass, hamiltonian);
      });
    }
  }
}

Plan run_plan_passes(const Hamiltonian& hamiltonian, const Request& request,
                     std::vector<PassEntry>& log) {
  Plan plan;
  plan.time = request.time;
  plan.parts.emplace_back();
  for (std::uint32_t q = 0; q < hamiltonian.qubits; ++q) plan.parts.back().qubits.push_back(q);
  for (const Pass& pass : pass_table()) {
    if (const auto* run = std::get_if<PlanPass>(&pass.run)) {
      logged(pass, log, [&](PassEntry& entry) {
        (*run)(hamiltonian, request, plan, entry.notes);
        check(pass, hamiltonian, plan);
      });
    }
  }
  return plan;
}

Plan offer_layerings(const Hamiltonian& hamiltonian) {
  Plan plan;
  plan.parts.emplace_back();
  Notes notes;
  group_commuting(hamiltonian, {}, plan, notes);
  pair_blocks(hamiltonian, {}, plan, notes);
  return plan;
}

Circuit run_circuit_passes(const Hamiltonian& hamiltonian, const Request& request, const Plan& plan,
                           std::vector<PassEntry>& log) {
  Circuit circuit;
  for (const Pass& pass : pass_table()) {
    if (const auto* build = std::get_if<BuildPass>(&pass.run)) {
      logged(pass, log, [&](PassEntry& entry) {
        circuit = (*build)(hamiltonian, plan, entry.notes);
        check(pass, circuit);
        entry.counts = CountsChange{{}, count(circuit)};
      });
    } else if (const auto* run = std::get_if<CircuitPass>(&pass.run)) {
      logged(pass, log, [&](PassEntry& entry) {
        CountsChange counts;
        counts.before =
            log.empty() || !log.back().counts ? count(circuit) : log.back().counts->after;
        (*run)(request, circuit, entry.notes);
        check(pass, circuit);
        counts.after = count(circuit);
        check_promises(pass, counts);
        entry.counts = std::move(counts);
      });
    }
  }
  return circuit;
}

}  // namespace farrier::passes
