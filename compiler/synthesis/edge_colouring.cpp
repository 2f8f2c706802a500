// Proper edge colourings.
#include "compiler/synthesis/edge_colouring.hpp"

#include <algorithm>
#include <cstddef>
#include <farrier/diagnostic.hpp>
#include <optional>

namespace farrier::synthesis {
namespace {

constexpr std::uint32_t none = ~std::uint32_t{0};
using Colours = std::vector<std::uint32_t>;

std::vector<std::uint32_t> degrees(std::uint32_t vertices, const std::vector<Edge>& edges) {
  std::vector<std::uint32_t> degree(vertices, 0);
  for (const auto& [a, b] : edges) {
    ++degree[a];
    ++degree[b];
  }
  return degree;
}

/// The least free colour for each edge in turn.
Colours greedy(std::uint32_t vertices, const std::vector<Edge>& edges) {
  std::vector<std::vector<std::uint32_t>> used(vertices);
  Colours colours;
  for (const auto& [a, b] : edges) {
    std::uint32_t colour = 0;
    while (std::ranges::find(used[a], colour) != used[a].end() ||
           std::ranges::find(used[b], colour) != used[b].end())
      ++colour;
    used[a].push_back(colour);
    used[b].push_back(colour);
    colours.push_back(colour);
  }
  return colours;
}

bool bipartite(std::uint32_t vertices, const std::vector<Edge>& edges) {
  std::vector<std::vector<std::uint32_t>> neighbours(vertices);
  for (const auto& [a, b] : edges) {
    neighbours[a].push_back(b);
    neighbours[b].push_back(a);
  }
  std::vector<int> side(vertices, 0);
  for (std::uint32_t start = 0; start < vertices; ++start) {
    if (side[start] != 0) continue;
    side[start] = 1;
    std::vector<std::uint32_t> stack = {start};
    while (!stack.empty()) {
      const std::uint32_t v = stack.back();
      stack.pop_back();
      for (const std::uint32_t w : neighbours[v]) {
        if (side[w] == side[v]) return false;
        if (side[w] != 0) continue;
        side[w] = -side[v];
        stack.push_back(w);
      }
    }
  }
  return true;
}

/// Which edge has which colour at each vertex, with the moves that both exact methods need.
class Colouring {
 public:
  Colouring(std::uint32_t vertices, const std::vector<Edge>& edges, std::uint32_t colours)
      : edges_(edges),
        colours_(colours),
        at_(vertices, std::vector<std::uint32_t>(colours, none)),
        colour_(edges.size(), none) {}

  [[nodiscard]] std::uint32_t free_colour(std::uint32_t vertex) const {
    const auto found = std::ranges::find(at_[vertex], none);
    if (found == at_[vertex].end()) throw InternalFault("no free colour at a vertex");
    return static_cast<std::uint32_t>(found - at_[vertex].begin());
  }
  [[nodiscard]] bool is_free(std::uint32_t vertex, std::uint32_t colour) const {
    return at_[vertex][colour] == none;
  }
  [[nodiscard]] std::uint32_t other_end(std::uint32_t edge, std::uint32_t vertex) const {
    return edges_[edge].first == vertex ? edges_[edge].second : edges_[edge].first;
  }
  [[nodiscard]] std::uint32_t edge_at(std::uint32_t vertex, std::uint32_t colour) const {
    return at_[vertex][colour];
  }
  [[nodiscard]] std::uint32_t colour_of(std::uint32_t edge) const { return colour_[edge]; }
  [[nodiscard]] const Colours& colours() const { return colour_; }

  void set(std::uint32_t edge, std::uint32_t colour) {
    colour_[edge] = colour;
    at_[edges_[edge].first][colour] = edge;
    at_[edges_[edge].second][colour] = edge;
  }
  void clear(std::uint32_t edge) {
    at_[edges_[edge].first][colour_[edge]] = none;
    at_[edges_[edge].second][colour_[edge]] = none;
    colour_[edge] = none;
  }

  /// Exchanges two colours on the path that starts at `vertex` with the colour `first`.
  void invert_path(std::uint32_t vertex, std::uint32_t first, std::uint32_t second) {
    std::vector<std::uint32_t> path;
    std::uint32_t colour = first;
    while (at_[vertex][colour] != none) {
      path.push_back(at_[vertex][colour]);
      vertex = other_end(path.back(), vertex);
      colour = colour == first ? second : first;
    }
    std::vector<std::uint32_t> old;
    for (const std::uint32_t edge : path) old.push_back(colour_[edge]);
    for (const std::uint32_t edge : path) clear(edge);
    for (std::size_t k = 0; k < path.size(); ++k) set(path[k], old[k] == first ? second : first);
  }

 private:
  const std::vector<Edge>& edges_;
  std::uint32_t colours_;
  std::vector<std::vector<std::uint32_t>> at_;
  Colours colour_;
};

/// Bipartite graphs with as many colours as the largest degree: where the free colours of the ends
/// differ, one alternating path is exchanged; it cannot come back to the other end.
Colours colour_bipartite(std::uint32_t vertices, const std::vector<Edge>& edges,
                         std::uint32_t degree) {
  Colouring colouring(vertices, edges, degree);
  for (std::uint32_t edge = 0; edge < edges.size(); ++edge) {
    const auto [a, b] = edges[edge];
    const std::uint32_t free_a = colouring.free_colour(a);
    const std::uint32_t free_b = colouring.free_colour(b);
    if (!colouring.is_free(b, free_a)) colouring.invert_path(b, free_a, free_b);
    colouring.set(edge, free_a);
  }
  return colouring.colours();
}

/// Round robin on all pairs of n vertices: n - 1 rounds for even n, n for odd n.
std::optional<Colours> colour_complete(std::uint32_t vertices, const std::vector<Edge>& edges) {
  std::vector<std::uint32_t> place(vertices, none);
  std::uint32_t n = 0;
  const auto degree = degrees(vertices, edges);
  for (std::uint32_t v = 0; v < vertices; ++v)
    if (degree[v] > 0) place[v] = n++;
  if (edges.size() != std::size_t{n} * (n - 1) / 2) return std::nullopt;
  const std::uint32_t rounds = n % 2 == 0 ? n - 1 : n;
  Colours colours;
  for (const auto& [a, b] : edges) {
    const std::uint32_t i = std::min(place[a], place[b]);
    const std::uint32_t j = std::max(place[a], place[b]);
    // With n even the last vertex meets vertex i in the round 2 i.
    colours.push_back(n % 2 == 0 && j == n - 1 ? 2 * i % rounds : (i + j) % rounds);
  }
  return colours;
}

/// Misra and Gries: a fan around one end of the new edge, one exchanged path, one rotation.
void add_by_fan(Colouring& colouring, std::uint32_t edge, std::uint32_t u, std::uint32_t v,
                std::uint32_t colour_count) {
  std::vector<std::uint32_t> fan = {edge};
  std::vector<std::uint32_t> tips = {v};
  for (bool grown = true; grown;) {
    grown = false;
    for (std::uint32_t colour = 0; colour < colour_count && !grown; ++colour) {
      const std::uint32_t next = colouring.edge_at(u, colour);
      if (next == none || !colouring.is_free(tips.back(), colour)) continue;
      if (std::ranges::find(fan, next) != fan.end()) continue;
      fan.push_back(next);
      tips.push_back(colouring.other_end(next, u));
      grown = true;
    }
  }
  const std::uint32_t c = colouring.free_colour(u);
  const std::uint32_t d = colouring.free_colour(tips.back());
  colouring.invert_path(u, d, c);
  // The first part of the fan that is still a fan and whose tip has d free.
  std::size_t end = 0;
  for (std::size_t k = 0; k < fan.size(); ++k) {
    if (k > 0 && !colouring.is_free(tips[k - 1], colouring.colour_of(fan[k]))) break;
    if (colouring.is_free(tips[k], d)) {
      end = k;
      break;
    }
  }
  for (std::size_t k = 0; k < end; ++k) {
    const std::uint32_t colour = colouring.colour_of(fan[k + 1]);
    colouring.clear(fan[k + 1]);
    colouring.set(fan[k], colour);
  }
  colouring.set(fan[end], d);
}

Colours colour_any(std::uint32_t vertices, const std::vector<Edge>& edges, std::uint32_t degree) {
  Colouring colouring(vertices, edges, degree + 1);
  for (std::uint32_t edge = 0; edge < edges.size(); ++edge)
    add_by_fan(colouring, edge, edges[edge].first, edges[edge].second, degree + 1);
  return colouring.colours();
}

/// Renumbers colours in the order in which they first occur.
Colours without_gaps(Colours colours) {
  std::vector<std::uint32_t> names;
  for (std::uint32_t& colour : colours) {
    if (colour >= names.size()) names.resize(colour + 1, none);
    if (names[colour] == none)
      names[colour] = static_cast<std::uint32_t>(
          names.size() - static_cast<std::size_t>(std::ranges::count(names, none)));
    colour = names[colour];
  }
  return colours;
}

}  // namespace

std::vector<std::uint32_t> colour_edges(std::uint32_t vertices, const std::vector<Edge>& edges) {
  if (edges.empty()) return {};
  const std::uint32_t degree = std::ranges::max(degrees(vertices, edges));
  Colours colours = greedy(vertices, edges);
  if (std::ranges::max(colours) + 1 <= degree) return colours;
  if (bipartite(vertices, edges)) return without_gaps(colour_bipartite(vertices, edges, degree));
  if (auto complete = colour_complete(vertices, edges)) return without_gaps(std::move(*complete));
  if (std::ranges::max(colours) <= degree) return colours;
  return without_gaps(colour_any(vertices, edges, degree));
}

}  // namespace farrier::synthesis
