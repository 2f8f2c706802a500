// The error of a formula on few qubits: the generator of the error as dense matrices, sector by
// sector; what of it averages out over the evolution is moved to the boundary.
//
// E_k/(k+1) = h_k - D_H K_k, and in the eigenbasis of H (D_H K)_ab = -i (E_a - E_b) K_ab, so K_k
// can take off h_k all that does not lie between nearly equal energies. The frame, and why any K is
// allowed, is in sector_series.hpp.
#include <algorithm>
#include <bit>
#include <cmath>
#include <limits>
#include <map>
#include <optional>
#include <string>
#include <type_traits>
#include <utility>
#include <vector>

#include "compiler/bounds/models.hpp"
#include "compiler/bounds/sector_series.hpp"
#include "compiler/bounds/sectors.hpp"
#include "compiler/bounds/table_norm.hpp"
#include "compiler/formulas/expand.hpp"

namespace farrier::bounds {
namespace {

/// Damping of the fit of K, in units of the coefficients' size a qubit.
constexpr double dampings[] = {0.003, 0.02, 0.1, 0.3, 1.0};

/// Whether every string has an even number of Y in the basis, so that all matrices are real.
bool is_real(const Hamiltonian& hamiltonian, Pauli axis) {
  for (std::size_t k = 0; k < hamiltonian.sum.size(); ++k) {
    const AxisString string = in_basis(hamiltonian.sum.factors(k), axis);
    if (std::popcount(string.x & string.z) % 2 != 0) return false;
  }
  return true;
}

/// A layer's matrix on a sector. Entries that leave the sector are zero.
template <typename Scalar>
Matrix<Scalar> layer_matrix(const Hamiltonian& hamiltonian, const Layer& layer, Pauli axis,
                            const std::vector<std::uint32_t>& states,
                            const std::vector<std::uint32_t>& place) {
  const auto size = static_cast<Eigen::Index>(states.size());
  Matrix<Scalar> matrix = Matrix<Scalar>::Zero(size, size);
  for (const Block& block : layer.blocks) {
    for (const std::uint32_t term : block.terms) {
      const AxisString string = in_basis(hamiltonian.sum.factors(term), axis);
      const double coefficient = string.sign * hamiltonian.sum.coefficient(term);
      const int ys = std::popcount(string.x & string.z) % 4;
      Scalar value{};
      if constexpr (std::is_same_v<Scalar, double>)
        value = ys == 0 ? coefficient : -coefficient;
      else
        value = coefficient * (ys == 0   ? Complex(1, 0)
                               : ys == 1 ? Complex(0, 1)
                               : ys == 2 ? Complex(-1, 0)
                                         : Complex(0, -1));
      for (Eigen::Index column = 0; column < size; ++column) {
        const std::uint32_t state = states[static_cast<std::size_t>(column)];
        const std::uint32_t row = place[state ^ string.x];
        if (row >= states.size() || states[row] != (state ^ string.x)) continue;
        const bool minus = (std::popcount(string.z & state) & 1) != 0;
        matrix(static_cast<Eigen::Index>(row), column) += minus ? -value : value;
      }
    }
  }
  return matrix;
}

/// A bound on the rounding of a layer's matrix: strings with one X mask share their entries, and
/// each is rounded at most once when it is added to them.
double matrix_rounding(const Hamiltonian& hamiltonian, const Layer& layer) {
  double norm = 0.0;
  std::size_t terms = 0;
  for (const Block& block : layer.blocks) {
    for (const std::uint32_t term : block.terms) {
      norm += std::abs(hamiltonian.sum.coefficient(term));
      ++terms;
    }
  }
  return unit_roundoff * static_cast<double>(terms) * norm;
}

template <typename Scalar>
class DenseCertificate {
 public:
  DenseCertificate(const Question& question, const Sectors& sectors) : question_(question) {
    const bool symmetric = question.formula.symmetric;
    const std::size_t layers = question.layering.layers.size();
    const auto exponentials = symmetric ? formulas::expand_first_half(question.formula, layers)
                                        : formulas::expand(question.formula, layers);
    std::vector<double> roundings;
    for (const Layer& layer : question.layering.layers)
      roundings.push_back(matrix_rounding(question.hamiltonian, layer));
    std::vector<std::uint32_t> place(std::size_t{1} << question.hamiltonian.qubits, 0);
    for (const auto& states : sectors.states) {
      for (std::uint32_t k = 0; k < states.size(); ++k) place[states[k]] = k;
      std::vector<Matrix<Scalar>> matrices;
      for (const Layer& layer : question.layering.layers)
        matrices.push_back(
            layer_matrix<Scalar>(question.hamiltonian, layer, sectors.axis, states, place));
      series_.emplace_back(matrices, roundings, exponentials, symmetric);
    }
    dimension_ = static_cast<double>(place.size());
    double squares = 0.0;
    for (std::size_t k = 0; k < question.hamiltonian.sum.size(); ++k)
      squares += std::pow(question.hamiltonian.sum.coefficient(k), 2);
    scale_ = std::sqrt(squares / question.hamiltonian.qubits);
  }

  /// Fits K for the next power that the dressing has not reached yet.
  void fit_next() {
    const int step = question_.formula.symmetric ? 2 : 1;
    const int power = spreads_.empty() ? question_.formula.order : spreads_.back().first + step;
    std::vector<Matrix<Scalar>> z;
    for (SectorSeries<Scalar>& series : series_) {
      series.run(power + 1);
      // (Anti-)Hermitian to the last bit, so that K is Hermitian whatever the rounding.
      const Matrix<Scalar>& r = series.coefficient(power);
      const Matrix<Scalar> adjoint = r.adjoint();
      const double weight = (question_.formula.symmetric ? 1.0 : 0.5) / (power + 1.0);
      z.push_back((power % 2 == 0 ? Matrix<Scalar>(r + adjoint) : Matrix<Scalar>(r - adjoint)) *
                  weight);
    }
    choose_dressing(z, power);
  }

  ErrorModel model(int degree) {
    for (SectorSeries<Scalar>& series : series_) series.run(degree);
    ErrorModel result{"secular certificate", {}, 0};
    const double factor = question_.formula.symmetric ? 2.0 : 1.0;
    for (int j = 0; j < degree; ++j) {
      Blocks blocks;
      double rounding = 0.0;
      for (const SectorSeries<Scalar>& series : series_) {
        blocks.push_back(&series.coefficient(j));
        rounding = std::max(rounding, series.rounding(j));
      }
      const double weight = factor / (j + 1);
      // Odd powers cancel in E, but what was rounded in them does not.
      if (!question_.formula.symmetric || j % 2 == 0) {
        const std::string name = j < question_.formula.order    ? "order conditions"
                                 : j == question_.formula.order ? "leading"
                                                                : "order " + std::to_string(j);
        result.terms.push_back({name, method(), weight * norm_of(blocks, j), j + 1, j});
      }
      result.terms.push_back({"rounding", "counted operations", weight * rounding, j + 1, j});
    }
    add_remainder(degree, factor, result);
    for (const auto& [power, spread] : spreads_)
      result.terms.push_back({"boundary", "spread of K", spread, power, power});
    double defect = 0.0;
    for (const SectorSeries<Scalar>& series : series_) defect = std::max(defect, series.defect());
    result.terms.push_back({"rounding", "eigenvectors", defect, 1, 0});
    return result;
  }

 private:
  using Blocks = std::vector<const Matrix<Scalar>*>;

  [[nodiscard]] std::string method() const {
    return question_.assurance == Assurance::average
               ? "normalised Frobenius norm"
               : "exact, " + std::to_string(question_.hamiltonian.qubits) + " qubits";
  }

  /// Ends of the spectrum of a block diagonal matrix i^k * blocks.
  static std::pair<double, double> ends(const Blocks& blocks, int k) {
    std::pair<double, double> result{-std::numeric_limits<double>::infinity(),
                                     std::numeric_limits<double>::infinity()};
    for (const Matrix<Scalar>* block : blocks) {
      const auto [high, low] = spectrum_ends<Scalar>(*block, k);
      result = {std::max(result.first, high), std::min(result.second, low)};
    }
    return result;
  }

  [[nodiscard]] double frobenius(const Blocks& blocks) const {
    double squares = 0.0;
    for (const Matrix<Scalar>* block : blocks) squares += block->squaredNorm();
    return std::sqrt(squares / dimension_) * (1.0 + 1e-12);
  }

  [[nodiscard]] double norm_of(const Blocks& blocks, int k) const {
    if (question_.assurance == Assurance::average) return frobenius(blocks);
    const auto [high, low] = ends(blocks, k);
    return question_.up_to_phase ? (high - low) / 2 : std::max(high, -low);
  }

  [[nodiscard]] double spread_of(const Blocks& blocks, int k) const {
    if (question_.assurance == Assurance::average) return 2 * frobenius(blocks);
    const auto [high, low] = ends(blocks, k);
    return high - low;
  }

  /// Takes the K, among several dampings and none at all, for which t ||z - D_H K|| + spread(K) is
  /// least.
  void choose_dressing(const std::vector<Matrix<Scalar>>& z, int power) {
    const auto pointers = [](const std::vector<Matrix<Scalar>>& blocks) {
      Blocks result;
      for (const Matrix<Scalar>& block : blocks) result.push_back(&block);
      return result;
    };
    std::vector<Matrix<Scalar>> best;
    for (const Matrix<Scalar>& block : z)
      best.push_back(Matrix<Scalar>::Zero(block.rows(), block.cols()));
    double best_spread = 0.0;
    double least = std::abs(question_.time) * norm_of(pointers(z), power);
    for (const double damping : dampings) {
      const double square = std::pow(damping * scale_, 2);
      std::vector<Matrix<Scalar>> m = z;
      std::vector<Matrix<Scalar>> rest = z;
      for (std::size_t s = 0; s < z.size(); ++s) {
        const Eigen::VectorXd& e = series_[s].energies();
        for (Eigen::Index b = 0; b < e.size(); ++b) {
          for (Eigen::Index a = 0; a < e.size(); ++a) {
            const double omega = e(a) - e(b);
            m[s](a, b) *= omega == 0.0 ? 0.0 : omega / (omega * omega + square);
            rest[s](a, b) -= omega * m[s](a, b);
          }
        }
      }
      const double spread = spread_of(pointers(m), power + 1);
      const double value = std::abs(question_.time) * norm_of(pointers(rest), power) + spread;
      if (value < least) {
        least = value;
        best = std::move(m);
        best_spread = spread;
      }
    }
    spreads_.emplace_back(power, best_spread);
    for (std::size_t s = 0; s < series_.size(); ++s)
      series_[s].add_dressing({power, std::move(best[s])});
  }

  void add_remainder(int degree, double factor, ErrorModel& result) const {
    std::map<int, double> largest;
    for (const SectorSeries<Scalar>& series : series_)
      for (const auto& [power, value] : series.remainder())
        largest[power] = std::max(largest[power], value);
    for (const auto& [power, value] : largest)
      result.terms.push_back({"remainder", "Frobenius norms, degree " + std::to_string(degree),
                              factor * value * (1.0 + 1e-10) / (power + 1), power + 1, power});
  }

  const Question& question_;
  std::vector<SectorSeries<Scalar>> series_;
  std::vector<std::pair<int, double>> spreads_;  ///< of each K, by its power
  double dimension_ = 1.0;
  double scale_ = 1.0;
};

template <typename Scalar>
ErrorModel build(const Question& question, const Sectors& sectors, int degree, int dressings) {
  DenseCertificate<Scalar> certificate(question, sectors);
  for (int k = 0; k < dressings; ++k) certificate.fit_next();
  return certificate.model(degree);
}

}  // namespace

bool dense_fits(const Hamiltonian& hamiltonian, const Layering& layering) {
  return hamiltonian.qubits <= dense_qubits &&
         find_sectors(hamiltonian, layering).cost() <= dense_cost;
}

std::optional<ErrorModel> dense_model(const Question& question, int degree, int dressings) {
  if (question.hamiltonian.qubits > dense_qubits || question.time == 0.0) return std::nullopt;
  const Sectors sectors = find_sectors(question.hamiltonian, question.layering);
  if (sectors.cost() > dense_cost) return std::nullopt;
  base::fix_eigen_blocking();
  return is_real(question.hamiltonian, sectors.axis)
             ? build<double>(question, sectors, degree, dressings)
             : build<Complex>(question, sectors, degree, dressings);
}

}  // namespace farrier::bounds
