// The single list of passes, in running order.
#pragma once

#include <vector>

#include "passes/pass.hpp"

namespace farrier::passes {

const std::vector<Pass>& pass_table();

// One function a row; each is described at the top of the file of its name.
void merge_terms(Hamiltonian& hamiltonian, Notes& notes);
void group_commuting(const Hamiltonian& hamiltonian, const Request& request, Plan& plan,
                     Notes& notes);
void pair_blocks(const Hamiltonian& hamiltonian, const Request& request, Plan& plan, Notes& notes);
void order_layers(const Hamiltonian& hamiltonian, const Request& request, Plan& plan, Notes& notes);
void choose_formula(const Hamiltonian& hamiltonian, const Request& request, Plan& plan,
                    Notes& notes);
Circuit synthesise_layers(const Hamiltonian& hamiltonian, const Plan& plan, Notes& notes);
void cancel_gates(const Request& request, Circuit& circuit, Notes& notes);
void lower_to_native(const Request& request, Circuit& circuit, Notes& notes);

}  // namespace farrier::passes
