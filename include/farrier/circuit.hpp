// A circuit as instructions on qubits with repeat blocks, so that nothing grows with the number of
// Trotter steps until flat text is asked for.
#pragma once

#include <array>
#include <cstdint>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace farrier {

/// What a gate is. The first two exist only until the pass lower_to_native has run; every other
/// kind has a row in gate_table() and a name in the text.
enum class GateKind : std::uint8_t {
  turn,  ///< any one-qubit rotation: w 1 - i (x X + y Y + z Z), parameters (w, x, y, z), unit norm
  canonical,  ///< exp(-i (a X(x)X + b Y(x)Y + c Z(x)Z)), parameters (a, b, c)
  h,
  s,
  sdg,
  sx,
  x,
  y,
  z,
  rx,
  ry,
  rz,
  u,  // one qubit, as in stdgates.inc (u is the built-in U)
  cx,
  cz,
  ecr,
  iswap,
  rzz,
  rxx,  // two qubits; a is the first operand
};

/// A row of the table of gates that may stand in the text.
struct GateInfo {
  GateKind kind;
  std::string_view name;  ///< in OpenQASM 3
  int qubits;
  int parameters;               ///< angles in radians
  std::string_view definition;  ///< the whole `gate` statement; empty where stdgates.inc has it
};

/// The table, in the order of GateKind from h on.
const std::vector<GateInfo>& gate_table();
/// The row of a kind that has one (InternalFault for turn and canonical).
const GateInfo& gate_info(GateKind kind);

struct Gate {
  GateKind kind = GateKind::turn;
  std::uint32_t a = 0;
  std::uint32_t b = 0;  ///< second operand; equal to a for one-qubit gates
  std::array<double, 4> parameters{};

  [[nodiscard]] bool two_qubit() const { return a != b; }
};

/// Gates in time order, run `repeats` times.
struct Segment {
  std::vector<Gate> gates;
  std::uint64_t repeats = 1;
};

/// The operator of a circuit is exp(i global_phase) times its gates, the first one acting first.
struct Circuit {
  std::uint32_t qubits = 0;
  std::vector<Segment> segments;
  double global_phase = 0.0;              ///< radians, in (-pi, pi]
  double rounding = 0.0;                  ///< bound on the spectral distance from the exact product
                                          ///< of the plan's exponentials, due to rounding alone
  std::vector<std::uint32_t> layout_in;   ///< circuit qubit of each Hamiltonian qubit at the start
  std::vector<std::uint32_t> layout_out;  ///< and at the end
};

/// Adds `radians * times` to the global phase and brings it back into (-pi, pi].
void add_phase(Circuit& circuit, double radians, std::uint64_t times = 1);

/// What an independent reader of the written text would count, loops expanded.
struct CircuitCounts {
  std::uint64_t one_qubit_gates = 0;
  std::uint64_t two_qubit_gates = 0;
  std::uint64_t rotations = 0;    ///< angles that are no multiple of pi/2, to 1e-12
  std::uint64_t t_rotations = 0;  ///< angles that are no multiple of pi/4, to 1e-12
  std::uint64_t depth = 0;        ///< longest chain of gates that share qubits
  std::uint64_t two_qubit_depth = 0;
  std::vector<std::pair<std::string, std::uint64_t>> by_name;  ///< in table order, none zero

  [[nodiscard]] std::uint64_t gates() const { return one_qubit_gates + two_qubit_gates; }
};

/// Counts a circuit. A canonical gate counts as the entanglers that `cx` needs for it, so that
/// counts of circuits before and after lowering can be compared.
CircuitCounts count(const Circuit& circuit);

}  // namespace farrier
