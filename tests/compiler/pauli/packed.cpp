// Packed strings against the sparse ones, which are tested against matrices: small systems, where the
// base is fixed, and long chains, where strings sit anywhere and cross the borders of words.
#include "compiler/pauli/packed.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <cstdint>
#include <map>
#include <string>
#include <vector>

#include "compiler/pauli/strings.hpp"
#include "tests/support/random.hpp"

using farrier::Factor;
using farrier::Pauli;
using farrier::to_text;
using farrier::test::Random;
using farrier::test::random_string;
using farrier::test::shifted;
using farrier::test::word;
namespace pauli = farrier::pauli;

namespace {

template <std::size_t W>
void check_round_trip(const std::vector<Factor>& string, std::uint32_t qubits) {
  const pauli::Packed<W> packed = pauli::pack<W>(string, qubits);
  INFO(to_text(string), " of ", qubits, " qubits in ", W, " words");
  CHECK(pauli::unpack(packed) == string);
  CHECK(pauli::weight(packed) == string.size());
  std::vector<std::uint32_t> visited;
  pauli::for_each_qubit(packed, [&](std::uint32_t qubit) { visited.push_back(qubit); });
  REQUIRE(visited.size() == string.size());
  for (std::size_t k = 0; k < visited.size(); ++k) CHECK(visited[k] == string[k].qubit());
}

/// Product and commutation of packed strings are those of the sparse ones, and the product is in the
/// one form that its string has.
template <std::size_t W>
void check_product(const std::vector<Factor>& a, const std::vector<Factor>& b,
                   std::uint32_t qubits) {
  INFO(to_text(a), " times ", to_text(b), " of ", qubits, " qubits in ", W, " words");
  const pauli::Packed<W> left = pauli::pack<W>(a, qubits);
  const pauli::Packed<W> right = pauli::pack<W>(b, qubits);
  const pauli::Product<W> product =
      pauli::multiply(left, right, pauli::fixed_base<W>(qubits));
  const pauli::SparseProduct expected = pauli::multiply(a, b);
  CHECK(pauli::unpack(product.string) == expected.factors);
  CHECK(product.quarter_turns == expected.quarter_turns);
  CHECK(product.string == pauli::pack<W>(expected.factors, qubits));
  CHECK(pauli::anticommute(left, right) == !pauli::commute(a, b));
}

/// A random string within `reach` qubits of `first`, its ends usually not at the ends of the range.
std::vector<Factor> sparse_string(Random& random, std::uint32_t first, std::uint32_t reach) {
  std::vector<Factor> factors;
  for (std::uint32_t qubit = first; qubit < first + reach; ++qubit)
    if (random.chance(0.15))
      factors.emplace_back(qubit, static_cast<Pauli>(random.integer(1, 3)));
  return factors;
}

template <std::size_t W>
void check_small_system(std::uint64_t seed) {
  Random random(seed);
  for (int k = 0; k < 300; ++k) {
    const auto a = sparse_string(random, 0, 64 * W);
    const auto b = sparse_string(random, 0, 64 * W);
    check_round_trip<W>(a, 64 * W);
    check_product<W>(a, b, 64 * W);
    CHECK(pauli::pack<W>(a, 64 * W).base == 0);
  }
}

/// Both strings within one window, anywhere on a long chain.
template <std::size_t W>
void check_long_chain(std::uint64_t seed) {
  constexpr std::uint32_t qubits = 5000;
  Random random(seed);
  for (int k = 0; k < 300; ++k) {
    const std::uint32_t first = random.integer(0, qubits - 64 * W);
    const auto a = sparse_string(random, first, 64 * W);
    const auto b = sparse_string(random, first, 64 * W);
    if (a.empty() || b.empty()) continue;
    check_round_trip<W>(a, qubits);
    check_product<W>(a, b, qubits);
    CHECK(pauli::pack<W>(a, qubits).base == a.front().qubit());
  }
}

}  // namespace

TEST_CASE("packed strings up to 64 qubits a word count from qubit 0") {
  check_small_system<1>(31);
  check_small_system<2>(32);
  check_small_system<4>(33);
}

TEST_CASE("packed strings of a long chain count from their lowest qubit") {
  check_long_chain<1>(34);
  check_long_chain<2>(35);
  check_long_chain<4>(36);
}

TEST_CASE("products across the borders of words") {
  Random random(37);
  // Windows that begin just before, at and after a multiple of 64, and pairs of different bases.
  for (const std::uint32_t border : {64U, 128U, 192U, 640U})
    for (int k = 0; k < 100; ++k) {
      const std::uint32_t base = border - random.integer(0, 9);
      const auto a = random_string(random, 6, base + random.integer(0, 8));
      const auto b = random_string(random, 6, base + random.integer(0, 8));
      check_product<1>(a, b, 1000);
      check_product<2>(a, b, 1000);
      check_product<4>(a, b, 1000);
      check_product<4>(a, b, 256 < border ? 1000 : 256);
    }
}

TEST_CASE("a product that loses its lowest letters counts from the next") {
  const std::vector<Factor> a = shifted(word("XZIIY"), 100);
  const std::vector<Factor> b = shifted(word("XZXII"), 100);
  const auto product =
      pauli::multiply(pauli::pack<1>(a, 1000), pauli::pack<1>(b, 1000), false);
  CHECK(product.string.base == 102);
  CHECK(to_text(pauli::unpack(product.string)) == "X102 Y104");
  const auto square =
      pauli::multiply(pauli::pack<1>(a, 1000), pauli::pack<1>(a, 1000), false);
  CHECK(square.string == pauli::Packed<1>{});
  CHECK(square.quarter_turns == 0);
  CHECK(square.string == pauli::pack<1>(std::vector<Factor>{}, 1000));
}

TEST_CASE("the identity is one packed string") {
  CHECK(pauli::pack<2>(std::vector<Factor>{}, 5) == pauli::Packed<2>{});
  CHECK(pauli::weight(pauli::Packed<2>{}) == 0);
  CHECK(pauli::unpack(pauli::Packed<2>{}).empty());
}

TEST_CASE("a string wider than the window does not fit") {
  const auto ends = [](std::uint32_t first, std::uint32_t last) {
    return std::vector<Factor>{{first, Pauli::x}, {last, Pauli::z}};
  };
  CHECK_NOTHROW(pauli::pack<1>(ends(10, 73), 1000));
  CHECK_THROWS_AS(pauli::pack<1>(ends(10, 74), 1000), pauli::WindowOverflow);
  CHECK_NOTHROW(pauli::pack<2>(ends(10, 137), 1000));
  CHECK_THROWS_AS(pauli::pack<2>(ends(10, 138), 1000), pauli::WindowOverflow);
  CHECK_NOTHROW(pauli::pack<4>(ends(10, 265), 1000));
  CHECK_THROWS_AS(pauli::pack<4>(ends(10, 266), 1000), pauli::WindowOverflow);
}

TEST_CASE("a product wider than the window does not fit") {
  const auto at = [](std::uint32_t qubit, Pauli letter) {
    return pauli::pack<2>(std::vector<Factor>{{qubit, letter}}, 1000);
  };
  const auto fits = pauli::multiply(at(60, Pauli::x), at(187, Pauli::y), false);
  CHECK(to_text(pauli::unpack(fits.string)) == "X60 Y187");
  CHECK_THROWS_AS(pauli::multiply(at(60, Pauli::x), at(188, Pauli::y), false),
                  pauli::WindowOverflow);
  CHECK_THROWS_AS(pauli::multiply(at(900, Pauli::x), at(3, Pauli::y), false),
                  pauli::WindowOverflow);
}

TEST_CASE("strings too far apart for one window still commute or not") {
  const auto pack = [](const std::vector<Factor>& string) {
    return pauli::pack<1>(string, 1000);
  };
  // One reaches from qubit 0 to 60, the other from 60 to 120: no window holds both.
  const auto left = pack({{0, Pauli::x}, {60, Pauli::z}});
  CHECK(pauli::anticommute(left, pack({{60, Pauli::x}, {120, Pauli::x}})));
  CHECK_FALSE(pauli::anticommute(left, pack({{60, Pauli::z}, {120, Pauli::x}})));
  CHECK_FALSE(pauli::anticommute(left, pack({{61, Pauli::x}, {120, Pauli::x}})));
  CHECK(pauli::anticommute(pack({{60, Pauli::y}, {120, Pauli::x}}), left));
}

TEST_CASE("a table adds equal strings and keeps the order of their first coming") {
  for (const std::uint32_t qubits : {0U, 100U, 129U, 1000U, 1'000'000U}) {
    Random random(38);
    pauli::Table<2> table = qubits == 0 ? pauli::Table<2>() : pauli::Table<2>(qubits);
    std::map<std::string, double> expected;
    std::vector<std::string> order;
    for (int k = 0; k < 4000; ++k) {
      const auto string = random_string(random, 5, random.integer(90, 94));
      const double value = std::floor(random.between(-8.0, 8.0));
      table.add(pauli::pack<2>(string, qubits == 0 ? 1000 : qubits), value);
      if (expected.find(to_text(string)) == expected.end()) order.push_back(to_text(string));
      expected[to_text(string)] += value;
    }
    REQUIRE(table.size() == order.size());
    double norm = 0.0;
    double squares = 0.0;
    for (std::size_t k = 0; k < table.size(); ++k) {
      CHECK(to_text(pauli::unpack(table.string(k))) == order[k]);
      CHECK(table.coefficient(k) == expected[order[k]]);
      norm += std::abs(table.coefficient(k));
      squares += table.coefficient(k) * table.coefficient(k);
    }
    CHECK(table.one_norm() == norm);
    CHECK(table.frobenius_norm() == std::sqrt(squares));
  }
}

TEST_CASE("tables are scaled and added") {
  const auto pack = [](const char* letters) { return pauli::pack<1>(word(letters), 3); };
  pauli::Table<1> table;
  table.add(pack("X"), 1.5);
  table.add(pack("ZZ"), -2.0);
  pauli::Table<1> other;
  other.add(pack("IY"), 4.0);
  other.add(pack("ZZ"), 4.0);
  table.add(other, 0.5);
  REQUIRE(table.size() == 3);
  CHECK(table.coefficient(0) == 1.5);
  CHECK(table.coefficient(1) == 0.0);
  CHECK(table.coefficient(2) == 2.0);
  CHECK(table.string(2) == pack("IY"));
  table.scale(-2.0);
  CHECK(table.one_norm() == 7.0);
}
