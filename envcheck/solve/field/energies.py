"""Where the heat of a solved section goes: energies and flows of its pieces."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from envcheck.solve.field.bound import Bounds
from envcheck.solve.field.networks import mean_square
from envcheck.solve.field.section import Array, Section


class Energies(NamedTuple):
    """Shares of the energy of the field, and of the heat flow; not bounded, unlike the value.

    The shares of ``along``, ``across`` and both films sum to 1. The share of a piece is the
    elasticity of U by its conductivity, dU/dk = (1/w) int |grad T|^2; that of a film the
    elasticity by its conductance.
    """

    along: Array
    """(rows, columns) of the section: share that flows along the wall, int k (dT/dx)^2"""
    across: Array
    """(rows, columns): share that flows across it, int k (dT/dy)^2"""
    outside: float
    inside: float
    flow: Array
    """(rows, columns): share of the heat that crosses the middle of each row in that column."""


def energies(section: Section, found: Bounds) -> Energies:
    """Sum the energy of the node-centred field over the pieces of the section.

    Source: U is the least energy, whose derivative by a conductivity is that of the energy with
    the field held (envelope theorem); stretching a row by 1 + e scales its energy across by
    1/(1 + e) and along by 1 + e.
    """
    grid, field = found.grid, found.temperatures
    k = np.asarray(section.conductivities, dtype=float)[np.ix_(grid.rows, grid.columns)]
    hx, hy = grid.hx, grid.hy[:, None]
    dx, dy = np.diff(field, axis=1), np.diff(field, axis=0)
    along = k * hy / hx * mean_square(dx[:-1], dx[1:])
    across = k * hx / hy * mean_square(dy[:, :-1], dy[:, 1:])
    outer, inner = field[0], 1.0 - field[-1]
    outside = float((hx * mean_square(outer[:-1], outer[1:])).sum() / section.outside)
    inside = float((hx * mean_square(inner[:-1], inner[1:])).sum() / section.inside)
    total = float(along.sum() + across.sum()) + outside + inside
    flows = k * hx / hy * (dy[:, :-1] + dy[:, 1:]) / 2.0
    return Energies(
        _by_piece(section, found, along) / total,
        _by_piece(section, found, across) / total,
        outside / total,
        inside / total,
        _through(section, found, flows),
    )


def _by_piece(section: Section, found: Bounds, cells: Array) -> Array:
    """Sum the cells of the grid over the pieces of the section."""
    summed = np.zeros((len(section.depths), len(section.widths)))
    np.add.at(summed, np.ix_(found.grid.rows, found.grid.columns), cells)
    return summed


def _through(section: Section, found: Bounds, flows: Array) -> Array:
    """Shares of the flow through the middle of each row, by column."""
    through = np.zeros((len(section.depths), len(section.widths)))
    for row in range(len(section.depths)):
        places = np.flatnonzero(found.grid.rows == row)
        depths = np.cumsum(found.grid.hy[places])
        middle = places[np.searchsorted(depths, depths[-1] / 2.0)]
        np.add.at(through[row], found.grid.columns, flows[middle])
    shares: Array = through / through.sum(axis=1, keepdims=True)
    return shares
