// The single list of passes, in running order. Log, help and report derive from it.
#include "passes/table.hpp"

namespace farrier::passes {

const std::vector<Pass>& pass_table() {
  static const std::vector<Pass> table = {
      {"merge_terms",
       "add up equal Pauli strings, drop what cancels",
       {.same_operator = true},
       merge_terms},
      {"group_commuting",
       "split H into layers of commuting terms",
       {.same_operator = true},
       group_commuting},
      {"pair_blocks",
       "split H into layers of disjoint two-qubit blocks",
       {.same_operator = true},
       pair_blocks},
      {"order_layers",
       "offer orders of the layers that are cheap at the seams",
       {.same_operator = true},
       order_layers},
      {"choose_formula",
       "choose formula, layering and steps by certified cost",
       {},
       choose_formula},
      {"synthesise_layers",
       "turn each layer's exponential into gates",
       {.same_operator = true},
       synthesise_layers},
      {"cancel_gates",
       "merge one-qubit runs, cancel inverse pairs, also at seams",
       {.same_operator = true, .never_more_gates = true, .never_more_depth = true},
       cancel_gates},
      {"lower_to_native",
       "replace blocks by native gates and name one-qubit gates",
       {.same_operator = true},
       lower_to_native},
  };
  return table;
}

}  // namespace farrier::passes
