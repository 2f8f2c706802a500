// Exponentials of blocks on one or two qubits against exact exponentials, and their decompositions.
#include "compiler/synthesis/block.hpp"

#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <numbers>
#include <numeric>
#include <string>
#include <vector>

#include "compiler/synthesis/turn.hpp"
#include "tests/support/hamiltonians.hpp"
#include "tests/support/unitary.hpp"

using namespace farrier;
using namespace farrier::synthesis;
using test::Random;
using test::Term;
using unitary::Matrix;
using unitary::Real;

namespace {

constexpr double pi = std::numbers::pi;
const std::array<std::string, 3> names = {"X", "Y", "Z"};

std::string on(std::size_t axis, int qubit) {
  return names[axis] + std::to_string(qubit);
}
std::string pair(std::size_t left, std::size_t right) {
  return on(left, 0) + " " + on(right, 1);
}

Matrix matrix(const Sequence& sequence) {
  return unitary::gates_matrix(2, sequence.gates, sequence.phase);
}

Block block_of(const Hamiltonian& h, BlockKind kind = BlockKind::pair) {
  Block block{kind, 0, kind == BlockKind::pair ? 1U : 0U, {}};
  block.terms.resize(h.sum.size());
  std::iota(block.terms.begin(), block.terms.end(), 0U);
  return block;
}

/// The canonical gate of a sequence, and that there is at most one.
Coordinates coordinates(const Sequence& sequence) {
  Coordinates result{};
  int count = 0;
  for (const Gate& gate : sequence.gates) {
    if (gate.kind == GateKind::turn) continue;
    REQUIRE(gate.kind == GateKind::canonical);
    result = {gate.parameters[0], gate.parameters[1], gate.parameters[2]};
    ++count;
  }
  CHECK(count <= 1);
  return result;
}

/// Checks the operator; returns how many cx the block takes.
int check_block(const std::vector<Term>& terms, double scale) {
  std::string text;
  for (const Term& term : terms) text += term.text + ": " + std::to_string(term.coefficient) + "; ";
  INFO(text << "scale " << scale);
  const Hamiltonian h = test::hamiltonian(2, terms);
  const Sequence sequence = block_sequence(h, block_of(h), scale);
  const Matrix expected = unitary::evolution(unitary::sum_matrix(2, h.sum), scale);
  // The eigenvalues of the reference are wrong by their last place, times the scale.
  const Real reference_error = 1e-17L + 3e-18L * std::abs(Real{scale}) * h.sum.one_norm();
  CHECK(unitary::distance(matrix(sequence), expected) <= sequence.rounding + reference_error);
  CHECK(sequence.rounding <= 1e-13 * (1.0 + std::abs(scale) * h.sum.one_norm()));
  // A multiple of pi/2, for the sum has no trace.
  CHECK(std::abs(std::remainder(sequence.phase, pi / 2)) <= 1e-12);
  return entanglers(coordinates(sequence), Native::cx);
}

std::vector<Term> couplings(Random& draw) {
  std::vector<Term> terms;
  for (std::size_t left = 0; left < 3; ++left)
    for (std::size_t right = 0; right < 3; ++right)
      terms.push_back({pair(left, right), draw.between(-1, 1)});
  return terms;
}

void add_fields(std::vector<Term>& terms, Random& draw) {
  for (std::size_t axis = 0; axis < 3; ++axis)
    for (const int qubit : {0, 1}) terms.push_back({on(axis, qubit), draw.between(-1, 1)});
}

/// Couplings and fields that conserve P_a + P_b for an axis P.
std::vector<Term> conserving(std::size_t p, Random& draw, bool antisymmetric, bool fields) {
  const std::size_t q = (p + 1) % 3;
  const std::size_t r = (p + 2) % 3;
  const double exchange = draw.between(-1, 1);
  std::vector<Term> terms = {{pair(q, q), exchange}, {pair(r, r), exchange}};
  if (draw.chance(0.5)) terms.push_back({pair(p, p), draw.between(-1, 1)});
  if (antisymmetric) {
    const double twist = draw.between(-1, 1);
    terms.push_back({pair(q, r), twist});
    terms.push_back({pair(r, q), -twist});
  }
  if (fields) {
    terms.push_back({on(p, 0), draw.between(-1, 1)});
    if (draw.chance(0.5)) terms.push_back({on(p, 1), draw.between(-1, 1)});
  }
  return terms;
}

double random_scale(Random& draw) {
  return pick(draw, std::array{1.0, -1.0, 0.1, 7.0, 1e-3, 1e-9, 1e3, 1e5}) * draw.between(0.5, 1.5);
}

PairMatrix to_pair_matrix(const Matrix& m) {
  PairMatrix result{};
  for (int i = 0; i < 4; ++i) {
    for (int j = 0; j < 4; ++j) {
      result.real[i][j] = static_cast<double>(m(i, j).real());
      result.imag[i][j] = static_cast<double>(m(i, j).imag());
    }
  }
  return result;
}

/// Qubit 1 of the matrices here is the more significant one.
void check_decomposition(const Matrix& special) {
  const PairMatrix given = to_pair_matrix(special);
  const Sequence sequence = decompose(1, 0, given);
  Matrix rounded(4, 4);
  for (int i = 0; i < 4; ++i)
    for (int j = 0; j < 4; ++j) rounded(i, j) = {given.real[i][j], given.imag[i][j]};
  CHECK(sequence.gates.size() == 5);
  CHECK(unitary::distance(matrix(sequence), rounded) <= sequence.rounding + 1e-17L);
  CHECK(sequence.rounding <= 1e-13);
  for (const double c : coordinates(sequence)) CHECK(std::abs(c) <= pi / 4);
}

Matrix gate(GateKind kind, std::array<double, 4> parameters = {}) {
  return unitary::gates_matrix(2, std::array{Gate{kind, 1, 0, parameters}});
}

/// Brings the determinant to 1, in each of the four ways.
void check_all_roots(const Matrix& m) {
  const Matrix special = m / std::pow(m.determinant(), 0.25L);
  for (const unitary::Complex root :
       {unitary::Complex(1), unitary::Complex(0, 1), unitary::Complex(-1), unitary::Complex(0, -1)})
    check_decomposition(root * special);
}

/// A random product of Clifford gates: degenerate in every way.
Matrix random_clifford(Random& draw) {
  std::vector<Gate> gates;
  for (int k = 0; k < 20; ++k) {
    const std::uint32_t q = below(draw, 2);
    switch (below(draw, 3)) {
      case 0:
        gates.push_back({GateKind::h, q, q, {}});
        break;
      case 1:
        gates.push_back({GateKind::s, q, q, {}});
        break;
      default:
        gates.push_back({GateKind::cx, q, 1 - q, {}});
    }
  }
  return unitary::gates_matrix(2, gates);
}

}  // namespace

TEST_CASE("a block on one qubit is one turn") {
  Random draw(1);
  for (int k = 0; k < 200; ++k) {
    const double scale = random_scale(draw);
    const Hamiltonian h = test::hamiltonian(2, {{"X0", k % 2 == 0 ? draw.between(-1, 1) : 0.0},
                                                {"Y0", draw.between(-1, 1)},
                                                {"Z0", draw.between(-1, 1)}});
    const Sequence sequence = block_sequence(h, block_of(h, BlockKind::one_qubit), scale);
    CHECK(sequence.gates.size() == 1);
    const Matrix expected = unitary::evolution(unitary::sum_matrix(2, h.sum), scale);
    CHECK(unitary::distance(matrix(sequence), expected) <=
          sequence.rounding + 1e-17L + 1e-17L * std::abs(Real{scale}));
  }
}

TEST_CASE("couplings without fields") {
  Random draw(2);
  for (int k = 0; k < 300; ++k) {
    std::vector<Term> terms = couplings(draw);
    CHECK(check_block(terms, random_scale(draw)) <= 3);
    terms.resize(1 + below(draw, 8));
    CHECK(check_block(terms, random_scale(draw)) <= 3);
  }
}

TEST_CASE("couplings with fields") {
  Random draw(3);
  for (int k = 0; k < 300; ++k) {
    std::vector<Term> terms = couplings(draw);
    add_fields(terms, draw);
    check_block(terms, random_scale(draw));
    terms.erase(terms.begin(), terms.begin() + 4 + below(draw, 8));
    check_block(terms, random_scale(draw));
  }
}

TEST_CASE("blocks that conserve the sum along an axis") {
  Random draw(4);
  for (std::size_t axis = 0; axis < 3; ++axis) {
    for (int k = 0; k < 120; ++k) {
      const std::vector<Term> terms = conserving(axis, draw, k % 2 == 0, k % 3 != 0);
      CHECK(check_block(terms, random_scale(draw)) <= 3);
    }
  }
}

TEST_CASE("exchange with fields along the conserved axis takes two cx") {
  // XX + YY + b (Z_a + Z_b) + d (Z_a - Z_b): a turn of a spin 1/2 on the states |01>, |10>, so the
  // ZZ coordinate is 0; two cx by Vidal, Dawson 2004, PRA 69, 010301.
  Random draw(5);
  for (std::size_t p = 0; p < 3; ++p) {
    for (int k = 0; k < 40; ++k) {
      const std::size_t q = (p + 1) % 3;
      const std::size_t r = (p + 2) % 3;
      CHECK(check_block({{pair(q, q), 0.6},
                         {pair(r, r), 0.6},
                         {pair(q, r), draw.between(-1, 1)},
                         {on(p, 0), draw.between(-1, 1)}},
                        draw.between(0.1, 0.5)) <= 3);
      CHECK(check_block({{pair(q, q), 0.6}, {pair(r, r), 0.6}, {on(p, 0), draw.between(-1, 1)}},
                        draw.between(0.1, 0.5)) == 2);
    }
  }
}

TEST_CASE("Ising coupling with fields across it takes two cx") {
  // ZZ, X_a, X_b generate turns of two spins 1/2, and the coordinate along X is 0.
  Random draw(6);
  for (std::size_t z = 0; z < 3; ++z) {
    for (int k = 0; k < 60; ++k) {
      const std::size_t x = (z + 1 + static_cast<std::size_t>(k % 2)) % 3;
      std::vector<Term> terms = {{pair(z, z), draw.between(0.3, 1)},
                                 {on(x, 0), draw.between(-1, 1)}};
      if (k % 3 != 0) terms.push_back({on(x, 1), draw.between(-1, 1)});
      CHECK(check_block(terms, draw.between(0.1, 0.5)) == 2);
    }
  }
}

TEST_CASE("cx of the usual couplings") {
  // As many as there are coordinates that are not 0, but two for one; one at the Clifford angle.
  CHECK(check_block({{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0 Z1", 1}}, 0.1) == 3);
  CHECK(check_block({{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0 Z1", 1}, {"Z0", 0.5}, {"Z1", 0.5}}, 0.1) ==
        3);
  CHECK(check_block({{"X0 X1", 1}, {"Y0 Y1", 1}}, 0.1) == 2);
  CHECK(check_block({{"X0 X1", 1}, {"Z0 Z1", 0.4}}, 0.1) == 2);
  CHECK(check_block({{"X0 Y1", 1}}, 0.1) == 2);
  CHECK(check_block({{"Z0 Z1", 1}}, 0.1) == 2);
  for (std::size_t left = 0; left < 3; ++left)
    for (std::size_t right = 0; right < 3; ++right)
      for (const int quarter : {1, -1, 3, 5})
        CHECK(check_block({{pair(left, right), 1}}, quarter * pi / 4) == 1);
  CHECK(check_block({{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0 Z1", 1}}, pi / 2) == 0);
}

TEST_CASE("degenerate blocks") {
  Random draw(7);
  const std::vector<std::vector<Term>> cases = {
      {{"X0 X1", 1}, {"Y0 Y1", -1}},
      {{"X0 Y1", 1}, {"Y0 X1", 1}},
      {{"X0 Y1", 1}, {"Y0 X1", -1}},
      {{"X0 Y1", 1}, {"Y0 X1", -1}, {"Z0", 0.3}, {"Z1", -0.3}},
      {{"X0 X1", 1}, {"X0", 1}, {"X1", 1}},
      {{"Z0 Z1", 1}, {"Z0", 1}, {"Z1", 1}},
      {{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0 Z1", 1}, {"X0", 1}, {"X1", 1}},
      {{"X0 X1", 1},
       {"Y0 Y1", 1},
       {"Z0 Z1", 1},
       {"X0", 0.5},
       {"Y0", 0.5},
       {"X1", 0.5},
       {"Y1", 0.5}},
      {{"X0", 1}},
      {{"Y1", 1}},
      {{"X0", 1}, {"Z1", 0.4}},
      {{"X0 Z1", 1}, {"Z0 X1", 1}},
      {{"X0 X1", 1}, {"X0 Y1", 1e-9}},
      {{"X0 X1", 1}, {"Y0 Y1", 1 + 1e-15}, {"Z0", 0.2}},
      {{"X0 X1", 1}, {"Y0 Y1", 1}, {"Z0", 1e-12}, {"X1", 1e-12}},
  };
  for (const auto& terms : cases) {
    for (int k = -8; k <= 8; ++k) check_block(terms, k * pi / 8);
    for (int k = 0; k < 10; ++k) check_block(terms, random_scale(draw));
  }
}

TEST_CASE("blocks on other qubits of a larger Hamiltonian") {
  const Hamiltonian h = test::hamiltonian(
      4, {{"X1 X3", 0.3}, {"Y1", 0.2}, {"Z3", -0.7}, {"Z1 Y3", 0.5}, {"X0 X1", 9.0}});
  Block block{BlockKind::pair, 1, 3, {}};
  for (std::uint32_t k = 0; k < h.sum.size(); ++k)
    if (h.sum.factors(k).front().qubit() != 0) block.terms.push_back(k);
  REQUIRE(block.terms.size() == 4);
  const Sequence sequence = block_sequence(h, block, 0.8);
  const Matrix made = unitary::gates_matrix(4, sequence.gates, sequence.phase);
  const Matrix expected = unitary::evolution(unitary::terms_matrix(h, block.terms), 0.8);
  CHECK(unitary::distance(made, expected) <= sequence.rounding + 1e-17L);
}

TEST_CASE("random special unitaries are decomposed within the stated rounding") {
  Random draw(8);
  for (int k = 0; k < 1000; ++k) {
    const Hamiltonian h = test::random_two_local(2, draw);
    check_decomposition(unitary::evolution(unitary::sum_matrix(2, h.sum), draw.between(-5, 5)));
  }
}

TEST_CASE("degenerate special unitaries are decomposed") {
  const Matrix identity = Matrix::Identity(4, 4);
  check_all_roots(identity);
  check_all_roots(gate(GateKind::cx));
  check_all_roots(gate(GateKind::cz));
  check_all_roots(gate(GateKind::iswap));
  check_all_roots(gate(GateKind::ecr));
  check_all_roots(gate(GateKind::canonical, {pi / 4, pi / 4, pi / 4}));  // SWAP up to phase
  check_all_roots(gate(GateKind::canonical, {pi / 8, pi / 8, pi / 8}));  // its square root
  // The B gate: Zhang, Vala, Sastry, Whaley 2004, PRL 93, 020502.
  check_all_roots(gate(GateKind::canonical, {pi / 4, pi / 8, 0}));
  Random draw(9);
  for (int k = 0; k < 400; ++k) check_all_roots(random_clifford(draw));
}

TEST_CASE("products of one-qubit gates are decomposed without a canonical gate of weight") {
  Random draw(10);
  for (int k = 0; k < 200; ++k) {
    const Hamiltonian h = test::hamiltonian(2, {{"X0", draw.between(-3, 3)},
                                                {"Z0", draw.between(-3, 3)},
                                                {"Y1", draw.between(-3, 3)},
                                                {"Z1", draw.between(-3, 3)}});
    const Matrix m = unitary::evolution(unitary::sum_matrix(2, h.sum), 1.0L);
    check_all_roots(m);
    CHECK(entanglers(coordinates(decompose(1, 0, to_pair_matrix(m))), Native::cx) == 0);
  }
}

TEST_CASE("nearly degenerate special unitaries are decomposed") {
  Random draw(11);
  for (const double off : {1e-15, 1e-12, 1e-9, 1e-8, 1e-7, 1e-5, 1e-3}) {
    for (int k = 0; k < 60; ++k) {
      const Hamiltonian h = test::random_two_local(2, draw);
      const Matrix small = unitary::evolution(unitary::sum_matrix(2, h.sum), off);
      check_all_roots(random_clifford(draw) * small);
    }
  }
}

TEST_CASE("pair_matrix multiplies turns and canonical gates and cx") {
  Random draw(12);
  for (int k = 0; k < 50; ++k) {
    std::vector<Gate> gates;
    for (int j = 0; j < 8; ++j) {
      const std::uint32_t q = below(draw, 2);
      switch (below(draw, 3)) {
        case 0:
          gates.push_back(turn_gate(
              q,
              rotation(pick(draw, std::array{Pauli::x, Pauli::y, Pauli::z}), draw.between(-3, 3))));
          break;
        case 1:
          gates.push_back({GateKind::canonical,
                           q,
                           1 - q,
                           {draw.between(-2, 2), draw.between(-2, 2), draw.between(-2, 2)}});
          break;
        default:
          gates.push_back({GateKind::cx, q, 1 - q, {}});
      }
    }
    const PairMatrix made = pair_matrix(1, gates);
    const Matrix expected = unitary::gates_matrix(2, gates);
    Matrix difference(4, 4);
    for (int i = 0; i < 4; ++i)
      for (int j = 0; j < 4; ++j)
        difference(i, j) = unitary::Complex(made.real[i][j], made.imag[i][j]) - expected(i, j);
    CHECK(unitary::spectral_norm(difference) <= 1e-14L);
  }
}
