// The table of gates: its rows against the matrices of the gates, and phases that are added up.
#include <doctest/doctest.h>

#include <cmath>
#include <farrier/circuit.hpp>
#include <farrier/diagnostic.hpp>
#include <numbers>
#include <set>
#include <sstream>
#include <string>
#include <vector>

#include "tests/support/unitary.hpp"

using namespace farrier;

namespace {

constexpr double pi = std::numbers::pi;

GateKind kind_of(const std::string& name) {
  for (const GateInfo& info : gate_table())
    if (info.name == name) return info.kind;
  throw std::invalid_argument("no gate is called " + name);
}

double angle_of(const std::string& text, double theta) {
  if (text == "theta") return theta;
  if (text == "pi/2") return pi / 2;
  throw std::invalid_argument("no angle: " + text);
}

/// Reads statements such as "rx(pi/2) b" and "cx a, b" out of the body of a definition.
std::vector<Gate> gates_of(const std::string& definition, double theta) {
  std::vector<Gate> gates;
  const std::size_t open = definition.find('{');
  const std::string body = definition.substr(open + 1, definition.find('}') - open - 1);
  std::istringstream statements(body);
  for (std::string statement; std::getline(statements, statement, ';');) {
    const std::size_t start = statement.find_first_not_of(' ');
    if (start == std::string::npos) continue;
    const std::size_t end = statement.find_first_of(" (", start);
    Gate gate;
    gate.kind = kind_of(statement.substr(start, end - start));
    if (statement[end] == '(')
      gate.parameters[0] =
          angle_of(statement.substr(end + 1, statement.find(')') - end - 1), theta);
    std::vector<std::uint32_t> operands;
    for (std::size_t k = statement.find(' ', end); k < statement.size(); ++k)
      if (statement[k] == 'a' || statement[k] == 'b')
        operands.push_back(statement[k] == 'a' ? 1 : 0);
    gate.a = operands.front();
    gate.b = operands.back();
    gates.push_back(gate);
  }
  return gates;
}

}  // namespace

TEST_CASE("the table lists the kinds with a name - in the order of the enumeration") {
  std::size_t index = static_cast<std::size_t>(GateKind::h);
  std::set<std::string> names;
  for (const GateInfo& info : gate_table()) {
    CHECK(static_cast<std::size_t>(info.kind) == index++);
    CHECK(&gate_info(info.kind) == &info);
    CHECK(names.emplace(info.name).second);
    CHECK(info.qubits == (info.kind >= GateKind::cx ? 2 : 1));
  }
  CHECK(index == static_cast<std::size_t>(GateKind::rxx) + 1);
}

TEST_CASE("gates that have not been lowered have no row") {
  CHECK_THROWS_AS(gate_info(GateKind::turn), InternalFault);
  CHECK_THROWS_AS(gate_info(GateKind::canonical), InternalFault);
}

TEST_CASE("what the standard library lacks is defined and nothing else") {
  // OpenQASM 3 specification, "Standard library" and "Built-in gates".
  const std::set<std::string> given = {"h",  "s",  "sdg", "sx", "x",  "y", "z",
                                       "rx", "ry", "rz",  "U",  "cx", "cz"};
  for (const GateInfo& info : gate_table())
    CHECK(info.definition.empty() == given.contains(std::string(info.name)));
}

TEST_CASE("each definition is the gate that it names - global phase included") {
  for (const GateInfo& info : gate_table()) {
    if (info.definition.empty()) continue;
    for (const double theta : {0.0, 0.3, -1.2, 3.0}) {
      INFO(info.name);
      const std::vector<Gate> body = gates_of(std::string(info.definition), theta);
      REQUIRE_FALSE(body.empty());
      // Operand a is the more significant qubit of the gate's matrix.
      const Gate gate{info.kind, 1, 0, {theta}};
      CHECK(unitary::distance(unitary::gates_matrix(2, body), unitary::gate_matrix(gate)) <=
            2e-16L);
    }
  }
}

TEST_CASE("add_phase keeps the phase in range and true") {
  Circuit circuit;
  const unitary::Real two_pi = 2 * unitary::pi;
  unitary::Real exact = 0.0L;
  for (int k = 0; k < 2000; ++k) {
    const double radians = std::sin(k) * 10.0;
    const std::uint64_t times = k % 5 == 0 ? 1000 : 1;
    add_phase(circuit, radians, times);
    exact += static_cast<unitary::Real>(radians) * static_cast<unitary::Real>(times);
    CHECK(circuit.global_phase > -pi);
    CHECK(circuit.global_phase <= pi);
  }
  const unitary::Real off = std::remainder(exact - circuit.global_phase, two_pi);
  CHECK(std::abs(off) <= 2000 * 3e-16L);
}

TEST_CASE("add_phase brings -pi to pi") {
  Circuit circuit;
  add_phase(circuit, -pi);
  CHECK(circuit.global_phase == pi);
  add_phase(circuit, pi);
  CHECK(std::abs(circuit.global_phase) <= 3e-16);
}
