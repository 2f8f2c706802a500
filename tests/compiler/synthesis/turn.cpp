// One-qubit rotations and their names against 2 x 2 matrices in extended precision.
#include "compiler/synthesis/turn.hpp"

#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <numbers>
#include <string>
#include <utility>
#include <vector>

#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using namespace farrier::synthesis;
using test::Random;
using unitary::Matrix;
using unitary::Real;

namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Pauli, 3> letters = {Pauli::x, Pauli::y, Pauli::z};

/// What a comparison of two matrices in extended precision may itself be wrong by.
constexpr Real reference_error = 1e-17L;

Matrix letter_matrix(Pauli letter) {
  return unitary::string_matrix(1, std::array{Factor(0, letter)});
}

Matrix matrix(const Turn& turn) {
  return unitary::gate_matrix(turn_gate(0, turn));
}

/// The unitary nearest to a turn whose components were rounded.
Matrix unit_matrix(const Turn& turn) {
  const Matrix m = matrix(turn);
  return m / std::sqrt(std::real(m.determinant()));
}

Turn random_turn(Random& draw) {
  Turn turn{draw.between(-1, 1), draw.between(-1, 1), draw.between(-1, 1), draw.between(-1, 1)};
  return compose(turn, {});
}

Real naming_distance(const Turn& turn, const NamedTurn& named) {
  return unitary::distance(unitary::gates_matrix(1, named.gates, named.phase), unit_matrix(turn));
}

/// What naming must keep: the operator within the stated rounding, one gate at most, angles in
/// range.
void check_name(const Turn& turn) {
  const NamedTurn named = name_turn(0, turn);
  CHECK(named.gates.size() <= 1);
  CHECK(naming_distance(turn, named) <= named.rounding + reference_error);
  CHECK(named.rounding <= 2e-14);
  CHECK(std::abs(named.phase) <= pi);
  for (const Gate& gate : named.gates) {
    REQUIRE(gate.kind != GateKind::turn);
    for (int k = 0; k < gate_info(gate.kind).parameters; ++k) {
      CHECK(gate.parameters[static_cast<std::size_t>(k)] > -pi);
      CHECK(gate.parameters[static_cast<std::size_t>(k)] <= pi);
    }
  }
}

/// The turns that some gates of stdgates.inc are up to a phase, with the gate's name.
const std::vector<std::pair<std::string, Turn>>& turns_with_names() {
  static const double half = std::numbers::sqrt2 / 2;
  static const std::vector<std::pair<std::string, Turn>> turns = {
      {"h", {0, half, 0, half}}, {"x", {0, 1, 0, 0}},       {"y", {0, 0, 1, 0}},
      {"z", {0, 0, 0, 1}},       {"s", {half, 0, 0, half}}, {"sdg", {half, 0, 0, -half}},
      {"sx", {half, half, 0, 0}}};
  return turns;
}

std::string name_of(const Turn& turn) {
  const NamedTurn named = name_turn(0, turn);
  return named.gates.empty() ? "" : std::string(gate_info(named.gates.front().kind).name);
}

}  // namespace

TEST_CASE("rotation is the exponential of its letter") {
  Random draw(1);
  for (const Pauli letter : letters) {
    for (int k = 0; k < 50; ++k) {
      const double angle = draw.between(-20, 20);
      const Matrix expected = unitary::evolution(letter_matrix(letter), Real{angle} / 2);
      CHECK(unitary::distance(matrix(rotation(letter, angle)), expected) <= turn_rounding);
    }
  }
}

TEST_CASE("compose multiplies operators - the second argument acts first") {
  Random draw(2);
  for (int k = 0; k < 500; ++k) {
    const Turn a = random_turn(draw);
    const Turn b = random_turn(draw);
    CHECK(unitary::distance(matrix(compose(a, b)), unit_matrix(a) * unit_matrix(b)) <=
          turn_rounding);
  }
}

TEST_CASE("inverse gives the adjoint - without rounding") {
  Random draw(3);
  for (int k = 0; k < 100; ++k) {
    const Turn a = random_turn(draw);
    CHECK(unitary::distance(matrix(inverse(a)), matrix(a).adjoint()) == 0.0L);
  }
}

TEST_CASE("power is repeated multiplication within the rounding that it states") {
  Random draw(4);
  for (int k = 0; k < 4000; ++k) {
    const Turn turn = k % 2 == 0 ? random_turn(draw)
                                 : rotation(pick(draw, letters), draw.between(-2 * pi, 2 * pi));
    const std::uint64_t n = k % 3 == 0 ? k % 7 : 1 + below(draw, 1'000'000);
    const Circuit repeated{1, {{{turn_gate(0, turn)}, n}}, 0.0, 0.0, {}, {}};
    Matrix expected = unitary::circuit_matrix(repeated);
    expected /= std::sqrt(std::real(expected.determinant()));
    // Repeated squaring in extended precision is itself wrong by about n units of its last place.
    CHECK(unitary::distance(matrix(power(turn, n)), expected) <=
          power_rounding(n) + reference_error + 1e-18L * static_cast<Real>(n));
  }
}

TEST_CASE("power of the identity and of its negative is exact") {
  for (const std::uint64_t n : {std::uint64_t{0}, std::uint64_t{1}, std::uint64_t{2},
                                std::uint64_t{1} << 40U, (std::uint64_t{1} << 40U) + 1}) {
    CHECK(power({1, 0, 0, 0}, n).w == 1.0);
    CHECK(power({-1, 0, 0, 0}, n).w == (n % 2 == 0 ? 1.0 : -1.0));
  }
}

TEST_CASE("from_z takes Z to its letter") {
  for (const Pauli letter : letters) {
    const Matrix v = matrix(from_z(letter));
    CHECK(unitary::distance(v * letter_matrix(Pauli::z) * v.adjoint(), letter_matrix(letter)) <=
          turn_rounding);
  }
}

TEST_CASE("a turn goes into a gate and comes back") {
  Random draw(5);
  const Turn turn = random_turn(draw);
  const Gate gate = turn_gate(3, turn);
  CHECK(gate.kind == GateKind::turn);
  CHECK_FALSE(gate.two_qubit());
  const Turn back = turn_of(gate);
  CHECK(std::array{back.w, back.x, back.y, back.z} == std::array{turn.w, turn.x, turn.y, turn.z});
}

TEST_CASE("distance_from_identity is the spectral distance") {
  Random draw(6);
  for (int k = 0; k < 300; ++k) {
    Turn turn = random_turn(draw);
    if (k % 3 == 0) turn = rotation(pick(draw, letters), draw.between(-1e-12, 1e-12));
    const Real expected = unitary::distance(unit_matrix(turn), Matrix::Identity(2, 2));
    CHECK(std::abs(static_cast<Real>(distance_from_identity(turn)) - expected) <=
          1e-15L * expected);
  }
}

TEST_CASE("gates without angle are named - whatever the sign of the turn") {
  for (const auto& [name, turn] : turns_with_names()) {
    INFO(name);
    for (const Turn& either : {turn, Turn{-turn.w, -turn.x, -turn.y, -turn.z}}) {
      CHECK(name_of(either) == name);
      check_name(either);
    }
  }
}

TEST_CASE("the identity and its negative take no gate") {
  const NamedTurn plus = name_turn(0, {1, 0, 0, 0});
  CHECK(plus.gates.empty());
  CHECK(plus.phase == 0.0);
  CHECK(plus.rounding == 0.0);
  const NamedTurn minus = name_turn(0, {-1, 0, 0, 0});
  CHECK(minus.gates.empty());
  CHECK(std::abs(minus.phase) == pi);
  check_name({-1, 0, 0, 0});
}

TEST_CASE("rotations about an axis are named after it") {
  Random draw(7);
  const std::array<std::string, 3> names = {"rx", "ry", "rz"};
  for (std::size_t axis = 0; axis < 3; ++axis) {
    std::vector<double> angles = {0.1, -0.1, pi / 4, -pi / 4, 3 * pi / 4, 3.0, -3.0, 4.0, -5.0};
    for (int k = 0; k < 200; ++k) angles.push_back(draw.between(-20, 20));
    for (const double angle : angles) {
      const Turn turn = rotation(letters[axis], angle);
      INFO(names[axis] << " " << angle);
      CHECK(name_of(turn) == names[axis]);
      check_name(turn);
    }
  }
  // No gate of the table without angle is this one.
  CHECK(name_of(rotation(Pauli::x, -pi / 2)) == "rx");
  CHECK(name_of(rotation(Pauli::y, pi / 2)) == "ry");
}

TEST_CASE("multiples of a quarter turn about any axis keep operator and phase") {
  for (const Pauli letter : letters)
    for (int k = -16; k <= 16; ++k) check_name(rotation(letter, k * pi / 4));
}

TEST_CASE("other turns become the built-in U") {
  Random draw(8);
  for (int k = 0; k < 3000; ++k) {
    const Turn turn = random_turn(draw);
    CHECK(name_of(turn) == "U");
    check_name(turn);
  }
}

TEST_CASE("all products of quarter turns are named within their rounding") {
  // The Clifford group on one qubit, with signs: each element as a product of a few quarter turns.
  for (int code = 0; code < 6 * 6 * 6 * 6; ++code) {
    Turn turn;
    for (int rest = code, k = 0; k < 4; ++k, rest /= 6)
      turn = compose(
          rotation(letters[static_cast<std::size_t>(rest % 3)], rest % 6 < 3 ? pi / 2 : -pi / 2),
          turn);
    check_name(turn);
  }
}

TEST_CASE("turns beside those of a shorter name keep the rounding that is stated") {
  Random draw(9);
  for (const double scale : {1e-17, 1e-16, 1e-15, 3e-15, 5e-15, 1e-14, 1e-12, 1e-8}) {
    for (int k = 0; k < 100; ++k) {
      Turn base = rotation(pick(draw, letters), draw.between(-7, 7));
      if (k % 2 == 0) base = pick(draw, turns_with_names()).second;
      if (k % 4 == 1) base = draw.chance(0.5) ? Turn{} : Turn{-1, 0, 0, 0};
      check_name(
          compose({base.w + draw.between(-scale, scale), base.x + draw.between(-scale, scale),
                   base.y + draw.between(-scale, scale), base.z + draw.between(-scale, scale)},
                  {}));
    }
  }
}
