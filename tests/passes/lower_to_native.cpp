// lower_to_native: the same operator, in named gates of the native set only.
#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <numbers>
#include <vector>

#include "compiler/synthesis/turn.hpp"
#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using passes::Notes;
using test::Random;

namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Native, 6> natives = {Native::cx,    Native::cz,  Native::ecr,
                                           Native::iswap, Native::rzz, Native::rxx};
constexpr std::array<GateKind, 6> kinds = {GateKind::cx,    GateKind::cz,  GateKind::ecr,
                                           GateKind::iswap, GateKind::rzz, GateKind::rxx};

Circuit circuit_of(std::uint32_t qubits, std::vector<Segment> segments) {
  return {qubits, std::move(segments), 0.3, 0.0, {}, {}};
}

Circuit lowered(Circuit circuit, Native native) {
  passes::Request request;
  request.native = native;
  Notes notes;
  passes::lower_to_native(request, circuit, notes);
  return circuit;
}

Gate random_gate(std::uint32_t qubits, Random& random) {
  const std::uint32_t a = test::below(random, qubits);
  const std::uint32_t b = (a + 1 + test::below(random, qubits - 1)) % qubits;
  const std::array<double, 5> special = {0.0, pi / 4, -pi / 4, pi / 8, pi / 2};
  const auto coordinate = [&] {
    return random.chance(0.5) ? pick(random, special) : random.between(-2, 2);
  };
  if (random.chance(0.3)) return {GateKind::cx, a, b, {}};
  if (random.chance(0.4))
    return {GateKind::canonical, a, b, {coordinate(), coordinate(), coordinate()}};
  return synthesis::turn_gate(
      a, synthesis::compose(synthesis::rotation(Pauli::x, 2 * coordinate()),
                            synthesis::rotation(Pauli::z, random.chance(0.5) ? 0.0 : 2.0)));
}

Circuit random_circuit(Random& random) {
  Circuit circuit = circuit_of(3, {});
  for (int k = 0; k < 3; ++k) {
    Segment segment{{}, random.chance(0.5) ? 1 : 1 + test::below(random, 5)};
    for (int j = 0; j < 6; ++j) segment.gates.push_back(random_gate(3, random));
    circuit.segments.push_back(std::move(segment));
  }
  return circuit;
}

void check_gates(const Circuit& circuit, Native native) {
  for (const Segment& segment : circuit.segments) {
    CHECK_FALSE(segment.gates.empty());
    for (const Gate& gate : segment.gates) {
      REQUIRE(gate.kind != GateKind::turn);
      REQUIRE(gate.kind != GateKind::canonical);
      if (gate.two_qubit()) CHECK(gate.kind == kinds[static_cast<std::size_t>(native)]);
      for (int k = 0; k < gate_info(gate.kind).parameters; ++k) {
        CHECK(gate.parameters[static_cast<std::size_t>(k)] > -pi);
        CHECK(gate.parameters[static_cast<std::size_t>(k)] <= pi);
      }
    }
  }
}

}  // namespace

TEST_CASE("random circuits keep their operator in every native set") {
  Random random(1);
  for (const Native native : natives) {
    for (int k = 0; k < 120; ++k) {
      const Circuit before = random_circuit(random);
      const Circuit after = lowered(before, native);
      check_gates(after, native);
      CHECK(unitary::distance(unitary::circuit_matrix(after), unitary::circuit_matrix(before)) <=
            after.rounding + 1e-16L);
      CHECK(after.rounding <= 1e-11);
    }
  }
}

TEST_CASE("no two one-qubit gates follow each other on a qubit") {
  Random random(2);
  for (const Native native : natives) {
    for (int k = 0; k < 40; ++k) {
      Circuit circuit = random_circuit(random);
      for (Segment& segment : circuit.segments) segment.repeats = 1;
      std::vector<bool> turned(3, false);
      bool twice = false;
      for (const Segment& segment : lowered(circuit, native).segments) {
        for (const Gate& gate : segment.gates) {
          twice = twice || (!gate.two_qubit() && turned[gate.a]);
          turned[gate.a] = turned[gate.b] = !gate.two_qubit();
        }
      }
      CHECK_FALSE(twice);
    }
  }
}

TEST_CASE("the example of the pass") {
  const Circuit circuit =
      lowered(circuit_of(2, {{{{GateKind::canonical, 0, 1, {0.2, 0, 0}}}, 1}}), Native::cx);
  REQUIRE(circuit.segments.size() == 1);
  const std::vector<Gate>& gates = circuit.segments.front().gates;
  REQUIRE(gates.size() == 3);
  CHECK(gates[0].kind == GateKind::cx);
  CHECK(gates[1].kind == GateKind::rx);
  CHECK(gates[1].a == 0);
  CHECK(std::abs(gates[1].parameters[0] - 0.4) <= 1e-15);
  CHECK(gates[2].kind == GateKind::cx);
}

TEST_CASE("one-axis couplings are one gate where the device has their kind") {
  const auto coupling = [](double x, double z) {
    return circuit_of(2, {{{{GateKind::canonical, 0, 1, {x, 0, z}}}, 1}});
  };
  for (const auto& [native, circuit] :
       {std::pair(Native::rzz, coupling(0, 0.2)), std::pair(Native::rxx, coupling(0.2, 0))}) {
    const CircuitCounts counts = count(lowered(circuit, native));
    CHECK(counts.two_qubit_gates == 1);
    CHECK(counts.one_qubit_gates == 0);
  }
}

TEST_CASE("a circuit that cancels is empty and keeps its phase") {
  const Circuit circuit =
      lowered(circuit_of(2, {{{synthesis::turn_gate(0, {-1, 0, 0, 0})}, 3}}), Native::cx);
  CHECK(circuit.segments.empty());
  CHECK(std::abs(std::remainder(circuit.global_phase - (0.3 + pi), 2 * pi)) <= 1e-15);
}
