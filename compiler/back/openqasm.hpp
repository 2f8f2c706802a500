// A lowered circuit as an OpenQASM 3 program.
#pragma once

#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/job.hpp>
#include <optional>
#include <string>
#include <vector>

namespace farrier::back {

/// What the program says. Texts go into the header's comments; control characters in them become
/// spaces.
struct OpenqasmInput {
  const Circuit& circuit;  ///< lowered: no GateKind::turn or canonical in it
  CircuitCounts counts;    ///< of the circuit

  std::string version;      ///< of farrier
  std::string job;          ///< name
  std::string hamiltonian;  ///< digest of the Pauli sum
  std::string command;      ///< canonical command line
  std::string inputs;       ///< digest of everything that determines the circuit
  std::string time;         ///< with its unit
  std::string formula;
  std::uint64_t steps = 1;
  std::string assurance;
  std::string certified_error;  ///< rounded up
  std::string tolerance;        ///< "none" where there is none
  std::string native;           ///< named where the circuit has no two-qubit gate that could be

  bool prepares = false;  ///< a runnable program even where every qubit starts at zero
  std::vector<Prepared> preparation;
  std::optional<Measurement> measurement;

  Style style = Style::flat;  ///< flat or looped
  Barriers barriers = Barriers::none;
};

/// The style that a circuit is written in. Style::automatic is flat up to 100,000 gates, and beyond
/// that looped where some segment repeats.
Style chosen_style(Style asked, const Circuit& circuit, const CircuitCounts& counts);

/// The program. Throws InternalFault where the circuit breaks its invariants: a gate that has no
/// name in OpenQASM 3, an angle outside (-pi, pi], a qubit that does not exist; UserError where
/// flat text would not fit into memory.
std::string write_openqasm(const OpenqasmInput& input);

}  // namespace farrier::back
