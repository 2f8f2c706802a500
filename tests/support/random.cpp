// Seeded random Pauli sums for tests.
#include "tests/support/random.hpp"

#include <algorithm>
#include <cmath>
#include <numeric>

namespace farrier::test {

std::vector<Factor> random_string(Random& random, std::uint32_t qubits, std::uint32_t first) {
  std::vector<Factor> factors;
  for (std::uint32_t qubit = first; qubit < first + qubits; ++qubit) {
    const auto letter = static_cast<Pauli>(random.integer(0, 3));
    if (letter != Pauli::i) factors.emplace_back(qubit, letter);
  }
  return factors;
}

std::vector<Factor> random_string_of_weight(Random& random, std::uint32_t qubits,
                                            std::uint32_t weight) {
  std::vector<std::uint32_t> places(qubits);
  std::iota(places.begin(), places.end(), 0U);
  random.shuffle(places);
  places.resize(weight);
  std::ranges::sort(places);
  std::vector<Factor> factors;
  for (const std::uint32_t qubit : places)
    factors.emplace_back(qubit, static_cast<Pauli>(random.integer(1, 3)));
  return factors;
}

PauliSum random_sum(Random& random, std::uint32_t qubits, std::size_t terms) {
  PauliSum sum;
  for (std::size_t k = 0; k < terms; ++k) {
    const std::vector<Factor> string = random_string(random, qubits);
    if (!string.empty()) sum.add(string, random.between(-1.0, 1.0));
  }
  sum.merge();
  return sum;
}

PauliSum random_integer_sum(Random& random, std::uint32_t qubits, std::size_t terms) {
  PauliSum sum;
  for (std::size_t k = 0; k < terms; ++k) {
    const std::vector<Factor> string = random_string(random, qubits);
    if (!string.empty()) sum.add(string, std::floor(random.between(-4.0, 5.0)));
  }
  sum.merge();
  return sum;
}

std::vector<Factor> word(std::string_view letters) {
  std::vector<Factor> factors;
  for (std::uint32_t qubit = 0; qubit < letters.size(); ++qubit) {
    if (letters[qubit] == 'X') factors.emplace_back(qubit, Pauli::x);
    if (letters[qubit] == 'Y') factors.emplace_back(qubit, Pauli::y);
    if (letters[qubit] == 'Z') factors.emplace_back(qubit, Pauli::z);
  }
  return factors;
}

std::vector<Factor> shifted(std::vector<Factor> factors, std::uint32_t by) {
  for (Factor& factor : factors) factor = Factor(factor.qubit() + by, factor.letter());
  return factors;
}

}  // namespace farrier::test
