// Sparse Pauli sums: appending, merging into canonical form, and the digest of a Hamiltonian.
#include <algorithm>
#include <cmath>
#include <farrier/hamiltonian.hpp>
#include <farrier/pauli.hpp>
#include <limits>
#include <numeric>
#include <stdexcept>

#include "compiler/base/fnv.hpp"

namespace farrier {
namespace {

/// The first two factors of a string as one number that orders like the string itself; a string
/// that goes on orders after its own beginning because missing factors count as zero.
std::uint64_t sort_prefix(std::span<const Factor> factors) {
  const auto code = [&](std::size_t k) -> std::uint64_t {
    if (k >= factors.size()) return 0;
    return (std::uint64_t{factors[k].qubit()} << 2U) |
           static_cast<std::uint64_t>(factors[k].letter());
  };
  return (code(0) << 32U) | code(1);
}

/// Whether a sum of `count` decimal numbers is zero but for their rounding: 0.1 + 0.2 - 0.3 is.
bool cancelled(double total, double mass, std::size_t count) {
  if (count == 1 || !std::isfinite(mass)) return total == 0.0;
  return std::abs(total) <= std::numeric_limits<double>::epsilon() * mass;
}

}  // namespace

void PauliSum::add(std::span<const Factor> factors, double coefficient) {
  for (std::size_t k = 0; k < factors.size(); ++k) {
    if (factors[k].letter() == Pauli::i) throw std::invalid_argument("identity letter in a string");
    if (k > 0 && factors[k - 1].qubit() >= factors[k].qubit())
      throw std::invalid_argument("factors of a string not in rising order of qubits");
  }
  if (factors.empty()) {
    constant_ += coefficient;
    return;
  }
  factors_.insert(factors_.end(), factors.begin(), factors.end());
  offsets_.push_back(factors_.size());
  coefficients_.push_back(coefficient);
}

std::vector<std::uint32_t> PauliSum::merge() {
  struct Key {
    std::uint64_t prefix;
    std::uint32_t index;
  };
  std::vector<Key> order(size());
  for (std::uint32_t k = 0; k < order.size(); ++k) order[k] = {sort_prefix(factors(k)), k};
  std::sort(order.begin(), order.end(), [this](const Key& left, const Key& right) {
    if (left.prefix != right.prefix) return left.prefix < right.prefix;
    const auto a = factors(left.index);
    const auto b = factors(right.index);
    const auto compared =
        std::lexicographical_compare_three_way(a.begin(), a.end(), b.begin(), b.end());
    return compared != 0 ? compared < 0 : left.index < right.index;
  });

  PauliSum merged;
  merged.constant_ = constant_;
  merged.factors_.reserve(factors_.size());
  merged.offsets_.reserve(offsets_.size());
  merged.coefficients_.reserve(size());
  std::vector<std::uint32_t> first_index;
  first_index.reserve(size());
  std::vector<double> equal;
  for (std::size_t k = 0; k < order.size();) {
    const auto string = factors(order[k].index);
    const std::uint32_t first = order[k].index;
    equal.clear();
    for (; k < order.size() && std::ranges::equal(factors(order[k].index), string); ++k)
      equal.push_back(coefficients_[order[k].index]);
    std::ranges::sort(equal);  // the order of the input must not show in the last bit
    double total = 0.0;
    double mass = 0.0;
    for (const double value : equal) {
      total += value;
      mass += std::abs(value);
    }
    if (cancelled(total, mass, equal.size())) continue;
    merged.factors_.insert(merged.factors_.end(), string.begin(), string.end());
    merged.offsets_.push_back(merged.factors_.size());
    merged.coefficients_.push_back(total);
    first_index.push_back(first);
  }
  *this = std::move(merged);
  return first_index;
}

void PauliSum::scale(double factor) {
  for (double& coefficient : coefficients_) coefficient *= factor;
  constant_ *= factor;
}

double PauliSum::one_norm() const {
  return std::accumulate(coefficients_.begin(), coefficients_.end(), 0.0,
                         [](double sum, double value) { return sum + std::abs(value); });
}

std::size_t PauliSum::max_weight() const {
  std::size_t weight = 0;
  for (std::size_t k = 0; k < size(); ++k) weight = std::max(weight, factors(k).size());
  return weight;
}

std::uint32_t PauliSum::qubit_span() const {
  std::uint32_t span = 0;
  for (std::size_t k = 0; k < size(); ++k) span = std::max(span, factors(k).back().qubit() + 1);
  return span;
}

std::string to_text(std::span<const Factor> factors) {
  static constexpr char letters[] = {'I', 'X', 'Z', 'Y'};
  if (factors.empty()) return "I";
  std::string text;
  for (const Factor factor : factors) {
    if (!text.empty()) text += ' ';
    text += letters[static_cast<std::size_t>(factor.letter())];
    text += std::to_string(factor.qubit());
  }
  return text;
}

std::string digest(const Hamiltonian& hamiltonian) {
  base::Fnv1a hash;
  hash.word(hamiltonian.qubits);
  hash.number(hamiltonian.sum.constant());
  for (std::size_t k = 0; k < hamiltonian.sum.size(); ++k) {
    const auto factors = hamiltonian.sum.factors(k);
    hash.word(factors.size());
    for (const Factor factor : factors)
      hash.word((std::uint64_t{factor.qubit()} << 2U) |
                static_cast<std::uint64_t>(factor.letter()));
    hash.number(hamiltonian.sum.coefficient(k));
  }
  return hash.hex();
}

}  // namespace farrier
