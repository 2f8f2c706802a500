// What a pass is: a free function on the Hamiltonian, the plan or the circuit, with no state
// between runs, and a row of the table in table.cpp.
#pragma once

#include <farrier/circuit.hpp>
#include <farrier/compile.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/job.hpp>
#include <farrier/plan.hpp>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace farrier::passes {

/// What the user asked for, as far as a pass may know it.
struct Request {
  double time = 0.0;
  Budget budget;
  Restriction restriction;
  Native native = Native::cx;
  Search search;
};

/// Sentences for the log: what a pass saw, what it changed.
using Notes = std::vector<std::string>;

using HamiltonianPass = void (*)(Hamiltonian&, Notes&);
using PlanPass = void (*)(const Hamiltonian&, const Request&, Plan&, Notes&);
using BuildPass = Circuit (*)(const Hamiltonian&, const Plan&, Notes&);
using CircuitPass = void (*)(const Request&, Circuit&, Notes&);

/// What a pass promises; the runner checks what can be checked. The default promises nothing.
struct Promises {
  bool same_operator = false;     ///< exactly, but for rounding that the circuit's bound takes up
  bool never_more_gates = false;  ///< neither all gates nor two-qubit gates
  bool never_more_depth = false;
};

struct Pass {
  std::string_view name;
  std::string_view description;
  Promises promises;
  std::variant<HamiltonianPass, PlanPass, BuildPass, CircuitPass> run;
};

}  // namespace farrier::passes
