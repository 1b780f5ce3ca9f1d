"""Lines with verdicts, findings, sums: what judging hands to the report."""

from dataclasses import dataclass
from math import fsum
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
    """Name of the group whose verdict it carries."""
    group_kind: str = ""
    """``mean`` or ``trade_off``"""
    low: Comparison | None = None
    """Ends of the bracket, compared likewise."""
    high: Comparison | None = None
    range_low: Comparison | None = None
    """Ends of the interval from stated ranges, compared likewise."""
    range_high: Comparison | None = None
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


CERTAIN, LIKELY, LOOK = "certain", "likely", "to be looked at"
"""How sure a finding is: what the file says contradicts itself or the rule; the usual meaning of
what was seen; a thing that may well be as it should."""


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
    sure: str = ""
    """``certain``, ``likely`` or ``to be looked at``."""

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
    counted: tuple[str, ...] = ()
    """Tags of the elements above the line."""


class Part(NamedTuple):
    """One line in a sum over several elements."""

    element: str
    assembly: str
    metric: str
    amount: float
    """m2; of an F-factor m."""
    value: float
    """As drawn, unrounded: W/(m2 K), W/(m K), or a plain number."""
    limit: float
    """By the table, in the same unit."""
    verdict: str
    """Its own, beside that of the group."""
    printed: str
    """Digits of the limit as printed ..."""
    unit: str
    """... and their unit."""

    @property
    def drawn(self) -> float:
        """What it adds as drawn, W/K."""
        return self.amount * self.value

    @property
    def table(self) -> float:
        """What it adds by the table, W/K."""
        return self.amount * self.limit


class Charge(NamedTuple):
    """What a rule charges for openings above their allowance."""

    ratio: str
    """``window_wall_ratio`` or ``skylight_roof_ratio``"""
    excess: float
    """Area above the allowance, m2."""
    glazing: float
    """Mean U of the openings, W/(m2 K): as drawn, or by the table."""
    opaque: float
    """Mean U of what they stand in, likewise."""
    amount: float
    """W/K; added to the sum named by ``to``, less than 0 where it is taken off."""
    to: str
    """``drawn`` or ``table``"""


class Group(NamedTuple):
    """Several lines judged together: an area-weighted mean, or a trade-off."""

    kind: str
    """``mean`` or ``trade_off``"""
    name: str
    """Of a mean as the project names it; of a trade-off the class of its spaces, or empty."""
    ruleset: str
    decides: bool
    clause: str
    elected: bool
    """The project asks for it: its lines carry its verdict. Else it is information."""
    state: str
    """``pass``, ``fail``, ``official_decides``, or ``not_decided`` where something is open."""
    parts: tuple[Part, ...]
    """Decided lines; the sums are over these."""
    drawn: float
    """Sum of amount times value, charges included; W/K of a U-, C- or F-factor."""
    table: float
    """The same by the table."""
    waits: tuple[str, ...] = ()
    """Why it is closed; empty where nothing stands in the way."""
    left_out: tuple[tuple[str, str], ...] = ()
    """(tag, why) of lines that have no place in the sum."""
    charges: tuple[Charge, ...] = ()
    cap: str = ""
    """What the individual cap of a mean says, in words."""
    rule: str = ""
    """The rule of a trade-off, and what it holds besides, as the rule set words it."""

    @property
    def value(self) -> float:
        """The mean."""
        return self.drawn / fsum(part.amount for part in self.parts)

    @property
    def worst(self) -> Part:
        """The member with the greatest value of a mean, the worst contributor of a sum."""
        if self.kind == "mean":
            return max(self.parts, key=lambda part: part.value)
        return max(self.parts, key=lambda part: part.drawn - part.table)


class Difference(NamedTuple):
    """A line whose verdict differs between two rule sets."""

    ruleset: str
    other: str
    element: str
    metric: str
    before: str
    """Verdict under the first ..."""
    after: str
    """... and under the other."""
    why: tuple[str, ...]
    """What differs, in plain words."""


class Turn(NamedTuple):
    """A verdict that one convention of another rule set turns, by itself."""

    ruleset: str
    """Judged by this one ..."""
    other: str
    """... with one convention of this one."""
    convention: str
    element: str
    metric: str
    before: str
    after: str


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
    groups: tuple[Group, ...]
    closings: tuple[Closing, ...]
    remarks: tuple[str, ...]
    """Trade-offs offered and not computed, drafts that do not decide ..."""
    changes: tuple[Difference, ...] = ()
    """Lines that differ between the first rule set and another."""
    turns: tuple[Turn, ...] = ()
    """Lines that one convention of the other turns."""
