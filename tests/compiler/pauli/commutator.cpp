// Commutators of sums against matrices, and their rounding data against sums in long double.
#include "compiler/pauli/commutator.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <cstdint>
#include <map>
#include <vector>

#include "compiler/pauli/strings.hpp"
#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::Factor;
using farrier::Pauli;
using farrier::PauliSum;
using farrier::test::dense;
using farrier::test::Matrix;
using farrier::test::Random;
using farrier::test::random_integer_sum;
using farrier::test::random_sum;
using farrier::test::shifted;
using farrier::test::word;
namespace pauli = farrier::pauli;

namespace {

constexpr double unit_roundoff = 0x1p-53;

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

template <std::size_t W>
pauli::Commutator<W> commute(const pauli::Table<W>& a, const pauli::Table<W>& b, double factor,
                             std::uint32_t qubits) {
  pauli::Work work;
  return pauli::commute(pauli::Commutant<W>(a, qubits), b, factor, work);
}

/// factor * D_A(B) by the sparse products, with the inputs taken as exact and sums in long double.
std::map<std::vector<Factor>, long double> reference(const PauliSum& a, const PauliSum& b,
                                                     double factor) {
  std::map<std::vector<Factor>, long double> sum;
  for (std::size_t j = 0; j < b.size(); ++j)
    for (std::size_t k = 0; k < a.size(); ++k) {
      if (pauli::commute(a.factors(k), b.factors(j))) continue;
      const auto product = pauli::multiply(a.factors(k), b.factors(j));
      // -i [aQ, bP] = -2i ab QP, and QP = +-i R.
      const long double sign = product.quarter_turns == 1 ? 1 : -1;
      sum[product.factors] +=
          2 * sign * static_cast<long double>(factor) * a.coefficient(k) * b.coefficient(j);
    }
  return sum;
}

/// The 1-norm of the difference.
template <std::size_t W>
long double distance(const pauli::Table<W>& table,
                     std::map<std::vector<Factor>, long double> sum) {
  long double total = 0;
  for (std::size_t k = 0; k < table.size(); ++k)
    sum[pauli::unpack(table.string(k))] -= table.coefficient(k);
  for (const auto& [string, value] : sum) total += std::abs(value);
  return total;
}

template <std::size_t W>
bool same(const pauli::Table<W>& a, const pauli::Table<W>& b) {
  if (a.size() != b.size()) return false;
  for (std::size_t k = 0; k < a.size(); ++k)
    if (!(a.string(k) == b.string(k)) || a.coefficient(k) != b.coefficient(k)) return false;
  return true;
}

}  // namespace

TEST_CASE("D_X of Z is -2Y") {
  // -i [X, Z] = -i (XZ - ZX) = -i (-2iY) = -2Y
  PauliSum x;
  x.add(word("X"), 1.0);
  PauliSum z;
  z.add(word("Z"), 0.7);
  const auto result = commute(table_of<1>(x, 1), table_of<1>(z, 1), 0.5, 1);
  REQUIRE(result.sum.size() == 1);
  CHECK(pauli::unpack(result.sum.string(0)) == word("Y"));
  CHECK(result.sum.coefficient(0) == -0.7);
  CHECK(result.mass == 0.7);
  CHECK(result.growth == 1.0);
}

TEST_CASE("commutators of sums with whole coefficients are exact") {
  Random random(41);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits)
    for (int round = 0; round < 6; ++round) {
      const PauliSum a = random_integer_sum(random, qubits, 12);
      const PauliSum b = random_integer_sum(random, qubits, 12);
      const auto result = commute(table_of<1>(a, qubits), table_of<1>(b, qubits), 0.5, qubits);
      const Matrix<double> expected =
          0.5 * farrier::test::commutator<double>(dense<double>(a, qubits),
                                                  dense<double>(b, qubits));
      CHECK(dense<double>(result.sum, qubits) == expected);
      CHECK(distance(result.sum, reference(a, b, 0.5)) == 0);
    }
}

TEST_CASE("nested commutators agree with the matrices") {
  Random random(42);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits)
    for (int round = 0; round < 3; ++round) {
      const PauliSum a = random_sum(random, qubits, 10);
      const PauliSum b = random_sum(random, qubits, 10);
      const Matrix<double> left = dense<double>(a, qubits);
      Matrix<double> expected = dense<double>(b, qubits);
      pauli::Table<1> nested = table_of<1>(b, qubits);
      pauli::Work work;
      const pauli::Commutant<1> commutant(table_of<1>(a, qubits), qubits);
      for (int depth = 1; depth <= 4; ++depth) {
        nested = pauli::commute(commutant, nested, 1.0 / depth, work).sum;
        expected = farrier::test::commutator<double>(left, expected) / depth;
        const double error = (dense<double>(nested, qubits) - expected).cwiseAbs().maxCoeff();
        CHECK(error <= 1e-12 * (1.0 + expected.cwiseAbs().maxCoeff()));
      }
    }
}

TEST_CASE("the Jacobi identity holds exactly for whole coefficients") {
  Random random(43);
  for (std::uint32_t qubits = 2; qubits <= 5; ++qubits) {
    const auto a = table_of<1>(random_integer_sum(random, qubits, 10), qubits);
    const auto b = table_of<1>(random_integer_sum(random, qubits, 10), qubits);
    const auto c = table_of<1>(random_integer_sum(random, qubits, 10), qubits);
    pauli::Table<1> sum;
    sum.add(commute(a, commute(b, c, 1.0, qubits).sum, 1.0, qubits).sum);
    sum.add(commute(b, commute(c, a, 1.0, qubits).sum, 1.0, qubits).sum);
    sum.add(commute(c, commute(a, b, 1.0, qubits).sum, 1.0, qubits).sum);
    CHECK(sum.size() > 0);
    CHECK(sum.one_norm() == 0.0);
  }
}

TEST_CASE("commutators are the same in every window") {
  Random random(44);
  for (int round = 0; round < 10; ++round) {
    const PauliSum a = random_sum(random, 6, 12);
    const PauliSum b = random_sum(random, 6, 12);
    const auto expected = reference(a, b, 1.0);
    const auto narrow = commute(table_of<1>(a, 6), table_of<1>(b, 6), 1.0, 6);
    const auto middle = commute(table_of<2>(a, 6), table_of<2>(b, 6), 1.0, 6);
    const auto wide = commute(table_of<4>(a, 6), table_of<4>(b, 6), 1.0, 6);
    REQUIRE(narrow.sum.size() == wide.sum.size());
    for (std::size_t k = 0; k < wide.sum.size(); ++k) {
      CHECK(pauli::unpack(narrow.sum.string(k)) == pauli::unpack(wide.sum.string(k)));
      CHECK(narrow.sum.coefficient(k) == middle.sum.coefficient(k));
      CHECK(narrow.sum.coefficient(k) == wide.sum.coefficient(k));
    }
    CHECK(narrow.mass == wide.mass);
    CHECK(narrow.growth == wide.growth);
    CHECK(distance(wide.sum, expected) < 1e-14);
  }
}

TEST_CASE("commutators are the same wherever they stand on a long chain") {
  constexpr std::uint32_t qubits = 2000;
  Random random(45);
  for (const std::uint32_t shift : {1U, 61U, 64U, 125U, 190U, 1000U, 1990U}) {
    const PauliSum a = random_integer_sum(random, 6, 12);
    const PauliSum b = random_integer_sum(random, 6, 12);
    const auto nested = [&]<std::size_t W>(std::uint32_t count, std::uint32_t by) {
      const auto left = table_of<W>(a, count, by);
      return commute(left, commute(left, table_of<W>(b, count, by), 1.0, count).sum, 1.0, count)
          .sum;
    };
    const auto home = nested.operator()<1>(6, 0);
    const auto narrow = nested.operator()<1>(qubits, shift);
    const auto wide = nested.operator()<2>(qubits, shift);
    REQUIRE(home.size() == narrow.size());
    REQUIRE(home.size() == wide.size());
    for (std::size_t k = 0; k < home.size(); ++k) {
      const auto moved = shifted(pauli::unpack(home.string(k)), shift);
      CHECK(pauli::unpack(narrow.string(k)) == moved);
      CHECK(pauli::unpack(wide.string(k)) == moved);
      CHECK(narrow.coefficient(k) == home.coefficient(k));
      CHECK(wide.coefficient(k) == home.coefficient(k));
    }
  }
}

TEST_CASE("a chain of couplings of many bases commutes as the sparse products say") {
  constexpr std::uint32_t qubits = 300;
  Random random(46);
  const auto draw = [&] {
    PauliSum sum;
    for (int k = 0; k < 60; ++k) {
      const std::uint32_t first = random.integer(0, qubits - 20);
      const auto string = farrier::test::random_string_of_weight(random, 20, random.integer(1, 4));
      sum.add(shifted(string, first), std::floor(random.between(1.0, 9.0)));
    }
    sum.merge();
    return sum;
  };
  for (int round = 0; round < 10; ++round) {
    const PauliSum a = draw();
    const PauliSum b = draw();
    const auto expected = reference(a, b, 1.0);
    CHECK(distance(commute(table_of<1>(a, qubits), table_of<1>(b, qubits), 1.0, qubits).sum,
                   expected) == 0);
    CHECK(distance(commute(table_of<2>(a, qubits), table_of<2>(b, qubits), 1.0, qubits).sum,
                   expected) == 0);
    CHECK(distance(commute(table_of<16>(a, qubits), table_of<16>(b, qubits), 1.0, qubits).sum,
                   expected) == 0);
  }
}

TEST_CASE("a commutator that outgrows the window says so") {
  PauliSum a;
  a.add(std::vector<Factor>{{0, Pauli::x}, {60, Pauli::z}}, 1.0);
  PauliSum b;
  b.add(std::vector<Factor>{{60, Pauli::x}, {120, Pauli::x}}, 1.0);
  CHECK_THROWS_AS(commute(table_of<1>(a, 200), table_of<1>(b, 200), 1.0, 200),
                  pauli::WindowOverflow);
  const auto wide = commute(table_of<2>(a, 200), table_of<2>(b, 200), 1.0, 200);
  CHECK(distance(wide.sum, reference(a, b, 1.0)) == 0);
}

TEST_CASE("the rounding of a commutator is bounded by its mass and roundings") {
  Random random(47);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits)
    for (int round = 0; round < 10; ++round) {
      const PauliSum a = random_sum(random, qubits, 20U << qubits);
      const PauliSum b = random_sum(random, qubits, 20U << qubits);
      const auto result = commute(table_of<1>(a, qubits), table_of<1>(b, qubits), 0.3, qubits);
      const long double error = distance(result.sum, reference(a, b, 0.3));
      CHECK(error > 0);
      CHECK(error <= unit_roundoff * static_cast<double>(result.roundings) * result.mass);
    }
}

TEST_CASE("mass and growth are the sums that they are said to be") {
  Random random(48);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits) {
    const PauliSum a = random_sum(random, qubits, 15);
    const PauliSum b = random_sum(random, qubits, 15);
    const double factor = -0.7;
    double mass = 0.0;
    double growth = 0.0;
    std::uint64_t products = 0;
    for (std::size_t j = 0; j < b.size(); ++j) {
      double row = 0.0;
      for (std::size_t k = 0; k < a.size(); ++k) {
        if (pauli::commute(a.factors(k), b.factors(j))) continue;
        row += 2 * std::abs(factor * a.coefficient(k));
        ++products;
      }
      mass += row * std::abs(b.coefficient(j));
      growth = std::max(growth, row);
    }
    pauli::Work work;
    const pauli::Commutant<1> commutant(table_of<1>(a, qubits), qubits);
    const auto result = pauli::commute(commutant, table_of<1>(b, qubits), factor, work);
    CHECK(result.mass == doctest::Approx(mass).epsilon(1e-14));
    CHECK(result.growth == doctest::Approx(growth).epsilon(1e-14));
    CHECK(work.done == products);
    CHECK(result.sum.one_norm() <= result.mass * (1.0 + 1e-14));

    const auto norm = pauli::commutator_one_norm(commutant, table_of<1>(b, qubits), factor, work);
    CHECK(norm.norm == doctest::Approx(mass).epsilon(1e-14));
    CHECK(norm.growth == doctest::Approx(growth).epsilon(1e-14));
    const Matrix<double> exact =
        std::abs(factor) * farrier::test::commutator<double>(dense<double>(a, qubits),
                                                             dense<double>(b, qubits));
    CHECK(norm.norm >= farrier::test::spectral_norm<double>(exact));
  }
}

TEST_CASE("an error in the inner sum grows by at most the growth") {
  Random random(49);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits) {
    const PauliSum a = random_integer_sum(random, qubits, 15);
    const PauliSum b = random_integer_sum(random, qubits, 15);
    const auto left = table_of<1>(a, qubits);
    const auto right = table_of<1>(b, qubits);
    auto disturbed = right;
    double disturbance = 0.0;
    for (std::size_t k = 0; k < right.size(); ++k) {
      const double change = std::floor(random.between(-3.0, 4.0));
      disturbed.add(right.string(k), change);
      disturbance += std::abs(change);
    }
    const auto clean = commute(left, right, 1.0, qubits);
    pauli::Table<1> difference = commute(left, disturbed, 1.0, qubits).sum;
    difference.add(clean.sum, -1.0);
    CHECK(difference.one_norm() <= clean.growth * disturbance);
  }
}

TEST_CASE("a coefficient of zero still carries its string") {
  PauliSum a;
  a.add(word("X"), 3.0);
  pauli::Table<1> b;
  b.add(pauli::pack<1>(word("Z"), 1), 0.0);
  const auto result = commute(table_of<1>(a, 1), b, 1.0, 1);
  CHECK(result.sum.size() == 1);
  CHECK(result.mass == 0.0);
  CHECK(result.growth == 6.0);
}

TEST_CASE("the identity commutes with everything") {
  PauliSum a;
  a.add(word("X"), 3.0);
  pauli::Table<1> identity;
  identity.add(pauli::Packed<1>{}, 2.0);
  const auto result = commute(table_of<1>(a, 1), identity, 1.0, 1);
  CHECK(result.sum.size() == 0);
  CHECK(result.growth == 0.0);
  const pauli::Commutant<1> commutant(identity, 1);
  CHECK(commutant.size() == 0);
}

TEST_CASE("work beyond the limit is not done") {
  Random random(50);
  const auto a = table_of<1>(random_sum(random, 5, 40), 5);
  const auto b = table_of<1>(random_sum(random, 5, 40), 5);
  const pauli::Commutant<1> commutant(a, 5);
  pauli::Work unlimited;
  const auto whole = pauli::commute(commutant, b, 1.0, unlimited);
  pauli::Work exact{0, unlimited.done};
  CHECK(same(pauli::commute(commutant, b, 1.0, exact).sum, whole.sum));
  CHECK_FALSE(exact.exhausted());
  pauli::Work short_of_one{0, unlimited.done - 1};
  CHECK_THROWS_AS(pauli::commute(commutant, b, 1.0, short_of_one), pauli::WorkExhausted);
  pauli::Work spent{unlimited.done, unlimited.done};
  CHECK_THROWS_AS(pauli::commutator_one_norm(commutant, b, 1.0, spent), pauli::WorkExhausted);
}

TEST_CASE("a commutant counts its terms and the most on one qubit") {
  PauliSum sum;
  for (const char* letters : {"XX", "IXX", "IZZ", "IIZ", "ZII"}) sum.add(word(letters), 1.0);
  const pauli::Commutant<1> commutant(table_of<1>(sum, 3), 3);
  CHECK(commutant.size() == 5);
  CHECK(commutant.degree() == 3);
  CHECK(commutant.base_is_fixed());
  CHECK_FALSE(pauli::Commutant<1>(table_of<1>(sum, 65), 65).base_is_fixed());
  CHECK(pauli::Commutant<2>(table_of<2>(sum, 65), 65).base_is_fixed());
}
