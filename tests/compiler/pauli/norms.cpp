// Norms from above: never below the spectral norm that Eigen finds, never above the 1-norm, and equal
// to the spectral norm where theory says so.
#include "compiler/pauli/norms.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <cstdint>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::PauliSum;
using farrier::test::dense;
using farrier::test::Matrix;
using farrier::test::Random;
using farrier::test::shifted;
using farrier::test::word;
namespace pauli = farrier::pauli;

namespace {

template <std::size_t W>
pauli::Table<W> table_of(const PauliSum& sum, std::uint32_t qubits, std::uint32_t shift = 0) {
  pauli::Table<W> table;
  for (std::size_t k = 0; k < sum.size(); ++k) {
    const auto factors = sum.factors(k);
    table.add(pauli::pack<W>(shifted({factors.begin(), factors.end()}, shift), qubits),
              sum.coefficient(k));
  }
  return table;
}

pauli::Table<1> table_of_words(const std::vector<std::pair<const char*, double>>& terms) {
  pauli::Table<1> table;
  for (const auto& [letters, coefficient] : terms)
    table.add(pauli::pack<1>(word(letters), 4), coefficient);
  return table;
}

double exact_norm(const Matrix<long double>& hermitian) {
  return static_cast<double>(farrier::test::Spectrum<long double>(hermitian).norm());
}

}  // namespace

TEST_CASE("a norm from above lies between the spectral norm and the 1-norm") {
  Random random(51);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits)
    for (int round = 0; round < 20; ++round) {
      PauliSum sum = farrier::test::random_sum(random, qubits, random.integer(1, 30));
      // Coefficients of very different sizes.
      PauliSum spread;
      for (std::size_t k = 0; k < sum.size(); ++k)
        spread.add(sum.factors(k), sum.coefficient(k) * std::pow(10.0, random.integer(0, 6)));
      for (const PauliSum& any : {sum, spread}) {
        const auto table = table_of<1>(any, qubits);
        const double exact = exact_norm(dense<long double>(any, qubits));
        const pauli::NormBound bound = pauli::norm_from_above(table, qubits);
        CHECK(bound.value >= exact);
        CHECK(bound.value <= pauli::summed_up(table.one_norm(), table.size()));
        CHECK((bound.method == "1-norm" || bound.method == "anticommuting sets"));
        const auto sets = pauli::anticommuting_sets_norm(table, qubits, 1'000'000);
        REQUIRE(sets.has_value());
        CHECK(*sets >= exact);
        CHECK(*sets >= bound.value);
      }
    }
}

TEST_CASE("mutually anticommuting strings have the root of the sum of squares") {
  // (sum c_k P_k)^2 = sum c_k^2 where the strings anticommute.
  const auto table = table_of_words({{"X", 3.0}, {"Y", 4.0}, {"ZX", 12.0}, {"ZZ", 84.0}});
  const pauli::NormBound bound = pauli::norm_from_above(table, 4);
  CHECK(bound.value == doctest::Approx(85.0).epsilon(1e-14));
  CHECK(bound.value >= 85.0);
  CHECK(bound.method == "anticommuting sets");
}

TEST_CASE("strings on different qubits have the 1-norm") {
  // The eigenvalues of the letters add up.
  const auto table = table_of_words({{"X", 1.0}, {"IY", -2.0}, {"IIZ", 4.0}, {"IIIX", 8.0}});
  const pauli::NormBound bound = pauli::norm_from_above(table, 4);
  CHECK(bound.value == doctest::Approx(15.0).epsilon(1e-14));
  CHECK(bound.value >= 15.0);
  CHECK(bound.method == "1-norm");
}

TEST_CASE("two anticommuting sets add up") {
  const auto table = table_of_words({{"X", 3.0}, {"Z", 4.0}, {"IX", 5.0}, {"IY", 12.0}});
  CHECK(pauli::norm_from_above(table, 4).value == doctest::Approx(18.0).epsilon(1e-14));
}

TEST_CASE("the identity string counts in full") {
  // The largest eigenvalue of 2 + X is 3, and 1 anticommutes with nothing.
  const auto table = table_of_words({{"", 2.0}, {"X", 3.0}, {"Z", 4.0}});
  CHECK(pauli::norm_from_above(table, 4).value == doctest::Approx(7.0).epsilon(1e-14));
}

TEST_CASE("norms of nothing and of one string") {
  CHECK(pauli::norm_from_above(pauli::Table<1>{}, 4).value == 0.0);
  CHECK(pauli::norm_from_above(table_of_words({{"XY", -0.3}}), 4).value ==
        doctest::Approx(0.3).epsilon(1e-14));
}

TEST_CASE("a search for sets that is too long is given up") {
  Random random(52);
  const auto table = table_of<1>(farrier::test::random_sum(random, 5, 60), 5);
  CHECK_FALSE(pauli::anticommuting_sets_norm(table, 5, 10).has_value());
  CHECK(pauli::anticommuting_sets_norm(table, 5, 1'000'000).has_value());
}

TEST_CASE("norms are the same wherever a sum stands on a long chain") {
  Random random(53);
  for (const std::uint32_t shift : {60U, 64U, 900U}) {
    const PauliSum sum = farrier::test::random_sum(random, 5, 30);
    const double home = pauli::norm_from_above(table_of<1>(sum, 5), 5).value;
    CHECK(pauli::norm_from_above(table_of<1>(sum, 1000, shift), 1000).value == home);
    CHECK(pauli::norm_from_above(table_of<2>(sum, 1000, shift), 1000).value == home);
    CHECK(pauli::norm_from_above(table_of<4>(sum, 1000, shift), 1000).value == home);
  }
}

TEST_CASE("norms of strings that no window holds together") {
  // X0 Z60 and X60 X120 anticommute, though 121 qubits do not fit into one word.
  pauli::Table<1> table;
  table.add(pauli::pack<1>(std::vector<farrier::Factor>{{0, farrier::Pauli::x},
                                                        {60, farrier::Pauli::z}}, 200), 3.0);
  table.add(pauli::pack<1>(std::vector<farrier::Factor>{{60, farrier::Pauli::x},
                                                        {120, farrier::Pauli::x}}, 200), 4.0);
  CHECK(pauli::norm_from_above(table, 200).value == doctest::Approx(5.0).epsilon(1e-14));
}

TEST_CASE("adding up many numbers is charged") {
  // 0.1 is no double, so that a sum of a thousand of them is rounded at almost every step.
  double sum = 0.0;
  for (int k = 0; k < 1000; ++k) sum += 0.1;
  const long double exact = 1000 * static_cast<long double>(0.1);
  REQUIRE(sum < exact);
  CHECK(pauli::summed_up(sum, 1000) >= exact);
  CHECK(pauli::summed_up(sum, 1000) <= sum * (1.0 + 2e-13));
}
