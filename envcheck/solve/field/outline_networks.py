"""The two resistor networks of an outline, and what they prove.

Upper bound: the node-centred temperatures as a continuous (bilinear) field over the solids; its
energy with the films is never below the conductance L (Dirichlet's principle).

Lower bound: the flows of the cell-centred network as a field q that is linear in each cell. For any
such q without flow through adiabatic faces, with C(q) its complementary energy, Q what enters from
indoors and d_i what vanishes in cell i, Green's formula with the exact temperatures T* gives

    a(q, q*) = Q - sum of d_i * (mean of T* in cell i),   a(q, q*)^2 <= C(q) L,   0 <= T* <= 1

and so L >= (Q - sum of |d_i|)^2 / C(q): the rounding that is left in the heat balance of the cells
lowers the bound by just what it may be worth, whatever the shape of the solids.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
import numpy.typing as npt

from envcheck.solve.field.networks import mean_square, solve_network
from envcheck.solve.field.outline import Cells
from envcheck.solve.field.section import Array


class Upper(NamedTuple):
    """The node-centred side."""

    conductance: float
    """L, W/(m K), never too low"""
    temperatures: Array
    """(n + 1, m + 1) at the grid nodes, 0 where no solid is near"""
    imbalance: float
    """Share of the flow by which what enters misses what leaves."""


class Lower(NamedTuple):
    """The cell-centred side."""

    conductance: float
    """L, W/(m K), never too high"""
    flow_x: Array
    """(n, m + 1) W/(m K) through the upright faces, positive towards smaller x"""
    flow_y: Array
    """(n + 1, m) through the level faces, positive towards smaller y"""
    imbalance: float


def upper(cells: Cells) -> Upper:
    """Solve the node-centred network and evaluate the exact energy of its field."""
    k, hx, hy = cells.k, cells.hx, cells.hy[:, None]
    n, m = k.shape
    along, across = np.zeros((n + 1, m)), np.zeros((n, m + 1))
    for whole, share, low, high in (
        (along, k * hy / (2.0 * hx), np.s_[:-1], np.s_[1:]),
        (across, k * hx / (2.0 * hy), np.s_[:, :-1], np.s_[:, 1:]),
    ):
        whole[low] += share
        whole[high] += share
    used = np.zeros((n + 1, m + 1), dtype=bool)
    for corner in (np.s_[:-1, :-1], np.s_[:-1, 1:], np.s_[1:, :-1], np.s_[1:, 1:]):
        used[corner] |= k > 0
    index = np.cumsum(used).reshape(used.shape) - 1
    edges = [
        _kept(index[:, :-1], index[:, 1:], along),
        _kept(index[:-1], index[1:], across),
    ]
    nodes = np.arange(int(used.sum()))
    boundaries = [
        (nodes, _to_air(cells, temperature)[used], temperature) for temperature in (0.0, 1.0)
    ]
    found, imbalance = solve_network(len(nodes), edges, boundaries)
    field = np.zeros(used.shape)
    field[used] = found
    return Upper(_energy(cells, field), field, imbalance)


def _kept(
    one: npt.NDArray[np.intp], other: npt.NDArray[np.intp], conductance: Array
) -> tuple[npt.NDArray[np.intp], npt.NDArray[np.intp], Array]:
    """The resistors that are there."""
    there = conductance > 0
    return one[there], other[there], conductance[there]


def _film_conductances(cells: Cells, temperature: float) -> tuple[Array, Array]:
    """Of the faces to air of that temperature, W/(m K): length over film, else 0."""
    found = []
    for film, air, length in (
        (cells.film_x, cells.air_x, cells.hy[:, None]),
        (cells.film_y, cells.air_y, cells.hx),
    ):
        there = (film > 0) & (air == temperature)
        found.append(np.where(there, length / np.where(there, film, 1.0), 0.0))
    return found[0], found[1]


def _to_air(cells: Cells, temperature: float) -> Array:
    """Conductance of each node to air of that temperature: half of each face that it bounds."""
    x, y = _film_conductances(cells, temperature)
    whole = np.zeros((len(cells.hy) + 1, len(cells.hx) + 1))
    whole[:-1] += x / 2.0
    whole[1:] += x / 2.0
    whole[:, :-1] += y / 2.0
    whole[:, 1:] += y / 2.0
    return whole


def _energy(cells: Cells, field: Array) -> float:
    """Energy of a bilinear field: squares only, so that rounding cannot make it too small."""
    k, hx, hy = cells.k, cells.hx, cells.hy[:, None]
    dx, dy = np.diff(field, axis=1), np.diff(field, axis=0)
    total = (k * hy / hx * mean_square(dx[:-1], dx[1:])).sum()
    total += (k * hx / hy * mean_square(dy[:, :-1], dy[:, 1:])).sum()
    for temperature in (0.0, 1.0):
        x, y = _film_conductances(cells, temperature)
        drop = field - temperature
        total += (x * mean_square(drop[:-1], drop[1:])).sum()
        total += (y * mean_square(drop[:, :-1], drop[:, 1:])).sum()
    return float(total)


def lower(cells: Cells) -> Lower:
    """Solve the cell-centred network and bound by the energy and the balance of its flows."""
    k, hx, hy = cells.k, cells.hx, cells.hy[:, None]
    solid = k > 0
    safe = np.where(solid, k, 1.0)
    half_x, half_y = hx / (2.0 * safe), hy / (2.0 * safe)
    inner_x = np.where(solid[:, :-1] & solid[:, 1:], hy / (half_x[:, :-1] + half_x[:, 1:]), 0.0)
    inner_y = np.where(solid[:-1] & solid[1:], hx / (half_y[:-1] + half_y[1:]), 0.0)
    out_x = _through_films(half_x.T, solid.T, cells.film_x.T, cells.hy).T
    out_y = _through_films(half_y, solid, cells.film_y, hx)
    index = np.cumsum(solid).reshape(solid.shape) - 1
    edges = [
        _kept(index[:, :-1], index[:, 1:], inner_x),
        _kept(index[:-1], index[1:], inner_y),
    ]
    nodes = np.arange(int(solid.sum()))
    boundaries = []
    for temperature in (0.0, 1.0):
        x = np.where(cells.air_x == temperature, out_x, 0.0)
        y = np.where(cells.air_y == temperature, out_y, 0.0)
        whole = x[:, :-1] + x[:, 1:] + y[:-1] + y[1:]  # a face with a film bounds one solid
        boundaries.append((nodes, whole[solid], temperature))
    found, imbalance = solve_network(len(nodes), edges, boundaries)
    field = np.zeros(solid.shape)
    field[solid] = found
    flow_x = _flows(field.T, solid.T, inner_x.T, out_x.T, cells.air_x.T).T
    flow_y = _flows(field, solid, inner_y, out_y, cells.air_y)
    return Lower(_bound(cells, flow_x, flow_y), flow_x, flow_y, imbalance)


def _through_films(half: Array, solid: npt.NDArray[np.bool_], film: Array, length: Array) -> Array:
    """Conductance of each face with a film: the film and the half cell behind it in series."""
    around = np.zeros((1, half.shape[1]))
    behind = np.where(solid, half, 0.0)
    behind = np.vstack([around, behind]) + np.vstack([behind, around])
    there = film > 0
    # Only one side of such a face is solid, so the sum is the half cell of that side.
    found: Array = np.where(there, length / np.where(there, film + behind, 1.0), 0.0)
    return found


def _flows(
    field: Array, solid: npt.NDArray[np.bool_], inner: Array, out: Array, air: Array
) -> Array:
    """Flow through every face between rows, positive towards the row before."""
    around = np.zeros((1, field.shape[1]))
    flow = np.vstack([around, inner * np.diff(field, axis=0), around])
    behind = np.vstack([solid, around > 0])
    towards = np.where(behind, np.vstack([field, around]) - air, air - np.vstack([around, field]))
    flow += out * towards
    return flow


def _bound(cells: Cells, flow_x: Array, flow_y: Array) -> float:
    """The least that L can be, from flows whose balance is nearly closed."""
    lost = (np.diff(flow_x, axis=1) + np.diff(flow_y, axis=0))[cells.k > 0]
    entering = _entering(cells, flow_x, flow_y)
    proven = max(entering - float(np.abs(lost).sum()), 0.0)
    return proven**2 / _complementary(cells, flow_x, flow_y)


def _entering(cells: Cells, flow_x: Array, flow_y: Array) -> float:
    """What enters the solids from indoors, W/(m K)."""
    total = 0.0
    for flow, film, air, k in (
        (flow_y, cells.film_y, cells.air_y, cells.k),
        (flow_x.T, cells.film_x.T, cells.air_x.T, cells.k.T),
    ):
        around = np.zeros((1, k.shape[1])) > 0
        before = np.vstack([around, k > 0])  # solid on the side that the flow runs to
        warm = (film > 0) & (air == 1.0)
        total += float(np.where(before, flow, -flow)[warm].sum())
    return total


def _complementary(cells: Cells, flow_x: Array, flow_y: Array) -> float:
    hx, hy = cells.hx, cells.hy[:, None]
    safe = np.where(cells.k > 0, cells.k, 1.0)
    total = (hx / (hy * safe) * mean_square(flow_x[:, :-1], flow_x[:, 1:]))[cells.k > 0].sum()
    total += (hy / (hx * safe) * mean_square(flow_y[:-1], flow_y[1:]))[cells.k > 0].sum()
    total += (cells.film_x / hy * flow_x**2).sum()
    total += (cells.film_y / hx * flow_y**2).sum()
    return float(total)


def indicators(cells: Cells, high: Upper, low: Lower) -> tuple[Array, Array]:
    """Share of the gap that splitting each column and each row would attack.

    As in ``networks.indicators``: the energy of the difference between the flow of one side and the
    gradient of the other, by the direction in which it varies.
    """
    k, hx, hy = cells.k, cells.hx, cells.hy[:, None]
    solid = k > 0
    safe = np.where(solid, k, 1.0)
    field = high.temperatures
    dx, dy = np.diff(field, axis=1), np.diff(field, axis=0)
    scale = low.conductance / _entering(cells, low.flow_x, low.flow_y)
    a0, a1 = k * dx[:-1] / hx, k * dx[1:] / hx
    b0, b1 = k * dy[:, :-1] / hy, k * dy[:, 1:] / hy
    left, right = scale * low.flow_x[:, :-1] / hy, scale * low.flow_x[:, 1:] / hy
    outer, inner = scale * low.flow_y[:-1] / hx, scale * low.flow_y[1:] / hx
    area = np.where(solid, hx * hy / safe, 0.0)
    mean = ((a0 + a1 - left - right) / 2.0) ** 2 + ((b0 + b1 - outer - inner) / 2.0) ** 2
    by_x = ((right - left) ** 2 + (b1 - b0) ** 2) / 12.0
    by_y = ((a1 - a0) ** 2 + (inner - outer) ** 2) / 12.0
    share = np.where(by_x + by_y > 0, by_x / np.maximum(by_x + by_y, 1e-300), 0.5)
    columns = (area * (by_x + mean * share)).sum(axis=0)
    rows = (area * (by_y + mean * (1.0 - share))).sum(axis=1)
    columns += _film_scores(cells.film_y, cells.air_y, scale * low.flow_y, field, k, hx)
    flow, film, air = low.flow_x.T, cells.film_x.T, cells.air_x.T
    rows += _film_scores(film, air, scale * flow, field.T, k.T, cells.hy)
    return columns, rows


def _film_scores(
    film: Array, air: Array, flow: Array, field: Array, k: Array, length: Array
) -> Array:
    """By column, what the flows through films and the drops over them disagree by."""
    there = film > 0
    behind = np.vstack([k > 0, np.zeros((1, k.shape[1])) > 0])  # solid behind the face
    out = np.where(behind, flow, -flow) / length
    safe = np.where(there, film, 1.0)
    first, second = (field[:, :-1] - air) / safe - out, (field[:, 1:] - air) / safe - out
    scores: Array = np.where(there, length * film * mean_square(first, second), 0.0).sum(axis=0)
    return scores
