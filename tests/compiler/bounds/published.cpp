// The published commutator bounds against the same commutators as dense matrices. Values of the
// Heisenberg ring come from a prototype in NumPy that shares no code with the program.
#include <doctest/doctest.h>

#include <cmath>
#include <vector>

#include "compiler/bounds/models.hpp"
#include "compiler/formulas/expand.hpp"
#include "tests/compiler/bounds/systems.hpp"

using farrier::Assurance;
using farrier::Layer;
using farrier::PauliSum;
using farrier::bounds::ErrorModel;
using farrier::bounds::published_model;
using farrier::bounds::Question;
using farrier::test::ask;
using farrier::test::coefficient;
using farrier::test::commutator;
using farrier::test::dense;
using farrier::test::Matrix;
using farrier::test::normalised_frobenius_norm;
using farrier::test::spectral_norm;
using farrier::test::System;

namespace {

using Dense = Matrix<long double>;

/// Sum of the coefficients of all terms.
double prefactor(const std::optional<ErrorModel>& model) {
  REQUIRE(model.has_value());
  double sum = 0.0;
  for (const auto& term : model->terms) sum += term.coefficient;
  return sum;
}

/// The sum of magnitudes of the coefficients in the Pauli basis.
long double one_norm(const Dense& matrix, std::uint32_t qubits) {
  long double sum = 0;
  for (std::uint32_t code = 0; code < 1U << (2 * qubits); ++code) {
    std::vector<farrier::Factor> string;
    for (std::uint32_t qubit = 0; qubit < qubits; ++qubit)
      if (const auto letter = (code >> (2 * qubit)) & 3U; letter != 0)
        string.emplace_back(qubit, static_cast<farrier::Pauli>(letter));
    sum += std::abs((dense<long double>(string, qubits) * matrix).trace()) /
           static_cast<long double>(matrix.rows());
  }
  return sum;
}

/// The bound with a norm of the caller's choice: order 1 or 2.
template <typename Norm>
double with_norm(const System& system, int order, Norm&& norm) {
  std::vector<Dense> layers;
  for (const Layer& layer : system.layering.layers)
    layers.push_back(dense<long double>(system.hamiltonian, layer));
  long double sum = 0;
  for (std::size_t k = 0; k < layers.size(); ++k) {
    Dense later = Dense::Zero(layers[k].rows(), layers[k].cols());
    for (std::size_t j = k + 1; j < layers.size(); ++j) later += layers[j];
    const Dense inner = commutator<long double>(layers[k], later);
    if (order == 1)
      sum += norm(inner) / 2;
    else
      sum += norm(commutator<long double>(later, inner)) / 12 +
             norm(commutator<long double>(layers[k], inner)) / 24;
  }
  return static_cast<double>(sum);
}

}  // namespace

TEST_CASE("published bounds of the Heisenberg ring") {
  const System system = farrier::test::heisenberg_ring();
  const auto spectral = [](const Dense& m) { return spectral_norm<long double>(m); };
  const auto one = [](const Dense& m) { return one_norm(m, 3); };
  // From the prototype: with exact norms, and with 1-norms.
  CHECK(with_norm(system, 1, spectral) == doctest::Approx(5.32189246065).epsilon(1e-11));
  CHECK(with_norm(system, 1, one) == doctest::Approx(10.0).epsilon(1e-11));
  CHECK(with_norm(system, 2, spectral) == doctest::Approx(5.69150289884).epsilon(1e-11));
  CHECK(with_norm(system, 2, one) == doctest::Approx(9.97333333333).epsilon(1e-11));

  const double first = prefactor(published_model(ask(system, "lie")));
  CHECK(first >= 5.3218924606);
  CHECK(first <= 10.000000001);
  const double second = prefactor(published_model(ask(system, "strang")));
  CHECK(second >= 5.6915028988);
  CHECK(second <= 9.973333334);
}

TEST_CASE("published bounds lie between the exact norms and the 1-norms") {
  for (const System& system :
       {farrier::test::heisenberg_ring(), farrier::test::two_letters(),
        farrier::test::ising_chain(), farrier::test::disordered_ring()})
    for (const int order : {1, 2}) {
      const double found =
          prefactor(published_model(ask(system, order == 1 ? "lie" : "strang")));
      CHECK(found >= with_norm(system, order,
                               [](const Dense& m) { return spectral_norm<long double>(m); }));
      CHECK(found <= with_norm(system, order, [&](const Dense& m) {
                       return one_norm(m, system.hamiltonian.qubits);
                     }) * (1.0 + 1e-12));
    }
}

TEST_CASE("published bounds of one qubit are exact commutators") {
  // D_X(0.7 Z) = -1.4 Y; D_Z of it and D_X of it have one string each.
  const System system = farrier::test::two_letters();
  CHECK(prefactor(published_model(ask(system, "lie"))) == doctest::Approx(0.7).epsilon(1e-13));
  const auto strang = published_model(ask(system, "strang"));
  REQUIRE(strang.has_value());
  CHECK(coefficient(*strang, "commutators with the later layers") ==
        doctest::Approx(4 * 0.49 / 12).epsilon(1e-13));
  CHECK(coefficient(*strang, "commutators with the layer itself") ==
        doctest::Approx(4 * 0.7 / 24).epsilon(1e-13));
}

TEST_CASE("published bounds in the normalised Frobenius norm") {
  for (const System& system : {farrier::test::heisenberg_ring(), farrier::test::ising_chain()})
    for (const int order : {1, 2}) {
      const double found = prefactor(
          published_model(ask(system, order == 1 ? "lie" : "strang", Assurance::average)));
      const double expected = with_norm(system, order, [](const Dense& m) {
        return normalised_frobenius_norm<long double>(m);
      });
      CHECK(found == doctest::Approx(expected).epsilon(1e-12));
      CHECK(found >= expected);
    }
}

TEST_CASE("the powers of published bounds") {
  const System system = farrier::test::heisenberg_ring();
  const auto lie = published_model(ask(system, "lie"));
  REQUIRE(lie.has_value());
  for (const auto& term : lie->terms) {
    CHECK(term.time_power == 2);
    CHECK(term.step_power == 1);
  }
  const auto strang = published_model(ask(system, "strang"));
  REQUIRE(strang.has_value());
  for (const auto& term : strang->terms) {
    CHECK(term.time_power == 3);
    CHECK(term.step_power == 2);
  }
}

TEST_CASE("the outer layer of Strang has the smaller share") {
  // The layers the other way round swap the constants 1/12 and 1/24: with the first layer far
  // larger, the bound is half as large.
  const System first = farrier::test::layered(1, {{{"X", 100.0}}, {{"Z", 0.01}}});
  const System last = farrier::test::layered(1, {{{"Z", 0.01}}, {{"X", 100.0}}});
  const double inside = prefactor(published_model(ask(last, "strang")));
  CHECK(prefactor(published_model(ask(first, "strang"))) ==
        doctest::Approx(inside / 2).epsilon(1e-3));
  // And so does the truth.
  const auto error = [](const System& system) {
    return farrier::test::Evolution<long double>(system.hamiltonian, system.layering)
        .error(farrier::formulas::expand(*farrier::find_formula("strang"), 2), 1e-3L, 1);
  };
  CHECK(static_cast<double>(error(last) / error(first)) == doctest::Approx(2.0).epsilon(1e-2));
}

TEST_CASE("other formulas have no published bound") {
  const System system = farrier::test::heisenberg_ring();
  CHECK_FALSE(published_model(ask(system, "suzuki-4")).has_value());
  CHECK_FALSE(published_model(ask(system, "suzuki-6")).has_value());
}

TEST_CASE("a published bound that costs too much is not made") {
  const System system = farrier::test::heisenberg_ring();
  for (const char* formula : {"lie", "strang"}) {
    Question question = ask(system, formula);
    question.work_limit = 3;
    CHECK_FALSE(published_model(question).has_value());
  }
}

TEST_CASE("published bounds of strings that reach over a long chain") {
  // 40 qubits or 2000 between the couplings: windows of 1, 2, 4 and 16 words, or none.
  const auto prefactor_at = [](std::uint32_t gap) {
    System system;
    system.hamiltonian.qubits = 5000;
    PauliSum& sum = system.hamiltonian.sum;
    using farrier::Factor;
    using farrier::Pauli;
    sum.add(std::vector<Factor>{{7, Pauli::x}, {7 + gap, Pauli::x}}, 1.0);
    sum.add(std::vector<Factor>{{7 + gap, Pauli::z}, {7 + 2 * gap, Pauli::z}}, 0.5);
    sum.merge();
    system.layering.layers = {{{{farrier::BlockKind::string, 0, 0, {0}}}},
                              {{{farrier::BlockKind::string, 0, 0, {1}}}}};
    return published_model(ask(system, "strang"));
  };
  const double home = prefactor(prefactor_at(1));
  for (const std::uint32_t gap : {20U, 40U, 100U, 400U}) CHECK(prefactor(prefactor_at(gap)) == home);
  CHECK_FALSE(prefactor_at(2000).has_value());
}
