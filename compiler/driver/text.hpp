// What the driver says to people: help, diagnostics, and the progress of long work.
#pragma once

#include <chrono>
#include <condition_variable>
#include <farrier/diagnostic.hpp>
#include <mutex>
#include <stop_token>
#include <string>
#include <string_view>
#include <thread>

#include "compiler/driver/options.hpp"

namespace farrier::driver {

/// `farrier --help`: at most 24 lines.
std::string program_help();
/// `farrier VERB --help`: one screen.
std::string verb_help(Verb verb);

/// The diagnostic as lines of text; in colour, the word "error" or "warning" stands out.
std::string diagnostic_text(const Diagnostic& diagnostic, bool colour);

/// Whether standard error is a terminal.
bool error_is_terminal();
/// Whether it also wants colour: a terminal, TERM not "dumb", NO_COLOR unset or empty.
bool error_wants_colour();
/// Writes to standard error, at once; what cannot be written is lost.
void write_error(std::string_view text);

/// Shows on standard error what the program is at. On a terminal it is one line that comes once a
/// stage takes over a second, or at once where progress is always wanted, and is wiped away in the
/// end. Elsewhere it is a line a stage, where it is always wanted, and else nothing.
class Progress {
 public:
  explicit Progress(const Run& run);
  Progress(const Progress&) = delete;
  Progress& operator=(const Progress&) = delete;
  ~Progress();

  /// A stage begins, and the former one ends.
  void stage(const std::string& what);

 private:
  void repaint(const std::stop_token& stop);

  bool lines_ = false;      ///< a line a stage
  bool transient_ = false;  ///< one line, repainted
  std::chrono::seconds patience_{1};
  std::mutex mutex_;
  std::condition_variable_any stopped_;
  std::string what_;
  std::chrono::steady_clock::time_point since_;
  bool painted_ = false;
  std::jthread painter_;  ///< last: it ends before what it uses
};

}  // namespace farrier::driver
