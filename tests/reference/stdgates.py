"""Matrices of the built-in gate U and of the 32 gates of stdgates.inc, with their exact phases.

Source: OpenQASM 3 specification, gates.rst ("Built-in gates", the formula of every released 3.x)
and standard_library.rst. Where the text of the standard library and the example file differ (cu,
CX), the text is followed, as it says itself.

A matrix of k operands has shape (2**k, 2**k); the first operand is the most significant bit of the
row and column index.
"""

import cmath
import math

import numpy as np


def u_matrix(theta, phi, lam):
    """U(theta, phi, lambda) of gates.rst, with its factor exp(i theta / 2)."""
    turn = cmath.exp(1j * theta)
    return 0.5 * np.array(
        [
            [1 + turn, -1j * cmath.exp(1j * lam) * (1 - turn)],
            [1j * cmath.exp(1j * phi) * (1 - turn), cmath.exp(1j * (phi + lam)) * (1 + turn)],
        ]
    )


def controlled(matrix):
    """The first operand controls `matrix` on the others: shape (m, m) -> (2 m, 2 m)."""
    size = len(matrix)
    result = np.eye(2 * size, dtype=complex)
    result[size:, size:] = matrix
    return result


def _p(lam):
    return np.diag([1, cmath.exp(1j * lam)])


def _rx(theta):
    cosine, sine = math.cos(theta / 2), math.sin(theta / 2)
    return np.array([[cosine, -1j * sine], [-1j * sine, cosine]])


def _ry(theta):
    cosine, sine = math.cos(theta / 2), math.sin(theta / 2)
    return np.array([[cosine, -sine], [sine, cosine]], dtype=complex)


def _rz(lam):
    return np.diag([cmath.exp(-0.5j * lam), cmath.exp(0.5j * lam)])


def _u3(theta, phi, lam):
    return cmath.exp(-0.5j * (theta + phi + lam)) * u_matrix(theta, phi, lam)


X = np.array([[0, 1], [1, 0]], dtype=complex)
Y = np.array([[0, -1j], [1j, 0]])
Z = np.diag([1, -1]).astype(complex)
_H = np.array([[1, 1], [1, -1]], dtype=complex) / math.sqrt(2)
_SX = 0.5 * np.array([[1 + 1j, 1 - 1j], [1 - 1j, 1 + 1j]])
_SWAP = np.array([[1, 0, 0, 0], [0, 0, 1, 0], [0, 1, 0, 0], [0, 0, 0, 1]], dtype=complex)

# name -> (number of parameters, number of qubits, function of the parameters)
STDGATES = {
    "p": (1, 1, _p),
    "x": (0, 1, lambda: X),
    "y": (0, 1, lambda: Y),
    "z": (0, 1, lambda: Z),
    "h": (0, 1, lambda: _H),
    "s": (0, 1, lambda: np.diag([1, 1j])),
    "sdg": (0, 1, lambda: np.diag([1, -1j])),
    "t": (0, 1, lambda: _p(math.pi / 4)),
    "tdg": (0, 1, lambda: _p(-math.pi / 4)),
    "sx": (0, 1, lambda: _SX),
    "rx": (1, 1, _rx),
    "ry": (1, 1, _ry),
    "rz": (1, 1, _rz),
    "cx": (0, 2, lambda: controlled(X)),
    "cy": (0, 2, lambda: controlled(Y)),
    "cz": (0, 2, lambda: controlled(Z)),
    "cp": (1, 2, lambda lam: controlled(_p(lam))),
    "crx": (1, 2, lambda theta: controlled(_rx(theta))),
    "cry": (1, 2, lambda theta: controlled(_ry(theta))),
    "crz": (1, 2, lambda theta: controlled(_rz(theta))),
    "ch": (0, 2, lambda: controlled(_H)),
    "swap": (0, 2, lambda: _SWAP),
    "ccx": (0, 3, lambda: controlled(controlled(X))),
    "cswap": (0, 3, lambda: controlled(_SWAP)),
    "cu": (4, 2, lambda a, b, c, d: controlled(cmath.exp(1j * d) * u_matrix(a, b, c))),
    "CX": (0, 2, lambda: controlled(X)),
    "phase": (1, 1, _p),
    "cphase": (1, 2, lambda lam: controlled(_p(lam))),
    "id": (0, 1, lambda: np.eye(2, dtype=complex)),
    "u1": (1, 1, _p),
    "u2": (2, 1, lambda phi, lam: _u3(math.pi / 2, phi, lam)),
    "u3": (3, 1, _u3),
}
BUILT_IN = {"U": (3, 1, u_matrix)}


def signature(name):
    """(number of parameters, number of qubits) of a gate of these tables."""
    return (BUILT_IN.get(name) or STDGATES[name])[:2]


def gate_matrix(name, parameters):
    """The matrix of a gate of these tables."""
    return (BUILT_IN.get(name) or STDGATES[name])[2](*parameters)
