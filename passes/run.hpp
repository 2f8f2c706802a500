// The only runner of passes.
#pragma once

#include <vector>

#include "passes/pass.hpp"

namespace farrier::passes {

/// Runs every Hamiltonian pass.
void run_hamiltonian_passes(Hamiltonian& hamiltonian, std::vector<PassEntry>& log);

/// Runs every plan pass, starting from a plan with one part that holds all of H.
Plan run_plan_passes(const Hamiltonian& hamiltonian, const Request& request,
                     std::vector<PassEntry>& log);

/// A plan with the layerings that the passes offer, none chosen: what inspect looks at.
Plan offer_layerings(const Hamiltonian& hamiltonian);

/// Turns a finished plan into a circuit of named gates.
Circuit run_circuit_passes(const Hamiltonian& hamiltonian, const Request& request, const Plan& plan,
                           std::vector<PassEntry>& log);

}  // namespace farrier::passes
