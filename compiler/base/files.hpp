// Reading whole files, and writing them so that a reader sees the old content or the new, never a
// part.
#pragma once

#include <farrier/diagnostic.hpp>
#include <string>
#include <string_view>

namespace farrier::base {

/// The whole content; "-" reads standard input. Throws UserError: no_input where it cannot be
/// opened (a directory counts as that), io_failed where reading fails.
std::string read_file(const std::string& path);

/// Writes a file. Regular and new files are written to a neighbour in the same folder and renamed,
/// symbolic links followed; devices and FIFOs are written directly; "-" is standard output. Throws
/// UserError: cannot_create, or io_failed; no temporary is left behind.
void write_file(const std::string& path, std::string_view content);

/// Removes the temporary that is being written, if there is one; safe to call from a signal
/// handler.
void discard_temporary() noexcept;

}  // namespace farrier::base
