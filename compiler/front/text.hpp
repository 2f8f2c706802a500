// Words of the user's in messages.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "compiler/base/source.hpp"

namespace farrier::front {

/// The word in single quotes, cut where it is long.
std::string in_quotes(std::string_view word);

/// "the nearest known one is 'x'", or "known are a, b, c" where none is near.
std::string nearest_of(std::string_view word, const std::vector<std::string_view>& known);

/// "1 letter", "2 letters".
std::string count_of(std::uint64_t count, std::string_view noun);

/// A piece of a list in a text.
struct Item {
  std::string_view text;
  std::size_t offset = 0;  ///< in the list
};

/// The pieces between any of the separators; empty pieces are left out.
std::vector<Item> split(std::string_view list, std::string_view separators);

/// The text without a byte order mark, known to be UTF-8 without NUL bytes; throws UserError
/// (bad_data) where it is something else.
base::SourceText checked_source(std::string name, std::string text);

}  // namespace farrier::front
