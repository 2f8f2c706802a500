// Invariant subspaces against dense matrices, and against the conserved quantities of known systems.
#include "compiler/bounds/sectors.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <bit>
#include <cmath>
#include <cstdint>
#include <numeric>
#include <vector>

#include "tests/compiler/bounds/systems.hpp"
#include "tests/support/random.hpp"

using farrier::Factor;
using farrier::Layer;
using farrier::Pauli;
using farrier::PauliSum;
using farrier::bounds::AxisString;
using farrier::bounds::find_sectors;
using farrier::bounds::in_basis;
using farrier::bounds::Sectors;
using farrier::test::dense;
using farrier::test::layered;
using farrier::test::Matrix;
using farrier::test::Random;
using farrier::test::System;

namespace {

/// (axis + Z)/sqrt(2) on every qubit: its own inverse; the identity for Z itself.
Matrix<double> exchange(Pauli axis, std::uint32_t qubits) {
  Matrix<double> product = Matrix<double>::Identity(1 << qubits, 1 << qubits);
  if (axis == Pauli::z) return product;
  for (std::uint32_t qubit = 0; qubit < qubits; ++qubit) {
    const Matrix<double> one = (dense<double>(std::vector<Factor>{{qubit, axis}}, qubits) +
                                dense<double>(std::vector<Factor>{{qubit, Pauli::z}}, qubits)) /
                               std::sqrt(2.0);
    product = Matrix<double>(one * product);
  }
  return product;
}

/// Bit k of a state is qubit k; a row of a dense matrix has qubit 0 as its highest bit.
Eigen::Index row_of(std::uint32_t state, std::uint32_t qubits) {
  Eigen::Index row = 0;
  for (std::uint32_t qubit = 0; qubit < qubits; ++qubit)
    if (((state >> qubit) & 1U) != 0) row |= Eigen::Index{1} << (qubits - 1 - qubit);
  return row;
}

/// The sectors partition all states, and no layer has an entry between two of them.
void check_invariant(const System& system) {
  const std::uint32_t qubits = system.hamiltonian.qubits;
  const Sectors sectors = find_sectors(system.hamiltonian, system.layering);
  std::vector<std::size_t> sector_of(std::size_t{1} << qubits, ~std::size_t{0});
  std::size_t states = 0;
  for (std::size_t k = 0; k < sectors.states.size(); ++k)
    for (const std::uint32_t state : sectors.states[k]) {
      REQUIRE(state < sector_of.size());
      CHECK(sector_of[state] == ~std::size_t{0});
      sector_of[state] = k;
      ++states;
    }
  CHECK(states == sector_of.size());
  const Matrix<double> basis = exchange(sectors.axis, qubits);
  for (const Layer& layer : system.layering.layers) {
    const Matrix<double> matrix =
        basis.adjoint() * dense<double>(system.hamiltonian, layer) * basis;
    for (std::uint32_t a = 0; a < sector_of.size(); ++a)
      for (std::uint32_t b = 0; b < sector_of.size(); ++b)
        if (sector_of[a] != sector_of[b])
          CHECK(std::abs(matrix(row_of(a, qubits), row_of(b, qubits))) < 1e-13);
  }
}

std::vector<std::size_t> sizes(const System& system) {
  std::vector<std::size_t> result;
  for (const auto& states : find_sectors(system.hamiltonian, system.layering).states)
    result.push_back(states.size());
  std::ranges::sort(result);
  return result;
}

}  // namespace

TEST_CASE("strings in the basis of an axis are the exchanged strings") {
  Random random(81);
  for (const Pauli axis : {Pauli::x, Pauli::y, Pauli::z})
    for (int round = 0; round < 60; ++round) {
      const auto string = farrier::test::random_string(random, 3);
      const AxisString turned = in_basis(string, axis);
      std::vector<Factor> factors;
      for (std::uint32_t qubit = 0; qubit < 3; ++qubit)
        if (const auto letter = ((turned.x >> qubit) & 1U) | (((turned.z >> qubit) & 1U) << 1U);
            letter != 0)
          factors.emplace_back(qubit, static_cast<Pauli>(letter));
      const Matrix<double> basis = exchange(axis, 3);
      const Matrix<double> expected = basis * dense<double>(string, 3) * basis.adjoint();
      const Matrix<double> found = dense<double>(factors, 3) * std::complex<double>(turned.sign);
      CHECK((found - expected).cwiseAbs().maxCoeff() < 1e-14);
    }
}

TEST_CASE("no layer leaves a sector") {
  for (const System& system : {farrier::test::heisenberg_ring(), farrier::test::two_letters(),
                               farrier::test::ising_chain(), farrier::test::disordered_ring()})
    check_invariant(system);
  Random random(82);
  for (int round = 0; round < 40; ++round) {
    System system;
    system.hamiltonian.qubits = random.integer(1, 5);
    for (int k = 0; k < 5; ++k)
      if (const auto string = farrier::test::random_string(random, system.hamiltonian.qubits);
          !string.empty())
        system.hamiltonian.sum.add(string, random.chance(0.5) ? 1.0 : random.between(-1.0, 1.0));
    system.hamiltonian.sum.merge();
    system.layering.layers.resize(2);
    for (std::uint32_t term = 0; term < system.hamiltonian.sum.size(); ++term)
      system.layering.layers[term % 2].blocks.push_back(
          {farrier::BlockKind::string, 0, 0, {term}});
    check_invariant(system);
  }
}

TEST_CASE("the number of ups is conserved where XX and YY stand in one layer") {
  // Sectors of n choose k states: the total Z commutes with both layers.
  const System system = layered(4, {{{"XXII", 1}, {"YYII", 1}, {"ZZII", 1}, {"IIXX", 1},
                                     {"IIYY", 1}, {"IIZZ", 1}},
                                    {{"IXXI", 1}, {"IYYI", 1}, {"IZZI", 0.5}, {"ZIII", 0.3}}});
  CHECK(sizes(system) == std::vector<std::size_t>{1, 1, 4, 4, 6});
}

TEST_CASE("only parities are left where XX and YY stand in layers of their own") {
  const System system = farrier::test::heisenberg_ring();
  CHECK(sizes(system) == std::vector<std::size_t>{4, 4});
  CHECK(find_sectors(system.hamiltonian, system.layering).cost() == 128.0);
}

TEST_CASE("the Ising chain keeps the parity of its transverse axis") {
  const System system = farrier::test::ising_chain();
  CHECK(sizes(system) == std::vector<std::size_t>{8, 8});
  CHECK(find_sectors(system.hamiltonian, system.layering).axis == Pauli::x);
}

TEST_CASE("strings along one axis keep every state") {
  for (const char letter : {'X', 'Y', 'Z'}) {
    const std::string one = {letter, 'I', 'I'};
    const std::string two = {'I', letter, letter};
    const System system = layered(3, {{{one, 1.0}}, {{two, 0.5}}});
    CHECK(sizes(system) == std::vector<std::size_t>(8, 1));
  }
}

TEST_CASE("entries that cancel do not connect") {
  // XX + YY has no entry between 00 and 11, XX - YY none between 01 and 10.
  CHECK(sizes(layered(2, {{{"XX", 0.1}, {"YY", 0.1}}})) == std::vector<std::size_t>{1, 1, 2});
  CHECK(sizes(layered(2, {{{"XX", 0.1}, {"YY", -0.1}}})) == std::vector<std::size_t>{1, 1, 2});
  CHECK(sizes(layered(2, {{{"XX", 0.1}, {"YY", 0.2}}})) == std::vector<std::size_t>{2, 2});
  // In layers of their own they do connect.
  CHECK(sizes(layered(2, {{{"XX", 0.1}}, {{"YY", 0.1}}})) == std::vector<std::size_t>{2, 2});
}
