"""The two resistor networks and their energies.

Unit temperatures: outdoor air 0, indoor air 1. Everything is per metre perpendicular to the
section. Flows towards the outside count positive.

The node-centred network gives a temperature field; its energy as a continuous (bilinear) field is
an upper bound of the conductance L, whatever the field (Dirichlet's principle). The cell-centred
network gives flows; the complementary energy of any divergence-free flow of total 1 is an upper
bound of 1/L (Thomson's principle).
"""

from __future__ import annotations

from typing import Any, NamedTuple

import numpy as np
import numpy.typing as npt
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import splu

from envcheck.solve.field.section import Array, Grid, Section

_Edges = tuple[npt.NDArray[np.intp], npt.NDArray[np.intp], Array]
"""Nodes of either end, and the conductance between them, W/(m K)."""
_Boundary = tuple[npt.NDArray[np.intp], Array, float]
"""Nodes, their conductance to the air, and its temperature."""

CLOSED = 1e-9
"""Share of the flow that may be lost at the nodes before a solution is refined ..."""
REFINEMENTS = 2
"""... which is done so often at most."""
BALANCE = 1e-6
"""Share of the flow by which what enters may miss what leaves."""
RESIDUAL = 1e-10
"""Heat that one node may lose, as a share of what its largest conductance could carry."""


class SolveError(Exception):
    """A linear solution that does not hold: the heat balance does not close."""


class Upper(NamedTuple):
    """The node-centred side."""

    conductance: float
    """L, W/(m K), never too low"""
    temperatures: Array
    """(n + 1, m + 1) at the grid nodes"""
    imbalance: float
    """Share of the flow by which what enters misses what leaves."""


class Lower(NamedTuple):
    """The cell-centred side."""

    conductance: float
    """L, W/(m K), never too high"""
    stream: Array
    """(n + 1, m + 1) stream function of a total flow of 1"""
    imbalance: float


def upper(section: Section, grid: Grid, k: Array) -> Upper:
    """Solve the node-centred network and evaluate the exact energy of its field.

    k: (n, m) conductivities of the cells, W/(m K).
    """
    n, m = k.shape
    hx, hy, wrap = grid.hx, grid.hy, section.periodic
    width = m if wrap else m + 1
    along = np.zeros((n + 1, m))
    across = np.zeros((n, m + 1))
    share = k * hy[:, None] / (2.0 * hx)
    along[:-1] += share
    along[1:] += share
    share = k * hx / (2.0 * hy[:, None])
    across[:, :-1] += share
    across[:, 1:] += share
    tributary = np.zeros(m + 1)
    tributary[:-1] += hx / 2.0
    tributary[1:] += hx / 2.0
    if wrap:
        across[:, 0] += across[:, -1]
        tributary[0] += tributary[-1]
    index = np.arange((n + 1) * width).reshape(n + 1, width)
    right = np.roll(index, -1, axis=1) if wrap else index[:, 1:]
    left = index if wrap else index[:, :-1]
    edges = [
        (left, right, along),
        (index[:-1], index[1:], across[:, :width]),
    ]
    films = tributary[:width]
    found, imbalance = solve_network(
        index.size,
        edges,
        [
            (index[0], films / section.outside, 0.0),
            (index[-1], films / section.inside, 1.0),
        ],
    )
    field = found.reshape(n + 1, width)
    if wrap:
        field = np.hstack([field, field[:, :1]])
    return Upper(_energy(section, grid, k, field), field, imbalance)


def _energy(section: Section, grid: Grid, k: Array, field: Array) -> float:
    """Energy of a bilinear field: squares only, so that rounding cannot make it too small."""
    dx, dy = np.diff(field, axis=1), np.diff(field, axis=0)
    hx, hy = grid.hx, grid.hy[:, None]
    along = (k * hy / hx * mean_square(dx[:-1], dx[1:])).sum()
    across = (k * hx / hy * mean_square(dy[:, :-1], dy[:, 1:])).sum()
    outer, inner = field[0], 1.0 - field[-1]
    films = (hx * mean_square(outer[:-1], outer[1:])).sum() / section.outside
    films += (hx * mean_square(inner[:-1], inner[1:])).sum() / section.inside
    return float(along + across + films)


def mean_square(a: Array, b: Array) -> Array:
    """Mean of the square of what runs linearly from a to b."""
    squared: Array = ((a + b) / 2.0) ** 2 + (b - a) ** 2 / 12.0
    return squared


def lower(section: Section, grid: Grid, k: Array) -> Lower:
    """Solve the cell-centred network and evaluate the exact energy of its flow."""
    n, m = k.shape
    hx, hy, wrap = grid.hx, grid.hy, section.periodic
    half_x, half_y = hx / (2.0 * k), hy[:, None] / (2.0 * k)
    beside = np.roll(half_x, -1, axis=1) if wrap else half_x[:, 1:]
    own = half_x if wrap else half_x[:, :-1]
    along = hy[:, None] / (own + beside)
    across = hx / (half_y[:-1] + half_y[1:])
    index = np.arange(n * m).reshape(n, m)
    right = np.roll(index, -1, axis=1) if wrap else index[:, 1:]
    left = index if wrap else index[:, :-1]
    out = hx / (section.outside + half_y[0])
    into = hx / (section.inside + half_y[-1])
    found, imbalance = solve_network(
        index.size,
        [(left, right, along), (index[:-1], index[1:], across)],
        [(index[0], out, 0.0), (index[-1], into, 1.0)],
    )
    found = found.reshape(n, m)
    flows = np.vstack([out * found[0], across * (found[1:] - found[:-1]), into * (1.0 - found[-1])])
    over_edge = along[:, -1] * (found[:, 0] - found[:, -1]) if wrap else np.zeros(n)
    stream = _stream(flows, over_edge)
    return Lower(1.0 / _complementary(section, grid, k, stream), stream, imbalance)


def _stream(flows: Array, over_edge: Array) -> Array:
    """Stream function of the flows through the horizontal lines, each line carrying 1 in all.

    flows: (n + 1, m) towards the outside. over_edge: (n,) flow through the side x = 0, by row,
    towards smaller x. Whatever the numbers, the flow of a stream function has no divergence.
    """
    total = flows.sum(axis=1, keepdims=True)
    start = np.concatenate([[0.0], np.cumsum(-over_edge / total.mean())])
    within = np.concatenate([np.zeros((len(flows), 1)), np.cumsum(flows / total, axis=1)], axis=1)
    stream: Array = start[:, None] + within
    return stream


def _complementary(section: Section, grid: Grid, k: Array, stream: Array) -> float:
    down, aside = np.diff(stream, axis=1), np.diff(stream, axis=0)
    hx, hy = grid.hx, grid.hy[:, None]
    across = (hy / (hx * k) * mean_square(down[:-1], down[1:])).sum()
    along = (hx / (hy * k) * mean_square(aside[:, :-1], aside[:, 1:])).sum()
    films = section.outside * (down[0] ** 2 / grid.hx).sum()
    films += section.inside * (down[-1] ** 2 / grid.hx).sum()
    return float(across + along + films)


def solve_network(
    size: int, edges: list[_Edges], boundaries: list[_Boundary]
) -> tuple[Array, float]:
    """Temperatures of a resistor network, and by how much its heat balance misses.

    Errors: SolveError where the balance does not close.
    """
    matrix, source, largest = _assembled(size, edges, boundaries)
    factors = splu(
        matrix,
        permc_spec="MMD_AT_PLUS_A",
        diag_pivot_thresh=0.0,
        options={"SymmetricMode": True},
    )
    found: Array = factors.solve(source)
    lost, flow = _lost(found, edges, boundaries)
    for _ in range(REFINEMENTS):
        if np.abs(lost).sum() <= CLOSED * flow:
            break
        found += factors.solve(lost)
        lost, flow = _lost(found, edges, boundaries)
    residual = float(np.abs(lost).max() / largest)
    imbalance = float(abs(lost.sum()) / flow)
    if not (residual <= RESIDUAL and imbalance <= BALANCE):
        raise SolveError(
            f"the heat balance does not close: residual {residual:.1e}, imbalance {imbalance:.1e}"
        )
    return found, imbalance


def _assembled(
    size: int, edges: list[_Edges], boundaries: list[_Boundary]
) -> tuple[Any, Array, float]:
    """The conductance matrix, the sources, and the largest conductance of a node."""
    rows, columns, values = [], [], []
    diagonal, source = np.zeros(size), np.zeros(size)
    for one, other, conductance in edges:
        a, b, g = one.ravel(), other.ravel(), conductance.ravel()
        rows += [a, b]
        columns += [b, a]
        values += [-g, -g]
        diagonal += np.bincount(a, g, size) + np.bincount(b, g, size)
    for nodes, conductance, temperature in boundaries:
        diagonal[nodes] += conductance
        source[nodes] += conductance * temperature
    every = np.arange(size)
    entries = np.concatenate([*values, diagonal])
    places = (np.concatenate([*rows, every]), np.concatenate([*columns, every]))
    matrix = coo_matrix((entries, places), shape=(size, size)).tocsc()
    return matrix, source, float(diagonal.max())


def _lost(found: Array, edges: list[_Edges], boundaries: list[_Boundary]) -> tuple[Array, float]:
    """Heat that vanishes at each node, and the flow through the section.

    Taken from the differences along the resistors: in the product with the matrix the large
    conductances of thin metal would cancel each other to rounding noise.
    """
    lost = np.zeros(found.size)
    for one, other, conductance in edges:
        a, b = one.ravel(), other.ravel()
        flow = conductance.ravel() * (found[a] - found[b])
        lost += np.bincount(b, flow, found.size) - np.bincount(a, flow, found.size)
    through = []
    for nodes, conductance, temperature in boundaries:
        flow = conductance * (temperature - found[nodes])
        lost[nodes] += flow
        through.append(abs(float(flow.sum())))
    return lost, max(through)


def indicators(
    section: Section, grid: Grid, k: Array, high: Upper, low: Lower
) -> tuple[Array, Array]:
    """Share of the gap that splitting each column and each row would attack.

    The gap between both bounds is the energy of the difference between the flow of one side and
    the gradient of the other (an identity, no constants); the part of it that varies along x
    falls to the columns, the part along y to the rows, the mean (also of what a
    film's flow and its temperature drop disagree by) in proportion.
    """
    flow = low.conductance * low.stream
    down, aside = np.diff(flow, axis=1), np.diff(flow, axis=0)
    dx, dy = np.diff(high.temperatures, axis=1), np.diff(high.temperatures, axis=0)
    hx, hy = grid.hx, grid.hy[:, None]
    area = hx * hy / k
    left, right = aside[:, :-1] / hy, aside[:, 1:] / hy
    outer, inner = down[:-1] / hx, down[1:] / hx
    a0, a1 = k * dx[:-1] / hx, k * dx[1:] / hx
    b0, b1 = k * dy[:, :-1] / hy, k * dy[:, 1:] / hy
    mean = ((a0 + a1 + left + right) / 2.0) ** 2 + ((b0 + b1 - outer - inner) / 2.0) ** 2
    by_x = ((right - left) ** 2 + (b1 - b0) ** 2) / 12.0
    by_y = ((a1 - a0) ** 2 + (inner - outer) ** 2) / 12.0
    share = np.where(by_x + by_y > 0, by_x / np.maximum(by_x + by_y, 1e-300), 0.5)
    columns = (area * (by_x + mean * share)).sum(axis=0)
    rows = (area * (by_y + mean * (1.0 - share))).sum(axis=1)
    for row, resistance, flux, temperature in (
        (0, section.outside, down[0] / grid.hx, high.temperatures[0]),
        (-1, section.inside, down[-1] / grid.hx, 1.0 - high.temperatures[-1]),
    ):
        first, second = temperature[:-1] / resistance - flux, temperature[1:] / resistance - flux
        mean = grid.hx * resistance * ((first + second) / 2.0) ** 2
        columns += grid.hx * resistance * (second - first) ** 2 / 12.0 + mean * share[row]
        rows[row] += (mean * (1.0 - share[row])).sum()
    return columns, rows
