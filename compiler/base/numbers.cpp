// Numbers to text and back by <charconv>, which knows no locale.
#include "compiler/base/numbers.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <system_error>

namespace farrier::base {
namespace {

/// A positive decimal 0.d1 d2 d3 ... * 10^point.
struct Decimal {
  std::string digits;
  int point = 0;
};

/// Every digit of a positive double; 767 significant ones are enough for any (IEEE 754).
Decimal expand(double value) {
  std::array<char, 1100> buffer{};
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value,
                                 std::chars_format::scientific, 800)
                       .ptr;
  const std::string_view text(buffer.data(), static_cast<std::size_t>(end - buffer.data()));
  const std::size_t e = text.find('e');
  Decimal result;
  result.digits = std::string(1, text[0]) + std::string(text.substr(2, e - 2));
  int exponent = 0;
  const char* first = text.data() + e + (text[e + 1] == '+' ? 2 : 1);
  std::from_chars(first, text.data() + text.size(), exponent);
  result.point = exponent + 1;
  return result;
}

void round_up(Decimal& decimal, std::size_t count) {
  const bool exact = decimal.digits.find_first_not_of('0', count) == std::string::npos;
  decimal.digits.resize(count, '0');
  if (!exact) {
    std::size_t k = count;
    while (k > 0 && decimal.digits[k - 1] == '9') decimal.digits[--k] = '0';
    if (k > 0) {
      ++decimal.digits[k - 1];
    } else {
      decimal.digits.insert(decimal.digits.begin(), '1');
      ++decimal.point;
    }
  }
  decimal.digits.erase(decimal.digits.find_last_not_of('0') + 1);
}

std::string fixed_text(const Decimal& decimal) {
  const auto count = static_cast<int>(decimal.digits.size());
  if (decimal.point <= 0) {
    return "0." + std::string(static_cast<std::size_t>(-decimal.point), '0') + decimal.digits;
  }
  if (decimal.point >= count) {
    return decimal.digits + std::string(static_cast<std::size_t>(decimal.point - count), '0');
  }
  const auto whole = static_cast<std::size_t>(decimal.point);
  return decimal.digits.substr(0, whole) + "." + decimal.digits.substr(whole);
}

std::string scientific_text(const Decimal& decimal) {
  const int exponent = decimal.point - 1;
  const std::string magnitude = std::to_string(std::abs(exponent));
  std::string text(1, decimal.digits[0]);
  if (decimal.digits.size() > 1) text += "." + decimal.digits.substr(1);
  text += exponent < 0 ? "e-" : "e+";
  return text + (magnitude.size() < 2 ? "0" : "") + magnitude;
}

}  // namespace

std::string shortest(double value) {
  std::array<char, 64> buffer{};
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value).ptr;
  return {buffer.data(), end};
}

std::string rounded_up(double value, int digits) {
  if (value == 0.0) return "0";
  if (!std::isfinite(value)) return shortest(value);
  Decimal decimal = expand(value);
  round_up(decimal, static_cast<std::size_t>(std::max(digits, 1)));
  const bool plain = decimal.point > -4 && decimal.point <= std::max(digits, 1);
  return plain ? fixed_text(decimal) : scientific_text(decimal);
}

std::string rounded_up_within(double value, double limit) {
  constexpr int fewest = 6;
  constexpr int enough = 24;  // so near to the value that the text reads back as the value itself
  std::string text = rounded_up(value, fewest);
  if (!(value <= limit)) return text;
  for (int digits = fewest + 1; digits <= enough; ++digits) {
    const std::optional<double> read = parse_double(text);
    if (read && *read <= limit) break;
    text = rounded_up(value, digits);
  }
  return text;
}

std::optional<double> parse_double(std::string_view text) {
  if (!text.empty() && text.front() == '+') {
    text.remove_prefix(1);
    if (!text.empty() && text.front() == '-') return std::nullopt;
  }
  double value = 0.0;
  const char* last = text.data() + text.size();
  const auto [end, error] = std::from_chars(text.data(), last, value);
  if (error != std::errc() || end != last || !std::isfinite(value)) return std::nullopt;
  return value;
}

std::optional<std::uint64_t> parse_unsigned(std::string_view text) {
  std::uint64_t value = 0;
  const char* last = text.data() + text.size();
  const auto [end, error] = std::from_chars(text.data(), last, value);
  if (error != std::errc() || end != last) return std::nullopt;
  return value;
}

}  // namespace farrier::base
