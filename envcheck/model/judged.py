"""Lines with verdicts, findings, sums: what judging hands to the report."""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple

from envcheck.model.ruleset import Limit
from envcheck.model.solved import Solved

VERDICTS = (
    "fail",
    "too_close",
    "not_decided",
    "official_decides",
    "path_closed",
    "not_in_table",
    "no_requirement",
    "pass",
)
"""In the order in which a report lists them."""
SETTLED = frozenset({"pass", "fail", "no_requirement"})
"""Every other verdict is open."""


class Choice(NamedTuple):
    """One step of the trail: what was chosen, how, and why not another."""

    step: str
    """``date``, ``edition``, ``amendment``, ``zone``, ``row``, ``condition``, ``footnote``,
    ``path``, ``class``, ``rounding``"""
    chosen: str
    why: str


class PathResult(NamedTuple):
    """One of several paths of a line."""

    path: str
    """``assembly`` or ``insulation``"""
    state: str
    """``pass``, ``fail``, ``not_available`` or ``not_decided``"""
    value: str
    """As compared, in the printed unit, in words: ``13.0 + 7.5ci``."""
    limit: str
    why: str


class Comparison(NamedTuple):
    """A number held against a limit, in the printed unit."""

    value: float
    """Unrounded, printed unit."""
    compared: float
    """As compared, after the code's rounding."""
    limit: float
    decimals: int
    """Of the printed limit."""
    unit: str
    sense: str
    within: bool
    by_rounding: bool
    """Within only after rounding."""
    margin: float
    """Room left to the limit, unrounded, printed unit; negative = over."""


class Line(NamedTuple):
    """One element held against one limit."""

    ruleset: str
    decides: bool
    element: str
    """Tag, or the name of the surface or ratio that a building line is about."""
    category: str
    """As judged (a class test may have moved it)."""
    metric: str
    verdict: str
    reasons: tuple[str, ...]
    """Why, in plain words, the deciding one first."""
    limit: Limit | None
    solved: Solved | None
    comparison: Comparison | None
    """The one that decides; of a group's member the group's."""
    own: Comparison | None = None
    """A group member's own comparison."""
    group: str = ""
    low: Comparison | None = None
    """Ends of the bracket, compared likewise."""
    high: Comparison | None = None
    paths: tuple[PathResult, ...] = ()
    trail: tuple[Choice, ...] = ()
    flags: tuple[str, ...] = ()
    """``method`` (the verdict hangs on the method), ``rounding``, ``at_limit`` ..."""
    with_exception: str = ""
    """Verdict words with and without a claimed exception."""

    @property
    def open(self) -> bool:
        """Whether the line still waits for somebody."""
        return self.verdict not in SETTLED


class Finding(NamedTuple):
    """What a cross-check saw."""

    check: str
    """Stable id of the check."""
    severity: str
    """``E`` stop, ``W`` warn, ``N`` note"""
    subject: str
    """Tag, assembly or surface."""
    sheet: str
    seen: str
    suggests: str
    settles: str
    """What would settle it."""
    answered: str = ""
    """The project's answer, where it gives one."""
    title: str = ""
    """What the check looks for, in a few words."""

    @property
    def unsettled(self) -> bool:
        """Whether it counts as open: it stops, and the project does not answer it."""
        return self.severity == "E" and not self.answered


class Ratio(NamedTuple):
    """An area ratio with its parts, m2."""

    name: str
    numerator: float
    denominator: float
    value: float
    most: float | None
    clause: str
    passed: bool
    """The cap is passed (exceeded)."""
    missing: tuple[str, ...] = ()


class Mean(NamedTuple):
    """An area-weighted mean that the project asks for."""

    group: str
    ruleset: str
    members: tuple[tuple[str, float, float], ...]
    """(tag, area m2, U W/(m2 K))"""
    value: float
    worst: str
    clause: str
    cap: str
    """What the individual cap says, in words."""


CLOSES_WITHIN = 0.005
"""Share of the gross area by which parts may miss it; drawings are dimensioned to the inch."""


class Closing(NamedTuple):
    """One surface's areas: gross = net + openings, m2."""

    surface: str
    sheet: str
    gross: float
    parts: tuple[tuple[str, float], ...]
    missing: float

    @property
    def closes(self) -> bool:
        """Whether gross = net + openings within the tolerance."""
        return abs(self.missing) <= CLOSES_WITHIN * self.gross


@dataclass(frozen=True, slots=True)
class Judged:
    """Everything judged for one project."""

    lines: tuple[Line, ...]
    findings: tuple[Finding, ...]
    ratios: tuple[Ratio, ...]
    means: tuple[Mean, ...]
    closings: tuple[Closing, ...]
    remarks: tuple[str, ...]
    """Trade-offs offered and not computed, drafts that do not decide ..."""
