// Lattices against counts of graph theory, lists written by hand, and positions in the plane.
#include "compiler/front/lattice.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <map>
#include <set>
#include <string>

using namespace farrier::front;

namespace {

constexpr std::uint64_t all = 1'000'000;
using List = std::vector<std::array<std::uint32_t, 2>>;

Lattice make(std::string_view shape, std::array<std::uint32_t, 2> size,
             std::array<bool, 2> periodic = {false, false}) {
  Lattice lattice;
  lattice.shape = find_shape(shape);
  REQUIRE(lattice.shape != nullptr);
  lattice.size = size;
  lattice.periodic = periodic;
  if (lattice.shape->always_periodic) lattice.periodic[0] = true;
  return lattice;
}

std::size_t bond_count(const Lattice& lattice) {
  return bonds(lattice, every_direction, all).size();
}

List list(const std::vector<Pair>& pairs) {
  List result;
  for (const Pair& pair : pairs) result.push_back({pair.first, pair.second});
  return result;
}

/// How many bonds each site has, as site count by degree.
std::map<std::size_t, std::size_t> degrees(const Lattice& lattice) {
  std::vector<std::size_t> of_site(lattice.sites(), 0);
  for (const Pair& pair : bonds(lattice, every_direction, all)) {
    ++of_site[pair.first];
    ++of_site[pair.second];
  }
  std::map<std::size_t, std::size_t> result;
  for (const std::size_t degree : of_site) ++result[degree];
  return result;
}

/// Squared distance from Cartesian coordinates, over many images: axes at 120 degrees in a
/// triangular lattice, and in a honeycomb at 60 degrees, sqrt(3) long.
double plain_squared_distance(const Lattice& lattice, std::uint32_t a, std::uint32_t b) {
  const double root = std::sqrt(3.0);
  std::array<double, 4> axes{1.0, 0.0, 0.0, 1.0};
  std::array<double, 2> sub{0.0, 0.0};
  if (lattice.shape->name == "triangular") axes = {1.0, 0.0, -0.5, root / 2.0};
  if (lattice.shape->name == "ladder") sub = {0.0, 1.0};
  if (lattice.shape->name == "honeycomb") {
    axes = {root, 0.0, root / 2.0, 1.5};
    sub = {root / 2.0, 0.5};
  }
  const auto coordinates = [&](std::uint32_t site, int shift_x, int shift_y) {
    const std::uint32_t cells = lattice.shape->cell_sites;
    const double x = (site / cells) % lattice.size[0] + shift_x * double(lattice.size[0]);
    const double y = (site / cells) / lattice.size[0] + shift_y * double(lattice.size[1]);
    const double s = site % cells;
    return std::array<double, 2>{x * axes[0] + y * axes[2] + s * sub[0],
                                 x * axes[1] + y * axes[3] + s * sub[1]};
  };
  const auto from = coordinates(a, 0, 0);
  double least = 1e300;
  const int images_x = lattice.periodic[0] ? 7 : 0;
  const int images_y = lattice.periodic[1] ? 7 : 0;
  for (int i = -images_x; i <= images_x; ++i) {
    for (int k = -images_y; k <= images_y; ++k) {
      const auto to = coordinates(b, i, k);
      least = std::min(least, std::pow(to[0] - from[0], 2) + std::pow(to[1] - from[1], 2));
    }
  }
  return least;
}

std::vector<Lattice> samples() {
  std::vector<Lattice> result = {make("chain", {1, 1}),
                                 make("chain", {6, 1}),
                                 make("chain", {7, 1}, {true, false}),
                                 make("ring", {3, 1}),
                                 make("ring", {8, 1}),
                                 make("ladder", {1, 1}),
                                 make("ladder", {5, 1}),
                                 make("ladder", {6, 1}, {true, false})};
  for (const std::string_view shape : {"grid", "triangular", "honeycomb"}) {
    for (const std::array<std::uint32_t, 2> size :
         {std::array<std::uint32_t, 2>{3, 4}, {4, 3}, {5, 5}, {3, 9}, {9, 3}}) {
      for (const bool x : {false, true}) {
        for (const bool y : {false, true}) result.push_back(make(shape, size, {x, y}));
      }
    }
    result.push_back(make(shape, {1, 6}));
    result.push_back(make(shape, {6, 1}));
    result.push_back(make(shape, {2, 2}));
  }
  return result;
}

}  // namespace

TEST_CASE("one-dimensional shapes have the bonds of paths and cycles") {
  for (const std::uint32_t n : {3U, 4U, 9U}) {
    CHECK(bond_count(make("chain", {n, 1})) == n - 1);
    CHECK(bond_count(make("chain", {n, 1}, {true, false})) == n);
    CHECK(bond_count(make("ring", {n, 1})) == n);
    CHECK(bond_count(make("complete", {n, 1})) == n * (n - 1) / 2);
    CHECK(bond_count(make("ladder", {n, 1})) == 3 * n - 2);
    CHECK(bond_count(make("ladder", {n, 1}, {true, false})) == 3 * n);
  }
  CHECK(bond_count(make("chain", {1, 1})) == 0);
  CHECK(bond_count(make("complete", {1, 1})) == 0);
}

TEST_CASE("two-dimensional shapes have the bonds of their rows and columns") {
  for (const std::uint32_t x : {3U, 5U}) {
    for (const std::uint32_t y : {3U, 4U}) {
      const std::size_t rows = (x - 1) * y;
      const std::size_t columns = x * (y - 1);
      const std::size_t squares = (x - 1) * (y - 1);
      CHECK(bond_count(make("grid", {x, y})) == rows + columns);
      CHECK(bond_count(make("triangular", {x, y})) == rows + columns + squares);
      CHECK(bond_count(make("honeycomb", {x, y})) == x * y + rows + columns);
      CHECK(bond_count(make("grid", {x, y}, {true, false})) == x * y + columns);
    }
  }
}

TEST_CASE("periodic shapes are regular graphs") {
  using Degrees = std::map<std::size_t, std::size_t>;
  CHECK(degrees(make("ring", {7, 1})) == Degrees{{2, 7}});
  CHECK(degrees(make("ladder", {5, 1}, {true, false})) == Degrees{{3, 10}});
  CHECK(degrees(make("grid", {3, 4}, {true, true})) == Degrees{{4, 12}});
  CHECK(degrees(make("triangular", {4, 3}, {true, true})) == Degrees{{6, 12}});
  CHECK(degrees(make("honeycomb", {3, 3}, {true, true})) == Degrees{{3, 18}});
}

TEST_CASE("bonds are listed by first site and then by direction") {
  CHECK(list(bonds(make("chain", {4, 1}), every_direction, all)) == List{{0, 1}, {1, 2}, {2, 3}});
  CHECK(list(bonds(make("ring", {3, 1}), every_direction, all)) == List{{0, 1}, {1, 2}, {2, 0}});
  CHECK(list(bonds(make("complete", {4, 1}), every_direction, all)) ==
        List{{0, 1}, {0, 2}, {0, 3}, {1, 2}, {1, 3}, {2, 3}});
  CHECK(list(bonds(make("ladder", {3, 1}), every_direction, all)) ==
        List{{0, 1}, {0, 2}, {1, 3}, {2, 3}, {2, 4}, {3, 5}, {4, 5}});
  CHECK(list(bonds(make("grid", {3, 2}), every_direction, all)) ==
        List{{0, 1}, {0, 3}, {1, 2}, {1, 4}, {2, 5}, {3, 4}, {4, 5}});
  CHECK(list(bonds(make("grid", {3, 2}, {true, false}), every_direction, all)) ==
        List{{0, 1}, {0, 3}, {1, 2}, {1, 4}, {2, 0}, {2, 5}, {3, 4}, {4, 5}, {5, 3}});
  CHECK(list(bonds(make("triangular", {3, 2}), every_direction, all)) ==
        List{{0, 1}, {0, 3}, {0, 4}, {1, 2}, {1, 4}, {1, 5}, {2, 5}, {3, 4}, {4, 5}});
  CHECK(list(bonds(make("honeycomb", {2, 2}), every_direction, all)) ==
        List{{0, 1}, {1, 2}, {1, 4}, {2, 3}, {3, 6}, {4, 5}, {5, 6}, {6, 7}});
}

TEST_CASE("directions split the bonds") {
  CHECK(list(bonds(make("ladder", {3, 1}), 0, all)) == List{{0, 1}, {2, 3}, {4, 5}});
  CHECK(list(bonds(make("ladder", {3, 1}), 1, all)) == List{{0, 2}, {1, 3}, {2, 4}, {3, 5}});
  CHECK(list(bonds(make("triangular", {3, 2}), 2, all)) == List{{0, 4}, {1, 5}});
  CHECK(list(bonds(make("honeycomb", {2, 2}), 0, all)) == List{{0, 1}, {2, 3}, {4, 5}, {6, 7}});
  CHECK(list(bonds(make("honeycomb", {2, 2}), 1, all)) == List{{1, 2}, {5, 6}});
  CHECK(list(bonds(make("honeycomb", {2, 2}), 2, all)) == List{{1, 4}, {3, 6}});
  for (const Lattice& lattice : samples()) {
    std::size_t total = 0;
    for (std::size_t k = 0; k < lattice.shape->directions.size(); ++k) {
      total += bonds(lattice, k, all).size();
    }
    CHECK(total == bond_count(lattice));
  }
}

TEST_CASE("every bond is one step long and stands once") {
  for (const Lattice& lattice : samples()) {
    std::set<std::array<std::uint32_t, 2>> seen;
    for (const Pair& pair : bonds(lattice, every_direction, all)) {
      CHECK(squared_distance(lattice, pair.first, pair.second) == 1);
      CHECK(seen.insert({std::min(pair.first, pair.second), std::max(pair.first, pair.second)})
                .second);
    }
  }
}

TEST_CASE("squared distances agree with positions in the plane") {
  for (const Lattice& lattice : samples()) {
    for (std::uint32_t a = 0; a < lattice.sites(); ++a) {
      for (std::uint32_t b = 0; b < lattice.sites(); ++b) {
        CHECK(double(squared_distance(lattice, a, b)) ==
              doctest::Approx(plain_squared_distance(lattice, a, b)).epsilon(1e-9));
      }
    }
  }
}

TEST_CASE("pairs within a reach are those that a look at all pairs finds") {
  for (const Lattice& lattice : samples()) {
    for (const double reach : {1.0, 1.5, 2.0, 2.7, 4.0, 1e9}) {
      List expected;
      for (std::uint32_t a = 0; a < lattice.sites(); ++a) {
        for (std::uint32_t b = a + 1; b < lattice.sites(); ++b) {
          if (std::sqrt(plain_squared_distance(lattice, a, b)) <= reach * (1.0 + 1e-9)) {
            expected.push_back({a, b});
          }
        }
      }
      CHECK(list(pairs_within(lattice, Distance::euclid, reach, all)) == expected);
    }
  }
}

TEST_CASE("shells have the sizes that number theory gives") {
  const auto shells = [](const Lattice& lattice, double reach) {
    std::map<std::int64_t, std::size_t> count;
    for (const Pair& pair : pairs_within(lattice, Distance::euclid, reach, all)) {
      ++count[pair.squared_distance];
    }
    for (auto& [square, pairs] : count) pairs = 2 * pairs / lattice.sites();
    return count;
  };
  using Shells = std::map<std::int64_t, std::size_t>;
  // Sums of two squares (OEIS A004018): 4 4 0 4 8.
  CHECK(shells(make("grid", {12, 12}, {true, true}), 2.3) ==
        Shells{{1, 4}, {2, 4}, {4, 4}, {5, 8}});
  // Theta series of the hexagonal lattice (OEIS A004016): 6 at 1, 3 and 4, 12 at 7.
  CHECK(shells(make("triangular", {14, 14}, {true, true}), 2.7) ==
        Shells{{1, 6}, {3, 6}, {4, 6}, {7, 12}});
  // Theta series of the honeycomb about a vertex (OEIS A113062): 3 6 3 6.
  CHECK(shells(make("honeycomb", {9, 9}, {true, true}), 2.7) ==
        Shells{{1, 3}, {3, 6}, {4, 3}, {7, 6}});
}

TEST_CASE("graph distances are those of the graph") {
  CHECK(list(pairs_at(make("chain", {5, 1}), 2, all)) == List{{0, 2}, {1, 3}, {2, 4}});
  CHECK(list(pairs_at(make("ring", {4, 1}), 2, all)) == List{{0, 2}, {1, 3}});
  CHECK(pairs_at(make("ring", {9, 1}), 4, all).size() == 9);
  CHECK(pairs_at(make("ring", {9, 1}), 5, all).empty());
  CHECK(list(pairs_at(make("ladder", {3, 1}), 2, all)) ==
        List{{0, 3}, {0, 4}, {1, 2}, {1, 5}, {2, 5}, {3, 4}});
  // Two steps on a torus: 8 sites around each (4 straight, 4 diagonal).
  CHECK(pairs_at(make("grid", {7, 7}, {true, true}), 2, all).size() == 49 * 8 / 2);
  // Second neighbours: 12 in the triangular lattice, 6 in the honeycomb.
  CHECK(pairs_at(make("triangular", {7, 7}, {true, true}), 2, all).size() == 49 * 12 / 2);
  CHECK(pairs_at(make("honeycomb", {5, 5}, {true, true}), 2, all).size() == 50 * 6 / 2);
  CHECK(pairs_at(make("complete", {5, 1}), 1, all).size() == 10);
  CHECK(pairs_at(make("complete", {5, 1}), 2, all).empty());
  for (const Pair& pair : pairs_within(make("grid", {4, 4}), Distance::graph, 3.0, all)) {
    const int dx = std::abs(int(pair.first % 4) - int(pair.second % 4));
    const int dy = std::abs(int(pair.first / 4) - int(pair.second / 4));
    CHECK(pair.squared_distance == (dx + dy) * (dx + dy));
    CHECK(dx + dy <= 3);
  }
}

TEST_CASE("long lists stop early") {
  CHECK(bonds(make("complete", {1000, 1}), every_direction, 10).size() == 11);
  CHECK(bonds(make("grid", {100, 100}), every_direction, 10).size() == 11);
  CHECK(pairs_within(make("chain", {1000, 1}), Distance::euclid, 1e9, 10).size() == 11);
}

TEST_CASE("the table describes every shape") {
  const std::vector<std::string_view> documented = {"chain", "ring",       "complete", "ladder",
                                                    "grid",  "triangular", "honeycomb"};
  CHECK(shape_words() == documented);
  for (const ShapeInfo& shape : shape_table()) {
    CHECK_FALSE(shape.size.empty());
    CHECK_FALSE(shape.numbering.empty());
  }
  CHECK(find_shape("kagome") == nullptr);
}
