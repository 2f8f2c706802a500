// Hamiltonians of job files: terms, term files, and the number of qubits.
#include "compiler/front/hamiltonian_reader.hpp"

#include <doctest/doctest.h>
#include <stdlib.h>

#include <filesystem>
#include <fstream>

#include "compiler/base/source.hpp"
#include "tests/compiler/front/support.hpp"

using namespace farrier;
using test::terms;
using test::xml;
using test::xml_message;
namespace fs = std::filesystem;

namespace {

std::string body(const std::string& children, const std::string& attributes = "") {
  return test::job_text("<hamiltonian" + attributes + ">" + children + "</hamiltonian>");
}

/// A folder with term files in it.
struct Folder {
  Folder() {
    std::string name = (fs::temp_directory_path() / "farrier-terms-XXXXXX").string();
    REQUIRE(::mkdtemp(name.data()) != nullptr);
    path = name;
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder() { fs::remove_all(path); }
  void plant(const std::string& name, const std::string& content) const {
    std::ofstream(path / name, std::ios::binary) << content;
  }
  [[nodiscard]] Job read(const std::string& text) const {
    return read_job_text(text, InputKind::xml, "input.xml", path.string());
  }
  /// The exit code and the message as the user sees it, with "DIR" for the folder.
  [[nodiscard]] std::string complaint(const std::string& text) const {
    try {
      static_cast<void>(read(text));
    } catch (const UserError& error) {
      std::string result = base::to_text(error.diagnostics().at(0));
      const std::size_t at = result.find(path.string());
      if (at != std::string::npos) result.replace(at, path.string().size(), "DIR");
      return std::to_string(static_cast<int>(error.code())) + " " + result;
    }
    return "accepted";
  }
  fs::path path;
};

}  // namespace

TEST_CASE("terms are written as in a text Pauli sum") {
  const Job job =
      xml(body("<term coefficient='0.5'>X0 X1</term>"
               "<term coefficient='-1+0i'>\n Z3\n X0 </term>"
               "<term coefficient='2'>I</term>"));
  CHECK(terms(job) == "0.5 X0 X1; -1 X0 Z3");
  CHECK(job.hamiltonian.sum.constant() == 2.0);
  CHECK(job.hamiltonian.qubits == 4);
  CHECK(xml(body("<term coefficient='1'>ZZIX</term><term coefficient='1'>X2</term>"))
            .hamiltonian.qubits == 4);
}

TEST_CASE("the number of qubits is given or follows from all parts") {
  CHECK(xml(body("<term coefficient='1'>X2</term>", " qubits='9'")).hamiltonian.qubits == 9);
  CHECK(xml(body("<term coefficient='1'>X0</term>"
                 "<lattice shape='chain' size='3' first='4'><site z='1'/></lattice>"))
            .hamiltonian.qubits == 7);
}

TEST_CASE("term files are relative to the job file and scaled") {
  const Folder folder;
  folder.plant("extra.pauli", "# more\n4 X0\n2 Z1\n");
  const Job job =
      folder.read(body("<term coefficient='1'>X0</term>\n<terms file='extra.pauli' scale='0.5'/>\n"
                       "<terms file='extra.pauli'/>"));
  CHECK(terms(job) == "7 X0; 3 Z1");
  CHECK(job.hamiltonian.files ==
        std::vector<std::string>{"input.xml", (folder.path / "extra.pauli").string()});
  CHECK(job.hamiltonian.origins[0].file == 0);
  CHECK(job.hamiltonian.origins[0].line == 1);
  CHECK(job.hamiltonian.origins[1].file == 1);
  CHECK(job.hamiltonian.origins[1].line == 3);
  const std::string absolute = (folder.path / "extra.pauli").string();
  CHECK(terms(xml(body("<terms file='" + absolute + "'/>"))) == "4 X0; 2 Z1");
}

TEST_CASE("the number of qubits of a term file counts and is limited") {
  const Folder folder;
  folder.plant("wide.pauli", "qubits 6\n1 X0\n");
  folder.plant("dense.pauli", "1 ZZX\n");
  CHECK(folder.read(body("<terms file='wide.pauli'/>")).hamiltonian.qubits == 6);
  CHECK(folder.read(body("<terms file='dense.pauli'/>", " qubits='8'")).hamiltonian.qubits == 8);
  CHECK(folder.complaint(body("<terms file='wide.pauli'/>", " qubits='4'")) ==
        "65 farrier: DIR/wide.pauli:1:8: error: bad number of qubits '6'; expected 1 to 4\n"
        "qubits 6\n       ^\n");
  CHECK(folder.complaint(body("<terms file='dense.pauli'/>", " qubits='2'")) ==
        "65 farrier: DIR/dense.pauli:1:3: error: dense word of 3 letters for 2 qubits; expected "
        "no more than 2\n1 ZZX\n  ^\n");
}

TEST_CASE("term files that do not open are shown at the attribute") {
  const Folder folder;
  CHECK(folder.complaint(body("\n<terms file='absent.pauli'/>\n")) ==
        "66 farrier: input.xml:2:14: error: 'DIR/absent.pauli' cannot be opened: No such file or "
        "directory\n<terms file='absent.pauli'/>\n             ^\n");
  CHECK(folder.complaint(body("<terms file='.'/>")).substr(0, 42) ==
        "66 farrier: input.xml:1:32: error: 'DIR/.'");
  // "-" is a file of that name here, never standard input.
  CHECK(xml_message(body("<terms file='-'/>")) ==
        "66 1:32: error: './-' cannot be opened: No such file or directory");
}

TEST_CASE("mistakes in term files name that file") {
  const Folder folder;
  folder.plant("bad.pauli", "1 X0\n1 Q0\n");
  CHECK(folder.complaint(body("<terms file='bad.pauli'/>")) ==
        "65 farrier: DIR/bad.pauli:2:3: error: unknown Pauli letter in 'Q0'; expected I, X, Y or "
        "Z\n1 Q0\n  ^\n");
  folder.plant("latin.pauli", "# \xe9\n1 X0\n");
  CHECK(folder.complaint(body("<terms file='latin.pauli'/>")) ==
        "65 farrier: DIR/latin.pauli:1:3: error: invalid UTF-8; expected text in UTF-8\n# ?\n  "
        "^\n");
  folder.plant("none.pauli", "");
  CHECK(folder.complaint(body("<term coefficient='1'>X0</term><terms file='none.pauli'/>")) ==
        "65 farrier: DIR/none.pauli:1:1: error: no term; expected a coefficient and a Pauli "
        "string\n");
}

TEST_CASE("a cancelled Hamiltonian warns") {
  const Job job = xml(body("<term coefficient='1'>X0</term><term coefficient='-1'>X0</term>"));
  REQUIRE(job.warnings.size() == 1);
  CHECK(base::to_text(job.warnings[0]) ==
        "farrier: input.xml: warning: the terms cancel to nothing; the evolution is the "
        "identity\n");
}

TEST_CASE("mistakes in a Hamiltonian are shown where they stand") {
  const struct {
    std::string attributes;
    std::string children;
    const char* expected;
  } cases[] = {
      {"", "", "65 1:7: error: <hamiltonian> has no term; expected <term>, <terms> or <lattice>"},
      {" qubits='0'", "<term coefficient='1'>X0</term>",
       "65 1:27: error: bad value '0' of 'qubits'; expected a whole number from 1 to 1073741824"},
      {" qubits='2'", "<term coefficient='1'>X0 X2</term>",
       "65 1:55: error: qubit index 2 is out of range; expected 0 to 1 for 2 qubits"},
      {" qubits='2'", "<term coefficient='1'>XXX</term>",
       "65 1:52: error: dense word of 3 letters for 2 qubits; expected 2 letters"},
      {" qubits='2'", "<lattice shape='chain' size='3'><site z='1'/></lattice>",
       "65 1:59: error: the lattice reaches qubit 2; expected no more than 1"},
      {"", "<term>X0</term>",
       "65 1:20: error: <term> has no attribute 'coefficient'; expected coefficient=\"0.5\""},
      {"", "<term coefficient='2j'>X0</term>",
       "65 1:38: error: bad coefficient '2j'; expected a number in the range of double precision, "
       "such as -0.25"},
      {"", "<term coefficient='1+2i'>X0</term>",
       "65 1:38: error: the coefficient '1+2i' has an imaginary part, so the operator would not "
       "be Hermitian; expected a real number"},
      {"", "<term coefficient='1'/>",
       "65 1:20: error: <term> holds 0 pieces of text; expected one Pauli string, such as X0 X1"},
      {"", "<term coefficient='1'>X0 <!-- and --> X1</term>",
       "65 1:20: error: <term> holds 2 pieces of text; expected one Pauli string, such as X0 X1"},
      {"", "<term coefficient='1'>X0 X1 X0</term>",
       "65 1:47: error: qubit 0 is named twice in one term; expected each qubit once"},
      {"", "<term coefficient='1'>XX</term><term coefficient='1'>X2</term>",
       "65 1:72: error: qubit index 2 is out of range; expected 0 to 1 for 2 qubits"},
      {"", "<term coefficient='1'>XX</term><lattice shape='chain' size='3'><site z='1'/></lattice>",
       "65 1:41: error: dense word of 2 letters for 3 qubits; expected 3 letters"},
      {"", "<terms scale='2'/>",
       "65 1:20: error: <terms> has no attribute 'file'; expected file=\"extra.pauli\""},
      {"", "<terms file='a' scale='x'/>",
       "65 1:42: error: bad value 'x' of 'scale'; expected a finite number"},
  };
  for (const auto& row : cases) {
    CAPTURE(row.children);
    CHECK(xml_message(body(row.children, row.attributes)) == row.expected);
  }
}
