// Upper bounds on the spectral norm of a merged Pauli sum.
#pragma once

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <farrier/pauli.hpp>
#include <optional>
#include <string>
#include <vector>

#include "compiler/pauli/packed.hpp"

namespace farrier::pauli {

/// A bound and the way it was found, for the log.
struct NormBound {
  double value = 0.0;
  std::string method;
};

/// Pairs of strings that the search for anticommuting sets compares at most, a qubit; beyond, the
/// 1-norm has to do.
inline constexpr std::uint64_t anticommuting_set_checks = 1'000'000;

/// Relative rounding of a sum of non-negative numbers, added to every bound that is such a sum.
inline double summed_up(double value, std::size_t terms) {
  return value * (1.0 + 1.2e-16 * (static_cast<double>(terms) + 4.0));
}

/// Splits the sum greedily into sets of mutually anticommuting strings, largest coefficients first,
/// and adds up sqrt(sum of c^2) over the sets: each set squares to (sum of c^2) times the identity.
/// (The identity string is a set of its own.) None where it would take more than `max_checks`
/// comparisons.
template <std::size_t W>
std::optional<double> anticommuting_sets_norm(const Table<W>& sum, std::uint32_t qubits,
                                              std::uint64_t max_checks) {
  std::vector<std::uint32_t> order(sum.size());
  for (std::uint32_t k = 0; k < order.size(); ++k) order[k] = k;
  std::sort(order.begin(), order.end(), [&](std::uint32_t a, std::uint32_t b) {
    const double left = std::abs(sum.coefficient(a));
    const double right = std::abs(sum.coefficient(b));
    return left != right ? left > right : a < b;
  });

  struct Set {
    std::vector<std::uint32_t> members;
    double squares = 0.0;
  };
  std::vector<Set> sets;
  // A set can only take strings that overlap its first member, so sets are found by its qubits.
  std::vector<std::vector<std::uint32_t>> sets_on_qubit(qubits);
  std::vector<std::uint32_t> candidates;
  std::uint64_t checks = 0;
  for (const std::uint32_t k : order) {
    const Packed<W>& string = sum.string(k);
    candidates.clear();
    for_each_qubit(string, [&](std::uint32_t q) {
      candidates.insert(candidates.end(), sets_on_qubit[q].begin(), sets_on_qubit[q].end());
    });
    std::sort(candidates.begin(), candidates.end());
    candidates.erase(std::unique(candidates.begin(), candidates.end()), candidates.end());
    const auto fits = [&](std::uint32_t index) {
      return std::ranges::all_of(sets[index].members, [&](std::uint32_t member) {
        ++checks;
        return anticommute(sum.string(member), string);
      });
    };
    const auto found = std::ranges::find_if(candidates, fits);
    checks += candidates.size();
    if (checks > max_checks) return std::nullopt;
    std::uint32_t index = 0;
    if (found == candidates.end()) {
      index = static_cast<std::uint32_t>(sets.size());
      sets.emplace_back();
      for_each_qubit(string, [&](std::uint32_t q) { sets_on_qubit[q].push_back(index); });
    } else {
      index = *found;
    }
    sets[index].members.push_back(k);
    sets[index].squares += sum.coefficient(k) * sum.coefficient(k);
  }
  double total = 0.0;
  for (const Set& set : sets) total += std::sqrt(set.squares);
  return summed_up(total, sum.size());
}

/// The least of the bounds that are worth their time.
template <std::size_t W>
NormBound norm_from_above(const Table<W>& sum, std::uint32_t qubits) {
  NormBound best{summed_up(sum.one_norm(), sum.size()), "1-norm"};
  if (sum.size() > 1) {
    const auto sets = anticommuting_sets_norm(sum, qubits, anticommuting_set_checks * qubits);
    if (sets && *sets < best.value) best = {*sets, "anticommuting sets"};
  }
  return best;
}

}  // namespace farrier::pauli
