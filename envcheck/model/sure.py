"""How much room a line has, and what its verdict hangs on: all numbers SI."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.advised import Edit
from envcheck.model.judged import Line


class Bound(NamedTuple):
    """How far one number of an assembly may move the wrong way while its lines stay within."""

    lever: str
    what: str
    now: float
    most: float
    """The last value that still passes; of a lever without an end the farthest looked at."""
    quantity: str
    grows: bool
    """Whether the wrong way is up."""
    state: str
    """``bound``; ``table`` (the last row of a table that passes); ``any`` (nothing that was
    looked at takes a line over); ``other_path`` (beyond it the R-value path carries the line)"""
    tag: str
    """Element whose line is reached first."""
    edits: tuple[Edit, ...]


class Stuck(NamedTuple):
    """A layer that cannot bring a line within its limit however much insulation it holds."""

    lever: str
    what: str
    tag: str
    value: float
    """Value of the assembly as that layer's resistance grows without end."""
    limit: float
    holds: str
    """Path or addition through which the most heat still flows, or empty."""
    share: float
    """Of the heat that it carries then, 0..1."""


class Room(NamedTuple):
    """The room that the lines of one assembly have."""

    assembly: str
    lines: tuple[Line, ...]
    """Those within their limit that the bounds are for."""
    bounds: tuple[Bound, ...]
    skipped: tuple[tuple[str, str, str], ...]
    """(tag, metric, why) of lines that have no bounds."""
    stuck: tuple[Stuck, ...]


class Input(NamedTuple):
    """One stated number and how far it may be off."""

    what: str
    quantity: str
    now: float
    low: float
    high: float
    basis: str
    """``stated range``, ``class band`` or ``evidence``"""
    band_source: str
    evidence: str
    source: str
    """As the project states it; may be empty."""
    effect: float | None
    """Share by which the end that works against the verdict moves the value; None where the
    method gives no value there."""
    alone: bool
    """Turns the verdict by itself."""


class Sureness(NamedTuple):
    """What the verdict of lines that share a value and a limit hangs on."""

    assembly: str
    sheet: str
    lines: tuple[Line, ...]
    state: str
    """``turns``, ``settled`` (no input within its band turns it) or ``without`` (see why)."""
    why: str
    value: float | None
    low: float | None
    """With every input at the end of least heat flow ..."""
    high: float | None
    """... and of most."""
    inputs: tuple[Input, ...]
    deciding: tuple[Input, ...]
    """With these as stated no other input, nor all others together, turns the verdict."""


class Workmanship(NamedTuple):
    """One level of voids or compression in the insulation between members."""

    layer: str
    kind: str
    """``void`` or ``compression``"""
    share: float
    """Of the area of the insulation, or of its thickness."""
    full: float
    """Resistance of the insulation as stated, m2 K/W."""
    left: float
    """What is left of it, m2 K/W."""
    whole: float | None
    """U of the assembly as stated, bridges of single elements left out, W/(m2 K)."""
    value: float | None
    """U of the assembly with it; None where the prescribed method gives none, or where a bracket
    decides."""
    source: str
