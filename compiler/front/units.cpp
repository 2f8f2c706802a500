// The table of units. A frequency f stands for H = 2 pi f, an energy E for H = E / hbar.
#include "compiler/front/units.hpp"

#include <cstdlib>
#include <numbers>

namespace farrier::front {
namespace {

constexpr double turn = 2.0 * std::numbers::pi;

// CODATA 2018: hbar = 1.054571817e-34 J s, e = 1.602176634e-19 C (exact), and the Hartree energy
// 4.3597447222071e-18 J; here without their powers of ten.
constexpr double hbar = 1.054571817;
constexpr double charge = 1.602176634;
constexpr double hartree = 4.3597447222071;

constexpr std::string_view by_angle = "hbar = 1";
constexpr std::string_view by_turn = "frequency times 2 pi";
constexpr std::string_view by_charge =
    "CODATA 2018: e = 1.602176634e-19 C, hbar = 1.054571817e-34 J s";
constexpr std::string_view by_hartree =
    "CODATA 2018: E_h = 4.3597447222071e-18 J, hbar = 1.054571817e-34 J s";
constexpr std::string_view by_second = "SI";

/// 10^count, exact for the counts up to 22 that occur.
double power_of_ten(int count) {
  double power = 1.0;
  for (int k = 0; k < count; ++k) power *= 10.0;
  return power;
}

}  // namespace

const std::vector<Unit>& unit_table() {
  static const std::vector<Unit> table = {
      {"rad/s", UnitKind::rate, 1.0, 0, by_angle},
      {"rad/us", UnitKind::rate, 1.0, 6, by_angle},
      {"rad/ns", UnitKind::rate, 1.0, 9, by_angle},
      {"Hz", UnitKind::rate, turn, 0, by_turn},
      {"kHz", UnitKind::rate, turn, 3, by_turn},
      {"MHz", UnitKind::rate, turn, 6, by_turn},
      {"GHz", UnitKind::rate, turn, 9, by_turn},
      {"meV", UnitKind::rate, charge / hbar, 12, by_charge},
      {"eV", UnitKind::rate, charge / hbar, 15, by_charge},
      {"Hartree", UnitKind::rate, hartree / hbar, 16, by_hartree},
      {"s", UnitKind::time, 1.0, 0, by_second},
      {"ms", UnitKind::time, 1.0, -3, by_second},
      {"us", UnitKind::time, 1.0, -6, by_second},
      {"ns", UnitKind::time, 1.0, -9, by_second},
      {"ps", UnitKind::time, 1.0, -12, by_second},
      {"fs", UnitKind::time, 1.0, -15, by_second},
  };
  return table;
}

const Unit* find_unit(std::string_view word, UnitKind kind) {
  for (const Unit& unit : unit_table()) {
    if (unit.kind == kind && unit.word == word) return &unit;
  }
  return nullptr;
}

std::vector<std::string_view> unit_words(UnitKind kind) {
  std::vector<std::string_view> words;
  for (const Unit& unit : unit_table()) {
    if (unit.kind == kind) words.push_back(unit.word);
  }
  return words;
}

double radians_per_time(const Unit& rate, const Unit& time) {
  const int power = rate.power + time.power;
  const double mantissa = rate.mantissa * time.mantissa;
  const double scale = power_of_ten(std::abs(power));
  return power < 0 ? mantissa / scale : mantissa * scale;
}

}  // namespace farrier::front
