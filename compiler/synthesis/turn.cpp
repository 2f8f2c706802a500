// One-qubit rotations as unit quaternions, and their names.
#include "compiler/synthesis/turn.hpp"

#include <array>
#include <cmath>
#include <numbers>

namespace farrier::synthesis {
namespace {

constexpr double pi = std::numbers::pi;
constexpr double half = std::numbers::sqrt2 / 2;

/// Gates without angle, as gate = exp(-i phase) * turn.
struct FixedGate {
  GateKind kind;
  Turn turn;
  double phase;  ///< turn = exp(i phase) * gate
};

// X = i * (turn by pi about x), and so on; S = e^(i pi/4) rz(pi/2); SX = e^(i pi/4) rx(pi/2).
constexpr std::array<FixedGate, 7> fixed_gates = {{
    {GateKind::h, {0, half, 0, half}, -pi / 2},
    {GateKind::x, {0, 1, 0, 0}, -pi / 2},
    {GateKind::y, {0, 0, 1, 0}, -pi / 2},
    {GateKind::z, {0, 0, 0, 1}, -pi / 2},
    {GateKind::s, {half, 0, 0, half}, -pi / 4},
    {GateKind::sdg, {half, 0, 0, -half}, pi / 4},
    {GateKind::sx, {half, half, 0, 0}, -pi / 4},
}};

/// Spectral distance: the 2-norm of the difference of the quaternions.
double distance(const Turn& a, const Turn& b) {
  return std::hypot(std::hypot(a.w - b.w, a.x - b.x), std::hypot(a.y - b.y, a.z - b.z));
}

/// Of the components and phases of gates without angle, and of the distance from them.
constexpr double fixed_rounding = 4e-16;

/// Of one printed angle up to 2 pi, arc tangent and reduction included.
constexpr double angle_rounding = 2e-15;

Turn negated(const Turn& t) {
  return {-t.w, -t.x, -t.y, -t.z};
}

Gate one_qubit_gate(GateKind kind, std::uint32_t qubit, std::array<double, 4> parameters = {}) {
  return {kind, qubit, qubit, parameters};
}

/// An angle brought into (-pi, pi].
double reduced(double angle) {
  const double value = std::remainder(angle, 2 * pi);
  return value <= -pi ? pi : value;
}

}  // namespace

Turn rotation(Pauli letter, double angle) {
  const double c = std::cos(angle / 2);
  const double s = std::sin(angle / 2);
  switch (letter) {
    case Pauli::x:
      return {c, s, 0, 0};
    case Pauli::y:
      return {c, 0, s, 0};
    case Pauli::z:
      return {c, 0, 0, s};
    case Pauli::i:
      break;
  }
  return {};
}

Turn compose(const Turn& a, const Turn& b) {
  Turn t{
      a.w * b.w - a.x * b.x - a.y * b.y - a.z * b.z, a.w * b.x + a.x * b.w + a.y * b.z - a.z * b.y,
      a.w * b.y - a.x * b.z + a.y * b.w + a.z * b.x, a.w * b.z + a.x * b.y - a.y * b.x + a.z * b.w};
  const double norm = std::sqrt(t.w * t.w + t.x * t.x + t.y * t.y + t.z * t.z);
  return {t.w / norm, t.x / norm, t.y / norm, t.z / norm};
}

Turn inverse(const Turn& t) {
  return {t.w, -t.x, -t.y, -t.z};
}

Turn power(const Turn& turn, std::uint64_t n) {
  // By the angle, whose error grows with n but not with the number of multiplications.
  const double sine = std::sqrt(turn.x * turn.x + turn.y * turn.y + turn.z * turn.z);
  if (sine == 0.0) return {n % 2 == 0 || turn.w > 0 ? 1.0 : -1.0, 0, 0, 0};
  const double angle = static_cast<double>(n) * std::atan2(sine, turn.w);
  const double scale = std::sin(angle) / sine;
  return {std::cos(angle), turn.x * scale, turn.y * scale, turn.z * scale};
}

Turn from_z(Pauli letter) {
  switch (letter) {
    case Pauli::x:
      return {0, half, 0, half};  // the Hadamard gate up to phase
    case Pauli::y:
      return {half, -half, 0, 0};
    case Pauli::z:
    case Pauli::i:
      break;
  }
  return {};
}

Gate turn_gate(std::uint32_t qubit, const Turn& turn) {
  return one_qubit_gate(GateKind::turn, qubit, {turn.w, turn.x, turn.y, turn.z});
}

Turn turn_of(const Gate& gate) {
  return {gate.parameters[0], gate.parameters[1], gate.parameters[2], gate.parameters[3]};
}

double distance_from_identity(const Turn& turn) {
  // Eigenvalues exp(-+i a) with cos a = w; |exp(i a) - 1| = 2 |sin(a/2)|, from the sine for
  // accuracy.
  const double sine = std::sqrt(turn.x * turn.x + turn.y * turn.y + turn.z * turn.z);
  return 2 * std::abs(std::sin(std::atan2(sine, turn.w) / 2));
}

NamedTurn name_turn(std::uint32_t qubit, const Turn& turn) {
  const Turn minus = negated(turn);
  const Turn identity;
  if (const double d = distance(turn, identity); d <= snap) return {{}, 0.0, d};
  if (const double d = distance(minus, identity); d <= snap) return {{}, pi, d + fixed_rounding};
  for (const FixedGate& fixed : fixed_gates) {
    if (const double d = distance(turn, fixed.turn); d <= snap)
      return {{one_qubit_gate(fixed.kind, qubit)}, fixed.phase, d + fixed_rounding};
    if (const double d = distance(minus, fixed.turn); d <= snap)
      return {{one_qubit_gate(fixed.kind, qubit)}, reduced(fixed.phase + pi), d + fixed_rounding};
  }
  // exp(-i angle/2 P); an angle past pi is brought back by 2 pi, which costs a sign.
  const auto about = [&](GateKind kind, double sine, double left_out) -> NamedTurn {
    const double angle = 2 * std::atan2(sine, turn.w);
    const double inside = reduced(angle);
    return {{one_qubit_gate(kind, qubit, {inside})},
            std::abs(angle - inside) > 1.0 ? pi : 0.0,
            left_out + angle_rounding};
  };
  const double not_x = std::hypot(turn.y, turn.z);
  const double not_y = std::hypot(turn.x, turn.z);
  const double not_z = std::hypot(turn.x, turn.y);
  if (not_x <= snap) return about(GateKind::rx, turn.x, not_x);
  if (not_y <= snap) return about(GateKind::ry, turn.y, not_y);
  if (not_z <= snap) return about(GateKind::rz, turn.z, not_z);
  // rz(phi) ry(theta) rz(lambda): w - i z = cos(theta/2) e^(-i (phi + lambda)/2) and
  // y - i x = sin(theta/2) e^(i (phi - lambda)/2), up to the sign of x. U is that product times
  // exp(i (theta + phi + lambda)/2) (OpenQASM 3, built-in gates).
  const double theta = 2 * std::atan2(std::hypot(turn.x, turn.y), std::hypot(turn.w, turn.z));
  const double half_sum = std::atan2(turn.z, turn.w);
  const double half_difference = std::atan2(-turn.x, turn.y);
  const double phi = half_sum + half_difference;
  const double lambda = half_sum - half_difference;
  const double phase = -(theta + phi + lambda) / 2;
  // U has period 2 pi in each angle, so only the printed angles are reduced.
  return {{one_qubit_gate(GateKind::u, qubit, {theta, reduced(phi), reduced(lambda)})},
          reduced(phase),
          3 * angle_rounding};
}

}  // namespace farrier::synthesis
