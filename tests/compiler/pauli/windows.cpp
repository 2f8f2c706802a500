// Ends of spectra from windows: never inside the spectrum that Eigen finds for the whole system, and
// equal to it where one window holds the sum.
#include "compiler/pauli/windows.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <cstdint>
#include <utility>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::Factor;
using farrier::Pauli;
using farrier::PauliSum;
using farrier::test::dense;
using farrier::test::Matrix;
using farrier::test::Random;
using farrier::test::shifted;
using farrier::test::word;
using farrier::pauli::SpectrumBound;
using farrier::pauli::window_bound;

namespace {

struct Ends {
  long double highest = 0;
  long double lowest = 0;
};

Ends exact_ends(const PauliSum& sum, std::uint32_t qubits) {
  const Eigen::SelfAdjointEigenSolver<Matrix<long double>> solver(dense<long double>(sum, qubits),
                                                                  Eigen::EigenvaluesOnly);
  return {solver.eigenvalues().maxCoeff(), solver.eigenvalues().minCoeff()};
}

void check_outside(const SpectrumBound& bound, const PauliSum& sum, const Ends& ends) {
  CHECK(bound.above >= ends.highest);
  CHECK(-bound.below <= ends.lowest);
  CHECK(bound.norm() >= std::max(ends.highest, -ends.lowest));
  CHECK(bound.spread() >= ends.highest - ends.lowest);
  CHECK(bound.norm() <= (sum.one_norm() + std::abs(sum.constant())) * (1.0 + 1e-11));
}

PauliSum sum_of(const std::vector<std::pair<const char*, double>>& terms) {
  PauliSum sum;
  for (const auto& [letters, value] : terms) sum.add(word(letters), value);
  return sum;
}

/// Random couplings of neighbours and fields on an open chain.
PauliSum random_chain(Random& random, std::uint32_t qubits, std::uint32_t weight) {
  PauliSum sum;
  for (std::uint32_t first = 0; first + weight <= qubits; ++first)
    for (int k = 0; k < 5; ++k)
      if (const auto string = farrier::test::random_string(random, weight, first); !string.empty())
        sum.add(string, random.between(-1.0, 1.0));
  sum.merge();
  return sum;
}

PauliSum moved(const PauliSum& sum, std::uint32_t by) {
  PauliSum result;
  for (std::size_t k = 0; k < sum.size(); ++k) {
    const auto factors = sum.factors(k);
    result.add(shifted({factors.begin(), factors.end()}, by), sum.coefficient(k));
  }
  return result;
}

}  // namespace

TEST_CASE("one window over everything finds the spectrum itself") {
  Random random(71);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits)
    for (int round = 0; round < 6; ++round) {
      PauliSum sum = farrier::test::random_sum(random, qubits, random.integer(1, 40));
      if (round % 2 == 1) sum.add_constant(random.between(-2.0, 2.0));
      const Ends ends = exact_ends(sum, qubits);
      const SpectrumBound bound = window_bound(sum, qubits, {qubits});
      check_outside(bound, sum, ends);
      CHECK(bound.above == doctest::Approx(static_cast<double>(ends.highest)).epsilon(1e-11));
      CHECK(bound.below == doctest::Approx(static_cast<double>(-ends.lowest)).epsilon(1e-11));
    }
}

TEST_CASE("windows of a chain bound its spectrum and widen to it") {
  Random random(72);
  for (int round = 0; round < 8; ++round) {
    const PauliSum sum = random_chain(random, 7, 2);
    const Ends ends = exact_ends(sum, 7);
    for (std::size_t size = 2; size <= 7; ++size) {
      const SpectrumBound bound = window_bound(sum, 7, {size});
      INFO("windows of ", size);
      check_outside(bound, sum, ends);
      // Wide windows lose little.
      if (size >= 5)
        CHECK(bound.norm() < 1.3 * static_cast<double>(std::max(ends.highest, -ends.lowest)));
    }
  }
}

TEST_CASE("strings that fit no window are bounded on their own") {
  Random random(73);
  for (std::uint32_t qubits = 4; qubits <= 6; ++qubits)
    for (std::size_t size = 1; size <= 3; ++size)
      for (int round = 0; round < 5; ++round) {
        const PauliSum sum = farrier::test::random_sum(random, qubits, 30);
        check_outside(window_bound(sum, qubits, {size}), sum, exact_ends(sum, qubits));
      }
}

TEST_CASE("windows over strings with gaps") {
  Random random(74);
  for (int round = 0; round < 20; ++round) {
    PauliSum sum;
    for (int k = 0; k < 25; ++k)
      sum.add(farrier::test::random_string_of_weight(random, 7, random.integer(1, 3)),
              random.between(-1.0, 1.0) * std::pow(10.0, random.integer(0, 3)));
    sum.merge();
    for (const std::size_t size : {3U, 4U, 5U})
      check_outside(window_bound(sum, 7, {size}), sum, exact_ends(sum, 7));
  }
}

TEST_CASE("strings shared equally by windows of a chain") {
  // Error operators of the transverse-field Ising chain on four qubits with windows of three; values of
  // a prototype in NumPy that shares no code with the program.
  const PauliSum first = sum_of({{"IIYZ", 1}, {"IIZY", 1}, {"IYZI", 1}, {"IZYI", 1}, {"YZII", 1},
                                 {"ZYII", 1}});
  CHECK(window_bound(first, 4, {3}).norm() == doctest::Approx(4.472135955).epsilon(1e-9));
  CHECK(window_bound(first, 4, {4}).norm() == doctest::Approx(4.472135955).epsilon(1e-9));
  const double s = 1.0 / 6;
  const PauliSum second = sum_of({{"IIIX", s}, {"IIXI", 2 * s}, {"IIYY", 4 * s}, {"IIZZ", -4 * s},
                                  {"IXII", 2 * s}, {"IYYI", 4 * s}, {"IZXZ", 2 * s},
                                  {"IZZI", -4 * s}, {"XIII", s}, {"YYII", 4 * s}, {"ZXZI", 2 * s},
                                  {"ZZII", -4 * s}});
  CHECK(window_bound(second, 4, {3}).norm() == doctest::Approx(3.28879169499).epsilon(1e-10));
  CHECK(window_bound(second, 4, {3}).spread() ==
        doctest::Approx(2 * 3.28879169499).epsilon(1e-10));
  CHECK(window_bound(second, 4, {4}).norm() == doctest::Approx(3.16625427932).epsilon(1e-10));
}

TEST_CASE("ends of lopsided spectra are told apart") {
  // XX + YY + ZZ has the eigenvalues 1, 1, 1, -3.
  const SpectrumBound bound = window_bound(sum_of({{"XX", 1}, {"YY", 1}, {"ZZ", 1}}), 2, {2});
  CHECK(bound.above == doctest::Approx(1.0).epsilon(1e-12));
  CHECK(bound.below == doctest::Approx(3.0).epsilon(1e-12));
  CHECK(bound.norm() == bound.below);
  CHECK(bound.spread() == doctest::Approx(4.0).epsilon(1e-12));
}

TEST_CASE("bounds do not depend on where a sum stands") {
  Random random(75);
  const PauliSum sum = random_chain(random, 12, 3);
  for (const std::size_t size : {2U, 3U, 5U}) {
    const SpectrumBound home = window_bound(sum, 12, {size});
    for (const std::uint32_t by : {1U, 60U, 5000U}) {
      const SpectrumBound away = window_bound(moved(sum, by), 6000, {size});
      CHECK(away.above == home.above);
      CHECK(away.below == home.below);
      CHECK(away.method == home.method);
    }
  }
}

TEST_CASE("fewer operations make smaller windows and weaker bounds") {
  Random random(76);
  const PauliSum sum = random_chain(random, 16, 2);
  const SpectrumBound wide = window_bound(sum, 16, {7});
  const SpectrumBound narrow = window_bound(sum, 16, {7, 20 * std::pow(8.0, 3.0)});
  const SpectrumBound least = window_bound(sum, 16, {7, 0.0});
  CHECK(narrow.norm() >= wide.norm());
  CHECK(least.norm() >= wide.norm());
  CHECK(least.norm() <= sum.one_norm() * (1.0 + 1e-11));
}

TEST_CASE("a real sum and its turned copy have one spectrum") {
  // Turning X to Y and Y to -X on every qubit is unitary; real matrices become complex ones.
  Random random(77);
  for (int round = 0; round < 5; ++round) {
    PauliSum real;
    PauliSum turned;
    for (int k = 0; k < 20; ++k) {
      const double value = random.between(-1.0, 1.0);
      const auto string = farrier::test::random_string_of_weight(random, 5, random.integer(1, 3));
      std::vector<Factor> other;
      double sign = 1.0;
      int ys = 0;
      for (const Factor factor : string) {
        ys += factor.letter() == Pauli::y ? 1 : 0;
        if (factor.letter() == Pauli::y) sign = -sign;
        other.emplace_back(factor.qubit(), factor.letter() == Pauli::x   ? Pauli::y
                                           : factor.letter() == Pauli::y ? Pauli::x
                                                                         : Pauli::z);
      }
      if (ys % 2 != 0) continue;
      real.add(string, value);
      turned.add(other, sign * value);
    }
    real.merge();
    turned.merge();
    const SpectrumBound a = window_bound(real, 5, {5});
    const SpectrumBound b = window_bound(turned, 5, {5});
    CHECK(a.above == doctest::Approx(b.above).epsilon(1e-11));
    CHECK(a.below == doctest::Approx(b.below).epsilon(1e-11));
  }
}

TEST_CASE("the spectrum of nothing and of a constant") {
  CHECK(window_bound(PauliSum{}, 4, {}).norm() == 0.0);
  PauliSum constant;
  constant.add_constant(-2.5);
  const SpectrumBound bound = window_bound(constant, 4, {});
  CHECK(bound.above == -2.5);
  CHECK(bound.below == 2.5);
  CHECK(bound.spread() == 0.0);
}
