// What the hunts for counterexamples draw.
#include "tests/properties/cases.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <utility>
#include <vector>

#include "compiler/pauli/strings.hpp"
#include "passes/blocks.hpp"
#include "passes/table.hpp"
#include "tests/support/random.hpp"

namespace farrier::test {
namespace {

std::vector<Factor> letters_on(std::initializer_list<std::pair<std::uint32_t, Pauli>> letters) {
  std::vector<Factor> factors;
  for (const auto& [qubit, letter] : letters) factors.emplace_back(qubit, letter);
  std::ranges::sort(factors);
  return factors;
}

PauliSum strings_of_any_weight(Random& random, std::uint32_t qubits) {
  PauliSum sum;
  for (std::uint32_t k = random.integer(2, 9); k > 0; --k)
    sum.add(random_string_of_weight(random, qubits, random.integer(1, qubits)),
            random.between(-1.0, 1.0));
  return sum;
}

PauliSum couplings_and_fields(Random& random, std::uint32_t qubits) {
  PauliSum sum;
  for (std::uint32_t k = random.integer(3, 10); k > 0; --k)
    sum.add(random_string_of_weight(random, qubits, random.chance(0.7) ? 2 : 1),
            random.between(-1.0, 1.0));
  return sum;
}

PauliSum heisenberg_ring(Random& random, std::uint32_t qubits) {
  PauliSum sum;
  for (std::uint32_t a = 0; a < qubits; ++a) {
    const std::uint32_t b = (a + 1) % qubits;
    if (a == b || (qubits == 2 && a == 1)) continue;
    for (const Pauli letter : {Pauli::x, Pauli::y, Pauli::z})
      sum.add(letters_on({{a, letter}, {b, letter}}), 1.0);
    if (random.chance(0.5)) sum.add(letters_on({{a, Pauli::z}}), random.between(-1.0, 1.0));
  }
  return sum;
}

PauliSum ising_chain(Random& random, std::uint32_t qubits) {
  PauliSum sum;
  const double field = random.chance(0.5) ? 1.0 : random.between(-2.0, 2.0);
  for (std::uint32_t a = 0; a < qubits; ++a) {
    if (a + 1 < qubits) sum.add(letters_on({{a, Pauli::z}, {a + 1, Pauli::z}}), 1.0);
    sum.add(letters_on({{a, Pauli::x}}), field);
  }
  return sum;
}

PauliSum commuting(Random& random, std::uint32_t qubits) {
  PauliSum sum;
  for (std::uint32_t k = random.integer(2, 6); k > 0; --k) {
    std::vector<Factor> string;
    for (std::uint32_t qubit = 0; qubit < qubits; ++qubit)
      if (random.chance(0.6)) string.emplace_back(qubit, Pauli::z);
    if (!string.empty()) sum.add(string, random.between(-1.0, 1.0));
  }
  return sum;
}

/// X0, Y0, Z0 X1, Z0 Y1, Z0 Z1 X2, ...: every two of them anticommute.
PauliSum anticommuting(Random& random, std::uint32_t qubits) {
  PauliSum sum;
  std::vector<Factor> tail;
  for (std::uint32_t qubit = 0; qubit < qubits && sum.size() < 5; ++qubit) {
    for (const Pauli letter : {Pauli::x, Pauli::y}) {
      std::vector<Factor> string = tail;
      string.emplace_back(qubit, letter);
      if (sum.size() < 5) sum.add(string, random.between(-1.0, 1.0));
    }
    tail.emplace_back(qubit, Pauli::z);
  }
  return sum;
}

PauliSum all_of_two_qubits(Random& random, std::uint32_t) {
  PauliSum sum;
  for (unsigned a = 0; a < 4; ++a)
    for (unsigned b = 0; b < 4; ++b) {
      std::vector<Factor> string;
      if (a != 0) string.emplace_back(0U, static_cast<Pauli>(a));
      if (b != 0) string.emplace_back(1U, static_cast<Pauli>(b));
      if (!string.empty()) sum.add(string, random.between(-1.0, 1.0));
    }
  return sum;
}

struct Kind {
  const char* name;
  PauliSum (*make)(Random&, std::uint32_t qubits);
};

constexpr std::array<Kind, 7> kinds = {{{"strings of any weight", strings_of_any_weight},
                                        {"couplings and fields", couplings_and_fields},
                                        {"Heisenberg ring", heisenberg_ring},
                                        {"Ising chain", ising_chain},
                                        {"commuting strings", commuting},
                                        {"anticommuting strings", anticommuting},
                                        {"all strings of two qubits", all_of_two_qubits}}};

/// Few large systems: they cost most and show least.
std::uint32_t random_qubits(Random& random) {
  const double u = random.unit();
  return u < 0.35 ? 2 : u < 0.70 ? 3 : u < 0.90 ? 4 : u < 0.98 ? 5 : 6;
}

/// Terms in random order, each to the first layer that it commutes with.
Layering dealt_at_random(Random& random, const Hamiltonian& hamiltonian) {
  const PauliSum& sum = hamiltonian.sum;
  std::vector<std::uint32_t> order(sum.size());
  for (std::uint32_t k = 0; k < order.size(); ++k) order[k] = k;
  random.shuffle(order);
  std::vector<std::vector<std::uint32_t>> groups;
  for (const std::uint32_t term : order) {
    const auto fits = [&](const std::vector<std::uint32_t>& group) {
      return std::ranges::all_of(group, [&](std::uint32_t other) {
        return pauli::commute(sum.factors(term), sum.factors(other));
      });
    };
    const auto found = std::ranges::find_if(groups, fits);
    if (found != groups.end() && !(groups.size() < 4 && random.chance(0.2)))
      found->push_back(term);
    else
      groups.push_back({term});
  }
  Layering layering{"at random", "at random", {}};
  for (auto& group : groups) {
    std::ranges::sort(group);
    layering.layers.push_back(passes::layer_of(hamiltonian, group));
  }
  return layering;
}

std::vector<Layering> layerings(Random& random, const Hamiltonian& hamiltonian) {
  Plan plan;
  plan.parts.resize(1);
  passes::Notes notes;
  passes::group_commuting(hamiltonian, {}, plan, notes);
  passes::pair_blocks(hamiltonian, {}, plan, notes);
  std::vector<Layering> all = std::move(plan.parts.front().layerings);
  all.push_back(dealt_at_random(random, hamiltonian));
  for (Layering& layering : all) random.shuffle(layering.layers);
  std::erase_if(all, [](const Layering& layering) { return layering.layers.size() > 5; });
  return all;
}

}  // namespace

Draw draw(std::uint64_t seed) {
  Random random(seed);
  for (;;) {
    const Kind& kind = kinds[random.integer(0, kinds.size() - 1)];
    Draw result;
    result.kind = kind.name;
    result.hamiltonian.qubits =
        kind.make == all_of_two_qubits ? 2 : random_qubits(random);
    PauliSum& sum = result.hamiltonian.sum;
    sum = kind.make(random, result.hamiltonian.qubits);
    if (random.chance(0.3)) {
      result.kind += " over six decades";
      PauliSum spread;
      for (std::size_t k = 0; k < sum.size(); ++k)
        spread.add(sum.factors(k), sum.coefficient(k) * std::pow(10.0, random.between(-3.0, 3.0)));
      sum = std::move(spread);
    }
    sum.merge();
    if (sum.empty()) continue;
    const std::vector<Layering> choice = layerings(random, result.hamiltonian);
    if (choice.empty()) continue;
    result.layering = choice[random.integer(0, static_cast<std::uint32_t>(choice.size() - 1))];
    result.time = std::pow(10.0, random.between(-1.0, 1.0)) / sum.one_norm();
    if (random.chance(0.3)) result.time = -result.time;
    return result;
  }
}

}  // namespace farrier::test
