// Help is rendered from the tables of verbs and options, so that it cannot fall behind them.
#include "compiler/driver/text.hpp"

#include <unistd.h>

#include <algorithm>
#include <cstdio>
#include <cstdlib>
#include <farrier/version.hpp>

#include "compiler/back/text.hpp"
#include "compiler/base/source.hpp"

namespace farrier::driver {
namespace {

constexpr std::string_view wipe = "\r\033[K";

/// Two columns: labels of equal width, then texts, wrapped.
void append_rows(std::string& out, const std::vector<std::pair<std::string, std::string>>& rows) {
  std::size_t width = 0;
  for (const auto& [label, text] : rows) width = std::max(width, label.size());
  for (const auto& [label, text] : rows)
    back::append_wrapped(out, "  " + label + std::string(width - label.size() + 2, ' '), text);
}

/// "-o, --output FILE"
std::string option_label(const OptionInfo& option) {
  std::string label;
  if (option.letter != 0) label = std::string("-") + option.letter + ", ";
  label += "--" + std::string(option.name);
  if (!option.argument.empty()) label += " " + std::string(option.argument);
  return label;
}

std::string option_text(const OptionInfo& option) {
  std::string text(option.meaning);
  if (!option.standard.empty()) text += " [" + std::string(option.standard) + "]";
  return text;
}

}  // namespace

std::string program_help() {
  std::string out = "farrier " + std::string(version) +
                    ": circuits for exp(-i H t) by product formulas, as OpenQASM 3,\n"
                    "with a certified error and as few gates as it finds.\n"
                    "\n  " +
                    std::string(verb_info(Verb::compile).example) +
                    "\n\nUsage: farrier VERB INPUT [options]\n";
  std::vector<std::pair<std::string, std::string>> rows;
  for (const VerbInfo& verb : verb_table())
    rows.emplace_back(verb.name,
                      std::string(verb.meaning) + (verb.available ? "" : " (not in this version)"));
  append_rows(out, rows);
  out +=
      "INPUT is a job file (.xml), a Pauli sum (.pauli), or - for standard input.\n"
      "farrier VERB --help shows the options of a verb; farrier --version the version.\n"
      "\n"
      "Exit status: 0 done; 1 a budget or limit cannot be met; 64 wrong usage; 65 bad\n"
      "input data; 66 input cannot be opened; 70 internal fault; 73 output cannot be\n"
      "created; 74 read or write failed; 128 + signal when interrupted.\n";
  return out;
}

std::string verb_help(Verb verb) {
  const VerbInfo& info = verb_info(verb);
  std::string out = "Usage: farrier " + std::string(info.name) + " " + std::string(info.operands) +
                    "\nThis verb " + std::string(info.meaning) + ".\n";
  if (!info.available) return out + "It is not available in this version.\n";
  out += "\n  " + std::string(info.example) + "\n\n";
  std::vector<std::pair<std::string, std::string>> rows;
  for (const OptionInfo& option : option_table())
    if ((option.verbs & only(verb)) != 0 && option.available())
      rows.emplace_back(option_label(option), option_text(option));
  rows.emplace_back("-h, --help", "show this text");
  append_rows(out, rows);
  return out;
}

std::string diagnostic_text(const Diagnostic& diagnostic, bool colour) {
  std::string text = base::to_text(diagnostic);
  if (!colour) return text;
  const bool error = diagnostic.severity == Severity::error;
  const std::string_view word = error ? "error:" : "warning:";
  const std::size_t at = text.find(word, diagnostic.file.size());
  if (at == std::string::npos) return text;
  text.insert(at + word.size(), "\033[0m");
  text.insert(at, error ? "\033[1;31m" : "\033[1;35m");
  return text;
}

bool error_is_terminal() {
  return ::isatty(STDERR_FILENO) == 1;
}

bool error_wants_colour() {
  const char* no_colour = std::getenv("NO_COLOR");
  const char* terminal = std::getenv("TERM");
  return error_is_terminal() && (no_colour == nullptr || *no_colour == '\0') &&
         (terminal == nullptr || std::string_view(terminal) != "dumb");
}

void write_error(std::string_view text) {
  std::fwrite(text.data(), 1, text.size(), stderr);
  std::fflush(stderr);
}

Progress::Progress(const Run& run) {
  if (run.quiet || run.progress == ShowProgress::never) return;
  const bool always = run.progress == ShowProgress::always;
  transient_ = error_is_terminal();
  lines_ = always && !transient_;
  if (always) patience_ = std::chrono::seconds(0);
  if (transient_) painter_ = std::jthread([this](const std::stop_token& stop) { repaint(stop); });
}

Progress::~Progress() {
  stage("");
}

void Progress::stage(const std::string& what) {
  if (lines_ && !what.empty()) write_error("farrier: " + what + "\n");
  if (!transient_) return;
  const std::lock_guard lock(mutex_);
  if (painted_) write_error(wipe);
  painted_ = false;
  what_ = what;
  since_ = std::chrono::steady_clock::now();
}

void Progress::repaint(const std::stop_token& stop) {
  std::unique_lock lock(mutex_);
  while (!stop.stop_requested()) {
    const auto elapsed =
        std::chrono::floor<std::chrono::seconds>(std::chrono::steady_clock::now() - since_);
    if (!what_.empty() && elapsed >= patience_) {
      write_error(std::string(wipe) + "farrier: " + what_ + ", " + std::to_string(elapsed.count()) +
                  " s");
      painted_ = true;
    }
    stopped_.wait_for(lock, stop, std::chrono::seconds(1), [] { return false; });
  }
}

}  // namespace farrier::driver
