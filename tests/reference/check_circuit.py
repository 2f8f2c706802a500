"""Checks a circuit that farrier wrote against the Hamiltonian, with nothing of farrier's.

    check_circuit.py CIRCUIT.qasm HAMILTONIAN.pauli TIME [--summary SUMMARY.xml]

Checked are the frame of the text (header keys and their order, digest of the body, one statement a
line), layouts, angles, native gates, counts, the summary, and, up to 10 wires, that the true error
is at most the certified one. Prints one line of figures and a line for each failure; exit code 0 or
1.
"""

import argparse
import math
import os
import re
import sys
import xml.etree.ElementTree as ElementTree
from dataclasses import dataclass, field

import numpy as np

import pauli
import qasm
from counts import count, is_expanded
from qasm_tokens import QasmError
from qasm_tree import Call, Loop, Measure, Phase, Reset, instantiate, regions
from simulate import MAX_WIRES, definition_matrix, unitary
from stdgates import X, Y, Z

HEADER_KEYS = """farrier job hamiltonian command inputs time formula steps assurance certified-error
    tolerance two-qubit-gates gates depth two-qubit-depth native layout-in layout-out global-phase
    body""".split()
OPTIONAL_KEYS = {"global-phase"}

_XX, _YY, _ZZ = (np.kron(letter, letter) for letter in (X, Y, Z))


def _rotation(product, angle):
    """exp(-i angle product / 2) for a product of Pauli letters."""
    return math.cos(angle / 2) * np.eye(4) - 1j * math.sin(angle / 2) * product


# Native gates beyond stdgates.inc as farrier's manual defines them (common practice, no source).
# (XX + YY) has the eigenvalues 0, 0, 2, -2, and XX and YY commute.
NATIVE_MATRICES = {
    "rzz": lambda angle: _rotation(_ZZ, angle),
    "rxx": lambda angle: _rotation(_XX, angle),
    "iswap": lambda: _rotation(_XX, -math.pi / 2) @ _rotation(_YY, -math.pi / 2),
    "ecr": lambda: (np.kron(X, np.eye(2)) - np.kron(Y, X)) / math.sqrt(2),
}


@dataclass
class Report:
    figures: dict = field(default_factory=dict)
    failures: list = field(default_factory=list)
    operator: object = None  # of the evolution, (2**w, 2**w), up to 10 wires

    def expect(self, holds, message):
        if not holds:
            self.failures.append(message)


def fnv1a(data):
    """64-bit FNV-1a (draft-eastlake-fnv), as 16 hexadecimal digits."""
    state = 0xCBF29CE484222325
    for byte in data:
        state = ((state ^ byte) * 0x100000001B3) & 0xFFFFFFFFFFFFFFFF
    return f"{state:016x}"


def rounding(gates):
    """How far the doubles of simulation and text may be off over so many gates."""
    return 1e-11 + 5e-15 * gates


def walk(program, statements, native):
    """All statements with loops opened once and definitions of other than native gates expanded."""
    for statement in statements:
        if isinstance(statement, Loop):
            yield from walk(program, statement.body, native)
        elif isinstance(statement, Call) and is_expanded(program, statement.name, native):
            definition = program.gates[statement.name]
            body = instantiate(definition, statement.parameters, statement.wires)
            yield from walk(program, body, native)
        else:
            yield statement


def check_frame(data, program, report):
    """Version, header, digest, order of the parts, one statement a line."""
    report.expect(data.startswith(b"OPENQASM 3.0;\n"), "the first line is not OPENQASM 3.0;")
    keys = [key for key, _ in program.header]
    wanted = [key for key in HEADER_KEYS if key in keys or key not in OPTIONAL_KEYS]
    report.expect(keys == wanted, f"header keys are {keys}, not {wanted}")
    match = re.search(rb"^// body: ([0-9a-f]+)\n", data, re.MULTILINE)
    if match is None:
        report.failures.append("there is no body digest")
    else:
        digest = fnv1a(data[match.end() :])
        stated = match.group(1).decode()
        report.expect(stated == digest, f"body digest is {stated}, the bytes have {digest}")
        after = data[match.end() :].lstrip()
        report.expect(after.startswith(b"include"), "the header is not followed by the include")
    first = min((s.line for s in program.statements), default=math.inf)
    late = [d.name for d in program.gates.values() if d.line > first]
    report.expect(not late, f"gates defined after the first statement: {late}")
    lines = list(_lines(program.statements))
    shared = {line for line, following in zip(lines, lines[1:]) if line == following}
    report.expect(not shared, f"several statements on lines {sorted(shared)[:5]}")
    resets = [s for s in program.statements if isinstance(s, Reset)]
    starts = bool(program.statements) and isinstance(program.statements[0], Reset)
    runnable = bool(resets) or any(isinstance(s, Measure) for s in program.statements)
    report.expect(starts == runnable, "a runnable program starts with a reset, no other has one")


def _lines(statements):
    for statement in statements:
        yield statement.line
        if isinstance(statement, Loop):
            yield from _lines(statement.body)


def check_gates(program, native, report):
    """Angles in (-pi, pi], one gphase, only native gates on two qubits, native definitions."""
    statements = list(walk(program, program.statements, native))
    for statement in statements:
        angles = getattr(statement, "parameters", ())
        angles = (statement.angle,) if isinstance(statement, Phase) else angles
        if any(not -math.pi <= angle <= math.pi for angle in angles):
            report.failures.append(f"line {statement.line}: angles {angles} leave (-pi, pi]")
            break
    phases = sum(isinstance(s, Phase) for s in statements)
    at_top = sum(isinstance(s, Phase) for s in program.statements)
    report.expect(phases <= 1 and phases == at_top, f"{phases} gphase, {at_top} at the top level")
    calls = [s for s in statements if isinstance(s, Call)]
    foreign = {s.name for s in calls if len(s.wires) > 1} - native
    report.expect(not foreign, f"gates {sorted(foreign)} are not native")
    for name in sorted(native & set(program.gates) & set(NATIVE_MATRICES)):
        parameters = len(program.gates[name].parameters)
        for angle in (0.7, -2.1):
            expected = NATIVE_MATRICES[name](*[angle] * parameters)
            actual = definition_matrix(program, name, [angle] * parameters)
            distance = pauli.spectral_distance(actual, expected)
            report.expect(distance < 1e-14, f"definition of {name} is off by {distance:.3g}")


def check_counts(program, header, native, report):
    """Compares the recount with the header; returns the recount."""
    recount = count(program, native)
    for key in ("two-qubit-gates", "gates", "depth", "two-qubit-depth"):
        actual = getattr(recount, key.replace("-", "_"))
        if key == "gates" or key == "two-qubit-gates":
            report.figures[key] = actual
        stated = header.get(key)
        report.expect(stated == str(actual), f"header says {key} {stated}, recount {actual}")
    return recount


def check_layouts(program, header, qubits, report):
    """Reads both layouts; returns (at the start, at the end)."""
    layouts = []
    for key in ("layout-in", "layout-out"):
        layout = [int(word) for word in header.get(key, "").split()]
        good = len(layout) == len(set(layout)) == qubits
        good = good and (not program.qubits or max(layout) < program.qubits)
        report.expect(good, f"{key} {layout} does not place {qubits} qubits")
        layouts.append(layout if good else list(range(qubits)))
    wrong = [
        (wire, bit)
        for statement in program.statements
        if isinstance(statement, Measure)
        for wire, bit in statement.pairs
        if bit >= qubits or layouts[1][bit] != wire
    ]
    report.expect(not wrong, f"measured pairs (wire, bit) {wrong} disagree with layout-out")
    return layouts


def on_hamiltonian_qubits(matrix, wires, layout_in, layout_out):
    """Orders rows by layout_out and columns by layout_in, other wires last in rising order.

    matrix: (2**w, 2**w) on `wires`; returns (2**n, 2**s, 2**n, 2**s), n placed and s other wires.
    """
    count_in, others = len(layout_in), len(wires) - len(layout_in)
    axes = []
    for layout, shift in ((layout_out, 0), (layout_in, len(wires))):
        order = list(layout) + [wire for wire in wires if wire not in layout]
        axes += [shift + wires.index(wire) for wire in order]
    tensor = matrix.reshape((2,) * (2 * len(wires))).transpose(axes)
    return tensor.reshape((2**count_in, 2**others) * 2)


def circuit_operator(program, layouts, target, global_phase=0.0):
    """The evolution's operator on Hamiltonian qubits, beside the operator that it should be.

    Wires that hold no Hamiltonian qubit may only change places: their factor must be a permutation
    that keeps |0...0>, else it is taken as the identity and the distance shows it.
    Returns (actual, wanted), each (2**w, 2**w), or None beyond 10 wires.
    """
    wires = sorted(set(program.wires) | set(layouts[0]) | set(layouts[1]))
    if len(wires) > MAX_WIRES:
        return None
    matrix = np.exp(1j * global_phase) * unitary(program, regions(program)["evolution"], wires)
    tensor = on_hamiltonian_qubits(matrix, wires, *layouts)
    rest = np.eye(tensor.shape[1])
    if len(rest) > 1:
        overlap = np.einsum("ab,akbl->kl", target.conj(), tensor) / len(target)
        moved = (np.abs(overlap) > 0.5).astype(float)
        if (moved.sum(0) == 1).all() and (moved.sum(1) == 1).all() and moved[0, 0] == 1:
            rest = moved
    return tensor.reshape(matrix.shape), np.kron(target, rest)


def metric(header, point):
    """The distance that the certified error speaks of; `point` is that of the summary, or None."""
    words = header["command"]
    if point is not None:
        words += " " + point.find("error").get("metric", "")
    up_to_phase = "--up-to-phase" in words or "up to a global phase" in words
    if header["assurance"] == "average":
        return pauli.frobenius_distance_up_to_phase if up_to_phase else pauli.frobenius_distance
    return pauli.spectral_distance_up_to_phase if up_to_phase else pauli.spectral_distance


def check_error(program, header, layouts, target, distance, gates, report):
    """True error <= certified error <= tolerance; `target` is the exact evolution."""
    certified = float(header["certified-error"])
    report.figures["certified"] = certified
    if header["tolerance"] != "none":
        tolerance = report.figures["tolerance"] = float(header["tolerance"])
        report.expect(certified <= tolerance, f"certified {certified} exceeds {tolerance}")
    operators = circuit_operator(program, layouts, target, float(header.get("global-phase", 0)))
    if operators is None:
        return
    error = report.figures["error"] = distance(*operators)
    report.operator = operators[0]
    within = error <= certified + rounding(gates)
    report.expect(within, f"true error {error:.6g} exceeds the certified {certified:.6g}")


def summary_point(path, circuit_name, report):
    """The point of a summary that is about this circuit, or None."""
    points = ElementTree.parse(path).getroot().findall("point")
    files = [os.path.basename(point.find("circuit").get("file", "")) for point in points]
    named = [point for point, file in zip(points, files) if file == circuit_name]
    if not named and len(points) != 1:
        report.failures.append(f"{len(points)} points in the summary, none of {circuit_name}")
        return None
    return (named or points)[0]


def check_summary(point, header, recount, report):
    """The point of a summary says what the text says."""
    circuit = point.find("circuit")
    stated = {
        key: circuit.get(key)
        for key in """gates one-qubit-gates two-qubit-gates rotations t-rotations depth
            two-qubit-depth""".split()
    }
    actual = {key: str(getattr(recount, key.replace("-", "_"))) for key in stated}
    report.expect(stated == actual, f"summary says {stated}, recount {actual}")
    names = {row.get("name"): int(row.get("count")) for row in point.findall("gate")}
    by_name = dict(recount.by_name)
    report.expect(names == by_name, f"summary says {names}, recount {by_name}")
    for key in ("layout-in", "layout-out"):
        report.expect(circuit.get(key) == header[key], f"{key} differs between summary and header")
    plan, error = point.find("plan"), point.find("error")
    for key in ("formula", "steps"):
        report.expect(plan.get(key) == header[key], f"{key} differs between summary and header")
    bound, certified = float(error.get("bound")), float(header["certified-error"])
    report.expect(math.isclose(bound, certified, rel_tol=1e-5), f"bounds {bound}, {certified}")
    measured, own = error.get("measured"), report.figures.get("error")
    if measured and own is not None:
        slack = rounding(recount.gates) + 1e-4 * own
        report.expect(abs(float(measured) - own) <= slack, f"measured {measured}, here {own}")


def check(data, circuit_name, hamiltonian, time, summary=None, target=None):
    """Runs all checks on the bytes of a circuit and returns the Report.

    hamiltonian: pauli.PauliSum; target: its exact evolution where it is known already.
    """
    report = Report()
    try:
        program = qasm.read(data.decode("utf-8"))
        header = dict(program.header)
        check_frame(data, program, report)
        native = frozenset(re.findall(r"[^\s,]+", header["native"]))
        check_gates(program, native, report)
        recount = check_counts(program, header, native, report)
        stated = float(header["time"].split()[0])
        report.expect(stated == time, f"header says time {stated}, not {time}")
        layouts = check_layouts(program, header, hamiltonian.qubits, report)
        point = summary_point(summary, circuit_name, report) if summary else None
        if hamiltonian.qubits <= MAX_WIRES:
            target = hamiltonian.evolution(time) if target is None else target
            distance = metric(header, point)
            check_error(program, header, layouts, target, distance, recount.gates, report)
        if point is not None:
            check_summary(point, header, recount, report)
    except (QasmError, UnicodeDecodeError, ElementTree.ParseError) as fault:
        report.failures.append(f"unreadable: {fault}")
    except (KeyError, ValueError, AttributeError, TypeError) as fault:
        report.failures.append(f"header or summary is incomplete: {fault!r}")
    return report


def figures_line(report):
    return " ".join(f"{key}={value:.6g}" for key, value in report.figures.items())


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("circuit")
    parser.add_argument("hamiltonian")
    parser.add_argument("time", type=float)
    parser.add_argument("--summary")
    options = parser.parse_args()
    with open(options.circuit, "rb") as file:
        data = file.read()
    with open(options.hamiltonian, encoding="utf-8") as file:
        hamiltonian = pauli.parse(file.read())
    name = os.path.basename(options.circuit)
    report = check(data, name, hamiltonian, options.time, options.summary)
    print(figures_line(report))
    for failure in report.failures:
        print(f"{name}: {failure}")
    return 1 if report.failures else 0


if __name__ == "__main__":
    sys.exit(main())
