// Circuits and Hamiltonians as matrices, in extended precision.
#include "tests/support/unitary.hpp"

#include <Eigen/Eigenvalues>
#include <bit>
#include <cmath>
#include <stdexcept>

namespace farrier::unitary {
namespace {

const Complex i_unit(0.0L, 1.0L);
const Real half_root = std::sqrt(0.5L);

Matrix two(Complex a, Complex b, Complex c, Complex d) {
  Matrix m(2, 2);
  m << a, b, c, d;
  return m;
}

Matrix x_matrix() {
  return two(0, 1, 1, 0);
}
Matrix y_matrix() {
  return two(0, -i_unit, i_unit, 0);
}
Matrix z_matrix() {
  return two(1, 0, 0, -1);
}
Matrix one() {
  return Matrix::Identity(2, 2);
}

Matrix diagonal(Complex a, Complex b) {
  return two(a, 0, 0, b);
}

/// exp(-i angle/2 P) for an involution P.
Matrix half_angle(const Matrix& p, Real angle) {
  const Matrix identity = Matrix::Identity(p.rows(), p.cols());
  return std::cos(angle / 2) * identity - i_unit * std::sin(angle / 2) * p;
}

Matrix letter_matrix(Pauli letter) {
  switch (letter) {
    case Pauli::x:
      return x_matrix();
    case Pauli::y:
      return y_matrix();
    case Pauli::z:
      return z_matrix();
    case Pauli::i:
      break;
  }
  return one();
}

Matrix couple(Pauli letter) {
  return kron(letter_matrix(letter), letter_matrix(letter));
}

/// The built-in U of the OpenQASM 3 specification ("Built-in gates", since version 3.0):
/// 1/2 [[1 + e^(i theta), -i e^(i lambda) (1 - e^(i theta))],
///      [i e^(i phi) (1 - e^(i theta)), e^(i (phi + lambda)) (1 + e^(i theta))]].
Matrix built_in_u(Real theta, Real phi, Real lambda) {
  const Complex e = std::polar(1.0L, theta);
  return two((1.0L + e) / 2.0L, -i_unit * std::polar(1.0L, lambda) * (1.0L - e) / 2.0L,
             i_unit * std::polar(1.0L, phi) * (1.0L - e) / 2.0L,
             std::polar(1.0L, phi + lambda) * (1.0L + e) / 2.0L);
}

Matrix controlled(const Matrix& target) {
  return kron(diagonal(1, 0), one()) + kron(diagonal(0, 1), target);
}

/// Gates of stdgates.inc: OpenQASM 3 specification, "Standard library". The last four: common
/// practice, no source, as farrier states them (rzz(a) = exp(-i a ZZ/2), rxx(a) = exp(-i a XX/2),
/// iswap = exp(i pi/4 (XX + YY)), ecr = (X_a - Y_a X_b) / sqrt(2)).
Matrix named_matrix(const Gate& gate) {
  const auto& p = gate.parameters;
  switch (gate.kind) {
    case GateKind::h:
      return half_root * two(1, 1, 1, -1);
    case GateKind::s:
      return diagonal(1, i_unit);
    case GateKind::sdg:
      return diagonal(1, -i_unit);
    case GateKind::sx:
      return 0.5L * two({1, 1}, {1, -1}, {1, -1}, {1, 1});
    case GateKind::x:
      return x_matrix();
    case GateKind::y:
      return y_matrix();
    case GateKind::z:
      return z_matrix();
    case GateKind::rx:
      return half_angle(x_matrix(), p[0]);
    case GateKind::ry:
      return half_angle(y_matrix(), p[0]);
    case GateKind::rz:
      return half_angle(z_matrix(), p[0]);
    case GateKind::u:
      return built_in_u(p[0], p[1], p[2]);
    case GateKind::cx:
      return controlled(x_matrix());
    case GateKind::cz:
      return controlled(z_matrix());
    case GateKind::ecr:
      return half_root * (kron(x_matrix(), one()) - kron(y_matrix(), x_matrix()));
    case GateKind::iswap:
      return half_angle(couple(Pauli::x), -pi / 2) * half_angle(couple(Pauli::y), -pi / 2);
    case GateKind::rzz:
      return half_angle(couple(Pauli::z), p[0]);
    case GateKind::rxx:
      return half_angle(couple(Pauli::x), p[0]);
    default:
      throw std::invalid_argument("a gate without a matrix");
  }
}

/// Multiplies `gate` onto `product` from the left.
void apply(const Gate& gate, const Matrix& matrix, Matrix& product) {
  const Eigen::Index high = Eigen::Index{1} << gate.a;
  const Eigen::Index low = gate.two_qubit() ? Eigen::Index{1} << gate.b : 0;
  const Eigen::Index size = matrix.rows();
  for (Eigen::Index column = 0; column < product.cols(); ++column) {
    for (Eigen::Index row = 0; row < product.rows(); ++row) {
      if ((row & (high | low)) != 0) continue;
      const Eigen::Index places[4] = {row, low != 0 ? row + low : row + high, row + high,
                                      row + high + low};
      Complex old[4];
      for (Eigen::Index k = 0; k < size; ++k) old[k] = product(places[k], column);
      for (Eigen::Index k = 0; k < size; ++k) {
        Complex sum = 0;
        for (Eigen::Index l = 0; l < size; ++l) sum += matrix(k, l) * old[l];
        product(places[k], column) = sum;
      }
    }
  }
}

Matrix power(Matrix base, std::uint64_t exponent) {
  Matrix result = Matrix::Identity(base.rows(), base.cols());
  for (; exponent > 0; exponent >>= 1U) {
    if ((exponent & 1U) != 0) result = base * result;
    if (exponent > 1) base = base * base;
  }
  return result;
}

void add_string(std::span<const Factor> factors, Real coefficient, Matrix& sum) {
  std::size_t flips = 0;
  std::size_t signs = 0;
  std::size_t ys = 0;
  for (const Factor factor : factors) {
    const std::size_t bit = std::size_t{1} << factor.qubit();
    if (factor.letter() != Pauli::z) flips |= bit;
    if (factor.letter() != Pauli::x) signs |= bit;
    if (factor.letter() == Pauli::y) ++ys;
  }
  // Y = i X Z, and X Z |k> = (-1)^k |k + 1>.
  const Complex turns[4] = {1.0L, i_unit, -1.0L, -i_unit};
  for (std::size_t column = 0; column < static_cast<std::size_t>(sum.cols()); ++column) {
    const Real sign = std::popcount(column & signs) % 2 == 0 ? 1.0L : -1.0L;
    sum(static_cast<Eigen::Index>(column ^ flips), static_cast<Eigen::Index>(column)) +=
        coefficient * sign * turns[ys % 4];
  }
}

Matrix zero(std::uint32_t qubits) {
  return Matrix::Zero(Eigen::Index{1} << qubits, Eigen::Index{1} << qubits);
}

}  // namespace

Matrix kron(const Matrix& more_significant, const Matrix& less_significant) {
  const Eigen::Index inner = less_significant.rows();
  Matrix m(more_significant.rows() * inner, more_significant.cols() * inner);
  for (Eigen::Index i = 0; i < more_significant.rows(); ++i)
    for (Eigen::Index j = 0; j < more_significant.cols(); ++j)
      m.block(i * inner, j * inner, inner, inner) = more_significant(i, j) * less_significant;
  return m;
}

Matrix gate_matrix(const Gate& gate) {
  const auto& p = gate.parameters;
  if (gate.kind == GateKind::turn)
    return Real{p[0]} * one() -
           i_unit * (Real{p[1]} * x_matrix() + Real{p[2]} * y_matrix() + Real{p[3]} * z_matrix());
  if (gate.kind == GateKind::canonical)
    return half_angle(couple(Pauli::x), 2 * Real{p[0]}) *
           half_angle(couple(Pauli::y), 2 * Real{p[1]}) *
           half_angle(couple(Pauli::z), 2 * Real{p[2]});
  return named_matrix(gate);
}

Matrix gates_matrix(std::uint32_t qubits, std::span<const Gate> gates, Real phase) {
  Matrix product = zero(qubits);
  product.diagonal().setConstant(std::polar(1.0L, phase));
  for (const Gate& gate : gates) apply(gate, gate_matrix(gate), product);
  return product;
}

Matrix circuit_matrix(const Circuit& circuit) {
  Matrix product = gates_matrix(circuit.qubits, {}, Real{circuit.global_phase});
  for (const Segment& segment : circuit.segments) {
    if (segment.repeats == 1)
      for (const Gate& gate : segment.gates) apply(gate, gate_matrix(gate), product);
    else
      product = power(gates_matrix(circuit.qubits, segment.gates), segment.repeats) * product;
  }
  return product;
}

Matrix string_matrix(std::uint32_t qubits, std::span<const Factor> factors) {
  Matrix m = zero(qubits);
  add_string(factors, 1.0L, m);
  return m;
}

Matrix sum_matrix(std::uint32_t qubits, const PauliSum& sum) {
  Matrix m = zero(qubits);
  m.diagonal().setConstant(Real{sum.constant()});
  for (std::size_t k = 0; k < sum.size(); ++k) add_string(sum.factors(k), sum.coefficient(k), m);
  return m;
}

Matrix terms_matrix(const Hamiltonian& hamiltonian, std::span<const std::uint32_t> terms) {
  Matrix m = zero(hamiltonian.qubits);
  for (const std::uint32_t k : terms)
    add_string(hamiltonian.sum.factors(k), hamiltonian.sum.coefficient(k), m);
  return m;
}

Matrix evolution(const Matrix& hermitian, Real time) {
  const Eigen::SelfAdjointEigenSolver<Matrix> solver(hermitian);
  if (solver.info() != Eigen::Success) throw std::runtime_error("no eigenvalues were found");
  Eigen::Matrix<Complex, Eigen::Dynamic, 1> phases(hermitian.rows());
  for (Eigen::Index k = 0; k < hermitian.rows(); ++k)
    phases(k) = std::polar(1.0L, -time * solver.eigenvalues()(k));
  return solver.eigenvectors() * phases.asDiagonal() * solver.eigenvectors().adjoint();
}

Real spectral_norm(const Matrix& matrix) {
  const Real scale = matrix.cwiseAbs().maxCoeff();
  if (scale == 0.0L) return 0.0L;
  const Matrix scaled = matrix / scale;
  const Matrix square = scaled.adjoint() * scaled;
  const Eigen::SelfAdjointEigenSolver<Matrix> solver(square, Eigen::EigenvaluesOnly);
  if (solver.info() != Eigen::Success) throw std::runtime_error("no eigenvalues were found");
  return scale * std::sqrt(solver.eigenvalues().maxCoeff());
}

Real distance(const Matrix& a, const Matrix& b) {
  return spectral_norm(a - b);
}

Real average_distance(const Matrix& a, const Matrix& b) {
  return (a - b).norm() / std::sqrt(static_cast<Real>(a.rows()));
}

}  // namespace farrier::unitary
