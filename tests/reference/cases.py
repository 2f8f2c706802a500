"""The cases of main_job.py. Adding a case is adding a row."""

import math
from typing import NamedTuple

import closed_forms as forms
import models


class Case(NamedTuple):
    """One circuit: farrier compile MODEL --time TIME OPTIONS."""

    name: str
    model: object
    time: float
    options: str
    exact: bool = False  # there is an evolution without any formula error, and it must be found


_RING_6 = models.heisenberg_ring(6, 1)
_RING_8 = models.heisenberg_ring(8, 2)
_XXZ_5 = models.open_xxz(5, 0.7)
_GRID = models.ising_grid(2, 3, 1.0, 0.8)
_DIPOLAR_5 = models.dipolar(5)
_BLOCKS = models.two_blocks()
_HYDROGEN = models.hydrogen()
_RANDOM_4 = models.random_two_local(4, 3)
_RANDOM_5 = models.random_two_local(5, 4)
_STRINGS_6 = models.random_strings(6, (3, 4, 2), 10, 5)
_ONE_BODY = models.one_body(4, 6)
_COMMUTING = models.commuting(7)
_PAIR = models.random_two_local(2, 8)
_RABI = models.one_qubit(0.65, 0.35)

CASES = (
    Case("ring of 8", _RING_8, 0.5, "--tolerance 1e-3"),
    Case("ring of 6", _RING_6, 1.0, "--tolerance 1e-5 --style looped"),
    Case("ring of 6, long time", _RING_6, 6.0, "--tolerance 1e-3 --style looped"),
    Case("open XXZ chain", _XXZ_5, 2.0, "--tolerance 1e-4"),
    Case("open XXZ chain, backwards", _XXZ_5, -1.3, "--tolerance 1e-3"),
    Case("open XXZ chain, no time", _XXZ_5, 0.0, "--tolerance 1e-3", exact=True),
    Case("Ising grid", _GRID, 1.0, "--tolerance 1e-3"),
    Case("Ising grid, loose", _GRID, 0.7, "--tolerance 0.1 --minimise depth"),
    Case("dipolar, all pairs", _DIPOLAR_5, 1.0, "--tolerance 1e-3"),
    Case("two blocks", _BLOCKS, 1.5, "--tolerance 1e-4"),
    Case("hydrogen", _HYDROGEN, 2.0, "--tolerance 1e-4"),
    Case("hydrogen, backwards and long", _HYDROGEN, -10.0, "--tolerance 1e-3"),
    Case("random two-local", _RANDOM_5, 1.0, "--tolerance 1e-3"),
    Case("random two-local, tight", _RANDOM_4, 0.8, "--tolerance 1e-7 --style looped"),
    Case("random strings", _STRINGS_6, 1.0, "--tolerance 1e-3"),
    Case("random strings, few rotations", _STRINGS_6, 1.0, "--tolerance 1e-2 --minimise rotations"),
    Case("one body", _ONE_BODY, 3.7, "--tolerance 1e-3", exact=True),
    Case("one qubit", _RABI, 2.1, "--tolerance 1e-3", exact=True),
    Case("identity only", models.identity(2, 1.9), 2.3, "--tolerance 1e-3", exact=True),
    Case("commuting", _COMMUTING, 1.1, "--tolerance 1e-3", exact=True),
    Case("commuting, long time", _COMMUTING, 40.0, "--tolerance 1e-3", exact=True),
    Case("pair", _PAIR, 1.7, "--tolerance 1e-3", exact=True),
    Case("pair, long time and iswap", _PAIR, 25.0, "--tolerance 1e-3 --native iswap", exact=True),
    Case("average error", _RANDOM_5, 1.0, "--tolerance 1e-3 --assurance average"),
    Case("up to phase", _RANDOM_4, 1.0, "--tolerance 1e-3 --up-to-phase"),
    Case("barriers", _GRID, 0.6, "--formula strang --steps 3 --barriers steps --style flat"),
    Case("relabelled", _STRINGS_6, 0.5, "--tolerance 1e-2 --relabel yes"),
    Case("lie in cz", _RING_6, 0.5, "--formula lie --steps 7 --native cz --style flat"),
    Case("strang in ecr", _RANDOM_4, 0.5, "--formula strang --steps 5 --native ecr --style flat"),
    Case("strang in iswap", _XXZ_5, 0.5, "--formula strang --steps 5 --native iswap --style flat"),
    Case("strang in rzz", _GRID, 0.5, "--formula strang --steps 5 --native rzz --style flat"),
    Case("strang in rxx", _DIPOLAR_5, 0.5, "--formula strang --steps 5 --native rxx --style flat"),
    Case("free choice in cz", _HYDROGEN, 1.0, "--tolerance 1e-3 --native cz"),
    Case("free choice in ecr", _STRINGS_6, 0.5, "--tolerance 1e-3 --native ecr"),
    Case("suzuki-4", _RANDOM_5, 1.0, "--formula suzuki-4 --steps 3 --style flat"),
    Case("suzuki-6", _XXZ_5, 1.0, "--formula suzuki-6 --steps 1 --style flat"),
    Case("lie, a million steps", _RANDOM_4, 2.0, "--formula lie --steps 1000000 --style looped"),
    Case("lie, one step", _RANDOM_5, 0.3, "--formula lie --steps 1"),
)

# Compiled twice, with one thread and with two: the bytes must agree.
REPEATS = tuple(
    case for case in CASES if case.name in ("ring of 6, long time", "hydrogen", "random strings")
)


class StylePair(NamedTuple):
    """The flat and the looped text of one circuit are one operator with the same counts."""

    name: str
    model: object
    time: float
    options: str


STYLE_PAIRS = (
    StylePair("lie", _RING_6, 1.0, "--formula lie --steps 9"),
    StylePair("strang", _STRINGS_6, 1.0, "--formula strang --steps 6"),
    StylePair("suzuki-4", _RANDOM_4, -1.0, "--formula suzuki-4 --steps 4 --native rxx"),
    StylePair("suzuki-6", _HYDROGEN, 1.0, "--formula suzuki-6 --steps 2 --native cz"),
    StylePair("free choice", _GRID, 2.0, "--tolerance 1e-3 --native ecr"),
    StylePair("two blocks", _BLOCKS, 1.0, "--tolerance 1e-3"),
)


class Slope(NamedTuple):
    """The true error falls as steps^(-order) (generic Hamiltonians: no error term vanishes)."""

    name: str
    model: object
    time: float
    formula: str
    order: int
    steps: tuple


_GENERIC = models.random_strings(4, (1, 2, 3), 12, 9)

SLOPES = (
    Slope("lie, pairs", _RANDOM_4, 1.0, "lie", 1, (200, 400, 800, 1600)),
    Slope("lie, strings", _GENERIC, 1.0, "lie", 1, (200, 400, 800, 1600)),
    Slope("strang, pairs", _RANDOM_4, 1.0, "strang", 2, (20, 40, 80, 160)),
    Slope("strang, strings", _GENERIC, 1.0, "strang", 2, (20, 40, 80, 160)),
    Slope("suzuki-4, pairs", _RANDOM_4, 1.5, "suzuki-4", 4, (8, 12, 16, 24)),
    Slope("suzuki-4, strings", _GENERIC, 1.5, "suzuki-4", 4, (6, 8, 12, 16, 24)),
    Slope("suzuki-6, pairs", _RANDOM_4, 1.5, "suzuki-6", 6, (6, 8, 10)),
    Slope("suzuki-6, strings", _GENERIC, 2.5, "suzuki-6", 6, (5, 6, 7, 8, 10)),
)


class Experiment(NamedTuple):
    """A job that prepares and measures, and the probabilities that its bits are 1."""

    name: str
    model: object
    time: float
    prepared: dict  # state -> qubits
    basis: str
    ones: list  # P(c[k] = 1); None where qubit k is not measured
    options: str = "--tolerance 1e-4"


def _ones(expectations):
    """P(1) from expectations of +-1."""
    return [None if value is None else (1 - value) / 2 for value in expectations]


_TURNS = ((0.7, "Z"), (0.4, "X"), (-0.9, "Y"), (0.3, "Z"), (1.1, "X"), (0.25, "Y"))
_SIX = {state: (k,) for k, state in enumerate(forms.STATES)}


def _turned(basis, time):
    return _ones(
        [
            forms.precession(state, *turn, basis, time)
            for state, turn in zip(forms.STATES, _TURNS)
        ]
    )


_FIRST = {"one": (0,)}
_SWAP_TIME = math.pi / 4
_HEISENBERG_6 = models.exchange([0.5] * 6, ("XX", "YY", "ZZ"), ring=True)
_ALL_PLUS = {"plus": tuple(range(8))}
_QUENCH = _ones([forms.ising_quench(8, 1.0, 0.5, 0.8)] * 8)

EXPERIMENTS = (
    Experiment("Rabi", _RABI, 2.1, {}, "z", [forms.rabi(1.3, 0.7, 2.1)]),
    Experiment(
        "ZZ coupling",
        models.exchange([1.0], ("ZZ",)),
        0.4,
        {"plus": (0, 1)},
        "x",
        _ones([forms.ising_pair(0.4)] * 2),
    ),
    Experiment(
        "exchange of two",
        models.exchange([1.0], ("XX", "YY", "ZZ")),
        0.37,
        _FIRST,
        "z",
        [1 - forms.exchange_pair(0.37), forms.exchange_pair(0.37)],
    ),
    Experiment(
        "swap of two", models.exchange([1.0], ("XX", "YY", "ZZ")), _SWAP_TIME, _FIRST, "z", [0, 1]
    ),
    Experiment(
        "state transfer over 4", models.state_transfer(4), _SWAP_TIME, _FIRST, "z", [0, 0, 0, 1]
    ),
    Experiment(
        "state transfer over 5",
        models.state_transfer(5),
        _SWAP_TIME,
        _FIRST,
        "z",
        forms.mirror_line(5, _SWAP_TIME),
        "--tolerance 1e-3 --formula strang,suzuki-4",
    ),
    Experiment(
        "state transfer, half way",
        models.state_transfer(5),
        math.pi / 8,
        _FIRST,
        "z",
        forms.mirror_line(5, math.pi / 8),
        "--tolerance 1e-3 --order 2 --native iswap",
    ),
    Experiment(
        "magnon on an XX ring",
        models.exchange([0.5] * 7, ring=True),
        1.0,
        _FIRST,
        "z",
        forms.magnon_ring(7, 1.0, 1.0),
    ),
    Experiment(
        "magnon on an XX ring, by steps",
        models.exchange([0.5] * 6, ring=True),
        2.0,
        _FIRST,
        "z",
        forms.magnon_ring(6, 1.0, 2.0),
        "--formula suzuki-4 --steps 8 --style looped --relabel yes",
    ),
    Experiment(
        "magnon on a Heisenberg ring",
        _HEISENBERG_6,
        1.2,
        {"one": (0,), "zero": (1, 2)},
        "z",
        forms.magnon_ring(6, 1.0, 1.2),
    ),
    Experiment("Ising quench", models.ising_ring(8, 1.0, 0.5), 0.8, _ALL_PLUS, "x", _QUENCH),
    Experiment(
        "Ising quench, by steps",
        models.ising_ring(8, 1.0, 0.5),
        0.8,
        _ALL_PLUS,
        "x",
        _QUENCH[:5] + [None] * 3,
        "--tolerance 1e-2 --order 2 --native rzz",
    ),
    Experiment("precession, x", models.fields(1.2, *_TURNS), 1.9, _SIX, "x", _turned("x", 1.9)),
    Experiment("precession, y", models.fields(1.2, *_TURNS), 1.9, _SIX, "y", _turned("y", 1.9)),
    Experiment("precession, z", models.fields(1.2, *_TURNS), -0.6, _SIX, "z", _turned("z", -0.6)),
)
