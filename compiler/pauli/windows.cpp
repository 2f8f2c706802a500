// Norms of local sums from above, by exact eigenvalues on small windows of qubits.
#include "compiler/pauli/windows.hpp"

#include <algorithm>
#include <array>
#include <bit>
#include <cmath>
#include <complex>
#include <farrier/diagnostic.hpp>
#include <iterator>
#include <map>
#include <span>
#include <utility>
#include <vector>

#include "compiler/base/eigen.hpp"
#include "compiler/base/parallel.hpp"
#include "compiler/pauli/norms.hpp"
#include "compiler/pauli/packed.hpp"

namespace farrier::pauli {
namespace {

using Qubits = std::vector<std::uint32_t>;

/// A string in a window: masks over the window's qubits, and its share of the coefficient.
struct LocalTerm {
  std::uint32_t x = 0;
  std::uint32_t z = 0;
  double coefficient = 0.0;

  friend auto operator<=>(const LocalTerm&, const LocalTerm&) = default;
};

/// A window's operator; equal ones are diagonalised once.
struct Window {
  std::size_t qubits = 0;
  std::vector<LocalTerm> terms;

  friend auto operator<=>(const Window&, const Window&) = default;
};

Qubits support(std::span<const Factor> factors) {
  Qubits qubits;
  for (const Factor factor : factors) qubits.push_back(factor.qubit());
  return qubits;
}

Qubits joined(const Qubits& a, const Qubits& b) {
  Qubits all;
  std::ranges::set_union(a, b, std::back_inserter(all));
  return all;
}

bool contains(const Qubits& a, const Qubits& b) {
  return std::ranges::includes(a, b);
}

/// Distinct supports by their lowest qubit, larger ones first.
std::vector<std::vector<Qubits>> supports_by_lowest(const PauliSum& sum,
                                                    const std::vector<std::uint32_t>& terms,
                                                    std::uint32_t qubits) {
  std::vector<std::vector<Qubits>> by_lowest(qubits);
  for (const std::uint32_t term : terms) {
    Qubits s = support(sum.factors(term));
    by_lowest[s.front()].push_back(std::move(s));
  }
  for (auto& supports : by_lowest) {
    std::ranges::sort(supports, [](const Qubits& a, const Qubits& b) {
      return a.size() != b.size() ? a.size() > b.size() : a < b;
    });
    supports.erase(std::unique(supports.begin(), supports.end()), supports.end());
  }
  return by_lowest;
}

/// Sets of at most `size` qubits such that every support lies in one: for each lowest qubit as many
/// as its supports need, each filled up with supports of the following qubits.
std::vector<Qubits> choose_windows(const std::vector<std::vector<Qubits>>& by_lowest,
                                   std::size_t size) {
  std::vector<Qubits> windows;
  for (std::size_t lowest = 0; lowest < by_lowest.size(); ++lowest) {
    std::vector<Qubits> open = by_lowest[lowest];
    while (!open.empty()) {
      Qubits window = open.front();
      const auto fill_from = [&](const std::vector<Qubits>& supports) {
        for (const Qubits& s : supports) {
          Qubits larger = joined(window, s);
          if (larger.size() <= size) window = std::move(larger);
        }
      };
      fill_from(open);
      for (std::size_t next = lowest + 1; next < by_lowest.size() && window.size() < size; ++next) {
        if (next > window.back()) break;
        fill_from(by_lowest[next]);
      }
      std::erase_if(open, [&](const Qubits& s) { return contains(window, s); });
      windows.push_back(std::move(window));
    }
  }
  // Windows inside others add nothing.
  std::vector<Qubits> kept;
  std::vector<std::vector<std::size_t>> kept_on(by_lowest.size());
  std::ranges::stable_sort(windows, std::ranges::greater{}, &Qubits::size);
  for (Qubits& window : windows) {
    const auto inside = [&](std::size_t k) { return contains(kept[k], window); };
    if (std::ranges::any_of(kept_on[window.front()], inside)) continue;
    for (const std::uint32_t qubit : window) kept_on[qubit].push_back(kept.size());
    kept.push_back(std::move(window));
  }
  return kept;
}

/// The windows' operators, each string shared equally.
std::vector<Window> share_terms(const PauliSum& sum, const std::vector<std::uint32_t>& terms,
                                const std::vector<Qubits>& windows, std::uint32_t qubits) {
  std::vector<std::vector<std::size_t>> windows_on(qubits);
  for (std::size_t k = 0; k < windows.size(); ++k)
    for (const std::uint32_t qubit : windows[k]) windows_on[qubit].push_back(k);
  std::vector<Window> operators(windows.size());
  for (std::size_t k = 0; k < windows.size(); ++k) operators[k].qubits = windows[k].size();
  for (const std::uint32_t term : terms) {
    const auto factors = sum.factors(term);
    const Qubits s = support(factors);
    std::vector<std::size_t> homes;
    for (const std::size_t k : windows_on[s.front()])
      if (contains(windows[k], s)) homes.push_back(k);
    if (homes.empty()) throw InternalFault("a string in no window");
    for (const std::size_t home : homes) {
      LocalTerm local{0, 0, sum.coefficient(term) / static_cast<double>(homes.size())};
      for (const Factor factor : factors) {
        const auto place =
            std::ranges::lower_bound(windows[home], factor.qubit()) - windows[home].begin();
        const auto letter = static_cast<unsigned>(factor.letter());
        local.x |= (letter & 1U) << place;
        local.z |= ((letter >> 1U) & 1U) << place;
      }
      operators[home].terms.push_back(local);
    }
  }
  for (Window& window : operators) std::ranges::sort(window.terms);
  return operators;
}

/// Adds a term to a matrix: P|j> = i^|x&z| (-1)^|z&j| |j xor x>, for Y = i X Z.
template <typename Matrix>
void add_term(Matrix& matrix, const LocalTerm& term) {
  using Scalar = typename Matrix::Scalar;
  const int ys = std::popcount(term.x & term.z);
  Scalar factor{};
  if constexpr (Eigen::NumTraits<Scalar>::IsComplex) {
    static constexpr std::array<Scalar, 4> powers = {Scalar{1, 0}, Scalar{0, 1}, Scalar{-1, 0},
                                                     Scalar{0, -1}};
    factor = term.coefficient * powers[static_cast<std::size_t>(ys % 4)];
  } else {
    factor = ys % 4 == 0 ? term.coefficient : -term.coefficient;  // ys is even here
  }
  const auto dimension = static_cast<std::uint32_t>(matrix.rows());
  for (std::uint32_t j = 0; j < dimension; ++j) {
    const bool minus = (std::popcount(term.z & j) & 1) != 0;
    matrix(j ^ term.x, j) += minus ? -factor : factor;
  }
}

template <typename Matrix>
std::pair<double, double> extreme_eigenvalues(const Window& window) {
  const auto dimension = Eigen::Index{1} << window.qubits;
  Matrix matrix = Matrix::Zero(dimension, dimension);
  for (const LocalTerm& term : window.terms) add_term(matrix, term);
  const Eigen::SelfAdjointEigenSolver<Matrix> solver(matrix, Eigen::EigenvaluesOnly);
  if (solver.info() != Eigen::Success) throw InternalFault("eigenvalues of a window not found");
  return {solver.eigenvalues()(dimension - 1), solver.eigenvalues()(0)};
}

/// Ends of a window's spectrum, moved outwards by the rounding of matrix and eigenvalues.
std::pair<double, double> spectrum_of(const Window& window) {
  bool real = true;
  double norm = 0.0;
  for (const LocalTerm& term : window.terms) {
    real = real && std::popcount(term.x & term.z) % 2 == 0;
    norm += std::abs(term.coefficient);
  }
  const auto [highest, lowest] = real ? extreme_eigenvalues<Eigen::MatrixXd>(window)
                                      : extreme_eigenvalues<Eigen::MatrixXcd>(window);
  // Householder reduction and QL are backward stable with a modest multiple of the dimension times
  // the unit roundoff; the 1-norm bounds the matrix norm.
  const double rounding = norm * 2.3e-16 *
                          (static_cast<double>(window.terms.size()) +
                           8.0 * static_cast<double>(std::size_t{1} << window.qubits));
  return {highest + rounding, -lowest + rounding};
}

/// Sums of the ends over windows, equal windows diagonalised once; summed in a fixed order.
SpectrumBound add_up(const std::vector<Window>& windows) {
  std::map<Window, std::size_t> places;
  std::vector<const Window*> distinct;
  std::vector<std::size_t> uses;
  for (const Window& window : windows) {
    const auto [place, fresh] = places.try_emplace(window, distinct.size());
    if (fresh) {
      distinct.push_back(&place->first);
      uses.push_back(0);
    }
    ++uses[place->second];
  }
  std::vector<std::pair<double, double>> ends(distinct.size());
  base::parallel_for(distinct.size(), [&](std::size_t k) { ends[k] = spectrum_of(*distinct[k]); });
  SpectrumBound bound;
  for (std::size_t k = 0; k < ends.size(); ++k) {
    bound.above += static_cast<double>(uses[k]) * ends[k].first;
    bound.below += static_cast<double>(uses[k]) * ends[k].second;
  }
  const double rounding = 2.3e-16 * static_cast<double>(windows.size() + 4) *
                          (std::abs(bound.above) + std::abs(bound.below));
  bound.above += rounding;
  bound.below += rounding;
  return bound;
}

double operations(const std::vector<Qubits>& windows) {
  double total = 0.0;
  for (const Qubits& window : windows) total += std::pow(8.0, static_cast<double>(window.size()));
  return total;
}

/// A bound on strings that are too heavy for windows.
NormBound heavy_bound(const PauliSum& sum, const std::vector<std::uint32_t>& terms,
                      std::uint32_t qubits) {
  PauliSum heavy;
  for (const std::uint32_t term : terms) heavy.add(sum.factors(term), sum.coefficient(term));
  try {
    return with_window([&]<std::size_t W>() {
      Table<W> table(qubits);
      for (std::size_t k = 0; k < heavy.size(); ++k)
        table.add(pack<W>(heavy.factors(k), qubits), heavy.coefficient(k));
      return norm_from_above(table, qubits);
    });
  } catch (const WindowOverflow&) {
    return {summed_up(heavy.one_norm(), heavy.size()), "1-norm"};
  }
}

}  // namespace

SpectrumBound window_bound(const PauliSum& sum, std::uint32_t qubits, const WindowLimits& limits) {
  base::fix_eigen_blocking();
  std::vector<std::uint32_t> light;
  std::vector<std::uint32_t> heavy;
  for (std::uint32_t k = 0; k < sum.size(); ++k)
    (sum.factors(k).size() <= limits.qubits ? light : heavy).push_back(k);
  SpectrumBound bound;
  if (!light.empty()) {
    std::size_t least = 1;
    for (const std::uint32_t k : light) least = std::max(least, sum.factors(k).size());
    const auto by_lowest = supports_by_lowest(sum, light, qubits);
    std::vector<Qubits> windows = choose_windows(by_lowest, limits.qubits);
    for (std::size_t size = limits.qubits; size > least && operations(windows) > limits.operations;)
      windows = choose_windows(by_lowest, --size);
    std::size_t largest = 0;
    for (const Qubits& window : windows) largest = std::max(largest, window.size());
    bound = add_up(share_terms(sum, light, windows, qubits));
    bound.method = windows.size() == 1 ? "exact, " + std::to_string(largest) + " qubits"
                                       : std::to_string(windows.size()) + " windows of up to " +
                                             std::to_string(largest) + " qubits";
  }
  if (!heavy.empty()) {
    const NormBound rest = heavy_bound(sum, heavy, qubits);
    bound.above += rest.value;
    bound.below += rest.value;
    bound.method += (bound.method.empty() ? "" : " and ") + rest.method;
  }
  bound.above += sum.constant();
  bound.below -= sum.constant();
  return bound;
}

}  // namespace farrier::pauli
