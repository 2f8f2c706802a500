"""Tests of the reader, the gate matrices, the simulator and the counts.

Expected facts are those of the OpenQASM 3 specification, named beside each check, or elementary.
"""

import cmath
import math
import unittest

import numpy as np
import scipy.linalg

import qasm
from counts import count
from qasm_tokens import QasmError
from qasm_tree import regions
from simulate import bit_probabilities, definition_matrix, final_state, unitary
from stdgates import STDGATES, X, Y, Z, gate_matrix, u_matrix

FRAME = 'OPENQASM 3.0;\ninclude "stdgates.inc";\n'
PI = math.pi


def program(body, qubits=2):
    return qasm.read(f"{FRAME}qubit[{qubits}] q;\n{body}\n")


def matrix(body, qubits=2):
    return unitary(program(body, qubits))


def angle(expression):
    """The value of an expression, by way of a gphase."""
    return program(f"gphase({expression});").statements[0].angle


class Reader(unittest.TestCase):
    def refuses(self, text, line=None):
        with self.assertRaises(QasmError) as caught:
            qasm.read(text)
        if line is not None:
            self.assertEqual(caught.exception.line, line)

    def test_version(self):  # comments.rst, "Version string"
        self.assertEqual(qasm.read("// first\nOPENQASM 3.0;\nqubit[1] q;").version, "3.0")
        self.assertEqual(qasm.read("OPENQASM 3;").version, "3")
        self.assertEqual(qasm.read("qubit[1] q;").version, "")
        self.refuses("OPENQASM 2.0;")
        self.refuses("OPENQASM 3.0;\nOPENQASM 3.0;", 2)
        self.refuses("qubit[1] q;\nOPENQASM 3.0;", 2)

    def test_header_and_comments(self):
        text = "OPENQASM 3.0;\n// job: a: b\n// empty:\n//odd\nqubit[1] q; // evolution\n"
        result = qasm.read(text)
        self.assertEqual(result.header, [("job", "a: b"), ("empty", ""), ("", "odd")])
        self.assertEqual(result.comments, [(5, " evolution")])

    def test_white_space_and_comments_are_free(self):
        text = "OPENQASM 3.0;\r\n/* a\r\n;;; */ qubit\t[2]\r\nq ;\r\n"
        self.assertEqual(qasm.read(text).qubits, 2)
        self.refuses("qubit[1] q; /* /* */ */")  # block comments do not nest

    def test_numbers(self):  # lexer grammar
        for text, value in (
            ("1_000", 1000), ("0x1F", 31), ("0b101", 5), ("0o17", 15),
            (".5", 0.5), ("5.", 5.0), ("1e-3", 1e-3), ("1.5E+2", 150.0), ("1_0.2_5", 10.25),
        ):
            self.assertEqual(angle(text), value)
        for text in ("1__0", "1_", "0xg", "1e", "2pi", "1 s", "1.5 ns", "3dt", "2im", "1e400"):
            with self.assertRaises(QasmError, msg=text):
                angle(text)

    def test_expressions(self):  # classical.rst, "Integers" and the table of precedence
        for text, value in (
            ("1/2", 0), ("3/4*pi", 0.0), ("-7/2", -3), ("pi/2", PI / 2), ("1.0/2", 0.5),
            ("-2**2", -4), ("2**3**2", 512), ("2.0**-1", 0.5), ("2.0**-1*4", 2.0),
            ("2-3-4", -5), ("8/2/2", 2), ("2*(3+4)", 14), ("1- -1", 2), ("--1", 1),
            ("π", PI), ("tau", 2 * PI), ("ℇ", math.e), ("2+3*4", 14),
        ):
            self.assertEqual(angle(text), value, text)
            self.assertIs(type(angle(text)), type(value), text)
        refused = ("+0.5", "1 + +1", "inf", "nan", "sin(1)", "1/0", "1.0/0", "2**-1", "(-1.0)**0.5",
                   "", "1 2", "(1", "1)", "~1", "1 % 2", "1e300*1e300", "x")
        for text in refused:
            with self.assertRaises(QasmError, msg=text):
                angle(text)

    def test_statements_that_are_refused(self):
        for body in (
            ";", "h q[0];;", "h q[0]", "h q[2];", "h q[-1];", "h q;", "h q[k];", "h q[0:1];",
            "cx q[0], q[0];", "cx q[0];", "rz q[0];", "rz() q[0];", "h(1) q[0];", "foo q[0];",
            "gphase 0.3;", "gphase(0.3) q[0];", "ctrl @ x q[0], q[1];", "inv @ s q[0];",
            "qubit[1] r;", "qubit r;", "bit c;", "int k;", "let a = q;", "if (true) x q[0];",
            "while (true) { }", "delay[10ns] q[0];", "box { }", "pragma a", "@a\nx q[0];",
            "for k in [0:3] { x q[0]; }", "for uint k in [0:2:4] { }", "for uint k in {1} { }",
            "for uint k in [0:3] x q[0];", "for uint k in [0:n] { }", "for uint x in [0:3] { }",
            "for uint k in [0:3] { reset q; }", "for uint k in [0:3] { rz(k) q[0]; }",
            "for uint k in [0:3] { for uint k in [0:3] { } }",
            "for uint k in [0:3] { qubit[1] r; }",
            "x $0;", "gate x a { }", "gate U a { }", "gate g { }", "gate g a { h a; } gate g a { }",
            "gate g a { reset a; }", "gate g a { x q[0]; }", "gate g a { x a[0]; }",
            "gate g(a) a { }", "gate g a, a { }", "gate g a { g a; }", "gate g a { later a; }",
            "gate g a { gate k b { } }", "measure q;", "measure q -> c;", "x q[0], ,;",
            "{ x q[0]; }",
            'include "stdgates.inc";', 'include "other.inc";', "reset;", "include stdgates.inc;",
        ):
            with self.assertRaises(QasmError, msg=body):
                program(body)
        self.refuses("qubit[1] q;\nh q[0];", 2)  # no stdgates without the include
        self.refuses('gate x a { }\ninclude "stdgates.inc";', 2)  # clashes with the library
        self.refuses("x q[0];\nqubit[1] q;", 1)
        self.refuses("qubit q[3];")  # types.rst
        self.refuses("qubit[0] q;")
        self.refuses("qubit[1] gphase;")
        self.refuses(f"{FRAME}qubit[1] $0;")
        self.refuses("qubit[1] a\u00b2;")  # category No may not stand in names

    def test_statements_that_are_taken(self):
        result = program(
            "gate turn(a, b,) u, v, { rz(a/2) u; for int k in [1:2] { rz(-b) v; } gphase(a); }"
            "bit[2] c; reset q; turn(1, 0.5,) q[0], q[1],; barrier; barrier q; barrier q[0], q[1];"
            "c = measure q; measure q[0] -> c[0]; c[1] = measure q[1]; for uint[8] k in [3:2] { }"
        )
        self.assertEqual([s.__class__.__name__ for s in result.statements],
                         "Reset Call Barrier Barrier Barrier Measure Measure Measure Loop".split())
        self.assertEqual(result.statements[5].pairs, ((0, 0), (1, 1)))
        self.assertEqual(result.statements[8].count, 0)  # types.rst: start > stop is empty

    def test_physical_qubits(self):  # types.rst, "Physical Qubits"
        result = qasm.read(f"{FRAME}cx $7, $3;\nbarrier $3, $7;")
        self.assertEqual(result.wires, (3, 7))
        expected = np.kron(X, np.diag([0, 1])) + np.kron(np.eye(2), np.diag([1, 0]))
        np.testing.assert_allclose(unitary(result), expected)


class Gates(unittest.TestCase):
    """gates.rst "Built-in gates" and standard_library.rst."""

    def same(self, actual, expected):
        np.testing.assert_allclose(actual, expected, atol=1e-15)

    def test_u(self):
        hadamard = gate_matrix("h", ())
        self.same(u_matrix(PI, 0, PI), 1j * X)
        self.same(u_matrix(PI / 2, 0, PI), cmath.exp(0.25j * PI) * hadamard)
        self.same(u_matrix(0, 0, 0.7), np.diag([1, cmath.exp(0.7j)]))
        self.same(u_matrix(0.3 + 2 * PI, 0.4, 0.5), u_matrix(0.3, 0.4, 0.5))
        cosine, sine = math.cos(0.15), math.sin(0.15)
        second = np.array([[cosine, -cmath.exp(0.5j) * sine],
                           [cmath.exp(0.4j) * sine, cmath.exp(0.9j) * cosine]])
        self.same(u_matrix(0.3, 0.4, 0.5), cmath.exp(0.15j) * second)

    def test_phases_of_the_library(self):
        self.assertEqual(len(STDGATES), 32)
        sx, rz = gate_matrix("sx", ()), gate_matrix("rz", (0.9,))
        self.same(sx @ sx, X)
        self.assertAlmostEqual(np.linalg.det(sx), 1j)
        self.assertAlmostEqual(np.linalg.det(rz), 1)
        self.same(rz, cmath.exp(-0.45j) * gate_matrix("p", (0.9,)))
        self.same(np.linalg.matrix_power(gate_matrix("t", ()), 2), gate_matrix("s", ()))
        self.same(gate_matrix("s", ()) @ gate_matrix("sdg", ()), np.eye(2))
        for name, letter in (("rx", X), ("ry", Y), ("rz", Z)):
            self.same(gate_matrix(name, (0.9,)), scipy.linalg.expm(-0.45j * letter))
        self.same(gate_matrix("u3", (0.3, 0.4, 0.5)),
                  cmath.exp(-0.6j) * u_matrix(0.3, 0.4, 0.5))
        self.same(gate_matrix("u2", (0.4, 0.5)), gate_matrix("u3", (PI / 2, 0.4, 0.5)))
        self.same(gate_matrix("u1", (0.4,)), gate_matrix("phase", (0.4,)))

    def test_library_by_its_own_definitions(self):  # examples/stdgates.inc
        for name, body in (
            ("x", "U(pi, 0, pi) q[0]; gphase(-pi/2);"),
            ("y", "U(pi, pi/2, pi/2) q[0]; gphase(-pi/2);"),
            ("h", "U(pi/2, 0, pi) q[0]; gphase(-pi/4);"),
        ):
            self.same(matrix(body, 1), gate_matrix(name, ()))
        self.same(matrix("U(0.6, -pi/2, pi/2) q[0]; gphase(-0.3);", 1), gate_matrix("rx", (0.6,)))
        self.same(matrix("gphase(-0.3); U(0, 0, 0.6) q[0];", 1), gate_matrix("rz", (0.6,)))
        self.same(matrix("cx q[0], q[1]; cx q[1], q[0]; cx q[0], q[1];"), gate_matrix("swap", ()))

    def test_controls_come_first(self):
        for name, inner in (("cx", X), ("cy", Y), ("cz", Z), ("ch", gate_matrix("h", ()))):
            self.same(gate_matrix(name, ()), scipy.linalg.block_diag(np.eye(2), inner))
        self.same(gate_matrix("cp", (0.4,)), np.diag([1, 1, 1, cmath.exp(0.4j)]))
        crz = np.diag([1, 1, cmath.exp(-0.2j), cmath.exp(0.2j)])
        self.same(gate_matrix("crz", (0.4,)), crz)
        self.same(gate_matrix("cu", (0.1, 0.2, 0.3, 0.4))[2:, 2:],
                  cmath.exp(0.4j) * u_matrix(0.1, 0.2, 0.3))
        self.same(gate_matrix("ccx", ()) @ np.eye(8)[6], np.eye(8)[7])
        self.same(gate_matrix("cswap", ()) @ np.eye(8)[5], np.eye(8)[6])


class Simulator(unittest.TestCase):
    def test_first_qubit_is_most_significant(self):
        np.testing.assert_allclose(matrix("x q[0];"), np.kron(X, np.eye(2)))
        np.testing.assert_allclose(matrix("cx q[1], q[0];") @ np.eye(4)[1], np.eye(4)[3])

    def test_gates_act_in_the_order_of_the_text(self):
        np.testing.assert_allclose(matrix("s q[0]; x q[0];", 1), X @ np.diag([1, 1j]))

    def test_random_circuit_against_plain_products(self):
        """Against products of full matrices that are built by Kronecker products."""
        generator = np.random.default_rng(1)
        expected, lines = np.eye(16, dtype=complex), []
        for _ in range(200):
            a, b = map(int, generator.choice(4, 2, replace=False))
            turn = float(generator.normal())
            lines.append(f"cx q[{a}], q[{b}]; ry({turn}) q[{a}]; cz q[{b}], q[{a}];")
            for factors in (self.on(a, np.diag([1, 0])) + self.on(a, np.diag([0, 1]), b, X),
                            scipy.linalg.expm(-0.5j * turn * self.on(a, Y)),
                            self.on(a, np.diag([1, 0])) + self.on(a, np.diag([0, 1]), b, Z)):
                expected = factors @ expected
        lines.append("ccx q[3], q[0], q[2]; rz(0.1) q[2];")
        expected = (np.eye(16) + self.on(3, np.diag([0, 1]), 0, np.diag([0, 1]))
                    @ (self.on(2, X) - np.eye(16))) @ expected
        expected = scipy.linalg.expm(-0.05j * self.on(2, Z)) @ expected
        np.testing.assert_allclose(matrix("".join(lines), 4), expected, atol=1e-13)

    @staticmethod
    def on(*placed):
        factors = dict(zip(placed[::2], placed[1::2]))
        product = np.eye(1)
        for k in range(4):
            product = np.kron(product, factors.get(k, np.eye(2)))
        return product

    def test_loops_include_both_ends(self):  # classical.rst, "For loops"
        body = "rx(0.1) q[0]; cx q[0], q[1]; gphase(0.2);"
        np.testing.assert_allclose(
            matrix(f"h q[1]; for uint k in [2:6] {{ {body} }} s q[0];"),
            matrix("h q[1];" + body * 5 + "s q[0];"), atol=1e-14)
        np.testing.assert_allclose(matrix("for uint k in [0:2] { for int j in [1:5] { t q[0]; } }"),
                                   matrix("t q[0];" * 15), atol=1e-14)

    def test_definitions_keep_their_phase(self):
        text = "gate g(a) u, v { gphase(a); cx v, u; rz(2*a) u; }"
        expected = cmath.exp(0.3j) * matrix("cx q[1], q[0]; rz(0.6) q[0];")
        np.testing.assert_allclose(matrix(f"{text} g(0.3) q[0], q[1];"), expected)
        np.testing.assert_allclose(definition_matrix(program(text), "g", (0.3,)), expected)

    def test_states_and_bits(self):
        bell = program("reset q; h q[0]; cx q[0], q[1]; barrier q;")
        np.testing.assert_allclose(final_state(bell), np.array([1, 0, 0, 1]) / math.sqrt(2))
        for body in ("h q[0];", "reset q[0]; h q[1];", "h q[0]; reset q;",
                     "bit[2] c; reset q; c = measure q; x q[0];"):
            with self.assertRaises(QasmError):
                final_state(program(body))
        crossed = program("bit[3] c; reset q; x q[1]; c[2] = measure q[1]; measure q[0] -> c[0];")
        expected = np.zeros((2, 2, 2))
        expected[0, 0, 1] = 1
        np.testing.assert_allclose(bit_probabilities(crossed), expected)
        marks = "reset q;\nx q[0];\n// evolution\nh q[0];\n// measurement\nc = measure q;"
        parts = regions(program(f"bit[2] c;\n// preparation\n{marks}"))
        self.assertEqual([len(parts[name]) for name in parts], [2, 1, 1])
        with self.assertRaises(QasmError):
            regions(program("reset q; x q[0];"))


class Counting(unittest.TestCase):
    def test_rules(self):
        body = """gate pair(a) u, v { cx u, v; rz(a) v; cx u, v; }
            gphase(0.1); h q[0]; pair(0.3) q[0], q[1]; barrier q; U(pi/2, 0.3, pi/4) q[2];
            rz(-pi/2) q[2]; rx(pi/2 + 4e-13) q[2]; rx(pi/2 + 4e-12) q[2]; pair(pi/4) q[1], q[2];"""
        opened = count(program(body, 3), ["cx"])
        self.assertEqual((opened.one_qubit_gates, opened.two_qubit_gates, opened.gates), (7, 4, 11))
        self.assertEqual((opened.depth, opened.two_qubit_depth), (7, 4))
        self.assertEqual((opened.rotations, opened.t_rotations), (5, 3))
        closed = count(program(body, 3), ["pair"])
        self.assertEqual(closed.by_name, {"h": 1, "pair": 2, "U": 1, "rz": 1, "rx": 2})
        self.assertEqual((closed.depth, closed.two_qubit_depth, closed.two_qubit_gates), (5, 2, 2))
        with self.assertRaises(QasmError):
            count(program("ccx q[0], q[1], q[2];", 3), ["cx"])

    def test_loops_count_as_their_expansion(self):
        """Bodies that are staggered, disconnected, nested, or touch only some wires."""
        staircase = "".join(f"cx q[{k}], q[{k + 1}]; rz(0.1) q[{k}];" for k in range(4))
        bodies = (staircase, "x q[0]; x q[1]; x q[1]; cx q[3], q[5]; cx q[2], q[4]; h q[2];",
                  "cx q[0], q[1]; cx q[1], q[2]; x q[0]; cx q[4], q[5]; x q[4]; x q[4];", "")
        for body in bodies:
            for times in (1, 2, 7, 30):
                around = "h q[0]; cx q[5], q[3]; {} cx q[0], q[5]; x q[1];"
                looped = around.format(f"for uint k in [1:{times}] {{ {body} }}")
                nested = around.format(
                    f"for uint k in [1:1] {{ for uint j in [1:{times}] {{ {body} }} }}")
                flat = count(program(around.format(body * times), 6), ["cx"])
                self.assertEqual(count(program(looped, 6), ["cx"]), flat)
                self.assertEqual(count(program(nested, 6), ["cx"]), flat)

    def test_a_million_passes(self):
        body = "".join(f"cx q[{k}], q[{k + 1}];" for k in range(9))
        result = count(program(f"for uint k in [1:1000000] {{ {body} }}", 10), ["cx"])
        self.assertEqual(result.two_qubit_gates, 9_000_000)
        self.assertEqual(result.depth, 2 * 999_999 + 9)  # passes follow each other two gates apart


if __name__ == "__main__":
    unittest.main()
