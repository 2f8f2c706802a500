// The generator of a formula's error on one invariant subspace, as dense matrices.
//
// Frame. With V(s) = prod_k exp(-i s^k K_k), k rising, any Hermitian K_k:
//   symmetric formulas   Y = U^(-1/2) V S V^dag U^(-1/2), only even powers of s, E(s) = 2 (even
//   part
//                        of T), T from the half R of S that acts first
//   others               Y = U^dag V S V^dag, E = T
//   ||S^r - U^r|| <= r int_0^tau ||E(s)|| ds + sum_k tau^k spread(K_k)
// since ||Y - 1|| <= int ||E|| and ||V^dag W V - W|| <= sum_k tau^k spread(K_k) for every unitary
// W. T is built from the right: exp(-i a s X) turns T into exp(-i a s ad_X) T + a X, and exp(+-i
// s^k K) likewise.
//
// Numbers. T_j = (-i)^j R_j and K_k = i (-i)^k M_k: for a real H all R_j and M_k are real. Rounding
// is bounded in the Frobenius norm and kept; eigenvectors that are not exact stand for a formula
// with slightly different layers, and that difference is kept too.
#pragma once

#include <cmath>
#include <complex>
#include <cstddef>
#include <farrier/diagnostic.hpp>
#include <farrier/plan.hpp>
#include <map>
#include <type_traits>
#include <utility>
#include <vector>

#include "compiler/base/eigen.hpp"
#include "compiler/bounds/table_norm.hpp"

namespace farrier::bounds {

using Complex = std::complex<double>;

template <typename Scalar>
using Matrix = Eigen::Matrix<Scalar, Eigen::Dynamic, Eigen::Dynamic>;

/// A Hermitian matrix by its eigenvectors, with a bound on how far it is from what they stand for.
template <typename Scalar>
struct Spectral {
  Eigen::VectorXd values;
  Matrix<Scalar> vectors;
  double unitarity = 0.0;  ///< distance of the vectors from a unitary matrix
  double defect = 0.0;     ///< distance of the matrix from the one that has these values and the
                           ///< columns of that unitary matrix as eigenvectors
};

template <typename Scalar>
Spectral<Scalar> diagonalise(const Matrix<Scalar>& matrix) {
  const Eigen::SelfAdjointEigenSolver<Matrix<Scalar>> solver(matrix);
  if (solver.info() != Eigen::Success) throw InternalFault("eigenvectors not found");
  Spectral<Scalar> result{solver.eigenvalues(), solver.eigenvectors(), 0.0, 0.0};
  const auto n = static_cast<double>(matrix.rows());
  const double norm =
      std::max(std::abs(result.values(0)), std::abs(result.values(matrix.rows() - 1)));
  const Matrix<Scalar>& v = result.vectors;
  const double residual = (matrix * v - v * result.values.asDiagonal()).norm();
  // Both are computed from sums of n products, each entry with at most n roundings.
  const double rounding = 4 * unit_roundoff * n * n;
  result.unitarity =
      (v.adjoint() * v - Matrix<Scalar>::Identity(matrix.rows(), matrix.cols())).norm() + rounding;
  result.defect = residual + 2 * norm * result.unitarity + rounding * norm;
  return result;
}

/// Largest and smallest eigenvalue of a Hermitian matrix, moved outwards by their rounding.
template <typename Scalar>
std::pair<double, double> spectrum_ends(const Matrix<Scalar>& matrix) {
  const Eigen::SelfAdjointEigenSolver<Matrix<Scalar>> solver(matrix, Eigen::EigenvaluesOnly);
  if (solver.info() != Eigen::Success) throw InternalFault("eigenvalues not found");
  const Eigen::Index last = matrix.rows() - 1;
  const double rounding = 16 * unit_roundoff * static_cast<double>(matrix.rows()) * matrix.norm();
  return {solver.eigenvalues()(last) + rounding, solver.eigenvalues()(0) - rounding};
}

/// The same of i^k times a matrix that is Hermitian for even k and anti-Hermitian for odd k, up to
/// the sign, which the callers know not to matter.
/// What of the matrix is not (anti-)Hermitian is rounding that nothing exact has, and left out.
template <typename Scalar>
std::pair<double, double> spectrum_ends(const Matrix<Scalar>& matrix, int k) {
  if (k % 2 == 0) return spectrum_ends<Scalar>(0.5 * (matrix + matrix.adjoint()));
  const Matrix<Scalar> part = matrix - matrix.adjoint();
  return spectrum_ends<Complex>(Complex(0, 0.5) * part.template cast<Complex>());
}

/// A fitted K = i (-i)^power m, m in the eigenbasis of H.
template <typename Scalar>
struct Dressing {
  int power = 0;
  Matrix<Scalar> m;
};

template <typename Scalar>
class SectorSeries {
 public:
  /// The layers' matrices on the sector, each with a bound on its rounding, and the exponentials of
  /// the formula: of its first half in time order where it is symmetric.
  SectorSeries(const std::vector<Matrix<Scalar>>& layers, const std::vector<double>& roundings,
               std::vector<Exponential> exponentials, bool symmetric)
      : dimension_(layers.front().rows()),
        symmetric_(symmetric),
        exponentials_(std::move(exponentials)) {
    Matrix<Scalar> h = Matrix<Scalar>::Zero(dimension_, dimension_);
    double h_rounding = 0.0;
    for (std::size_t k = 0; k < layers.size(); ++k) {
      h += layers[k];
      h_rounding += roundings[k] + unit_roundoff * h.norm();
      layers_.push_back(diagonalise<Scalar>(layers[k]));
      layers_.back().defect += roundings[k];
    }
    layers_.push_back(diagonalise<Scalar>(h));
    layers_.back().defect += h_rounding;
    for (const Exponential& e : exponentials_)
      defect_ += (symmetric_ ? 2.0 : 1.0) * std::abs(e.fraction) * layers_[e.layer].defect;
    defect_ += layers_.back().defect;
  }

  /// Computes T up to s^(degree - 1) and a remainder; the result is in the eigenbasis of H.
  void run(int degree);

  void add_dressing(Dressing<Scalar> dressing) { dressing_.push_back(std::move(dressing)); }

  [[nodiscard]] Eigen::Index dimension() const { return dimension_; }
  [[nodiscard]] const Matrix<Scalar>& coefficient(int j) const {
    return coefficients_[static_cast<std::size_t>(j)];
  }
  [[nodiscard]] double rounding(int j) const { return rounding_[static_cast<std::size_t>(j)]; }
  /// Bounds c with ||rest|| <= sum over powers p of c_p s^p.
  [[nodiscard]] const std::map<int, double>& remainder() const { return remainder_; }
  /// A bound on ||S - S'|| / tau, S' the formula that the numbers are exact for.
  [[nodiscard]] double defect() const { return defect_; }
  [[nodiscard]] const Eigen::VectorXd& energies() const { return layers_.back().values; }

 private:
  [[nodiscard]] std::size_t hamiltonian_basis() const { return layers_.size() - 1; }

  /// T <- exp(+-i s^k ad_K) T -+ k s^(k-1) K: with i ad_K T_j = -(-i)^(j+k) [M, R_j].
  void dress(const Dressing<Scalar>& dressing, double sign) {
    const auto k = static_cast<std::size_t>(dressing.power);
    for (std::size_t j = degree_; j-- > 0;) {
      if (coefficients_[j].isZero(0.0)) continue;
      Matrix<Scalar> next = coefficients_[j];
      // Errors of R_j itself are only conjugated by a unitary; what counts is the new rounding.
      double inherited = 0.0;
      for (std::size_t m = 1;; ++m) {
        const double norm = next.norm();
        const double m_norm = dressing.m.norm();
        next = Matrix<Scalar>((dressing.m * next - next * dressing.m) *
                              (-sign / static_cast<double>(m)));
        inherited = (2 * m_norm * inherited + product_rounding() * 2 * m_norm * norm) /
                    static_cast<double>(m);
        const std::size_t power = j + m * k;
        if (power >= degree_) {
          remainder_[static_cast<int>(power)] += next.norm() + inherited;
          break;
        }
        add(power, next, inherited);
      }
    }
    const Matrix<Scalar> derivative = (-sign * static_cast<double>(k)) * dressing.m;
    if (k - 1 < degree_)
      add(k - 1, derivative, unit_roundoff * derivative.norm());
    else
      remainder_[dressing.power - 1] += derivative.norm();
  }

  /// R_j += term, whose rounding is given; the sum is rounded too.
  void add(std::size_t j, const Matrix<Scalar>& term, double rounding) {
    coefficients_[j] += term;
    rounding_[j] += rounding + unit_roundoff * coefficients_[j].norm();
  }

  /// T <- exp(-i a s ad_X) T + a X, elementwise in the eigenbasis of X: R_(j+m) gains
  /// (a (x_a - x_b))^m / m! R_j.
  void conjugate(std::size_t layer, double a) {
    to_basis(layer);
    const Eigen::VectorXd& x = layers_[layer].values;
    Eigen::MatrixXd gaps(dimension_, dimension_);
    for (Eigen::Index c = 0; c < dimension_; ++c)
      for (Eigen::Index b = 0; b < dimension_; ++b) gaps(b, c) = a * (x(b) - x(c));
    for (std::size_t j = degree_; j-- > 0;) {
      if (coefficients_[j].isZero(0.0)) continue;
      Matrix<Scalar> term = coefficients_[j];
      for (std::size_t m = 1; j + m <= degree_; ++m) {
        term =
            (term.array() * gaps.array().template cast<Scalar>() / static_cast<double>(m)).matrix();
        const double norm = term.norm();
        const double rounding = 6 * unit_roundoff * static_cast<double>(m) * norm;
        if (j + m == degree_)
          remainder_[static_cast<int>(degree_)] += norm + rounding;
        else
          add(j + m, term, rounding);
      }
    }
    coefficients_[0].diagonal() += (a * x).template cast<Scalar>();
    rounding_[0] +=
        unit_roundoff * (2 * std::abs(a) * x.norm() + coefficients_[0].diagonal().norm());
  }

  /// Relative Frobenius error of a product with a unitary matrix on each side, or of one product. A
  /// complex product has twice the summands, in two parts.
  [[nodiscard]] double product_rounding() const {
    constexpr double constant = Eigen::NumTraits<Scalar>::IsComplex ? 6.0 : 2.5;
    const auto n = static_cast<double>(dimension_);
    return constant * unit_roundoff * n * std::sqrt(n);
  }

  void to_basis(std::size_t target) {
    if (basis_ == target) return;
    const auto [place, fresh] = changes_.try_emplace({basis_, target});
    if (fresh) {
      Change& change = place->second;
      change.w = layers_[target].vectors.adjoint() * layers_[basis_].vectors;
      const auto n = static_cast<double>(dimension_);
      change.defect =
          layers_[target].unitarity + layers_[basis_].unitarity + 4 * unit_roundoff * n * n;
    }
    const Change& change = place->second;
    for (std::size_t j = 0; j < degree_; ++j) {
      if (coefficients_[j].isZero(0.0)) continue;
      const double norm = coefficients_[j].norm();
      coefficients_[j] = change.w * coefficients_[j] * change.w.adjoint();
      rounding_[j] += (2 * change.defect + product_rounding()) * norm;
    }
    basis_ = target;
  }

  struct Change {
    Matrix<Scalar> w;
    double defect = 0.0;
  };

  Eigen::Index dimension_;
  bool symmetric_;
  std::vector<Spectral<Scalar>> layers_;  ///< and H at the end
  std::vector<Exponential> exponentials_;
  double defect_ = 0.0;
  std::vector<Dressing<Scalar>> dressing_;
  std::map<std::pair<std::size_t, std::size_t>, Change> changes_;

  std::size_t degree_ = 0;
  std::size_t basis_ = 0;
  std::vector<Matrix<Scalar>> coefficients_;  ///< R_j in the basis `basis_`
  std::vector<double> rounding_;              ///< of each, in the Frobenius norm
  std::map<int, double> remainder_;
};

template <typename Scalar>
void SectorSeries<Scalar>::run(int degree) {
  degree_ = static_cast<std::size_t>(degree);
  coefficients_.assign(degree_, Matrix<Scalar>::Zero(dimension_, dimension_));
  rounding_.assign(degree_, 0.0);
  remainder_.clear();
  basis_ = hamiltonian_basis();
  if (symmetric_) coefficients_[0] = layers_.back().values.template cast<Scalar>().asDiagonal();
  if (symmetric_) coefficients_[0] *= -0.5;
  for (const Dressing<Scalar>& k : dressing_) dress(k, +1.0);
  for (const Exponential& exponential : exponentials_)
    conjugate(exponential.layer, exponential.fraction);
  to_basis(hamiltonian_basis());
  if (symmetric_) return;
  for (std::size_t k = dressing_.size(); k-- > 0;) dress(dressing_[k], -1.0);
  conjugate(hamiltonian_basis(), -1.0);
}

}  // namespace farrier::bounds
