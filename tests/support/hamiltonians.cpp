// Hamiltonians that several tests are about.
#include "tests/support/hamiltonians.hpp"

#include <algorithm>
#include <array>
#include <sstream>

namespace farrier::test {
namespace {

constexpr std::array<Pauli, 3> letters = {Pauli::x, Pauli::y, Pauli::z};

Pauli letter_of(char name) {
  switch (name) {
    case 'X':
      return Pauli::x;
    case 'Y':
      return Pauli::y;
    case 'Z':
      return Pauli::z;
    default:
      return Pauli::i;
  }
}

void add_pair(PauliSum& sum, std::uint32_t a, std::uint32_t b, Pauli left, Pauli right,
              double coefficient) {
  const Factor first(std::min(a, b), a < b ? left : right);
  const Factor second(std::max(a, b), a < b ? right : left);
  sum.add(std::array{first, second}, coefficient);
}

void add_site(PauliSum& sum, std::uint32_t site, Pauli letter, double coefficient) {
  if (coefficient != 0.0) sum.add(std::array{Factor(site, letter)}, coefficient);
}

Hamiltonian finished(std::uint32_t qubits, PauliSum sum) {
  sum.merge();
  return {qubits, std::move(sum), {}, {}};
}

}  // namespace

Hamiltonian hamiltonian(std::uint32_t qubits, const std::vector<Term>& terms) {
  PauliSum sum;
  for (const Term& term : terms) {
    std::vector<Factor> factors;
    std::istringstream words(term.text);
    for (std::string word; words >> word;)
      if (word != "I")
        factors.emplace_back(static_cast<std::uint32_t>(std::stoul(word.substr(1))),
                             letter_of(word[0]));
    sum.add(factors, term.coefficient);
  }
  return finished(qubits, std::move(sum));
}

Hamiltonian heisenberg(std::uint32_t sites, Ends ends, double field) {
  PauliSum sum;
  const std::uint32_t bonds = ends == Ends::joined ? sites : sites - 1;
  for (std::uint32_t k = 0; k < bonds; ++k)
    for (const Pauli letter : letters) add_pair(sum, k, (k + 1) % sites, letter, letter, 1.0);
  for (std::uint32_t k = 0; k < sites; ++k) add_site(sum, k, Pauli::z, field);
  return finished(sites, std::move(sum));
}

Hamiltonian ising_chain(std::uint32_t sites, double coupling, double field) {
  return ising_grid(sites, 1, coupling, field);
}

Hamiltonian ising_grid(std::uint32_t width, std::uint32_t height, double coupling, double field) {
  PauliSum sum;
  for (std::uint32_t y = 0; y < height; ++y) {
    for (std::uint32_t x = 0; x < width; ++x) {
      const std::uint32_t site = x + width * y;
      if (x + 1 < width) add_pair(sum, site, site + 1, Pauli::z, Pauli::z, coupling);
      if (y + 1 < height) add_pair(sum, site, site + width, Pauli::z, Pauli::z, coupling);
      add_site(sum, site, Pauli::x, field);
    }
  }
  return finished(width * height, std::move(sum));
}

Hamiltonian random_two_local(std::uint32_t qubits, Random& random) {
  PauliSum sum;
  for (std::uint32_t a = 0; a < qubits; ++a) {
    for (std::uint32_t b = a + 1; b < qubits; ++b)
      for (const Pauli left : letters)
        for (const Pauli right : letters) add_pair(sum, a, b, left, right, random.between(-1, 1));
    for (const Pauli letter : letters) add_site(sum, a, letter, random.between(-1, 1));
  }
  return finished(qubits, std::move(sum));
}

Hamiltonian random_strings(std::uint32_t qubits, std::uint32_t count, std::uint32_t weight,
                           Random& random) {
  PauliSum sum;
  for (std::uint32_t k = 0; k < count; ++k) {
    const std::vector<Factor> factors =
        random_string_of_weight(random, qubits, 1 + below(random, std::min(weight, qubits)));
    sum.add(factors, random.between(-1, 1));
  }
  sum.add_constant(random.between(-1, 1));
  return finished(qubits, std::move(sum));
}

Hamiltonian hydrogen() {
  return hamiltonian(4, {{"I", -0.81261073},
                         {"Z0", 0.17120125},
                         {"Z1", 0.17120125},
                         {"Z2", -0.22279638},
                         {"Z3", -0.22279638},
                         {"Z0 Z1", 0.16862327},
                         {"Z0 Z2", 0.12054612},
                         {"Z1 Z3", 0.12054612},
                         {"Z0 Z3", 0.16586801},
                         {"Z1 Z2", 0.16586801},
                         {"Z2 Z3", 0.17434948},
                         {"X0 X1 Y2 Y3", -0.04532188},
                         {"Y0 Y1 X2 X3", -0.04532188},
                         {"X0 Y1 Y2 X3", 0.04532188},
                         {"Y0 X1 X2 Y3", 0.04532188}});
}

}  // namespace farrier::test
