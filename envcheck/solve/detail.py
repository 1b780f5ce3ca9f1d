"""Linear transmittance of a drawn detail: what its junction adds to the assemblies that meet."""

from __future__ import annotations

import itertools
from collections.abc import Sequence
from contextlib import suppress
from functools import lru_cache
from typing import TYPE_CHECKING

from envcheck.model.details import (
    Coldest,
    Crossing,
    Detail,
    Flank,
    SolvedDetail,
    SolvedFlank,
    crossings,
    face_lengths,
)
from envcheck.model.project import Project
from envcheck.solve.surface import STILL

if TYPE_CHECKING:
    from envcheck.solve.field.outline import Outline
    from envcheck.solve.field.outline_bound import OutlineBounds

TOLERANCE = 2e-4
"""Gap of the bounds of L2D, as a share of it; psi is a small difference of large numbers."""
SOURCE = "ISO 10211:2017: psi = L2D - sum of U l"


class NotSolved(Exception):
    """Why a detail has no value, in words."""


def linear_transmittance(
    conductance: tuple[float, float], flanks: tuple[tuple[float, float], ...]
) -> tuple[float, float]:
    """Bounds of psi = L2D - sum of U l, W/(m K).

    conductance: bounds of L2D, W/(m K). flanks: U, W/(m2 K), and length, m, of each assembly that
    meets, on one measuring basis. Source: ISO 10211:2017, and interval arithmetic: U of layers in
    series is exact, so both ends are those of L2D less one sum.
    """
    taken = sum(u * length for u, length in flanks)
    return conductance[0] - taken, conductance[1] - taken


@lru_cache(maxsize=256)
def solve_detail(detail: Detail, surfaces: bool = False) -> SolvedDetail:
    """Bound L2D and psi of a detail; with ``surfaces`` find its coldest inside surface as well.

    Errors: NotSolved with the reason. Loads numpy and scipy.
    """
    from envcheck.solve.field.networks import SolveError
    from envcheck.solve.field.outline_bound import bound_outline
    from envcheck.solve.field.section import ModelError

    outline = outline_of(detail)
    try:
        found = bound_outline(outline, TOLERANCE)
        coldest = _coldest(outline) if surfaces else None
    except (ModelError, SolveError) as why:
        raise NotSolved(str(why)) from why
    flanks = tuple(_flank(detail, flank, found) for flank in detail.flanks)
    psi = linear_transmittance(
        (found.low, found.high), tuple((flank.u_factor, flank.length) for flank in flanks)
    )
    note = (
        f"the drawn detail in two dimensions: {found.rounds} rounds, {found.nodes} nodes, "
        f"bounds {found.gap * 100:.2g} % apart"
    )
    if found.stopped_by != "tolerance":
        note += f", stopped by its most {found.stopped_by}"
    return SolvedDetail(detail.id, found.low, found.high, *psi, flanks, coldest, note)


def outline_of(detail: Detail) -> Outline:
    """The drawing as solids and air on its grid."""
    from envcheck.solve.field.outline import NOTHING, Air, Outline

    kinds: dict[Air, int] = {}
    airs, conductivities = [], []
    for rectangle in detail.rectangles:
        if rectangle.material is not None:
            conductivities.append(rectangle.material.conductivity)
            airs.append(NOTHING)
        else:
            air = Air(rectangle.indoors, rectangle.film)
            conductivities.append(0.0)
            airs.append(kinds.setdefault(air, len(kinds)))
    columns, rows = detail.columns, detail.rows
    return Outline(
        tuple(end - start for start, end in itertools.pairwise(columns)),
        tuple(end - start for start, end in itertools.pairwise(rows)),
        tuple(tuple(conductivities[number] for number in row) for row in detail.seen),
        tuple(tuple(airs[number] for number in row) for row in detail.seen),
        tuple(kinds),
    )


def _flank(detail: Detail, flank: Flank, found: OutlineBounds) -> SolvedFlank:
    (crossing,) = crossings(detail, flank.cut)
    resistance = 0.0
    for number, thickness in crossing.solids:
        material = detail.rectangles[number].material
        assert material is not None, "a crossing is made of solids"
        resistance += thickness / material.conductivity
    films = (
        detail.rectangles[crossing.outdoors].film,
        detail.rectangles[crossing.indoors].film,
    )
    u_factor = 1.0 / (resistance + sum(films))
    outside, inside = face_lengths(detail, flank.cut, crossing)
    return SolvedFlank(
        flank.assembly,
        flank.cut,
        flank.length,
        u_factor,
        resistance,
        outside,
        inside,
        _at_cut(detail, flank.cut, crossing, found) / films[1] / u_factor,
    )


def _at_cut(detail: Detail, edge: str, crossing: Crossing, found: OutlineBounds) -> float:
    """Temperature drop over the inner film at the cut, of 1."""
    from envcheck.solve.field.surfaces import temperature_at

    upright = edge in ("left", "right")
    place = crossing.first if crossing.indoors_first else crossing.last + 1
    at = (detail.rows if upright else detail.columns)[place]
    lines = detail.columns if upright else detail.rows
    end = lines[0] if edge in ("left", "bottom") else lines[-1]
    return 1.0 - (temperature_at(found, end, at) if upright else temperature_at(found, at, end))


def _coldest(outline: Outline) -> Coldest:
    from envcheck.solve.field.outline_bound import bound_outline
    from envcheck.solve.field.surfaces import coldest_inside, with_still_air

    spot = coldest_inside(bound_outline(with_still_air(outline, STILL), TOLERANCE))
    return Coldest(spot.factor, spot.x, spot.y, STILL)


def asked_by_bridges(project: Project) -> tuple[str, ...]:
    """Details that some bridge of an element takes its psi from."""
    found: dict[str, None] = {}
    for element in project.elements.values():
        for bridge in (*element.bridges, *project.assemblies[element.assembly].bridges):
            if bridge.detail is not None:
                found[bridge.detail.id] = None
    return tuple(found)


def solved_details(project: Project, names: Sequence[str]) -> dict[str, SolvedDetail]:
    """Solve drawn details; those that cannot be solved are left out (their bridges say why)."""
    found = {}
    for name in names:
        with suppress(NotSolved):
            found[name] = solve_detail(project.details[name])
    return found
