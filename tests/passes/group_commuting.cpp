// group_commuting: every term in one layer, and all terms of a layer commute.
#include <doctest/doctest.h>

#include <map>
#include <string>
#include <vector>

#include "passes/table.hpp"
#include "tests/support/hamiltonians.hpp"

using namespace farrier;
using passes::Notes;
using test::Random;

namespace {

Layering grouped(const Hamiltonian& h) {
  Plan plan;
  plan.parts.emplace_back();
  Notes notes;
  passes::group_commuting(h, {}, plan, notes);
  REQUIRE(plan.parts.front().layerings.size() == 1);
  CHECK_FALSE(notes.empty());
  return plan.parts.front().layerings.front();
}

/// Strings commute where they differ on an even number of the qubits that both act on.
bool commute(const Hamiltonian& h, std::uint32_t a, std::uint32_t b) {
  std::map<std::uint32_t, Pauli> letters;
  for (const Factor factor : h.sum.factors(a)) letters[factor.qubit()] = factor.letter();
  int different = 0;
  for (const Factor factor : h.sum.factors(b)) {
    const auto found = letters.find(factor.qubit());
    if (found != letters.end() && found->second != factor.letter()) ++different;
  }
  return different % 2 == 0;
}

std::vector<std::uint32_t> terms_of(const Layer& layer) {
  std::vector<std::uint32_t> terms;
  for (const Block& block : layer.blocks)
    terms.insert(terms.end(), block.terms.begin(), block.terms.end());
  return terms;
}

void check_layers(const Hamiltonian& h) {
  std::vector<int> seen(h.sum.size(), 0);
  for (const Layer& layer : grouped(h).layers) {
    const std::vector<std::uint32_t> terms = terms_of(layer);
    CHECK_FALSE(terms.empty());
    bool all_commute = true;
    for (const std::uint32_t a : terms) {
      ++seen[a];
      for (const std::uint32_t b : terms) all_commute = all_commute && commute(h, a, b);
    }
    CHECK(all_commute);
  }
  CHECK(seen == std::vector<int>(h.sum.size(), 1));
}

std::vector<std::vector<std::string>> texts(const Hamiltonian& h) {
  std::vector<std::vector<std::string>> result;
  for (const Layer& layer : grouped(h).layers) {
    result.emplace_back();
    for (const std::uint32_t term : terms_of(layer))
      result.back().push_back(to_text(h.sum.factors(term)));
  }
  return result;
}

}  // namespace

TEST_CASE("the example of the pass") {
  using Texts = std::vector<std::vector<std::string>>;
  CHECK(texts(test::hamiltonian(3, {{"X0 X1", 1}, {"Y0 Y1", 1}, {"X1 X2", 1}, {"Z1", 1}})) ==
        Texts{{"X0 X1", "Y0 Y1"}, {"X1 X2"}, {"Z1"}});
}

TEST_CASE("no term gives no layer") {
  CHECK(grouped(test::hamiltonian(2, {{"I", 3}})).layers.empty());
}

TEST_CASE("largest coefficients come first") {
  // Z0 goes first and takes the first layer, though X0 stands before it.
  CHECK(texts(test::hamiltonian(1, {{"X0", 0.1}, {"Z0", -2}})).front().front() == "Z0");
}

TEST_CASE("sums of few commuting sets are split into as many layers") {
  // XX, YY and ZZ of any bonds commute among their likes; terms of one letter all commute.
  CHECK(grouped(test::heisenberg(6, test::Ends::joined)).layers.size() <= 3);
  CHECK(grouped(test::heisenberg(6, test::Ends::joined, 0.3)).layers.size() <= 3);
  CHECK(grouped(test::ising_chain(9, 1.0, 0.7)).layers.size() == 2);
  CHECK(grouped(test::ising_chain(9, 1.0, 0.0)).layers.size() == 1);
  // All 15 strings on two qubits fall into at least five commuting sets of three (Lawrence,
  // Brukner, Zeilinger 2002, PRA 65, 032320).
  Random random(1);
  CHECK(grouped(test::random_two_local(2, random)).layers.size() >= 5);
}

TEST_CASE("every layer commutes and every term stands in one layer") {
  Random random(2);
  check_layers(test::heisenberg(7, test::Ends::joined, 0.5));
  check_layers(test::ising_grid(3, 4, 1.0, 0.8));
  check_layers(test::hydrogen());
  for (int k = 0; k < 60; ++k) {
    const std::uint32_t qubits = 1 + test::below(random, 8);
    check_layers(test::random_strings(qubits, 1 + test::below(random, 80), qubits, random));
    check_layers(test::random_two_local(1 + test::below(random, 5), random));
  }
}
