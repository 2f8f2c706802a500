// The front end's entry points: a file becomes a job.
#pragma once

#include <farrier/job.hpp>
#include <iosfwd>
#include <optional>
#include <string>

namespace farrier {

enum class InputKind { xml, pauli, fcidump };

/// The kind that a file name's suffix stands for, or none.
std::optional<InputKind> input_kind(const std::string& path);

/// Reads a job file or a bare Hamiltonian. A path of "-" reads standard input, named
/// "<standard input>" in diagnostics. Throws UserError with position: ExitCode::no_input where a
/// file cannot be opened, io_failed where reading fails, bad_data where its content is wrong.
Job read_job(const std::string& path, InputKind kind);

/// The same from text that is already in memory; relative paths in it are resolved against
/// `directory`, and diagnostics call it `name`.
Job read_job_text(const std::string& text, InputKind kind, const std::string& name,
                  const std::string& directory);

}  // namespace farrier
