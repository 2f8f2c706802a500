// Helpers of the front end's tests.
#include "tests/compiler/front/support.hpp"

#include "compiler/base/numbers.hpp"
#include "compiler/base/source.hpp"

namespace farrier::test {
namespace {

std::string complaint(const std::string& text, InputKind kind) {
  try {
    read(text, kind);
  } catch (const UserError& error) {
    std::string result = std::to_string(static_cast<int>(error.code())) + "\n";
    for (const Diagnostic& diagnostic : error.diagnostics()) result += base::to_text(diagnostic);
    return result;
  }
  return "accepted";
}

std::string message(const std::string& text) {
  const std::string prefix = "\nfarrier: input.";
  const std::size_t name = text.find(prefix);
  if (name == std::string::npos) return text;
  const std::size_t begin = text.find(':', name + prefix.size()) + 1;
  return text.substr(0, name) + " " + text.substr(begin, text.find('\n', begin) - begin);
}

}  // namespace

Job read(const std::string& text, InputKind kind) {
  return read_job_text(text, kind, kind == InputKind::xml ? "input.xml" : "input.pauli", "");
}

Job pauli(const std::string& text) {
  return read(text, InputKind::pauli);
}

Job xml(const std::string& text) {
  return read(text, InputKind::xml);
}

std::string job_text(const std::string& hamiltonian, const std::string& rest) {
  return "<job>" + hamiltonian + rest + "</job>";
}

std::string terms(const Job& job) {
  std::string result;
  const PauliSum& sum = job.hamiltonian.sum;
  for (std::size_t k = 0; k < sum.size(); ++k) {
    result += result.empty() ? "" : "; ";
    result += base::shortest(sum.coefficient(k)) + " " + to_text(sum.factors(k));
  }
  return result;
}

std::string pauli_complaint(const std::string& text) {
  return complaint(text, InputKind::pauli);
}

std::string xml_complaint(const std::string& text) {
  return complaint(text, InputKind::xml);
}

std::string pauli_message(const std::string& text) {
  return message(pauli_complaint(text));
}

std::string xml_message(const std::string& text) {
  return message(xml_complaint(text));
}

}  // namespace farrier::test
