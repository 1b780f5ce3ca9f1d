"""Resistors in series and in parallel. Nothing here knows what a building is.

Assumptions of every function: steady state, no heat generated inside, one-dimensional flow
within each branch. Numbers may be floats or numpy arrays of any shape that broadcast together.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck.model.solved import Node, Parallel, Resistor, Series


def series(*resistances: float) -> float:
    """Resistance of parts one behind another: R = sum of R_i.

    resistances: m2 K/W (or K/W), any shape. Returns the same unit.
    Source: Fourier's law for a steady series; ISO 6946:2017, 6.7.1.
    """
    total = resistances[0]
    for resistance in resistances[1:]:
        total = total + resistance
    return total


def parallel(shares: Sequence[float], resistances: Sequence[float]) -> float:
    """Resistance of branches side by side: 1/R = sum of f_i/R_i.

    shares: area shares f_i, which must sum to 1. resistances: R_i, m2 K/W, none of them 0.
    Returns m2 K/W.
    Source: ISO 6946:2017, 6.7.2.2.
    """
    conductance = shares[0] / resistances[0]
    for share, resistance in zip(shares[1:], resistances[1:], strict=True):
        conductance = conductance + share / resistance
    return 1.0 / conductance


def plane_wall(thickness: float, conductivity: float) -> float:
    """Resistance of a plane layer: R = L/k.

    thickness: L, m. conductivity: k, W/(m K), above 0. Returns m2 K/W.
    Source: Fourier's law; ISO 6946:2017, 6.7.1.1.
    """
    return thickness / conductivity


def is_nothing(resistance: float) -> bool:
    """Whether a single resistance is 0; an array is taken to resist."""
    return isinstance(resistance, (int, float)) and resistance == 0


def in_series(title: str, parts: Iterable[Node]) -> Series:
    """Connect nodes one behind another."""
    nodes = tuple(parts)
    return Series(title, nodes, sum([node.value for node in nodes]))


def in_parallel(title: str, branches: Iterable[tuple[float, Node]]) -> Parallel:
    """Connect nodes side by side, each with its share of the area.

    A branch without any resistance shorts the others: the result is 0. Resistances may be arrays,
    all of them above 0.
    """
    pairs = tuple(branches)
    shares = tuple(share for share, _ in pairs)
    nodes = tuple(node for _, node in pairs)
    if any(is_nothing(node.value) and share > 0 for share, node in pairs):
        return Parallel(title, shares, nodes, 0.0)
    return Parallel(title, shares, nodes, parallel(shares, [node.value for node in nodes]))


def interface_temperatures(tree: Node, outside: float, inside: float) -> list[tuple[str, float]]:
    """Temperatures behind each part of a series, from outside to inside.

    tree: a series of nodes (anything else counts as one part). outside, inside: air
    temperatures, any unit. Returns (title of the part just passed, temperature) for each part;
    the last one is the inside air.
    Source: the drop over a part is its share of the total resistance; ISO 13788:2012, 6.3.
    """
    parts = tree.parts if isinstance(tree, Series) else (tree,)
    passed = 0.0
    temperatures = []
    for part in parts:
        passed += part.value
        temperatures.append((part.title, outside + (inside - outside) * passed / tree.value))
    return temperatures


def leaves(tree: Node) -> list[Resistor]:
    """All resistors of a tree, from outside to inside."""
    if isinstance(tree, Resistor):
        return [tree]
    children = tree.parts if isinstance(tree, Series) else tree.branches
    return [leaf for child in children for leaf in leaves(child)]
