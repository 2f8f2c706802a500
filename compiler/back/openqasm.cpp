// A lowered circuit as an OpenQASM 3 program: a header of comments, declarations, and one statement
// a line. What repeats is rendered once; flat text appends copies of it, looped text puts it into a
// `for` statement. Qubit indices are literals everywhere, since the specification asks no reader to
// take others (types.rst, "Register concatenation and slicing").
#include "compiler/back/openqasm.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <cstring>
#include <farrier/diagnostic.hpp>
#include <new>
#include <numbers>
#include <string_view>
#include <utility>

#include "compiler/back/text.hpp"
#include "compiler/base/fnv.hpp"

namespace farrier::back {
namespace {

constexpr std::uint64_t most_gates_flat = 100'000;
constexpr std::string_view barrier_line = "barrier q;\n";
constexpr std::string_view digest_place = "0000000000000000";

/// Room that the text of a gate is expected to take; only a guess for reserving memory.
constexpr std::size_t expected_gate_bytes = 32;

using Words = std::vector<std::string_view>;

/// Gates that turn |0> into each State, in the order of the enumeration.
const std::array<Words, 6> preparation_gates{
    {{}, {"x"}, {"h"}, {"x", "h"}, {"h", "s"}, {"h", "sdg"}}};
/// Gates that turn each Basis into that of Z, in the order of the enumeration.
const std::array<Words, 3> basis_gates{{{"h"}, {"sdg", "h"}, {}}};

/// One statement, built in a fixed buffer: the longest has three angles and two operands.
class Line {
 public:
  void text(std::string_view part) {
    std::memcpy(end_, part.data(), part.size());
    end_ += part.size();
  }
  void qubit(std::uint32_t index) {
    text("q[");
    end_ = std::to_chars(end_, limit(), index).ptr;
    text("]");
  }
  /// The shortest text that reads back as the same double, made a float literal by its point or
  /// exponent: without one it would be an integer.
  void angle(double radians) {
    if (!(radians > -std::numbers::pi && radians <= std::numbers::pi)) {
      throw InternalFault("an angle of the circuit lies outside (-pi, pi]");
    }
    char* const start = end_;
    end_ = std::to_chars(end_, limit(), radians + 0.0).ptr;  // no "-0"
    const bool literal = std::any_of(start, end_, [](char c) { return c == '.' || c == 'e'; });
    if (!literal) text(".0");
  }
  [[nodiscard]] std::string_view view() const {
    return {buffer_.data(), static_cast<std::size_t>(end_ - buffer_.data())};
  }

 private:
  [[nodiscard]] char* limit() { return buffer_.data() + buffer_.size(); }

  std::array<char, 256> buffer_;
  char* end_ = buffer_.data();
};

void append_gate(std::string& out, const Gate& gate, std::string_view margin) {
  const GateInfo& info = gate_info(gate.kind);
  Line line;
  line.text(margin);
  line.text(info.name);
  for (int k = 0; k < info.parameters; ++k) {
    line.text(k == 0 ? "(" : ", ");
    line.angle(gate.parameters[static_cast<std::size_t>(k)]);
  }
  line.text(info.parameters > 0 ? ") " : " ");
  line.qubit(gate.a);
  if (gate.two_qubit()) {
    line.text(", ");
    line.qubit(gate.b);
  }
  line.text(";\n");
  out += line.view();
}

void append_gates(std::string& out, const Segment& segment, std::string_view margin) {
  for (const Gate& gate : segment.gates) append_gate(out, gate, margin);
}

/// Which kinds occur, by their number. Throws where a gate cannot be written.
std::array<bool, 256> check_gates(const Circuit& circuit) {
  std::array<bool, 256> seen{};
  for (const Segment& segment : circuit.segments) {
    for (const Gate& gate : segment.gates) {
      if (std::max(gate.a, gate.b) >= circuit.qubits) {
        throw InternalFault("a gate acts on a qubit that the circuit does not have");
      }
      if ((gate_info(gate.kind).qubits == 2) != gate.two_qubit()) {
        throw InternalFault("a gate has the wrong number of operands");
      }
      seen[static_cast<std::uint8_t>(gate.kind)] = true;
    }
  }
  return seen;
}

/// The rows of the gate table that occur in a circuit.
std::vector<const GateInfo*> used_gates(const Circuit& circuit) {
  const std::array<bool, 256> seen = check_gates(circuit);
  std::vector<const GateInfo*> used;
  for (const GateInfo& info : gate_table()) {
    if (seen[static_cast<std::uint8_t>(info.kind)]) used.push_back(&info);
  }
  return used;
}

void check_layout(const Circuit& circuit, const std::vector<std::uint32_t>& layout) {
  const bool there = std::all_of(layout.begin(), layout.end(),
                                 [&](std::uint32_t qubit) { return qubit < circuit.qubits; });
  if (!there || layout.size() != circuit.layout_in.size()) {
    throw InternalFault("a layout of the circuit names qubits that it does not have");
  }
}

/// Two-qubit gates count as one whether stdgates.inc has them or the text defines them.
std::string native_words(const OpenqasmInput& input, const std::vector<const GateInfo*>& used) {
  std::string words;
  for (const GateInfo* info : used) {
    if (info->qubits != 2 && info->definition.empty()) continue;
    if (!words.empty()) words += ' ';
    words += info->name;
  }
  return words.empty() ? input.native : words;
}

void append_header(std::string& out, const OpenqasmInput& input,
                   const std::vector<const GateInfo*>& used) {
  const CircuitCounts& counts = input.counts;
  const std::vector<std::pair<std::string_view, std::string>> rows{
      {"farrier", input.version},
      {"job", input.job},
      {"hamiltonian", input.hamiltonian},
      {"command", input.command},
      {"inputs", input.inputs},
      {"time", input.time},
      {"formula", input.formula},
      {"steps", std::to_string(input.steps)},
      {"assurance", input.assurance},
      {"certified-error", input.certified_error},
      {"tolerance", input.tolerance},
      {"two-qubit-gates", std::to_string(counts.two_qubit_gates)},
      {"gates", std::to_string(counts.gates())},
      {"depth", std::to_string(counts.depth)},
      {"two-qubit-depth", std::to_string(counts.two_qubit_depth)},
      {"native", native_words(input, used)},
      {"layout-in", joined(input.circuit.layout_in)},
      {"layout-out", joined(input.circuit.layout_out)},
      {"body", std::string(digest_place)},
  };
  out += "OPENQASM 3.0;\n";
  for (const auto& [key, value] : rows) {
    out.append("// ").append(key).append(": ").append(one_line(value)).append("\n");
  }
}

/// The definition of the table with a line for its head, each of its statements and its end.
void append_definition(std::string& out, std::string_view definition) {
  const std::size_t head = definition.find('{') + 1;
  out.append(definition.substr(0, head)).append("\n");
  for (std::string_view rest = definition.substr(head); !rest.empty();) {
    const std::size_t end = rest.find(';');
    if (end == std::string_view::npos) break;
    const std::string_view statement = rest.substr(0, end + 1);
    out.append("  ").append(statement.substr(statement.find_first_not_of(' '))).append("\n");
    rest.remove_prefix(end + 1);
  }
  out += "}\n";
}

void append_declarations(std::string& out, const OpenqasmInput& input,
                         const std::vector<const GateInfo*>& used) {
  const Circuit& circuit = input.circuit;
  out += "include \"stdgates.inc\";\n";
  for (const GateInfo* info : used) {
    if (!info->definition.empty()) append_definition(out, info->definition);
  }
  out.append("qubit[").append(std::to_string(circuit.qubits)).append("] q;\n");
  if (input.measurement) {
    out.append("bit[").append(std::to_string(circuit.layout_out.size())).append("] c;\n");
  }
}

void append_words(std::string& out, const Words& gates, std::uint32_t qubit) {
  for (const std::string_view gate : gates) {
    out.append(gate).append(" q[").append(std::to_string(qubit)).append("];\n");
  }
}

std::uint32_t placed(const std::vector<std::uint32_t>& layout, std::uint32_t qubit) {
  if (qubit >= layout.size()) throw InternalFault("a qubit that is no part of the Hamiltonian");
  return layout[qubit];
}

void append_preparation(std::string& out, const OpenqasmInput& input) {
  out += "// preparation\nreset q;\n";
  for (const Prepared& one : input.preparation) {
    append_words(out, preparation_gates.at(static_cast<std::size_t>(one.state)),
                 placed(input.circuit.layout_in, one.qubit));
  }
}

void append_measurement(std::string& out, const OpenqasmInput& input) {
  const std::vector<std::uint32_t>& layout = input.circuit.layout_out;
  const Words& gates = basis_gates.at(static_cast<std::size_t>(input.measurement->basis));
  out += "// measurement\n";
  for (const std::uint32_t k : input.measurement->qubits) {
    append_words(out, gates, placed(layout, k));
  }
  for (const std::uint32_t k : input.measurement->qubits) {
    out.append("c[").append(std::to_string(k)).append("] = measure q[");
    out.append(std::to_string(placed(layout, k))).append("];\n");
  }
}

[[noreturn]] void refuse_size() {
  throw UserError(ExitCode::refused,
                  "the circuit with every gate written out does not fit into memory; "
                  "expected the looped style");
}

void make_room(std::string& out, std::size_t bytes) {
  try {
    if (bytes > out.max_size() - out.size()) refuse_size();
    out.reserve(out.size() + bytes);
  } catch (const std::bad_alloc&) {
    refuse_size();
  }
}

/// Appends copies of everything from `start` on, with room for `spare` bytes after them.
void append_copies(std::string& out, std::size_t start, std::uint64_t copies, std::size_t spare) {
  const std::size_t length = out.size() - start;
  if (copies == 0) return;
  if (copies > (out.max_size() - spare) / length) refuse_size();
  make_room(out, copies * length + spare);
  for (std::uint64_t k = 0; k < copies; ++k) out.append(out.data() + start, length);
}

/// Appends a segment; `barrier` ends each of its rounds by one. `spare` is room for what follows.
void append_segment(std::string& out, const Segment& segment, bool looped, bool barrier,
                    std::size_t spare) {
  const bool loop = looped && segment.repeats > 1;
  if (loop) {
    out.append("for uint k in [1:").append(std::to_string(segment.repeats)).append("] {\n");
  }
  const std::string_view margin = loop ? "  " : "";
  const std::size_t start = out.size();
  append_gates(out, segment, margin);
  if (barrier) out.append(margin).append(barrier_line);
  if (loop) {
    out += "}\n";
  } else {
    append_copies(out, start, segment.repeats - 1, spare);
  }
}

/// The global phase belongs to the operator of the evolution, and opens it.
void append_phase(std::string& out, double radians) {
  if (radians == 0.0) return;
  Line line;
  line.text("gphase(");
  line.angle(radians);
  line.text(");\n");
  out += line.view();
}

void append_evolution(std::string& out, const OpenqasmInput& input) {
  append_phase(out, input.circuit.global_phase);
  std::vector<const Segment*> segments;
  std::size_t spare = 4096;
  for (const Segment& segment : input.circuit.segments) {
    if (segment.gates.empty() || segment.repeats == 0) continue;
    segments.push_back(&segment);
    spare += segment.gates.size() * expected_gate_bytes;
  }
  make_room(out, spare);
  for (const Segment* segment : segments) {
    spare -= segment->gates.size() * expected_gate_bytes;
    const bool between = segment->repeats > 1 || segment != segments.back();
    append_segment(out, *segment, input.style == Style::looped,
                   between && input.barriers == Barriers::steps, spare);
  }
}

}  // namespace

Style chosen_style(Style asked, const Circuit& circuit, const CircuitCounts& counts) {
  if (asked != Style::automatic) return asked;
  const bool repeats = std::any_of(
      circuit.segments.begin(), circuit.segments.end(),
      [](const Segment& segment) { return segment.repeats > 1 && !segment.gates.empty(); });
  return repeats && counts.gates() > most_gates_flat ? Style::looped : Style::flat;
}

std::string write_openqasm(const OpenqasmInput& input) {
  const Circuit& circuit = input.circuit;
  if (circuit.qubits == 0) throw InternalFault("a circuit without qubits cannot be written");
  if (input.style == Style::automatic) throw InternalFault("the style of the text is undecided");
  check_layout(circuit, circuit.layout_in);
  check_layout(circuit, circuit.layout_out);
  const std::vector<const GateInfo*> used = used_gates(circuit);
  const bool runnable = input.prepares || input.measurement.has_value();

  std::string out;
  append_header(out, input, used);
  const std::size_t body = out.size();
  append_declarations(out, input, used);
  if (runnable) {
    append_preparation(out, input);
    out += "// evolution\n";
  }
  append_evolution(out, input);
  if (input.measurement) append_measurement(out, input);

  base::Fnv1a fnv;
  fnv.bytes(std::string_view(out).substr(body));
  out.replace(body - 1 - digest_place.size(), digest_place.size(), fnv.hex());
  return out;
}

}  // namespace farrier::back
