// What the user asks for: a Hamiltonian, times, an error budget, and how the circuit should look.
#pragma once

#include <cstdint>
#include <farrier/diagnostic.hpp>
#include <farrier/hamiltonian.hpp>
#include <optional>
#include <string>
#include <vector>

namespace farrier {

enum class Objective { gates, depth, duration, rotations, error };
enum class Assurance { certified, average };
enum class Style { automatic, flat, looped };
enum class Barriers { none, steps };
enum class Effort { low, normal, high };
enum class Native { cx, cz, ecr, iswap, rzz, rxx };
enum class State { zero, one, plus, minus, plus_i, minus_i };
enum class Basis { x, y, z };

/// The error that may be made, and what is to be least within it.
struct Budget {
  std::optional<double> tolerance;  ///< of the whole evolution; none: reported, not searched
  Assurance assurance = Assurance::certified;
  bool up_to_phase = false;
  Objective minimise = Objective::gates;
  std::optional<std::uint64_t> max_two_qubit_gates;
  std::optional<std::uint64_t> max_depth;
};

/// Narrows the choice of product formula; an empty list restricts nothing.
struct Restriction {
  std::vector<std::string> formulas;
  std::vector<int> orders;
  std::optional<std::uint64_t> steps;

  [[nodiscard]] bool any() const { return !formulas.empty() || !orders.empty() || steps; }
};

struct OutputChoice {
  Style style = Style::automatic;
  Native native = Native::cx;
  std::optional<bool> relabel;  ///< none: yes where the job measures, else no
  Barriers barriers = Barriers::none;
};

struct Search {
  Effort effort = Effort::normal;
  std::uint64_t seed = 1;
};

/// One qubit's state before the evolution.
struct Prepared {
  std::uint32_t qubit = 0;
  State state = State::zero;
};

/// Which qubits are measured after the evolution, and in which basis; qubits in rising order.
struct Measurement {
  Basis basis = Basis::z;
  std::vector<std::uint32_t> qubits;
};

/// A job with units already gone: coefficients in radians per time unit, times in that unit.
struct Job {
  std::string name;  ///< of the job, or the stem of the input's file name
  Hamiltonian hamiltonian;
  std::string time_unit;      ///< "us" and the like; empty where the job is dimensionless
  std::vector<double> times;  ///< in time_unit
  Budget budget;
  Restriction restriction;
  OutputChoice output;
  Search search;
  bool prepares = false;              ///< a <prepare> element is there, perhaps an empty one
  std::vector<Prepared> preparation;  ///< qubits that do not start at zero, by rising index
  std::optional<Measurement> measurement;
  std::string command;               ///< canonical command line, for the circuit's header
  std::vector<Diagnostic> warnings;  ///< found while reading; the driver prints them
};

}  // namespace farrier
