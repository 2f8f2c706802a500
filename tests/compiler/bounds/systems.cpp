// Small Hamiltonians whose error operators are known from elsewhere.
#include "tests/compiler/bounds/systems.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <string>

#include "compiler/formulas/expand.hpp"
#include "tests/support/random.hpp"

namespace farrier::test {

System layered(std::uint32_t qubits, const std::vector<LayerTerms>& layers) {
  System system;
  system.hamiltonian.qubits = qubits;
  PauliSum& sum = system.hamiltonian.sum;
  for (const LayerTerms& layer : layers)
    for (const auto& [letters, value] : layer) sum.add(word(letters), value);
  sum.merge();
  for (const LayerTerms& layer : layers) {
    Layer& made = system.layering.layers.emplace_back();
    for (const auto& [letters, value] : layer) {
      const std::vector<Factor> string = word(letters);
      std::uint32_t term = 0;
      while (!std::ranges::equal(sum.factors(term), string)) ++term;
      made.blocks.push_back(
          {BlockKind::string, string.front().qubit(), string.back().qubit(), {term}});
    }
  }
  return system;
}

System heisenberg_ring() {
  return layered(3, {{{"XXI", 1}, {"IXX", 1}, {"XIX", 1}},
                     {{"YYI", 1}, {"IYY", 1}, {"YIY", 1}},
                     {{"ZZI", 1}, {"IZZ", 1}, {"ZIZ", 1}, {"ZII", 0.5}, {"IZI", -0.3}, {"IIZ", 0.2}}});
}

System two_letters() { return layered(1, {{{"X", 1}}, {{"Z", 0.7}}}); }

System ising_chain() {
  return layered(4, {{{"ZZII", 1}, {"IZZI", 1}, {"IIZZ", 1}},
                     {{"XIII", 1}, {"IXII", 1}, {"IIXI", 1}, {"IIIX", 1}}});
}

System disordered_ring() {
  return layered(4, {{{"XXII", 1}, {"IXXI", 1}, {"IIXX", 1}, {"XIIX", 1}},
                     {{"YYII", 1}, {"IYYI", 1}, {"IIYY", 1}, {"YIIY", 1}},
                     {{"ZZII", 1}, {"IZZI", 1}, {"IIZZ", 1}, {"ZIIZ", 1},
                      {"ZIII", -0.165955990594852}, {"IZII", 0.440648986884316},
                      {"IIZI", -0.99977125036531}, {"IIIZ", -0.39533485473632}}});
}

bounds::Question ask(const System& system, std::string_view formula, Assurance assurance,
                     bool up_to_phase) {
  const Formula* found = find_formula(formula);
  REQUIRE(found != nullptr);
  return {system.hamiltonian, system.layering, *found, assurance, up_to_phase, 1'000'000'000};
}

double coefficient(const bounds::ErrorModel& model, std::string_view name) {
  const auto found = std::ranges::find(model.terms, name, &bounds::ErrorTerm::name);
  INFO("no term of the name ", std::string(name));
  REQUIRE(found != model.terms.end());
  return found->coefficient;
}

std::vector<Matrix<long double>> generator(const System& system, const Formula& formula,
                                           int degree) {
  const Hamiltonian& hamiltonian = system.hamiltonian;
  std::vector<Matrix<long double>> layers;
  for (const Layer& layer : system.layering.layers)
    layers.push_back(dense<long double>(hamiltonian, layer));
  std::vector<Matrix<long double>> powers(
      static_cast<std::size_t>(degree),
      Matrix<long double>::Zero(layers.front().rows(), layers.front().cols()));
  for (const auto& layer : layers) powers[0] -= layer / 2;
  for (const Exponential& exponential : formulas::expand_first_half(formula, layers.size())) {
    const Matrix<long double>& layer = layers[exponential.layer];
    const long double a = exponential.fraction;
    std::vector<Matrix<long double>> next = powers;
    for (std::size_t j = 0; j < powers.size(); ++j) {
      Matrix<long double> derivative = powers[j];
      for (std::size_t m = 1; j + m < powers.size(); ++m) {
        derivative = commutator<long double>(layer, derivative) *
                     std::complex<long double>(a / static_cast<long double>(m));
        next[j + m] += derivative;
      }
    }
    next[0] += layer * std::complex<long double>(a);
    powers = next;
  }
  return powers;
}

Matrix<long double> generator_at(const System& system, const Formula& formula, long double s) {
  Matrix<long double> value =
      dense<long double>(system.hamiltonian.sum, system.hamiltonian.qubits) *
      std::complex<long double>(-0.5L);
  for (const Exponential& exponential :
       formulas::expand_first_half(formula, system.layering.layers.size())) {
    const auto layer =
        dense<long double>(system.hamiltonian, system.layering.layers[exponential.layer]);
    const long double a = exponential.fraction;
    const Matrix<long double> turn = Spectrum<long double>(layer).exponential(a * s);
    value = turn * value * turn.adjoint() + layer * std::complex<long double>(a);
  }
  return value;
}

}  // namespace farrier::test
