"""The program tree that qasm.py yields, and what follows from the tree alone.

Wires are integers: the index k of q[k], or the number k of the physical qubit $k. Inside a gate
definition they are positions in its list of qubits. Parameters are numbers, or, inside a gate
definition, expressions: a number, ("name", parameter), ("negate", e), or (operator, left, right).
"""

import math
from dataclasses import dataclass, field
from typing import NamedTuple

from qasm_tokens import QasmError


class Call(NamedTuple):
    """A gate on wires."""

    line: int
    name: str
    parameters: tuple
    wires: tuple


class Phase(NamedTuple):
    """gphase(angle);"""

    line: int
    angle: object


class Loop(NamedTuple):
    """A `for` whose body does not depend on the loop variable, so that only its count matters."""

    line: int
    count: int
    body: tuple


class Barrier(NamedTuple):
    line: int
    wires: tuple


class Reset(NamedTuple):
    line: int
    wires: tuple


class Measure(NamedTuple):
    """Pairs (wire, bit)."""

    line: int
    pairs: tuple


class Definition(NamedTuple):
    """A gate defined in the text; wires of the body are positions in its list of qubits."""

    line: int
    name: str
    parameters: tuple
    qubits: int
    body: tuple


@dataclass
class Program:
    """A whole text. `wires` rise; they are all of the register, or the physical qubits used."""

    version: str = ""
    header: list = field(default_factory=list)  # (key, value); key "" where it is no such pair
    comments: list = field(default_factory=list)  # (line, text), header left out
    gates: dict = field(default_factory=dict)  # name -> Definition
    stdgates: bool = False
    qubits: int = 0  # size of the register, 0 with physical qubits
    bits: int = 0
    wires: tuple = ()
    statements: tuple = ()


def evaluate(expression, values, line):
    """The number that an expression stands for; `values` holds the parameters by name.

    int and float stay apart, as `/` on two integers is integer division (classical.rst,
    "Integers"); it rounds towards zero as in C.
    """
    if isinstance(expression, (int, float)):
        return expression
    operator = expression[0]
    if operator == "name":
        return values[expression[1]]
    if operator == "negate":
        return -evaluate(expression[1], values, line)
    left = evaluate(expression[1], values, line)
    right = evaluate(expression[2], values, line)
    try:
        result = _apply(operator, left, right, line)
    except (ZeroDivisionError, OverflowError) as fault:
        raise QasmError(line, f"{left} {operator} {right} has no value") from fault
    if isinstance(result, complex) or not math.isfinite(result):
        raise QasmError(line, f"{left} {operator} {right} is no finite real number")
    return result


def _apply(operator, left, right, line):
    integers = isinstance(left, int) and isinstance(right, int)
    if operator == "+":
        return left + right
    if operator == "-":
        return left - right
    if operator == "*":
        return left * right
    if operator == "/":
        if not integers:
            return left / right
        quotient = abs(left) // abs(right)
        return quotient if (left < 0) == (right < 0) else -quotient
    if integers and right < 0:
        raise QasmError(line, "a negative power of an integer is not defined on integers")
    return left**right


def instantiate(definition, parameters, wires):
    """The body of a gate definition with its parameters and wires put in."""
    values = dict(zip(definition.parameters, parameters))
    return _instantiate(definition.body, values, wires)


def _instantiate(body, values, wires):
    result = []
    for statement in body:
        line = statement.line
        if isinstance(statement, Call):
            result.append(
                Call(
                    line,
                    statement.name,
                    tuple(evaluate(e, values, line) for e in statement.parameters),
                    tuple(wires[w] for w in statement.wires),
                )
            )
        elif isinstance(statement, Phase):
            result.append(Phase(line, evaluate(statement.angle, values, line)))
        else:
            result.append(Loop(line, statement.count, _instantiate(statement.body, values, wires)))
    return tuple(result)


REGIONS = ("preparation", "evolution", "measurement")


def regions(program):
    """The statements by region: {"preparation": (...), "evolution": (...), "measurement": (...)}.

    A program that resets or measures marks the regions by comment lines that hold just the name of
    the region; all of a program that does neither is the evolution.
    """
    result = {name: [] for name in REGIONS}
    runnable = any(isinstance(s, (Reset, Measure)) for s in program.statements)
    if not runnable:
        result["evolution"] = list(program.statements)
        return result
    marks = [(line, text.strip()) for line, text in program.comments if text.strip() in REGIONS]
    names = [name for _, name in marks]
    if "evolution" not in names or names != [name for name in REGIONS if name in names]:
        raise QasmError(1, f"the regions of the program are not marked in order: {names}")
    for statement in program.statements:
        before = [name for line, name in marks if line <= statement.line]
        if not before:
            raise QasmError(statement.line, "a statement stands before the first region")
        result[before[-1]].append(statement)
    return result
