// Proper edge colourings: which pairs of qubits can be worked on at the same time.
#pragma once

#include <cstdint>
#include <utility>
#include <vector>

namespace farrier::synthesis {

using Edge = std::pair<std::uint32_t, std::uint32_t>;

/// A colour for each edge so that edges at one vertex differ. Edges are distinct and have two ends;
/// vertices are below `vertices`. As many colours as the largest degree D where the graph is
/// bipartite (Konig 1916) or complete on an even number of vertices (round robin), or where going
/// through the edges in order happens to do; else at most D + 1 (Vizing 1964; Misra, Gries 1992,
/// Inf. Process. Lett. 41, 131). Colours are numbered from 0 without gaps.
std::vector<std::uint32_t> colour_edges(std::uint32_t vertices, const std::vector<Edge>& edges);

}  // namespace farrier::synthesis
