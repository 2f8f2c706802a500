// Numbers to text and back, without locale.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

namespace farrier::base {

/// The shortest decimal text that reads back as the same double ("0.5", "1e-05", "3").
std::string shortest(double value);

/// A decimal text of `digits` significant digits that is not below the value: for printed bounds.
/// Requires value >= 0; zero prints as "0".
std::string rounded_up(double value, int digits = 6);

/// rounded_up with as many digits as it takes to stay at or below `limit` where the value does.
std::string rounded_up_within(double value, double limit);

/// The whole of `text` as a finite double, with an optional leading sign; none otherwise.
std::optional<double> parse_double(std::string_view text);
/// The whole of `text` as a decimal integer without sign; none otherwise or on overflow.
std::optional<std::uint64_t> parse_unsigned(std::string_view text);

}  // namespace farrier::base
