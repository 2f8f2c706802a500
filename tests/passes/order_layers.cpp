// order_layers: every order holds the same layers; few layers get every order, many the useful
// ones.
#include <doctest/doctest.h>

#include <algorithm>
#include <set>
#include <string>
#include <vector>

#include "compiler/synthesis/cost.hpp"
#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"

using namespace farrier;
using passes::Notes;

namespace {

using Signature = std::vector<std::vector<std::uint32_t>>;

/// The terms of each layer, by which layers are told apart.
Signature signature(const Layering& layering) {
  Signature result;
  for (const Layer& layer : layering.layers) {
    result.emplace_back();
    for (const Block& block : layer.blocks)
      result.back().insert(result.back().end(), block.terms.begin(), block.terms.end());
  }
  return result;
}

Plan plan_of(const Hamiltonian& h, bool pairs) {
  Plan plan;
  plan.parts.emplace_back();
  Notes notes;
  if (pairs)
    passes::pair_blocks(h, {}, plan, notes);
  else
    passes::group_commuting(h, {}, plan, notes);
  return plan;
}

std::vector<Layering> ordered(const Hamiltonian& h, Plan plan) {
  Notes notes;
  passes::order_layers(h, {}, plan, notes);
  return plan.parts.front().layerings;
}

/// Orders are distinct, have distinct names, and hold the layers that were there before.
void check_orders(const Hamiltonian& h, const Plan& plan) {
  Signature before = signature(plan.parts.front().layerings.front());
  std::ranges::sort(before);
  std::set<Signature> orders;
  std::set<std::string> names;
  for (const Layering& layering : ordered(h, plan)) {
    CHECK(layering.name == plan.parts.front().layerings.front().name);
    Signature layers = signature(layering);
    CHECK(orders.insert(layers).second);
    CHECK(names.insert(layering.order).second);
    std::ranges::sort(layers);
    CHECK(layers == before);
  }
}

}  // namespace

TEST_CASE("two or three layers are offered in every order") {
  const Hamiltonian ising = test::ising_chain(6, 1.0, 0.7);
  CHECK(ordered(ising, plan_of(ising, false)).size() == 2);
  check_orders(ising, plan_of(ising, false));
  const Hamiltonian heisenberg = test::heisenberg(6, test::Ends::joined);
  CHECK(ordered(heisenberg, plan_of(heisenberg, false)).size() == 6);
  check_orders(heisenberg, plan_of(heisenberg, false));
}

TEST_CASE("a single layer keeps its order") {
  const Hamiltonian h = test::ising_chain(6, 1.0, 0.0);
  const std::vector<Layering> orders = ordered(h, plan_of(h, false));
  REQUIRE(orders.size() == 1);
  CHECK(orders.front().order == "as grouped");
}

TEST_CASE("many layers are offered in at most four orders") {
  test::Random random(1);
  for (int k = 0; k < 10; ++k) {
    const Hamiltonian h = test::random_two_local(6, random);
    for (const bool pairs : {false, true}) {
      const Plan plan = plan_of(h, pairs);
      CHECK(ordered(h, plan).size() <= 4);
      check_orders(h, plan);
    }
  }
}

TEST_CASE("the costliest two layers come to the ends") {
  test::Random random(2);
  const Hamiltonian h = test::random_strings(7, 60, 7, random);
  const std::vector<Layering> orders = ordered(h, plan_of(h, false));
  const auto cost = [&](const Layer& layer) { return synthesis::layer_cost(h, layer); };
  const auto named = [&](const std::string& name) {
    return *std::ranges::find(orders, name, &Layering::order);
  };
  const Layering ends = named("costliest at the ends");
  for (std::size_t k = 1; k + 1 < ends.layers.size(); ++k) {
    CHECK(cost(ends.layers[k]) <= cost(ends.layers.front()));
    CHECK(cost(ends.layers[k]) <= cost(ends.layers.back()));
  }
  const auto costs = [&](const std::string& name) {
    std::vector<std::uint64_t> all;
    for (const Layer& layer : named(name).layers) all.push_back(cost(layer));
    return all;
  };
  CHECK(std::ranges::is_sorted(costs("rising cost")));
  CHECK(std::ranges::is_sorted(costs("falling cost"), std::ranges::greater{}));
}

TEST_CASE("large sums are offered in few orders") {
  const Hamiltonian h = test::heisenberg(1400, test::Ends::joined);
  REQUIRE(h.sum.size() > 4000);
  const Plan plan = plan_of(h, false);
  CHECK(ordered(h, plan).size() <= 2);
  check_orders(h, plan);
}

TEST_CASE("every layering of a part is ordered") {
  const Hamiltonian h = test::heisenberg(6, test::Ends::joined);
  Plan plan = plan_of(h, false);
  plan.parts.front().layerings.push_back(plan_of(h, true).parts.front().layerings.front());
  std::set<std::string> names;
  for (const Layering& layering : ordered(h, plan)) names.insert(layering.name);
  CHECK(names == std::set<std::string>{"commuting sets", "pair blocks"});
}
