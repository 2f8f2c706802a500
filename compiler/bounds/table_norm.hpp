// The norm that a question asks for, bounded from above.
#pragma once

#include <cmath>
#include <cstddef>

#include "compiler/bounds/models.hpp"
#include "compiler/pauli/norms.hpp"
#include "compiler/pauli/packed.hpp"
#include "compiler/pauli/windows.hpp"

namespace farrier::bounds {

/// Half the distance from 1 to the next double: the relative error of one rounding.
inline constexpr double unit_roundoff = 1.1102230246251566e-16;

/// Whole systems of at most so many qubits are diagonalised; larger ones by windows of fewer.
inline constexpr std::uint32_t whole_system_qubits = 8;
inline constexpr std::size_t window_qubits = 7;

/// Certified: the spectral norm, the least of several bounds; up to a global phase half the spread
/// of the spectrum, since any multiple of the identity may be taken off the generator of the error.
/// Average: the normalised Frobenius norm, sqrt(sum c^2), which is the root mean square over
/// Haar-random states (Zhao, Zhou, Shaw, Li, Childs 2022, arXiv:2111.04773).
template <std::size_t W>
pauli::NormBound table_norm(const pauli::Table<W>& sum, const Question& question) {
  if (question.assurance == Assurance::average)
    return {pauli::summed_up(sum.frobenius_norm(), sum.size()), "normalised Frobenius norm"};
  pauli::NormBound best{pauli::summed_up(sum.one_norm(), sum.size()), "1-norm"};
  if (sum.size() <= 1) return best;
  const std::uint32_t qubits = question.hamiltonian.qubits;
  PauliSum sparse;
  for (std::size_t k = 0; k < sum.size(); ++k)
    sparse.add(pauli::unpack(sum.string(k)), sum.coefficient(k));
  const pauli::WindowLimits limits{qubits <= whole_system_qubits ? qubits : window_qubits};
  const pauli::SpectrumBound spectrum = pauli::window_bound(sparse, qubits, limits);
  const double windows = question.up_to_phase ? spectrum.spread() / 2 : spectrum.norm();
  if (windows < best.value) best = {windows, spectrum.method};
  return best;
}

}  // namespace farrier::bounds
