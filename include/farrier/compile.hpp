// The library's entry points: a job goes in; plan, circuit, certificate, log and text come out.
#pragma once

#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/job.hpp>
#include <farrier/plan.hpp>
#include <optional>
#include <string>
#include <vector>

namespace farrier {

/// Gate counts around a pass.
struct CountsChange {
  CircuitCounts before;
  CircuitCounts after;
};

/// What one pass saw and did.
struct PassEntry {
  std::string name;
  std::string description;         ///< the line of the pass table
  std::vector<std::string> notes;  ///< what it saw, what it changed; one sentence each
  std::optional<CountsChange> counts;
  double seconds = 0.0;  ///< wall time; shown by --explain only
};

/// One time of the job, compiled.
struct Point {
  std::size_t index = 0;  ///< of the time in the job
  Plan plan;
  Circuit circuit;
  CircuitCounts counts;
  std::string style;   ///< "flat" or "looped"
  std::string inputs;  ///< digest of everything that determines the circuit
  std::string text;    ///< OpenQASM 3; empty for a survey
  std::vector<PassEntry> log;
};

struct Result {
  std::string job;
  std::string digest;  ///< of the Hamiltonian
  Hamiltonian hamiltonian;
  std::uint64_t commuting_groups = 0;  ///< as in Facts; 0 where they were not counted
  Job settings;                        ///< the job that was compiled, its Hamiltonian left empty
  std::vector<Point> points;
};

/// Compiles every time of the job. Throws UserError where the job cannot be met (ExitCode::refused)
/// or contradicts itself (ExitCode::usage), InternalFault where farrier broke its own promise.
Result compile(const Job& job);

/// Weighs the alternatives and writes no circuit text.
Result survey(const Job& job);

/// Facts of a Hamiltonian; needs no time.
struct Facts {
  std::string job;
  std::string digest;
  std::uint32_t qubits = 0;
  std::uint64_t terms = 0;
  double constant = 0.0;
  double one_norm = 0.0;                       ///< radians per time unit
  std::vector<std::uint64_t> terms_by_weight;  ///< index 0: weight 1
  std::uint64_t commuting_groups = 0;
  std::uint64_t interacting_pairs = 0;  ///< pairs of qubits that share a term of weight 2
  std::uint64_t pair_layers = 0;        ///< 0 where a term has weight over 2
  std::vector<std::vector<std::uint32_t>>
      components;                      ///< qubits of each disconnected part with a term
  std::vector<std::string> structure;  ///< exact structure found, a sentence each
};

Facts inspect(const Job& job);

}  // namespace farrier
