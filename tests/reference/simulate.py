"""What a program does: its unitary matrix, its final state, its measured bits.

Convention, used in every file here: the first wire (the lowest index) is the most significant bit
of a row or column index, so a product operator is np.kron in the order of the wires. The global
phase is kept throughout. At most 10 wires.
"""

import numpy as np

from qasm_tokens import QasmError
from qasm_tree import Barrier, Call, Loop, Measure, Phase, Reset, instantiate
from stdgates import gate_matrix

MAX_WIRES = 10
_IDENTITY = np.eye(2)


def apply(matrix, places, tensor, wires):
    """Applies a gate from the left.

    matrix: (2**k, 2**k) for k one or more different `places` (positions among the wires, the first
    is the gate's most significant bit); tensor: (2**wires, m); returns the same shape.
    """
    columns = tensor.shape[1]
    if len(places) == 1:
        parts = tensor.reshape(2 ** places[0], 2, -1)
        return np.matmul(matrix, parts).reshape(-1, columns)
    axes = tensor.reshape((2,) * wires + (columns,))
    front = np.moveaxis(axes, places, range(len(places)))
    result = (matrix @ front.reshape(len(matrix), -1)).reshape(front.shape)
    return np.moveaxis(result, range(len(places)), places).reshape(-1, columns)


class _Runner:
    """Applies statements to a tensor of shape (2**wires, m), m = 1 for a state.

    One- and two-qubit gates are gathered into blocks on at most two wires first: `open` holds, for
    each place, the block [places, matrix] that gathers gates there, or nothing.
    """

    def __init__(self, program, wires, tensor):
        if len(wires) > MAX_WIRES:
            raise ValueError(f"{len(wires)} wires are more than {MAX_WIRES}")
        self.program = program
        self.wires = wires
        self.place = {wire: place for place, wire in enumerate(wires)}
        self.tensor = tensor
        self.phase = 0.0
        self.open = {}

    def run(self, statements):
        for statement in statements:
            if isinstance(statement, Call):
                self.call(statement)
            elif isinstance(statement, Phase):
                self.phase += statement.angle
            elif isinstance(statement, Loop):
                self.loop(statement)
            elif not isinstance(statement, Barrier):
                raise QasmError(statement.line, "reset or measure inside unitary statements")

    def call(self, statement):
        definition = self.program.gates.get(statement.name)
        if definition is not None:
            return self.run(instantiate(definition, statement.parameters, statement.wires))
        matrix = gate_matrix(statement.name, statement.parameters)
        self.gather([self.place[wire] for wire in statement.wires], matrix)

    def loop(self, statement):
        """The body's matrix to the power of the count, by repeated squaring."""
        size = len(self.tensor)
        body = _Runner(self.program, self.wires, np.eye(size, dtype=complex))
        body.run(statement.body)
        self.flush()
        self.tensor = np.linalg.matrix_power(body.finish(), statement.count) @ self.tensor

    def gather(self, places, matrix):
        if len(places) > 2:
            self.flush()
            self.tensor = apply(matrix, places, self.tensor, len(self.wires))
            return
        block = self.open.get(places[0])
        if block is None or any(self.open.get(p) is not block for p in places):
            block = self.merged_block(places)
        block[1] = _widened(matrix, places, block[0]) @ block[1]

    def merged_block(self, places):
        """A block on exactly these places that has swallowed what one-place blocks hold there."""
        block = [tuple(places), np.eye(2 ** len(places), dtype=complex)]
        for place in places:
            old = self.open.get(place)
            if old is not None and len(old[0]) == 1:
                block[1] = _widened(old[1], old[0], block[0]) @ block[1]
            elif old is not None:
                self.close(old)
            self.open[place] = block
        return block

    def close(self, block):
        self.tensor = apply(block[1], block[0], self.tensor, len(self.wires))
        for place in block[0]:
            self.open.pop(place, None)

    def flush(self):
        while self.open:
            self.close(next(iter(self.open.values())))

    def finish(self):
        """The tensor after all that has been run, global phase included."""
        self.flush()
        return np.exp(1j * self.phase) * self.tensor


def _widened(matrix, places, target):
    """A gate on one or two places as a matrix on the one or two places of `target`."""
    if tuple(places) == tuple(target):
        return matrix
    if len(places) == 2:  # the same two in the other order
        return matrix.reshape(2, 2, 2, 2).transpose(1, 0, 3, 2).reshape(4, 4)
    if places[0] == target[0]:
        return (matrix[:, None, :, None] * _IDENTITY[None, :, None, :]).reshape(4, 4)
    return (_IDENTITY[:, None, :, None] * matrix[None, :, None, :]).reshape(4, 4)


def unitary(program, statements=None, wires=None):
    """The matrix, shape (2**w, 2**w), of `statements` (default: all) on `wires` (default: all)."""
    wires = tuple(program.wires if wires is None else wires)
    runner = _Runner(program, wires, np.eye(2 ** len(wires), dtype=complex))
    runner.run(program.statements if statements is None else statements)
    return runner.finish()


def definition_matrix(program, name, parameters=()):
    """The matrix of a gate that the text defines, first operand most significant."""
    definition = program.gates[name]
    wires = tuple(range(definition.qubits))
    return unitary(program, instantiate(definition, parameters, wires), wires)


def final_state(program):
    """The state before the first measurement, shape (2**w,), from |0...0>.

    Qubits start undefined (types.rst, "Qubits"), so every wire must be reset before its first gate,
    and nothing but measurement and barriers may follow a measurement.
    """
    fresh, unitary_part, measured = set(), [], False
    for statement in program.statements:
        if isinstance(statement, Reset):
            if unitary_part or measured:
                raise QasmError(statement.line, "a reset after the start is not simulated")
            fresh |= set(statement.wires)
        elif isinstance(statement, Measure):
            measured = True
        elif not isinstance(statement, Barrier):
            if measured:
                raise QasmError(statement.line, "a gate after a measurement is not simulated")
            unitary_part.append(statement)
    if fresh != set(program.wires):
        raise QasmError(1, "not every qubit is reset at the start")
    start = np.zeros((2 ** len(program.wires), 1), dtype=complex)
    start[0, 0] = 1
    runner = _Runner(program, program.wires, start)
    runner.run(unitary_part)
    return runner.finish()[:, 0]


def bit_probabilities(program):
    """The joint distribution of the bits, shape (2,)*bits, axis k for c[k]; unmeasured bits are 0.

    Each bit is written at most once.
    """
    axes = {wire: axis for axis, wire in enumerate(program.wires)}
    weights = np.abs(final_state(program).reshape((2,) * len(axes))) ** 2
    source = {}
    for statement in program.statements:
        for wire, bit in statement.pairs if isinstance(statement, Measure) else ():
            if bit in source or wire in source.values():
                raise QasmError(statement.line, "a bit or qubit is measured twice")
            source[bit] = wire
    kept = [axes[source[bit]] for bit in sorted(source)]
    others = tuple(axis for axis in range(len(axes)) if axis not in kept)
    marginal = weights.sum(axis=others)
    ranks = [sorted(kept).index(axis) for axis in kept]
    marginal = marginal.transpose(ranks)
    result = np.zeros((2,) * program.bits)
    result[tuple(slice(None) if bit in source else 0 for bit in range(program.bits))] = marginal
    return result
