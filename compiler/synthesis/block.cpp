// The exact exponential of all terms on one or two qubits as one block of gates.
#include "compiler/synthesis/block.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <complex>
#include <farrier/diagnostic.hpp>
#include <numbers>

#include "compiler/base/eigen.hpp"
#include "compiler/synthesis/turn.hpp"

namespace farrier::synthesis {
namespace {

using Complex = std::complex<double>;
using Matrix2 = Eigen::Matrix2cd;
using Matrix4 = Eigen::Matrix4cd;
using Real4 = Eigen::Matrix4d;

constexpr double pi = std::numbers::pi;

Matrix2 matrix_of(const Turn& t) {
  Matrix2 m;
  m << Complex(t.w, -t.z), Complex(-t.y, -t.x), Complex(t.y, -t.x), Complex(t.w, t.z);
  return m;
}

Matrix2 matrix_of(Pauli letter) {
  if (letter == Pauli::i) return Matrix2::Identity();
  return Complex(0, 1) * matrix_of(rotation(letter, pi));
}

Matrix4 kron(const Matrix2& a, const Matrix2& b) {
  Matrix4 m;
  for (int i = 0; i < 2; ++i)
    for (int j = 0; j < 2; ++j) m.block<2, 2>(2 * i, 2 * j) = a(i, j) * b;
  return m;
}

Turn turn_from(const Matrix2& m) {
  return {(m(0, 0).real() + m(1, 1).real()) / 2, -(m(0, 1).imag() + m(1, 0).imag()) / 2,
          (m(1, 0).real() - m(0, 1).real()) / 2, (m(1, 1).imag() - m(0, 0).imag()) / 2};
}

/// Columns: the Bell states with phases that make SU(2) (x) SU(2) real (Hill, Wootters 1997, PRL
/// 78, 5022). XX, YY and ZZ are diagonal in it: (1,-1,1,-1), (-1,1,1,-1), (1,1,-1,-1).
Matrix4 magic_basis() {
  const double s = std::numbers::sqrt2 / 2;
  const Complex i(0, 1);
  Matrix4 basis = Matrix4::Zero();
  basis(0, 0) = s, basis(3, 0) = s;
  basis(0, 1) = i * s, basis(3, 1) = -i * s;
  basis(1, 2) = i * s, basis(2, 2) = i * s;
  basis(1, 3) = s, basis(2, 3) = -s;
  return basis;
}

Matrix4 canonical_matrix(const Coordinates& c) {
  static const Matrix4 basis = magic_basis();
  const std::array<double, 4> angles = {c[0] - c[1] + c[2], -c[0] + c[1] + c[2], c[0] + c[1] - c[2],
                                        -c[0] - c[1] - c[2]};
  Matrix4 diagonal = Matrix4::Zero();
  for (int k = 0; k < 4; ++k)
    diagonal(k, k) = std::polar(1.0, -angles[static_cast<std::size_t>(k)]);
  return basis * diagonal * basis.adjoint();
}

/// The two SU(2) factors of a matrix that is their tensor product.
std::pair<Turn, Turn> tensor_factors(const Matrix4& m) {
  // The largest entry fixes a block of the second factor and an entry of each block for the first.
  Eigen::Index row = 0;
  Eigen::Index column = 0;
  m.cwiseAbs().maxCoeff(&row, &column);
  Matrix2 second = m.block<2, 2>(row / 2 * 2, column / 2 * 2);
  Matrix2 first;
  for (int i = 0; i < 2; ++i)
    for (int j = 0; j < 2; ++j) first(i, j) = m(2 * i + row % 2, 2 * j + column % 2);
  second /= std::sqrt(second.determinant());
  first /= std::sqrt(first.determinant());
  Turn a = turn_from(first);
  const Turn b = turn_from(second);
  // Each square root left a sign open; the product's sign is known.
  const Matrix4 product = kron(matrix_of(a), matrix_of(b));
  if ((product(row, column) * std::conj(m(row, column))).real() < 0) a = {-a.w, -a.x, -a.y, -a.z};
  return {compose(a, {}), compose(b, {})};
}

/// Orthonormal real eigenvectors of a symmetric unitary matrix: of its real and imaginary parts,
/// which commute. A generic combination of the two separates all eigenspaces that differ; several
/// are tried, since any fixed one can be unlucky.
Real4 real_eigenvectors(const Matrix4& symmetric) {
  Real4 best = Real4::Identity();
  double least = std::numeric_limits<double>::infinity();
  for (const double angle : {0.0, 0.7, 1.3, 2.2, 2.9}) {
    const Real4 combination =
        angle == 0.0
            ? Real4(symmetric.imag())
            : Real4(std::cos(angle) * symmetric.real() + std::sin(angle) * symmetric.imag());
    const Eigen::SelfAdjointEigenSolver<Real4> solver((combination + combination.transpose()) / 2);
    const Real4 vectors = solver.eigenvectors();
    Matrix4 rotated = vectors.transpose() * symmetric * vectors;
    rotated.diagonal().setZero();
    const double residual = rotated.norm();
    if (residual < least) {
      least = residual;
      best = vectors;
    }
    if (least < 4e-16) break;
  }
  if (best.determinant() < 0) best.col(0) = -best.col(0);
  return best;
}

/// Turns and canonical gate of u in SU(4).
Sequence decompose(std::uint32_t first, std::uint32_t second, const Matrix4& u) {
  static const Matrix4 basis = magic_basis();
  const Matrix4 m = basis.adjoint() * u * basis;
  const Matrix4 square = m.transpose() * m;
  const Real4 p = real_eigenvectors(square);
  const Eigen::Vector4cd eigenvalues = (p.transpose() * square * p).diagonal();
  std::array<double, 4> angles{};  // of exp(-i angle)
  for (int k = 0; k < 4; ++k) angles[static_cast<std::size_t>(k)] = -std::arg(eigenvalues(k)) / 2;
  const auto left = [&] {
    Matrix4 diagonal = Matrix4::Zero();
    for (int k = 0; k < 4; ++k)
      diagonal(k, k) = std::polar(1.0, angles[static_cast<std::size_t>(k)]);
    return Real4((m * p.cast<Complex>() * diagonal).real());
  };
  Real4 k1 = left();
  if (k1.determinant() < 0) {
    angles[0] += pi;
    k1 = left();
  }
  const Coordinates raw = {(angles[0] + angles[2]) / 2, (angles[1] + angles[2]) / 2,
                           (angles[0] + angles[1]) / 2};
  const Reduced reduced = reduce(raw);
  const auto [a1, b1] = tensor_factors(basis * k1.cast<Complex>() * basis.adjoint());
  auto [a0, b0] = tensor_factors(basis * p.transpose().cast<Complex>() * basis.adjoint());
  for (std::size_t k = 0; k < 3; ++k) {
    if (!reduced.flipped[k]) continue;
    const Turn flip = rotation(k == 0 ? Pauli::x : (k == 1 ? Pauli::y : Pauli::z), pi);
    a0 = compose(flip, a0);
    b0 = compose(flip, b0);
  }

  Sequence result;
  result.phase = reduced.phase;
  const Matrix4 before = kron(matrix_of(a0), matrix_of(b0));
  const Matrix4 after = kron(matrix_of(a1), matrix_of(b1));
  const Matrix4 made = after * canonical_matrix(reduced.coordinates) * before;
  const Matrix4 difference = std::polar(1.0, result.phase) * made - u;
  result.rounding = difference.norm() + 2e-15;
  if (!(result.rounding < 1e-9)) throw InternalFault("a two-qubit block was decomposed wrongly");
  result.gates = {turn_gate(first, a0),
                  turn_gate(second, b0),
                  {GateKind::canonical,
                   first,
                   second,
                   {reduced.coordinates[0], reduced.coordinates[1], reduced.coordinates[2]}},
                  turn_gate(first, a1),
                  turn_gate(second, b1)};
  return result;
}

/// Turns u, v and diagonal s with sum_jk J_jk P_j (x) P_k = (u (x) v) (sum_k s_k P_k (x) P_k) (u
/// (x) v)^dag, from the singular value decomposition of J.
Turn turn_from_rotation(const Eigen::Matrix3d& r) {
  const Eigen::Quaterniond q(r);
  return compose({q.w(), q.x(), q.y(), q.z()}, {});
}

Sequence coupling_sequence(std::uint32_t first, std::uint32_t second, const Eigen::Matrix3d& j) {
  Eigen::Matrix3d u = Eigen::Matrix3d::Identity();
  Eigen::Matrix3d v = Eigen::Matrix3d::Identity();
  Eigen::Vector3d s = j.diagonal();
  const bool diagonal = (j - Eigen::Matrix3d(s.asDiagonal())).isZero(0.0);
  double residual = 0.0;
  if (!diagonal) {
    const Eigen::JacobiSVD<Eigen::Matrix3d> svd(j, Eigen::ComputeFullU | Eigen::ComputeFullV);
    if (svd.info() != Eigen::Success) throw InternalFault("couplings without a decomposition");
    u = svd.matrixU();
    v = svd.matrixV();
    s = svd.singularValues();
    if (u.determinant() < 0) {
      u = -u;
      s = -s;
    }
    if (v.determinant() < 0) {
      v = -v;
      s = -s;
    }
    residual = (u * s.asDiagonal() * v.transpose() - j).cwiseAbs().sum();
  }
  const Reduced reduced = reduce({s[0], s[1], s[2]});
  Sequence result;
  result.phase = reduced.phase;
  Turn a = turn_from_rotation(u);
  Turn b = turn_from_rotation(v);
  const Turn before_a = inverse(a);
  const Turn before_b = inverse(b);
  for (std::size_t k = 0; k < 3; ++k) {
    if (!reduced.flipped[k]) continue;
    const Turn flip = rotation(k == 0 ? Pauli::x : (k == 1 ? Pauli::y : Pauli::z), pi);
    a = compose(a, flip);
    b = compose(b, flip);
  }
  result.rounding = residual + reduced.rounding + 6 * turn_rounding + 4e-16 * j.cwiseAbs().sum();
  result.gates = {turn_gate(first, before_a),
                  turn_gate(second, before_b),
                  {GateKind::canonical,
                   first,
                   second,
                   {reduced.coordinates[0], reduced.coordinates[1], reduced.coordinates[2]}},
                  turn_gate(first, a),
                  turn_gate(second, b)};
  return result;
}

std::size_t axis_of(Pauli letter) {
  return letter == Pauli::x ? 0 : (letter == Pauli::y ? 1 : 2);
}

/// The coefficients of a block's terms, times a scale.
struct PairTerms {
  Eigen::Vector3d first = Eigen::Vector3d::Zero();
  Eigen::Vector3d second = Eigen::Vector3d::Zero();
  Eigen::Matrix3d coupling = Eigen::Matrix3d::Zero();
};

PairTerms collect(const Hamiltonian& hamiltonian, const Block& block, double scale) {
  PairTerms terms;
  for (const std::uint32_t term : block.terms) {
    const auto factors = hamiltonian.sum.factors(term);
    const double value = scale * hamiltonian.sum.coefficient(term);
    const auto axis = [&](std::size_t k) {
      return static_cast<Eigen::Index>(axis_of(factors[k].letter()));
    };
    if (factors.size() == 2)
      terms.coupling(axis(0), axis(1)) += value;
    else if (factors[0].qubit() == block.a)
      terms.first(axis(0)) += value;
    else
      terms.second(axis(0)) += value;
  }
  return terms;
}

/// exp(-i (x X + y Y + z Z)).
Turn field_turn(const Eigen::Vector3d& field) {
  const double norm = field.norm();
  if (norm == 0.0) return {};
  const double scale = std::sin(norm) / norm;
  return {std::cos(norm), scale * field[0], scale * field[1], scale * field[2]};
}

/// The axis P whose sum P_a + P_b commutes with all terms, or 3: fields along P only, and couplings
/// QQ + RR, QR - RQ and PP of the other two axes Q, R.
std::size_t conserved_axis(const PairTerms& terms) {
  for (Eigen::Index p = 0; p < 3; ++p) {
    const Eigen::Index q = (p + 1) % 3;
    const Eigen::Index r = (p + 2) % 3;
    const auto only_p = [&](const Eigen::Vector3d& field) {
      return field(q) == 0 && field(r) == 0;
    };
    const Eigen::Matrix3d& j = terms.coupling;
    if (only_p(terms.first) && only_p(terms.second) && j(q, q) == j(r, r) && j(q, r) == -j(r, q) &&
        j(p, q) == 0 && j(p, r) == 0 && j(q, p) == 0 && j(r, p) == 0)
      return static_cast<std::size_t>(p);
  }
  return 3;
}

/// The exponential of a block that conserves P_a + P_b, in closed form. The sum of the fields and
/// PP commute with everything; the rest, d (P_a - P_b)/2 + 2 s (QQ + RR)/2 + 2 k (QR - RQ)/2, acts
/// as a spin 1/2 on the states where the qubits differ along P, and its turn has Euler angles:
/// rz(phi) rx(theta) rz(lambda) become turns about P and the canonical gate (theta/2) (QQ + RR).
Sequence conserving_sequence(const Block& block, const PairTerms& terms, std::size_t axis) {
  constexpr std::array<Pauli, 3> axes = {Pauli::x, Pauli::y, Pauli::z};
  const auto p = static_cast<Eigen::Index>(axis);
  const Eigen::Index q = (p + 1) % 3;
  const Eigen::Index r = (p + 2) % 3;
  const double sum = terms.first(p) + terms.second(p);
  const double difference = terms.first(p) - terms.second(p);
  const Turn inner = field_turn({2 * terms.coupling(q, q), 2 * terms.coupling(r, q), difference});
  // rz(phi) rx(theta) rz(lambda): w - i z = cos(theta/2) e^(-i (phi + lambda)/2),
  // x + i y = sin(theta/2) e^(i (phi - lambda)/2).
  const double theta = 2 * std::atan2(std::hypot(inner.x, inner.y), std::hypot(inner.w, inner.z));
  const double half_sum = std::atan2(inner.z, inner.w);
  const double half_difference = std::atan2(inner.y, inner.x);
  // The turn of the spin by phi about P is a turn by phi/2 of one qubit and -phi/2 of the other.
  const auto turns = [&](double inner_angle, double outer, std::vector<Gate>& gates) {
    gates.push_back(turn_gate(block.a, rotation(axes[axis], outer + inner_angle / 2)));
    gates.push_back(turn_gate(block.b, rotation(axes[axis], outer - inner_angle / 2)));
  };
  Coordinates coordinates{};
  coordinates[axis] = terms.coupling(p, p);
  coordinates[static_cast<std::size_t>(q)] = coordinates[static_cast<std::size_t>(r)] = theta / 4;
  Sequence result;
  turns(half_sum - half_difference, sum / 2, result.gates);
  result.gates.push_back(
      {GateKind::canonical, block.a, block.b, {coordinates[0], coordinates[1], coordinates[2]}});
  turns(half_sum + half_difference, sum / 2, result.gates);
  result.rounding =
      1e-15 * (8.0 + std::abs(sum) + std::abs(difference) + terms.coupling.cwiseAbs().sum());
  return result;
}

Matrix4 exponential(const PairTerms& terms) {
  constexpr std::array<Pauli, 3> axes = {Pauli::x, Pauli::y, Pauli::z};
  Matrix4 generator = Matrix4::Zero();
  for (int k = 0; k < 3; ++k) {
    const Matrix2 letter = matrix_of(axes[static_cast<std::size_t>(k)]);
    generator += terms.first(k) * kron(letter, Matrix2::Identity());
    generator += terms.second(k) * kron(Matrix2::Identity(), letter);
    for (int l = 0; l < 3; ++l)
      generator +=
          terms.coupling(k, l) * kron(letter, matrix_of(axes[static_cast<std::size_t>(l)]));
  }
  const Eigen::SelfAdjointEigenSolver<Matrix4> solver(generator);
  const Eigen::Vector4cd phases =
      solver.eigenvalues().unaryExpr([](double value) { return std::polar(1.0, -value); });
  const Matrix4 v = solver.eigenvectors();
  return v * phases.asDiagonal() * v.adjoint();
}

}  // namespace

Sequence block_sequence(const Hamiltonian& hamiltonian, const Block& block, double scale) {
  const PairTerms terms = collect(hamiltonian, block, scale);
  if (block.kind == BlockKind::one_qubit)
    return {{turn_gate(block.a, field_turn(terms.first))},
            0.0,
            turn_rounding * (1.0 + terms.first.norm())};
  if (terms.first.isZero(0.0) && terms.second.isZero(0.0))
    return coupling_sequence(block.a, block.b, terms.coupling);
  if (const std::size_t axis = conserved_axis(terms); axis < 3)
    return conserving_sequence(block, terms, axis);
  Sequence result = decompose(block.a, block.b, exponential(terms));
  const double norm = terms.first.norm() + terms.second.norm() + terms.coupling.cwiseAbs().sum();
  result.rounding += 2e-15 * (1.0 + norm);  // of the eigenvalues and of the exponential
  return result;
}

Sequence decompose(std::uint32_t first, std::uint32_t second, const PairMatrix& matrix) {
  Matrix4 u;
  for (int i = 0; i < 4; ++i)
    for (int j = 0; j < 4; ++j) u(i, j) = {matrix.real[i][j], matrix.imag[i][j]};
  return decompose(first, second, u);
}

PairMatrix pair_matrix(std::uint32_t first, const std::vector<Gate>& gates) {
  Matrix4 product = Matrix4::Identity();
  for (const Gate& gate : gates) {
    Matrix4 factor = Matrix4::Identity();
    if (gate.kind == GateKind::turn) {
      const Matrix2 turn = matrix_of(turn_of(gate));
      factor = gate.a == first ? kron(turn, Matrix2::Identity()) : kron(Matrix2::Identity(), turn);
    } else if (gate.kind == GateKind::canonical) {
      factor = canonical_matrix({gate.parameters[0], gate.parameters[1], gate.parameters[2]});
    } else if (gate.kind == GateKind::cx) {
      const Matrix2 up = (Matrix2::Identity() + matrix_of(Pauli::z)) / 2;
      const Matrix2 down = (Matrix2::Identity() - matrix_of(Pauli::z)) / 2;
      const Matrix2 x = matrix_of(Pauli::x);
      factor = gate.a == first ? kron(up, Matrix2::Identity()) + kron(down, x)
                               : kron(Matrix2::Identity(), up) + kron(x, down);
    } else {
      throw InternalFault("a gate that is not on the pair's list was taken for a matrix");
    }
    product = factor * product;
  }
  PairMatrix result{};
  for (int i = 0; i < 4; ++i) {
    for (int j = 0; j < 4; ++j) {
      result.real[i][j] = product(i, j).real();
      result.imag[i][j] = product(i, j).imag();
    }
  }
  return result;
}

}  // namespace farrier::synthesis
