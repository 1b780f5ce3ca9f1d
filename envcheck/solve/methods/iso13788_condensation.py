"""Condensation and drying at the faces of layers, month by month, by vapour diffusion alone."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from math import ceil
from typing import NamedTuple

from envcheck.solve.registry import Method

SOURCE = "ISO 13788:2012, 6"
PERMEABILITY = 2e-10
"""Of still air, kg/(m s Pa). Source: ISO 13788:2012 (from memory)."""
THICK = 0.25
"""m2 K/W; a layer of more is cut into equal parts of at most that. Source: ISO 13788:2012, 6
(from memory)."""
DAY = 86400.0
NOTHING = 1e-15
"""kg/(m2 s) below which a face counts as dry: 3e-9 kg/m2 in a month."""
MOST_PARTS = 100

Point = tuple[float, float]
"""sd from the outer surface, m, and vapour pressure, Pa."""


class Change(NamedTuple):
    """Water at one face over a part of a month."""

    face: int
    days: float
    part: int
    outer: Point
    at: Point
    inner: Point
    change: float
    """kg/m2"""
    after: float
    """kg/m2"""


def parts_of(resistance: float) -> int:
    """Number of equal parts that a layer is cut into: n = R / 0.25 rounded up, at least 1."""
    return max(ceil(resistance / THICK - 1e-9), 1)


def touching(points: Sequence[Point], wet: Sequence[int] = ()) -> list[int]:
    """Faces at which the vapour pressure is that of saturation, and both ends.

    points: of the air at both surfaces, and of saturation at each face between, outside first, sd
    rising. wet: faces that hold water. Between wet faces and ends the pressure follows the highest
    line that is nowhere above saturation and bends at no face but to condense there: the lower
    convex hull. Any number of points from two. Returns indices, outside first.
    Source: ISO 13788:2012, 6 (drawn there with string and tangents; from memory).
    """
    found = [0]
    for end in (*sorted(wet), len(points) - 1):
        chain = [found[-1]]
        for index in range(found[-1] + 1, end + 1):
            while len(chain) > 1 and _bends(points, chain[-2], chain[-1], index) <= 0.0:
                chain.pop()
            chain.append(index)
        found += chain[1:]
    return found


def _bends(points: Sequence[Point], before: int, at: int, after: int) -> float:
    return rate(points[before], points[at], points[after])


def rate(outer: Point, at: Point, inner: Point) -> float:
    """Water that collects at a face: g = d0 ((p_in - p) / (s_in - s) - (p - p_out) / (s - s_out)).

    Points of (sd, m; pressure, Pa), sd rising. Returns kg/(m2 s), negative where it dries.
    Source: ISO 13788:2012, 6 (from memory).
    """
    arriving = (inner[1] - at[1]) / (inner[0] - at[0])
    leaving = (at[1] - outer[1]) / (at[0] - outer[0])
    return PERMEABILITY * (arriving - leaving)


def month_of(points: Sequence[Point], held: Mapping[int, float], days: float) -> list[Change]:
    """What collects and dries in one month.

    points: as :func:`touching`. held: water at faces at its start, kg/m2. days: its length. A
    month in which a face dries out is cut there, and the rest goes on without that face.
    """
    amounts, left, found = dict(held), days, []
    for part in range(1, MOST_PARTS):
        wet = [face for face, amount in amounts.items() if amount > 0.0]
        line = touching(points, wet)
        rates = {
            at: rate(points[before], points[at], points[after]) * DAY
            for before, at, after in zip(line, line[1:], line[2:], strict=False)
        }
        rates = {at: g for at, g in rates.items() if at in wet or g > NOTHING * DAY}
        dries = {at: amounts[at] / -g for at, g in rates.items() if g < 0.0}
        step = min([left, *dries.values()])
        for place in range(1, len(line) - 1):
            at = line[place]
            if at not in rates:
                continue
            after = amounts.get(at, 0.0) + rates[at] * step
            amounts[at] = 0.0 if dries.get(at) == step else max(after, 0.0)
            outer, inner = points[line[place - 1]], points[line[place + 1]]
            found.append(
                Change(at, step, part, outer, points[at], inner, rates[at] * step, amounts[at])
            )
        left -= step
        if left <= 0.0 or not rates:
            break
    return found


def starts(months: Sequence[Sequence[Point]]) -> list[int]:
    """Months in which a dry construction begins to condense after one in which it does not.

    All year round: the first month. Never: none.
    Source: ISO 13788:2012, 6, starting month (from memory).
    """
    damp = [bool(month_of(points, {}, 1.0)) for points in months]
    if all(damp):
        return [0]
    return [month for month, each in enumerate(damp) if each and not damp[month - 1]]


def year_from(
    start: int, months: Sequence[Sequence[Point]], days: Sequence[float]
) -> list[tuple[int, list[Change]]]:
    """Twelve months on end, from a dry start: (month, changes) in order of time."""
    held: dict[int, float] = {}
    found = []
    for place in range(start, start + len(months)):
        month = place % len(months)
        changes = month_of(months[month], held, days[month])
        for change in changes:
            held[change.face] = change.after
        found.append((month, changes))
    return found


METHODS = (
    Method(
        name="iso13788_condensation",
        title="Condensation and drying at layer faces, by month (advisory)",
        formula="g = 2e-10 ((p_in - p) / (s_in - s) - (p - p_out) / (s - s_out)) at faces where p "
        "= psat, sd = mu d; layers of more than 0.25 m2 K/W in equal parts; air layers sd = 0.01 m",
        source=SOURCE,
        valid="vapour diffusion through layers in series at monthly means; no rain, built-in "
        "water, air flow, storage, capillary flow or sun; never a verdict, and no favourable "
        "statement for timber roofs, insulation inside masonry, framed layers, ventilated spaces",
    ),
)
