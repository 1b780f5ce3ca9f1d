"""The two resistor networks of a box, seven points each, and their exact energies.

Unit temperatures: outdoor air 0, indoor air 1. Flows towards lower indices (towards the outside,
in axis 0) count positive. As in two dimensions the node-centred network gives a temperature field
whose energy is an upper bound of the conductance L whatever the field, and the cell-centred one
gives flows: any flow that is conserved in every cell bounds 1/L from above by its complementary
energy. So neither an inexact solution nor a coarse grid can make a bound wrong, only wide.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple, TypeVar

import numpy as np
import numpy.typing as npt
from scipy.sparse import csr_array

from envcheck.solve.box import Box
from envcheck.solve.field.box_grid import BoxGrid, Exposure, Marks, exposures, repeats
from envcheck.solve.field.section import Array

RESIDUAL = 1e-6
"""Residual of a solution as a share of the sources."""
MOST_STEPS = 4000
"""Of the conjugate gradients; what they reach by then is bounded like anything else."""

_T = TypeVar("_T", bound=np.generic)

EVEN = 0.1
"""Share of the mean disagreement in a cell that counts for all axes alike: by symmetry a cell may
vary along none of them."""

_Moments = tuple[Array, Array, Array, Array]
"""Mean, slope along one edge, slope along the other, twist of what runs bilinearly on faces."""


class BoxUpper(NamedTuple):
    """The node-centred side."""

    conductance: float
    """L, W/K, never too low"""
    temperatures: Array
    """At the grid nodes, one more than cells along each axis; not bounded."""


class BoxLower(NamedTuple):
    """The cell-centred side."""

    conductance: float
    """L, W/K, never too high"""
    temperatures: Array
    """At the cells' middles."""
    flows: tuple[Array, Array, Array]
    """W/K through the faces along each axis, one more than cells along it."""
    imbalance: float
    """Share of the flow that had to be moved so that every cell conserves it."""


def _moments(values: Array, one: int, other: int) -> _Moments:
    """Of node values along two axes, for each face between the nodes."""
    mean, along_one = _halves(values, one)
    mean, along_other = _halves(mean, other)
    along_one, twist = _halves(along_one, other)
    return mean, along_one, along_other, twist


def _halves(values: Array, axis: int) -> tuple[Array, Array]:
    """Mean and difference of neighbours along an axis."""
    low, high = np.delete(values, -1, axis), np.delete(values, 0, axis)
    return (low + high) / 2.0, high - low


def _mean_square(mean: Array, one: Array, other: Array, twist: Array) -> Array:
    """Mean over a face of the square of what runs bilinearly on it: squares only."""
    squared: Array = mean**2 + (one**2 + other**2) / 12.0 + twist**2 / 144.0
    return squared


def _others(axis: int) -> tuple[int, int]:
    one, other = (a for a in range(3) if a != axis)
    return one, other


def _side(values: npt.NDArray[_T], axis: int, side: int) -> npt.NDArray[_T]:
    """Node (or face) values on one side of every cell along an axis, as a view."""
    at = [slice(None)] * 3
    at[axis] = slice(None, -1) if side == 0 else slice(1, None)
    return values[tuple(at)]


# --------------------------------------------------------------------------- node-centred


def upper(box: Box, grid: BoxGrid, k: Array, start: Array | None = None) -> BoxUpper:
    """Solve the node-centred network and evaluate the exact energy of its field.

    k: conductivities of the cells, W/(m K), 0 where air lies. start: node temperatures to start
    from.
    """
    air = exposures(box, k)
    index = _node_index(box, k.shape)
    edges = []
    for axis in range(3):
        share = _spread(k * grid.across(axis) / (4.0 * grid.along(axis)), *_others(axis))
        edges.append((_side(index, axis, 0), _side(index, axis, 1), share))
    diagonal, source = np.zeros(index.max() + 1), np.zeros(index.max() + 1)
    for face in air:
        share = np.where(face.cells, grid.across(face.axis) / (4.0 * face.resistance), 0.0)
        at = _side(index, face.axis, face.side).ravel()
        found = np.bincount(at, _spread(share, *_others(face.axis)).ravel(), len(diagonal))
        diagonal += found
        source += found * face.air
    guess = None
    if start is not None:
        guess = np.zeros(len(diagonal))
        guess[index.ravel()] = start.ravel()
    field = _solve(edges, diagonal, source, guess)[index]
    return BoxUpper(_energy(grid, k, air, field), field)


def _node_index(box: Box, shape: tuple[int, ...]) -> npt.NDArray[np.intp]:
    """Number of the unknown at each node; nodes on the two ends of a repeat are one."""
    free = tuple(
        n if wraps else n + 1 for n, wraps in zip(shape, repeats(box), strict=True)
    )  # fmt: skip
    index = np.arange(int(np.prod(free))).reshape(free)
    for axis, wraps in enumerate(repeats(box)):
        if wraps:
            index = np.concatenate([index, np.take(index, [0], axis)], axis)
    return index


def _spread(share: Array, *axes: int) -> Array:
    """Give every cell's share to the nodes at both of its ends along the axes."""
    for axis in axes:
        nothing = np.zeros_like(np.take(share, [0], axis))
        share = np.concatenate([share, nothing], axis) + np.concatenate([nothing, share], axis)
    return share


def _energy(grid: BoxGrid, k: Array, air: Sequence[Exposure], field: Array) -> float:
    """Energy of a trilinear field, exactly."""
    total = 0.0
    for axis in range(3):
        slopes = _moments(np.diff(field, axis=axis), *_others(axis))
        total += float((k * grid.across(axis) / grid.along(axis) * _mean_square(*slopes)).sum())
    for face in air:
        share = np.where(face.cells, grid.across(face.axis), 0.0) / face.resistance
        total += float((share * _mean_square(*_drop(field, face))).sum())
    return total


def _drop(field: Array, face: Exposure) -> _Moments:
    """Temperature of the exposed faces over that of the air."""
    mean, one, other, twist = _moments(_side(field, face.axis, face.side), *_others(face.axis))
    return mean - face.air, one, other, twist


# --------------------------------------------------------------------------- cell-centred


def lower(box: Box, grid: BoxGrid, k: Array, start: Array | None = None) -> BoxLower:
    """Solve the cell-centred network and evaluate the exact energy of its flow.

    The flows through the side faces are those of the network; the ones through the wall are
    summed from the outer face inwards, so that every cell conserves what flows through it
    whatever the residual of the solution.
    """
    air = exposures(box, k)
    half = [_half(grid, k, axis) for axis in range(3)]
    index = np.arange(k.size).reshape(k.shape)
    inner = [_conductances(half[axis], grid, axis, repeats(box)[axis]) for axis in range(3)]
    edges = [
        (index, np.roll(index, -1, axis), inner[axis]) for axis in range(3)
    ]  # fmt: skip
    diagonal, source = np.zeros(k.size), np.zeros(k.size)
    films = []
    for face in air:
        film = np.zeros(k.shape)
        area = np.broadcast_to(grid.across(face.axis), k.shape)[face.cells]
        film[face.cells] = area / (face.resistance + half[face.axis][face.cells])
        films.append(film)
        diagonal += film.ravel()
        source += film.ravel() * face.air
    guess = None if start is None else start.ravel()
    found = _solve(edges, diagonal, source, guess).reshape(k.shape)
    flows, total, imbalance = _conserved(k > 0, found, inner, air, films)
    complementary = _complementary(grid, k, air, flows)
    conductance = total**2 / complementary
    scaled = tuple(flow * (conductance / total) for flow in flows)
    return BoxLower(conductance, found, (scaled[0], scaled[1], scaled[2]), imbalance)


def _half(grid: BoxGrid, k: Array, axis: int) -> Array:
    """Resistance of half a cell along an axis, m2 K/W; without end in air."""
    with np.errstate(divide="ignore"):
        half: Array = grid.along(axis) / (2.0 * k)
    return half


def _conductances(half: Array, grid: BoxGrid, axis: int, wraps: bool) -> Array:
    """Between every cell and the next along an axis, W/K; 0 beyond a closed end."""
    found = grid.across(axis) / (half + np.roll(half, -1, axis))
    if not wraps:
        last = [slice(None)] * 3
        last[axis] = slice(-1, None)
        found[tuple(last)] = 0.0
    return found


def _conserved(
    solid: Marks, found: Array, inner: list[Array], air: Sequence[Exposure], films: list[Array]
) -> tuple[list[Array], float, float]:
    """Flows through all faces that every cell conserves, their total, and what was moved."""
    flows = []
    for axis in (0, 1, 2):
        inside = inner[axis] * (np.roll(found, -1, axis) - found)
        flows.append(np.concatenate([np.take(inside, [-1], axis), inside], axis))
    outer = np.zeros(found.shape[1:])
    total = 0.0
    for face, film in zip(air, films, strict=True):
        flow = film * (found - face.air) * (1.0 if face.side == 0 else -1.0)
        if face.axis:
            _side(flows[face.axis], face.axis, face.side)[...] += flow
        elif face.side == 0:
            outer += flow.sum(axis=0)
        if face.air == 0.0:
            total += float(flow.sum()) * (1.0 if face.side == 0 else -1.0)
    gained = np.where(solid, np.diff(flows[1], axis=1) + np.diff(flows[2], axis=2), 0.0)
    start = outer[None]
    through = np.concatenate([start, start - np.cumsum(gained, axis=0)])
    moved = sum(
        np.abs(film * (1.0 - found) - np.where(face.cells, through[1:], 0.0)).sum()
        for face, film in zip(air, films, strict=True)
        if face.axis == 0 and face.side == 1
    )
    return [through, flows[1], flows[2]], total, float(moved) / total


def _complementary(
    grid: BoxGrid, k: Array, air: Sequence[Exposure], flows: Sequence[Array]
) -> float:
    """Complementary energy of a flow that runs linearly through each cell."""
    total = 0.0
    with np.errstate(divide="ignore"):
        resistivity = np.where(k > 0, 1.0 / k, 0.0)
    for axis, flow in enumerate(flows):
        mean, slope = _halves(flow, axis)
        weight = resistivity * grid.along(axis) / grid.across(axis)
        total += float((weight * (mean**2 + slope**2 / 12.0)).sum())
    for face in air:
        flow = _side(flows[face.axis], face.axis, face.side)
        share = np.where(face.cells, face.resistance / grid.across(face.axis), 0.0)
        total += float((share * flow**2).sum())
    return total


# ------------------------------------------------------------------------------ both


def _solve(
    edges: Sequence[tuple[npt.NDArray[np.intp], npt.NDArray[np.intp], Array]],
    diagonal: Array,
    source: Array,
    start: Array | None,
) -> Array:
    """Temperatures of a resistor network by conjugate gradients, preconditioned by Jacobi.

    diagonal: conductances to air, W/K, whose sum with those of the edges makes the diagonal.
    """
    size = len(diagonal)
    rows, columns, values = [], [], []
    for one, other, conductance in edges:
        g = conductance.ravel()
        there = np.flatnonzero(g)
        a, b, g = one.ravel()[there], other.ravel()[there], g[there]
        rows += [a, b]
        columns += [b, a]
        values += [-g, -g]
        diagonal = diagonal + np.bincount(a, g, size) + np.bincount(b, g, size)
    diagonal = np.where(diagonal > 0, diagonal, 1.0)  # a node or cell amid air
    scale = 1.0 / np.sqrt(diagonal)
    ends = [np.concatenate(places).astype(np.int32) for places in (rows, columns)]
    scaled = np.concatenate(values) * scale[ends[0]] * scale[ends[1]]
    coupled = csr_array((scaled, (ends[0], ends[1])), shape=(size, size))
    guess = np.zeros(size) if start is None else start / scale
    found: Array = scale * _conjugate_gradients(coupled, scale * source, guess)
    return found


def _conjugate_gradients(coupled: csr_array, source: Array, found: Array) -> Array:
    """Solve (1 + coupled) x = source for a matrix of unit diagonal, by Hestenes and Stiefel (1952).

    Inner products stay with numpy's own loops: threads of a linear-algebra library cost more than
    they give on vectors of this length.
    """
    residual = source - found - coupled @ found
    direction = residual.copy()
    square = _dot(residual, residual)
    enough = RESIDUAL**2 * _dot(source, source)
    for _ in range(MOST_STEPS):
        if square <= enough:
            break
        image = coupled @ direction + direction
        step = square / _dot(direction, image)
        found = found + step * direction
        residual -= step * image
        before, square = square, _dot(residual, residual)
        direction *= square / before
        direction += residual
    return found


def _dot(one: Array, other: Array) -> float:
    return float(np.einsum("i,i->", one, other))


# ------------------------------------------------------------------------- where the gap sits


def indicators(
    box: Box, grid: BoxGrid, k: Array, high: BoxUpper, low: BoxLower
) -> tuple[Array, Array, Array]:
    """Share of the gap that splitting each row, course and column would attack.

    The gap is the energy of the difference between k grad T and the flow. The part of it that
    varies along an axis falls to that axis; the mean, also of what a film's flow and its
    temperature drop disagree by, in proportion.
    """
    shares = [np.zeros(k.shape) for _ in range(3)]
    means = np.zeros(k.shape)
    with np.errstate(divide="ignore"):
        resistivity = np.where(k > 0, 1.0 / k, 0.0)
    for axis in range(3):
        one, other = _others(axis)
        area, size = grid.across(axis), grid.along(axis)
        flow, along = _halves(low.flows[axis] / area, axis)
        gradient = k / size
        mean, *slopes = _moments(np.diff(high.temperatures, axis=axis), one, other)
        weight = resistivity * area * size
        means += weight * (gradient * mean - flow) ** 2
        shares[axis] += weight * along**2 / 12.0
        _share_slopes(shares, weight * gradient**2, slopes, one, other)
    for face in exposures(box, k):
        one, other = _others(face.axis)
        weight = np.where(face.cells, grid.across(face.axis), 0.0) * face.resistance
        flux = _side(low.flows[face.axis], face.axis, face.side) / grid.across(face.axis)
        sign = 1.0 if face.side == 0 else -1.0
        mean, *slopes = _drop(high.temperatures, face)
        means += weight * (sign * mean / face.resistance - flux) ** 2
        _share_slopes(shares, weight / face.resistance**2, slopes, one, other)
    varies = np.maximum(sum(shares), 1e-300)
    by_axis = [np.where(varies > 1e-200, share / varies, 1.0 / 3.0) for share in shares]
    rows, courses, columns = (
        share + means * (EVEN / 3.0 + (1.0 - EVEN) * part)
        for share, part in zip(shares, by_axis, strict=True)
    )
    return rows.sum(axis=(1, 2)), courses.sum(axis=(0, 2)), columns.sum(axis=(0, 1))


def _share_slopes(
    shares: list[Array], weight: Array, slopes: Sequence[Array], one: int, other: int
) -> None:
    """Give the slopes along two axes to them, and half of the twist to either."""
    along_one, along_other, twist = slopes
    shares[one] += weight * (along_one**2 / 12.0 + twist**2 / 288.0)
    shares[other] += weight * (along_other**2 / 12.0 + twist**2 / 288.0)
