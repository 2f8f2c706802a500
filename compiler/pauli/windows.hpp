// Norms of local sums from above, by exact eigenvalues on small windows of qubits.
#pragma once

#include <cstddef>
#include <cstdint>
#include <farrier/pauli.hpp>
#include <string>

namespace farrier::pauli {

/// Upper bounds on the ends of a spectrum: every eigenvalue lies in [-below, above].
struct SpectrumBound {
  double above = 0.0;
  double below = 0.0;
  std::string method;

  [[nodiscard]] double norm() const { return above > below ? above : below; }
  [[nodiscard]] double spread() const { return above + below; }
};

/// What window_bound may spend.
struct WindowLimits {
  std::size_t qubits = 8;   ///< of one window, at most 10
  double operations = 5e8;  ///< sum over windows of 8^qubits, above which windows get smaller
};

/// Splits the sum over windows W of qubits, A = sum_W A_W, each string shared equally by all
/// windows that hold it, and adds up the extreme eigenvalues of the A_W: lambda_max(A) <= sum
/// lambda_max(A_W) (P. W. Anderson 1951, Phys. Rev. 83, 1260, from memory, for ground states).
/// Exact where one window holds the whole sum. Strings on more qubits than a window are bounded by
/// anticommuting sets or their 1-norm. The rounding of the eigenvalues is added.
SpectrumBound window_bound(const PauliSum& sum, std::uint32_t qubits, const WindowLimits& limits);

}  // namespace farrier::pauli
