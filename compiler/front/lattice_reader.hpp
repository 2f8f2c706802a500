// The reader of <lattice> elements: couplings and fields on a piece of a lattice.
#pragma once

#include <cstdint>
#include <farrier/diagnostic.hpp>
#include <vector>

#include "compiler/front/terms.hpp"
#include "compiler/front/xml_document.hpp"

namespace farrier::front {

/// Appends a lattice's terms and returns 1 + its highest qubit. Where `limit` is not 0, the lattice
/// may not reach beyond that many qubits. `file` is the job file's index in the list.
std::uint32_t read_lattice(const Element& element, std::uint32_t file, std::uint32_t limit,
                           TermList& terms, std::vector<Diagnostic>& warnings);

}  // namespace farrier::front
