"""What the benchmarks measure within one process: sections and sweeps, imports left out.

Everything here runs in one thread, and seconds are those of the processor, which other processes
lengthen less than those of the clock.
"""

from __future__ import annotations

import time
from collections.abc import Callable
from itertools import islice
from statistics import median
from typing import NamedTuple

import numpy as np

from envcheck.solve.field.bound import bound
from envcheck.solve.field.section import Section
from envcheck.solve.network import parallel, plane_wall, series
from envcheck.solve.sweep import sweep
from tests.benchmarks.even_mesh import u_factor
from tests.solve.field.sections import BLOCK, CHEEK, WOOD, accepted, c_stud, random_section

VARIANTS = 1_000_000
LAYERS = 10
EIGHT = 8
"""Bytes of a number."""
STREAM = 8_000_000
"""Numbers of each array of the memory yardstick: 64 MB."""


def timed(run: Callable[[], object], runs: int) -> float:
    """Median processor seconds of some runs after one to warm up."""
    times = []
    for _ in range(runs + 1):
        start = time.process_time()
        run()
        times.append(time.process_time() - start)
    return median(times[1:])


# ------------------------------------------------------------------------------------- sections


def mixed_sections() -> list[Section]:
    """A hundred: studs of wood and steel, blocks, a dormer cheek, and 60 at random."""
    drawn = [WOOD, BLOCK, CHEEK, c_stud(), c_stud(outer=True), c_stud(lip=12.7)]
    scaled = [
        of._replace(widths=tuple(w * by for w in of.widths))
        for by in (0.7, 0.85, 1.0, 1.2, 1.4, 1.6, 1.8)
        for of in drawn
    ][:40]
    rng = np.random.default_rng(7)
    return [*scaled, *islice(accepted(random_section, rng, 60), 60)]


def mixed_seconds() -> float:
    """To bound a hundred mixed sections to 0.1 %, or to the caps of rounds and nodes."""
    sections = mixed_sections()
    return timed(lambda: [bound(of) for of in sections], 1)


class Against(NamedTuple):
    """Bounds against the even mesh at equal true error."""

    ours: float
    """s, the whole refinement"""
    error: float
    """Of the worse of both bounds."""
    even: float
    """s, one solution on the first mesh that is as near"""
    cells: int
    even_error: float


def against_even_mesh() -> Against:
    """The C-stud to 0.3 %: what the even mesh takes to come as near to the true value.

    True value: the middle of bounds 0.004 % apart. Only the last mesh is counted, as if its size
    had been known.
    """
    of = c_stud()._replace(periodic=False)
    sharp = bound(of, 5e-5)
    true = (sharp.low + sharp.high) / 2.0
    ours = timed(lambda: bound(of, 3e-3), 5)
    found = bound(of, 3e-3)
    error = max(found.high - true, true - found.low) / true
    size, even, count, off = 2e-3, 0.0, 0, 1.0
    while off > error:
        size /= 1.2
        start = time.process_time()
        value, count = u_factor(of, size)
        even = time.process_time() - start
        off = abs(value / true - 1.0)
    return Against(ours, error, even, count, off)


# ---------------------------------------------------------------------------------------- sweep


def two_paths(*numbers: float) -> float:
    """U of a wall of ten layers, the last of them framed: thicknesses, then conductivities."""
    thickness, conductivity = numbers[:LAYERS], numbers[LAYERS:]
    plain = zip(thickness[:-1], conductivity[: LAYERS - 1], strict=True)
    common = series(0.04, 0.13, *(plane_wall(length, k) for length, k in plain))
    fill, member = (plane_wall(thickness[-1], k) for k in conductivity[-2:])
    return 1.0 / parallel((0.75, 0.25), (common + fill, common + member))


class Swept(NamedTuple):
    """A sweep against what memory gives."""

    seconds: float
    rate: float
    """Bytes a second: every number read once and every result written once."""
    ceiling: float
    """Bytes a second of the faster of copy and triad."""


def swept(runs: int = 7) -> Swept:
    """A million variants of a wall of two paths and ten layers, one thread, in turn with memory."""
    rng = np.random.default_rng(11)
    lengths = [rng.uniform(0.005, 0.2, VARIANTS) for _ in range(LAYERS)]
    stuffs = [rng.uniform(0.03, 1.0, VARIANTS) for _ in range(LAYERS + 1)]
    moved = EIGHT * VARIANTS * (len(lengths) + len(stuffs) + 1)
    a, b, c = (np.ones(STREAM) for _ in range(3))
    ours, copies, triads = [], [], []
    for _ in range(runs):
        ours.append(timed(lambda: sweep(two_paths, *lengths, *stuffs), 1))
        copies.append(timed(lambda: np.copyto(a, b), 1))
        triads.append(timed(lambda: triad(a, b, c), 1))
    ceiling = max(2 * EIGHT * STREAM / median(copies), 3 * EIGHT * STREAM / median(triads))
    return Swept(median(ours), moved / median(ours), ceiling)


def triad(a: np.ndarray, b: np.ndarray, c: np.ndarray, block: int = 4096) -> None:
    """a = 3 b + c, in blocks, so that only the three arrays travel to memory."""
    for start in range(0, a.size, block):
        part = slice(start, start + block)
        np.multiply(b[part], 3.0, out=a[part])
        np.add(a[part], c[part], out=a[part])
