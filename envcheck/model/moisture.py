"""What the moisture check hands to the report: advisory figures, never a verdict. Numbers SI."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.solved import Step

MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
DAYS = (31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31)


class Month(NamedTuple):
    """Air on both sides in one month, and what it asks of the inner surface."""

    outdoor_temperature: float
    """degC"""
    outdoor_pressure: float
    """Pa"""
    indoor_temperature: float
    """degC"""
    indoor_pressure: float
    """Pa"""
    least_surface: float
    """Inner surface temperature at which the air beside it has 80 %, degC."""
    critical: float | None
    """Least temperature factor; None where it is not colder outdoors."""


class Sheet(NamedTuple):
    """A layer as the check sees it: along the clear field, between two faces."""

    title: str
    resistance: float
    """m2 K/W"""
    diffusion: float
    """sd, m"""
    source: str
    """Where mu or sd comes from."""
    ratio: float | None = None
    """mu; None where sd is stated."""
    thickness: float = 0.0
    """m, to which mu applies"""


class Plane(NamedTuple):
    """A face at which water collects in some month."""

    title: str
    amounts: tuple[float, ...]
    """At the end of each month from January, kg/m2."""
    greatest: float
    """kg/m2"""
    month: int
    """0 = January: at whose end it is greatest."""
    left: float
    """At the end of the twelve months, counted from their start, kg/m2."""


class Flow(NamedTuple):
    """Vapour to and from one wet face over a part of a month."""

    month: int
    part: int
    """1, 2 ... where a face dries out within the month."""
    days: float
    plane: str
    symbol: str
    """``C1``, ``C2`` ... outside first"""
    outer: tuple[float, float]
    """sd from the outer surface, m, and pressure, Pa, of the point beyond."""
    at: tuple[float, float]
    """Of the face itself."""
    inner: tuple[float, float]
    """Of the point further inside."""
    change: float
    """kg/m2; negative where it dries"""
    after: float
    """kg/m2"""


class Year(NamedTuple):
    """Twelve months of vapour diffusion."""

    start: int
    """First month of the count."""
    planes: tuple[Plane, ...]
    """Outside first; empty where nothing condenses at the faces."""
    flows: tuple[Flow, ...]


class Moisture(NamedTuple):
    """One assembly checked for surface humidity and condensation at its layer faces."""

    assembly: str
    title: str
    sheet: str
    elements: tuple[str, ...]
    missing: tuple[str, ...] = ()
    """What is missing or does not fit, in words; then nothing is computed."""
    withheld: tuple[str, ...] = ()
    """Why no favourable statement is made, whatever the figures."""
    notes: tuple[str, ...] = ()
    sheets: tuple[Sheet, ...] = ()
    factor: float = 0.0
    """f_Rsi of the plain element"""
    short: tuple[int, ...] = ()
    """Months whose critical factor is not reached."""
    year: Year | None = None
    steps: tuple[Step, ...] = ()


class Check(NamedTuple):
    """The check of a project."""

    missing: tuple[str, ...]
    """What the site lacks, each with its place; then nothing is computed."""
    months: tuple[Month, ...] = ()
    worst: int | None = None
    """Month of the greatest critical factor; None where it is never colder outdoors."""
    assemblies: tuple[Moisture, ...] = ()
    left: tuple[str, ...] = ()
    """Assemblies that are not checked: no layers, or no outdoor air beyond."""
    steps: tuple[Step, ...] = ()
    """Of the critical month."""
