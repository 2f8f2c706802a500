// The reader of a job file's <hamiltonian>.
#pragma once

#include <cstdint>
#include <farrier/diagnostic.hpp>
#include <string>
#include <vector>

#include "compiler/front/terms.hpp"
#include "compiler/front/xml_document.hpp"

namespace farrier::front {

/// What a <hamiltonian> holds, in its own unit.
struct HamiltonianText {
  TermList terms;
  std::uint32_t qubits = 0;
};

/// Paths of term files are relative to `directory`.
HamiltonianText read_hamiltonian(const Element& element, const base::SourceText& source,
                                 const std::string& directory, std::vector<Diagnostic>& warnings);

}  // namespace farrier::front
