// Seeded random numbers and Pauli sums for tests, the same on every machine.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <farrier/pauli.hpp>
#include <random>
#include <string_view>
#include <vector>

namespace farrier::test {

/// The standard fixes what std::mt19937_64 draws, but not what its distributions make of it.
class Random {
 public:
  explicit Random(std::uint64_t seed) : engine_(seed) {}

  /// From 0 to below 1.
  double unit() { return static_cast<double>(engine_() >> 11U) * 0x1p-53; }
  double between(double low, double high) { return low + (high - low) * unit(); }
  /// From low to high, both included.
  std::uint32_t integer(std::uint32_t low, std::uint32_t high) {
    return low + static_cast<std::uint32_t>(engine_() % (high - low + 1U));
  }
  bool chance(double probability) { return unit() < probability; }

  template <typename Item>
  void shuffle(std::vector<Item>& items) {
    for (std::size_t k = items.size(); k > 1; --k)
      std::swap(items[k - 1], items[integer(0, static_cast<std::uint32_t>(k - 1))]);
  }

 private:
  std::mt19937_64 engine_;
};

/// Letters on the qubits first to first + qubits - 1, each of the four equally likely.
std::vector<Factor> random_string(Random& random, std::uint32_t qubits, std::uint32_t first = 0);
/// Letters on `weight` different qubits.
std::vector<Factor> random_string_of_weight(Random& random, std::uint32_t qubits,
                                            std::uint32_t weight);
/// A merged sum of that many random strings, fewer where some are equal or the identity.
PauliSum random_sum(Random& random, std::uint32_t qubits, std::size_t terms);
/// The same with coefficients from -4 to 4 that are whole numbers, so that sums of products are
/// exact.
PauliSum random_integer_sum(Random& random, std::uint32_t qubits, std::size_t terms);

/// The factors of a word with the leftmost letter on qubit 0: "XIZ".
std::vector<Factor> word(std::string_view letters);
/// The factors moved up by some qubits.
std::vector<Factor> shifted(std::vector<Factor> factors, std::uint32_t by);

}  // namespace farrier::test
