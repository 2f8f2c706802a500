"""Hamiltonians for the checks, written out term by term as pauli.PauliSum."""

import itertools
import math

import numpy as np

from pauli import PauliSum


def _sum(qubits, terms):
    """terms: pairs (coefficient, {qubit: letter})."""
    result = PauliSum(qubits)
    for coefficient, factors in terms:
        result.add_sparse(factors, float(coefficient))
    return result


def _pair(letters, a, b):
    return {a: letters[0], b: letters[1]}


def heisenberg_ring(qubits, seed):
    """Sum over the ring of XX + YY + ZZ, and fields on Z uniform in [-1, 1].

    The model of Childs, Maslov, Nam, Ross, Su, arXiv:1711.10980.
    """
    fields = np.random.default_rng(seed).uniform(-1, 1, qubits)
    bonds = [(k, (k + 1) % qubits) for k in range(qubits)]
    terms = [(1, _pair(word, *bond)) for bond in bonds for word in ("XX", "YY", "ZZ")]
    return _sum(qubits, terms + [(field, {k: "Z"}) for k, field in enumerate(fields)])


def open_xxz(qubits, anisotropy):
    couplings = (("XX", 1), ("YY", 1), ("ZZ", anisotropy))
    return _sum(
        qubits, [(c, _pair(w, k, k + 1)) for k in range(qubits - 1) for w, c in couplings]
    )


def ising_grid(width, height, coupling, transverse):
    """-coupling sum ZZ - transverse sum X on an open grid; site x + width y."""
    terms = []
    for x, y in itertools.product(range(width), range(height)):
        site = x + width * y
        terms.append((-transverse, {site: "X"}))
        if x + 1 < width:
            terms.append((-coupling, _pair("ZZ", site, site + 1)))
        if y + 1 < height:
            terms.append((-coupling, _pair("ZZ", site, site + width)))
    return _sum(width * height, terms)


def ising_ring(qubits, coupling, transverse):
    """-coupling sum ZZ - transverse sum X on a ring."""
    bonds = [(-coupling, _pair("ZZ", k, (k + 1) % qubits)) for k in range(qubits)]
    return _sum(qubits, bonds + [(-transverse, {k: "X"}) for k in range(qubits)])


def dipolar(qubits):
    """All pairs, (XX + YY - 2 ZZ) / distance^3 on a line."""
    terms = []
    for a, b in itertools.combinations(range(qubits), 2):
        strength = 1 / (b - a) ** 3
        terms += [(strength * c, _pair(w, a, b)) for w, c in (("XX", 1), ("YY", 1), ("ZZ", -2))]
    return _sum(qubits, terms)


def two_blocks():
    """A chain on qubits 0, 2, 4 and another on 1, 3, 5, with no term between them."""
    terms = []
    for first, strength in ((0, 1.0), (1, 0.6)):
        for a, b in ((first, first + 2), (first + 2, first + 4)):
            terms += [(strength, _pair(word, a, b)) for word in ("XX", "YY", "ZZ")]
        terms += [(0.3 * (k + 1), {first + 2 * k: "XZY"[k]}) for k in range(3)]
    return _sum(6, terms)


def hydrogen():
    """H2 in the STO-3G basis at R = 1.401 bohr, Jordan-Wigner, electronic energy only.

    Digits recomputed from the Gaussian basis; they agree with the integrals in Whitfield, Biamonte,
    Aspuru-Guzik, arXiv:1001.3855 (from memory).
    """
    rows = """IIII -0.81261073 ZIII 0.17120125 IZII 0.17120125 IIZI -0.22279638 IIIZ -0.22279638
        ZZII 0.16862327 ZIZI 0.12054612 IZIZ 0.12054612 ZIIZ 0.16586801 IZZI 0.16586801
        IIZZ 0.17434948 XXYY -0.04532188 YYXX -0.04532188 XYYX 0.04532188 YXXY 0.04532188"""
    words = rows.split()
    return PauliSum(4, zip(words[::2], map(float, words[1::2])))


def random_two_local(qubits, seed):
    """All letter pairs on all pairs of qubits, all letters on all qubits: normal over `qubits`."""
    generator = np.random.default_rng(seed)
    terms = []
    for a, b in itertools.combinations(range(qubits), 2):
        terms += [(generator.normal(), _pair(w, a, b)) for w in itertools.product("XYZ", repeat=2)]
    terms += [(generator.normal(), {k: letter}) for k in range(qubits) for letter in "XYZ"]
    return _sum(qubits, [(c / qubits, factors) for c, factors in terms])


def random_strings(qubits, weights, count, seed):
    """Random strings of the given weights with normal coefficients, and a field on Z0."""
    generator = np.random.default_rng(seed)
    terms = [(0.4, {0: "Z"})]
    for index in range(count):
        weight = weights[index % len(weights)]
        places = generator.choice(qubits, weight, replace=False)
        factors = {int(place): "XYZ"[generator.integers(3)] for place in places}
        terms.append((0.5 * generator.normal(), factors))
    return _sum(qubits, terms)


def one_body(qubits, seed):
    """A field in a direction of its own on every qubit, and a constant."""
    generator = np.random.default_rng(seed)
    terms = [(generator.normal(), {k: letter}) for k in range(qubits) for letter in "XYZ"]
    return _sum(qubits, terms + [(0.7, {})])


def identity(qubits, constant):
    return _sum(qubits, [(constant, {})])


def commuting(seed):
    """All 15 products of XXII, ZZII, IIXX, IIZZ (up to sign), and Z on a fifth qubit."""
    generator = np.random.default_rng(seed)
    words = [a + b for a in ("II", "XX", "YY", "ZZ") for b in ("II", "XX", "YY", "ZZ")][1:]
    result = PauliSum(5, [(word + "I", float(generator.normal())) for word in words])
    result.add("IIIIZ", 0.35)
    return result


def exchange(couplings, letters=("XX", "YY"), ring=False):
    """Sum over k of couplings[k] (products of the letters on k and k + 1)."""
    qubits = len(couplings) + (0 if ring else 1)
    terms = [
        (strength, _pair(word, k, (k + 1) % qubits))
        for k, strength in enumerate(couplings)
        for word in letters
    ]
    return _sum(qubits, terms)


def state_transfer(qubits):
    """sqrt(j (n - j)) (XX + YY) on bonds j = 1 ... n - 1 (Christandl et al., quant-ph/0309131)."""
    return exchange([math.sqrt(j * (qubits - j)) for j in range(1, qubits)])


def fields(constant, *terms):
    """A constant and one-qubit terms (coefficient, letter) on qubits 0, 1, ..."""
    terms = [(c, {k: letter}) for k, (c, letter) in enumerate(terms)]
    return _sum(len(terms), terms + [(constant, {})])


def one_qubit(x, z):
    return _sum(1, [(x, {0: "X"}), (z, {0: "Z"})])
