// Quoting, counting and splitting for messages and lists.
#include "compiler/front/text.hpp"

#include <algorithm>
#include <utility>

#include "compiler/base/suggest.hpp"

namespace farrier::front {
namespace {

char lower(char c) {
  return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
}

bool differ_in_case_only(std::string_view a, std::string_view b) {
  return std::equal(a.begin(), a.end(), b.begin(), b.end(),
                    [](char x, char y) { return lower(x) == lower(y); });
}

}  // namespace

std::string in_quotes(std::string_view word) {
  constexpr std::size_t longest = 40;
  if (word.size() <= longest) return "'" + std::string(word) + "'";
  std::size_t end = longest;
  // Never in the middle of a UTF-8 sequence.
  while (end > 0 && (static_cast<unsigned char>(word[end]) & 0xc0U) == 0x80U) --end;
  return "'" + std::string(word.substr(0, end)) + "...'";
}

std::string nearest_of(std::string_view word, const std::vector<std::string_view>& known) {
  std::string_view near = base::nearest(word, known);
  for (const std::string_view candidate : known) {
    if (differ_in_case_only(word, candidate)) near = candidate;
  }
  if (!near.empty()) return "the nearest known one is '" + std::string(near) + "'";
  if (known.empty()) return "none is known here";
  std::string text = "known are ";
  for (std::size_t k = 0; k < known.size(); ++k) {
    text += (k > 0 ? ", " : "") + std::string(known[k]);
  }
  return text;
}

std::string count_of(std::uint64_t count, std::string_view noun) {
  return std::to_string(count) + " " + std::string(noun) + (count == 1 ? "" : "s");
}

std::vector<Item> split(std::string_view list, std::string_view separators) {
  std::vector<Item> items;
  std::size_t at = list.find_first_not_of(separators);
  while (at != std::string_view::npos) {
    const std::size_t end = std::min(list.find_first_of(separators, at), list.size());
    items.push_back({list.substr(at, end - at), at});
    at = list.find_first_not_of(separators, end);
  }
  return items;
}

base::SourceText checked_source(std::string name, std::string text) {
  constexpr std::string_view mark = "\xef\xbb\xbf";
  if (text.compare(0, mark.size(), mark) == 0) text.erase(0, mark.size());
  base::SourceText source{std::move(name), std::move(text)};
  const std::size_t wrong = base::find_invalid_utf8(source.text);
  if (wrong != std::string::npos) {
    const bool nul = source.text[wrong] == '\0';
    source.fail(wrong, nul ? "NUL byte; expected text" : "invalid UTF-8; expected text in UTF-8");
  }
  return source;
}

}  // namespace farrier::front
