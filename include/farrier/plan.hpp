// The plan: what will be simulated, with no gate in it.
#pragma once

#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/job.hpp>
#include <optional>
#include <string>
#include <vector>

namespace farrier {

/// Terms of H that are exponentiated together, exactly.
enum class BlockKind {
  one_qubit,  ///< all its terms act on qubit a
  pair,       ///< all its terms act on qubits a < b; they need not commute
  string,     ///< one Pauli string of any weight
};

struct Block {
  BlockKind kind = BlockKind::string;
  std::uint32_t a = 0;
  std::uint32_t b = 0;
  std::vector<std::uint32_t> terms;  ///< indices into Hamiltonian::sum
};

/// Blocks that commute with each other, so that the exponential of their sum is their product.
struct Layer {
  std::vector<Block> blocks;  ///< in an order that is good to schedule
};

/// H split into layers; every term of H stands in exactly one block of one layer.
struct Layering {
  std::string name;   ///< how it was made, for log and survey
  std::string order;  ///< how its layers were ordered
  std::vector<Layer> layers;
};

/// One summand of a certificate, or one share of such a summand.
struct Contribution {
  std::string name;
  double value = 0.0;
  std::string method;  ///< how its norm was bounded
  bool counts = true;  ///< false: a share of another contribution, shown for information
};

/// An upper bound on the error of the whole evolution. The contributions that count add up to it.
struct Certificate {
  Assurance assurance = Assurance::certified;
  bool up_to_phase = false;
  double bound = 0.0;
  std::vector<Contribution> contributions;
};

/// Steps that another account of the error would have asked for.
struct Yardstick {
  std::string name;
  std::uint64_t steps = 0;
};

/// One way that was weighed: a row of the survey.
struct Candidate {
  std::string formula;
  int order = 0;  ///< 0: exact
  std::uint32_t stages = 0;
  std::uint64_t steps = 0;
  std::string layering;
  std::string term_order;  ///< order of the layers
  std::string ladders;     ///< "line" or "tree": how heavy strings are synthesised
  Certificate certificate;
  CircuitCounts counts;                    ///< of the finished circuit; zero where it was not built
  std::uint64_t step_two_qubit_gates = 0;  ///< of one step between its neighbours
  std::uint64_t step_two_qubit_depth = 0;
  std::string verdict;  ///< "chosen", or why it lost
};

/// A product of exponentials of layers: exp(-i fraction_k tau H_layer_k), in time order.
struct Exponential {
  std::uint32_t layer = 0;
  double fraction = 0.0;
};

/// A part of H that is simulated on its own.
struct Part {
  std::vector<std::uint32_t> qubits;
  std::vector<Layering> layerings;  ///< candidates; after choose_formula just the chosen one
  std::string formula;              ///< name in the formula table, or "exact"
  int order = 0;
  std::uint32_t stages = 0;
  std::uint64_t steps = 1;
  std::vector<Exponential> step;  ///< one step, first exponential acting first
  bool tree_ladders = false;      ///< heavy strings by balanced trees instead of lines
  Certificate certificate;
};

struct Plan {
  double time = 0.0;
  std::vector<Part> parts;
  Certificate certificate;  ///< of the whole evolution
  std::vector<Yardstick> yardsticks;
  std::vector<Candidate> candidates;  ///< all that were weighed, best first
};

}  // namespace farrier
