// The table of gates that may stand in the text.
#include <cmath>
#include <farrier/circuit.hpp>
#include <farrier/diagnostic.hpp>
#include <numbers>

namespace farrier {

const std::vector<GateInfo>& gate_table() {
  // Names and matrices of stdgates.inc: OpenQASM 3 specification, "standard library".
  // ecr, iswap, rzz, rxx: common practice, no source; the definitions are exact, phase included:
  //   ecr   = X_a exp(-i pi/4 Z_a X_b),  iswap = exp(i pi/4 (X X + Y Y))
  static const std::vector<GateInfo> table = {
      {GateKind::h, "h", 1, 0, ""},
      {GateKind::s, "s", 1, 0, ""},
      {GateKind::sdg, "sdg", 1, 0, ""},
      {GateKind::sx, "sx", 1, 0, ""},
      {GateKind::x, "x", 1, 0, ""},
      {GateKind::y, "y", 1, 0, ""},
      {GateKind::z, "z", 1, 0, ""},
      {GateKind::rx, "rx", 1, 1, ""},
      {GateKind::ry, "ry", 1, 1, ""},
      {GateKind::rz, "rz", 1, 1, ""},
      {GateKind::u, "U", 1, 3, ""},
      {GateKind::cx, "cx", 2, 0, ""},
      {GateKind::cz, "cz", 2, 0, ""},
      {GateKind::ecr, "ecr", 2, 0, "gate ecr a, b { cx a, b; s a; rx(pi/2) b; x a; }"},
      {GateKind::iswap, "iswap", 2, 0, "gate iswap a, b { s a; s b; h a; cx a, b; cx b, a; h b; }"},
      {GateKind::rzz, "rzz", 2, 1, "gate rzz(theta) a, b { cx a, b; rz(theta) b; cx a, b; }"},
      {GateKind::rxx, "rxx", 2, 1,
       "gate rxx(theta) a, b { h a; h b; cx a, b; rz(theta) b; cx a, b; h a; h b; }"},
  };
  return table;
}

const GateInfo& gate_info(GateKind kind) {
  const auto first = static_cast<std::size_t>(GateKind::h);
  const auto index = static_cast<std::size_t>(kind);
  if (index < first) throw InternalFault("a gate that has not been lowered has no name");
  return gate_table()[index - first];
}

void add_phase(Circuit& circuit, double radians, std::uint64_t times) {
  constexpr long double two_pi = 2 * std::numbers::pi_v<long double>;
  const long double turns = static_cast<long double>(radians) * static_cast<long double>(times);
  const long double sum =
      std::remainder(static_cast<long double>(circuit.global_phase) + turns, two_pi);
  const auto value = static_cast<double>(sum);
  circuit.global_phase = value <= -std::numbers::pi ? std::numbers::pi : value;
}

}  // namespace farrier
