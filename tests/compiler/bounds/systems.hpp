// Small Hamiltonians, split into layers by hand, whose error operators are known from elsewhere; and
// those operators computed with dense matrices in long double.
#pragma once

#include <cstdint>
#include <farrier/formula.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/plan.hpp>
#include <string_view>
#include <utility>
#include <vector>

#include "compiler/bounds/models.hpp"
#include "tests/support/dense.hpp"

namespace farrier::test {

struct System {
  Hamiltonian hamiltonian;
  Layering layering;
};

/// Words and coefficients, a layer each; every term becomes a block.
using LayerTerms = std::vector<std::pair<std::string_view, double>>;
System layered(std::uint32_t qubits, const std::vector<LayerTerms>& layers);

/// The Heisenberg ring on three qubits, J = 1, fields 0.5, -0.3, 0.2; layers XX, YY, ZZ and Z.
System heisenberg_ring();
/// X and 0.7 Z on one qubit.
System two_letters();
/// The transverse-field Ising chain on four qubits, J = g = 1; layers ZZ, X.
System ising_chain();
/// The Heisenberg ring on four qubits in a random field; layers XX, YY, ZZ and Z.
System disordered_ring();

bounds::Question ask(const System& system, std::string_view formula,
                     Assurance assurance = Assurance::certified, bool up_to_phase = false,
                     double time = 1.0);

/// The coefficient of the term of that name; fails the test where there is none.
double coefficient(const bounds::ErrorModel& model, std::string_view name);

/// The powers of s below `degree` of the error's generator with nothing fitted, E(s) of
/// sector_series.hpp: in the midpoint frame for symmetric formulas, in the frame of U^dag else.
std::vector<Matrix<long double>> error_generator(const System& system, const Formula& formula,
                                                 int degree);
/// E(s) itself, with no series.
Matrix<long double> error_generator_at(const System& system, const Formula& formula,
                                       long double s);

}  // namespace farrier::test
