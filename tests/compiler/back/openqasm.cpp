// The OpenQASM 3 writer: exact texts of small circuits, and what holds for every text.
#include "compiler/back/openqasm.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <complex>
#include <farrier/diagnostic.hpp>
#include <numbers>
#include <random>
#include <regex>
#include <sstream>
#include <tuple>

#include "compiler/base/numbers.hpp"
#include "sample.hpp"

using namespace farrier;
using back::OpenqasmInput;

namespace {

constexpr double pi = std::numbers::pi;

Gate one(GateKind kind, std::uint32_t a, std::array<double, 4> parameters = {}) {
  return {kind, a, a, parameters};
}

Gate two(GateKind kind, std::uint32_t a, std::uint32_t b, std::array<double, 4> parameters = {}) {
  return {kind, a, b, parameters};
}

Circuit circuit(std::uint32_t qubits, std::vector<Segment> segments) {
  Circuit c;
  c.qubits = qubits;
  c.segments = std::move(segments);
  for (std::uint32_t k = 0; k < qubits; ++k) {
    c.layout_in.push_back(k);
    c.layout_out.push_back(k);
  }
  return c;
}

OpenqasmInput input(const Circuit& c, Style style = Style::flat) {
  OpenqasmInput in{.circuit = c,
                   .counts = sample::counts(),
                   .version = "0.1.0",
                   .job = "dimer",
                   .hamiltonian = "00000000000000aa",
                   .command = "compile dimer.pauli --time 2",
                   .inputs = "00000000000000bb",
                   .time = "2 us",
                   .formula = "strang",
                   .steps = 3,
                   .assurance = "certified",
                   .certified_error = "0.00087",
                   .tolerance = "0.001",
                   .native = "cz",
                   .prepares = false,
                   .preparation = {},
                   .measurement = {},
                   .style = style,
                   .barriers = Barriers::none};
  return in;
}

/// Everything after the line with the digest.
std::string body(const std::string& text) {
  const std::size_t at = text.find("// body: ");
  return text.substr(text.find('\n', at) + 1);
}

/// What follows the declaration of the qubits.
std::string statements(const std::string& text) {
  const std::size_t at = text.find("qubit[");
  return text.substr(text.find('\n', at) + 1);
}

/// Gates with angles of every size.
Segment random_segment(std::mt19937_64& random, std::uint32_t qubits, std::size_t size,
                       std::uint64_t repeats) {
  std::uniform_real_distribution<double> angle(-3.14159, 3.14159);
  std::uniform_int_distribution<std::uint32_t> index(0, qubits - 1);
  std::uniform_int_distribution<int> exponent(-18, 0);
  constexpr std::array<GateKind, 5> kinds{GateKind::h, GateKind::rz, GateKind::u, GateKind::cx,
                                          GateKind::rzz};
  Segment segment;
  segment.repeats = repeats;
  for (std::size_t k = 0; k < size; ++k) {
    const GateKind kind = kinds[random() % kinds.size()];
    Gate gate = one(kind, index(random));
    if (gate_info(kind).qubits == 2) gate.b = (gate.a + 1) % qubits;
    for (double& value : gate.parameters) value = angle(random) * std::pow(10.0, exponent(random));
    segment.gates.push_back(gate);
  }
  return segment;
}

/// The lines with every `for` statement run out, as classical.rst ("For loops") has it: the range
/// [1:R] includes both ends.
std::vector<std::string> run_out(const std::string& text) {
  static const std::regex head(R"(for uint k in \[1:(\d+)\] \{)");
  std::vector<std::string> result;
  std::vector<std::string> round;
  std::uint64_t rounds = 0;
  for (const std::string& line : sample::lines(text)) {
    std::smatch match;
    if (std::regex_match(line, match, head)) {
      rounds = std::stoull(match[1]);
      round.clear();
    } else if (rounds > 0 && line == "}") {
      for (; rounds > 0; --rounds) result.insert(result.end(), round.begin(), round.end());
    } else if (rounds > 0) {
      round.push_back(line.substr(2));
    } else {
      result.push_back(line);
    }
  }
  return result;
}

}  // namespace

TEST_CASE("a flat pure evolution, to the letter") {
  Circuit c =
      circuit(2, {{{one(GateKind::h, 0), two(GateKind::cx, 0, 1)}, 1},
                  {{one(GateKind::rz, 1, {0.5}), one(GateKind::u, 0, {3.0, -1e-5, 2.5})}, 2},
                  {{one(GateKind::sdg, 1)}, 1}});
  c.global_phase = -0.25;
  CHECK(back::write_openqasm(input(c)) ==
        "OPENQASM 3.0;\n"
        "// farrier: 0.1.0\n"
        "// job: dimer\n"
        "// hamiltonian: 00000000000000aa\n"
        "// command: compile dimer.pauli --time 2\n"
        "// inputs: 00000000000000bb\n"
        "// time: 2 us\n"
        "// formula: strang\n"
        "// steps: 3\n"
        "// assurance: certified\n"
        "// certified-error: 0.00087\n"
        "// tolerance: 0.001\n"
        "// two-qubit-gates: 16\n"
        "// gates: 36\n"
        "// depth: 30\n"
        "// two-qubit-depth: 14\n"
        "// native: cx\n"
        "// layout-in: 0 1\n"
        "// layout-out: 0 1\n"
        "// body: aa5e3b61b3d799a4\n"
        "include \"stdgates.inc\";\n"
        "qubit[2] q;\n"
        "gphase(-0.25);\n"
        "h q[0];\n"
        "cx q[0], q[1];\n"
        "rz(0.5) q[1];\n"
        "U(3.0, -1e-05, 2.5) q[0];\n"
        "rz(0.5) q[1];\n"
        "U(3.0, -1e-05, 2.5) q[0];\n"
        "sdg q[1];\n");
}

TEST_CASE("the body's digest is FNV-1a of the bytes after its line") {
  const Circuit c = circuit(1, {{{one(GateKind::rx, 0, {0.125})}, 7}});
  const std::string text = back::write_openqasm(input(c));
  std::uint64_t hash = 14695981039346656037ULL;  // offset basis and prime: draft-eastlake-fnv
  for (const char byte : body(text))
    hash = (hash ^ static_cast<unsigned char>(byte)) * 1099511628211ULL;
  std::ostringstream hex;
  hex << std::hex;
  hex.width(16);
  hex.fill('0');
  hex << hash;
  CHECK(text.find("\n// body: " + hex.str() + "\n") != std::string::npos);
}

TEST_CASE("looped text keeps a repeated segment in a for statement") {
  const Circuit c =
      circuit(2, {{{one(GateKind::x, 0)}, 1},
                  {{one(GateKind::sx, 1), two(GateKind::cz, 1, 0)}, 1'000'000'000'000},
                  {{}, 5},
                  {{one(GateKind::z, 1)}, 0},
                  {{one(GateKind::y, 1)}, 1}});
  CHECK(statements(back::write_openqasm(input(c, Style::looped))) ==
        "x q[0];\n"
        "for uint k in [1:1000000000000] {\n"
        "  sx q[1];\n"
        "  cz q[1], q[0];\n"
        "}\n"
        "y q[1];\n");
}

TEST_CASE("barriers end the rounds of a repeated segment and stand between segments") {
  const Circuit c = circuit(1, {{{one(GateKind::x, 0)}, 1},
                                {{one(GateKind::y, 0)}, 2},
                                {{one(GateKind::z, 0)}, 1},
                                {{}, 1}});
  OpenqasmInput in = input(c);
  in.barriers = Barriers::steps;
  CHECK(statements(back::write_openqasm(in)) ==
        "x q[0];\nbarrier q;\ny q[0];\nbarrier q;\ny q[0];\nbarrier q;\nz q[0];\n");
  in.style = Style::looped;
  CHECK(statements(back::write_openqasm(in)) ==
        "x q[0];\nbarrier q;\nfor uint k in [1:2] {\n  y q[0];\n  barrier q;\n}\nz q[0];\n");
}

TEST_CASE("a program prepares and measures where the layouts say") {
  Circuit c = circuit(4, {{{two(GateKind::cx, 3, 1)}, 1}});
  c.layout_in = {3, 1, 0};
  c.layout_out = {1, 3, 0};
  c.global_phase = 0.5;
  OpenqasmInput in = input(c);
  in.prepares = true;
  in.preparation = {{0, State::minus_i}, {2, State::one}};
  in.measurement = Measurement{Basis::y, {0, 2}};
  const std::string text = back::write_openqasm(in);
  CHECK(text.find("// layout-in: 3 1 0\n// layout-out: 1 3 0\n") != std::string::npos);
  CHECK(body(text) ==
        "include \"stdgates.inc\";\n"
        "qubit[4] q;\n"
        "bit[3] c;\n"
        "// preparation\n"
        "reset q;\n"
        "h q[3];\n"
        "sdg q[3];\n"
        "x q[0];\n"
        "// evolution\n"
        "gphase(0.5);\n"
        "cx q[3], q[1];\n"
        "// measurement\n"
        "sdg q[1];\n"
        "h q[1];\n"
        "sdg q[0];\n"
        "h q[0];\n"
        "c[0] = measure q[1];\n"
        "c[2] = measure q[0];\n");
}

TEST_CASE("an empty preparation resets and measures nothing") {
  const Circuit c = circuit(1, {});
  OpenqasmInput in = input(c);
  in.prepares = true;
  CHECK(statements(back::write_openqasm(in)) == "// preparation\nreset q;\n// evolution\n");
  in.prepares = false;
  CHECK(statements(back::write_openqasm(in)).empty());
  in.measurement = Measurement{Basis::z, {0}};
  CHECK(
      statements(back::write_openqasm(in)) ==
      "bit[1] c;\n// preparation\nreset q;\n// evolution\n// measurement\nc[0] = measure q[0];\n");
}

TEST_CASE("prepared states and measured bases are those of the Pauli operators") {
  using C = std::complex<double>;
  using Vector = std::array<C, 2>;
  const double r = std::sqrt(0.5);
  // Matrices as in standard_library.rst of the OpenQASM 3 specification.
  const auto apply = [r](const std::string& gate, const Vector& v) -> Vector {
    if (gate == "x") return {v[1], v[0]};
    if (gate == "h") return {r * (v[0] + v[1]), r * (v[0] - v[1])};
    if (gate == "s") return {v[0], C(0, 1) * v[1]};
    REQUIRE(gate == "sdg");
    return {v[0], C(0, -1) * v[1]};
  };
  // Eigenvectors of Z, X and Y (any textbook), and the basis in which they are certain.
  const std::vector<std::tuple<State, Basis, int>> rows{
      {State::zero, Basis::z, 0},  {State::one, Basis::z, 1},    {State::plus, Basis::x, 0},
      {State::minus, Basis::x, 1}, {State::plus_i, Basis::y, 0}, {State::minus_i, Basis::y, 1}};
  const std::vector<Vector> states{{1, 0}, {0, 1}, {r, r}, {r, -r}, {r, C(0, r)}, {r, C(0, -r)}};
  const Circuit c = circuit(1, {});
  for (std::size_t k = 0; k < rows.size(); ++k) {
    const auto& [state, basis, outcome] = rows[k];
    OpenqasmInput in = input(c);
    in.prepares = true;
    in.preparation = {{0, state}};
    in.measurement = Measurement{basis, {0}};
    Vector v{1, 0};
    for (const std::string& line : sample::lines(statements(back::write_openqasm(in)))) {
      if (line == "// evolution") {
        CHECK(std::abs(std::conj(states[k][0]) * v[0] + std::conj(states[k][1]) * v[1]) ==
              doctest::Approx(1.0));
      }
      if (line.find(" q[0];") != std::string::npos && line.find('=') == std::string::npos) {
        v = apply(line.substr(0, line.find(' ')), v);
      }
    }
    CHECK(std::norm(v[static_cast<std::size_t>(outcome)]) == doctest::Approx(1.0));
  }
}

TEST_CASE("gates outside stdgates.inc are defined once where they occur and only there") {
  const Circuit c = circuit(2, {{{two(GateKind::rzz, 0, 1, {0.5}), two(GateKind::rzz, 1, 0, {-0.5}),
                                  two(GateKind::iswap, 0, 1)},
                                 1}});
  const std::string text = back::write_openqasm(input(c));
  CHECK(text.find("// native: iswap rzz\n") != std::string::npos);
  const std::string definitions = body(text).substr(0, body(text).find("qubit["));
  std::vector<std::string> heads;
  std::size_t ends = 0;
  // A definition uses only gates of stdgates.inc, its own qubits and its own parameter.
  static const std::regex head(R"(gate (iswap|rzz)(\([a-z]+\))? a, b \{)");
  static const std::regex statement(
      R"(  (h|s|sdg|sx|x|y|z|cx|cz|(gphase|rx|ry|rz)\([-+*/0-9a-z. ]*\)) ?(a|b|a, b|b, a)?;)");
  for (const std::string& line : sample::lines(definitions)) {
    std::smatch match;
    if (std::regex_match(line, match, head)) heads.push_back(match[1]);
    if (line == "}") ++ends;
    if (line[0] == ' ') CHECK_MESSAGE(std::regex_match(line, statement), line);
  }
  CHECK(heads == std::vector<std::string>{"iswap", "rzz"});
  CHECK(ends == 2);
  CHECK(statements(text) == "rzz(0.5) q[0], q[1];\nrzz(-0.5) q[1], q[0];\niswap q[0], q[1];\n");
}

TEST_CASE("the definition of a ZZ rotation") {
  // exp(-i t Z(x)Z / 2): the parity lies on b between the two controlled nots (any textbook).
  static const std::regex expected(
      R"(include "stdgates.inc";
gate rzz\(([a-z]+)\) a, b \{
  cx a, b;
  rz\(\1\) b;
  cx a, b;
\}
qubit\[2\] q;
rzz\(0.5\) q\[0\], q\[1\];
)");
  const Circuit c = circuit(2, {{{two(GateKind::rzz, 0, 1, {0.5})}, 1}});
  CHECK(std::regex_match(body(back::write_openqasm(input(c))), expected));
}

TEST_CASE("the native gate is named where no gate could show it") {
  const Circuit c = circuit(1, {{{one(GateKind::h, 0)}, 1}});
  CHECK(back::write_openqasm(input(c)).find("// native: cz\n") != std::string::npos);
}

TEST_CASE("angles are float literals that read back as the same double") {
  // FloatLiteral of the specification's lexer (qasm3Lexer.g4), without digit separators.
  static const std::regex literal(R"(-?(\d+[eE][+-]?\d+|(\.\d+|\d+\.\d*)([eE][+-]?\d+)?))");
  std::mt19937_64 random(11);
  std::vector<double> values{0.0,  -0.0,   1.0,   -3.0, pi, std::nextafter(-pi, 0.0),
                             1e-5, 1e-300, 5e-324};
  std::uniform_real_distribution<double> angle(-3.14, 3.14);
  for (int k = 0; k < 2000; ++k) values.push_back(std::ldexp(angle(random), -(k % 200)));
  Segment segment;
  for (const double value : values) segment.gates.push_back(one(GateKind::rz, 0, {value}));
  const Circuit c = circuit(1, {segment});
  const auto rows = sample::lines(statements(back::write_openqasm(input(c))));
  REQUIRE(rows.size() == values.size());
  for (std::size_t k = 0; k < rows.size(); ++k) {
    REQUIRE(rows[k].substr(0, 3) == "rz(");
    const std::string text = rows[k].substr(3, rows[k].find(')') - 3);
    CHECK_MESSAGE(std::regex_match(text, literal), text);
    CHECK(base::parse_double(text) == values[k]);
    // 17 significant digits are enough for any double (IEEE 754).
    std::size_t digits = 0;
    for (const char ch : text.substr(0, text.find('e'))) digits += ch >= '0' && ch <= '9' ? 1 : 0;
    if (std::abs(values[k]) >= 1.0) CHECK(digits <= 17);
  }
  CHECK(rows[1] == "rz(0.0) q[0];");
  CHECK(rows[2] == "rz(1.0) q[0];");
}

TEST_CASE("no global phase statement for exactly zero") {
  Circuit c = circuit(1, {{{one(GateKind::h, 0)}, 1}});
  c.global_phase = -0.0;
  CHECK(back::write_openqasm(input(c)).find("gphase") == std::string::npos);
  c.global_phase = pi;
  CHECK(statements(back::write_openqasm(input(c))) == "gphase(3.141592653589793);\nh q[0];\n");
}

TEST_CASE("flat text is looped text run out, one statement a line") {
  std::mt19937_64 random(5);
  for (int round = 0; round < 20; ++round) {
    const Circuit c =
        circuit(4, {random_segment(random, 4, 7, 1), random_segment(random, 4, 9, 31),
                    random_segment(random, 4, 3, 2), random_segment(random, 4, 5, 1)});
    OpenqasmInput in = input(c);
    in.barriers = round % 2 == 0 ? Barriers::none : Barriers::steps;
    in.prepares = round % 3 == 0;
    const std::string flat = back::write_openqasm(in);
    in.style = Style::looped;
    const std::string looped = back::write_openqasm(in);
    CHECK(run_out(body(looped)) == sample::lines(body(flat)));
    for (const std::string& line : sample::lines(flat + looped)) {
      if (line.substr(0, 2) == "//") continue;
      CHECK(std::count(line.begin(), line.end(), ';') <= 1);
      CHECK((line.back() == ';' || line.back() == '{' || line == "}"));
    }
    CHECK(flat.back() == '\n');
  }
}

TEST_CASE("odd names cannot break out of the comments") {
  const Circuit c = circuit(1, {});
  OpenqasmInput in = input(c);
  in.job = "a\nqubit[9] r;\r\x1b[0m \xff";
  in.command = "compile b\n.pauli";
  const std::string text = back::write_openqasm(in);
  CHECK(text.find("\n// job: a qubit[9] r;  [0m ?\n") != std::string::npos);
  CHECK(text.find("\n// command: compile b .pauli\n") != std::string::npos);
  CHECK(sample::lines(text).size() == 22);
}

TEST_CASE("the automatic style") {
  CircuitCounts counts;
  counts.one_qubit_gates = 60'000;
  counts.two_qubit_gates = 40'000;
  const Circuit repeats = circuit(1, {{{one(GateKind::h, 0)}, 100'000}});
  const Circuit single = circuit(1, {{{one(GateKind::h, 0)}, 1}, {{}, 7}});
  CHECK(back::chosen_style(Style::automatic, repeats, counts) == Style::flat);
  ++counts.one_qubit_gates;
  CHECK(back::chosen_style(Style::automatic, repeats, counts) == Style::looped);
  CHECK(back::chosen_style(Style::automatic, single, counts) == Style::flat);
  CHECK(back::chosen_style(Style::flat, repeats, counts) == Style::flat);
  CHECK(back::chosen_style(Style::looped, single, counts) == Style::looped);
}

TEST_CASE("broken circuits are internal faults") {
  const auto write = [](const Circuit& c) { return back::write_openqasm(input(c)); };
  const auto with = [](Gate gate) { return circuit(2, {{{gate}, 1}}); };
  CHECK_THROWS_AS(write(with(one(GateKind::turn, 0, {1.0}))), InternalFault);
  CHECK_THROWS_AS(write(with(two(GateKind::canonical, 0, 1, {0.1}))), InternalFault);
  CHECK_THROWS_AS(write(with(one(GateKind::h, 2))), InternalFault);
  CHECK_THROWS_AS(write(with(one(GateKind::cx, 1))), InternalFault);
  CHECK_THROWS_AS(write(with(two(GateKind::rz, 0, 1, {0.1}))), InternalFault);
  CHECK_THROWS_AS(write(with(one(GateKind::rz, 0, {-pi}))), InternalFault);
  CHECK_THROWS_AS(write(with(one(GateKind::rz, 0, {std::nan("")}))), InternalFault);
  CHECK_THROWS_AS(write(circuit(0, {})), InternalFault);
  Circuit c = circuit(2, {});
  c.layout_out = {0, 2};
  CHECK_THROWS_AS(write(c), InternalFault);
  c = circuit(2, {});
  c.global_phase = 4.0;
  CHECK_THROWS_AS(write(c), InternalFault);
  CHECK_THROWS_AS(back::write_openqasm(input(circuit(1, {}), Style::automatic)), InternalFault);
  OpenqasmInput in = input(c);
  c.global_phase = 0.0;
  in.measurement = Measurement{Basis::z, {2}};
  CHECK_THROWS_AS(back::write_openqasm(in), InternalFault);
}

TEST_CASE("flat text beyond any memory is refused") {
  const Circuit c = circuit(1, {{{one(GateKind::h, 0)}, ~std::uint64_t{0}}});
  try {
    back::write_openqasm(input(c));
    FAIL("nothing was thrown");
  } catch (const UserError& error) {
    CHECK(error.code() == ExitCode::refused);
  }
}
