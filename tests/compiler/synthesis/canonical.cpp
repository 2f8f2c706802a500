// The canonical gate in every native gate set: operator, phase, rounding, and how many entanglers.
#include "compiler/synthesis/canonical.hpp"

#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <numbers>
#include <string>
#include <vector>

#include "compiler/synthesis/turn.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using namespace farrier::synthesis;
using test::Random;
using unitary::Matrix;
using unitary::Real;

namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Native, 6> natives = {Native::cx,    Native::cz,  Native::ecr,
                                           Native::iswap, Native::rzz, Native::rxx};
constexpr std::array<GateKind, 6> kinds = {GateKind::cx,    GateKind::cz,  GateKind::ecr,
                                           GateKind::iswap, GateKind::rzz, GateKind::rxx};
constexpr std::array<Native, 3> cx_like = {Native::cx, Native::cz, Native::ecr};

/// A comparison of two matrices in extended precision may itself be wrong by this.
constexpr Real reference_error = 1e-17L;

GateKind kind_of(Native native) {
  return kinds[static_cast<std::size_t>(native)];
}

Matrix canonical_matrix(const Coordinates& c, std::uint32_t first = 0, std::uint32_t second = 1) {
  const Gate gate{GateKind::canonical, first, second, {c[0], c[1], c[2]}};
  return unitary::gates_matrix(2, std::array{gate});
}

Matrix matrix(const Sequence& sequence) {
  return unitary::gates_matrix(2, sequence.gates, sequence.phase);
}

int two_qubit_gates(const Sequence& sequence) {
  int count = 0;
  for (const Gate& gate : sequence.gates) count += gate.two_qubit() ? 1 : 0;
  return count;
}

void check_gates(const Sequence& sequence, Native native) {
  for (const Gate& gate : sequence.gates) {
    if (!gate.two_qubit()) {
      CHECK(gate.kind == GateKind::turn);
      continue;
    }
    CHECK(gate.kind == kind_of(native));
    CHECK(std::abs(gate.parameters[0]) <= pi);
  }
}

void check_canonical(const Coordinates& c, Native native) {
  INFO("native " << static_cast<int>(native) << ", " << c[0] << " " << c[1] << " " << c[2]);
  for (const auto& [first, second] : {std::array{0U, 1U}, std::array{1U, 0U}}) {
    const Sequence sequence = canonical_sequence(first, second, c, native);
    check_gates(sequence, native);
    CHECK(two_qubit_gates(sequence) == entanglers(c, native));
    CHECK(unitary::distance(matrix(sequence), canonical_matrix(c, first, second)) <=
          sequence.rounding + reference_error);
  }
}

/// Coordinates at and beside the corners of the chamber, in every sign.
std::vector<double> special_values() {
  std::vector<double> values = {0.0, 1e-9, 1e-13, 5e-15, 1e-16, 0.3};
  for (int k = 1; k <= 8; ++k) values.push_back(k * pi / 4);
  for (const double near : {1e-15, 1e-14, 1e-13, 1e-9}) {
    values.push_back(pi / 4 + near);
    values.push_back(pi / 4 - near);
    values.push_back(pi / 2 + near);
  }
  const std::size_t positive = values.size();
  for (std::size_t k = 1; k < positive; ++k) values.push_back(-values[k]);
  return values;
}

/// What reduced coordinates and flips stand for.
Matrix reduced_matrix(const Reduced& reduced) {
  std::vector<Gate> gates = {
      {GateKind::canonical,
       0,
       1,
       {reduced.coordinates[0], reduced.coordinates[1], reduced.coordinates[2]}}};
  constexpr std::array<Pauli, 3> letters = {Pauli::x, Pauli::y, Pauli::z};
  for (std::size_t k = 0; k < 3; ++k)
    if (reduced.flipped[k])
      for (const std::uint32_t qubit : {0U, 1U})
        gates.push_back(turn_gate(qubit, rotation(letters[k], pi)));
  return unitary::gates_matrix(2, gates, reduced.phase);
}

}  // namespace

TEST_CASE("reduce keeps the operator and brings coordinates into range") {
  Random draw(1);
  for (int k = 0; k < 3000; ++k) {
    const double scale = std::array{1.0, 10.0, 1e3, 1e-9}[static_cast<std::size_t>(k % 4)];
    Coordinates c = {draw.between(-scale, scale), draw.between(-scale, scale),
                     draw.between(-scale, scale)};
    if (k % 5 == 0) c[0] = pick(draw, special_values());
    const Reduced reduced = reduce(c);
    for (const double value : reduced.coordinates) {
      CHECK(value > -pi / 4);
      CHECK(value <= pi / 4);
    }
    CHECK(reduced.rounding <= 3 * coordinate_snap + 2e-15);
    // Turns by pi are rounded, too: six of them at most.
    CHECK(unitary::distance(reduced_matrix(reduced), canonical_matrix(c)) <=
          reduced.rounding + 1e-15L);
  }
}

TEST_CASE("canonical_sequence is the canonical gate for random coordinates") {
  Random draw(2);
  for (const Native native : natives) {
    for (const double scale : {1.0, 1e-9, 1e3}) {
      for (int k = 0; k < 100; ++k) {
        const Coordinates c = {draw.between(-scale, scale), draw.between(-scale, scale),
                               draw.between(-scale, scale)};
        check_canonical(c, native);
      }
    }
  }
}

TEST_CASE("canonical_sequence is the canonical gate with one or two axes") {
  Random draw(3);
  for (const Native native : natives) {
    for (int mask = 0; mask < 8; ++mask) {
      for (int k = 0; k < 20; ++k) {
        Coordinates c{};
        for (std::size_t axis = 0; axis < 3; ++axis)
          if ((mask >> axis & 1) != 0) c[axis] = draw.between(-4, 4);
        check_canonical(c, native);
      }
    }
  }
}

TEST_CASE("canonical_sequence is the canonical gate at special coordinates") {
  Random draw(4);
  const std::vector<double> values = special_values();
  for (const Native native : natives) {
    for (const double value : values)
      for (std::size_t axis = 0; axis < 3; ++axis) {
        Coordinates c{};
        c[axis] = value;
        check_canonical(c, native);
      }
    for (int k = 0; k < 400; ++k)
      check_canonical({pick(draw, values), pick(draw, values), pick(draw, values)}, native);
  }
}

TEST_CASE("canonical_sequence is the canonical gate where coordinates nearly agree") {
  Random draw(5);
  for (const Native native : natives) {
    for (const double off : {0.0, 1e-16, 1e-12, 1e-8}) {
      for (int k = 0; k < 30; ++k) {
        const double value = draw.between(-2, 2);
        check_canonical({value, draw.chance(0.5) ? value + off : -value, value - off}, native);
      }
    }
  }
}

TEST_CASE("gates equivalent to cx take as many as they need: 3 - 2 - 1 - 0") {
  // Vidal, Dawson 2004, PRA 69, 010301; Vatan, Williams 2004, PRA 69, 032315: one where the only
  // coordinate is pi/4, two where one vanishes, three at most.
  for (const Native native : cx_like) {
    CHECK(entanglers({0, 0, 0}, native) == 0);
    CHECK(entanglers({0, pi / 2, 0}, native) == 0);
    CHECK(entanglers({pi / 2, -pi, 5 * pi / 2}, native) == 0);
    for (const double quarter : {pi / 4, -pi / 4, 3 * pi / 4}) {
      CHECK(entanglers({quarter, 0, 0}, native) == 1);
      CHECK(entanglers({0, quarter, pi / 2}, native) == 1);
      CHECK(entanglers({pi, 0, quarter}, native) == 1);
    }
    CHECK(entanglers({0.2, 0, 0}, native) == 2);
    CHECK(entanglers({0, 0.2, 0.1}, native) == 2);
    CHECK(entanglers({pi / 4, 0, pi / 4}, native) == 2);  // iswap
    CHECK(entanglers({pi / 4, pi / 8, 0}, native) == 2);
    CHECK(entanglers({0.3, 0.2, 0.1}, native) == 3);
    CHECK(entanglers({pi / 4, pi / 4, pi / 4}, native) == 3);  // swap
    CHECK(entanglers({0.1, 0.1, 0.1}, native) == 3);
  }
}

TEST_CASE("iswap and one-angle gates take as many as their rules say") {
  // iswap: common practice, no source; each count is realised above, matrix for matrix.
  CHECK(entanglers({0, 0, 0}, Native::iswap) == 0);
  CHECK(entanglers({pi / 4, pi / 4, 0}, Native::iswap) == 1);
  CHECK(entanglers({pi / 4, 0, -pi / 4}, Native::iswap) == 1);
  CHECK(entanglers({pi / 2, 3 * pi / 4, -pi / 4}, Native::iswap) == 1);
  CHECK(entanglers({0.3, 0, 0}, Native::iswap) == 2);
  CHECK(entanglers({pi / 4, 0, 0}, Native::iswap) == 2);
  CHECK(entanglers({0, 0.3, 0.2}, Native::iswap) == 2);
  CHECK(entanglers({0.3, 0.2, 0.1}, Native::iswap) == 3);
  for (const Native native : {Native::rzz, Native::rxx}) {
    CHECK(entanglers({0, pi / 2, 0}, native) == 0);
    CHECK(entanglers({0, 0, 0.3}, native) == 1);
    CHECK(entanglers({0.3, 0, pi / 4}, native) == 2);
    CHECK(entanglers({0.3, 0.2, 0.1}, native) == 3);
  }
}

TEST_CASE("cx_sequence is cx in every native gate") {
  constexpr std::array<int, 6> expected = {1, 1, 1, 2, 1, 1};
  for (const Native native : natives) {
    for (const auto& [control, target] : {std::array{0U, 1U}, std::array{1U, 0U}}) {
      INFO("native " << static_cast<int>(native));
      const Sequence sequence = cx_sequence(control, target, native);
      check_gates(sequence, native);
      CHECK(two_qubit_gates(sequence) == expected[static_cast<std::size_t>(native)]);
      const Gate cx{GateKind::cx, control, target, {}};
      CHECK(unitary::distance(matrix(sequence), unitary::gates_matrix(2, std::array{cx})) <=
            sequence.rounding + reference_error);
    }
  }
}

TEST_CASE("the identities that the decompositions rest on") {
  const auto product = [](const std::vector<Gate>& gates, Real phase) {
    return unitary::gates_matrix(2, gates, phase);
  };
  const auto turn = [](std::uint32_t qubit, Pauli letter, double angle) {
    return turn_gate(qubit, rotation(letter, angle));
  };
  const auto pair = [](GateKind kind) { return Gate{kind, 0, 1, {}}; };
  const auto zx = unitary::string_matrix(2, std::array{Factor(0, Pauli::z), Factor(1, Pauli::x)});
  const auto zy = unitary::string_matrix(2, std::array{Factor(0, Pauli::z), Factor(1, Pauli::y)});
  const auto yz = unitary::string_matrix(2, std::array{Factor(0, Pauli::y), Factor(1, Pauli::z)});
  const auto zz = unitary::string_matrix(2, std::array{Factor(0, Pauli::z), Factor(1, Pauli::z)});

  // exp(-i pi/4 ZX) = e^(i pi/4) rz_a(pi/2) rx_b(pi/2) CX
  CHECK(unitary::distance(
            unitary::evolution(zx, unitary::pi / 4),
            product({pair(GateKind::cx), turn(0, Pauli::z, pi / 2), turn(1, Pauli::x, pi / 2)},
                    unitary::pi / 4)) <= 1e-15L);
  // exp(-i (a XX + c ZZ)) = CX (rx(2a) (x) rz(2c)) CX
  CHECK(unitary::distance(canonical_matrix({0.3, 0, 0.7}),
                          product({pair(GateKind::cx), turn(0, Pauli::x, 0.6),
                                   turn(1, Pauli::z, 1.4), pair(GateKind::cx)},
                                  0)) <= 1e-15L);
  // iswap = SWAP CZ (S (x) S), SWAP as three cx
  CHECK(unitary::distance(product({pair(GateKind::iswap)}, 0), product({{GateKind::s, 0, 0, {}},
                                                                        {GateKind::s, 1, 1, {}},
                                                                        pair(GateKind::cz),
                                                                        pair(GateKind::cx),
                                                                        {GateKind::cx, 1, 0, {}},
                                                                        pair(GateKind::cx)},
                                                                       0)) <= 1e-17L);
  // W rx_a(p) rx_b(q) W = exp(-i p/2 ZY) exp(-i q/2 YZ) Z_a Z_b
  const Matrix two_iswaps = product({pair(GateKind::iswap), turn(0, Pauli::x, 0.6),
                                     turn(1, Pauli::x, 1.4), pair(GateKind::iswap)},
                                    0);
  CHECK(unitary::distance(two_iswaps, unitary::evolution(zy, 0.3L) * unitary::evolution(yz, 0.7L) *
                                          zz) <= 1e-15L);
}
