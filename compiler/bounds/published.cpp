// The published commutator bounds of orders 1 and 2, with every commutator merged.
#include <string>

#include "compiler/bounds/layer_tables.hpp"
#include "compiler/bounds/models.hpp"
#include "compiler/bounds/table_norm.hpp"

namespace farrier::bounds {
namespace {

/// Sums of all layers after each layer.
template <std::size_t W>
std::vector<pauli::Table<W>> later_layers(const std::vector<pauli::Table<W>>& layers) {
  std::vector<pauli::Table<W>> later(layers.size());
  for (std::size_t k = layers.size(); k-- > 1;) {
    later[k - 1] = later[k];
    later[k - 1].add(layers[k]);
  }
  return later;
}

/// A bound on ||sum|| + the rounding of the commutators that it came from.
template <std::size_t W>
class NormSum {
 public:
  explicit NormSum(const Question& question) : question_(question) {}

  /// Adds factor * ||commutator||; `inherited` is the rounding (1-norm) of the inner commutator.
  void add(const pauli::Commutator<W>& commutator, double factor, double inherited) {
    const pauli::NormBound norm = table_norm(commutator.sum, question_);
    value_ += factor * (norm.value + inherited * commutator.growth + rounding(commutator));
    method_ = norm.method;
    ++count_;
  }

  static double rounding(const pauli::Commutator<W>& commutator) {
    return unit_roundoff * static_cast<double>(commutator.roundings) * commutator.mass;
  }

  [[nodiscard]] double value() const { return pauli::summed_up(value_ * (1.0 + 1e-14), count_); }
  [[nodiscard]] const std::string& method() const { return method_; }

 private:
  const Question& question_;
  double value_ = 0.0;
  std::size_t count_ = 0;
  std::string method_;
};

template <std::size_t W>
ErrorModel first_order(const Question& question) {
  const auto layers = layer_tables<W>(question.hamiltonian, question.layering);
  const auto later = later_layers(layers);
  pauli::Work work{0, question.work_limit};
  NormSum<W> sum(question);
  for (std::size_t k = 0; k + 1 < layers.size(); ++k) {
    const pauli::Commutant<W> commutant(layers[k], question.hamiltonian.qubits);
    sum.add(pauli::commute(commutant, later[k], 1.0, work), 0.5, 0.0);
  }
  return {
      "published commutator bound", {{"commutators", sum.method(), sum.value(), 2, 1}}, work.done};
}

template <std::size_t W>
ErrorModel second_order(const Question& question) {
  const auto layers = layer_tables<W>(question.hamiltonian, question.layering);
  const auto later = later_layers(layers);
  pauli::Work work{0, question.work_limit};
  NormSum<W> inner(question);
  NormSum<W> outer(question);
  for (std::size_t k = 0; k + 1 < layers.size(); ++k) {
    const pauli::Commutant<W> layer(layers[k], question.hamiltonian.qubits);
    const pauli::Commutant<W> rest(later[k], question.hamiltonian.qubits);
    const pauli::Commutator<W> first = pauli::commute(layer, later[k], 1.0, work);
    const double rounding = NormSum<W>::rounding(first);
    inner.add(pauli::commute(rest, first.sum, 1.0, work), 1.0 / 12, rounding);
    outer.add(pauli::commute(layer, first.sum, 1.0, work), 1.0 / 24, rounding);
  }
  return {"published commutator bound",
          {{"commutators with the later layers", inner.method(), inner.value(), 3, 2},
           {"commutators with the layer itself", outer.method(), outer.value(), 3, 2}},
          work.done};
}

}  // namespace

std::optional<ErrorModel> published_model(const Question& question) {
  const bool strang = question.formula.symmetric && question.formula.ramps.size() == 2;
  if (question.formula.order != 1 && !strang) return std::nullopt;
  try {
    return pauli::with_window([&]<std::size_t W>() {
      return strang ? second_order<W>(question) : first_order<W>(question);
    });
  } catch (const pauli::WorkExhausted&) {
    return std::nullopt;
  } catch (const pauli::WindowOverflow&) {
    return std::nullopt;
  }
}

}  // namespace farrier::bounds
