// Edge colourings: proper, without gaps, and with as few colours as the theorems promise.
#include "compiler/synthesis/edge_colouring.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cstdint>
#include <set>
#include <utility>
#include <vector>

#include "tests/support/hamiltonians.hpp"

using namespace farrier::synthesis;
using farrier::test::Random;

namespace {

using Edges = std::vector<Edge>;

std::uint32_t largest_degree(std::uint32_t vertices, const Edges& edges) {
  std::vector<std::uint32_t> degree(vertices, 0);
  for (const auto& [a, b] : edges) {
    ++degree[a];
    ++degree[b];
  }
  return *std::ranges::max_element(degree);
}

/// The number of colours, after checking that they are proper and numbered without gaps.
std::uint32_t colours(std::uint32_t vertices, const Edges& edges) {
  const std::vector<std::uint32_t> colour = colour_edges(vertices, edges);
  REQUIRE(colour.size() == edges.size());
  std::set<std::pair<std::uint32_t, std::uint32_t>> used;
  std::set<std::uint32_t> names;
  bool proper = true;
  for (std::size_t k = 0; k < edges.size(); ++k) {
    proper = proper && used.emplace(edges[k].first, colour[k]).second;
    proper = proper && used.emplace(edges[k].second, colour[k]).second;
    names.insert(colour[k]);
  }
  CHECK(proper);
  const auto count = static_cast<std::uint32_t>(names.size());
  CHECK((names.empty() || *names.rbegin() + 1 == count));
  return count;
}

Edges path(std::uint32_t n) {
  Edges edges;
  for (std::uint32_t k = 0; k + 1 < n; ++k) edges.emplace_back(k, k + 1);
  return edges;
}

Edges ring(std::uint32_t n) {
  Edges edges = path(n);
  edges.emplace_back(n - 1, 0);
  return edges;
}

Edges grid(std::uint32_t width, std::uint32_t height, bool diagonal) {
  Edges edges;
  for (std::uint32_t y = 0; y < height; ++y) {
    for (std::uint32_t x = 0; x < width; ++x) {
      const std::uint32_t site = x + width * y;
      if (x + 1 < width) edges.emplace_back(site, site + 1);
      if (y + 1 < height) edges.emplace_back(site, site + width);
      if (diagonal && x + 1 < width && y + 1 < height) edges.emplace_back(site, site + width + 1);
    }
  }
  return edges;
}

Edges complete(std::uint32_t n) {
  Edges edges;
  for (std::uint32_t a = 0; a < n; ++a)
    for (std::uint32_t b = a + 1; b < n; ++b) edges.emplace_back(a, b);
  return edges;
}

/// A brick wall with a vertex put on every edge: degrees 3 and 2, as in heavy hexagons.
Edges heavy_hexagons(std::uint32_t width, std::uint32_t height, std::uint32_t& vertices) {
  Edges bricks;
  for (std::uint32_t y = 0; y < height; ++y) {
    for (std::uint32_t x = 0; x < width; ++x) {
      const std::uint32_t site = x + width * y;
      if (x + 1 < width) bricks.emplace_back(site, site + 1);
      if (y + 1 < height && (x + y) % 2 == 0) bricks.emplace_back(site, site + width);
    }
  }
  vertices = width * height;
  Edges edges;
  for (const auto& [a, b] : bricks) {
    edges.emplace_back(a, vertices);
    edges.emplace_back(vertices++, b);
  }
  return edges;
}

void shuffle(Edges& edges, Random& draw) {
  for (std::size_t k = edges.size(); k > 1; --k)
    std::swap(edges[k - 1], edges[below(draw, static_cast<std::uint32_t>(k))]);
  for (auto& [a, b] : edges)
    if (draw.chance(0.5)) std::swap(a, b);
}

Edges random_graph(std::uint32_t vertices, double density, Random& draw) {
  Edges edges;
  for (const Edge& edge : complete(vertices))
    if (draw.between(0, 1) < density) edges.push_back(edge);
  shuffle(edges, draw);
  return edges;
}

}  // namespace

TEST_CASE("no edge takes no colour") {
  CHECK(colour_edges(0, {}).empty());
  CHECK(colour_edges(5, {}).empty());
}

TEST_CASE("one edge takes one colour") {
  CHECK(colours(7, {{2, 5}}) == 1);
}

TEST_CASE("chains and even rings take two colours - odd rings three") {
  Random draw(1);
  for (std::uint32_t n = 3; n <= 60; ++n) {
    Edges chain = path(n);
    Edges loop = ring(n);
    CHECK(colours(n, chain) == 2);
    CHECK(colours(n, loop) == (n % 2 == 0 ? 2 : 3));
    shuffle(chain, draw);
    shuffle(loop, draw);
    CHECK(colours(n, chain) == 2);
    CHECK(colours(n, loop) == (n % 2 == 0 ? 2 : 3));
  }
}

TEST_CASE("grids take four colours - ladders and heavy hexagons three") {
  Random draw(2);
  for (int k = 0; k < 10; ++k) {
    Edges square = grid(3 + below(draw, 10), 3 + below(draw, 10), false);
    Edges ladder = grid(2, 3 + below(draw, 20), false);
    std::uint32_t vertices = 0;
    Edges hexagons = heavy_hexagons(5 + below(draw, 4), 3 + below(draw, 4), vertices);
    if (k > 0) {
      shuffle(square, draw);
      shuffle(ladder, draw);
      shuffle(hexagons, draw);
    }
    CHECK(colours(200, square) == 4);
    CHECK(colours(200, ladder) == 3);
    CHECK(colours(vertices, hexagons) == 3);
  }
}

TEST_CASE("complete graphs take n - 1 colours for even n and n for odd n") {
  // Round robin; n - 1 is the degree, and with n odd a colour covers at most (n - 1)/2 edges.
  Random draw(3);
  for (std::uint32_t n = 2; n <= 31; ++n) {
    Edges edges = complete(n);
    CHECK(colours(n, edges) == (n % 2 == 0 ? n - 1 : n));
    shuffle(edges, draw);
    // Vertices without an edge do not matter.
    for (auto& [a, b] : edges) a += 5, b += 5;
    CHECK(colours(n + 9, edges) == (n % 2 == 0 ? n - 1 : n));
  }
}

TEST_CASE("stars take a colour an edge") {
  for (std::uint32_t n = 2; n < 50; ++n) {
    Edges edges;
    for (std::uint32_t k = 1; k < n; ++k) edges.emplace_back(k, 0);
    CHECK(colours(n, edges) == n - 1);
  }
}

TEST_CASE("bipartite graphs take as many colours as the largest degree") {
  // Konig 1916, Math. Ann. 77, 453.
  Random draw(4);
  for (int k = 0; k < 100; ++k) {
    const std::uint32_t left = 1 + below(draw, 20);
    const std::uint32_t right = 1 + below(draw, 20);
    const double density = draw.between(0.05, 1.0);
    Edges edges;
    for (std::uint32_t a = 0; a < left; ++a)
      for (std::uint32_t b = 0; b < right; ++b)
        if (draw.between(0, 1) < density) edges.emplace_back(a, left + b);
    if (edges.empty()) continue;
    shuffle(edges, draw);
    CHECK(colours(left + right, edges) == largest_degree(left + right, edges));
  }
}

TEST_CASE("every graph takes at most one colour more than the largest degree") {
  // Vizing 1964; and no fewer than the degree.
  Random draw(5);
  for (int k = 0; k < 150; ++k) {
    const std::uint32_t n = 3 + below(draw, k % 10 == 0 ? 198 : 30);
    const Edges edges = random_graph(n, draw.between(0.02, 1.0), draw);
    if (edges.empty()) continue;
    const std::uint32_t degree = largest_degree(n, edges);
    const std::uint32_t count = colours(n, edges);
    CHECK(count >= degree);
    CHECK(count <= degree + 1);
  }
}

TEST_CASE("nearly complete graphs and triangular lattices keep to the bound of Vizing") {
  Random draw(6);
  for (std::uint32_t n = 4; n <= 14; ++n) {
    for (int k = 0; k < 10; ++k) {
      Edges edges = complete(n);
      shuffle(edges, draw);
      edges.resize(edges.size() - 1 - below(draw, 3));
      CHECK(colours(n, edges) <= largest_degree(n, edges) + 1);
    }
  }
  Edges triangles = grid(12, 12, true);
  CHECK(colours(144, triangles) <= 7);
  shuffle(triangles, draw);
  CHECK(colours(144, triangles) <= 7);
}

TEST_CASE("the same edges get the same colours") {
  Random draw(7);
  const Edges edges = random_graph(40, 0.4, draw);
  CHECK(colour_edges(40, edges) == colour_edges(40, edges));
}
