// Pauli strings and sums of them, in sparse storage: one 32-bit word per non-identity letter.
#pragma once

#include <compare>
#include <cstddef>
#include <cstdint>
#include <span>
#include <string>
#include <vector>

namespace farrier {

/// A Pauli letter. Bit 0 is its X part and bit 1 its Z part, so the product of two letters is the
/// bitwise exclusive or, up to a phase.
enum class Pauli : std::uint8_t { i = 0, x = 1, z = 2, y = 3 };

/// One letter of a Pauli string on one qubit; ordered by qubit, then by letter (X, Z, Y).
class Factor {
 public:
  /// Largest qubit index that a factor can hold.
  static constexpr std::uint32_t max_qubit = (1U << 30U) - 1U;

  constexpr Factor() = default;
  /// Requires qubit <= max_qubit.
  constexpr Factor(std::uint32_t qubit, Pauli letter)
      : code_((qubit << 2U) | static_cast<std::uint32_t>(letter)) {}

  [[nodiscard]] constexpr std::uint32_t qubit() const { return code_ >> 2U; }
  [[nodiscard]] constexpr Pauli letter() const { return static_cast<Pauli>(code_ & 3U); }

  friend constexpr auto operator<=>(const Factor&, const Factor&) = default;

 private:
  std::uint32_t code_ = 0;
};

/// A real combination of Pauli strings: sum over k of coefficient(k) * P_k, plus constant() * 1.
///
/// Strings lie one behind the other in one array, so a million short strings cost a few tens of
/// megabytes. After merge() the strings are distinct, in canonical order (lexicographic by
/// factors) and no coefficient is zero; add() appends without merging.
class PauliSum {
 public:
  PauliSum() = default;

  /// Appends a string. The factors must be sorted by qubit, name each qubit at most once and hold
  /// no identity letter (std::invalid_argument otherwise). No factor at all adds to the constant.
  void add(std::span<const Factor> factors, double coefficient);

  /// Brings the sum into canonical form. Equal strings are added by rising coefficient; a
  /// total within one machine epsilon of the sum of magnitudes counts as cancelled.
  /// Returns, for each remaining term, the index that its first occurrence had before the call.
  std::vector<std::uint32_t> merge();

  [[nodiscard]] std::size_t size() const { return coefficients_.size(); }
  [[nodiscard]] bool empty() const { return coefficients_.empty(); }
  [[nodiscard]] double constant() const { return constant_; }
  [[nodiscard]] double coefficient(std::size_t k) const { return coefficients_[k]; }
  [[nodiscard]] std::span<const Factor> factors(std::size_t k) const {
    return {factors_.data() + offsets_[k], offsets_[k + 1] - offsets_[k]};
  }

  /// Multiplies every coefficient and the constant by a factor.
  void scale(double factor);
  void add_constant(double value) { constant_ += value; }

  /// Sum of |coefficient|, the constant left out.
  [[nodiscard]] double one_norm() const;
  /// Largest number of letters in a string; 0 for an empty sum.
  [[nodiscard]] std::size_t max_weight() const;
  /// 1 + the highest qubit index that occurs; 0 where none does.
  [[nodiscard]] std::uint32_t qubit_span() const;

 private:
  std::vector<Factor> factors_;
  std::vector<std::uint64_t> offsets_{0};
  std::vector<double> coefficients_;
  double constant_ = 0.0;
};

/// "X0 Z3" for the factors of a string, "I" for none.
std::string to_text(std::span<const Factor> factors);

}  // namespace farrier
