"""The moisture check in words and figures; advisory, so nothing here is favourable by itself."""

from __future__ import annotations

from collections.abc import Iterable
from functools import partial
from typing import NamedTuple

from envcheck import units
from envcheck.model.moisture import MONTHS, Check, Moisture, Month, Sheet, Year
from envcheck.model.project import Project
from envcheck.model.solved import Step
from envcheck.report import numbers, worksheet
from envcheck.report.inert import clean
from envcheck.report.rows import NO_FIGURE, Figure
from envcheck.report.worksheet import Line

NONE_COMPUTED = (
    "no condensation computed at the layer faces for the stated months; not a statement that the "
    "wall is dry"
)
SCOPE = (
    "Advisory, by ISO 13788 with monthly means: it is no verdict and changes none. Only vapour "
    "diffusion through the clear field is computed. Rain, built-in moisture, rising damp, air flow "
    "through leaks, storage, capillary flow, sun, edges, corners, members and fasteners are not. "
    "What it computes can call for advice; it cannot show that a construction is safe."
)


class MonthView(NamedTuple):
    """One month as printed."""

    month: str
    outdoor_temperature: Figure
    outdoor_pressure: Figure
    indoor_temperature: Figure
    indoor_pressure: Figure
    least_surface: Figure
    critical: Figure


class FaceView(NamedTuple):
    """One face at which water collects."""

    symbol: str
    title: str
    greatest: Figure
    month: str
    left: Figure
    amounts: tuple[Figure, ...]
    """At the end of each month, from January."""


class SheetView(NamedTuple):
    """One layer as vapour meets it."""

    title: str
    resistance: Figure
    ratio: str
    diffusion: Figure
    source: str


class MoistureView(NamedTuple):
    """One assembly."""

    assembly: str
    title: str
    sheet: str
    elements: tuple[str, ...]
    missing: tuple[str, ...]
    withheld: tuple[str, ...]
    says: tuple[str, ...]
    """What is computed, in words."""
    factor: Figure
    short: tuple[str, ...]
    layers: tuple[SheetView, ...]
    faces: tuple[FaceView, ...]
    start: str
    worksheet: tuple[Line, ...]


class CheckView(NamedTuple):
    """The check of a project."""

    scope: str
    missing: tuple[str, ...]
    outdoors: str
    indoors: str
    months: tuple[MonthView, ...]
    critical: Figure
    critical_month: str
    assemblies: tuple[MoistureView, ...]
    not_checked: tuple[str, ...]
    worksheet: tuple[Line, ...]


def build(check: Check, project: Project, system: str, details: bool) -> CheckView:
    """Put the check into words; ``details``: with worksheets. Errors: none for a check of the same
    project.
    """
    sums = partial(worksheet.write, system=system) if details else _no_sums
    critical = None if check.worst is None else check.months[check.worst].critical
    return CheckView(
        SCOPE,
        tuple(map(clean, check.missing)),
        clean(project.site.climate.source) if project.site.climate else "",
        clean(_indoors(project)),
        tuple(_month(name, one, system) for name, one in zip(MONTHS, check.months, strict=False)),
        _number(critical),
        "" if check.worst is None else MONTHS[check.worst],
        tuple(
            _assembly(one, critical, check.worst, system, sums(one.steps))
            for one in check.assemblies
        ),
        tuple(map(clean, check.left)),
        sums(check.steps),
    )


def _no_sums(steps: Iterable[Step]) -> tuple[Line, ...]:
    return ()


def _indoors(project: Project) -> str:
    air = project.site.indoor_air
    if air is None:
        return ""
    if air.humidity_class is None:
        return f"stated humidity, no margin added [{air.source}]"
    said = f"humidity class {air.humidity_class} at its upper bound, {air.excess:.0f} Pa at 0 degC"
    return f"{said} ({air.excess_source}) [{air.source}]"


def _month(name: str, month: Month, system: str) -> MonthView:
    return MonthView(
        name,
        _figure(month.outdoor_temperature, "temperature", system, 1),
        _figure(month.outdoor_pressure, "vapour_pressure", system, 0),
        _figure(month.indoor_temperature, "temperature", system, 1),
        _figure(month.indoor_pressure, "vapour_pressure", system, 0),
        _figure(month.least_surface, "temperature", system, 1),
        _number(month.critical),
    )


def _assembly(
    one: Moisture, critical: float | None, worst: int | None, system: str, sums: tuple[Line, ...]
) -> MoistureView:
    short = tuple(MONTHS[n] for n in one.short)
    year = one.year or Year(0, (), ())
    return MoistureView(
        clean(one.assembly),
        clean(one.title),
        clean(one.sheet),
        tuple(map(clean, one.elements)),
        tuple(map(clean, one.missing)),
        tuple(map(clean, one.withheld)),
        tuple(_says(one, year, critical, worst, system)),
        NO_FIGURE if one.missing else _number(one.factor),
        short,
        tuple(_layer(each, system) for each in one.sheets),
        _faces(year, system),
        MONTHS[year.start] if year.planes else "",
        sums,
    )


def _layer(each: Sheet, system: str) -> SheetView:
    resistance = numbers.resistance(each.resistance, system)
    return SheetView(
        clean(each.title),
        Figure(resistance, units.label("resistance", system)),
        "" if each.ratio is None else numbers.trimmed(each.ratio, 1),
        _figure(each.diffusion, "run", system, 3),
        clean(each.source),
    )


def _says(
    one: Moisture, year: Year, critical: float | None, worst: int | None, system: str
) -> Iterable[str]:
    if one.missing:
        return
    factor, needed = _number(one.factor).text, _number(critical).text
    if one.short:
        months = ", ".join(MONTHS[n] for n in one.short)
        yield (
            f"the plain surface falls below its critical temperature factor in {months}: f_Rsi = "
            f"{factor} against up to {needed}; air beside it then has more than 80 %"
        )
    elif worst is None:
        yield "surface: it is colder indoors in every month, so that no factor is asked for"
    elif one.withheld:
        yield f"plain surface: f_Rsi = {factor}, greatest critical factor {needed}; no statement"
    else:
        yield (
            f"plain surface: f_Rsi = {factor} is not below the greatest critical factor {needed} "
            f"({MONTHS[worst]}); edges, corners and bridges are colder and are not covered"
        )
    yield from _water(one, year, system)
    yield from one.notes


def _water(one: Moisture, year: Year, system: str) -> Iterable[str]:
    if not year.planes:
        nothing = "layer faces: no amount computed; no statement follows from that"
        yield nothing if one.withheld else NONE_COMPUTED
        return
    for number, plane in enumerate(year.planes, 1):
        most, left = _water_text(plane.greatest, system), _water_text(plane.left, system)
        where = clean(plane.title)
        said = f"condensation computed at C{number} ({where}): most {most} at the end of "
        said += f"{MONTHS[plane.month]}; after twelve months from {MONTHS[year.start]} "
        if plane.left > 0.0:
            yield f"{said}{left} is left, which adds up year by year"
        elif one.withheld:
            yield f"{said}none is left by this sum; no statement that it dries"
        else:
            yield f"{said}none is left by this sum"


def _faces(year: Year, system: str) -> tuple[FaceView, ...]:
    return tuple(
        FaceView(
            f"C{number}",
            clean(plane.title),
            _water_figure(plane.greatest, system),
            MONTHS[plane.month],
            _water_figure(plane.left, system),
            tuple(_water_figure(each, system) for each in plane.amounts),
        )
        for number, plane in enumerate(year.planes, 1)
    )


def _number(value: float | None) -> Figure:
    return NO_FIGURE if value is None else Figure(numbers.fixed(value, 3), "")


def _figure(value: float, quantity: str, system: str, decimals: int) -> Figure:
    shown = numbers.in_system(value, quantity, system)
    return Figure(numbers.fixed(shown, decimals), units.label(quantity, system))


def _water_figure(value: float, system: str) -> Figure:
    return _figure(value, "area_weight", system, 4)


def _water_text(value: float, system: str) -> str:
    figure = _water_figure(value, system)
    return f"{figure.text} {figure.unit}"
