// Lists of terms, coefficients and words below the level of files.
#include "compiler/front/terms.hpp"

#include <doctest/doctest.h>

#include <array>

using namespace farrier;
using namespace farrier::front;

namespace {

TermList two_terms() {
  TermList list;
  const std::uint32_t file = list.file_index("a");
  const std::array<Factor, 1> z{Factor(2, Pauli::z)};
  const std::array<Factor, 1> x{Factor(0, Pauli::x)};
  list.add(z, 1.5, {file, 3});
  list.add({}, 2.0, {file, 4});
  list.add(x, -1.0, {list.file_index("b"), 1});
  return list;
}

}  // namespace

TEST_CASE("file names are kept once each") {
  TermList list;
  CHECK(list.file_index("a") == 0);
  CHECK(list.file_index("b") == 1);
  CHECK(list.file_index("a") == 0);
  CHECK(list.files == std::vector<std::string>{"a", "b"});
}

TEST_CASE("a list of terms becomes a Hamiltonian in canonical order scaled") {
  std::vector<Diagnostic> warnings;
  CHECK(two_terms().read == 3);
  const Hamiltonian hamiltonian = to_hamiltonian(two_terms(), 5, 2.0, warnings);
  CHECK(warnings.empty());
  CHECK(hamiltonian.qubits == 5);
  CHECK(hamiltonian.sum.constant() == 4.0);
  REQUIRE(hamiltonian.sum.size() == 2);
  REQUIRE(hamiltonian.origins.size() == 2);
  CHECK(hamiltonian.sum.coefficient(0) == -2.0);
  CHECK(hamiltonian.origins[0].file == 1);
  CHECK(hamiltonian.origins[0].line == 1);
  CHECK(hamiltonian.sum.coefficient(1) == 3.0);
  CHECK(hamiltonian.origins[1].line == 3);
}

TEST_CASE("a unit that leaves double precision is refused") {
  std::vector<Diagnostic> warnings;
  CHECK_THROWS_WITH_AS(to_hamiltonian(two_terms(), 5, 1e308, warnings),
                       "the terms add up beyond the range of double precision; expected less",
                       UserError);
}

TEST_CASE("words are read out of the middle of a text") {
  const base::SourceText source{"a", "(Z1\n X0\t)"};
  WordReader words(source);
  Extent extent;
  const auto factors = words.read(1, 8, extent);
  REQUIRE(factors.size() == 2);
  CHECK(factors[0] == Factor(0, Pauli::x));
  CHECK(factors[1] == Factor(1, Pauli::z));
  CHECK(extent.span == 2);
  CHECK(extent.dense == 0);
}

TEST_CASE("the bound of indices is the least of all that is known") {
  Extent extent;
  CHECK(extent.bound() == 0);
  extent.limit = 8;
  CHECK(extent.bound() == 8);
  extent.declared = 5;
  CHECK(extent.bound() == 5);
  extent.dense = 6;
  CHECK(extent.bound() == 5);
}
