// The entry points: kinds of input, names of jobs, and inputs that cannot be opened.
#include <doctest/doctest.h>
#include <stdlib.h>

#include <farrier/read.hpp>
#include <filesystem>
#include <fstream>

#include "compiler/base/source.hpp"
#include "tests/compiler/front/support.hpp"

using namespace farrier;
namespace fs = std::filesystem;

namespace {

std::string complaint(const std::string& path, InputKind kind) {
  try {
    read_job(path, kind);
  } catch (const UserError& error) {
    return std::to_string(static_cast<int>(error.code())) + " " +
           base::to_text(error.diagnostics().at(0));
  }
  return "accepted";
}

}  // namespace

TEST_CASE("suffixes stand for kinds of input") {
  CHECK(input_kind("a.xml") == InputKind::xml);
  CHECK(input_kind("deep/a.b.pauli") == InputKind::pauli);
  CHECK(input_kind("a.fcidump") == InputKind::fcidump);
  CHECK_FALSE(input_kind("a"));
  CHECK_FALSE(input_kind("xml"));
  CHECK_FALSE(input_kind(".xml"));
  CHECK_FALSE(input_kind("-"));
  CHECK_FALSE(input_kind("a.XML"));
}

TEST_CASE("a job without a name is called after its file") {
  const auto name = [](const std::string& path) {
    return read_job_text("1 X0\n", InputKind::pauli, path, "").name;
  };
  CHECK(name("some/where/ising.pauli") == "ising");
  CHECK(name("two.parts.pauli") == "two.parts");
  CHECK(name("<standard input>") == "stdin");
  CHECK(name("a\nb\x7f.pauli") == "a_b_");
  CHECK(name("caf\xc3\xa9.pauli") == "caf\xc3\xa9");
  CHECK(name("caf\xe9.pauli") == "caf_");
}

TEST_CASE("files are read under their path") {
  std::string folder = (fs::temp_directory_path() / "farrier-read-XXXXXX").string();
  REQUIRE(::mkdtemp(folder.data()) != nullptr);
  std::ofstream(folder + "/part.pauli") << "2 Z0\n";
  std::ofstream(folder + "/job.xml")
      << "<job><hamiltonian><terms file='part.pauli'/></hamiltonian></job>";
  const Job job = read_job(folder + "/job.xml", InputKind::xml);
  CHECK(job.name == "job");
  CHECK(test::terms(job) == "2 Z0");
  CHECK(job.hamiltonian.files ==
        std::vector<std::string>{folder + "/job.xml", folder + "/part.pauli"});
  CHECK(complaint(folder, InputKind::xml) ==
        "66 farrier: " + folder + ": error: cannot be opened: Is a directory\n");
  CHECK(complaint(folder + "/none.xml", InputKind::xml) ==
        "66 farrier: " + folder +
            "/none.xml: error: cannot be opened: No such file or "
            "directory\n");
  CHECK(complaint(folder + "/job.xml", InputKind::pauli).substr(0, 3) == "65 ");
  fs::remove_all(folder);
}

TEST_CASE("FCIDUMP files are refused as not available") {
  try {
    read_job_text("&FCI\n", InputKind::fcidump, "a.fcidump", "");
    FAIL("accepted");
  } catch (const UserError& error) {
    CHECK(error.code() == ExitCode::usage);
    CHECK(base::to_text(error.diagnostics().at(0)) ==
          "farrier: a.fcidump: error: FCIDUMP input is not available in this version; expected a "
          "job file (xml) or a Pauli sum (pauli)\n");
  }
}

TEST_CASE("a long sum reads in one pass") {
  std::string text;
  const std::size_t count = 200'000;
  for (std::size_t k = 0; k < count; ++k) {
    const std::string index = std::to_string(k);
    text += "0.5 X" + index + " Z" + std::to_string(k + 1) + "\n";
  }
  const Job job = test::pauli(text);
  CHECK(job.hamiltonian.qubits == count + 1);
  CHECK(job.hamiltonian.sum.size() == count);
  CHECK(job.hamiltonian.origins.back().line == count);
}
