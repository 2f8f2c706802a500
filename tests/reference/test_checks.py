"""Tests of the checks themselves: right circuits pass, and each kind of wrong circuit is caught.

Also tests of the Pauli reader, of the distances, and of the closed forms against exact evolution.
"""

import cmath
import math
import os
import tempfile
import unittest

import numpy as np
import scipy.linalg

import check_circuit
import closed_forms
import models
import pauli
import qasm
from check_circuit import check, fnv1a

# H = 0.25 Z0 Z1 + 0.5 X2 - 0.3 Z0 + 1 at time 0.8: the terms commute, so the circuit is exact.
HAMILTONIAN = pauli.parse("qubits 3\n0.25 Z0 Z1\n0.5 X2\n-0.3 Z0\n1 I")
TIME = 0.8
HEADER = {
    "farrier": "0.1.0",
    "job": "hand-made",
    "hamiltonian": "0" * 16,
    "command": "compile hand-made.pauli --time 0.8",
    "inputs": "0" * 16,
    "time": "0.8",
    "formula": "exact",
    "steps": "1",
    "assurance": "certified",
    "certified-error": "0",
    "tolerance": "0.001",
    "two-qubit-gates": "2",
    "gates": "5",
    "depth": "4",
    "two-qubit-depth": "2",
    "native": "cx",
    "layout-in": "0 1 2",
    "layout-out": "0 1 2",
}
DECLARED = 'include "stdgates.inc";\nqubit[3] q;\n'
EVOLUTION = """gphase(-0.8);
cx q[0], q[1];
rz(0.4) q[1];
cx q[0], q[1];
rx(0.8) q[2];
rz(-0.48) q[0];
"""
SUMMARY = """<summary program="farrier" version="0.1.0" verb="compile" job="hand-made">
  <point index="0" time="0.8">
    <plan formula="exact" order="0" steps="1"/>
    <error assurance="certified" metric="{metric}" bound="0" measured="1e-16"/>
    <circuit file="a.qasm" style="flat" gates="5" one-qubit-gates="3" two-qubit-gates="2"
      rotations="{rotations}" t-rotations="3" depth="4" two-qubit-depth="2" qubits="3" swaps="0"
      layout-in="0 1 2" layout-out="0 1 2"/>
    <gate name="rx" count="1"/><gate name="rz" count="2"/><gate name="cx" count="2"/>
  </point>
</summary>
"""


def circuit(body=EVOLUTION, header=None, declared=DECLARED, digest=None, **changes):
    """A circuit as bytes; keyword changes of header values use _ for -."""
    rows = dict(header or HEADER)
    rows.update({key.replace("_", "-"): value for key, value in changes.items()})
    head = "OPENQASM 3.0;\n" + "".join(f"// {key}: {value}\n" for key, value in rows.items())
    text = (declared + body).encode()
    return f"{head}// body: {digest or fnv1a(text)}\n".encode() + text


def failures(data, hamiltonian=HAMILTONIAN, time=TIME, summary=None):
    return check(data, "a.qasm", hamiltonian, time, summary).failures


class Checks(unittest.TestCase):
    def caught(self, data, words, **options):
        found = failures(data, **options)
        self.assertTrue(any(words in failure for failure in found), f"{words!r} not in {found}")

    def edited(self, old, new, **changes):
        self.assertIn(old, EVOLUTION)
        return circuit(EVOLUTION.replace(old, new, 1), **changes)

    def test_a_right_circuit_passes(self):
        report = check(circuit(), "a.qasm", HAMILTONIAN, TIME)
        self.assertEqual(report.failures, [])
        self.assertLess(report.figures["error"], 1e-14)
        self.assertEqual(failures(self.edited("0.4", "2*0.2")), [])

    def test_wrong_operators(self):
        for old, new in (
            ("rz(0.4)", "rz(0.4000001)"), ("rz(0.4)", "rz(-0.4)"), ("rx(0.8)", "ry(0.8)"),
            ("rx(0.8) q[2]", "rx(0.8) q[1]"), ("cx q[0], q[1]", "cx q[1], q[0]"),
            ("gphase(-0.8)", "gphase(0.8)"), ("gphase(-0.8);\n", ""),
            ("rz(-0.48) q[0];\n", ""), ("cx q[0], q[1];\n", ""),
        ):
            self.caught(self.edited(old, new), "true error")
        self.caught(circuit(), "true error", hamiltonian=pauli.parse("qubits 3\n0.25 Z0 Z1"))
        self.caught(circuit(time="0.9"), "time 0.9")
        self.caught(circuit(time="-0.8"), "true error", time=-0.8)

    def test_errors_are_measured_in_the_metric_of_the_header(self):
        wrong_phase = {"body": EVOLUTION.replace("gphase(-0.8)", "gphase(0.1)")}
        self.caught(circuit(**wrong_phase), "true error")
        command = HEADER["command"] + " --up-to-phase"
        self.assertEqual(failures(circuit(command=command, **wrong_phase)), [])
        # One eigenvalue of eight is off by the angle a: spectral 2 sin(a/2), average that / sqrt 8.
        body = EVOLUTION.replace("cx q[0], q[1];\n", "ccz q[0], q[1], q[2];\ncx q[0], q[1];\n", 1)
        gate = "gate ccz a, b, c { h c; ccx a, b, c; h c; }\n"
        data = circuit(body, declared=DECLARED.replace("qubit", gate + "qubit"), native="cx ccz")
        program = qasm.read(data.decode())
        actual, wanted = check_circuit.circuit_operator(
            program, [[0, 1, 2]] * 2, HAMILTONIAN.evolution(TIME))
        self.assertAlmostEqual(pauli.spectral_distance(actual, wanted), 2)
        self.assertAlmostEqual(pauli.frobenius_distance(actual, wanted), 2 / math.sqrt(8))

    def test_wrong_headers(self):
        self.caught(circuit(gates="6"), "recount 5")
        self.caught(circuit(two_qubit_gates="3"), "recount 2")
        self.caught(circuit(depth="3"), "depth 3")
        self.caught(circuit(two_qubit_depth="1"), "two-qubit-depth 1")
        self.caught(circuit(certified_error="0.002"), "exceeds 0.001")
        self.caught(circuit(digest="0" * 16), "body digest")
        self.caught(circuit() + b"\n", "body digest")
        swapped = dict(sorted(HEADER.items()))
        self.caught(circuit(header=swapped), "header keys")
        missing = {key: value for key, value in HEADER.items() if key != "inputs"}
        self.caught(circuit(header=missing), "header keys")
        self.caught(circuit(layout_in="0 1"), "layout-in")
        self.caught(circuit(layout_in="0 1 1"), "layout-in")
        self.caught(circuit(layout_out="0 1 3"), "layout-out")
        self.caught(circuit(native="cz"), "not native")
        self.caught(circuit().replace(b"3.0", b"3.1", 1), "first line")
        self.caught(circuit("h q[9];\n"), "unreadable")
        self.caught(circuit(time="soon"), "is incomplete")
        self.assertEqual(failures(circuit(tolerance="none", certified_error="1e-2")), [])

    def test_wrong_frames(self):
        self.caught(self.edited("rz(0.4)", "rz(0.4 + 4*pi)"), "leave (-pi, pi]")
        self.caught(self.edited("gphase(-0.8);", "gphase(-0.4);\ngphase(-0.4);"), "gphase")
        self.caught(self.edited("cx q[0], q[1];\n", "cx q[0], q[1]; "), "several statements")
        self.caught(self.edited("gphase", "reset q;\ngphase"), "unreadable")
        runnable = "// preparation\nx q[1];\nreset q;\n// evolution\n" + EVOLUTION
        self.caught(circuit(runnable), "starts with a reset")
        late = "gate g a {\n  x a;\n}\n"
        self.caught(self.edited("rx(0.8)", late + "rx(0.8)"), "after the first statement")
        self.caught(circuit(declared="qubit[3] q;\ninclude \"stdgates.inc\";\n"), "the include")

    def test_native_definitions(self):
        body = EVOLUTION.replace("cx q[0], q[1];\nrz(0.4) q[1];\ncx q[0], q[1];",
                                 "rzz(0.4) q[0], q[1];")
        counts = {"two_qubit_gates": "1", "gates": "3", "depth": "2", "two_qubit_depth": "1"}
        for turn, words in (("theta", None), ("-theta", "definition of rzz")):
            gate = f"gate rzz(theta) a, b {{ cx a, b; rz({turn}) b; cx a, b; }}\nqubit"
            data = circuit(body, declared=DECLARED.replace("qubit", gate), native="rzz", **counts)
            if words:
                self.caught(data, words)
            else:
                self.assertEqual(failures(data), [])

    def test_native_matrices(self):
        """The closed products against exponentials of Pauli sums; ecr against its signs."""
        for name, parameters, text, time in (
            ("rzz", (0.7,), "1 ZZ", 0.35),
            ("rxx", (0.7,), "1 XX", 0.35),
            ("iswap", (), "1 XX\n1 YY", -math.pi / 4),
        ):
            actual = check_circuit.NATIVE_MATRICES[name](*parameters)
            np.testing.assert_allclose(actual, pauli.parse(text).evolution(time), atol=1e-15)
        expected = pauli.parse("1 XI\n-1 YX").matrix() / math.sqrt(2)
        np.testing.assert_allclose(check_circuit.NATIVE_MATRICES["ecr"](), expected)

    def test_layouts(self):
        """Qubits 0, 1, 2 start on the wires 2, 0, 1 and end on 0, 1, 2 or 3."""
        moved = """gphase(-0.8);
cx q[2], q[0];
rz(0.4) q[0];
cx q[2], q[0];
rx(0.8) q[1];
rz(-0.48) q[2];
"""
        self.assertEqual(failures(circuit(moved, layout_in="2 0 1", layout_out="2 0 1")), [])
        self.caught(circuit(moved, layout_in="2 0 1"), "true error")
        swaps = moved + "swap q[0], q[3];\n"
        counts = {"two_qubit_gates": "3", "gates": "6", "two_qubit_depth": "3", "native": "cx swap"}
        wide = DECLARED.replace("[3]", "[4]")
        layouts = {"layout_in": "2 0 1", "layout_out": "2 3 1"}
        self.assertEqual(failures(circuit(swaps, declared=wide, **layouts, **counts)), [])
        layouts["layout_out"] = "2 0 1"
        self.caught(circuit(swaps, declared=wide, **layouts, **counts), "true error")
        spare = moved + "x q[3];\n"
        layouts["gates"] = "6"
        self.caught(circuit(spare, declared=wide, **layouts), "true error")

    def test_programs_that_measure(self):
        """The global phase belongs to the evolution, so it stands behind the reset."""
        body = ("// preparation\nreset q;\nx q[1];\n// evolution\n" + EVOLUTION
                + "// measurement\nh q[0];\nc[0] = measure q[{}];\nc[1] = measure q[1];\n")
        declared = DECLARED + "bit[3] c;\n"
        self.assertEqual(failures(circuit(body.format(0), declared=declared)), [])
        self.caught(circuit(body.format(2), declared=declared), "disagree with layout-out")
        early = "gphase(-0.8);\n" + body.format(0).replace("gphase(-0.8);\n", "")
        self.caught(circuit(early, declared=declared), "before the first region")

    def test_summary(self):
        with tempfile.TemporaryDirectory() as folder:
            path = os.path.join(folder, "s.xml")
            for values, words in (
                ({"rotations": 3, "metric": "spectral norm"}, None),
                ({"rotations": 2, "metric": "spectral norm"}, "summary says"),
            ):
                with open(path, "w", encoding="utf-8") as file:
                    file.write(SUMMARY.format(**values))
                found = failures(circuit(), summary=path)
                self.assertEqual(bool(found), bool(words), found)
                self.assertTrue(not words or words in found[0])
            with open(path, "w", encoding="utf-8") as file:
                file.write(SUMMARY.format(rotations=3, metric="norm up to a global phase"))
            data = self.edited("-0.8", "0.1")
            self.assertEqual(failures(data, summary=path), [])
            with open(path, "w", encoding="utf-8") as file:
                file.write("<summary><point><circuit/></point></summary>")
            self.caught(circuit(), "is incomplete", summary=path)

    def test_digest(self):  # test vectors of draft-eastlake-fnv
        self.assertEqual(fnv1a(b""), "cbf29ce484222325")
        self.assertEqual(fnv1a(b"a"), "af63dc4c8601ec8c")
        self.assertEqual(fnv1a(b"foobar"), "85944171f73967e8")


class PauliSums(unittest.TestCase):
    def test_forms(self):
        text = "# one\nqubits 3\n0.5 Z2 X0 # sparse\r\n-1.5e-1 ZIX\n2 I\n1 III\n.5+0i X0 Z2 I1\n"
        result = pauli.parse(text)
        self.assertEqual(result.terms, {"XIZ": 1.0, "ZIX": -0.15, "III": 3.0})
        again = pauli.parse(result.text())
        self.assertEqual(again.terms, result.terms)
        self.assertEqual(pauli.parse("1 X2").qubits, 3)
        self.assertEqual(pauli.parse("1 X").qubits, 1)

    def test_refused(self):
        for text in ("", "1 X0 Y0", "qubits 2\n1 X2", "nan X0", "inf X0", "1+2i X0",
                     "qubits 0\n1 I", "1 XX\n1 XXX", "1 XX\n1 Z2", "1 W0", "X0", "1",
                     "1 X0\nqubits 1", "1e999 X0"):
            with self.assertRaises(pauli.PauliError, msg=text):
                pauli.parse(text)

    def test_matrix(self):
        """Qubit 0 is the most significant bit."""
        x, z = np.array([[0, 1], [1, 0]]), np.diag([1, -1])
        expected = 0.5 * np.kron(x, z) + 2 * np.eye(4)
        np.testing.assert_allclose(pauli.parse("0.5 X0 Z1\n2 I").matrix(), expected)
        turn = pauli.parse("0.5 X0 Z1\n2 I").evolution(0.3)
        np.testing.assert_allclose(turn, scipy.linalg.expm(-0.3j * expected), atol=1e-14)

    def test_distances(self):
        first = models.random_two_local(3, 1).evolution(1.0)
        second = np.diag(np.exp(1j * np.array([0.3] * 7 + [0.5]))) @ first
        self.assertAlmostEqual(pauli.spectral_distance(first, second), 2 * math.sin(0.25))
        up_to_phase = pauli.spectral_distance_up_to_phase(first, second)
        self.assertAlmostEqual(up_to_phase, 2 * math.sin(0.05))
        mean = math.sqrt((7 * 4 * math.sin(0.15) ** 2 + 4 * math.sin(0.25) ** 2) / 8)
        self.assertAlmostEqual(pauli.frobenius_distance(first, second), mean)
        overlap = abs(7 + cmath.exp(0.2j)) / 8
        least = pauli.frobenius_distance_up_to_phase(first, second)
        self.assertAlmostEqual(least, math.sqrt(2 - 2 * overlap))
        self.assertAlmostEqual(pauli.spectral_distance_up_to_phase(first, -first), 0)


class ClosedForms(unittest.TestCase):
    """Each formula against the exact evolution of a prepared state."""

    @staticmethod
    def ones(model, time, state):
        """P(qubit k = 1), from a basis state given by its bits."""
        index = int("".join(map(str, state)), 2)
        weights = np.abs(model.evolution(time)[:, index]) ** 2
        weights = weights.reshape((2,) * model.qubits)
        return [weights.take(1, axis=k).sum() for k in range(model.qubits)]

    @staticmethod
    def expectation(model, time, state, operator):
        final = model.evolution(time) @ state
        return np.vdot(final, operator.matrix() @ final).real

    def test_basis_states(self):
        ring, heisenberg = models.exchange([0.5] * 7, ring=True), ("XX", "YY", "ZZ")
        for model, time, wanted in (
            (models.state_transfer(5), math.pi / 8, closed_forms.mirror_line(5, math.pi / 8)),
            (models.state_transfer(4), 0.3, closed_forms.mirror_line(4, 0.3)),
            (ring, 1.0, closed_forms.magnon_ring(7, 1.0, 1.0)),
            (models.exchange([0.5] * 6, heisenberg, True), 1.2,
             closed_forms.magnon_ring(6, 1.0, 1.2)),
        ):
            start = [1] + [0] * (model.qubits - 1)
            np.testing.assert_allclose(self.ones(model, time, start), wanted, atol=1e-12)
        pair = models.exchange([1.0], heisenberg)
        self.assertAlmostEqual(self.ones(pair, 0.37, [1, 0])[1], closed_forms.exchange_pair(0.37))
        rabi = models.one_qubit(0.65, 0.35)
        self.assertAlmostEqual(self.ones(rabi, 2.1, [0])[0], closed_forms.rabi(1.3, 0.7, 2.1))

    def test_expectations(self):
        plus = np.full(256, 1 / 16)
        ring = models.ising_ring(8, 1.0, 0.5)
        actual = self.expectation(ring, 0.8, plus, pauli.parse("qubits 8\n1 X3"))
        self.assertAlmostEqual(actual, closed_forms.ising_quench(8, 1.0, 0.5, 0.8))
        actual = self.expectation(pauli.parse("1 ZZ"), 0.4, np.full(4, 0.5), pauli.parse("1 XI"))
        self.assertAlmostEqual(actual, closed_forms.ising_pair(0.4))
        states = {"zero": (1, 0), "one": (0, 1), "plus": (1, 1), "minus": (1, -1),
                  "plus-i": (1, 1j), "minus-i": (1, -1j)}
        for name, amplitudes in states.items():
            start = np.array(amplitudes) / np.linalg.norm(amplitudes)
            for axis in "XYZ":
                for basis in "XYZ":
                    turn, letter = pauli.parse(f"0.7 {axis}"), pauli.parse(f"1 {basis}")
                    actual = self.expectation(turn, 1.3, start, letter)
                    wanted = closed_forms.precession(name, 0.7, axis, basis.lower(), 1.3)
                    self.assertAlmostEqual(actual, wanted)


if __name__ == "__main__":
    unittest.main()
