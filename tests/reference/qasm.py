"""A strict reader of the subset of OpenQASM 3 that a gate-level compiler may emit.

Read here: the version line, comments, include "stdgates.inc", one `qubit[n] q;` or physical qubits
`$k`, one `bit[n] c;`, `gate` definitions, gate calls, `gphase`, `for` over a literal range,
`barrier`, `reset` and both forms of `measure`. All else raises QasmError with the line. Source of
the grammar: qasm3Parser.g4 and the chapters of the OpenQASM 3 specification named below. Stricter
than the specification on purpose: no name is shadowed, gates are not broadcast over registers, and
indices and ranges are literals.
"""

import re
from dataclasses import dataclass
from typing import Callable

from qasm_cursor import CONSTANTS, Cursor
from qasm_tokens import QasmError
from qasm_tree import Barrier, Call, Definition, Loop, Measure, Phase, Program, Reset
from stdgates import BUILT_IN, STDGATES, signature

_HEADER = re.compile(r" ([a-z][a-z0-9-]*):(?: (.*))?")


def read(text):
    """Reads a text and returns its Program."""
    return _Reader(text).program()


@dataclass
class _Scope:
    """Where a statement stands: how a qubit is read, and the names of the inner scopes."""

    wire: Callable
    parameters: tuple = ()
    inner: tuple = ()
    in_gate: bool = False


class _Reader(Cursor):
    """Recursive descent; each method reads what its name says."""

    def __init__(self, text):
        super().__init__(text)
        self.result = Program()
        self.register = self.bit_register = None  # their names
        self.physical = set()
        self.readers = {
            "include": self.include,
            "qubit": self.qubit_declaration,
            "bit": self.bit_declaration,
            "gate": self.gate_definition,
            "reset": self.reset,
            "measure": self.measure_arrow,
        }

    # The file

    def program(self):
        result = self.result
        if self.text() == "OPENQASM":
            self.version()
        self.header()
        statements = []
        while self.kind() != "end":
            statement = self.global_statement()
            if statement is not None:
                statements.append(statement)
        result.statements = tuple(statements)
        result.wires = tuple(sorted(self.physical)) or tuple(range(result.qubits))
        return result

    def version(self):
        self.take("OPENQASM")
        _, text, line = self.next()
        if not re.fullmatch(r"3(\.[0-9]+)?", text):
            raise QasmError(line, f"{text!r} is no version 3 of OpenQASM")
        self.result.version = text
        self.take(";")

    def header(self):
        """The line comments between the version line and the next token are the header."""
        for line, text, before in self.comments:
            if before == self.place and self.result.version:
                match = _HEADER.fullmatch(text)
                pair = (match.group(1), match.group(2) or "") if match else ("", text)
                self.result.header.append(pair)
            else:
                self.result.comments.append((line, text))

    def global_statement(self):
        """A statement of the global scope; declarations yield None."""
        if self.text() in self.readers:
            return self.readers[self.text()]()
        if self.bit_register is not None and self.text() == self.bit_register:
            return self.measure_assignment()
        return self.unitary_statement(_Scope(self.wire))

    def include(self):
        line = self.line()
        self.take("include")
        name = self.take_kind("string", "a file name")[1:-1]
        self.take(";")
        if name != "stdgates.inc":
            raise QasmError(line, f"{name!r} cannot be included here; only stdgates.inc can")
        if self.result.stdgates:
            raise QasmError(line, "stdgates.inc is included twice")
        for clash in sorted(self.taken_names() & set(STDGATES)):
            raise QasmError(line, f"{clash!r} of stdgates.inc is already declared")
        self.result.stdgates = True

    def taken_names(self):
        """Names of the global scope (scope.rst, "Global scope")."""
        names = set(self.result.gates) | set(BUILT_IN) | set(CONSTANTS)
        names |= {self.register, self.bit_register} - {None}
        return names | set(STDGATES) if self.result.stdgates else names

    def new_name(self, others=()):
        line = self.line()
        name = self.take_kind("name", "a new name")
        if name in self.taken_names() or name in others:
            raise QasmError(line, f"{name!r} is already declared")
        return name

    def sized_declaration(self, word):
        line = self.line()
        self.take(word, "[")
        size = self.take_integer()
        self.take("]")
        name = self.new_name()
        self.take(";")
        if size < 1:
            raise QasmError(line, "an empty register is outside the subset")
        return name, size

    def qubit_declaration(self):
        if self.register is not None or self.physical:
            self.fail("no second set of qubits")
        self.register, self.result.qubits = self.sized_declaration("qubit")

    def bit_declaration(self):
        if self.bit_register is not None:
            self.fail("no second bit register")
        self.bit_register, self.result.bits = self.sized_declaration("bit")

    def gate_definition(self):
        """gates.rst, "Hierarchical gates definitions"."""
        line = self.line()
        self.take("gate")
        name = self.new_name()
        parameters, qubits = [], []
        if self.text() == "(":
            self.take("(")
            self.listed(lambda: parameters.append(self.new_name(parameters + [name])), ")")
            self.take(")")
        self.listed(lambda: qubits.append(self.new_name(parameters + qubits + [name])), "{")
        if not qubits:
            self.fail("at least one qubit of the gate")
        scope = _Scope(
            lambda: self.formal_wire(name, qubits),
            tuple(parameters),
            tuple(parameters + qubits + [name]),
            True,
        )
        body = self.block(scope)
        definition = Definition(line, name, tuple(parameters), len(qubits), body)
        self.result.gates[name] = definition

    def formal_wire(self, gate, qubits):
        line = self.line()
        name = self.take_kind("name", f"a qubit of gate {gate}")
        if name not in qubits:
            raise QasmError(line, f"{name!r} is no qubit of gate {gate}")
        return qubits.index(name)

    # Statements that may stand in blocks

    def block(self, scope):
        self.take("{")
        statements = []
        while self.text() != "}":
            statements.append(self.unitary_statement(scope))
        self.take("}")
        return tuple(statements)

    def unitary_statement(self, scope):
        """A call, gphase, for or (outside gate definitions) barrier."""
        line, text = self.line(), self.text()
        if text == "for":
            return self.loop(scope)
        if text == "gphase":
            self.take("gphase", "(")
            angle = self.expression(scope.parameters)
            self.take(")", ";")
            return Phase(line, angle)
        if text == "barrier" and not scope.in_gate:
            self.take("barrier")
            groups = self.listed(self.wires, ";")
            self.take(";")
            return Barrier(line, tuple(wire for group in groups for wire in group))
        return self.call(scope)

    def loop(self, scope):
        """Both ends of the range belong to it (classical.rst, "For loops")."""
        line = self.line()
        self.take("for")
        if self.text() not in ("int", "uint"):
            self.fail("the type of the loop variable, int or uint")
        self.next()
        if self.text() == "[":
            self.take("[")
            self.take_integer()
            self.take("]")
        variable = self.new_name(scope.inner)
        self.take("in", "[")
        first = self.take_integer()
        self.take(":")
        last = self.take_integer()
        self.take("]")
        inside = _Scope(scope.wire, scope.parameters, scope.inner + (variable,), scope.in_gate)
        return Loop(line, max(0, last - first + 1), self.block(inside))

    def call(self, scope):
        line = self.line()
        name = self.take_kind("name", "a statement of the subset")
        parameters, qubits = self.call_signature(name, line)
        angles = []
        if self.text() == "(":
            self.take("(")
            angles = self.listed(lambda: self.expression(scope.parameters), ")")
            self.take(")")
        wires = self.listed(scope.wire, ";")
        self.take(";")
        if (len(angles), len(wires)) != (parameters, qubits):
            raise QasmError(line, f"{name} takes {parameters} parameters and {qubits} qubits")
        if len(set(wires)) != len(wires):
            raise QasmError(line, f"{name} acts twice on one qubit")
        return Call(line, name, tuple(angles), tuple(wires))

    def call_signature(self, name, line):
        """(number of parameters, number of qubits) of a gate that is defined before this line."""
        if name in self.result.gates:
            definition = self.result.gates[name]
            return len(definition.parameters), definition.qubits
        if name in BUILT_IN or (self.result.stdgates and name in STDGATES):
            return signature(name)
        raise QasmError(line, f"{name!r} is no gate that is known here")

    # Operands

    def wire(self):
        """One qubit: $k or q[k] with a literal index."""
        if self.kind() == "physical":
            if self.register is not None:
                self.fail("a declared qubit, as declared and physical qubits are not mixed,")
            wire = int(self.next()[1][1:])
            self.physical.add(wire)
            return wire
        return self.element(self.register, self.result.qubits, "a qubit")

    def element(self, register, size, what):
        line = self.line()
        if register is None or self.text() != register:
            self.fail(what)
        self.take(register, "[")
        index = self.take_integer()
        self.take("]")
        if index >= size:
            raise QasmError(line, f"{register}[{index}] does not exist; the size is {size}")
        return index

    def group(self, register, size, one):
        """A whole register or one element of it, as a list of indices."""
        if register is not None and self.text() == register:
            if self.tokens[self.place + 1][1] != "[":
                self.take(register)
                return list(range(size))
        return [one()]

    def wires(self):
        return self.group(self.register, self.result.qubits, self.wire)

    def bit(self):
        return self.element(self.bit_register, self.result.bits, "a bit")

    def bits(self):
        return self.group(self.bit_register, self.result.bits, self.bit)

    def reset(self):
        line = self.line()
        self.take("reset")
        wires = self.wires()
        self.take(";")
        return Reset(line, tuple(wires))

    def measure_arrow(self):
        """measure q -> c;"""
        line = self.line()
        self.take("measure")
        wires = self.wires()
        self.take("->")
        return self.measured(line, wires, self.bits())

    def measure_assignment(self):
        """c = measure q;"""
        line = self.line()
        bits = self.bits()
        self.take("=", "measure")
        return self.measured(line, self.wires(), bits)

    def measured(self, line, wires, bits):
        self.take(";")
        if len(wires) != len(bits):
            raise QasmError(line, f"{len(wires)} qubits are measured into {len(bits)} bits")
        return Measure(line, tuple(zip(wires, bits)))
