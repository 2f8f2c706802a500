// order_layers
//
// Does: for each layering, offers orders of its layers. The first and the last layer of a symmetric
// step meet their own likes at the seams, so a step costs twice the sum of its layers less these
// two; and the error depends on the order too. Few layers: every order; many: the costliest two at
// the ends, rising and falling cost. Does not choose one.
//
//   layers of 6, 20, 9 gates   offered as   6 20 9, 6 9 20, 20 6 9, ...
//
// Promises: the same operator.
// Stands after the passes that make layerings; before choose_formula, which certifies each.
#include <algorithm>
#include <cstdint>
#include <numeric>
#include <string>
#include <utility>
#include <vector>

#include "compiler/synthesis/cost.hpp"
#include "passes/table.hpp"

namespace farrier::passes {
namespace {

using Order = std::vector<std::uint32_t>;

struct NamedOrder {
  std::string name;
  Order order;
};

/// Sums of more terms than this are offered in few orders: each costs a certificate.
constexpr std::size_t many_terms = 1500;

std::string name_of(const Order& order) {
  std::string text;
  for (const std::uint32_t layer : order)
    text += (text.empty() ? "" : "-") + std::to_string(layer + 1);
  return text;
}

std::vector<NamedOrder> permutations(std::size_t layers) {
  Order order(layers);
  std::iota(order.begin(), order.end(), 0U);
  std::vector<NamedOrder> all;
  do {
    all.push_back({name_of(order), order});
  } while (std::ranges::next_permutation(order).found);
  return all;
}

std::vector<NamedOrder> by_cost(const std::vector<std::uint64_t>& costs, bool few) {
  Order as_made(costs.size());
  std::iota(as_made.begin(), as_made.end(), 0U);
  Order falling = as_made;
  std::ranges::stable_sort(falling, std::ranges::greater{},
                           [&](std::uint32_t k) { return costs[k]; });
  Order ends = falling;
  std::rotate(ends.begin() + 1, ends.begin() + 2, ends.end());
  std::vector<NamedOrder> all = {{"costliest at the ends", ends}, {"as made", as_made}};
  if (few) return all;
  all.push_back({"falling cost", falling});
  Order rising = falling;
  std::ranges::reverse(rising);
  all.push_back({"rising cost", rising});
  return all;
}

Layering reordered(const Layering& layering, const NamedOrder& order) {
  Layering result{layering.name, order.name, {}};
  for (const std::uint32_t layer : order.order) result.layers.push_back(layering.layers[layer]);
  return result;
}

}  // namespace

void order_layers(const Hamiltonian& hamiltonian, const Request&, Plan& plan, Notes& notes) {
  const bool large = hamiltonian.sum.size() > many_terms;
  for (Part& part : plan.parts) {
    std::vector<Layering> offered;
    for (const Layering& layering : part.layerings) {
      const std::size_t count = layering.layers.size();
      if (count <= 1) {
        offered.push_back(layering);
        continue;
      }
      std::vector<std::uint64_t> costs;
      for (const Layer& layer : layering.layers)
        costs.push_back(synthesis::layer_cost(hamiltonian, layer));
      const std::vector<NamedOrder> orders =
          count <= 3 && !large ? permutations(count) : by_cost(costs, large);
      std::vector<Order> seen;
      for (const NamedOrder& order : orders) {
        if (std::ranges::find(seen, order.order) != seen.end()) continue;
        seen.push_back(order.order);
        offered.push_back(reordered(layering, order));
      }
      notes.push_back(layering.name + ": " + std::to_string(seen.size()) + " orders of " +
                      std::to_string(count) + " layers");
    }
    part.layerings = std::move(offered);
  }
}

}  // namespace farrier::passes
