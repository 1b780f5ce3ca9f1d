"""The yardstick for sections: finite volumes on an even mesh, as plainly as they can be written.

Every piece of the section is cut into cells of about one size; harmonic means between centres,
films in series with half cells, sides adiabatic, one sparse direct solution. It has no error
estimate: the caller doubles the mesh until the known error is reached.
"""

from __future__ import annotations

import math

import numpy as np
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import splu

from envcheck.solve.field.section import Section


def cells(sizes: tuple[float, ...], size: float) -> tuple[np.ndarray, np.ndarray]:
    """Cell sizes of about ``size`` (m), and the piece that each lies in."""
    counts = [max(1, math.ceil(length / size - 1e-9)) for length in sizes]
    pieces = np.repeat(np.arange(len(sizes)), counts)
    return np.array(sizes)[pieces] / np.array(counts)[pieces], pieces


def u_factor(of: Section, size: float) -> tuple[float, int]:
    """U in W/(m2 K) on cells of about ``size``, and how many cells there are."""
    hx, columns = cells(of.widths, size)
    hy, rows = cells(of.depths, size)
    k = np.array(of.conductivities)[np.ix_(rows, columns)]
    half_x, half_y = hx / (2 * k), hy[:, None] / (2 * k)
    along = hy[:, None] / (half_x[:, :-1] + half_x[:, 1:])
    across = hx / (half_y[:-1] + half_y[1:])
    out, into = hx / (of.outside + half_y[0]), hx / (of.inside + half_y[-1])
    index = np.arange(k.size).reshape(k.shape)
    a = np.concatenate([index[:, :-1].ravel(), index[:-1].ravel()])
    b = np.concatenate([index[:, 1:].ravel(), index[1:].ravel()])
    g = np.concatenate([along.ravel(), across.ravel()])
    diagonal = np.bincount(a, g, k.size) + np.bincount(b, g, k.size)
    source = np.zeros(k.size)
    diagonal[index[0]] += out
    diagonal[index[-1]] += into
    source[index[-1]] = into
    entries = np.concatenate([-g, -g, diagonal])
    every = index.ravel()
    places = (np.concatenate([a, b, every]), np.concatenate([b, a, every]))
    matrix = coo_matrix((entries, places)).tocsc()
    found = splu(
        matrix,
        permc_spec="MMD_AT_PLUS_A",
        diag_pivot_thresh=0.0,
        options={"SymmetricMode": True},
    ).solve(source)
    return float((out * found[index[0]]).sum() / sum(of.widths)), k.size
