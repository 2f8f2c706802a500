"""Pauli sums as text, their matrices, exact evolutions, and distances between operators.

Convention as in simulate.py: qubit 0 is the most significant bit of a matrix index, so the letters
of a dense word multiply by np.kron from left to right.
"""

import math
import re

import numpy as np
import scipy.linalg
import scipy.sparse

from stdgates import X, Y, Z

LETTERS = {"I": np.eye(2, dtype=complex), "X": X, "Y": Y, "Z": Z}
_REAL = r"[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?"
_COEFFICIENT = re.compile(rf"({_REAL})(?:([+-](?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)i)?")
_SPARSE = re.compile(r"([IXYZ])(\d+)")


class PauliError(Exception):
    """The text is no Pauli sum."""


class PauliSum:
    """H = sum of coefficient * word; `terms` maps words of `qubits` letters to coefficients."""

    def __init__(self, qubits, pairs=()):
        self.qubits = qubits
        self.terms = {}
        for word, coefficient in pairs:
            self.add(word, coefficient)

    def add(self, word, coefficient):
        if len(word) != self.qubits or set(word) - set(LETTERS):
            raise PauliError(f"{word!r} is no word of {self.qubits} Pauli letters")
        self.terms[word] = self.terms.get(word, 0.0) + coefficient

    def add_sparse(self, factors, coefficient):
        """Adds a term from a mapping qubit -> letter."""
        self.add("".join(factors.get(k, "I") for k in range(self.qubits)), coefficient)

    def matrix(self):
        """The dense Hermitian matrix, shape (2**qubits, 2**qubits)."""
        total = scipy.sparse.csr_matrix((2**self.qubits, 2**self.qubits), dtype=complex)
        for word, coefficient in self.terms.items():
            product = scipy.sparse.identity(1, dtype=complex, format="csr")
            for letter in word:
                product = scipy.sparse.kron(product, LETTERS[letter], format="csr")
            total = total + coefficient * product
        return total.toarray()

    def evolution(self, time):
        """exp(-i H time), hbar = 1, shape (2**qubits, 2**qubits)."""
        return scipy.linalg.expm(-1j * time * self.matrix())

    def text(self):
        """The sum in the text form that parse() reads, sparse words, shortest decimals."""
        lines = [f"qubits {self.qubits}"]
        for word, coefficient in self.terms.items():
            factors = [f"{letter}{k}" for k, letter in enumerate(word) if letter != "I"]
            lines.append(f"{coefficient!r} {' '.join(factors) or 'I'}")
        return "\n".join(lines) + "\n"


def _coefficient(word):
    match = _COEFFICIENT.fullmatch(word)
    if match is None or float(match.group(2) or 0) != 0:
        raise PauliError(f"{word!r} is no real number")
    value = float(match.group(1))
    if not math.isfinite(value):
        raise PauliError(f"{word!r} is not finite")
    return value


def _letters(words):
    """The letters of a term: a dense word, or a mapping of qubits for sparse words."""
    if words == ["I"]:
        return {}
    if len(words) == 1 and not set(words[0]) - set(LETTERS):
        return words[0]
    factors, named = {}, set()
    for word in words:
        match = _SPARSE.fullmatch(word)
        if match is None:
            raise PauliError(f"{word!r} is no Pauli letter with an index")
        qubit = int(match.group(2))
        if qubit in named:
            raise PauliError(f"qubit {qubit} is named twice")
        named.add(qubit)
        factors[qubit] = match.group(1)
    return factors


def parse(text):
    """Reads a `.pauli` text: comments from #, `qubits n` before sparse or dense terms."""
    declared, terms = None, []
    for line in text.splitlines():
        words = line.split("#")[0].split()
        if not words:
            continue
        if words[0] == "qubits":
            if declared is not None or terms or len(words) != 2 or not words[1].isdigit():
                raise PauliError(f"{line!r}: the number of qubits stands once, before the terms")
            declared = int(words[1])
            continue
        if len(words) < 2:
            raise PauliError(f"{line!r} has no Pauli word")
        terms.append((_letters(words[1:]), _coefficient(words[0])))
    if not terms:
        raise PauliError("there is no term")
    result = PauliSum(_qubits(declared, terms))
    for letters, coefficient in terms:
        if isinstance(letters, str):
            result.add(letters, coefficient)
        else:
            result.add_sparse(letters, coefficient)
    return result


def _qubits(declared, terms):
    lengths = {len(letters) for letters, _ in terms if isinstance(letters, str)}
    named = [q for letters, _ in terms if isinstance(letters, dict) for q in letters]
    highest = 1 + max(named, default=0)
    if declared is not None:
        lengths.add(declared)
    if len(lengths) > 1:
        raise PauliError(f"the words disagree in their number of qubits: {sorted(lengths)}")
    qubits = lengths.pop() if lengths else highest
    if qubits < 1 or highest > max(qubits, 1):
        raise PauliError(f"an index does not fit {qubits} qubits")
    return qubits


def spectral_distance(first, second):
    """The largest singular value of the difference; the global phase counts."""
    return float(np.linalg.norm(first - second, 2))


def spectral_distance_up_to_phase(first, second):
    """The least spectral distance of two unitaries over a global phase on one of them.

    The eigenphases of first^dagger second lie on a circle; the best phase is the middle of the
    shortest arc that holds them all, and the distance is the chord from the middle to its end.
    """
    phases = np.sort(np.angle(np.linalg.eigvals(first.conj().T @ second)))
    gaps = np.diff(np.append(phases, phases[0] + 2 * math.pi))
    return 2 * math.sin((2 * math.pi - float(gaps.max())) / 4)


def frobenius_distance(first, second):
    """The Frobenius norm of the difference over sqrt(dimension): root mean square over states."""
    return float(np.linalg.norm(first - second)) / math.sqrt(len(first))


def frobenius_distance_up_to_phase(first, second):
    """The same, least over a global phase on one of two unitaries."""
    overlap = np.vdot(second, first)
    return frobenius_distance(first, np.exp(1j * np.angle(overlap)) * second)
