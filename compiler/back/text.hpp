// Plain text for people: columns, lines of limited width, and strings kept to one line.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

namespace farrier::back {

/// Width of everything that is meant for a terminal.
inline constexpr std::size_t line_width = 80;

/// The text as one line of well-formed UTF-8: control characters and line separators become spaces,
/// bytes that belong to no character question marks. So it fits a comment and an XML attribute.
std::string one_line(std::string_view text);

/// Columns that the text takes on a terminal (one a character).
std::size_t columns(std::string_view text);

/// The numbers, separated by single spaces.
std::string joined(const std::vector<std::uint32_t>& numbers);
/// The numbers with runs of neighbours drawn together: "0-3 6".
std::string ranges(const std::vector<std::uint32_t>& numbers);

/// To six significant digits, for values that are no bounds.
std::string six_digits(double value);

/// Appends `lead` and then the words of `text`, broken between words so that lines stay within
/// line_width; lines after the first are indented by the width of `lead`.
void append_wrapped(std::string& out, std::string_view lead, std::string_view text);

/// Appends a line "  label      text" (the text starts in column 14), wrapped.
void append_item(std::string& out, std::string_view label, std::string_view text);

struct Column {
  std::string title;   ///< one line or two
  bool right = false;  ///< numbers stand right
};

/// Aligned columns, two spaces apart, below their titles; no trailing spaces.
std::string table(const std::vector<Column>& head,
                  const std::vector<std::vector<std::string>>& rows);

}  // namespace farrier::back
