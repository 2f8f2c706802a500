// Commutators of sums as merged sums, with the work counted and the rounding bounded.
#pragma once

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <exception>
#include <utility>
#include <vector>

#include "compiler/pauli/packed.hpp"

namespace farrier::pauli {

/// Counts products of strings, so that searches are bounded by work and never by the clock.
struct Work {
  std::uint64_t done = 0;
  std::uint64_t limit = ~std::uint64_t{0};

  [[nodiscard]] bool exhausted() const { return done > limit; }
};

/// Thrown where a computation would exceed its work limit.
class WorkExhausted : public std::exception {};

/// A sum that others are commuted with: its terms, found by the qubits on which they act.
template <std::size_t W>
class Commutant {
 public:
  Commutant(const Table<W>& sum, std::uint32_t qubits)
      : qubits_(qubits), fixed_base_(fixed_base<W>(qubits)) {
    by_qubit_.resize(qubits);
    for (std::size_t k = 0; k < sum.size(); ++k) {
      if (sum.coefficient(k) == 0.0 || weight(sum.string(k)) == 0) continue;
      const auto index = static_cast<std::uint32_t>(terms_.size());
      terms_.push_back({sum.string(k), sum.coefficient(k)});
      for_each_qubit(sum.string(k), [&](std::uint32_t q) { by_qubit_[q].push_back(index); });
    }
    for (const auto& list : by_qubit_) degree_ = std::max(degree_, list.size());
  }

  /// Calls visit(aligned pair, coefficient) for every term that anticommutes with `string`; the
  /// term is the pair's first string.
  template <typename Visit>
  void for_each_anticommuting(const Packed<W>& string, Visit&& visit) const {
    for_each_qubit(string, [&](std::uint32_t qubit) {
      for (const std::uint32_t index : by_qubit_[qubit]) {
        const Term& term = terms_[index];
        const Aligned<W> pair(term.string, string);
        // A term on several qubits of the string is met at each of them, and taken at the first.
        if (pair.lowest_common_qubit() == qubit && pair.anticommute())
          visit(pair, term.coefficient);
      }
    });
  }

  [[nodiscard]] std::uint32_t qubits() const { return qubits_; }
  [[nodiscard]] bool base_is_fixed() const { return fixed_base_; }
  [[nodiscard]] std::size_t size() const { return terms_.size(); }
  /// Largest number of terms on one qubit.
  [[nodiscard]] std::size_t degree() const { return degree_; }

 private:
  struct Term {
    Packed<W> string;
    double coefficient;
  };

  std::vector<Term> terms_;
  std::vector<std::vector<std::uint32_t>> by_qubit_;
  std::size_t degree_ = 0;
  std::uint32_t qubits_;
  bool fixed_base_;
};

/// D_A(B) = -i [A, B] as a merged sum, with what is needed to bound its rounding.
template <std::size_t W>
struct Commutator {
  explicit Commutator(Table<W> table) : sum(std::move(table)) {}

  Table<W> sum;
  double mass = 0.0;          ///< sum of the magnitudes of all products before merging
  double growth = 0.0;        ///< largest 1-norm of D_A(P) over the strings P of B
  std::size_t roundings = 0;  ///< most roundings that one merged coefficient went through
};

/// factor * D_A(B). Each anticommuting pair a Q of A and b P of B gives -i [aQ, bP] = -2i ab QP.
/// Throws WorkExhausted, WindowOverflow.
template <std::size_t W>
Commutator<W> commute(const Commutant<W>& a, const Table<W>& b, double factor, Work& work) {
  Commutator<W> result{Table<W>(a.qubits())};
  std::size_t largest_weight = 0;
  for (std::size_t k = 0; k < b.size(); ++k) {
    // A coefficient that came out as 0 is not skipped: its true value may be a rounding error.
    const double scaled = 2.0 * factor * b.coefficient(k);
    double row = 0.0;
    a.for_each_anticommuting(b.string(k), [&](const Aligned<W>& pair, double coefficient) {
      const Product<W> product = pair.product(a.base_is_fixed());
      const double value = scaled * coefficient;
      result.sum.add(product.string, product.quarter_turns == 1 ? value : -value);
      largest_weight = std::max(largest_weight, weight(product.string));
      row += std::abs(coefficient);
      ++work.done;
    });
    if (work.exhausted()) throw WorkExhausted();
    result.mass += row * std::abs(scaled);
    result.growth = std::max(result.growth, 2.0 * std::abs(factor) * row);
  }
  // A merged string R comes from at most as many products as A has terms that anticommute with R.
  result.roundings = 4 + std::min(a.size(), largest_weight * a.degree());
  return result;
}

/// What commutator_one_norm finds.
struct CommutatorNorm {
  double norm = 0.0;
  double growth = 0.0;  ///< as in Commutator
};

/// A bound on |factor| * ||D_A(B)|| that builds nothing: the sum over P in B of |c_P| times twice
/// the 1-norm of the part of A that anticommutes with P.
template <std::size_t W>
CommutatorNorm commutator_one_norm(const Commutant<W>& a, const Table<W>& b, double factor,
                                   Work& work) {
  CommutatorNorm result;
  for (std::size_t k = 0; k < b.size(); ++k) {
    double row = 0.0;
    a.for_each_anticommuting(b.string(k), [&](const Aligned<W>&, double coefficient) {
      row += std::abs(coefficient);
      ++work.done;
    });
    if (work.exhausted()) throw WorkExhausted();
    const double grown = 2.0 * std::abs(factor) * row;
    result.norm += grown * std::abs(b.coefficient(k));
    result.growth = std::max(result.growth, grown);
  }
  return result;
}

}  // namespace farrier::pauli
