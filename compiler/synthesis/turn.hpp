// One-qubit rotations as unit quaternions.
#pragma once

#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/pauli.hpp>
#include <vector>

namespace farrier::synthesis {

/// The operator w 1 - i (x X + y Y + z Z), an element of SU(2): w^2 + x^2 + y^2 + z^2 = 1.
struct Turn {
  double w = 1.0;
  double x = 0.0;
  double y = 0.0;
  double z = 0.0;
};

/// exp(-i angle/2 letter); the letter is not the identity.
Turn rotation(Pauli letter, double angle);
/// The operator product `second` * `first`, normalised.
Turn compose(const Turn& second, const Turn& first);
Turn inverse(const Turn& turn);
/// The turn to the power of n.
Turn power(const Turn& turn, std::uint64_t n);
/// A turn V with V Z V^dag = letter.
Turn from_z(Pauli letter);

Gate turn_gate(std::uint32_t qubit, const Turn& turn);
Turn turn_of(const Gate& gate);

/// Spectral distance of a turn from the identity.
double distance_from_identity(const Turn& turn);

/// Rounding of one composition of turns: a bound on the spectral distance.
inline constexpr double turn_rounding = 1e-15;
/// The same for the n-th power: the angle and its multiple are rounded to at most 7e-16 n.
constexpr double power_rounding(std::uint64_t n) {
  return turn_rounding + 8e-16 * static_cast<double>(n);
}

/// A turn as at most one gate with a name in the text: turn = exp(i phase) * gate up to a spectral
/// distance of `rounding`. No gate at all where the turn is the identity up to its sign. A turn
/// whose components are within `snap` of those of a gate without angle, or of a rotation about an
/// axis, is taken for it.
struct NamedTurn {
  std::vector<Gate> gates;  ///< none or one
  double phase = 0.0;
  double rounding = 0.0;
};
NamedTurn name_turn(std::uint32_t qubit, const Turn& turn);
inline constexpr double snap = 4e-15;

}  // namespace farrier::synthesis
