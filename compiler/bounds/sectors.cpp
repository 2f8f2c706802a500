// Invariant subspaces of all layers of a splitting.
#include "compiler/bounds/sectors.hpp"

#include <bit>
#include <complex>
#include <map>
#include <numeric>
#include <utility>

namespace farrier::bounds {
namespace {

/// Joins the states that a layer connects. Terms with one X mask share their entries, which may
/// cancel: XX + YY moves a state only where the qubits differ.
void connect(const Hamiltonian& hamiltonian, const Layer& layer, Pauli axis,
             std::vector<std::uint32_t>& parent) {
  std::map<std::uint32_t, std::vector<std::pair<AxisString, double>>> by_x;
  for (const Block& block : layer.blocks) {
    for (const std::uint32_t term : block.terms) {
      const AxisString string = in_basis(hamiltonian.sum.factors(term), axis);
      by_x[string.x].emplace_back(string, string.sign * hamiltonian.sum.coefficient(term));
    }
  }
  const auto root = [&](std::uint32_t state) {
    while (parent[state] != state) state = parent[state] = parent[parent[state]];
    return state;
  };
  static constexpr std::complex<double> powers[] = {{1, 0}, {0, 1}, {-1, 0}, {0, -1}};
  for (const auto& [x, strings] : by_x) {
    if (x == 0) continue;
    for (std::uint32_t j = 0; j < parent.size(); ++j) {
      std::complex<double> entry = 0.0;
      for (const auto& [string, coefficient] : strings) {
        const double sign = (std::popcount(string.z & j) & 1) != 0 ? -1.0 : 1.0;
        entry += sign * coefficient * powers[std::popcount(string.x & string.z) % 4];
      }
      if (entry == 0.0) continue;
      const std::uint32_t a = root(j);
      const std::uint32_t b = root(j ^ x);
      parent[std::max(a, b)] = std::min(a, b);
    }
  }
}

}  // namespace

double Sectors::cost() const {
  double total = 0.0;
  for (const auto& sector : states) {
    const auto size = static_cast<double>(sector.size());
    total += size * size * size;
  }
  return total;
}

AxisString in_basis(std::span<const Factor> factors, Pauli axis) {
  // Conjugation by (axis + Z)/sqrt(2) on every qubit exchanges the axis with Z and turns the third
  // letter's sign.
  AxisString result;
  for (const Factor factor : factors) {
    Pauli letter = factor.letter();
    if (axis != Pauli::z) {
      if (letter == axis)
        letter = Pauli::z;
      else if (letter == Pauli::z)
        letter = axis;
      else
        result.sign = -result.sign;
    }
    const auto bits = static_cast<std::uint32_t>(letter);
    result.x |= (bits & 1U) << factor.qubit();
    result.z |= (bits >> 1U) << factor.qubit();
  }
  return result;
}

Sectors find_sectors(const Hamiltonian& hamiltonian, const Layering& layering) {
  Sectors best;
  for (const Pauli axis : {Pauli::z, Pauli::x, Pauli::y}) {
    std::vector<std::uint32_t> parent(std::size_t{1} << hamiltonian.qubits);
    std::iota(parent.begin(), parent.end(), 0U);
    for (const Layer& layer : layering.layers) connect(hamiltonian, layer, axis, parent);
    std::map<std::uint32_t, std::vector<std::uint32_t>> groups;
    for (std::uint32_t state = 0; state < parent.size(); ++state) {
      std::uint32_t root = state;
      while (parent[root] != root) root = parent[root];
      groups[root].push_back(state);
    }
    Sectors found{axis, {}};
    for (auto& [root, members] : groups) found.states.push_back(std::move(members));
    if (best.states.empty() || found.cost() < best.cost()) best = std::move(found);
  }
  return best;
}

}  // namespace farrier::bounds
