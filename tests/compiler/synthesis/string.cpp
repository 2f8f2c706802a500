// Exponentials of Pauli strings: operator, counts and depths.
#include "compiler/synthesis/string.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <bit>
#include <cmath>
#include <cstdint>
#include <vector>

#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using namespace farrier::synthesis;
using test::Random;

namespace {

std::uint64_t two_qubit_gates(const Sequence& sequence) {
  return static_cast<std::uint64_t>(
      std::ranges::count_if(sequence.gates, [](const Gate& gate) { return gate.two_qubit(); }));
}

std::uint64_t two_qubit_depth(const Sequence& sequence, std::uint32_t qubits) {
  std::vector<std::uint64_t> depth(qubits, 0);
  for (const Gate& gate : sequence.gates)
    if (gate.two_qubit())
      depth[gate.a] = depth[gate.b] = 1 + std::max(depth[gate.a], depth[gate.b]);
  return *std::ranges::max_element(depth);
}

}  // namespace

TEST_CASE("string_sequence is the exponential of its string within the stated rounding") {
  Random draw(1);
  for (std::uint32_t weight = 1; weight <= 7; ++weight) {
    for (const Ladder ladder : {Ladder::line, Ladder::tree}) {
      for (const double scale : {1.0, 1e-9, 1e4}) {
        for (int k = 0; k < (weight > 5 ? 1 : 3); ++k) {
          const std::uint32_t qubits = std::min(7U, weight + below(draw, 3));
          const std::vector<Factor> factors = test::random_string_of_weight(draw, qubits, weight);
          const double value = draw.between(-scale, scale);
          const Sequence sequence = string_sequence(factors, value, ladder);
          // exp(-i v P) = cos v - i sin v P, since P squares to 1.
          const unitary::Real v = value;
          const auto size = Eigen::Index{1} << qubits;
          const unitary::Matrix expected =
              std::cos(v) * unitary::Matrix::Identity(size, size) -
              unitary::Complex(0, std::sin(v)) * unitary::string_matrix(qubits, factors);
          const unitary::Matrix made =
              unitary::gates_matrix(qubits, sequence.gates, sequence.phase);
          CHECK(unitary::distance(made, expected) <= sequence.rounding + 1e-17L);
        }
      }
    }
  }
}

TEST_CASE("a string of weight w takes 2 w - 2 cx in either ladder") {
  // Elementary: w - 1 gates gather the parity, as many take it apart again.
  Random draw(2);
  for (std::uint32_t weight = 1; weight <= 33; ++weight)
    for (const Ladder ladder : {Ladder::line, Ladder::tree})
      CHECK(two_qubit_gates(string_sequence(test::random_string_of_weight(draw, 40, weight), 0.3,
                                            ladder)) == 2 * (weight - 1));
}

TEST_CASE("a line is 2 w - 2 deep - a tree twice the logarithm of w rounded up") {
  // Elementary: a balanced tree halves the number of open parities in each layer.
  Random draw(3);
  for (std::uint32_t weight = 1; weight <= 33; ++weight) {
    const std::vector<Factor> factors = test::random_string_of_weight(draw, 40, weight);
    const auto ceiling = static_cast<std::uint64_t>(std::bit_width(weight - 1));
    CHECK(two_qubit_depth(string_sequence(factors, 0.3, Ladder::line), 40) == 2 * (weight - 1));
    CHECK(two_qubit_depth(string_sequence(factors, 0.3, Ladder::tree), 40) == 2 * ceiling);
  }
}

TEST_CASE("only turns and cx on the qubits of the string are used") {
  Random draw(4);
  for (const Ladder ladder : {Ladder::line, Ladder::tree}) {
    const std::vector<Factor> factors = test::random_string_of_weight(draw, 9, 4);
    const auto acted_on = [&](std::uint32_t qubit) {
      return std::ranges::any_of(factors, [&](Factor f) { return f.qubit() == qubit; });
    };
    for (const Gate& gate : string_sequence(factors, 0.3, ladder).gates) {
      CHECK((gate.kind == GateKind::turn || gate.kind == GateKind::cx));
      CHECK(acted_on(gate.a));
      CHECK(acted_on(gate.b));
    }
  }
}
