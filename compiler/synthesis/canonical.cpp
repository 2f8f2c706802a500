// The canonical two-qubit gate exp(-i (a XX + b YY + c ZZ)) in native two-qubit gates.
//
// Identities used, each checked as matrices in tests/compiler/synthesis/canonical.cpp:
//   exp(-i pi/4 Z_a X_b) = e^(i pi/4) rz_a(pi/2) rx_b(pi/2) CX_ab
//   exp(-i (a XX + c ZZ)) = CX (rx(2a) (x) rz(2c)) CX
//   three coordinates: Vatan, Williams 2004, PRA 69, 032315 (circuit recomputed)
//   W = iswap = SWAP CZ (S (x) S),  W rx_a(p) rx_b(q) W = exp(-i p/2 ZY) exp(-i q/2 YZ) Z_a Z_b
#include "compiler/synthesis/canonical.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <utility>

#include "compiler/synthesis/turn.hpp"

namespace farrier::synthesis {
namespace {

constexpr double pi = std::numbers::pi;
constexpr std::array<Pauli, 3> axes = {Pauli::x, Pauli::y, Pauli::z};

/// What pi/2 is more than the nearest double: many turns are taken off in twice the precision.
constexpr double half_pi_rest = 6.123233995736766e-17;
/// Of a coordinate and of the phase where turns are taken off.
constexpr double turns_rounding = 6e-16;

/// One product of a letter with a turn by pi about it: P = i * turn.
Turn half_turn(Pauli letter) {
  return rotation(letter, pi);
}

/// Collects gates, with native two-qubit gates standing in for cx.
class Builder {
 public:
  Builder(std::uint32_t a, std::uint32_t b, Native native) : a_(a), b_(b), native_(native) {}

  void turn_a(const Turn& t) { result_.gates.push_back(turn_gate(a_, t)); }
  void turn_b(const Turn& t) { result_.gates.push_back(turn_gate(b_, t)); }
  void turn_both(const Turn& t) {
    turn_a(t);
    turn_b(t);
  }
  void phase(double radians) { result_.phase += radians; }
  void exchange_qubits() { std::swap(a_, b_); }

  void native_gate(double angle = 0.0) {
    static constexpr std::array<GateKind, 6> kinds = {
        GateKind::cx, GateKind::cz, GateKind::ecr, GateKind::iswap, GateKind::rzz, GateKind::rxx};
    result_.gates.push_back({kinds[static_cast<std::size_t>(native_)], a_, b_, {angle}});
  }

  /// cx with control a, for the natives that are one cx up to turns.
  void cx() {
    if (native_ == Native::cz) {
      turn_b(from_z(Pauli::x));
      native_gate();
      turn_b(inverse(from_z(Pauli::x)));
    } else if (native_ == Native::ecr) {
      // ecr = X_a exp(-i pi/4 ZX) and cx = e^(-i pi/4) rz_a(-pi/2) rx_b(-pi/2) exp(-i pi/4 ZX).
      native_gate();
      turn_a(compose(rotation(Pauli::z, -pi / 2), half_turn(Pauli::x)));
      turn_b(rotation(Pauli::x, -pi / 2));
      phase(pi / 2 - pi / 4);
    } else {
      native_gate();
    }
  }

  /// exp(-i angle/2 P P) by one gate of a device with rzz or rxx.
  void axis_rotation(Pauli axis, double angle) {
    const Turn from_native =
        native_ == Native::rzz ? Turn{} : inverse(from_z(Pauli::x));  // native axis to z
    const Turn v = compose(from_z(axis), from_native);
    turn_both(inverse(v));
    native_gate(angle);
    turn_both(v);
  }

  Sequence take() {
    result_.rounding += turn_rounding * static_cast<double>(result_.gates.size());
    return std::move(result_);
  }

 private:
  std::uint32_t a_;
  std::uint32_t b_;
  Native native_;
  Sequence result_;
};

/// exp(-i pi/4 P P): one cx.
void one_cx(Builder& build, Pauli axis) {
  const Turn to_axis_a = from_z(axis);
  const Turn to_axis_b = compose(from_z(axis), inverse(from_z(Pauli::x)));
  build.turn_a(inverse(to_axis_a));
  build.turn_b(inverse(to_axis_b));
  build.cx();
  build.turn_a(compose(to_axis_a, rotation(Pauli::z, pi / 2)));
  build.turn_b(compose(to_axis_b, rotation(Pauli::x, pi / 2)));
  build.phase(pi / 4);
}

/// The turn that takes X and Z to the two axes other than `zero`, up to signs.
Turn frame_without(std::size_t zero) {
  if (zero == 0) return rotation(Pauli::z, pi / 2);   // X to Y
  if (zero == 2) return rotation(Pauli::x, -pi / 2);  // Z to Y
  return {};
}

void two_cx(Builder& build, const Coordinates& c, std::size_t zero) {
  const Turn frame = frame_without(zero);
  const double along_x = c[zero == 0 ? 1 : 0];
  const double along_z = c[zero == 2 ? 1 : 2];
  build.turn_both(inverse(frame));
  build.cx();
  build.turn_a(rotation(Pauli::x, 2 * along_x));
  build.turn_b(rotation(Pauli::z, 2 * along_z));
  build.cx();
  build.turn_both(frame);
}

/// exp(-i (a XX + b YY + c ZZ)) = e^(i pi/4) times this circuit.
void three_cx(Builder& build, const Coordinates& c) {
  build.turn_b(rotation(Pauli::z, pi / 2));
  build.exchange_qubits();
  build.cx();
  build.exchange_qubits();
  build.turn_a(rotation(Pauli::z, pi / 2 + 2 * c[2]));
  build.turn_b(rotation(Pauli::y, pi / 2 + 2 * c[0]));
  build.cx();
  build.turn_b(rotation(Pauli::y, -pi / 2 - 2 * c[1]));
  build.exchange_qubits();
  build.cx();
  build.exchange_qubits();
  build.turn_a(rotation(Pauli::z, -pi / 2));
  build.phase(pi / 4);
}

/// exp(-i pi/4 (P P + Q Q)) = W (Z (x) Z) in the frame that takes X, Y to P, Q.
void one_iswap(Builder& build, std::size_t zero) {
  // Frames that take Z to the axis left out: X and Y then go to the other two.
  const Turn frame = from_z(axes[zero]);
  build.turn_both(compose(half_turn(Pauli::z), inverse(frame)));
  build.native_gate();
  build.turn_both(frame);
  build.phase(pi);  // Z (x) Z = (i turn) (x) (i turn)
}

void two_iswaps(Builder& build, const Coordinates& c, std::size_t zero) {
  // In the frame of rx_b(pi/2), ZY becomes ZZ and YZ becomes -YY.
  const Turn frame = zero == 0   ? Turn{}
                     : zero == 1 ? rotation(Pauli::z, pi / 2)   // Y to X, up to sign
                                 : rotation(Pauli::y, pi / 2);  // Z to X, Y stays
  const double along_y = c[zero == 1 ? 0 : 1];
  const double along_z = c[zero == 2 ? 0 : 2];
  build.turn_both(inverse(frame));
  build.turn_b(rotation(Pauli::x, -pi / 2));
  build.turn_both(half_turn(Pauli::z));
  build.phase(pi);
  build.native_gate();
  build.turn_a(rotation(Pauli::x, 2 * along_z));
  build.turn_b(rotation(Pauli::x, -2 * along_y));
  build.native_gate();
  build.turn_b(rotation(Pauli::x, pi / 2));
  build.turn_both(frame);
}

/// Three iswaps are three cz and one SWAP up to turns, and U(a, b, c) = e^(i pi/4)
/// U(a + pi/4, b + pi/4, c + pi/4) SWAP; so the circuit of the right-hand side, its cz replaced and
/// its qubits exchanged after each, is the left-hand side on exchanged qubits.
Sequence three_iswaps(std::uint32_t a, std::uint32_t b, const Coordinates& c) {
  Builder cz_build(b, a, Native::cz);
  three_cx(cz_build, {c[0] + pi / 4, c[1] + pi / 4, c[2] + pi / 4});
  const Sequence with_cz = cz_build.take();
  Sequence result;
  result.phase = with_cz.phase + pi / 4;
  result.rounding = with_cz.rounding;
  bool exchanged = false;
  const auto place = [&](std::uint32_t qubit) { return exchanged ? a + b - qubit : qubit; };
  for (const Gate& gate : with_cz.gates) {
    if (gate.kind == GateKind::turn) {
      result.gates.push_back(turn_gate(place(gate.a), turn_of(gate)));
      continue;
    }
    // cz = SWAP W (Sdg (x) Sdg), Sdg = e^(-i pi/4) rz(-pi/2).
    result.gates.push_back(turn_gate(a, rotation(Pauli::z, -pi / 2)));
    result.gates.push_back(turn_gate(b, rotation(Pauli::z, -pi / 2)));
    result.gates.push_back({GateKind::iswap, a, b, {}});
    result.phase -= pi / 2;
    exchanged = !exchanged;
  }
  return result;
}

bool is_quarter(double coordinate) {
  return coordinate == pi / 4;
}

/// The index of a coordinate that is 0, or 3; that of YY if there is a choice, for it needs no
/// frame.
std::size_t zero_axis(const Coordinates& c) {
  if (c[1] == 0.0) return 1;
  return static_cast<std::size_t>(std::ranges::find(c, 0.0) - c.begin());
}

int nonzero(const Coordinates& c) {
  return static_cast<int>(3 - std::ranges::count(c, 0.0));
}

int quarters(const Coordinates& c) {
  return static_cast<int>(std::ranges::count_if(c, is_quarter));
}

int entanglers_of_reduced(const Coordinates& c, Native native) {
  const int count = nonzero(c);
  switch (native) {
    case Native::rzz:
    case Native::rxx:
      return count;
    case Native::iswap:
      if (count == 0) return 0;
      if (count == 3) return 3;
      return count == 2 && quarters(c) == 2 ? 1 : 2;
    case Native::cx:
    case Native::cz:
    case Native::ecr:
      return count == 1 && quarters(c) == 1 ? 1 : (count == 1 ? 2 : count);
  }
  return 3;
}

void apply_flips(Builder& build, const Reduced& reduced) {
  build.phase(reduced.phase);
  Turn flips;
  for (std::size_t k = 0; k < 3; ++k)
    if (reduced.flipped[k]) flips = compose(half_turn(axes[k]), flips);
  build.turn_both(flips);
}

}  // namespace

Reduced reduce(const Coordinates& coordinates) {
  Reduced result;
  for (std::size_t k = 0; k < 3; ++k) {
    double turns = std::round(coordinates[k] / (pi / 2));
    double rest = std::fma(-turns, half_pi_rest, std::fma(-turns, pi / 2, coordinates[k]));
    if (std::abs(rest + pi / 4) <= coordinate_snap) {
      turns -= 1;
      rest += pi / 2;
    }
    double snapped = rest;
    if (std::abs(rest) <= coordinate_snap) snapped = 0.0;
    if (std::abs(rest - pi / 4) <= coordinate_snap) snapped = pi / 4;
    result.rounding += std::abs(snapped - rest) + (turns != 0.0 ? turns_rounding : 0.0);
    result.coordinates[k] = snapped;
    // exp(-i m pi/2 PP) = (-i)^m (PP)^m, and P (x) P = -(turn (x) turn).
    const bool odd = std::remainder(turns, 2.0) != 0.0;
    result.flipped[k] = odd;
    result.phase += -std::remainder(turns, 4.0) * (pi / 2) + (odd ? pi : 0.0);
  }
  result.phase = std::remainder(result.phase, 2 * pi);
  return result;
}

int entanglers(const Coordinates& coordinates, Native native) {
  return entanglers_of_reduced(reduce(coordinates).coordinates, native);
}

Sequence canonical_sequence(std::uint32_t first, std::uint32_t second,
                            const Coordinates& coordinates, Native native) {
  const Reduced reduced = reduce(coordinates);
  const Coordinates& c = reduced.coordinates;
  const int count = entanglers_of_reduced(c, native);
  const std::size_t zero = zero_axis(c);
  Builder build(first, second, native);
  apply_flips(build, reduced);
  if (native == Native::rzz || native == Native::rxx) {
    for (std::size_t k = 0; k < 3; ++k)
      if (c[k] != 0.0) build.axis_rotation(axes[k], 2 * c[k]);
  } else if (native == Native::iswap) {
    if (count == 1) one_iswap(build, zero);
    if (count == 2) two_iswaps(build, c, zero);
    if (count == 3) {
      Sequence result = three_iswaps(first, second, c);
      Sequence flips = build.take();
      flips.gates.insert(flips.gates.end(), result.gates.begin(), result.gates.end());
      return {std::move(flips.gates), flips.phase + result.phase,
              flips.rounding + result.rounding + reduced.rounding};
    }
  } else {
    if (count == 1)
      one_cx(build,
             axes[static_cast<std::size_t>(std::ranges::find_if(c, is_quarter) - c.begin())]);
    if (count == 2) two_cx(build, c, zero);
    if (count == 3) three_cx(build, c);
  }
  Sequence result = build.take();
  result.rounding += reduced.rounding;
  return result;
}

Sequence cx_sequence(std::uint32_t control, std::uint32_t target, Native native) {
  Builder build(control, target, native);
  if (native != Native::iswap && native != Native::rzz && native != Native::rxx) {
    build.cx();
    return build.take();
  }
  // cx = e^(-i pi/4) rz_a(-pi/2) rx_b(-pi/2) exp(-i pi/4 ZX), and the turn of H takes ZZ to ZX.
  Sequence result = canonical_sequence(control, target, {0, 0, pi / 4}, native);
  const Turn h = from_z(Pauli::x);
  result.gates.insert(result.gates.begin(), turn_gate(target, inverse(h)));
  result.gates.push_back(turn_gate(control, rotation(Pauli::z, -pi / 2)));
  result.gates.push_back(turn_gate(target, compose(rotation(Pauli::x, -pi / 2), h)));
  result.phase -= pi / 4;
  return result;
}

}  // namespace farrier::synthesis
