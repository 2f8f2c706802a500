// The canonical two-qubit gate exp(-i (a XX + b YY + c ZZ)) in native two-qubit gates.
#pragma once

#include <array>
#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/job.hpp>
#include <vector>

namespace farrier::synthesis {

using Coordinates = std::array<double, 3>;

/// Coordinates each within (-pi/4, pi/4]; those within this of 0 or pi/4 are taken for it.
inline constexpr double coordinate_snap = 1e-14;

/// A canonical gate brought into the smallest coordinates: exp(-i sum coordinates_k P_k P_k) =
/// exp(i phase) * (product over flipped k of P_k (x) P_k as turns by pi) * exp(-i sum reduced_k
/// ...).
struct Reduced {
  Coordinates coordinates{};
  std::array<bool, 3> flipped{};
  double phase = 0.0;
  double rounding = 0.0;  ///< bound on what snapping and rounding changed
};
Reduced reduce(const Coordinates& coordinates);

/// How many two-qubit gates of a kind a canonical gate takes: for cx, cz and ecr as many as its
/// coordinates need, at most 3 (Vidal, Dawson 2004, PRA 69, 010301; Vatan, Williams 2004, PRA 69,
/// 032315); for iswap 1 where two coordinates are pi/4 and one is 0, 2 where one is 0, else 3; for
/// rzz and rxx one a coordinate that is not 0.
int entanglers(const Coordinates& coordinates, Native native);

/// Gates in time order; the operator that was asked for is exp(i phase) times their product, up to
/// a spectral distance of `rounding`.
struct Sequence {
  std::vector<Gate> gates;
  double phase = 0.0;
  double rounding = 0.0;
};

/// exp(-i (a XX + b YY + c ZZ)) on qubits (first, second) as turns and `native` gates.
Sequence canonical_sequence(std::uint32_t first, std::uint32_t second,
                            const Coordinates& coordinates, Native native);

/// A cx as turns and `native` gates.
Sequence cx_sequence(std::uint32_t control, std::uint32_t target, Native native);

}  // namespace farrier::synthesis
