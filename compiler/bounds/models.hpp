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

/// A bound from 1-norms alone: r [ (L_S tau)^(p+1) + (L_H tau)^(p+1) ] / (p+1)!, L_H the 1-norm of
/// H and L_S the sum of |fraction| times the layer's 1-norm. Both S and U agree with each other up
/// to order p, and the (p+1)-th derivatives are at most L^(p+1). Holds in every case.
ErrorModel coarse_model(const Question& question);

/// Levels of effort for a formula. Level 0: the bound from 1-norms, the published one where there
/// is one, and the midpoint frame with nothing but its remainder; never empty. Level k > 0: the
/// midpoint frame with k more explicit orders, several times dearer than the level below; empty
/// where there is no such model or the work limit is too small.
std::vector<ErrorModel> error_models(const Question& question, int level);
inline constexpr int deepest_level = 3;

}  // namespace farrier::bounds
