// The two kinds of error: the user's input is wrong, or the program is wrong.
#pragma once

#include <cstddef>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

namespace farrier {

/// Exit codes of the command line (BSD sysexits values where they have one). Errors carry the code
/// that they lead to, so that the driver decides nothing.
enum class ExitCode : int {
  done = 0,
  refused = 1,    ///< a true "no": a budget or limit cannot be met
  usage = 64,     ///< wrong options
  bad_data = 65,  ///< input that cannot be understood
  no_input = 66,  ///< input that cannot be opened
  internal_fault = 70,
  cannot_create = 73,  ///< output that cannot be created
  io_failed = 74,      ///< a read or write that failed
};

enum class Severity { error, warning };

/// One message to the user. Line and column count from 1 (column in bytes); 0 means that the
/// message is about the whole file, and an empty file name that it is about no file.
struct Diagnostic {
  Severity severity = Severity::error;
  std::string file;
  std::size_t line = 0;
  std::size_t column = 0;
  std::string message;      ///< lower case, what is wrong; what was expected
  std::string source_line;  ///< the line that is meant, shown with a caret; may be empty
};

/// The user's input is wrong, or asks for what cannot be had.
class UserError : public std::runtime_error {
 public:
  UserError(ExitCode code, Diagnostic diagnostic)
      : std::runtime_error(diagnostic.message), code_(code), diagnostics_{std::move(diagnostic)} {}
  UserError(ExitCode code, const std::string& message)
      : UserError(code, Diagnostic{Severity::error, "", 0, 0, message, ""}) {}

  [[nodiscard]] ExitCode code() const { return code_; }
  [[nodiscard]] const std::vector<Diagnostic>& diagnostics() const { return diagnostics_; }

 private:
  ExitCode code_;
  std::vector<Diagnostic> diagnostics_;
};

/// The program broke an invariant of its own.
class InternalFault : public std::logic_error {
  using std::logic_error::logic_error;
};

}  // namespace farrier
