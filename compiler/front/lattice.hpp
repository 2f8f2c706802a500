// Lattices: site numbering, bonds and distances, all drawn from one table of shapes.
#pragma once

#include <array>
#include <cstdint>
#include <limits>
#include <string_view>
#include <vector>

namespace farrier::front {

/// A bond that every unit cell has: from its `from`-th site to the `to`-th site of the cell that
/// lies (dx, dy) further.
struct Link {
  std::uint32_t from = 0;
  std::uint32_t to = 0;
  int dx = 0;
  int dy = 0;
  std::size_t direction = 0;  ///< index into ShapeInfo::directions
};

/// Where sites lie in the plane. In steps of 1/cell_step cells, the s-th site of cell (x, y) has
/// the coordinates cell_step * (x, y) + s * offset, and the squared distance of two sites is (a X^2
/// + b X Y + c Y^2) / divisor, a whole number, with nearest neighbours at distance 1.
struct Metric {
  std::int64_t cell_step = 1;
  std::array<std::int64_t, 2> offset{0, 0};
  std::int64_t a = 1;
  std::int64_t b = 0;
  std::int64_t c = 1;
  std::int64_t divisor = 1;
};

/// A row of the table of shapes.
struct ShapeInfo {
  std::string_view name;
  std::string_view size;  ///< what the size attribute holds, such as "Lx Ly"
  std::vector<std::string_view> directions;
  std::string_view numbering;  ///< of the sites
  std::size_t axes = 1;        ///< how many numbers the size has
  std::uint32_t cell_sites = 1;
  bool always_periodic = false;
  bool may_be_periodic = true;
  bool all_pairs = false;  ///< every pair of sites is a bond, at distance 1
  std::vector<Link> links{};
  Metric metric{};
};

const std::vector<ShapeInfo>& shape_table();
const ShapeInfo* find_shape(std::string_view name);
std::vector<std::string_view> shape_words();

/// A finite piece of a shape. A shape with one axis has size[1] = 1.
struct Lattice {
  const ShapeInfo* shape = nullptr;
  std::array<std::uint32_t, 2> size{1, 1};
  std::array<bool, 2> periodic{false, false};

  [[nodiscard]] std::uint64_t sites() const {
    return std::uint64_t{shape->cell_sites} * size[0] * size[1];
  }
};

/// The least size of a periodic axis: below it, two bonds would join the same two sites.
constexpr std::uint32_t least_periodic = 3;

struct Pair {
  std::uint32_t first = 0;
  std::uint32_t second = 0;
  std::int64_t squared_distance = 1;

  friend bool operator==(const Pair&, const Pair&) = default;
};

/// All directions of a shape.
constexpr std::size_t every_direction = std::numeric_limits<std::size_t>::max();

// Each of the following stops early and returns `most` + 1 pairs where there are more than `most`.

/// Nearest neighbours, by first site and then by direction; along one direction or all.
std::vector<Pair> bonds(const Lattice& lattice, std::size_t direction, std::uint64_t most);

/// Pairs of sites at that distance in the graph of the bonds, first < second, in rising order.
std::vector<Pair> pairs_at(const Lattice& lattice, std::uint32_t distance, std::uint64_t most);

enum class Distance { euclid, graph };

/// Pairs of sites up to a distance, first < second, in rising order.
std::vector<Pair> pairs_within(const Lattice& lattice, Distance distance, double reach,
                               std::uint64_t most);

/// Squared distance in the plane, to the nearest image along periodic axes.
std::int64_t squared_distance(const Lattice& lattice, std::uint32_t first, std::uint32_t second);

}  // namespace farrier::front
