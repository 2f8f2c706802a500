// The table of product formulas. A formula is a row; everything else derives from it.
#include <cmath>
#include <farrier/formula.hpp>
#include <utility>

namespace farrier {
namespace {

/// Steps of Strang's formula run one after the other: weight w becomes the ramps w/2, w/2.
std::vector<double> strang_composition(const std::vector<double>& weights) {
  std::vector<double> ramps;
  for (const double weight : weights) {
    ramps.push_back(weight / 2);
    ramps.push_back(weight / 2);
  }
  return ramps;
}

/// Strang weights of Suzuki's formula of an even order: S_2k(t) = S_2k-2(p t)^2 S_2k-2((1-4p) t)
/// S_2k-2(p t)^2 with p = 1 / (4 - 4^(1/(2k-1))).
std::vector<double> suzuki_weights(int order) {
  if (order == 2) return {1.0};
  const double p = 1.0 / (4.0 - std::pow(4.0, 1.0 / (order - 1)));
  const std::vector<double> inner = suzuki_weights(order - 2);
  std::vector<double> weights;
  for (const double outer : {p, p, 1.0 - 4.0 * p, p, p})
    for (const double weight : inner) weights.push_back(outer * weight);
  return weights;
}

constexpr std::string_view trotter = "Trotter 1959, Proc. Am. Math. Soc. 10, 545";
constexpr std::string_view strang = "Strang 1968, SIAM J. Numer. Anal. 5, 506";
constexpr std::string_view suzuki =
    "Suzuki 1990, Phys. Lett. A 146, 319; 1991, J. Math. Phys. 32, 400";

}  // namespace

const std::vector<Formula>& formula_table() {
  static const std::vector<Formula> table = {
      {"lie", 1, false, {1.0}, trotter},
      {"strang", 2, true, strang_composition({1.0}), strang},
      {"suzuki-4", 4, true, strang_composition(suzuki_weights(4)), suzuki},
      {"suzuki-6", 6, true, strang_composition(suzuki_weights(6)), suzuki},
  };
  return table;
}

const Formula* find_formula(std::string_view name) {
  for (const Formula& formula : formula_table())
    if (formula.name == name) return &formula;
  return nullptr;
}

}  // namespace farrier
