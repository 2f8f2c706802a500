// Counts against a naive count of the circuit with every repeat written out.
#include <doctest/doctest.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <farrier/circuit.hpp>
#include <map>
#include <numbers>
#include <string>
#include <vector>

#include "compiler/synthesis/canonical.hpp"
#include "compiler/synthesis/turn.hpp"
#include "tests/support/hamiltonians.hpp"

using namespace farrier;
using test::Random;

namespace {

constexpr double pi = std::numbers::pi;

std::uint64_t weight(const Gate& gate) {
  if (gate.kind != GateKind::canonical) return 1;
  return static_cast<std::uint64_t>(synthesis::entanglers(
      {gate.parameters[0], gate.parameters[1], gate.parameters[2]}, Native::cx));
}

bool named(const Gate& gate) {
  return gate.kind != GateKind::turn && gate.kind != GateKind::canonical;
}

std::vector<Gate> written_out(const Circuit& circuit) {
  std::vector<Gate> gates;
  for (const Segment& segment : circuit.segments)
    for (std::uint64_t k = 0; k < segment.repeats; ++k)
      gates.insert(gates.end(), segment.gates.begin(), segment.gates.end());
  return gates;
}

/// By the definitions beside CircuitCounts, gate by gate.
CircuitCounts naive(const Circuit& circuit) {
  CircuitCounts counts;
  std::map<GateKind, std::uint64_t> by_kind;
  std::vector<std::uint64_t> depth(circuit.qubits, 0);
  std::vector<std::uint64_t> two_depth(circuit.qubits, 0);
  for (const Gate& gate : written_out(circuit)) {
    if (gate.two_qubit()) {
      counts.two_qubit_gates += weight(gate);
      depth[gate.a] = depth[gate.b] = weight(gate) + std::max(depth[gate.a], depth[gate.b]);
      two_depth[gate.a] = two_depth[gate.b] =
          weight(gate) + std::max(two_depth[gate.a], two_depth[gate.b]);
    } else {
      ++counts.one_qubit_gates;
      ++depth[gate.a];
    }
    if (!named(gate)) continue;
    ++by_kind[gate.kind];
    for (int k = 0; k < gate_info(gate.kind).parameters; ++k) {
      const double angle = gate.parameters[static_cast<std::size_t>(k)];
      counts.rotations += std::abs(std::remainder(angle, pi / 2)) > 1e-12 ? 1 : 0;
      counts.t_rotations += std::abs(std::remainder(angle, pi / 4)) > 1e-12 ? 1 : 0;
    }
  }
  for (const auto& [kind, count] : by_kind)
    counts.by_name.emplace_back(gate_info(kind).name, count);
  counts.depth = *std::ranges::max_element(depth);
  counts.two_qubit_depth = *std::ranges::max_element(two_depth);
  return counts;
}

void check_equal(const CircuitCounts& a, const CircuitCounts& b) {
  CHECK(a.one_qubit_gates == b.one_qubit_gates);
  CHECK(a.two_qubit_gates == b.two_qubit_gates);
  CHECK(a.rotations == b.rotations);
  CHECK(a.t_rotations == b.t_rotations);
  CHECK(a.depth == b.depth);
  CHECK(a.two_qubit_depth == b.two_qubit_depth);
  CHECK(a.by_name == b.by_name);
}

Gate random_gate(std::uint32_t qubits, Random& draw) {
  const auto kind =
      static_cast<GateKind>(below(draw, static_cast<std::uint32_t>(GateKind::rxx) + 1));
  Gate gate{kind, below(draw, qubits), 0, {}};
  gate.b = gate.a;
  if (kind == GateKind::canonical || kind >= GateKind::cx)
    gate.b = (gate.a + 1 + below(draw, qubits - 1)) % qubits;
  const std::array<double, 5> angles = {0.0, pi / 4, pi / 2, 0.3, -1.7};
  for (double& parameter : gate.parameters) parameter = pick(draw, angles);
  if (kind == GateKind::turn) gate.parameters = {1, 0, 0, 0};
  return gate;
}

Circuit random_circuit(std::uint32_t qubits, Random& draw) {
  Circuit circuit;
  circuit.qubits = qubits;
  const std::uint32_t segments = 1 + below(draw, 4);
  for (std::uint32_t k = 0; k < segments; ++k) {
    Segment segment{{}, draw.chance(0.5) ? 1 : 1 + below(draw, 300)};
    const std::uint32_t gates = 1 + below(draw, 12);
    for (std::uint32_t j = 0; j < gates; ++j) segment.gates.push_back(random_gate(qubits, draw));
    circuit.segments.push_back(std::move(segment));
  }
  return circuit;
}

Gate one(GateKind kind, std::uint32_t q, double angle = 0.0) {
  return {kind, q, q, {angle}};
}
Gate two(GateKind kind, std::uint32_t a, std::uint32_t b, double angle = 0.0) {
  return {kind, a, b, {angle}};
}

Circuit circuit_of(std::uint32_t qubits, std::vector<Segment> segments) {
  return {qubits, std::move(segments), 0.0, 0.0, {}, {}};
}

}  // namespace

TEST_CASE("an empty circuit counts nothing") {
  const CircuitCounts counts = count(circuit_of(3, {}));
  CHECK(counts.gates() == 0);
  CHECK(counts.depth == 0);
  CHECK(counts.by_name.empty());
  CHECK(count(circuit_of(0, {})).depth == 0);
}

TEST_CASE("random circuits count as their gates written out") {
  Random draw(1);
  for (int k = 0; k < 400; ++k) {
    const Circuit circuit = random_circuit(2 + below(draw, 7), draw);
    check_equal(count(circuit), naive(circuit));
  }
}

TEST_CASE("sparse bodies on many qubits count as written out") {
  // Few gates on many qubits: several components, each deepening at a rate of its own.
  Random draw(2);
  for (int k = 0; k < 200; ++k) {
    Circuit circuit;
    circuit.qubits = 12;
    for (int j = 0; j < 3; ++j) {
      Segment segment{{}, 1 + below(draw, 200)};
      const std::uint32_t gates = 2 + below(draw, 6);
      for (std::uint32_t i = 0; i < gates; ++i) segment.gates.push_back(random_gate(12, draw));
      circuit.segments.push_back(std::move(segment));
    }
    check_equal(count(circuit), naive(circuit));
  }
}

TEST_CASE("a staircase deepens by less than its length a round") {
  // cx 01, cx 12, ..., repeated: rounds overlap, each adds two gates to every chain.
  std::vector<Gate> body;
  for (std::uint32_t q = 0; q + 1 < 9; ++q) body.push_back(two(GateKind::cx, q, q + 1));
  const Circuit circuit = circuit_of(9, {{body, 100}});
  check_equal(count(circuit), naive(circuit));
  CHECK(count(circuit).depth == 8 + 2 * 99);
}

TEST_CASE("components of different rates and a head start") {
  const std::vector<Gate> body = {one(GateKind::rx, 0, 0.3), one(GateKind::rx, 1, 0.3),
                                  one(GateKind::rz, 1, 0.3), two(GateKind::cx, 2, 3),
                                  one(GateKind::h, 3),       one(GateKind::h, 3),
                                  one(GateKind::h, 4)};
  for (const std::uint64_t start : {0, 5, 700}) {
    const Circuit circuit = circuit_of(5, {{{one(GateKind::s, 4)}, start + 1}, {body, 300}});
    check_equal(count(circuit), naive(circuit));
  }
}

TEST_CASE("counts grow linearly to a huge number of repeats") {
  // Known rates: two-qubit depth 2 a round on the first component, 1 on the second.
  const std::vector<Gate> body = {two(GateKind::cx, 0, 1), two(GateKind::cz, 1, 2),
                                  one(GateKind::rz, 0, 0.3), two(GateKind::rzz, 3, 4, pi / 4)};
  for (const std::uint64_t repeats :
       {std::uint64_t{1'000'000}, std::uint64_t{1} << 40U, (std::uint64_t{1} << 50U) + 7}) {
    const CircuitCounts counts = count(circuit_of(5, {{body, repeats}}));
    CHECK(counts.two_qubit_gates == 3 * repeats);
    CHECK(counts.one_qubit_gates == repeats);
    CHECK(counts.rotations == 2 * repeats);
    CHECK(counts.t_rotations == repeats);
    CHECK(counts.two_qubit_depth == 2 * repeats);
    CHECK(counts.depth == 2 * repeats);
  }
}

TEST_CASE("a million repeats of random bodies follow from a thousand") {
  // Depths are periodic after a transient, so equal numbers of rounds add equal depths.
  Random draw(3);
  for (int k = 0; k < 100; ++k) {
    Circuit circuit = random_circuit(6, draw);
    const auto depth_after = [&](std::uint64_t repeats) {
      circuit.segments.front().repeats = repeats;
      return count(circuit).depth;
    };
    // 720720 is a multiple of every period up to 16.
    const std::uint64_t growth = depth_after(1000 + 720720) - depth_after(1000);
    CHECK(depth_after(1'000'000 + 720720) - depth_after(1'000'000) == growth);
  }
}

TEST_CASE("a canonical gate counts as the cx that it needs") {
  const auto canonical = [](double a, double b, double c) {
    return circuit_of(2, {{{{GateKind::canonical, 0, 1, {a, b, c}}}, 1}});
  };
  CHECK(count(canonical(0.3, 0.2, 0.1)).two_qubit_gates == 3);
  CHECK(count(canonical(0.3, 0.2, 0.1)).depth == 3);
  CHECK(count(canonical(0.3, 0.2, 0)).two_qubit_gates == 2);
  CHECK(count(canonical(pi / 4, 0, 0)).two_qubit_gates == 1);
  CHECK(count(canonical(pi / 2, 0, 0)).two_qubit_gates == 0);
}

TEST_CASE("multiples of pi over 2 and pi over 4 to a part in 1e12 are no rotations") {
  const auto rz = [](double angle) {
    return count(circuit_of(1, {{{one(GateKind::rz, 0, angle)}, 1}}));
  };
  CHECK(rz(pi / 2).rotations == 0);
  CHECK(rz(pi / 2 + 9e-13).rotations == 0);
  CHECK(rz(pi / 2 + 2e-12).rotations == 1);
  CHECK(rz(-pi / 4).rotations == 1);
  CHECK(rz(-pi / 4).t_rotations == 0);
  CHECK(rz(-pi / 4 + 2e-12).t_rotations == 1);
  CHECK(rz(0.0).rotations == 0);
  const Circuit u = circuit_of(1, {{{{GateKind::u, 0, 0, {0.3, pi / 2, -0.4}}}, 5}});
  CHECK(count(u).rotations == 10);
}
