// Plain text for people: columns, lines of limited width, and strings kept to one line.
#include "compiler/back/text.hpp"

#include <algorithm>
#include <array>
#include <charconv>

#include "compiler/base/source.hpp"

namespace farrier::back {
namespace {

constexpr std::size_t item_column = 13;

/// Length in bytes of the control character or line separator at the start of a text; 0 for others.
std::size_t control_length(std::string_view text) {
  const auto first = static_cast<unsigned char>(text[0]);
  if (first < 0x20U || first == 0x7fU) return 1;
  // U+0080 to U+009F are C2 80 to C2 9F; U+2028 and U+2029 are E2 80 A8 and E2 80 A9 (RFC 3629).
  if (first == 0xc2U && text.size() > 1 && static_cast<unsigned char>(text[1]) < 0xa0U) return 2;
  if (text.substr(0, 3) == "\xe2\x80\xa8" || text.substr(0, 3) == "\xe2\x80\xa9") return 3;
  return 0;
}

void append_padded(std::string& out, std::string_view text, std::size_t width, bool right) {
  const std::size_t taken = columns(text);
  const std::size_t padding = taken < width ? width - taken : 0;
  if (right) out.append(padding, ' ');
  out += text;
  if (!right) out.append(padding, ' ');
}

void append_row(std::string& out, const std::vector<Column>& head,
                const std::vector<std::size_t>& widths, const std::vector<std::string>& cells) {
  for (std::size_t k = 0; k < head.size(); ++k) {
    if (k > 0) out += "  ";
    append_padded(out, cells[k], widths[k], head[k].right);
  }
  out.erase(out.find_last_not_of(' ') + 1);
  out += '\n';
}

}  // namespace

std::string one_line(std::string_view text) {
  std::string valid(text);
  for (std::size_t at = 0; at < valid.size();) {
    const std::size_t bad = base::find_invalid_utf8(std::string_view(valid).substr(at));
    if (bad == std::string_view::npos) break;
    at += bad;
    valid[at] = valid[at] == '\0' ? ' ' : '?';
    ++at;
  }
  std::string line;
  line.reserve(valid.size());
  for (std::string_view rest = valid; !rest.empty();) {
    const std::size_t length = control_length(rest);
    line += length > 0 ? ' ' : rest[0];
    rest.remove_prefix(std::max<std::size_t>(length, 1));
  }
  return line;
}

std::size_t columns(std::string_view text) {
  return static_cast<std::size_t>(std::count_if(text.begin(), text.end(), [](char c) {
    return (static_cast<unsigned char>(c) & 0xc0U) != 0x80U;
  }));
}

std::string joined(const std::vector<std::uint32_t>& numbers) {
  std::string text;
  for (const std::uint32_t number : numbers) {
    if (!text.empty()) text += ' ';
    text += std::to_string(number);
  }
  return text;
}

std::string ranges(const std::vector<std::uint32_t>& numbers) {
  std::string text;
  for (std::size_t first = 0; first < numbers.size();) {
    std::size_t last = first;
    while (last + 1 < numbers.size() && numbers[last + 1] == numbers[last] + 1) ++last;
    if (!text.empty()) text += ' ';
    text += std::to_string(numbers[first]);
    if (last > first) text += (last == first + 1 ? ' ' : '-') + std::to_string(numbers[last]);
    first = last + 1;
  }
  return text;
}

std::string six_digits(double value) {
  std::array<char, 32> buffer{};
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value,
                                 std::chars_format::general, 6)
                       .ptr;
  return {buffer.data(), end};
}

void append_wrapped(std::string& out, std::string_view lead, std::string_view text) {
  const std::size_t indent = columns(lead);
  std::size_t at = indent;
  bool first = true;
  out += lead;
  while (!text.empty()) {
    const std::string_view word = text.substr(0, text.find(' '));
    text.remove_prefix(std::min(word.size() + 1, text.size()));
    if (word.empty()) continue;
    const std::size_t width = columns(word);
    if (!first && at + 1 + width > line_width) {
      out += '\n';
      out.append(indent, ' ');
      at = indent;
    } else if (!first) {
      out += ' ';
      ++at;
    }
    out += word;
    at += width;
    first = false;
  }
  out += '\n';
}

void append_item(std::string& out, std::string_view label, std::string_view text) {
  std::string lead = "  ";
  append_padded(lead, label, item_column - 3, false);
  append_wrapped(out, lead + ' ', text);
}

std::string table(const std::vector<Column>& head,
                  const std::vector<std::vector<std::string>>& rows) {
  std::vector<std::string> upper;
  std::vector<std::string> lower;
  for (const Column& column : head) {
    const std::size_t split = column.title.find('\n');
    const bool two = split != std::string::npos;
    upper.push_back(two ? column.title.substr(0, split) : "");
    lower.push_back(two ? column.title.substr(split + 1) : column.title);
  }
  std::vector<std::size_t> widths(head.size());
  const auto widen = [&widths](const std::vector<std::string>& cells) {
    for (std::size_t k = 0; k < widths.size(); ++k) {
      widths[k] = std::max(widths[k], columns(cells[k]));
    }
  };
  widen(upper);
  widen(lower);
  for (const auto& row : rows) widen(row);

  std::string out;
  const auto blank = [](const std::string& title) { return title.empty(); };
  if (!std::all_of(upper.begin(), upper.end(), blank)) append_row(out, head, widths, upper);
  append_row(out, head, widths, lower);
  for (const auto& row : rows) append_row(out, head, widths, row);
  return out;
}

}  // namespace farrier::back
