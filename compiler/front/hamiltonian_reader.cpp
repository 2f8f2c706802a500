// Terms from <term>, <terms> and <lattice>, in the order of the text.
#include "compiler/front/hamiltonian_reader.hpp"

#include <algorithm>
#include <filesystem>
#include <utility>

#include "compiler/base/files.hpp"
#include "compiler/front/lattice_reader.hpp"
#include "compiler/front/pauli_reader.hpp"

namespace farrier::front {
namespace {

/// Where a path of the job file leads; never "-", which would be standard input.
std::string resolve(const std::string& directory, std::string_view path) {
  const std::string joined = (std::filesystem::path(directory) / path).string();
  return joined == "-" ? "./-" : joined;
}

/// Reads a file that an attribute names; failures point at the attribute.
std::string read_named_file(const Attribute& attribute, const std::string& path) {
  try {
    return base::read_file(path);
  } catch (const UserError& error) {
    throw UserError(error.code(),
                    attribute.source->at(attribute.value_at, in_quotes(path) + " " + error.what()));
  }
}

class HamiltonianReader {
 public:
  HamiltonianReader(const base::SourceText& source, const std::string& directory,
                    std::vector<Diagnostic>& warnings)
      : source_(source), directory_(directory), warnings_(warnings), words_(source) {
    file_ = terms_.file_index(source.name);
  }

  HamiltonianText read(const Element& element) {
    if (const auto attribute = element.attribute("qubits")) {
      qubits_ = static_cast<std::uint32_t>(whole_value(*attribute, 1, most_qubits));
      extent_.limit = extent_.declared = qubits_;
    }
    for (const Element& child : element.children()) read_child(child);
    if (terms_.read == 0) {
      element.fail("<hamiltonian> has no term; expected <term>, <terms> or <lattice>");
    }
    const std::uint32_t qubits = qubits_ > 0 ? qubits_ : std::max({span_, extent_.span, 1U});
    if (extent_.dense > 0 && extent_.dense != qubits) {
      source_.fail(extent_.dense_at, "dense word of " + count_of(extent_.dense, "letter") +
                                         " for " + count_of(qubits, "qubit") + "; expected " +
                                         count_of(qubits, "letter"));
    }
    return {std::move(terms_), qubits};
  }

 private:
  void read_child(const Element& child) {
    if (child.name() == "term") {
      read_term(child);
    } else if (child.name() == "terms") {
      read_terms(child);
    } else {
      span_ = std::max(span_, read_lattice(child, file_, qubits_, terms_, warnings_));
    }
  }

  void read_term(const Element& child) {
    const Attribute attribute = child.required("coefficient", "0.5");
    const double coefficient = read_coefficient(source_, attribute.value_at, attribute.value);
    const std::vector<Item> pieces = child.text();
    if (pieces.size() != 1) {
      child.fail("<term> holds " + count_of(pieces.size(), "piece") +
                 " of text; expected one Pauli string, such as X0 X1");
    }
    const std::size_t end = pieces[0].offset + pieces[0].text.size();
    terms_.add(words_.read(pieces[0].offset, end, extent_), coefficient, {file_, child.line()});
  }

  void read_terms(const Element& child) {
    const Attribute file = child.required("file", "extra.pauli");
    double scale = 1.0;
    if (const auto attribute = child.attribute("scale")) scale = number_value(*attribute);
    const std::string path = resolve(directory_, file.value);
    const base::SourceText text = checked_source(path, read_named_file(file, path));
    span_ = std::max(span_, read_pauli(text, scale, qubits_, terms_));
  }

  const base::SourceText& source_;
  const std::string& directory_;
  std::vector<Diagnostic>& warnings_;
  WordReader words_;
  TermList terms_;
  Extent extent_;
  std::uint32_t file_ = 0;
  std::uint32_t qubits_ = 0;  ///< as the attribute says; 0: it is not there
  std::uint32_t span_ = 0;    ///< of files and lattices
};

}  // namespace

HamiltonianText read_hamiltonian(const Element& element, const base::SourceText& source,
                                 const std::string& directory, std::vector<Diagnostic>& warnings) {
  return HamiltonianReader(source, directory, warnings).read(element);
}

}  // namespace farrier::front
