"""The main check of the built program: circuits in, true errors and physics out.

    main_job.py FARRIER [--only WORD] [--keep FOLDER]

Runs the program on Hamiltonians that are written here and compares what it emits with exact
evolution and with closed forms. Shares no code with the program. The tables are in cases.py.
"""

import argparse
import math
import os
import subprocess
import sys
import tempfile

import numpy as np

import cases
import check_circuit
import pauli
import qasm
from simulate import bit_probabilities

EXACT = 1e-9  # certified errors of exact evolutions may hold some rounding
TIMEOUT = 120
SLOPE_RANGE = (3e-9, 2e-2)  # above the rounding of doubles, and small enough for the leading term
SLOPE_MARGIN = 0.25


class Trouble(Exception):
    """The program did not do what a case needs."""


class Tester:
    """Runs farrier and keeps the score."""

    def __init__(self, program, folder, only):
        self.program = program
        self.folder = folder
        self.only = only
        self.passed = self.failed = self.serial = 0
        self.evolutions = {}

    def run(self, group, row, procedure):
        """One case: `procedure` returns a list of failures."""
        name = f"{group}: {row.name}"
        if self.only not in name:
            return
        try:
            failures = procedure(row)
        except Trouble as trouble:
            failures = [str(trouble)]
        for failure in failures:
            print(f"FAILED {name}: {failure}")
        self.passed += not failures
        self.failed += bool(failures)

    def evolution(self, model, time):
        """The exact evolution, computed once."""
        key = (id(model), time)
        if key not in self.evolutions:
            self.evolutions[key] = model.evolution(time)
        return self.evolutions[key]

    def call(self, arguments):
        command = [self.program, "compile"] + arguments
        try:
            done = subprocess.run(command, capture_output=True, text=True, timeout=TIMEOUT)
        except subprocess.TimeoutExpired:
            raise Trouble(f"{' '.join(command)} took more than {TIMEOUT} s") from None
        if done.returncode != 0:
            said = done.stderr.strip()[-600:]
            raise Trouble(f"{' '.join(command)} ended with {done.returncode}: {said}")

    def write_input(self, text, suffix):
        self.serial += 1
        path = os.path.join(self.folder, f"{self.serial:03d}{suffix}")
        with open(path, "w", encoding="utf-8") as file:
            file.write(text)
        return path

    def emit(self, source, options):
        """Compiles a file; returns (name, bytes, path of the summary)."""
        stem = source.rsplit(".", 1)[0]
        circuit, summary = stem + ".qasm", stem + ".summary.xml"
        self.call([source, *options, "-o", circuit, "--summary", summary])
        with open(circuit, "rb") as file:
            return os.path.basename(circuit), file.read(), summary

    def compile(self, row, options):
        """Compiles a row's model and checks the circuit; returns its Report."""
        source = self.write_input(row.model.text(), ".pauli")
        return self.checked(row, source, [*options.split(), "--time", repr(row.time)])[1]

    def checked(self, row, source, options):
        """Compiles a file and checks the circuit; returns (bytes, Report)."""
        name, data, summary = self.emit(source, options)
        target = self.evolution(row.model, row.time)
        return data, check_circuit.check(data, name, row.model, row.time, summary, target)

    # Procedures

    def case(self, row):
        report = self.compile(row, row.options)
        if row.exact and report.figures.get("certified", 1) > EXACT:
            report.failures.append(f"an exact evolution is certified at {report.figures}")
        if row.time == 0 and report.figures.get("gates"):
            report.failures.append(f"no time, but {report.figures['gates']} gates")
        return report.failures

    def repeat(self, row):
        source = self.write_input(row.model.text(), ".pauli")
        options = [*row.options.split(), "--time", repr(row.time)]
        first = self.emit(source, options + ["--threads", "1"])
        again = self.emit(source, options + ["--threads", "2"])
        return [] if first == again else ["a second run with two threads gave other bytes"]

    def style_pair(self, row):
        flat = self.compile(row, row.options + " --style flat")
        looped = self.compile(row, row.options + " --style looped")
        failures = flat.failures + looped.failures
        if failures:
            return failures
        distance = pauli.spectral_distance(flat.operator, looped.operator)
        gates = [report.figures["gates"] for report in (flat, looped)]
        if distance > check_circuit.rounding(gates[0]):
            failures.append(f"flat and looped text differ by {distance:.3g}")
        if gates[0] != gates[1]:
            failures.append(f"{gates[0]} gates flat, {gates[1]} looped")
        return failures

    def slope(self, row):
        points, failures = [], []
        for steps in row.steps:
            options = f"--formula {row.formula} --steps {steps} --style looped"
            report = self.compile(row, options)
            failures += report.failures
            error = report.figures.get("error", math.nan)
            if SLOPE_RANGE[0] <= error <= SLOPE_RANGE[1]:
                points.append((math.log(steps), math.log(error)))
        if len(points) < 3:
            return failures + [f"only {len(points)} errors lie within {SLOPE_RANGE}"]
        slope = -np.polyfit(*np.transpose(points), 1)[0]
        if abs(slope - row.order) > SLOPE_MARGIN:
            failures.append(f"the error falls with the power {slope:.3f}, not {row.order}")
        return failures

    def experiment(self, row):
        source = self.write_input(job_text(row), ".xml")
        data, report = self.checked(row, source, row.options.split())
        if report.failures:
            return report.failures
        weights = bit_probabilities(qasm.read(data.decode()))
        slack = 2 * report.figures["certified"] + check_circuit.rounding(report.figures["gates"])
        for bit, wanted in enumerate(row.ones):
            if wanted is None:
                continue
            ones = float(weights.take(1, axis=bit).sum())
            if abs(ones - wanted) > slack:
                report.failures.append(f"P(c[{bit}] = 1) is {ones}, not {wanted}, +- {slack:.3g}")
        return report.failures


def job_text(row):
    """The job file of an experiment."""
    lines = ["<job>", f'  <hamiltonian qubits="{row.model.qubits}">']
    for word, coefficient in row.model.terms.items():
        factors = " ".join(f"{letter}{k}" for k, letter in enumerate(word) if letter != "I")
        lines.append(f'    <term coefficient="{coefficient!r}">{factors or "I"}</term>')
    lines += ["  </hamiltonian>", f'  <evolution time="{row.time!r}"/>', "  <prepare>"]
    for state, qubits in row.prepared.items():
        lines.append(f'    <{state} qubits="{" ".join(map(str, qubits))}"/>')
    measured = [str(k) for k, wanted in enumerate(row.ones) if wanted is not None]
    qubits = "all" if len(measured) == len(row.ones) else " ".join(measured)
    lines += ["  </prepare>", f'  <measure basis="{row.basis}" qubits="{qubits}"/>', "</job>"]
    return "\n".join(lines) + "\n"


def run_all(tester):
    for row in cases.CASES:
        tester.run("circuit", row, tester.case)
    for row in cases.REPEATS:
        tester.run("repeat", row, tester.repeat)
    for row in cases.STYLE_PAIRS:
        tester.run("styles", row, tester.style_pair)
    for row in cases.SLOPES:
        tester.run("slope", row, tester.slope)
    for row in cases.EXPERIMENTS:
        tester.run("experiment", row, tester.experiment)


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("program")
    parser.add_argument("--only", default="", help="run the cases whose name holds this")
    parser.add_argument("--keep", help="folder for the files, kept afterwards")
    options = parser.parse_args()
    with tempfile.TemporaryDirectory() as temporary:
        if options.keep:
            os.makedirs(options.keep, exist_ok=True)
        folder = options.keep or temporary
        tester = Tester(os.path.abspath(options.program), folder, options.only)
        run_all(tester)
    print(f"{tester.passed} passed, {tester.failed} failed")
    return 1 if tester.failed or not tester.passed else 0


if __name__ == "__main__":
    sys.exit(main())
