// What an independent reader of the written text would count.
#include <algorithm>
#include <cmath>
#include <cstdint>
#include <farrier/circuit.hpp>
#include <numbers>
#include <numeric>

#include "compiler/synthesis/canonical.hpp"

namespace farrier {
namespace {

/// Two-qubit gates that a gate stands for: several for one that has not been lowered yet.
std::uint64_t two_qubit_gates(const Gate& gate) {
  if (gate.kind != GateKind::canonical) return 1;
  return static_cast<std::uint64_t>(synthesis::entanglers(
      {gate.parameters[0], gate.parameters[1], gate.parameters[2]}, Native::cx));
}

bool is_multiple(double angle, double unit) {
  return std::abs(std::remainder(angle, unit)) <= 1e-12;
}

/// Longest chains of gates, by one number per qubit, through segments with repeats.
class DepthCounter {
 public:
  DepthCounter(std::uint32_t qubits, bool two_qubit_only)
      : depth_(qubits, 0), two_qubit_only_(two_qubit_only) {}

  /// Depths grow by a max-plus linear map. Once some rounds together have added one and the same
  /// number to every qubit of each connected component, the same number of further rounds does so
  /// again; the reference point moves on at powers of two, so that any period is found.
  void run(const Segment& segment) {
    if (segment.repeats == 1) {
      pass(segment.gates);
      return;
    }
    const std::vector<std::uint32_t> component = components(segment.gates);
    std::vector<std::uint64_t> reference = depth_;
    std::uint64_t reference_round = 0;
    for (std::uint64_t round = 1; round <= segment.repeats; ++round) {
      pass(segment.gates);
      if (uniform(component, reference)) {
        const std::uint64_t period = round - reference_round;
        const std::uint64_t jumps = (segment.repeats - round) / period;
        for (std::size_t q = 0; q < depth_.size(); ++q)
          depth_[q] += jumps * (depth_[q] - reference[q]);
        round += jumps * period;
        for (; round < segment.repeats; ++round) pass(segment.gates);
        return;
      }
      if ((round & (round - 1)) == 0) {
        reference = depth_;
        reference_round = round;
      }
    }
  }

  [[nodiscard]] std::uint64_t depth() const {
    return depth_.empty() ? 0 : *std::ranges::max_element(depth_);
  }

 private:
  void pass(const std::vector<Gate>& gates) {
    for (const Gate& gate : gates) {
      if (gate.two_qubit()) {
        const std::uint64_t after =
            std::max(depth_[gate.a], depth_[gate.b]) + two_qubit_gates(gate);
        depth_[gate.a] = depth_[gate.b] = after;
      } else if (!two_qubit_only_) {
        ++depth_[gate.a];
      }
    }
  }

  [[nodiscard]] bool uniform(const std::vector<std::uint32_t>& component,
                             const std::vector<std::uint64_t>& before) const {
    for (std::size_t q = 0; q < depth_.size(); ++q) {
      const std::uint32_t first = component[q];
      if (depth_[q] - before[q] != depth_[first] - before[first]) return false;
    }
    return true;
  }

  /// The lowest qubit of the connected component of each qubit.
  [[nodiscard]] std::vector<std::uint32_t> components(const std::vector<Gate>& gates) const {
    std::vector<std::uint32_t> parent(depth_.size());
    std::iota(parent.begin(), parent.end(), 0U);
    const auto root = [&](std::uint32_t q) {
      while (parent[q] != q) q = parent[q] = parent[parent[q]];
      return q;
    };
    for (const Gate& gate : gates) {
      const std::uint32_t a = root(gate.a);
      const std::uint32_t b = root(gate.b);
      parent[std::max(a, b)] = std::min(a, b);
    }
    for (std::uint32_t q = 0; q < parent.size(); ++q) parent[q] = root(q);
    return parent;
  }

  std::vector<std::uint64_t> depth_;
  bool two_qubit_only_;
};

void count_angles(const Gate& gate, std::uint64_t repeats, CircuitCounts& counts) {
  const int parameters = gate_info(gate.kind).parameters;
  for (int k = 0; k < parameters; ++k) {
    const double angle = gate.parameters[static_cast<std::size_t>(k)];
    if (!is_multiple(angle, std::numbers::pi / 2)) counts.rotations += repeats;
    if (!is_multiple(angle, std::numbers::pi / 4)) counts.t_rotations += repeats;
  }
}

bool has_name(const Gate& gate) {
  return gate.kind != GateKind::turn && gate.kind != GateKind::canonical;
}

}  // namespace

CircuitCounts count(const Circuit& circuit) {
  CircuitCounts counts;
  std::vector<std::uint64_t> by_kind(gate_table().size(), 0);
  for (const Segment& segment : circuit.segments) {
    for (const Gate& gate : segment.gates) {
      if (gate.two_qubit())
        counts.two_qubit_gates += two_qubit_gates(gate) * segment.repeats;
      else
        counts.one_qubit_gates += segment.repeats;
      if (!has_name(gate)) continue;
      by_kind[static_cast<std::size_t>(gate.kind) - static_cast<std::size_t>(GateKind::h)] +=
          segment.repeats;
      count_angles(gate, segment.repeats, counts);
    }
  }
  for (std::size_t k = 0; k < by_kind.size(); ++k)
    if (by_kind[k] > 0) counts.by_name.emplace_back(gate_table()[k].name, by_kind[k]);

  DepthCounter all(circuit.qubits, false);
  DepthCounter two_qubit(circuit.qubits, true);
  for (const Segment& segment : circuit.segments) {
    all.run(segment);
    two_qubit.run(segment);
  }
  counts.depth = all.depth();
  counts.two_qubit_depth = two_qubit.depth();
  return counts;
}

}  // namespace farrier
