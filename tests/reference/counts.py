"""An independent recount of a program.

Rules: loops and gate definitions are expanded to gates of stdgates.inc, U, and the gates that are
named as native; gphase, barriers, reset and measurement are not counted, nor is anything outside
the evolution; barriers do not align depth. A rotation is an angle that is no multiple of pi/2 (to
1e-12), a t-rotation one that is no multiple of pi/4; each of the three angles of a U counts.
"""

import math
from collections import Counter
from dataclasses import dataclass, field

import numpy as np

from qasm_tokens import QasmError
from qasm_tree import Call, Loop, instantiate, regions

_NEVER = -(2**62)  # "no path", far below any depth and far from overflow when two are added
_MULTIPLE = 1e-12


@dataclass
class Counts:
    one_qubit_gates: int = 0
    two_qubit_gates: int = 0
    rotations: int = 0
    t_rotations: int = 0
    depth: int = 0
    two_qubit_depth: int = 0
    by_name: Counter = field(default_factory=Counter)

    @property
    def gates(self):
        return self.one_qubit_gates + self.two_qubit_gates


def count(program, native):
    """Counts the evolution of a program; `native` holds the names that count as one gate."""
    statements = regions(program)["evolution"]
    result = Counts()
    _count(program, statements, frozenset(native), 1, result)
    result.depth = _depth(program, statements, native, False)
    result.two_qubit_depth = _depth(program, statements, native, True)
    return result


def expanded(program, statements, native):
    """The calls of primitive gates and the loops, definitions expanded."""
    for statement in statements:
        if isinstance(statement, Call) and is_expanded(program, statement.name, native):
            body = instantiate(
                program.gates[statement.name], statement.parameters, statement.wires
            )
            yield from expanded(program, body, native)
        elif isinstance(statement, (Call, Loop)):
            yield statement


def is_expanded(program, name, native):
    """Whether the inside of a gate counts, and not the gate."""
    return name in program.gates and name not in native


def _is_multiple(angle, unit):
    return abs(angle - unit * round(angle / unit)) <= _MULTIPLE


def _count(program, statements, native, times, result):
    for statement in expanded(program, statements, native):
        if isinstance(statement, Loop):
            _count(program, statement.body, native, times * statement.count, result)
            continue
        if len(statement.wires) > 2:
            raise QasmError(statement.line, f"{statement.name} is a gate on more than two qubits")
        if len(statement.wires) == 1:
            result.one_qubit_gates += times
        else:
            result.two_qubit_gates += times
        result.by_name[statement.name] += times
        for angle in statement.parameters:
            result.rotations += 0 if _is_multiple(angle, math.pi / 2) else times
            result.t_rotations += 0 if _is_multiple(angle, math.pi / 4) else times


# Depth. A run of gates acts on the depths reached on the wires as a linear map of the algebra in
# which sum means maximum and product means addition (Baccelli, Cohen, Olsder, Quadrat,
# "Synchronization and Linearity", 1992, chapter 3). So a loop is a power of one matrix, taken by
# repeated squaring, and costs no more for 10^6 passes than for 20.


def _product(left, right):
    """Max-plus product: (m, k) and (k, n) -> (m, n)."""
    rows = [np.max(row[:, None] + right, axis=0) for row in left]
    return np.maximum(np.array(rows), _NEVER)


def _identity(size):
    result = np.full((size, size), _NEVER, dtype=np.int64)
    np.fill_diagonal(result, 0)
    return result


def _power(matrix, exponent):
    result = _identity(len(matrix))
    while exponent:
        if exponent & 1:
            result = _product(result, matrix)
        matrix = _product(matrix, matrix) if exponent > 1 else matrix
        exponent >>= 1
    return result


def _wires_of(statements):
    found = set()
    for statement in statements:
        if isinstance(statement, Call):
            found.update(statement.wires)
        elif isinstance(statement, Loop):
            found |= _wires_of(statement.body)
    return found


def _depth(program, statements, native, two_qubit_only):
    """The longest chain of gates that share wires."""
    reached = {wire: 0 for wire in program.wires}
    _advance(program, statements, frozenset(native), two_qubit_only, reached)
    return int(max(reached.values(), default=0))


def _advance(program, statements, native, two_qubit_only, reached):
    """Runs statements on `reached`: wire -> depth, or wire -> row of path lengths (int64 array)."""
    for statement in expanded(program, statements, native):
        if isinstance(statement, Loop):
            _advance_loop(program, statement, native, two_qubit_only, reached)
        elif len(statement.wires) == 2:
            first, second = statement.wires
            longest = np.maximum(reached[first], reached[second]) + 1
            reached[first] = reached[second] = longest
        elif not two_qubit_only:
            reached[statement.wires[0]] = reached[statement.wires[0]] + 1


def _advance_loop(program, loop, native, two_qubit_only, reached):
    wires = sorted(_wires_of(loop.body))
    rows = dict(zip(wires, _identity(len(wires))))
    _advance(program, loop.body, native, two_qubit_only, rows)
    body = np.array([rows[wire] for wire in wires])
    power = _power(body, loop.count)
    before = np.array([np.atleast_1d(reached[wire]) for wire in wires])
    after = _product(power, before)
    for wire, row in zip(wires, after):
        reached[wire] = row if isinstance(reached[wire], np.ndarray) else int(row[0])
