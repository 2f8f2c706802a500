// Dense matrices for tests.
#include "tests/support/dense.hpp"

#include <algorithm>
#include <cmath>

namespace farrier::test {
namespace {

template <typename Real>
Eigen::Matrix<std::complex<Real>, 2, 2> letter_matrix(Pauli letter) {
  const std::complex<Real> i(0, 1);
  Eigen::Matrix<std::complex<Real>, 2, 2> matrix;
  switch (letter) {
    case Pauli::i:
      matrix << 1, 0, 0, 1;
      break;
    case Pauli::x:
      matrix << 0, 1, 1, 0;
      break;
    case Pauli::y:
      matrix << 0, -i, i, 0;
      break;
    case Pauli::z:
      matrix << 1, 0, 0, -1;
      break;
  }
  return matrix;
}

template <typename Real, typename Right>
Matrix<Real> kronecker(const Matrix<Real>& left, const Right& right) {
  Matrix<Real> product(left.rows() * right.rows(), left.cols() * right.cols());
  for (Eigen::Index row = 0; row < left.rows(); ++row)
    for (Eigen::Index column = 0; column < left.cols(); ++column)
      product.block(row * right.rows(), column * right.cols(), right.rows(), right.cols()) =
          left(row, column) * right;
  return product;
}

}  // namespace

template <typename Real>
Matrix<Real> dense(std::span<const Factor> string, std::uint32_t qubits) {
  Matrix<Real> product = Matrix<Real>::Identity(1, 1);
  std::size_t next = 0;
  for (std::uint32_t qubit = 0; qubit < qubits; ++qubit) {
    const bool acts = next < string.size() && string[next].qubit() == qubit;
    product = kronecker<Real>(product,
                              letter_matrix<Real>(acts ? string[next++].letter() : Pauli::i));
  }
  return product;
}

template <typename Real>
Matrix<Real> dense(const PauliSum& sum, std::uint32_t qubits) {
  Matrix<Real> total = Matrix<Real>::Identity(1 << qubits, 1 << qubits) *
                       std::complex<Real>(static_cast<Real>(sum.constant()));
  for (std::size_t k = 0; k < sum.size(); ++k)
    total += dense<Real>(sum.factors(k), qubits) *
             std::complex<Real>(static_cast<Real>(sum.coefficient(k)));
  return total;
}

template <typename Real>
Matrix<Real> dense(const Hamiltonian& hamiltonian, const Layer& layer) {
  PauliSum sum;
  for (const Block& block : layer.blocks)
    for (const std::uint32_t term : block.terms)
      sum.add(hamiltonian.sum.factors(term), hamiltonian.sum.coefficient(term));
  return dense<Real>(sum, hamiltonian.qubits);
}

template <typename Real>
Real spectral_norm(const Matrix<Real>& matrix) {
  const Matrix<Real> square = matrix.adjoint() * matrix;
  const Eigen::SelfAdjointEigenSolver<Matrix<Real>> solver(square, Eigen::EigenvaluesOnly);
  return std::sqrt(std::max(Real(0), solver.eigenvalues().maxCoeff()));
}

template <typename Real>
Real normalised_frobenius_norm(const Matrix<Real>& matrix) {
  return matrix.norm() / std::sqrt(static_cast<Real>(matrix.rows()));
}

template <typename Real>
Real distance_up_to_phase(const Matrix<Real>& a, const Matrix<Real>& b) {
  const Matrix<Real> relative = b.adjoint() * a;
  const Eigen::ComplexEigenSolver<Matrix<Real>> solver(relative, false);
  std::vector<Real> phases;
  for (const std::complex<Real>& value : solver.eigenvalues()) phases.push_back(std::arg(value));
  std::ranges::sort(phases);
  const Real turn = 2 * std::acos(Real(-1));
  Real widest_gap = phases.front() + turn - phases.back();
  for (std::size_t k = 1; k < phases.size(); ++k)
    widest_gap = std::max(widest_gap, phases[k] - phases[k - 1]);
  return 2 * std::sin((turn - widest_gap) / 4);
}

template <typename Real>
Matrix<Real> power(Matrix<Real> matrix, std::uint64_t exponent) {
  Matrix<Real> result = Matrix<Real>::Identity(matrix.rows(), matrix.cols());
  for (; exponent > 0; exponent /= 2) {
    if (exponent % 2 == 1) result = result * matrix;
    if (exponent > 1) matrix = matrix * matrix;
  }
  return result;
}

template <typename Real>
Spectrum<Real>::Spectrum(const Matrix<Real>& hermitian) : solver_(hermitian) {}

template <typename Real>
Matrix<Real> Spectrum<Real>::exponential(Real time) const {
  Eigen::Matrix<std::complex<Real>, Eigen::Dynamic, 1> phases(solver_.eigenvalues().size());
  for (Eigen::Index k = 0; k < phases.size(); ++k)
    phases[k] = std::polar(Real(1), -time * solver_.eigenvalues()[k]);
  return solver_.eigenvectors() * phases.asDiagonal() * solver_.eigenvectors().adjoint();
}

template <typename Real>
Real Spectrum<Real>::norm() const {
  return solver_.eigenvalues().cwiseAbs().maxCoeff();
}

template <typename Real>
Evolution<Real>::Evolution(const Hamiltonian& hamiltonian, const Layering& layering)
    : whole_(dense<Real>(hamiltonian.sum, hamiltonian.qubits)),
      constant_(static_cast<Real>(hamiltonian.sum.constant())) {
  for (const Layer& layer : layering.layers)
    layers_.emplace_back(dense<Real>(hamiltonian, layer));
}

template <typename Real>
Matrix<Real> Evolution<Real>::product(const std::vector<Exponential>& step, Real time,
                                      std::uint64_t steps) const {
  const Real tau = time / static_cast<Real>(steps);
  std::map<std::pair<std::uint32_t, double>, Matrix<Real>> exponentials;
  const Matrix<Real> nothing = whole_.exponential(0);
  Matrix<Real> once = Matrix<Real>::Identity(nothing.rows(), nothing.cols());
  for (const Exponential& exponential : step) {
    const auto [entry, is_new] =
        exponentials.try_emplace({exponential.layer, exponential.fraction});
    if (is_new)
      entry->second =
          layers_[exponential.layer].exponential(static_cast<Real>(exponential.fraction) * tau);
    once = entry->second * once;
  }
  once *= std::polar(Real(1), -constant_ * tau);
  return power<Real>(once, steps);
}

std::vector<Exponential> ramp_by_ramp(const Formula& formula, std::size_t layers) {
  std::vector<Exponential> step;
  for (std::size_t ramp = 0; ramp < formula.ramps.size(); ++ramp)
    for (std::size_t k = 0; k < layers; ++k)
      step.push_back({static_cast<std::uint32_t>(ramp % 2 == 0 ? k : layers - 1 - k),
                      formula.ramps[ramp]});
  return step;
}

template Matrix<double> dense<double>(std::span<const Factor>, std::uint32_t);
template Matrix<double> dense<double>(const PauliSum&, std::uint32_t);
template Matrix<double> dense<double>(const Hamiltonian&, const Layer&);
template double spectral_norm<double>(const Matrix<double>&);
template double normalised_frobenius_norm<double>(const Matrix<double>&);
template double distance_up_to_phase<double>(const Matrix<double>&, const Matrix<double>&);
template Matrix<double> power<double>(Matrix<double>, std::uint64_t);
template class Spectrum<double>;
template class Evolution<double>;

template Matrix<long double> dense<long double>(std::span<const Factor>, std::uint32_t);
template Matrix<long double> dense<long double>(const PauliSum&, std::uint32_t);
template Matrix<long double> dense<long double>(const Hamiltonian&, const Layer&);
template long double spectral_norm<long double>(const Matrix<long double>&);
template long double normalised_frobenius_norm<long double>(const Matrix<long double>&);
template long double distance_up_to_phase<long double>(const Matrix<long double>&,
                                                       const Matrix<long double>&);
template Matrix<long double> power<long double>(Matrix<long double>, std::uint64_t);
template class Spectrum<long double>;
template class Evolution<long double>;

}  // namespace farrier::test
