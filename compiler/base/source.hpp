// Source text with positions: from a byte offset to line, column and the line itself.
#pragma once

#include <cstddef>
#include <farrier/diagnostic.hpp>
#include <string>
#include <string_view>

namespace farrier::base {

/// A text and the name that diagnostics call it by.
struct SourceText {
  std::string name;
  std::string text;

  /// A diagnostic that points at a byte offset (clamped to the end of the text).
  [[nodiscard]] Diagnostic at(std::size_t offset, std::string message,
                              Severity severity = Severity::error) const;
  /// Throws UserError(ExitCode::bad_data) that points at a byte offset.
  [[noreturn]] void fail(std::size_t offset, std::string message) const;
};

/// The offset of the first byte that is not part of well-formed UTF-8 (or is a NUL), or npos.
std::size_t find_invalid_utf8(std::string_view text);

/// "farrier: FILE:LINE:COLUMN: error: message", then the source line and a caret below it, each
/// line ended. Control characters are shown as spaces, and a long line is cut around the column.
std::string to_text(const Diagnostic& diagnostic);

}  // namespace farrier::base
