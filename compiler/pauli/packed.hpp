// Pauli strings as bit masks over a window of qubits, and sums of them in a hash table: the working
// form of nested commutators.
//
// A packed string holds the X and Z parts of up to 64 * W neighbouring qubits, counted from `base`.
// On at most 64 * W qubits the base is always 0; on more it is the lowest qubit of the string, so
// that local strings of any lattice fit. A product that would not fit throws WindowOverflow, and
// the caller starts again with a larger W.
#pragma once

#include <array>
#include <bit>
#include <cmath>
#include <cstddef>
#include <cstdint>
#include <exception>
#include <farrier/pauli.hpp>
#include <span>
#include <utility>
#include <vector>

namespace farrier::pauli {

/// A string reaches over more qubits than the packed form holds.
class WindowOverflow : public std::exception {};

template <std::size_t W>
struct Packed {
  std::uint32_t base = 0;
  std::array<std::uint64_t, W> x{};
  std::array<std::uint64_t, W> z{};

  friend bool operator==(const Packed&, const Packed&) = default;
};

template <std::size_t W>
std::size_t weight(const Packed<W>& string) {
  int count = 0;
  for (std::size_t k = 0; k < W; ++k) count += std::popcount(string.x[k] | string.z[k]);
  return static_cast<std::size_t>(count);
}

/// Calls visit(qubit) for every qubit on which the string acts, in rising order.
template <std::size_t W, typename Visit>
void for_each_qubit(const Packed<W>& string, Visit&& visit) {
  for (std::size_t k = 0; k < W; ++k) {
    for (std::uint64_t bits = string.x[k] | string.z[k]; bits != 0; bits &= bits - 1)
      visit(string.base + static_cast<std::uint32_t>(64 * k) +
            static_cast<std::uint32_t>(std::countr_zero(bits)));
  }
}

namespace detail {

/// The bits moved towards higher indices; `lost` tells whether one fell out.
template <std::size_t W>
std::array<std::uint64_t, W> shifted_up(const std::array<std::uint64_t, W>& bits,
                                        std::uint32_t shift, bool& lost) {
  const std::size_t words = shift / 64;
  const std::uint32_t rest = shift % 64;
  std::array<std::uint64_t, W> moved{};
  for (std::size_t k = 0; k < W; ++k) {
    if (bits[k] == 0) continue;
    const std::uint64_t high = rest == 0 ? 0 : bits[k] >> (64 - rest);
    if (k + words < W)
      moved[k + words] |= bits[k] << rest;
    else
      lost = true;
    if (high != 0 && k + words + 1 < W)
      moved[k + words + 1] |= high;
    else
      lost = lost || high != 0;
  }
  return moved;
}

/// Moves the bits towards lower indices; the lowest `shift` bits must be clear.
template <std::size_t W>
void shift_down(std::array<std::uint64_t, W>& bits, std::uint32_t shift) {
  if (shift == 0) return;
  const std::size_t words = shift / 64;
  const std::uint32_t rest = shift % 64;
  std::array<std::uint64_t, W> moved{};
  for (std::size_t k = words; k < W; ++k) {
    moved[k - words] |= bits[k] >> rest;
    if (rest != 0 && k > words) moved[k - words - 1] |= bits[k] << (64 - rest);
  }
  bits = moved;
}

/// Counts the string from its lowest qubit.
template <std::size_t W>
void normalise(Packed<W>& string) {
  for (std::size_t k = 0; k < W; ++k) {
    const std::uint64_t bits = string.x[k] | string.z[k];
    if (bits == 0) continue;
    const auto shift =
        static_cast<std::uint32_t>(64 * k) + static_cast<std::uint32_t>(std::countr_zero(bits));
    shift_down<W>(string.x, shift);
    shift_down<W>(string.z, shift);
    string.base += shift;
    return;
  }
  string.base = 0;
}

}  // namespace detail

/// Whether base 0 serves every string on that many qubits.
template <std::size_t W>
constexpr bool fixed_base(std::uint32_t qubits) {
  return qubits <= 64 * W;
}

template <std::size_t W>
Packed<W> pack(std::span<const Factor> factors, std::uint32_t qubits) {
  Packed<W> string;
  if (factors.empty()) return string;
  if (!fixed_base<W>(qubits)) string.base = factors.front().qubit();
  for (const Factor factor : factors) {
    const std::uint32_t place = factor.qubit() - string.base;
    if (place >= 64 * W) throw WindowOverflow();
    const std::uint64_t bit = std::uint64_t{1} << (place % 64);
    const auto letter = static_cast<unsigned>(factor.letter());
    if ((letter & 1U) != 0) string.x[place / 64] |= bit;
    if ((letter & 2U) != 0) string.z[place / 64] |= bit;
  }
  return string;
}

template <std::size_t W>
std::vector<Factor> unpack(const Packed<W>& string) {
  std::vector<Factor> factors;
  for_each_qubit(string, [&](std::uint32_t qubit) {
    const std::uint32_t place = qubit - string.base;
    const auto x = static_cast<unsigned>((string.x[place / 64] >> (place % 64)) & 1U);
    const auto z = static_cast<unsigned>((string.z[place / 64] >> (place % 64)) & 1U);
    factors.emplace_back(qubit, static_cast<Pauli>(x | (z << 1U)));
  });
  return factors;
}

/// A product of strings: i^quarter_turns times a string.
template <std::size_t W>
struct Product {
  Packed<W> string;
  unsigned quarter_turns = 0;  ///< 0 to 3
};

/// Two strings counted from one base. What of the higher one does not fit the window cannot overlap
/// the lower one, so it matters to their product only.
template <std::size_t W>
class Aligned {
 public:
  Aligned(const Packed<W>& a, const Packed<W>& b) : a_(a), b_(b) {
    if (a.base > b.base)
      lower(a_, b.base);
    else if (b.base > a.base)
      lower(b_, a.base);
  }

  /// The lowest qubit on which both act; an impossible index where there is none.
  [[nodiscard]] std::uint32_t lowest_common_qubit() const {
    for (std::size_t k = 0; k < W; ++k) {
      const std::uint64_t both = (a_.x[k] | a_.z[k]) & (b_.x[k] | b_.z[k]);
      if (both != 0)
        return a_.base + static_cast<std::uint32_t>(64 * k) +
               static_cast<std::uint32_t>(std::countr_zero(both));
    }
    return ~std::uint32_t{0};
  }

  [[nodiscard]] bool anticommute() const {
    std::uint64_t parity = 0;
    for (std::size_t k = 0; k < W; ++k) parity ^= (a_.x[k] & b_.z[k]) ^ (a_.z[k] & b_.x[k]);
    return (std::popcount(parity) & 1) != 0;
  }

  /// a * b with its exact phase. With Y = i X Z a string is i^|x&z| X^x Z^z, and moving Z^z past
  /// X^x costs (-1)^|z&x|. Throws WindowOverflow where the product does not fit.
  [[nodiscard]] Product<W> product(bool base_is_fixed) const {
    if (lost_) throw WindowOverflow();
    Product<W> result;
    result.string.base = a_.base;
    int turns = 0;
    for (std::size_t k = 0; k < W; ++k) {
      const std::uint64_t x = a_.x[k] ^ b_.x[k];
      const std::uint64_t z = a_.z[k] ^ b_.z[k];
      turns += std::popcount(a_.x[k] & a_.z[k]) + std::popcount(b_.x[k] & b_.z[k]) -
               std::popcount(x & z) + 2 * std::popcount(a_.z[k] & b_.x[k]);
      result.string.x[k] = x;
      result.string.z[k] = z;
    }
    if (!base_is_fixed) detail::normalise(result.string);
    result.quarter_turns = static_cast<unsigned>(turns) & 3U;
    return result;
  }

 private:
  void lower(Packed<W>& string, std::uint32_t base) {
    const std::uint32_t shift = string.base - base;
    string.x = detail::shifted_up<W>(string.x, shift, lost_);
    string.z = detail::shifted_up<W>(string.z, shift, lost_);
    string.base = base;
  }

  Packed<W> a_;
  Packed<W> b_;
  bool lost_ = false;
};

template <std::size_t W>
bool anticommute(const Packed<W>& a, const Packed<W>& b) {
  return Aligned<W>(a, b).anticommute();
}

template <std::size_t W>
Product<W> multiply(const Packed<W>& a, const Packed<W>& b, bool base_is_fixed) {
  return Aligned<W>(a, b).product(base_is_fixed);
}

template <std::size_t W>
std::uint64_t hash(const Packed<W>& string) {
  std::uint64_t h = string.base * 0x9e3779b97f4a7c15ULL;
  const auto mix = [&h](std::uint64_t word) {
    h ^= word;
    h *= 0xff51afd7ed558ccdULL;
    h ^= h >> 32U;
  };
  for (std::size_t k = 0; k < W; ++k) {
    mix(string.x[k]);
    mix(string.z[k]);
  }
  h *= 0xc4ceb9fe1a85ec53ULL;
  return h ^ (h >> 29U);
}

/// A sum of packed strings. Terms keep the order in which they first came, which depends on nothing
/// but the calls. Strings of neighbouring bases are kept near each other in memory: on many qubits,
/// products of local strings then stay within the cache.
template <std::size_t W>
class Table {
 public:
  Table() = default;
  /// For strings whose bases are below `qubits`.
  explicit Table(std::uint32_t qubits)
      : indices_(fixed_base<W>(qubits) ? 1 : qubits / bases_an_index + 1) {}

  [[nodiscard]] std::size_t size() const { return strings_.size(); }
  [[nodiscard]] const Packed<W>& string(std::size_t k) const { return strings_[k]; }
  [[nodiscard]] double coefficient(std::size_t k) const { return coefficients_[k]; }

  void add(const Packed<W>& string, double value) {
    Index& index = indices_[string.base / bases_an_index % indices_.size()];
    if (2 * (index.used + 1) > index.slots.size()) grow(index);
    std::size_t slot = hash(string) & (index.slots.size() - 1);
    while (index.slots[slot] != 0) {
      const std::size_t k = index.slots[slot] - 1;
      if (strings_[k] == string) {
        coefficients_[k] += value;
        return;
      }
      slot = (slot + 1) & (index.slots.size() - 1);
    }
    strings_.push_back(string);
    coefficients_.push_back(value);
    index.slots[slot] = static_cast<std::uint32_t>(strings_.size());
    ++index.used;
  }

  /// Adds factor times another table.
  void add(const Table& other, double factor = 1.0) {
    for (std::size_t k = 0; k < other.size(); ++k)
      add(other.strings_[k], factor * other.coefficients_[k]);
  }

  void scale(double factor) {
    for (double& value : coefficients_) value *= factor;
  }

  [[nodiscard]] double one_norm() const {
    double sum = 0.0;
    for (const double value : coefficients_) sum += std::abs(value);
    return sum;
  }

  /// Square root of the sum of squares: the normalised Frobenius norm.
  [[nodiscard]] double frobenius_norm() const {
    double sum = 0.0;
    for (const double value : coefficients_) sum += value * value;
    return std::sqrt(sum);
  }

 private:
  static constexpr std::uint32_t bases_an_index = 8;

  /// Where to find the strings of some neighbouring bases: places in strings_, plus one, by hash.
  struct Index {
    std::vector<std::uint32_t> slots;
    std::size_t used = 0;
  };

  void grow(Index& index) {
    const std::vector<std::uint32_t> old = std::move(index.slots);
    index.slots.assign(old.empty() ? 16 : 2 * old.size(), 0);
    for (const std::uint32_t entry : old) {
      if (entry == 0) continue;
      std::size_t slot = hash(strings_[entry - 1]) & (index.slots.size() - 1);
      while (index.slots[slot] != 0) slot = (slot + 1) & (index.slots.size() - 1);
      index.slots[slot] = entry;
    }
  }

  std::vector<Packed<W>> strings_;
  std::vector<double> coefficients_;
  std::vector<Index> indices_ = std::vector<Index>(1);
};

/// Calls compute.template operator()<W>() with W = 1, 2, 4, 16 in turn until the strings fit.
/// Throws WindowOverflow where even the widest window is too narrow.
template <typename Compute>
auto with_window(Compute&& compute) {
  try {
    return compute.template operator()<1>();
  } catch (const WindowOverflow&) {
  }
  try {
    return compute.template operator()<2>();
  } catch (const WindowOverflow&) {
  }
  try {
    return compute.template operator()<4>();
  } catch (const WindowOverflow&) {
  }
  return compute.template operator()<16>();
}

}  // namespace farrier::pauli
