// Pauli sums in sparse form: what may be appended, the canonical form, and the digest.
#include <farrier/hamiltonian.hpp>
#include <farrier/pauli.hpp>

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <numeric>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::digest;
using farrier::Factor;
using farrier::Hamiltonian;
using farrier::Pauli;
using farrier::PauliSum;
using farrier::to_text;
using farrier::test::dense;
using farrier::test::Random;
using farrier::test::word;

namespace {

PauliSum sum_of(const std::vector<std::pair<std::string, double>>& terms) {
  PauliSum sum;
  for (const auto& [letters, coefficient] : terms) sum.add(word(letters), coefficient);
  return sum;
}

std::string strings_of(const PauliSum& sum) {
  std::string text;
  for (std::size_t k = 0; k < sum.size(); ++k)
    text += (text.empty() ? "" : "; ") + to_text(sum.factors(k));
  return text;
}

/// Strictly rising in lexicographic order of factors.
bool canonical(const PauliSum& sum) {
  for (std::size_t k = 0; k < sum.size(); ++k) {
    if (sum.coefficient(k) == 0.0) return false;
    if (k == 0) continue;
    const auto a = sum.factors(k - 1);
    const auto b = sum.factors(k);
    if (!std::lexicographical_compare(a.begin(), a.end(), b.begin(), b.end())) return false;
  }
  return true;
}

}  // namespace

TEST_CASE("a string names each qubit once in rising order and no identity") {
  PauliSum sum;
  CHECK_THROWS_AS(sum.add(std::vector<Factor>{{1, Pauli::x}, {0, Pauli::x}}, 1.0),
                  std::invalid_argument);
  CHECK_THROWS_AS(sum.add(std::vector<Factor>{{1, Pauli::x}, {1, Pauli::z}}, 1.0),
                  std::invalid_argument);
  CHECK_THROWS_AS(sum.add(std::vector<Factor>{{1, Pauli::i}}, 1.0), std::invalid_argument);
  CHECK(sum.empty());
  CHECK(sum.constant() == 0.0);
}

TEST_CASE("no factor at all adds to the constant") {
  PauliSum sum = sum_of({{"", 0.5}, {"III", 0.25}, {"X", 1.0}});
  CHECK(sum.size() == 1);
  CHECK(sum.constant() == 0.75);
  sum.add_constant(-0.5);
  sum.merge();
  CHECK(sum.constant() == 0.25);
}

TEST_CASE("merging sorts by qubits and then by letters X Z Y") {
  PauliSum sum = sum_of({{"IY", 1}, {"IZ", 1}, {"IX", 1}, {"YI", 1}, {"ZI", 1}, {"XI", 1},
                         {"XX", 1}, {"XIX", 1}, {"XXX", 1}, {"IIX", 1}});
  sum.merge();
  CHECK(strings_of(sum) == "X0; X0 X1; X0 X1 X2; X0 X2; Z0; Y0; X1; Z1; Y1; X2");
}

TEST_CASE("merging adds equal strings and says where each came from") {
  PauliSum sum = sum_of({{"ZZ", 1.0}, {"X", 0.5}, {"ZZ", 2.0}, {"Y", 4.0}, {"X", 0.25}});
  const std::vector<std::uint32_t> origins = sum.merge();
  CHECK(strings_of(sum) == "X0; Z0 Z1; Y0");
  CHECK(sum.coefficient(0) == 0.75);
  CHECK(sum.coefficient(1) == 3.0);
  CHECK(sum.coefficient(2) == 4.0);
  CHECK(origins == std::vector<std::uint32_t>{1, 0, 3});
}

TEST_CASE("decimal numbers that cancel on paper cancel") {
  PauliSum sum = sum_of({{"X", 0.1}, {"Z", 1.0}, {"X", 0.2}, {"X", -0.3}});
  REQUIRE(0.1 + 0.2 - 0.3 != 0.0);
  CHECK(sum.merge() == std::vector<std::uint32_t>{1});
  CHECK(strings_of(sum) == "Z0");
}

TEST_CASE("small terms that stand alone or are left over stay") {
  PauliSum sum = sum_of({{"X", 1e-300}, {"Z", 1.0}, {"Z", -1.0}, {"Y", 1.0}, {"Y", -1.0 + 1e-15},
                         {"XX", 0.0}});
  sum.merge();
  CHECK(strings_of(sum) == "X0; Y0");
  CHECK(sum.coefficient(1) == 1.0 + (-1.0 + 1e-15));
}

TEST_CASE("merging keeps the operator") {
  Random random(21);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits) {
    PauliSum sum;
    for (int k = 0; k < 60; ++k)
      sum.add(farrier::test::random_string(random, qubits), random.between(-1.0, 1.0));
    PauliSum merged = sum;
    const std::vector<std::uint32_t> origins = merged.merge();
    CHECK(canonical(merged));
    CHECK((dense<double>(sum, qubits) - dense<double>(merged, qubits)).cwiseAbs().maxCoeff() <
          1e-13);
    REQUIRE(origins.size() == merged.size());
    for (std::size_t k = 0; k < merged.size(); ++k) {
      CHECK(std::ranges::equal(sum.factors(origins[k]), merged.factors(k)));
      for (std::size_t earlier = 0; earlier < origins[k]; ++earlier)
        CHECK_FALSE(std::ranges::equal(sum.factors(earlier), merged.factors(k)));
    }
    std::vector<std::uint32_t> unchanged(merged.size());
    std::iota(unchanged.begin(), unchanged.end(), 0U);
    CHECK(merged.merge() == unchanged);
  }
}

TEST_CASE("merging orders strings with far qubits") {
  PauliSum sum;
  sum.add(std::vector<Factor>{{Factor::max_qubit, Pauli::x}}, 1.0);
  sum.add(std::vector<Factor>{{0, Pauli::y}, {Factor::max_qubit, Pauli::y}}, 1.0);
  sum.add(std::vector<Factor>{{0, Pauli::y}, {5, Pauli::x}, {7, Pauli::x}}, 1.0);
  sum.add(std::vector<Factor>{{0, Pauli::y}, {5, Pauli::x}, {6, Pauli::z}}, 1.0);
  sum.merge();
  CHECK(canonical(sum));
  CHECK(strings_of(sum) == "Y0 X5 Z6; Y0 X5 X7; Y0 Y1073741823; X1073741823");
}

TEST_CASE("norm and extent of a sum") {
  PauliSum sum = sum_of({{"XIZ", -2.0}, {"Y", 0.5}, {"", -7.0}});
  CHECK(sum.one_norm() == 2.5);
  CHECK(sum.max_weight() == 2);
  CHECK(sum.qubit_span() == 3);
  sum.scale(-0.5);
  CHECK(sum.coefficient(0) == 1.0);
  CHECK(sum.constant() == 3.5);
  CHECK(PauliSum().one_norm() == 0.0);
  CHECK(PauliSum().max_weight() == 0);
  CHECK(PauliSum().qubit_span() == 0);
}

TEST_CASE("strings as text") {
  CHECK(to_text(word("XIZY")) == "X0 Z2 Y3");
  CHECK(to_text(word("III")) == "I");
}

TEST_CASE("the digest does not depend on the order of the input") {
  Random random(22);
  std::vector<std::pair<std::vector<Factor>, double>> terms;
  for (int k = 0; k < 40; ++k)
    // Whole numbers, so that adding up equal strings rounds nothing in any order.
    terms.emplace_back(farrier::test::random_string(random, 3),
                       std::floor(random.between(-9.0, 9.0)));
  std::string first;
  for (int round = 0; round < 20; ++round) {
    Hamiltonian hamiltonian;
    hamiltonian.qubits = 3;
    for (const auto& [string, coefficient] : terms) hamiltonian.sum.add(string, coefficient);
    hamiltonian.sum.merge();
    if (round == 0) first = digest(hamiltonian);
    CHECK(digest(hamiltonian) == first);
    random.shuffle(terms);
  }
  CHECK(first.size() == 16);
}

TEST_CASE("the digest tells Hamiltonians apart") {
  const auto of = [](std::uint32_t qubits, const PauliSum& sum) {
    return digest({qubits, sum, {}, {}});
  };
  const std::string base = of(3, sum_of({{"XIZ", 1.0}}));
  CHECK(of(4, sum_of({{"XIZ", 1.0}})) != base);
  CHECK(of(3, sum_of({{"XIZ", 1.0}, {"", 1.0}})) != base);
  CHECK(of(3, sum_of({{"XIY", 1.0}})) != base);
  CHECK(of(3, sum_of({{"XZI", 1.0}})) != base);
  CHECK(of(3, sum_of({{"XIZ", std::nextafter(1.0, 2.0)}})) != base);
  CHECK(of(3, sum_of({{"X", 1.0}, {"IIZ", 1.0}})) != base);
  CHECK(of(3, sum_of({{"XIZ", 1.0}})) == base);
}

TEST_CASE("the digest of one known Hamiltonian") {
  // FNV-1a over the words 2, bits of 0.5, 1, code of X0, bits of 1, each least significant byte
  // first, computed apart from the program by a few lines of Python.
  Hamiltonian hamiltonian;
  hamiltonian.qubits = 2;
  hamiltonian.sum.add(word("X"), 1.0);
  hamiltonian.sum.add_constant(0.5);
  CHECK(digest(hamiltonian) == "b6c5aa6117dca8d7");
}
