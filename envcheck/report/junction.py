"""A drawn detail from drawing to psi, and the lowest inside surface temperature."""

from __future__ import annotations

from typing import TYPE_CHECKING

from envcheck import units
from envcheck.model.project import Site
from envcheck.report import numbers
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Facts, Grid, Pair, Paragraph, Section

if TYPE_CHECKING:
    from envcheck.model.details import Coldest, Detail, SolvedDetail, SolvedFlank

NOT_BOUNDED = (
    "Information: read from the solved temperatures, not bounded as the heat flow is, and held "
    "against no limit here."
)
PSI_DECIMALS = {"SI": 4, "IP": 5}


def sections(detail: Detail, solved: SolvedDetail | str, site: Site, system: str) -> list[Section]:
    """The page of one detail; ``solved`` is the reason where it could not be solved."""
    pairs = [
        ("sheet", detail.sheet),
        ("title", detail.title),
        ("measured", f"{detail.measured} dimensions"),
        ("pieces", str(sum(r.material is not None for r in detail.rectangles))),
    ]
    made = [Section("As drawn", (_facts(pairs), _pieces(detail, system)))]
    if isinstance(solved, str):
        return [*made, Section("Linear transmittance", (Paragraph(f"Not solved: {solved}."),))]
    made.append(_psi(detail, solved, system))
    if solved.coldest is not None:
        made.append(surface(solved.coldest, site, system))
    return made


def _facts(pairs: list[tuple[str, str]]) -> Facts:
    return Facts(tuple(Pair(label, clean(text)) for label, text in pairs if text))


def _pieces(detail: Detail, system: str) -> Grid:
    rows = [
        (
            clean(r.title),
            _span(r.left, r.right, system),
            _span(r.bottom, r.top, system),
            numbers.conductivity(r.material.conductivity, system) if r.material else "",
            numbers.resistance(r.film, system) if r.material is None else "",
        )
        for r in detail.rectangles
    ]
    heads = (
        "piece, later ones on top",
        f"x, {units.label('thickness', system)}",
        f"y, {units.label('thickness', system)}",
        f"k, {units.label('conductivity', system)}",
        f"film, {units.label('resistance', system)}",
    )
    return Grid(heads, tuple(rows), (3, 4), (0,))


def _span(start: float, end: float, system: str) -> str:
    ends = (_place(start, system), _place(end, system))
    return f"{ends[0]} to {ends[1]}"


def _place(value: float, system: str) -> str:
    shown = numbers.in_system(value, "thickness", system)
    return numbers.trimmed(shown, 4 if system == "IP" else 1)


def _psi(detail: Detail, solved: SolvedDetail, system: str) -> Section:
    unit = units.label("linear_transmittance", system)
    pairs = [
        ("L2D", f"{_interval(solved.low, solved.high, system)} {unit}; {solved.note}"),
        ("psi", f"{_interval(solved.psi_low, solved.psi_high, system)} {unit}, by {detail.measured}"
                " dimensions"),
        ("formula", "psi = L2D - sum of U l (ISO 10211:2017); the high end enters a value"),
    ]  # fmt: skip
    rows = tuple(_flank(flank, system) for flank in solved.flanks)
    run = units.label("run", system)
    heads = (
        "flank",
        "cut",
        f"R, {units.label('resistance', system)}",
        f"U, {units.label('u_factor', system)}",
        f"length, {run}",
        f"outer, {run}",
        f"inner, {run}",
        "flow",
    )
    note = (
        "R and U are those of the layers that the cut shows, without and with the films of the "
        "drawing; outer and inner are how far both faces run on from the cut. The flow at the cut "
        "is a share of what those layers alone would pass: near 100 % where the cut lies far "
        "enough from the junction."
    )
    blocks: tuple[Block, ...] = (
        _facts(pairs), Grid(heads, rows, (2, 3, 4, 5, 6, 7), (0,)), Paragraph(note),
    )  # fmt: skip
    return Section("Linear transmittance", blocks)


def _interval(low: float, high: float, system: str) -> str:
    ends = [numbers.in_system(end, "linear_transmittance", system) for end in (low, high)]
    return " to ".join(numbers.interval(ends[0], ends[1], PSI_DECIMALS[system]))


def _flank(flank: SolvedFlank, system: str) -> tuple[str, ...]:
    lengths = (flank.length, flank.face_outside, flank.face_inside)
    return (
        clean(flank.assembly),
        flank.cut,
        numbers.resistance(flank.resistance, system),
        numbers.significant(numbers.in_system(flank.u_factor, "u_factor", system), 5),
        *(numbers.trimmed(numbers.in_system(each, "run", system), 3) for each in lengths),
        numbers.percent(flank.even),
    )


def surface(found: Coldest | str, site: Site, system: str) -> Section:
    """The lowest inside surface temperature as a factor, and in degrees where both airs are known.

    found: the reason where there is none.
    """
    heading = "Lowest inside surface temperature"
    if isinstance(found, str):
        return Section(heading, (Paragraph(f"Not given: {clean(found)}."),))
    film = f"{numbers.resistance(found.film, system)} {units.label('resistance', system)}"
    pairs = [
        ("factor", f"f_Rsi = (Tsi - Te) / (Ti - Te) = {numbers.fixed(found.factor, 3)}"),
        ("where", _where(found, system)),
        ("films", f"{film} inside (ISO 13788 and ISO 10211, opaque parts; from memory), more than "
                  "a U-factor counts"),
    ]  # fmt: skip
    if site.indoor_temperature is not None and site.outdoor_temperature is not None:
        outdoor, indoor = site.outdoor_temperature, site.indoor_temperature
        at = outdoor + found.factor * (indoor - outdoor)
        airs = tuple(numbers.temperature(air, system) for air in (outdoor, indoor))
        text = f"{numbers.temperature(at, system)} between air of {airs[0]} and {airs[1]}"
        pairs.append(("temperature", text))
    return Section(heading, (_facts(pairs), Paragraph(NOT_BOUNDED)))


def _where(found: Coldest, system: str) -> str:
    if found.x is None or found.y is None:
        return "all of the inner face: layers in series"
    unit = units.label("thickness", system)
    return f"x = {_place(found.x, system)} {unit}, y = {_place(found.y, system)} {unit}"
