// Positions in a text, well-formed UTF-8, and diagnostics as lines with a caret.
#include "compiler/base/source.hpp"

#include <algorithm>
#include <cstdint>
#include <cstring>
#include <utility>
#include <vector>

namespace farrier::base {
namespace {

constexpr std::size_t npos = std::string_view::npos;

/// Length of the well-formed UTF-8 sequence at the start of a text that is not empty, or 0
/// (RFC 3629, section 4).
std::size_t sequence_length(std::string_view text) {
  const auto byte = [&](std::size_t k) { return static_cast<unsigned char>(text[k]); };
  const unsigned lead = byte(0);
  if (lead < 0x80) return 1;
  const std::size_t length = lead >= 0xc2 && lead <= 0xdf   ? 2
                             : lead >= 0xe0 && lead <= 0xef ? 3
                             : lead >= 0xf0 && lead <= 0xf4 ? 4
                                                            : 0;
  if (length == 0 || length > text.size()) return 0;
  for (std::size_t k = 1; k < length; ++k) {
    if ((byte(k) & 0xc0U) != 0x80U) return 0;
  }
  // Overlong forms, surrogates, and what lies beyond U+10FFFF.
  const unsigned second = byte(1);
  const bool wrong = (lead == 0xe0 && second < 0xa0) || (lead == 0xed && second > 0x9f) ||
                     (lead == 0xf0 && second < 0x90) || (lead == 0xf4 && second > 0x8f);
  return wrong ? 0 : length;
}

/// True where eight bytes are all ASCII and none of them is NUL.
bool plain_block(const char* bytes) {
  std::uint64_t word = 0;
  std::memcpy(&word, bytes, sizeof word);
  constexpr std::uint64_t ones = 0x0101010101010101ULL;
  constexpr std::uint64_t highs = 0x8080808080808080ULL;
  return (word & highs) == 0 && ((word - ones) & highs) == 0;
}

/// What one character of a text looks like on a terminal: control characters as a space, bytes
/// that are no UTF-8 as a question mark.
struct Shown {
  std::string_view text;
  std::size_t length;  ///< bytes taken from the source
};

Shown shown_character(std::string_view text) {
  const std::size_t length = sequence_length(text);
  if (length == 0) return {"?", 1};
  const auto lead = static_cast<unsigned char>(text[0]);
  const bool control =
      lead < 0x20 || lead == 0x7f || (lead == 0xc2 && static_cast<unsigned char>(text[1]) < 0xa0);
  return {control ? std::string_view(" ") : text.substr(0, length), length};
}

std::string shown_text(std::string_view text) {
  std::string result;
  while (!text.empty()) {
    const Shown character = shown_character(text);
    result += character.text;
    text.remove_prefix(character.length);
  }
  return result;
}

/// The source line and a caret below its `column`-th byte, cut where the line is long.
std::string excerpt(std::string_view line, std::size_t column) {
  constexpr std::size_t widest = 100;
  constexpr std::size_t before_caret = 60;
  std::vector<std::string_view> cells;
  std::size_t caret = npos;
  for (std::size_t at = 0; at < line.size();) {
    const Shown character = shown_character(line.substr(at));
    if (column > 0 && at + character.length >= column && caret == npos) caret = cells.size();
    cells.push_back(character.text);
    at += character.length;
  }
  if (caret == npos) caret = cells.size();
  std::size_t first = 0;
  std::size_t last = cells.size();
  if (cells.size() > widest) {
    first = std::min(caret > before_caret ? caret - before_caret : 0, cells.size() - widest);
    last = first + widest;
  }
  std::string result = first > 0 ? "..." : "";
  const std::size_t indent = result.size() + caret - first;
  for (std::size_t k = first; k < last; ++k) result += cells[k];
  result += last < cells.size() ? "...\n" : "\n";
  if (column > 0) result += std::string(indent, ' ') + "^\n";
  return result;
}

}  // namespace

Diagnostic SourceText::at(std::size_t offset, std::string message, Severity severity) const {
  offset = std::min(offset, text.size());
  const std::string_view before(text.data(), offset);
  const std::size_t newline = before.rfind('\n');
  const std::size_t begin = newline == npos ? 0 : newline + 1;
  std::size_t end = std::min(text.find('\n', begin), text.size());
  if (end > begin && text[end - 1] == '\r') --end;
  Diagnostic result;
  result.severity = severity;
  result.file = name;
  result.line = 1 + static_cast<std::size_t>(std::count(before.begin(), before.end(), '\n'));
  result.column = 1 + offset - begin;
  result.message = std::move(message);
  result.source_line = text.substr(begin, end - begin);
  return result;
}

void SourceText::fail(std::size_t offset, std::string message) const {
  throw UserError(ExitCode::bad_data, at(offset, std::move(message)));
}

std::size_t find_invalid_utf8(std::string_view text) {
  std::size_t at = 0;
  while (at < text.size()) {
    if (text.size() - at >= 8 && plain_block(text.data() + at)) {
      at += 8;
      continue;
    }
    const std::size_t length = text[at] == '\0' ? 0 : sequence_length(text.substr(at));
    if (length == 0) return at;
    at += length;
  }
  return npos;
}

std::string to_text(const Diagnostic& diagnostic) {
  std::string result = "farrier: ";
  if (!diagnostic.file.empty()) {
    result += shown_text(diagnostic.file) + ":";
    if (diagnostic.line > 0) result += std::to_string(diagnostic.line) + ":";
    if (diagnostic.line > 0 && diagnostic.column > 0) {
      result += std::to_string(diagnostic.column) + ":";
    }
    result += " ";
  }
  result += diagnostic.severity == Severity::warning ? "warning: " : "error: ";
  result += shown_text(diagnostic.message) + "\n";
  if (!diagnostic.source_line.empty()) {
    result += excerpt(diagnostic.source_line, diagnostic.column);
  }
  return result;
}

}  // namespace farrier::base
