"""Compiles every sample and checks the circuit against a Hamiltonian that is written here anew.

    samples.py FARRIER SAMPLES

Of the job files only the time and the options count for the check; the Hamiltonians below follow
from the comments in them. Shares no code with the program.
"""

import itertools
import math
import os
import subprocess
import sys
import tempfile

sys.path.insert(0, os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "reference"))

import check_circuit
import pauli

MHZ_US = 2 * math.pi  # radians a microsecond for 1 MHz: angular frequency is 2 pi f
MASK = (1 << 64) - 1


def mersenne_twister_64(seed):
    """The draws of std::mt19937_64 (C++20, [rand.eng.mers] and [rand.predef])."""
    state = [seed]
    for k in range(1, 312):
        state.append((6364136223846793005 * (state[-1] ^ (state[-1] >> 62)) + k) & MASK)
    while True:
        for k in range(312):
            mixed = (state[k] >> 31 << 31) | (state[(k + 1) % 312] & 0x7FFFFFFF)
            turned = (mixed >> 1) ^ (0xB5026F5AA96619E9 if mixed & 1 else 0)
            state[k] = state[(k + 156) % 312] ^ turned
        for value in state:
            value ^= (value >> 29) & 0x5555555555555555
            value ^= (value << 17) & 0x71D67FFFEDA60000
            value ^= (value << 37) & 0xFFF7EEE000000000 & MASK
            yield value ^ (value >> 43)


def check_generator():
    """The standard states the 10000th draw of the default seed ([rand.predef])."""
    draw = next(itertools.islice(mersenne_twister_64(5489), 9999, None))
    return [] if draw == 9981545732273789042 else ["the generator of this test is wrong"]


def pairs_sum(qubits, pairs):
    """Adds (a, b, {letter: coefficient}) as coefficient * letter_a letter_b."""
    result = pauli.PauliSum(qubits)
    for a, b, couplings in pairs:
        for letter, coefficient in couplings.items():
            result.add_sparse({a: letter, b: letter}, coefficient)
    return result


def ladder_quench():
    leg, rung = ({letter: MHZ_US * value for letter in "XYZ"} for value in (0.05, 0.06))
    legs = [(2 * k + s, 2 * k + 2 + s, leg) for k in range(3) for s in range(2)]
    return pairs_sum(8, legs + [(2 * k, 2 * k + 1, rung) for k in range(4)])


def dipolar_disorder():
    pairs = []
    for a, b in itertools.combinations(range(8), 2):
        if b - a <= 3:
            unit = MHZ_US * 0.04 / (b - a) ** 3
            pairs.append((a, b, {"X": unit, "Y": unit, "Z": -2 * unit}))
    result = pairs_sum(8, pairs)
    for site, draw in zip(range(8), mersenne_twister_64(7)):
        result.add_sparse({site: "Z"}, MHZ_US * (-0.1 + 0.2 * (draw >> 11) / 2**53))
    return result


def field_grid():
    sites = list(itertools.product(range(3), range(3)))
    pairs = [
        (x + 3 * y, u + 3 * v, {"Z": 1.0})
        for (x, y), (u, v) in itertools.product(sites, sites)
        if (u - x, v - y) in ((1, 0), (0, 1))
    ]
    result = pairs_sum(9, pairs)
    for site in range(9):
        result.add_sparse({site: "X"}, 0.7)
    return result


def dimer(folder):
    with open(os.path.join(folder, "dimer.pauli"), encoding="utf-8") as file:
        return pauli.parse(file.read())


def check_sample(program, source, hamiltonian, time, options):
    with tempfile.TemporaryDirectory() as scratch:
        circuit, summary = (os.path.join(scratch, name) for name in ("a.qasm", "a.xml"))
        command = [program, "compile", source, "-o", circuit, "--summary", summary, "-q"]
        done = subprocess.run(command + options, capture_output=True, text=True)
        if done.returncode != 0 or done.stderr:
            return [f"ended with {done.returncode}: {done.stderr.strip()}"]
        with open(circuit, "rb") as file:
            data = file.read()
        report = check_circuit.check(data, "a.qasm", hamiltonian, time, summary)
        print(os.path.basename(source), check_circuit.figures_line(report))
        return report.failures


def main():
    program, folder = map(os.path.abspath, sys.argv[1:])
    samples = {
        "ladder-quench.xml": (ladder_quench(), 2.0, []),
        "dipolar-disorder.xml": (dipolar_disorder(), 1.5, []),
        "field-grid.xml": (field_grid(), 1.0, []),
        "dimer.pauli": (dimer(folder), 1.0, ["--time", "1"]),
    }
    failures = check_generator()
    found = {name for name in os.listdir(folder) if name.endswith((".xml", ".pauli"))}
    if found != set(samples):
        failures.append(f"samples {sorted(found ^ set(samples))} are missing or not tested")
    for name, (hamiltonian, time, options) in samples.items():
        source = os.path.join(folder, name)
        found = check_sample(program, source, hamiltonian, time, options)
        failures += [f"{name}: {failure}" for failure in found]
    for failure in failures:
        print(f"FAILED {failure}")
    print(f"{len(samples)} samples, {len(failures)} failures")
    return 1 if failures else 0


if __name__ == "__main__":
    sys.exit(main())
