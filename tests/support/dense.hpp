// Dense matrices for tests: Pauli sums and product formulas computed the plain way with Eigen, in
// double and, where an error is too small for that, in long double.
#pragma once

#include <complex>
#include <cstddef>
#include <cstdint>
#include <farrier/formula.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/pauli.hpp>
#include <farrier/plan.hpp>
#include <map>
#include <span>
#include <utility>
#include <vector>

#include "compiler/base/eigen.hpp"
#include "compiler/pauli/packed.hpp"

namespace farrier::test {

template <typename Real>
using Matrix = Eigen::Matrix<std::complex<Real>, Eigen::Dynamic, Eigen::Dynamic>;

/// The Kronecker product of a string's letters, qubit 0 leftmost.
template <typename Real>
Matrix<Real> dense(std::span<const Factor> string, std::uint32_t qubits);
/// With the constant.
template <typename Real>
Matrix<Real> dense(const PauliSum& sum, std::uint32_t qubits);
template <typename Real>
Matrix<Real> dense(const Hamiltonian& hamiltonian, const Layer& layer);

template <typename Real, std::size_t W>
Matrix<Real> dense(const pauli::Table<W>& sum, std::uint32_t qubits) {
  Matrix<Real> total = Matrix<Real>::Zero(1 << qubits, 1 << qubits);
  for (std::size_t k = 0; k < sum.size(); ++k)
    total += dense<Real>(pauli::unpack(sum.string(k)), qubits) *
             std::complex<Real>(static_cast<Real>(sum.coefficient(k)));
  return total;
}

/// D_A(B) = -i [A, B].
template <typename Real>
Matrix<Real> commutator(const Matrix<Real>& a, const Matrix<Real>& b) {
  return std::complex<Real>(0, -1) * (a * b - b * a);
}

/// The largest singular value.
template <typename Real>
Real spectral_norm(const Matrix<Real>& matrix);
/// ||M||_F / sqrt(dimension), 1 for every unitary.
template <typename Real>
Real normalised_frobenius_norm(const Matrix<Real>& matrix);
/// min over phi of ||A - e^(i phi) B|| for unitary A and B: with the eigenphases of B^dag A in an arc
/// of width w, 2 sin(w / 4).
template <typename Real>
Real distance_up_to_phase(const Matrix<Real>& a, const Matrix<Real>& b);
template <typename Real>
Matrix<Real> power(Matrix<Real> matrix, std::uint64_t exponent);

/// A Hermitian matrix taken to its eigenbasis, so that it can be exponentiated at any time.
template <typename Real>
class Spectrum {
 public:
  explicit Spectrum(const Matrix<Real>& hermitian);
  /// exp(-i time M)
  [[nodiscard]] Matrix<Real> exponential(Real time) const;
  /// The spectral norm.
  [[nodiscard]] Real norm() const;

 private:
  Eigen::SelfAdjointEigenSolver<Matrix<Real>> solver_;
};

/// The evolution under H and its product formulas over a layering.
template <typename Real>
class Evolution {
 public:
  Evolution(const Hamiltonian& hamiltonian, const Layering& layering);
  /// exp(-i H time)
  [[nodiscard]] Matrix<Real> exact(Real time) const { return whole_.exponential(time); }
  /// S(time / steps)^steps, the first exponential of `step` acting first. The constant of H, which
  /// commutes with everything, goes into each step.
  [[nodiscard]] Matrix<Real> product(const std::vector<Exponential>& step, Real time,
                                     std::uint64_t steps) const;
  /// ||S(time / steps)^steps - exp(-i H time)||
  [[nodiscard]] Real error(const std::vector<Exponential>& step, Real time,
                           std::uint64_t steps) const {
    return spectral_norm<Real>(product(step, time, steps) - exact(time));
  }

 private:
  Spectrum<Real> whole_;
  std::vector<Spectrum<Real>> layers_;
  Real constant_;
};

/// The exponentials of a formula as its ramps say, with no neighbours merged.
std::vector<Exponential> ramp_by_ramp(const Formula& formula, std::size_t layers);

}  // namespace farrier::test
