// Units of Hamiltonians and of times, and the one factor that removes both.
#pragma once

#include <optional>
#include <string_view>
#include <vector>

namespace farrier::front {

enum class UnitKind { rate, time };

/// A unit is mantissa * 10^power rad/s, or that many seconds. The two are kept apart so that powers
/// of ten cancel exactly where they meet.
struct Unit {
  std::string_view word;
  UnitKind kind = UnitKind::rate;
  double mantissa = 1.0;
  int power = 0;
  std::string_view source;
};

/// Every unit: those of Hamiltonians first.
const std::vector<Unit>& unit_table();

const Unit* find_unit(std::string_view word, UnitKind kind);
std::vector<std::string_view> unit_words(UnitKind kind);

/// What one unit of H is in radians per unit of time: exactly 2 pi for MHz and us.
double radians_per_time(const Unit& rate, const Unit& time);

}  // namespace farrier::front
