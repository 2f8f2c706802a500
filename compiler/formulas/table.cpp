// The table of product formulas. A formula is a row; everything else derives from it.
#include <algorithm>
#include <cmath>
#include <farrier/formula.hpp>
#include <iterator>
#include <tuple>

#include "compiler/formulas/rows.hpp"

namespace farrier {
namespace {

using formulas::from_two_operators;
using formulas::mirrored_strang;
using formulas::strang_composition;

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
constexpr std::string_view forest_ruth = "Forest and Ruth 1990, Physica D 43, 105";
constexpr std::string_view yoshida = "Yoshida 1990, Phys. Lett. A 150, 262, solution A";
constexpr std::string_view mclachlan = "McLachlan 1995, SIAM J. Sci. Comput. 16, 151";
constexpr std::string_view kahan_li = "Kahan and Li 1997, Math. Comput. 66, 1089";
constexpr std::string_view suzuki_umeno =
    "Suzuki and Umeno 1993, Springer Proc. Phys. 76, 74; McLachlan 1995, SIAM J. Sci. Comput. 16, "
    "151";
constexpr std::string_view omelyan_2002 =
    "Omelyan, Mryglod and Folk 2002, Comput. Phys. Commun. 146, 188";
constexpr std::string_view omelyan_2003 =
    "Omelyan, Mryglod and Folk 2003, Comput. Phys. Commun. 151, 272";
constexpr std::string_view blanes_moan = "Blanes and Moan 2002, J. Comput. Appl. Math. 142, 313";

constexpr bool when_named = false;  ///< what lost every comparison

std::vector<Formula> published_formulas() {
  const double root19 = std::sqrt(19.0);
  const double root471 = std::sqrt(471.0);
  return {
      {"lie", 1, false, {1.0}, trotter},
      {"strang", 2, true, strang_composition({1.0}), strang},
      {"omelyan-2", 2, true, from_two_operators({0.1931833275037836}, {}), omelyan_2003},
      {"suzuki-4", 4, true, strang_composition(suzuki_weights(4)), suzuki},
      {"forest-ruth-4", 4, true, mirrored_strang({1.351207191959657634}), forest_ruth, when_named},
      {"omelyan-position-4", 4, true,
       from_two_operators({0.1786178958448091, -0.06626458266981849},
                          {(1.0 + 2.0 * 0.2123418310626054) / 2.0}),
       omelyan_2002, when_named},
      {"omelyan-velocity-4-4", 4, true,
       from_two_operators({0.1644986515575760, 1.235692651138917},
                          {(1.0 + 2.0 * 0.02094333910398989) / 2.0}),
       omelyan_2002, when_named},
      {"mclachlan-4-4", 4, true,
       from_two_operators({(642.0 + root471) / 3924.0, 121.0 * (12.0 - root471) / 3924.0},
                          {6.0 / 11.0}),
       mclachlan, when_named},
      {"mclachlan-4-5", 4, true,
       from_two_operators({(14.0 - root19) / 108.0, (20.0 - 7.0 * root19) / 108.0}, {0.4, -0.1}),
       mclachlan},
      {"omelyan-velocity-4-5", 4, true,
       from_two_operators({0.08398315262876693, 0.6822365335719091},
                          {0.2539785108410595, -0.03230286765269967}),
       omelyan_2003},
      {"blanes-moan-4", 4, true,
       from_two_operators({0.0792036964311957, 0.353172906049774, -0.0420650803577195},
                          {0.209515106613362, -0.143851773179818}),
       blanes_moan},
      {"suzuki-6", 6, true, strang_composition(suzuki_weights(6)), suzuki, when_named},
      {"yoshida-6", 6, true,
       mirrored_strang({0.784513610477560, 0.235573213359357, -1.17767998417887}), yoshida,
       when_named},
      {"kahan-li-6", 6, true,
       mirrored_strang({0.39216144400731413928, 0.33259913678935943860, -0.70624617255763935981,
                        0.082213596293550800230}),
       kahan_li, when_named},
      {"blanes-moan-6", 6, true,
       from_two_operators(
           {0.0502627644003922, 0.413514300428344, 0.0450798897943977, -0.188054853819569,
            0.541960678450780},
           {0.148816447901042, -0.132385865767784, 0.067307604692185, 0.432666402578175}),
       blanes_moan},
      {"suzuki-8", 8, true, strang_composition(suzuki_weights(8)), suzuki, when_named},
      {"suzuki-umeno-8", 8, true,
       mirrored_strang({0.74167036435061295345, -0.40910082580003159400, 0.19075471029623837995,
                        -0.57386247111608226666, 0.29906418130365592384, 0.33462491824529818378,
                        0.31529309239676659663}),
       suzuki_umeno},
      {"kahan-li-8", 8, true,
       mirrored_strang({0.13020248308889008088, 0.56116298177510838456, -0.38947496264484728641,
                        0.15884190655515560090, -0.39590389413323757734, 0.18453964097831570709,
                        0.25837438768632204729, 0.29501172360931029887}),
       kahan_li},
  };
}

/// By order; of one order Suzuki's first, as the textbooks have them, then by stages.
std::vector<Formula> all_formulas() {
  std::vector<Formula> table = published_formulas();
  std::ranges::move(formulas::house_sets(), std::back_inserter(table));
  std::ranges::stable_sort(table, {}, [](const Formula& formula) {
    return std::tuple(formula.order, formula.source != suzuki, formula.stages());
  });
  return table;
}

}  // namespace

const std::vector<Formula>& formula_table() {
  static const std::vector<Formula> table = all_formulas();
  return table;
}

const Formula* find_formula(std::string_view name) {
  for (const Formula& formula : formula_table())
    if (formula.name == name) return &formula;
  return nullptr;
}

}  // namespace farrier
