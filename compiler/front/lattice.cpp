// Geometry of lattices. Squared distances are whole numbers in every shape, so nothing is rounded.
#include "compiler/front/lattice.hpp"

#include <algorithm>
#include <cmath>
#include <cstdlib>

namespace farrier::front {
namespace {

std::vector<ShapeInfo> make_shapes() {
  std::vector<ShapeInfo> shapes;
  ShapeInfo chain{"chain", "n", {"x"}, "0 to n-1 along the chain"};
  chain.links = {{0, 0, 1, 0, 0}};
  ShapeInfo ring = chain;
  ring.name = "ring";
  ring.numbering = "0 to n-1 around the ring";
  ring.always_periodic = true;
  ShapeInfo complete{"complete", "n", {}, "0 to n-1; every pair is a bond"};
  complete.may_be_periodic = false;
  complete.all_pairs = true;
  ShapeInfo ladder{"ladder", "L", {"rung", "leg"}, "2*rung + leg"};
  ladder.cell_sites = 2;
  ladder.links = {{0, 1, 0, 0, 0}, {0, 0, 1, 0, 1}, {1, 1, 1, 0, 1}};
  ladder.metric.offset = {0, 1};
  ShapeInfo grid{"grid", "Lx Ly", {"x", "y"}, "x + Lx*y"};
  grid.axes = 2;
  grid.links = {{0, 0, 1, 0, 0}, {0, 0, 0, 1, 1}};
  ShapeInfo triangular = grid;
  triangular.name = "triangular";
  triangular.directions = {"x", "y", "diagonal"};
  triangular.links.push_back({0, 0, 1, 1, 2});
  // The two axes meet at 120 degrees, so that (1, 1) is as long as each of them.
  triangular.metric.b = -1;
  // In a honeycomb, "rung" is the bond within a cell. The axes meet at 60 degrees and are sqrt(3)
  // long; the second site of a cell lies a third of both further.
  ShapeInfo honeycomb{"honeycomb", "Lx Ly", {"rung", "x", "y"}, "2*(x + Lx*y) + s"};
  honeycomb.axes = 2;
  honeycomb.cell_sites = 2;
  honeycomb.links = {{0, 1, 0, 0, 0}, {1, 0, 1, 0, 1}, {1, 0, 0, 1, 2}};
  honeycomb.metric = {3, {1, 1}, 1, 1, 1, 3};
  return {chain, ring, complete, ladder, grid, triangular, honeycomb};
}

/// A site by its cell and its place in the cell.
struct Place {
  std::array<std::int64_t, 2> cell{0, 0};
  std::uint32_t sub = 0;
};

Place place_of(const Lattice& lattice, std::uint32_t site) {
  const std::uint32_t cell = site / lattice.shape->cell_sites;
  return {{cell % lattice.size[0], cell / lattice.size[0]}, site % lattice.shape->cell_sites};
}

/// The site that a link from that place leads to (backwards: comes from); none beyond an open edge.
bool follow(const Lattice& lattice, const Place& from, const Link& link, int sign,
            std::uint32_t& site) {
  std::array<std::int64_t, 2> cell = from.cell;
  const std::array<int, 2> step{link.dx * sign, link.dy * sign};
  for (std::size_t axis = 0; axis < 2; ++axis) {
    const std::int64_t length = lattice.size[axis];
    cell[axis] += step[axis];
    if (lattice.periodic[axis]) cell[axis] = (cell[axis] + length) % length;
    if (cell[axis] < 0 || cell[axis] >= length) return false;
  }
  const std::int64_t index = cell[0] + std::int64_t{lattice.size[0]} * cell[1];
  const std::uint32_t sub = sign > 0 ? link.to : link.from;
  site = static_cast<std::uint32_t>(index * lattice.shape->cell_sites + sub);
  return true;
}

std::vector<Pair> all_pairs(std::uint32_t sites, std::uint64_t most) {
  std::vector<Pair> pairs;
  for (std::uint32_t a = 0; a < sites; ++a) {
    for (std::uint32_t b = a + 1; b < sites; ++b) {
      if (pairs.size() > most) return pairs;
      pairs.push_back({a, b, 1});
    }
  }
  return pairs;
}

/// Breadth-first search over the graph of the bonds, again and again from different sites.
class Search {
 public:
  explicit Search(const Lattice& lattice)
      : lattice_(lattice), seen_(lattice.sites(), 0), depth_(lattice.sites(), 0) {}

  /// Visits the sites around `start` up to `deepest` bonds away, the start itself among them.
  const std::vector<std::uint32_t>& around(std::uint32_t start, std::uint32_t deepest) {
    ++round_;
    order_.clear();
    reach(start, 0);
    for (std::size_t k = 0; k < order_.size(); ++k) {
      const std::uint32_t site = order_[k];
      if (depth_[site] == deepest) break;
      const Place place = place_of(lattice_, site);
      for (const Link& link : lattice_.shape->links) {
        std::uint32_t next = 0;
        if (place.sub == link.from && follow(lattice_, place, link, 1, next)) {
          reach(next, depth_[site] + 1);
        }
        if (place.sub == link.to && follow(lattice_, place, link, -1, next)) {
          reach(next, depth_[site] + 1);
        }
      }
    }
    return order_;
  }

  [[nodiscard]] std::uint32_t depth(std::uint32_t site) const { return depth_[site]; }

 private:
  void reach(std::uint32_t site, std::uint32_t depth) {
    if (seen_[site] == round_) return;
    seen_[site] = round_;
    depth_[site] = depth;
    order_.push_back(site);
  }

  const Lattice& lattice_;
  std::vector<std::uint32_t> seen_;
  std::vector<std::uint32_t> depth_;
  std::vector<std::uint32_t> order_;
  std::uint32_t round_ = 0;
};

/// Pairs that a search finds and `squared` gives a distance to, in rising order; 0 leaves out.
template <typename Squared>
std::vector<Pair> searched_pairs(const Lattice& lattice, std::uint32_t deepest, std::uint64_t most,
                                 const Squared& squared) {
  Search search(lattice);
  std::vector<Pair> pairs;
  const auto sites = static_cast<std::uint32_t>(lattice.sites());
  for (std::uint32_t a = 0; a < sites; ++a) {
    const std::size_t begin = pairs.size();
    for (const std::uint32_t b : search.around(a, deepest)) {
      if (b <= a) continue;
      const std::int64_t value = squared(a, b, search.depth(b));
      if (value > 0) pairs.push_back({a, b, value});
    }
    std::sort(pairs.begin() + static_cast<std::ptrdiff_t>(begin), pairs.end(),
              [](const Pair& left, const Pair& right) { return left.second < right.second; });
    if (pairs.size() > most) {
      pairs.resize(most + 1);
      break;
    }
  }
  return pairs;
}

std::int64_t length_squared(const Metric& metric, std::int64_t x, std::int64_t y) {
  return (metric.a * x * x + metric.b * x * y + metric.c * y * y) / metric.divisor;
}

/// The least squared length of (x + k * period, y) over all whole k, for a form with a = c, so that
/// the same holds with the axes exchanged.
std::int64_t least_along(const Metric& metric, std::int64_t x, std::int64_t y,
                         std::int64_t period) {
  // The parabola in x has its vertex at -b y / 2a; the nearest images on either side of it count.
  const std::int64_t twice = 2 * metric.a * x + metric.b * y;
  const std::int64_t guess = -twice / (2 * metric.a * period);
  std::int64_t least = std::numeric_limits<std::int64_t>::max();
  for (std::int64_t k = guess - 1; k <= guess + 1; ++k) {
    least = std::min(least, length_squared(metric, x + k * period, y));
  }
  return least;
}

}  // namespace

const std::vector<ShapeInfo>& shape_table() {
  static const std::vector<ShapeInfo> shapes = make_shapes();
  return shapes;
}

const ShapeInfo* find_shape(std::string_view name) {
  for (const ShapeInfo& shape : shape_table()) {
    if (shape.name == name) return &shape;
  }
  return nullptr;
}

std::vector<std::string_view> shape_words() {
  std::vector<std::string_view> words;
  for (const ShapeInfo& shape : shape_table()) words.push_back(shape.name);
  return words;
}

std::vector<Pair> bonds(const Lattice& lattice, std::size_t direction, std::uint64_t most) {
  const auto sites = static_cast<std::uint32_t>(lattice.sites());
  if (lattice.shape->all_pairs) return all_pairs(sites, most);
  std::vector<Pair> pairs;
  for (std::uint32_t site = 0; site < sites && pairs.size() <= most; ++site) {
    const Place place = place_of(lattice, site);
    for (const Link& link : lattice.shape->links) {
      const bool wanted = direction == every_direction || direction == link.direction;
      std::uint32_t other = 0;
      if (wanted && link.from == place.sub && follow(lattice, place, link, 1, other)) {
        pairs.push_back({site, other, 1});
      }
    }
  }
  if (pairs.size() > most) pairs.resize(most + 1);
  return pairs;
}

std::vector<Pair> pairs_at(const Lattice& lattice, std::uint32_t distance, std::uint64_t most) {
  if (lattice.shape->all_pairs) {
    return distance == 1 ? bonds(lattice, every_direction, most) : std::vector<Pair>{};
  }
  const std::int64_t square = std::int64_t{distance} * distance;
  return searched_pairs(lattice, distance, most,
                        [&](std::uint32_t, std::uint32_t, std::uint32_t depth) -> std::int64_t {
                          return depth == distance ? square : 0;
                        });
}

std::vector<Pair> pairs_within(const Lattice& lattice, Distance distance, double reach,
                               std::uint64_t most) {
  const auto sites = static_cast<std::uint32_t>(lattice.sites());
  if (lattice.shape->all_pairs) {
    return reach >= 1.0 ? all_pairs(sites, most) : std::vector<Pair>{};
  }
  // A path along bonds is at most twice as long as the way in the plane, but for the edge's
  // corners.
  const double bonds_away = distance == Distance::graph ? reach : 2.0 * reach + 2.0;
  const auto deepest = static_cast<std::uint32_t>(std::min<double>(bonds_away, sites));
  return searched_pairs(
      lattice, deepest, most, [&](std::uint32_t a, std::uint32_t b, std::uint32_t depth) {
        const std::int64_t value = distance == Distance::graph ? std::int64_t{depth} * depth
                                                               : squared_distance(lattice, a, b);
        return std::sqrt(static_cast<double>(value)) <= reach ? value : 0;
      });
}

std::int64_t squared_distance(const Lattice& lattice, std::uint32_t first, std::uint32_t second) {
  if (lattice.shape->all_pairs) return first == second ? 0 : 1;
  const Metric& metric = lattice.shape->metric;
  const Place from = place_of(lattice, first);
  const Place to = place_of(lattice, second);
  std::array<std::int64_t, 2> way{};
  std::array<std::int64_t, 2> period{};
  const std::int64_t sub = std::int64_t{to.sub} - std::int64_t{from.sub};
  for (std::size_t axis = 0; axis < 2; ++axis) {
    way[axis] = metric.cell_step * (to.cell[axis] - from.cell[axis]) + metric.offset[axis] * sub;
    period[axis] = metric.cell_step * lattice.size[axis];
  }
  // The shorter periodic axis is solved exactly for each of the near images along the longer one.
  std::size_t exact = lattice.periodic[0] ? 0 : 1;
  if (lattice.periodic[0] && lattice.periodic[1] && period[1] < period[0]) exact = 1;
  const std::size_t other = 1 - exact;
  if (!lattice.periodic[exact]) return length_squared(metric, way[0], way[1]);
  const std::int64_t images = lattice.periodic[other] ? 2 : 0;
  std::int64_t least = std::numeric_limits<std::int64_t>::max();
  for (std::int64_t k = -images; k <= images; ++k) {
    least = std::min(
        least, least_along(metric, way[exact], way[other] + k * period[other], period[exact]));
  }
  return least;
}

}  // namespace farrier::front
