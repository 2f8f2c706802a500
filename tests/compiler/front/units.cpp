// Units against CODATA 2018 (NIST), values from memory: 1 eV corresponds to 2.417989242e14 Hz, the
// Hartree energy to 6.579683920502e15 Hz, and the atomic unit of time is 2.4188843265857e-17 s.
#include "compiler/front/units.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <numbers>
#include <string>

using namespace farrier::front;

namespace {

double factor(std::string_view rate, std::string_view time) {
  return radians_per_time(*find_unit(rate, UnitKind::rate), *find_unit(time, UnitKind::time));
}

constexpr double two_pi = 2.0 * std::numbers::pi;

}  // namespace

TEST_CASE("frequencies whose powers of ten cancel give exactly a turn") {
  CHECK(factor("Hz", "s") == two_pi);
  CHECK(factor("kHz", "ms") == two_pi);
  CHECK(factor("MHz", "us") == two_pi);
  CHECK(factor("GHz", "ns") == two_pi);
  CHECK(factor("rad/s", "s") == 1.0);
  CHECK(factor("rad/us", "us") == 1.0);
  CHECK(factor("rad/ns", "ns") == 1.0);
}

TEST_CASE("powers of ten that do not cancel are rounded once") {
  CHECK(factor("rad/ns", "us") == 1000.0);
  CHECK(factor("rad/us", "ns") == 0.001);
  CHECK(factor("GHz", "us") == two_pi * 1000.0);
  CHECK(factor("kHz", "us") == two_pi / 1000.0);
  CHECK(factor("rad/s", "fs") == 1e-15);
}

TEST_CASE("energies agree with the frequencies that CODATA gives them") {
  const auto near = [](double value) { return doctest::Approx(value).epsilon(1e-9); };
  CHECK(factor("eV", "s") == near(two_pi * 2.417989242e14));
  CHECK(factor("meV", "ps") == near(two_pi * 0.2417989242));
  CHECK(factor("Hartree", "s") == near(two_pi * 6.579683920502e15));
  CHECK(factor("Hartree", "fs") == near(1.0 / 2.4188843265857e-2));
}

TEST_CASE("every pair of units agrees with the plain product") {
  for (const std::string_view rate : unit_words(UnitKind::rate)) {
    for (const std::string_view time : unit_words(UnitKind::time)) {
      const Unit* first = find_unit(rate, UnitKind::rate);
      const Unit* second = find_unit(time, UnitKind::time);
      const double plain =
          first->mantissa * std::pow(10.0, first->power) * std::pow(10.0, second->power);
      CHECK(factor(rate, time) == doctest::Approx(plain).epsilon(1e-14));
    }
  }
}

TEST_CASE("the table holds the documented units and a source for each") {
  const std::vector<std::string_view> rates = {"rad/s", "rad/us", "rad/ns", "Hz", "kHz",
                                               "MHz",   "GHz",    "meV",    "eV", "Hartree"};
  const std::vector<std::string_view> times = {"s", "ms", "us", "ns", "ps", "fs"};
  CHECK(unit_words(UnitKind::rate) == rates);
  CHECK(unit_words(UnitKind::time) == times);
  for (const Unit& unit : unit_table()) CHECK_FALSE(unit.source.empty());
  CHECK(find_unit("MHz", UnitKind::time) == nullptr);
  CHECK(find_unit("us", UnitKind::rate) == nullptr);
}
