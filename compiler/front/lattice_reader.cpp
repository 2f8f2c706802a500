// Attributes of a lattice and its children become terms, drawn at random where a range is given.
#include "compiler/front/lattice_reader.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>
#include <optional>
#include <random>
#include <string>

#include "compiler/base/numbers.hpp"
#include "compiler/front/lattice.hpp"
#include "compiler/front/names.hpp"

namespace farrier::front {
namespace {

/// What one lattice, and one of its children, may hold: far beyond any circuit, within memory.
constexpr std::uint64_t most_sites = 10'000'000;
constexpr std::uint64_t most_pairs = 20'000'000;

/// A value, or the ends of the range that it is drawn from.
struct Strength {
  Pauli letter = Pauli::z;
  double low = 0.0;
  double high = 0.0;
  bool drawn = false;
};

struct LetterName {
  std::string_view field;
  std::string_view coupling;
  Pauli letter;
};

/// In the order in which ranges draw.
constexpr std::array<LetterName, 3> letters = {
    {{"x", "xx", Pauli::x}, {"y", "yy", Pauli::y}, {"z", "zz", Pauli::z}}};

Strength read_strength(const Attribute& attribute, Pauli letter) {
  const std::size_t dots = attribute.value.find("..");
  if (dots == std::string_view::npos) {
    const double value = number_value(attribute);
    return {letter, value, value, false};
  }
  const std::optional<double> low = base::parse_double(attribute.value.substr(0, dots));
  const std::optional<double> high = base::parse_double(attribute.value.substr(dots + 2));
  if (!low || !high || *low > *high || !std::isfinite(*high - *low)) {
    attribute.fail("bad range " + in_quotes(attribute.value) + " of '" +
                   std::string(attribute.name) + "'; expected low..high with low up to high");
  }
  return {letter, *low, *high, true};
}

/// The strengths of a child, at least one; `name` picks the attribute of a letter.
std::vector<Strength> read_strengths(const Element& element, std::string_view LetterName::*name) {
  std::vector<Strength> strengths;
  for (const LetterName& row : letters) {
    if (const auto attribute = element.attribute(row.*name)) {
      strengths.push_back(read_strength(*attribute, row.letter));
    }
  }
  if (strengths.empty()) {
    element.fail(element.tag() + " without a strength; expected '" + std::string(letters[0].*name) +
                 "', '" + std::string(letters[1].*name) + "' or '" + std::string(letters[2].*name) +
                 "'");
  }
  return strengths;
}

/// One child's values: fixed ones as they are, drawn ones from one generator in order.
class Draws {
 public:
  explicit Draws(const Element& element) {
    std::uint64_t seed = 1;
    if (const auto attribute = element.attribute("seed")) {
      seed = whole_value(*attribute, 0, std::numeric_limits<std::uint64_t>::max());
    }
    generator_.seed(seed);
  }

  double value(const Strength& strength) {
    if (!strength.drawn) return strength.low;
    const double unit = static_cast<double>(generator_() >> 11U) * 0x1p-53;
    return strength.low + (strength.high - strength.low) * unit;
  }

 private:
  std::mt19937_64 generator_;
};

Lattice read_geometry(const Element& element) {
  const Attribute name = element.required("shape", "chain");
  Lattice lattice;
  lattice.shape = find_shape(name.value);
  if (lattice.shape == nullptr) {
    name.fail("unknown shape " + in_quotes(name.value) + "; " +
              nearest_of(name.value, shape_words()));
  }
  const ShapeInfo& shape = *lattice.shape;
  const Attribute size = element.required("size", shape.axes == 1 ? "4" : "4 3");
  const std::vector<Item> sides = split(size.value, " \t");
  if (sides.size() != shape.axes) {
    size.fail("bad size " + in_quotes(size.value) + " of a " + std::string(shape.name) +
              "; expected " + std::string(shape.size));
  }
  for (std::size_t axis = 0; axis < shape.axes; ++axis) {
    lattice.size[axis] = static_cast<std::uint32_t>(whole_item(size, sides[axis], 1, most_sites));
  }
  if (lattice.sites() > most_sites) {
    size.fail("a lattice of " + count_of(lattice.sites(), "site") + "; expected no more than " +
              std::to_string(most_sites));
  }
  return lattice;
}

void read_periodic(const Element& element, Lattice& lattice) {
  const ShapeInfo& shape = *lattice.shape;
  lattice.periodic[0] = shape.always_periodic;
  if (const auto attribute = element.attribute("periodic")) {
    const std::vector<Item> words = split(attribute->value, " \t");
    if (words.size() != 1 && words.size() != shape.axes) {
      attribute->fail("bad value " + in_quotes(attribute->value) +
                      " of 'periodic'; expected yes or no" +
                      (shape.axes > 1 ? ", once or for each axis" : ""));
    }
    for (std::size_t axis = 0; axis < shape.axes; ++axis) {
      const Item& word = words[std::min(axis, words.size() - 1)];
      lattice.periodic[axis] = word_item(*attribute, word, &parse_yes_no, yes_no_words());
    }
    const bool asked = lattice.periodic[0];
    if ((shape.always_periodic && !asked) || (!shape.may_be_periodic && asked)) {
      attribute->fail("a " + std::string(shape.name) + " lattice is " +
                      (asked ? "never" : "always") + " periodic; expected " +
                      (asked ? "no" : "yes"));
    }
  }
  const Attribute size = element.required("size", "");
  const std::vector<Item> sides = split(size.value, " \t");
  for (std::size_t axis = 0; axis < shape.axes; ++axis) {
    if (lattice.periodic[axis] && lattice.size[axis] < least_periodic) {
      size.fail("a periodic side of " + std::to_string(lattice.size[axis]) + "; expected " +
                    std::to_string(least_periodic) + " or more",
                sides[axis].offset);
    }
  }
}

std::size_t read_direction(const Element& element, const ShapeInfo& shape) {
  const auto along = element.attribute("along");
  if (!along) return every_direction;
  const auto& names = shape.directions;
  const auto found = std::find(names.begin(), names.end(), along->value);
  if (found == names.end()) {
    along->fail("unknown direction " + in_quotes(along->value) + " of a " +
                std::string(shape.name) + "; " + nearest_of(along->value, names));
  }
  return static_cast<std::size_t>(found - names.begin());
}

std::vector<Pair> bond_pairs(const Element& element, const Lattice& lattice) {
  const std::size_t direction = read_direction(element, *lattice.shape);
  const auto distance = element.attribute("distance");
  if (!distance) return bonds(lattice, direction, most_pairs);
  if (direction != every_direction) {
    distance->fail("'distance' beside 'along'; expected one of them");
  }
  const auto value = static_cast<std::uint32_t>(whole_value(*distance, 1, most_sites));
  return value == 1 ? bonds(lattice, every_direction, most_pairs)
                    : pairs_at(lattice, value, most_pairs);
}

std::vector<Pair> reached_pairs(const Element& element, const Lattice& lattice) {
  double reach = std::numeric_limits<double>::infinity();
  if (const auto attribute = element.attribute("reach")) reach = positive_value(*attribute);
  Distance distance = Distance::euclid;
  if (const auto attribute = element.attribute("metric")) {
    constexpr auto parse = [](std::string_view word) -> std::optional<Distance> {
      if (word == "euclid") return Distance::euclid;
      if (word == "graph") return Distance::graph;
      return std::nullopt;
    };
    distance = word_value<Distance>(*attribute, parse, {"euclid", "graph"});
  }
  return pairs_within(lattice, distance, reach, most_pairs);
}

double read_power(const Element& element) {
  const auto attribute = element.attribute("power");
  if (!attribute) return 0.0;
  const double power = number_value(*attribute);
  if (power < 0.0) {
    attribute->fail("bad value " + in_quotes(attribute->value) +
                    " of 'power'; expected a number from 0 up");
  }
  return power;
}

class LatticeReader {
 public:
  LatticeReader(const Element& element, std::uint32_t file, std::uint32_t limit, TermList& terms,
                std::vector<Diagnostic>& warnings)
      : file_(file), terms_(terms), warnings_(warnings), lattice_(read_geometry(element)) {
    read_periodic(element, lattice_);
    const std::uint64_t most = limit > 0 ? limit : most_qubits;
    if (const auto attribute = element.attribute("first")) {
      first_ = static_cast<std::uint32_t>(whole_value(*attribute, 0, most - 1));
    }
    const std::uint64_t end = first_ + lattice_.sites();
    if (end > most) {
      element.required("size", "")
          .fail("the lattice reaches qubit " + std::to_string(end - 1) +
                "; expected no more than " + std::to_string(most - 1));
    }
    end_ = static_cast<std::uint32_t>(end);
  }

  [[nodiscard]] std::uint32_t end() const { return end_; }

  void read_child(const Element& child) {
    if (child.name() == "site") return read_site(child);
    const bool bond = child.name() == "bond";
    const std::vector<Strength> strengths = read_strengths(child, &LetterName::coupling);
    const double power = bond ? 0.0 : read_power(child);
    const std::vector<Pair> pairs =
        bond ? bond_pairs(child, lattice_) : reached_pairs(child, lattice_);
    if (pairs.size() > most_pairs) {
      child.fail(child.tag() + " joins more than " + std::to_string(most_pairs) +
                 " pairs of sites; expected fewer");
    }
    if (pairs.empty()) warnings_.push_back(child.warning(child.tag() + " joins no pair of sites"));
    add_pairs(child, pairs, strengths, power);
  }

 private:
  void read_site(const Element& child) {
    const std::vector<Strength> strengths = read_strengths(child, &LetterName::field);
    Draws draws(child);
    for (std::uint32_t qubit = first_; qubit < end_; ++qubit) {
      for (const Strength& strength : strengths) {
        const Factor factor(qubit, strength.letter);
        terms_.add({&factor, 1}, draws.value(strength), {file_, child.line()});
      }
    }
  }

  void add_pairs(const Element& child, const std::vector<Pair>& pairs,
                 const std::vector<Strength>& strengths, double power) {
    Draws draws(child);
    const TermOrigin origin{file_, child.line()};
    for (const Pair& pair : pairs) {
      // The power of the squared distance is exact more often than that of its root.
      const double falloff = std::pow(static_cast<double>(pair.squared_distance), power / 2.0);
      const auto [low, high] = std::minmax(pair.first, pair.second);
      for (const Strength& strength : strengths) {
        const std::array<Factor, 2> factors{Factor(first_ + low, strength.letter),
                                            Factor(first_ + high, strength.letter)};
        terms_.add(factors, draws.value(strength) / falloff, origin);
      }
    }
  }

  std::uint32_t file_;
  TermList& terms_;
  std::vector<Diagnostic>& warnings_;
  Lattice lattice_;
  std::uint32_t first_ = 0;
  std::uint32_t end_ = 0;
};

}  // namespace

std::uint32_t read_lattice(const Element& element, std::uint32_t file, std::uint32_t limit,
                           TermList& terms, std::vector<Diagnostic>& warnings) {
  LatticeReader reader(element, file, limit, terms, warnings);
  const std::vector<Element> children = element.children();
  if (children.empty()) element.fail("<lattice> is empty; expected <bond>, <pair> or <site>");
  for (const Element& child : children) reader.read_child(child);
  return reader.end();
}

}  // namespace farrier::front
