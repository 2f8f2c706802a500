// Circuits and Hamiltonians as matrices, in extended precision, so that roundings of double
// precision can be measured. Shares nothing with synthesis: every gate's matrix is written down
// here.
//
// Qubit k of a circuit is bit k of a row or column index.
#pragma once

#include <complex>
#include <cstdint>
#include <farrier/circuit.hpp>
#include <farrier/hamiltonian.hpp>
#include <span>
#include <vector>

#include "compiler/base/eigen.hpp"

namespace farrier::unitary {

using Real = long double;
using Complex = std::complex<Real>;
using Matrix = Eigen::Matrix<Complex, Eigen::Dynamic, Eigen::Dynamic>;

inline constexpr Real pi = 3.14159265358979323846264338327950288L;

/// The matrix of a gate on its own operands: 2 x 2, or 4 x 4 with the first operand as the more
/// significant one. Any kind, turn and canonical among them.
Matrix gate_matrix(const Gate& gate);

/// exp(i phase) times the gates on so many qubits, the first one acting first.
Matrix gates_matrix(std::uint32_t qubits, std::span<const Gate> gates, Real phase = 0.0L);

/// The operator of a circuit, repeats and global phase included.
Matrix circuit_matrix(const Circuit& circuit);

/// A Pauli string, and a sum of strings with its constant.
Matrix string_matrix(std::uint32_t qubits, std::span<const Factor> factors);
Matrix sum_matrix(std::uint32_t qubits, const PauliSum& sum);
/// The same for some terms of a sum.
Matrix terms_matrix(const Hamiltonian& hamiltonian, std::span<const std::uint32_t> terms);

/// exp(-i time hermitian), by eigenvalues.
Matrix evolution(const Matrix& hermitian, Real time);

Matrix kron(const Matrix& more_significant, const Matrix& less_significant);

/// Largest singular value.
Real spectral_norm(const Matrix& matrix);
/// Largest singular value of the difference.
Real distance(const Matrix& a, const Matrix& b);
/// Root mean square of the difference's singular values.
Real average_distance(const Matrix& a, const Matrix& b);

}  // namespace farrier::unitary
