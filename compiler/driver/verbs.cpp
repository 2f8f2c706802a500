// The verbs. Every output is complete as text before the first one is written, and the circuit is
// written last.
#include "compiler/driver/verbs.hpp"

#include <sched.h>

#include <algorithm>
#include <farrier/compile.hpp>
#include <farrier/read.hpp>
#include <farrier/version.hpp>
#include <filesystem>
#include <functional>
#include <string>
#include <system_error>
#include <thread>
#include <utility>
#include <vector>

#include "compiler/back/depfile.hpp"
#include "compiler/back/log.hpp"
#include "compiler/back/summary.hpp"
#include "compiler/base/files.hpp"
#include "compiler/base/parallel.hpp"
#include "compiler/driver/lists.hpp"
#include "compiler/driver/text.hpp"

namespace farrier::driver {
namespace {

namespace fs = std::filesystem;

[[noreturn]] void refuse(const std::string& message) {
  throw UserError(ExitCode::usage, message);
}

/// What the reader calls standard input where it names the files of a Hamiltonian.
constexpr std::string_view standard_input = "<standard input>";

/// Something that will be written once everything has succeeded.
struct Output {
  std::string option;  ///< that asked for it, for messages
  std::string path;    ///< empty: not asked for
  std::function<std::string()> content;
};

unsigned usable_cpus() {
  cpu_set_t cpus;
  CPU_ZERO(&cpus);
  if (sched_getaffinity(0, sizeof cpus, &cpus) == 0)
    return static_cast<unsigned>(std::max(CPU_COUNT(&cpus), 1));
  return std::max(std::thread::hardware_concurrency(), 1U);
}

InputKind kind_of(const CommandLine& line) {
  if (line.run.kind) return *line.run.kind;
  if (line.operand == "-") return InputKind::pauli;
  if (const auto kind = input_kind(line.operand)) return *kind;
  base::read_file(line.operand);  // that it cannot be opened is the better message
  refuse("cannot tell what kind of input '" + line.operand +
         "' is; expected a name that ends in .xml or .pauli, or --input-kind");
}

/// A job with the command line applied.
struct ReadJob {
  Job job;
  std::vector<std::string> overrides;
};

ReadJob read(const CommandLine& line) {
  ReadJob read;
  read.job = read_job(line.operand, kind_of(line));
  read.overrides = apply_options(line, read.job);
  if (!line.run.quiet)
    for (const Diagnostic& warning : read.job.warnings)
      write_error(diagnostic_text(warning, error_wants_colour()));
  return read;
}

/// Whether two paths name one regular file, or one that does not exist yet.
bool same_file(const std::string& one, const std::string& other) {
  std::error_code error;
  if (one == "-" || other == "-") return one == other;
  if (fs::exists(one, error) && fs::exists(other, error))
    return fs::is_regular_file(one, error) && fs::equivalent(one, other, error);
  return fs::path(one).lexically_normal() == fs::path(other).lexically_normal();
}

/// No output may overwrite another one, or an input.
void check_outputs(const std::vector<Output>& outputs, const std::vector<std::string>& inputs) {
  for (std::size_t i = 0; i < outputs.size(); ++i) {
    for (std::size_t j = 0; j < i; ++j)
      if (same_file(outputs[i].path, outputs[j].path))
        refuse(outputs[j].option + " and " + outputs[i].option + " would both write to '" +
               outputs[i].path + "'; expected two files");
    for (const std::string& input : inputs)
      if (outputs[i].path != "-" && same_file(outputs[i].path, input))
        refuse(outputs[i].option + " would overwrite the input '" + input +
               "'; expected another file");
  }
}

/// The outputs that were asked for.
std::vector<Output> wanted(std::vector<Output> outputs, const std::vector<std::string>& inputs) {
  std::erase_if(outputs, [](const Output& output) { return output.path.empty(); });
  check_outputs(outputs, inputs);
  return outputs;
}

void write(const std::vector<Output>& outputs, Progress& progress) {
  std::vector<std::string> contents;
  contents.reserve(outputs.size());
  for (const Output& output : outputs) contents.push_back(output.content());
  for (std::size_t k = 0; k < outputs.size(); ++k) {
    progress.stage("writing " + (outputs[k].path == "-" ? "standard output" : outputs[k].path));
    base::write_file(outputs[k].path, contents[k]);
  }
  progress.stage("");
}

/// What the command line changed of the job file, as the first entry of the log.
void log_overrides(Result& result, const std::vector<std::string>& overrides) {
  if (overrides.empty()) return;
  PassEntry entry;
  entry.name = "command_line";
  entry.description = "the command line wins over the job file";
  entry.notes = overrides;
  for (Point& point : result.points) point.log.insert(point.log.begin(), entry);
}

std::vector<std::string> input_files(const CommandLine& line, const Job& job) {
  std::vector<std::string> files;
  if (line.operand != "-") files.push_back(line.operand);
  for (const std::string& file : job.hamiltonian.files)
    if (file != standard_input && std::ranges::find(files, file) == files.end())
      files.push_back(file);
  return files;
}

void run_compile(const CommandLine& line) {
  const Run& run = line.run;
  if (!run.depfile.empty() && run.output == "-")
    refuse("--depfile needs the name of the circuit as its target; expected --output FILE too");
  Progress progress(run);
  progress.stage("reading " + line.operand);
  const auto [job, overrides] = read(line);
  const std::vector<std::string> inputs = input_files(line, job);
  const std::vector<std::string> circuits = {run.output == "-" ? "" : run.output};
  Result result;
  const std::vector<Output> outputs =
      wanted({{"--depfile", run.depfile, [&] { return back::depfile(run.output, inputs); }},
              {"--log", run.log, [&] { return back::log_xml(result, "compile"); }},
              {"--summary", run.summary, [&] { return back::summary_xml(result, circuits); }},
              {"the circuit", run.output, [&] { return result.points.at(0).text; }}},
             inputs);

  progress.stage("compiling " + job.name);
  result = compile(job);
  log_overrides(result, overrides);
  write(outputs, progress);
  if (run.explain) write_error(back::log_text(result));
  if (!run.quiet) write_error(back::summary_text(result, circuits));
}

void run_survey(const CommandLine& line) {
  const Run& run = line.run;
  Progress progress(run);
  progress.stage("reading " + line.operand);
  const auto [job, overrides] = read(line);
  Result result;
  const std::vector<Output> outputs =
      wanted({{"--log", run.log, [&] { return back::log_xml(result, "survey"); }},
              {"--summary", run.summary, [&] { return back::survey_xml(result); }},
              {"the table", "-", [&] { return back::survey_text(result); }}},
             input_files(line, job));

  progress.stage("weighing the alternatives for " + job.name);
  result = survey(job);
  log_overrides(result, overrides);
  write(outputs, progress);
  if (run.explain) write_error(back::log_text(result));
}

void run_inspect(const CommandLine& line) {
  Progress progress(line.run);
  progress.stage("reading " + line.operand);
  const Job job = read(line).job;
  Facts facts;
  const std::vector<Output> outputs =
      wanted({{"--summary", line.run.summary, [&] { return back::facts_xml(facts); }},
              {"the facts", "-", [&] { return back::facts_text(facts); }}},
             input_files(line, job));

  progress.stage("inspecting " + job.name);
  facts = inspect(job);
  write(outputs, progress);
}

}  // namespace

void run(const CommandLine& line) {
  if (line.version) return base::write_file("-", std::string("farrier ") + version + "\n");
  if (line.help) return base::write_file("-", line.verb ? verb_help(*line.verb) : program_help());
  base::set_threads(line.run.threads.value_or(usable_cpus()));
  switch (line.verb.value()) {
    case Verb::compile:
      return run_compile(line);
    case Verb::survey:
      return run_survey(line);
    case Verb::inspect:
      return run_inspect(line);
    case Verb::list:
      return base::write_file("-", list_text(line.operand));
    case Verb::audit:
      break;
  }
  throw InternalFault("a verb that is not available reached the driver");
}

}  // namespace farrier::driver
