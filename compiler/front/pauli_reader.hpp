// The reader of text Pauli sums (.pauli).
#pragma once

#include "compiler/base/source.hpp"
#include "compiler/front/terms.hpp"

namespace farrier::front {

/// Appends the terms of a text, each times `scale`, and returns its number of qubits. Where
/// `limit` is not 0, the text may not reach beyond that many qubits.
std::uint32_t read_pauli(const base::SourceText& source, double scale, std::uint32_t limit,
                         TermList& terms);

}  // namespace farrier::front
