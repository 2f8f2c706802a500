// What the rows of the table of formulas are made of.
#pragma once

#include <farrier/formula.hpp>
#include <vector>

namespace farrier::formulas {

/// Steps of Strang's formula run one after the other: weight w becomes the ramps w/2, w/2.
std::vector<double> strang_composition(const std::vector<double>& weights);

/// Strang steps with these weights, one more in the middle that makes the sum 1, and the same
/// backwards.
std::vector<double> mirrored_strang(std::vector<double> weights);

/// These ramps and the same backwards.
std::vector<double> mirrored_ramps(std::vector<double> half);

/// A palindrome for two operators, A(a1) B(b1) A(a2) B(b2) ..., as ramps. Each coefficient is the
/// sum of two neighbouring ramps: a1 = r1, b1 = r1 + r2, a2 = r2 + r3, and so on, so that the
/// scheme carries over to any number of operators (McLachlan 1995, SIAM J. Sci. Comput. 16, 151).
/// Takes the coefficients up to the middle without those that consistency gives.
std::vector<double> from_two_operators(const std::vector<double>& a, const std::vector<double>& b);

/// The rows found by search for this program, by order and stages.
std::vector<Formula> house_sets();

}  // namespace farrier::formulas
