// Local rewriting: the operator stays, phase included; no count and no depth grows; known
// cancellations happen.
#include "compiler/synthesis/peephole.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <numbers>
#include <utility>
#include <vector>

#include "compiler/synthesis/turn.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using namespace farrier::synthesis;
using test::Random;
using unitary::Real;

namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Pauli, 3> letters = {Pauli::x, Pauli::y, Pauli::z};

Circuit circuit_of(std::uint32_t qubits, std::vector<Segment> segments) {
  return {qubits, std::move(segments), 0.0, 0.0, {}, {}};
}

Gate turned(std::uint32_t q, Pauli letter, double angle) {
  return turn_gate(q, rotation(letter, angle));
}

Gate two(GateKind kind, std::uint32_t a, std::uint32_t b, std::array<double, 4> parameters = {}) {
  return {kind, a, b, parameters};
}

std::size_t gates_in(const Circuit& circuit) {
  std::size_t count = 0;
  for (const Segment& segment : circuit.segments) count += segment.gates.size();
  return count;
}

void check_counts(const CircuitCounts& before, const CircuitCounts& after) {
  CHECK(after.gates() <= before.gates());
  CHECK(after.two_qubit_gates <= before.two_qubit_gates);
  CHECK(after.depth <= before.depth);
  CHECK(after.two_qubit_depth <= before.two_qubit_depth);
}

/// Simplifies a copy and checks everything that is promised.
Circuit simplified(const Circuit& before) {
  Circuit after = before;
  simplify(after);
  check_counts(count(before), count(after));
  CHECK(std::abs(after.global_phase) <= pi);
  CHECK(after.rounding >= before.rounding);
  const Real allowed = static_cast<Real>(after.rounding) - static_cast<Real>(before.rounding);
  CHECK(unitary::distance(unitary::circuit_matrix(after), unitary::circuit_matrix(before)) <=
        allowed + 1e-16L);
  for (const Segment& segment : after.segments) {
    CHECK(segment.repeats >= 1);
    CHECK_FALSE(segment.gates.empty());
  }
  return after;
}

/// From a small set, so that neighbours often merge.
Gate random_gate(std::uint32_t qubits, Random& draw) {
  const std::uint32_t a = below(draw, qubits);
  const std::uint32_t b = (a + 1 + below(draw, qubits - 1)) % qubits;
  const std::array<double, 6> angles = {pi / 2, -pi / 2, pi, 0.3, -0.3, 2.5};
  switch (below(draw, 9)) {
    case 0:
      return two(GateKind::cx, a, b);
    case 1:
      return two(GateKind::cz, a, b);
    case 2:
      return two(GateKind::ecr, a, b);
    case 3:
      return two(GateKind::iswap, a, b);
    case 4:
      return two(GateKind::rzz, a, b, {pick(draw, angles)});
    case 5:
      return two(GateKind::rxx, a, b, {pick(draw, angles)});
    case 6:
      return two(GateKind::canonical, a, b,
                 {draw.chance(0.5) ? 0.0 : pick(draw, angles) / 4,
                  draw.chance(0.5) ? 0.0 : pick(draw, angles) / 4,
                  draw.chance(0.5) ? 0.0 : pick(draw, angles) / 4});
    case 7:
      return turn_gate(a, compose(rotation(pick(draw, letters), draw.between(-6, 6)),
                                  rotation(pick(draw, letters), draw.between(-6, 6))));
    default:
      return turned(a, pick(draw, letters), pick(draw, angles));
  }
}

Circuit random_circuit(std::uint32_t qubits, Random& draw) {
  Circuit circuit;
  circuit.qubits = qubits;
  circuit.global_phase = draw.between(-3, 3);
  const std::uint32_t segments = 1 + below(draw, 4);
  for (std::uint32_t k = 0; k < segments; ++k) {
    Segment segment{{}, draw.chance(0.5) ? 1 : 1 + below(draw, 6)};
    const std::uint32_t gates = below(draw, 10);
    for (std::uint32_t j = 0; j < gates; ++j) segment.gates.push_back(random_gate(qubits, draw));
    circuit.segments.push_back(std::move(segment));
  }
  return circuit;
}

/// A circuit of gates and their inverses around something.
Circuit mirrored(std::uint32_t qubits, Random& draw) {
  Circuit circuit = random_circuit(qubits, draw);
  std::vector<Gate>& gates = circuit.segments.front().gates;
  for (std::size_t k = gates.size(); k-- > 0;) {
    Gate gate = gates[k];
    if (gate.kind == GateKind::turn)
      gate = turn_gate(gate.a, inverse(turn_of(gate)));
    else if (gate.kind != GateKind::iswap)
      for (double& parameter : gate.parameters) parameter = -parameter;
    gates.push_back(gate);
  }
  return circuit;
}

}  // namespace

TEST_CASE("random circuits keep their operator and never grow") {
  Random draw(1);
  for (int k = 0; k < 1500; ++k) simplified(random_circuit(2 + below(draw, 3), draw));
}

TEST_CASE("circuits with their mirror image keep their operator and never grow") {
  Random draw(2);
  for (int k = 0; k < 700; ++k) simplified(mirrored(2 + below(draw, 2), draw));
}

TEST_CASE("a second run changes no count for the worse") {
  Random draw(3);
  for (int k = 0; k < 200; ++k) simplified(simplified(random_circuit(3, draw)));
}

TEST_CASE("a turn and its inverse vanish") {
  const Circuit after = simplified(circuit_of(
      2, {{{turned(0, Pauli::y, 0.7), turned(1, Pauli::x, 1), turned(0, Pauli::y, -0.7)}, 1}}));
  CHECK(gates_in(after) == 1);
  CHECK(after.global_phase == 0.0);
}

TEST_CASE("a full turn becomes the sign -1") {
  const Circuit after =
      simplified(circuit_of(1, {{{turned(0, Pauli::x, pi), turned(0, Pauli::x, pi)}, 1}}));
  CHECK(after.segments.empty());
  CHECK(after.global_phase == pi);
}

TEST_CASE("a run of turns becomes one") {
  const Circuit after = simplified(circuit_of(
      2, {{{turned(0, Pauli::x, 0.1), turned(0, Pauli::y, 0.2), turned(0, Pauli::z, 0.3)}, 1}}));
  CHECK(gates_in(after) == 1);
}

TEST_CASE("equal gates that are their own inverse vanish in pairs") {
  for (const GateKind kind : {GateKind::cx, GateKind::cz, GateKind::ecr}) {
    CHECK(simplified(circuit_of(2, {{{two(kind, 0, 1), two(kind, 0, 1)}, 1}})).segments.empty());
    // Three deep: the inner pair first, then those around it.
    CHECK(simplified(circuit_of(3, {{{two(kind, 0, 1), two(kind, 1, 2), turned(0, Pauli::x, 0.4),
                                      turned(0, Pauli::x, -0.4), two(kind, 1, 2), two(kind, 0, 1)},
                                     1}}))
              .segments.empty());
  }
  CHECK(simplified(circuit_of(2, {{{two(GateKind::cz, 0, 1), two(GateKind::cz, 1, 0)}, 1}}))
            .segments.empty());
}

TEST_CASE("cx and ecr do not vanish with their operands exchanged - iswap not at all") {
  for (const GateKind kind : {GateKind::cx, GateKind::ecr})
    CHECK(gates_in(simplified(circuit_of(2, {{{two(kind, 0, 1), two(kind, 1, 0)}, 1}}))) == 2);
  CHECK(gates_in(simplified(
            circuit_of(2, {{{two(GateKind::iswap, 0, 1), two(GateKind::iswap, 0, 1)}, 1}}))) == 2);
}

TEST_CASE("a gate between keeps two equal gates apart") {
  CHECK(gates_in(simplified(circuit_of(
            3, {{{two(GateKind::cx, 0, 1), turned(1, Pauli::z, 0.3), two(GateKind::cx, 0, 1)},
                 1}}))) == 3);
  CHECK(gates_in(simplified(circuit_of(
            3, {{{two(GateKind::cx, 0, 1), two(GateKind::cx, 1, 2), two(GateKind::cx, 0, 1)},
                 1}}))) == 3);
}

TEST_CASE("angles of neighbours on one pair are added up") {
  for (const GateKind kind : {GateKind::canonical, GateKind::rzz, GateKind::rxx}) {
    const Circuit after =
        simplified(circuit_of(2, {{{two(kind, 0, 1, {0.25}), two(kind, 1, 0, {0.5})}, 1}}));
    REQUIRE(gates_in(after) == 1);
    CHECK(after.segments.front().gates.front().parameters[0] == 0.75);
    CHECK(simplified(circuit_of(2, {{{two(kind, 0, 1, {0.25}), two(kind, 0, 1, {-0.25})}, 1}}))
              .segments.empty());
  }
}

TEST_CASE("angles that are added up stay within one turn") {
  // Angles of rzz and rxx are written as they are, and must lie in (-pi, pi].
  for (const GateKind kind : {GateKind::rzz, GateKind::rxx}) {
    for (const double angle : {3.0, -3.0, pi, -2.5}) {
      const Circuit after = simplified(circuit_of(
          2,
          {{{two(kind, 0, 1, {angle}), two(kind, 0, 1, {angle}), two(kind, 0, 1, {angle})}, 1}}));
      for (const Segment& segment : after.segments) {
        for (const Gate& gate : segment.gates) {
          CHECK(gate.parameters[0] > -pi);
          CHECK(gate.parameters[0] <= pi);
        }
      }
    }
  }
}

TEST_CASE("lone turns of a body are lifted out of it") {
  for (const std::uint64_t repeats : {std::uint64_t{2}, std::uint64_t{5}, std::uint64_t{1000}}) {
    const Circuit after = simplified(circuit_of(
        3, {{{two(GateKind::cx, 0, 1), turned(2, Pauli::y, 0.3), turned(0, Pauli::x, 0.2)},
             repeats}}));
    std::size_t on_two = 0;
    for (const Segment& segment : after.segments)
      for (const Gate& gate : segment.gates)
        if (gate.a == 2) on_two += segment.repeats;
    CHECK(on_two == 1);
  }
}

TEST_CASE("a lone turn that comes round vanishes") {
  const Circuit after = simplified(circuit_of(1, {{{turned(0, Pauli::z, pi / 2)}, 8}}));
  CHECK(after.segments.empty());
  CHECK(after.global_phase == 0.0);
}

TEST_CASE("a body whose ends cancel is rotated") {
  // [V cx V^dag] x n is V [cx] x n V^dag, gate for gate.
  const std::uint64_t repeats = 50;
  const Circuit before = circuit_of(2, {{{turned(0, Pauli::y, 0.4), two(GateKind::cx, 0, 1),
                                          turned(1, Pauli::z, 0.3), turned(0, Pauli::y, -0.4)},
                                         repeats}});
  const CircuitCounts after = count(simplified(before));
  CHECK(after.two_qubit_gates == repeats);
  CHECK(after.one_qubit_gates == repeats + 2);
}

TEST_CASE("two-qubit gates meet over the seam") {
  // [cx T cx U] x n with U on another qubit: the last cx of a round meets the first of the next.
  const std::uint64_t repeats = 40;
  const Circuit before =
      circuit_of(3, {{{two(GateKind::cx, 0, 1), turned(1, Pauli::z, 0.3), two(GateKind::cx, 0, 1),
                       two(GateKind::cz, 1, 2), two(GateKind::cz, 1, 2)},
                      repeats}});
  const CircuitCounts after = count(simplified(before));
  CHECK(after.two_qubit_gates == 2);
}

TEST_CASE("canonical gates meet over the seam") {
  const std::uint64_t repeats = 30;
  const Circuit before = circuit_of(
      3, {{{two(GateKind::canonical, 0, 1, {0.1, 0.1, 0.1}), two(GateKind::canonical, 1, 2, {0.2}),
            two(GateKind::canonical, 0, 1, {0.1, 0.1, 0.1})},
           repeats}});
  const CircuitCounts after = count(simplified(before));
  // One gate of each pair a round, and one of the first pair more at the end.
  CHECK(after.two_qubit_gates == (3 + 2) * repeats + 3);
}

TEST_CASE("empty segments and segments of no repeats are dropped") {
  Circuit circuit = circuit_of(
      2, {{{}, 5}, {{two(GateKind::cx, 0, 1)}, 0}, {{two(GateKind::cx, 0, 1)}, 1}, {{}, 1}});
  simplify(circuit);
  REQUIRE(circuit.segments.size() == 1);
  CHECK(circuit.segments.front().gates.size() == 1);
}

TEST_CASE("neighbouring segments that run once are one") {
  const Circuit after =
      simplified(circuit_of(2, {{{two(GateKind::cx, 0, 1)}, 1}, {{two(GateKind::cx, 0, 1)}, 1}}));
  CHECK(after.segments.empty());
}
