"""Evolutions whose outcome is known in closed form. Conventions: hbar = 1, H in Pauli matrices."""

import math

import numpy as np
import scipy.special


def rabi(drive, detuning, time):
    """P(1) from |0> under (drive / 2) X + (detuning / 2) Z (Rabi 1937)."""
    frequency = math.hypot(drive, detuning)
    return (drive / frequency) ** 2 * math.sin(frequency * time / 2) ** 2


def ising_pair(time):
    """<X_0> from |++> under ZZ: Heisenberg's equation gives cos 2t."""
    return math.cos(2 * time)


def exchange_pair(time):
    """P(|10> -> |01>) under XX + YY + ZZ, whose spectrum is -3, 1, 1, 1."""
    return math.sin(2 * time) ** 2


def mirror_line(qubits, time):
    """P(excitation on k), k = 0 ... n - 1, from qubit 0 under models.state_transfer.

    The single excitation is a spin (n - 1) / 2 that turns by the angle 4 t (Christandl et al.,
    quant-ph/0309131): binomial weights, and all on the last qubit at t = pi / 4.
    """
    forward = math.sin(2 * time) ** 2
    return [
        math.comb(qubits - 1, k) * forward**k * (1 - forward) ** (qubits - 1 - k)
        for k in range(qubits)
    ]


def magnon_ring(qubits, hop, time, images=12):
    """P(excitation on k) from qubit 0 on a ring under (hop / 2) sum (XX + YY).

    The amplitude is the sum over images k + m n of (-i)^|x| J_|x|(2 hop t): the generating function
    of the Bessel functions. ZZ couplings of equal strength add only a common phase.
    """
    result = []
    for k in range(qubits):
        distances = [abs(k + m * qubits) for m in range(-images, images + 1)]
        amplitude = sum((-1j) ** x * scipy.special.jv(x, 2 * hop * time) for x in distances)
        result.append(abs(amplitude) ** 2)
    return result


def ising_quench(qubits, coupling, transverse, time):
    """Mean <X> from |+...+> under models.ising_ring, an even number of qubits.

    Jordan-Wigner and a rotation per pair of momenta k, -k (Pfeuty 1970; Barouch, McCoy, Dresden
    1970): (2/n) sum over k > 0 of c^2 + (1 - c^2) cos 4 e t.
    """
    momenta = (2 * np.arange(qubits // 2) + 1) * math.pi / qubits
    energies = np.sqrt(
        coupling**2 + transverse**2 - 2 * coupling * transverse * np.cos(momenta)
    )
    along = (transverse - coupling * np.cos(momenta)) / energies
    terms = along**2 + (1 - along**2) * np.cos(4 * energies * time)
    return 2 / qubits * float(terms.sum())


# Directions of the states that a job can prepare.
STATES = {
    "zero": (0, 0, 1),
    "one": (0, 0, -1),
    "plus": (1, 0, 0),
    "minus": (-1, 0, 0),
    "plus-i": (0, 1, 0),
    "minus-i": (0, -1, 0),
}


def precession(state, coefficient, axis, basis, time):
    """<basis> of one qubit after a turn about `axis` under coefficient * (that Pauli letter).

    The Bloch vector turns by the angle 2 coefficient t (Rodrigues' formula).
    """
    vector = np.array(STATES[state], dtype=float)
    unit = np.eye(3)["XYZ".index(axis)]
    angle = 2 * coefficient * time
    turned = (
        math.cos(angle) * vector
        + math.sin(angle) * np.cross(unit, vector)
        + (1 - math.cos(angle)) * unit.dot(vector) * unit
    )
    return float(turned["xyz".index(basis)])
