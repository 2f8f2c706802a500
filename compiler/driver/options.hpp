// The command line: the table of verbs, the one table of options, and the parsing that derives from
// them. Help, errors and the circuit's canonical command line come from the same rows.
#pragma once

#include <farrier/job.hpp>
#include <farrier/read.hpp>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace farrier::driver {

enum class Verb : unsigned { compile, survey, inspect, audit, list };

/// A row of the table of verbs.
struct VerbInfo {
  Verb verb;
  std::string_view name;
  std::string_view operands;  ///< what stands behind the verb
  std::string_view meaning;   ///< one line
  std::string_view example;
  bool available;  ///< false: recognised, and an error that says so
};

const std::vector<VerbInfo>& verb_table();
const VerbInfo& verb_info(Verb verb);

/// A set of verbs.
using Verbs = unsigned;
constexpr Verbs only(Verb verb) {
  return 1U << static_cast<unsigned>(verb);
}

enum class ShowProgress { automatic, always, never };

/// What a run does besides compiling its job. An empty file name stands for no such file.
struct Run {
  std::string output = "-";
  std::string summary;
  std::string log;
  std::string depfile;
  bool explain = false;
  bool quiet = false;
  ShowProgress progress = ShowProgress::automatic;
  std::optional<unsigned> threads;  ///< none: the CPUs that the process may use
  std::optional<InputKind> kind;    ///< none: by the input's suffix
};

/// A row of the table of options.
struct OptionInfo {
  std::string_view name;      ///< long, without the dashes
  char letter;                ///< short, or 0
  std::string_view argument;  ///< what help calls the value; empty for a switch
  std::string_view meaning;   ///< one line
  std::string_view standard;  ///< the default as help shows it; empty where there is none to show
  Verbs verbs;                ///< which verbs take it
  /// Puts the value into job or run. Returns what is wrong with the value or what was expected, or
  /// "" where it was taken. Null for an option that this version recognises but does not have.
  std::string (*apply)(Job&, Run&, std::string_view value);
  /// The setting of a job as this option would write it ("" for a switch that is off or a setting
  /// that is not there). Null for options that do not change the circuit.
  std::string (*show)(const Job&);

  [[nodiscard]] bool available() const { return apply != nullptr; }
  [[nodiscard]] bool changes_circuit() const { return show != nullptr; }
};

/// Every option, in the order of help and of the canonical command line.
const std::vector<OptionInfo>& option_table();

/// An option that was given, with its value ("" for a switch).
struct GivenOption {
  const OptionInfo* option = nullptr;
  std::string value;
};

/// A command line that has been understood; every value has been checked.
struct CommandLine {
  std::optional<Verb> verb;  ///< none: --help or --version of the program
  bool help = false;
  bool version = false;
  std::string operand;               ///< INPUT, or the table that `list` shows
  std::vector<GivenOption> options;  ///< in table order
  Run run;
};

/// Understands the words behind the program's name. Throws UserError(ExitCode::usage).
CommandLine parse(const std::vector<std::string>& words);

/// Applies the options to a job that has been read, and sets its canonical command. Returns a
/// sentence for each setting of a job file that an option replaced by something else.
std::vector<std::string> apply_options(const CommandLine& line, Job& job);

}  // namespace farrier::driver
