// What the tests of the front end share: text in, terms or a complaint out.
#pragma once

#include <farrier/read.hpp>
#include <string>

namespace farrier::test {

/// Reads a text under the name "input.pauli" or "input.xml".
Job read(const std::string& text, InputKind kind);
Job pauli(const std::string& text);
Job xml(const std::string& text);

/// A job file around a <hamiltonian>.
std::string job_text(const std::string& hamiltonian, const std::string& rest = "");

/// "0.5 X0 X1; -1 Z3": the merged terms of a job.
std::string terms(const Job& job);

/// The exit code and all diagnostics as the user sees them, or "accepted".
std::string pauli_complaint(const std::string& text);
std::string xml_complaint(const std::string& text);
/// The exit code and the first message behind the file's name: "65 2:9: error: ...".
std::string pauli_message(const std::string& text);
std::string xml_message(const std::string& text);

}  // namespace farrier::test
