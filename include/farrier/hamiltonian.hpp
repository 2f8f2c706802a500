// A Hamiltonian as the passes see it: qubits, a merged Pauli sum, and where each term came from.
#pragma once

#include <cstdint>
#include <farrier/pauli.hpp>
#include <string>
#include <vector>

namespace farrier {

/// Where a term of the Hamiltonian was written. Line and column count from 1; 0 means unknown.
struct TermOrigin {
  std::uint32_t file = 0;  ///< index into Hamiltonian::files
  std::uint32_t line = 0;
};

/// H = sum of coefficient * Pauli string, with hbar = 1 and coefficients in radians per time unit
/// of the job. Qubit k is the k-th qubit of the circuit before any layout.
struct Hamiltonian {
  std::uint32_t qubits = 0;         ///< at least sum.qubit_span()
  PauliSum sum;                     ///< canonical after the pass merge_terms
  std::vector<TermOrigin> origins;  ///< one a term, or empty where the sum was built by a program
  std::vector<std::string> files;   ///< names of the files that the terms came from
};

/// The 64-bit FNV-1a digest (16 hexadecimal digits) of the canonical Pauli sum: qubit count,
/// constant, and every string with the bits of its coefficient.
std::string digest(const Hamiltonian& hamiltonian);

}  // namespace farrier
