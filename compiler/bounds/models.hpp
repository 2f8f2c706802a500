// Every error bound that farrier knows, as models of error against time and steps.
#pragma once

#include <cstdint>
#include <farrier/formula.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/job.hpp>
#include <farrier/plan.hpp>
#include <optional>
#include <string>
#include <vector>

#include "compiler/bounds/error_model.hpp"

namespace farrier::bounds {

/// What to bound: a formula over the layers of H, in the norm of the assurance.
struct Question {
  const Hamiltonian& hamiltonian;
  const Layering& layering;
  const Formula& formula;
  Assurance assurance = Assurance::certified;
  bool up_to_phase = false;
  double time = 0.0;             ///< weighs the accumulating part of the error against the rest
  std::uint64_t work_limit = 0;  ///< products of Pauli strings that one model may cost
};

/// The published commutator bound of order 1 or 2 with every commutator merged; none for other
/// formulas or where the work limit is too small.
///   order 1: t^2/(2r) sum_i ||[B_i, A_i]||
///   order 2: t^3/r^2 sum_i (1/12 ||[B_i,[B_i,A_i]]|| + 1/24 ||[A_i,[A_i,B_i]]||)
/// with A_i layer i and B_i the sum of the layers after it. Source: Childs, Su, Tran, Wiebe, Zhu
/// 2021, PRX 11, 011020, propositions 9 and 10 (numbers from memory). The derivation uses only the
/// triangle inequality and unitary invariance, so it holds in the normalised Frobenius norm too.
std::optional<ErrorModel> published_model(const Question& question);

/// The generator of the error in the midpoint frame: its Taylor coefficients as merged Pauli sums
/// up to s^(degree-2), and a bound on the rest. For time-symmetric formulas only; `degree` is even.
/// None where the work limit is too small.
///
/// With S = L R, R the half that acts first and Z = U^(-1/2) S U^(-1/2),
///   ||S - U|| <= int_0^tau ||E(s)|| ds,  E(s) = T(s) + T(-s),
/// where T starts as -H/2 and every exponential exp(-i a s X) of R, in time order, turns it into
/// exp(-i a s ad_X) T + a X. Odd powers cancel. What the Taylor series of one exponential leaves
/// out is at most |a|^m/m! ||D_X^m T_j|| s^(j+m) for m = degree - j, for every s, and later
/// exponentials only conjugate it.
std::optional<ErrorModel> midpoint_model(const Question& question, int degree);

/// On at most dense_qubits qubits: the generator of the error as dense matrices to a degree, in the
/// frame of exp(-i s^k K_k) for `dressings` fitted K_k, with exact norms. What of the error
/// averages out over the evolution is counted once, as a boundary term, and not once a step. Works
/// for every formula (derivation in sector_series.hpp). None for more qubits, too large sectors, or
/// time 0.
std::optional<ErrorModel> dense_model(const Question& question, int degree, int dressings);
inline constexpr std::uint32_t dense_qubits = 10;
/// Sum of the cubes of the sectors' sizes, above which dense matrices are too dear: one of 2^8
/// states.
inline constexpr double dense_cost = 1.7e7;
/// Whether the dense model is there for a splitting.
bool dense_fits(const Hamiltonian& hamiltonian, const Layering& layering);

/// A bound from 1-norms alone: r [ (L_S tau)^(p+1) + (L_H tau)^(p+1) ] / (p+1)!, L_H the 1-norm of
/// H and L_S the sum of |fraction| times the layer's 1-norm. Both S and U agree with each other up
/// to order p, and the (p+1)-th derivatives are at most L^(p+1). Holds in every case.
ErrorModel coarse_model(const Question& question);

/// Levels of effort for a formula. Level 0: the bound from 1-norms and the published one where
/// there is one; never empty. Where dense matrices fit, levels 1 and 2 are the dense series,
/// shorter and longer; elsewhere level k is the midpoint frame with k explicit orders, each level
/// several times dearer than the one below. Empty where there is no such model or the work limit is
/// too small.
std::vector<ErrorModel> error_models(const Question& question, int level);
inline constexpr int deepest_level = 3;

}  // namespace farrier::bounds
