// The entry points of <farrier/read.hpp>: by the kind of input, to its reader.
#include <algorithm>
#include <farrier/read.hpp>
#include <filesystem>
#include <utility>

#include "compiler/base/files.hpp"
#include "compiler/base/source.hpp"
#include "compiler/front/job_reader.hpp"
#include "compiler/front/pauli_reader.hpp"
#include "compiler/front/terms.hpp"
#include "compiler/front/text.hpp"

namespace farrier {
namespace {

constexpr const char* standard_input = "<standard input>";

struct Suffix {
  std::string_view suffix;
  InputKind kind;
};

constexpr Suffix suffixes[] = {
    {".xml", InputKind::xml}, {".pauli", InputKind::pauli}, {".fcidump", InputKind::fcidump}};

/// The stem of a file's name as one line of UTF-8, since headers and summaries hold it.
std::string job_name(const std::string& input) {
  if (input == standard_input) return "stdin";
  std::string stem = std::filesystem::path(input).stem().string();
  const bool broken = base::find_invalid_utf8(stem) != std::string::npos;
  std::replace_if(
      stem.begin(), stem.end(),
      [broken](char c) {
        const auto byte = static_cast<unsigned char>(c);
        return byte < 0x20 || byte == 0x7f || (broken && byte >= 0x80);
      },
      '_');
  return stem;
}

Job read_pauli_job(base::SourceText source) {
  Job job;
  front::TermList terms;
  const std::uint32_t qubits = front::read_pauli(source, 1.0, 0, terms);
  // The text of a large sum is as large as the sum; it is not needed while the sum is merged.
  source.text = std::string();
  job.hamiltonian = front::to_hamiltonian(std::move(terms), qubits, 1.0, job.warnings);
  return job;
}

Job read_source(std::string text, InputKind kind, const std::string& name,
                const std::string& directory) {
  if (kind == InputKind::fcidump) {
    throw UserError(ExitCode::usage,
                    Diagnostic{Severity::error, name, 0, 0,
                               "FCIDUMP input is not available in this version; expected a job "
                               "file (xml) or a Pauli sum (pauli)",
                               ""});
  }
  base::SourceText source = front::checked_source(name, std::move(text));
  Job job = kind == InputKind::xml ? front::read_job_file(source, directory)
                                   : read_pauli_job(std::move(source));
  if (job.name.empty()) job.name = job_name(name);
  return job;
}

}  // namespace

std::optional<InputKind> input_kind(const std::string& path) {
  for (const Suffix& row : suffixes) {
    const bool ends =
        path.size() > row.suffix.size() &&
        path.compare(path.size() - row.suffix.size(), row.suffix.size(), row.suffix) == 0;
    if (ends) return row.kind;
  }
  return std::nullopt;
}

Job read_job(const std::string& path, InputKind kind) {
  const std::string name = path == "-" ? standard_input : path;
  const std::string directory =
      path == "-" ? "" : std::filesystem::path(path).parent_path().string();
  return read_source(base::read_file(path), kind, name, directory);
}

Job read_job_text(const std::string& text, InputKind kind, const std::string& name,
                  const std::string& directory) {
  return read_source(text, kind, name, directory);
}

}  // namespace farrier
