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
                     bool up_to_phase, double time) {
  const Formula* found = find_formula(formula);
  REQUIRE(found != nullptr);
  return {system.hamiltonian, system.layering, *found, assurance, up_to_phase, time,
          1'000'000'000};
}

double coefficient(const bounds::ErrorModel& model, std::string_view name) {
  const auto found = std::ranges::find(model.terms, name, &bounds::ErrorTerm::name);
  INFO("no term of the name ", std::string(name));
  REQUIRE(found != model.terms.end());
  return found->coefficient;
}

namespace {

using Dense = Matrix<long double>;
using Complex = std::complex<long double>;

/// The exponentials that turn the generator in a frame, as operators and fractions.
struct Turn {
  Dense layer;
  long double fraction = 0;
};

/// For symmetric formulas the half that acts first, on -H/2; for others the whole and then exp(iHs),
/// on nothing.
std::vector<Turn> turns(const System& system, const Formula& formula) {
  const Hamiltonian& hamiltonian = system.hamiltonian;
  const std::size_t layers = system.layering.layers.size();
  std::vector<Turn> result;
  for (const Exponential& exponential : formula.symmetric
                                            ? formulas::expand_first_half(formula, layers)
                                            : formulas::expand(formula, layers))
    result.push_back(
        {dense<long double>(hamiltonian, system.layering.layers[exponential.layer]),
         static_cast<long double>(exponential.fraction)});
  if (!formula.symmetric)
    result.push_back({dense<long double>(hamiltonian.sum, hamiltonian.qubits), -1});
  return result;
}

Dense start(const System& system, const Formula& formula) {
  const Dense h = dense<long double>(system.hamiltonian.sum, system.hamiltonian.qubits);
  return h * Complex(formula.symmetric ? -0.5L : 0.0L);
}

}  // namespace

std::vector<Dense> error_generator(const System& system, const Formula& formula, int degree) {
  const Dense first = start(system, formula);
  std::vector<Dense> powers(static_cast<std::size_t>(degree),
                            Dense::Zero(first.rows(), first.cols()));
  powers[0] = first;
  for (const Turn& turn : turns(system, formula)) {
    std::vector<Dense> next = powers;
    for (std::size_t j = 0; j < powers.size(); ++j) {
      Dense derivative = powers[j];
      for (std::size_t m = 1; j + m < powers.size(); ++m) {
        derivative = commutator<long double>(turn.layer, derivative) *
                     Complex(turn.fraction / static_cast<long double>(m));
        next[j + m] += derivative;
      }
    }
    next[0] += turn.layer * Complex(turn.fraction);
    powers = next;
  }
  if (formula.symmetric)
    for (std::size_t j = 0; j < powers.size(); ++j) powers[j] *= Complex(j % 2 == 0 ? 2 : 0);
  return powers;
}

Dense error_generator_at(const System& system, const Formula& formula, long double s) {
  const auto at = [&](long double place) {
    Dense value = start(system, formula);
    for (const Turn& turn : turns(system, formula)) {
      const Dense unitary = Spectrum<long double>(turn.layer).exponential(turn.fraction * place);
      value = unitary * value * unitary.adjoint() + turn.layer * Complex(turn.fraction);
    }
    return value;
  };
  return formula.symmetric ? Dense(at(s) + at(-s)) : at(s);
}

}  // namespace farrier::test
