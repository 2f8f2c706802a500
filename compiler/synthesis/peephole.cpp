// Local rewriting of circuits.
#include "compiler/synthesis/peephole.hpp"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <numbers>
#include <utility>
#include <vector>

#include "compiler/synthesis/canonical.hpp"
#include "compiler/synthesis/turn.hpp"

namespace farrier::synthesis {
namespace {

constexpr double pi = std::numbers::pi;

bool self_inverse(GateKind kind) {
  return kind == GateKind::cx || kind == GateKind::cz || kind == GateKind::ecr;
}

bool adds_up(GateKind kind) {
  return kind == GateKind::canonical || kind == GateKind::rzz || kind == GateKind::rxx;
}

bool symmetric(GateKind kind) {
  return kind == GateKind::cz || adds_up(kind);
}

/// Whether two neighbouring gates become one or none.
bool would_merge(const Gate& earlier, const Gate& later) {
  if (earlier.kind != later.kind) return false;
  const bool same = earlier.a == later.a && earlier.b == later.b;
  if (earlier.kind == GateKind::turn) return same;
  if (!self_inverse(earlier.kind) && !adds_up(earlier.kind)) return false;
  return same || (symmetric(earlier.kind) && earlier.a == later.b && earlier.b == later.a);
}

/// Takes gates one by one and keeps them simplified: the last gate on each qubit is on its stack.
class Window {
 public:
  explicit Window(std::uint32_t qubits) : stacks_(qubits) {}

  void append(const Gate& gate) {
    if (!stacks_[gate.a].empty() && (!gate.two_qubit() || !stacks_[gate.b].empty())) {
      const std::size_t top = stacks_[gate.a].back();
      if (top == stacks_[gate.b].back() && would_merge(gates_[top], gate)) {
        merge_into(top, gate);
        return;
      }
    }
    if (gate.kind == GateKind::turn && vanishes(gate)) return;
    stacks_[gate.a].push_back(gates_.size());
    if (gate.two_qubit()) stacks_[gate.b].push_back(gates_.size());
    gates_.push_back(gate);
    alive_.push_back(true);
  }

  [[nodiscard]] std::vector<Gate> take() {
    std::vector<Gate> kept;
    for (std::size_t k = 0; k < gates_.size(); ++k)
      if (alive_[k]) kept.push_back(gates_[k]);
    return kept;
  }

  [[nodiscard]] double phase() const { return phase_; }
  [[nodiscard]] double rounding() const { return rounding_; }

 private:
  void remove(std::size_t index) {
    alive_[index] = false;
    stacks_[gates_[index].a].pop_back();
    if (gates_[index].two_qubit()) stacks_[gates_[index].b].pop_back();
  }

  /// Whether a turn is the identity up to a sign; then sign and deviation are noted.
  bool vanishes(const Gate& gate) {
    Turn turn = turn_of(gate);
    const bool negative = turn.w < 0;
    if (negative) turn = {-turn.w, -turn.x, -turn.y, -turn.z};
    const double distance = distance_from_identity(turn);
    if (distance > snap) return false;
    rounding_ += distance;
    if (negative) phase_ += pi;
    return true;
  }

  void merge_into(std::size_t index, const Gate& gate) {
    Gate& earlier = gates_[index];
    if (earlier.kind == GateKind::turn) {
      const Turn turn = compose(turn_of(gate), turn_of(earlier));
      rounding_ += turn_rounding;
      earlier = turn_gate(gate.a, turn);
      if (vanishes(earlier)) remove(index);
      return;
    }
    if (self_inverse(earlier.kind)) {
      remove(index);
      return;
    }
    for (std::size_t k = 0; k < 3; ++k) {
      earlier.parameters[k] += gate.parameters[k];
      rounding_ += 2.3e-16 * std::abs(earlier.parameters[k]);
    }
    if (earlier.kind != GateKind::canonical) reduce_angle(earlier.parameters[0]);
    if (std::all_of(earlier.parameters.begin(), earlier.parameters.begin() + 3,
                    [](double value) { return value == 0.0; }))
      remove(index);
  }

  /// Brings the angle of an rzz or rxx that was added up into (-pi, pi]; a whole turn is a sign.
  void reduce_angle(double& angle) {
    if (angle > -pi && angle <= pi) return;
    angle += angle > 0.0 ? -2 * pi : 2 * pi;
    phase_ += pi;
    rounding_ += 4e-16;
  }

  std::vector<Gate> gates_;
  std::vector<bool> alive_;
  std::vector<std::vector<std::size_t>> stacks_;
  double phase_ = 0.0;
  double rounding_ = 0.0;
};

void simplify_segment(Circuit& circuit, Segment& segment) {
  Window window(circuit.qubits);
  for (const Gate& gate : segment.gates) window.append(gate);
  add_phase(circuit, window.phase(), segment.repeats);
  circuit.rounding += window.rounding() * static_cast<double>(segment.repeats);
  segment.gates = window.take();
}

/// Joins neighbouring segments that run once, and drops empty ones.
void join_segments(Circuit& circuit) {
  std::vector<Segment> joined;
  for (Segment& segment : circuit.segments) {
    if (segment.gates.empty() || segment.repeats == 0) continue;
    if (!joined.empty() && joined.back().repeats == 1 && segment.repeats == 1) {
      joined.back().gates.insert(joined.back().gates.end(), segment.gates.begin(),
                                 segment.gates.end());
    } else {
      joined.push_back(std::move(segment));
    }
  }
  circuit.segments = std::move(joined);
}

/// Which gates of a body are the first, or the last, on all their qubits.
std::vector<bool> outermost(const std::vector<Gate>& gates, std::uint32_t qubits, bool first) {
  std::vector<bool> touched(qubits, false);
  std::vector<bool> result(gates.size(), false);
  for (std::size_t step = 0; step < gates.size(); ++step) {
    const std::size_t k = first ? step : gates.size() - 1 - step;
    const Gate& gate = gates[k];
    result[k] = !touched[gate.a] && !touched[gate.b];
    touched[gate.a] = touched[gate.b] = true;
  }
  return result;
}

/// Gates of a body that begin it and would merge with a different gate that ends it.
std::vector<bool> mergeable_heads(const std::vector<Gate>& gates, std::uint32_t qubits) {
  const std::vector<bool> heads = outermost(gates, qubits, true);
  const std::vector<bool> tails = outermost(gates, qubits, false);
  std::vector<std::size_t> tail_on(qubits, gates.size());
  for (std::size_t k = 0; k < gates.size(); ++k)
    if (tails[k]) tail_on[gates[k].a] = tail_on[gates[k].b] = k;
  std::vector<bool> result(gates.size(), false);
  for (std::size_t k = 0; k < gates.size(); ++k) {
    const std::size_t tail = tail_on[gates[k].a];
    result[k] = heads[k] && tail != gates.size() && tail != k && would_merge(gates[tail], gates[k]);
  }
  return result;
}

/// Turns a body's lone turns, on qubits with nothing else in it, into one turn each in front of it.
void lift_lone_turns(Circuit& circuit, std::size_t index) {
  Segment& body = circuit.segments[index];
  std::vector<std::size_t> count(circuit.qubits, 0);
  for (const Gate& gate : body.gates) {
    ++count[gate.a];
    if (gate.two_qubit()) ++count[gate.b];
  }
  Segment lifted;
  std::vector<Gate> kept;
  for (const Gate& gate : body.gates) {
    if (gate.kind == GateKind::turn && count[gate.a] == 1) {
      lifted.gates.push_back(turn_gate(gate.a, power(turn_of(gate), body.repeats)));
      circuit.rounding += power_rounding(body.repeats);
    } else {
      kept.push_back(gate);
    }
  }
  if (lifted.gates.empty()) return;
  body.gates = std::move(kept);
  circuit.segments.insert(circuit.segments.begin() + static_cast<std::ptrdiff_t>(index), lifted);
}

/// One rotation of a body: true where something merged.
bool rotate_body(Circuit& circuit, std::size_t index) {
  const Segment body = circuit.segments[index];
  const std::vector<bool> heads = mergeable_heads(body.gates, circuit.qubits);
  if (std::ranges::find(heads, true) == heads.end()) return false;
  Segment head;
  Segment core;
  for (std::size_t k = 0; k < body.gates.size(); ++k)
    (heads[k] ? head : core).gates.push_back(body.gates[k]);
  Segment turned = core;
  turned.gates.insert(turned.gates.end(), head.gates.begin(), head.gates.end());
  turned.repeats = body.repeats - 1;
  simplify_segment(circuit, turned);
  const auto place = circuit.segments.begin() + static_cast<std::ptrdiff_t>(index);
  *place = std::move(turned);
  circuit.segments.insert(place, std::move(head));
  circuit.segments.insert(circuit.segments.begin() + static_cast<std::ptrdiff_t>(index) + 2,
                          std::move(core));
  return true;
}

/// Bodies are rotated at most so often: each time the text grows by one body.
constexpr int most_rotations = 3;

}  // namespace

void simplify(Circuit& circuit) {
  join_segments(circuit);
  for (Segment& segment : circuit.segments) simplify_segment(circuit, segment);
  for (std::size_t k = 0; k < circuit.segments.size(); ++k) {
    if (circuit.segments[k].repeats < 2) continue;
    const std::size_t before = circuit.segments.size();
    lift_lone_turns(circuit, k);
    k += circuit.segments.size() - before;
    for (int turn = 0; turn < most_rotations && circuit.segments[k].repeats >= 2; ++turn) {
      if (!rotate_body(circuit, k)) break;
      ++k;  // the body stands behind its head now
    }
  }
  join_segments(circuit);
  for (Segment& segment : circuit.segments)
    if (segment.repeats == 1) simplify_segment(circuit, segment);
  join_segments(circuit);
}

}  // namespace farrier::synthesis
