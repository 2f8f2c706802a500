// The error of a time-symmetric formula from the generator of the error in the midpoint frame.
#include <algorithm>
#include <cmath>
#include <string>
#include <utility>

#include "compiler/bounds/layer_tables.hpp"
#include "compiler/bounds/models.hpp"
#include "compiler/bounds/table_norm.hpp"
#include "compiler/formulas/expand.hpp"

namespace farrier::bounds {
namespace {

/// T(s) = sum_j coefficients[j] s^j + remainder, with the 1-norm of the rounding of each
/// coefficient and a bound remainder * s^degree on the rest.
template <std::size_t W>
class Generator {
 public:
  Generator(const Question& question, int degree)
      : question_(question),
        degree_(static_cast<std::size_t>(degree)),
        coefficients_(degree_, pauli::Table<W>(question.hamiltonian.qubits)),
        rounding_(degree_, 0.0),
        fractions_(question.layering.layers.size(), -0.5) {
    const auto tables = layer_tables<W>(question.hamiltonian, question.layering);
    for (const auto& table : tables) {
      coefficients_[0].add(table, -0.5);
      commutants_.emplace_back(table, question.hamiltonian.qubits);
    }
    layers_ = tables;
  }

  /// T <- exp(-i a s ad_X) T + a X.
  void conjugate(const Exponential& exponential, pauli::Work& work) {
    const double a = exponential.fraction;
    const pauli::Commutant<W>& layer = commutants_[exponential.layer];
    // Highest power first, so that each coefficient is used before it is changed.
    for (std::size_t j = degree_; j-- > 0;) {
      if (coefficients_[j].size() == 0) continue;
      expand(layer, a, j, work);
    }
    coefficients_[0].add(layers_[exponential.layer], a);
    // T_0 is (fractions so far - 1/2) times each layer: the product and the sum are rounded.
    double& fraction = fractions_[exponential.layer];
    fraction += a;
    rounding_[0] += 1.01 * unit_roundoff * (std::abs(a) + std::abs(fraction)) *
                    layers_[exponential.layer].one_norm();
  }

  [[nodiscard]] const pauli::Table<W>& coefficient(std::size_t j) const { return coefficients_[j]; }
  // Themselves sums of up to millions of non-negative numbers.
  [[nodiscard]] double rounding(std::size_t j) const { return rounding_[j] * (1.0 + 1e-9); }
  [[nodiscard]] double remainder() const { return remainder_ * (1.0 + 1e-11); }

 private:
  /// Adds (a^m/m!) D_X^m T_j to T_(j+m) for m = 1, 2, ..., and what is left to the remainder.
  void expand(const pauli::Commutant<W>& layer, double a, std::size_t j, pauli::Work& work) {
    pauli::Table<W> owned;
    const pauli::Table<W>* derivative = &coefficients_[j];
    double inherited = rounding_[j];
    for (std::size_t m = 1; j + m < degree_; ++m) {
      const double factor = a / static_cast<double>(m);
      pauli::Commutator<W> next = pauli::commute(layer, *derivative, factor, work);
      inherited =
          inherited * next.growth + unit_roundoff * static_cast<double>(next.roundings) * next.mass;
      owned = std::move(next.sum);
      derivative = &owned;
      if (owned.size() == 0 && inherited == 0.0) return;
      coefficients_[j + m].add(owned);
      rounding_[j + m] += inherited + unit_roundoff * coefficients_[j + m].one_norm();
    }
    const double last = a / static_cast<double>(degree_ - j);
    const pauli::CommutatorNorm left_out =
        pauli::commutator_one_norm(layer, *derivative, last, work);
    remainder_ += pauli::summed_up(left_out.norm, derivative->size() + layer.size()) +
                  inherited * left_out.growth;
  }

  const Question& question_;
  std::size_t degree_;
  std::vector<pauli::Table<W>> coefficients_;
  std::vector<double> rounding_;
  std::vector<double> fractions_;
  double remainder_ = 0.0;
  std::vector<pauli::Table<W>> layers_;
  std::vector<pauli::Commutant<W>> commutants_;
};

/// A power of s below the formula's order, there only through the rounding of its coefficients.
ErrorTerm residue_term(int power, double norm) {
  return {"order conditions", "1-norm, rounding of the coefficients", norm, power + 1, power};
}

template <std::size_t W>
ErrorModel build(const Question& question, int degree) {
  Generator<W> generator(question, degree);
  pauli::Work work{0, question.work_limit};
  for (const Exponential& exponential :
       formulas::expand_first_half(question.formula, question.layering.layers.size()))
    generator.conjugate(exponential, work);

  ErrorModel model{"midpoint frame", {}, work.done};
  for (int j = 0; j < degree; j += 2) {
    const auto index = static_cast<std::size_t>(j);
    const pauli::Table<W>& sum = generator.coefficient(index);
    // E_j = 2 T_j, integrated over [0, tau]: tau^(j+1)/(j+1), r times.
    const double weight = 2.0 / (j + 1);
    if (j < question.formula.order) {
      const double norm = sum.one_norm() * (1.0 + 1e-10) + generator.rounding(index);
      if (norm > 0.0) model.terms.push_back(residue_term(j, weight * norm));
      continue;
    }
    const pauli::NormBound norm = table_norm(sum, question);
    model.terms.push_back({j == question.formula.order ? "leading" : "order " + std::to_string(j),
                           norm.method, weight * norm.value, j + 1, j});
    model.terms.push_back(
        {"rounding", "counted operations", weight * generator.rounding(index), j + 1, j});
  }
  model.terms.push_back({"remainder", "1-norms of commutators, degree " + std::to_string(degree),
                         2.0 / (degree + 1) * generator.remainder(), degree + 1, degree});
  return model;
}

}  // namespace

std::optional<ErrorModel> midpoint_model(const Question& question, int degree) {
  if (!question.formula.symmetric || degree < 2 || degree % 2 != 0) return std::nullopt;
  try {
    return pauli::with_window([&]<std::size_t W>() { return build<W>(question, degree); });
  } catch (const pauli::WorkExhausted&) {
    return std::nullopt;
  } catch (const pauli::WindowOverflow&) {
    return std::nullopt;
  }
}

}  // namespace farrier::bounds
