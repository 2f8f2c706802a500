"""A place in a list of tokens, and the expressions that can be read from there."""

import math

from qasm_tokens import QasmError, tokenize
from qasm_tree import evaluate

# types.rst, "Built-in constants".
CONSTANTS = {
    "pi": math.pi,
    "π": math.pi,
    "tau": math.tau,
    "τ": math.tau,
    "euler": math.e,
    "ℇ": math.e,
}


def _integer(kind, text):
    return int(text.replace("_", ""), 0 if kind == "based" else 10)


class Cursor:
    """`place` is the index of the next token."""

    def __init__(self, text):
        self.tokens, self.comments = tokenize(text)
        self.place = 0

    def kind(self):
        return self.tokens[self.place][0]

    def text(self):
        return self.tokens[self.place][1]

    def line(self):
        return self.tokens[self.place][2]

    def next(self):
        token = self.tokens[self.place]
        if token[0] == "end":
            raise QasmError(token[2], "the text ends too early")
        self.place += 1
        return token

    def fail(self, expected):
        raise QasmError(
            self.line(), f"{self.text() or 'the end'!r} is not expected; {expected} was"
        )

    def take(self, *texts):
        """Takes exactly these tokens."""
        for text in texts:
            if self.text() != text:
                self.fail(repr(text))
            self.place += 1

    def take_kind(self, kind, what):
        if self.kind() != kind:
            self.fail(what)
        return self.next()[1]

    def take_integer(self):
        if self.kind() not in ("integer", "based"):
            self.fail("an integer literal")
        kind, text, _ = self.next()
        return _integer(kind, text)

    def listed(self, item, closing):
        """item {, item} [,] up to the token `closing`, which is not taken."""
        items = []
        while self.text() != closing:
            items.append(item())
            if self.text() != ",":
                break
            self.take(",")
        if self.text() != closing:
            self.fail(repr(closing))
        return items

    # Expressions (classical.rst, table of precedence: power, unary, * /, + -). There is no unary
    # plus.

    def expression(self, parameters=()):
        """A number where no gate parameter takes part, else a tree as in qasm_tree.py."""
        left = self._product(parameters)
        while self.text() in ("+", "-"):
            _, operator, line = self.next()
            left = _joined(operator, left, self._product(parameters), line)
        return left

    def _product(self, parameters):
        left = self._unary(parameters)
        while self.text() in ("*", "/"):
            _, operator, line = self.next()
            left = _joined(operator, left, self._unary(parameters), line)
        return left

    def _unary(self, parameters):
        if self.text() == "-":
            self.take("-")
            operand = self._unary(parameters)
            return -operand if isinstance(operand, (int, float)) else ("negate", operand)
        base = self._atom(parameters)
        if self.text() != "**":
            return base
        line = self.next()[2]
        return _joined("**", base, self._unary(parameters), line)

    def _atom(self, parameters):
        kind, text, line = self.next()
        if kind in ("integer", "based"):
            return _integer(kind, text)
        if kind == "float":
            value = float(text.replace("_", ""))
            if math.isinf(value):
                raise QasmError(line, f"{text} is too large")
            return value
        if text == "(":
            inner = self.expression(parameters)
            self.take(")")
            return inner
        if kind == "name" and text in parameters:
            return ("name", text)
        if kind == "name" and text in CONSTANTS:
            return CONSTANTS[text]
        raise QasmError(line, f"{text!r} is not expected in an expression")


def _joined(operator, left, right, line):
    """Computes at once where both sides are numbers."""
    tree = (operator, left, right)
    if isinstance(left, (int, float)) and isinstance(right, (int, float)):
        return evaluate(tree, {}, line)
    return tree
