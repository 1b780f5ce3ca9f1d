"""A rule set as read and folded: one edition with its amendments, in long form.

Limits keep the printed text and unit of their cell: the comparison is made in the printed unit,
so ``Term.number`` is the printed number, the one exception to SI inside.
"""

from collections.abc import Mapping
from datetime import date
from types import MappingProxyType
from typing import NamedTuple

from envcheck.model.conventions import (
    ClassTest,
    Conventions,
    FilmRow,
    MethodRule,
    SpaceTest,
    TableRow,
)

__all__ = [
    "Adjustment",
    "AreaLimit",
    "Averaging",
    "ClassTest",
    "Condition",
    "Conventions",
    "Dimension",
    "Edition",
    "ExceptionClause",
    "FilmRow",
    "Limit",
    "Lock",
    "MethodRule",
    "Note",
    "OtherMetric",
    "RuleSet",
    "SpaceTest",
    "TableRow",
    "Term",
    "TradeOff",
    "Trigger",
    "Weight",
    "Zones",
]


class Term(NamedTuple):
    """One number of a cell: ``13``, ``9ci``, ``R-15 for 24 in``."""

    number: float
    text: str
    """Digits as printed, which fix the decimals of the comparison."""
    role: str = ""
    """What it speaks of: ``cavity``, ``ci``, a declared suffix, or empty."""
    extent: float | None = None
    """Depth or width, m."""
    metric: str = ""
    """Where a prefix names another metric than the row's (``ER 34``, ``WER B``)."""
    where: str = ""
    """An extent in words: ``perimeter & under entire slab``, ``below``."""
    also: tuple[str, ...] = ()
    """Further suffixes: ``7.5ci std``."""
    band: str = ""
    """A rating band instead of a number, which then is its rank (0 = best)."""

    @property
    def decimals(self) -> int:
        """Printed decimals."""
        return len(self.text.partition(".")[2])


class Condition(NamedTuple):
    """A condition on one dimension: words, or an interval with open or closed ends."""

    dimension: str
    words: tuple[str, ...] = ()
    low: float | None = None
    high: float | None = None
    low_closed: bool = False
    high_closed: bool = False
    text: str = ""
    """As printed."""

    def holds(self, value: str | float) -> bool:
        """Whether the value of the fact meets the condition."""
        if self.words:
            return value in self.words or str(value).casefold() in map(str.casefold, self.words)
        number = float(value)
        above = self.low is None or (number >= self.low if self.low_closed else number > self.low)
        below = self.high is None or (
            number <= self.high if self.high_closed else number < self.high
        )
        return above and below


class Dimension(NamedTuple):
    """What a condition may ask for."""

    name: str
    values: tuple[str, ...] = ()
    """Allowed words; empty for numbers."""
    unit: str = ""
    meaning: str = ""
    default: str = ""
    """Value where the project says nothing, and the rule set says so; empty = must be stated."""
    sheet: str = ""
    """Drawing where the fact belongs ("mechanical schedule"), for the missing-fact message."""
    kind: str = ""
    """``date``: a day (as its ordinal), by default the permit application date; else empty."""
    interpolate: bool = False
    """Between the rows for two values the limit is found linearly."""
    outside: str = "hold"
    """Beyond those values: ``hold`` the nearest row's figure, or ``error``: no limit."""


class Note(NamedTuple):
    """A footnote of a table."""

    mark: str
    effect: str
    text: str
    by_official: bool
    """The program cannot decide it: the verdict becomes ``official_decides``."""
    did: str = ""
    """What it did to the printed figure, in words: ``19 instead of 30``, ``does not apply``."""


class Weight(NamedTuple):
    """Weight of an area in a mean."""

    factor: float
    text: str
    """What it is for, as printed."""
    when: tuple[Condition, ...] = ()
    """Of the element; empty where only a person can tell."""


class Limit(NamedTuple):
    """One cell in long form: one reading of it, under the conditions for which it holds."""

    id: str
    """``ruleset/table/zone/row/metric`` and the conditions that tell it apart."""
    ruleset: str
    """The rule set whose sheet prints the cell (an amendment's id where it replaced it)."""
    table: str
    clause: str
    zone: str
    """Printed zone head, or ``*``."""
    row: str
    label: str
    categories: tuple[str, ...]
    """envcheck categories that the row covers; patterns such as ``wall.*`` allowed."""
    metric: str
    """A name of :data:`envcheck.model.metrics.METRICS`."""
    sense: str
    """``max`` or ``min``"""
    unit: str
    """Printed unit, a spelling of ``units``; empty where dimensionless."""
    cell: str
    """As printed."""
    kind: str
    """``number``, ``no_requirement`` or ``not_covered``."""
    alternatives: tuple[tuple[Term, ...], ...]
    """Any one of these, each a sum whose terms must all hold."""
    when: tuple[Condition, ...]
    path: str
    """``assembly``, ``insulation`` or empty where the code knows one path."""
    applies_to: str
    """``each_component``, ``area_weighted_mean``, ``any_point`` or ``whole_envelope``."""
    notes: tuple[Note, ...]
    src: str
    file: str
    line: int
    replaced: str = ""
    """What an amendment replaced: the base cell's text and rule set."""
    threshold: Term | None = None
    """The limit is a target that counts only where the old value is worse than this."""
    threshold_cell: str = ""
    """The threshold as printed."""
    weights: tuple[Weight, ...] = ()
    """Of areas in the mean that this limits."""
    otherwise: bool = False
    """Row for all cases that no other row covers."""
    depth_to: float | None = None
    """Depth to which the row counts, m (below-grade walls)."""


class AreaLimit(NamedTuple):
    """An area cap and the rows that it closes."""

    of: str
    """``window_wall_ratio`` or ``skylight_roof_ratio``."""
    most: float
    clause: str
    closes: tuple[str, ...]
    """Category patterns whose rows do not apply above the cap."""


class Averaging(NamedTuple):
    """A mean that the code permits."""

    clause: str
    scope: tuple[str, ...]
    """Category patterns within which a mean may be taken (one row at a time)."""
    metric: str
    individual_cap: float | None = None
    """No member above this multiple of the limit ..."""
    cap_exempt: str = ""
    """... except this category up to ``cap_exempt_area``."""
    cap_exempt_area: float | None = None
    """m2"""


class TradeOff(NamedTuple):
    """A sum over the building that the code offers in place of its rows."""

    kind: str
    """As the rule set names it."""
    clause: str = ""
    rule: str = ""
    """In words, for the report."""
    supported: str = "no"
    """``yes``; ``partly`` (the sum is taken, the official decides); ``no`` (said only)"""
    say: str = ""
    terms: tuple[str, ...] = ()
    """Which products are summed: ``U_A``, ``C_A``, ``F_P``; empty = none is taken."""
    rows: tuple[str, ...] = ()
    """Category patterns that belong; empty = all."""
    left_out: tuple[str, ...] = ()
    """Category patterns that may not be traded."""
    per: str = ""
    """Dimension whose words part the building (``space_category``); empty = one sum."""
    classes: tuple[str, ...] = ()
    """Its words for which the code offers the sum; empty = all."""
    glazing: str = "closes"
    """Openings above their allowance: they close the sum (``closes``); the table counts the
    excess as what it stands in (``at_allowance``); the design is charged for it
    (``excess_added``)."""

    @property
    def taken(self) -> bool:
        """Whether the sum is computed."""
        return self.supported != "no" and bool(self.terms)

    @property
    def charges(self) -> bool:
        """Whether openings above their allowance are charged, and close nothing."""
        return self.taken and self.glazing != "closes"


class OtherMetric(NamedTuple):
    """A rating that a cell may offer beside the row's own metric: ``ER 34``, ``WER B``."""

    name: str
    sense: str
    """``min``, ``max`` or ``band_or_better``"""
    meaning: str
    bands: tuple[str, ...] = ()
    """Best first."""


class Adjustment(NamedTuple):
    """A factor on the design's own value before it is compared."""

    clause: str
    metric: str
    factor: float
    when: tuple[Condition, ...]


class Trigger(NamedTuple):
    """Alterations: the target applies where more than ``share`` of an element is renewed."""

    share: float
    clause: str
    text: str


class ExceptionClause(NamedTuple):
    """A clause that lets an official waive a row."""

    clause: str
    text: str


class Zones(NamedTuple):
    """How the site's zone is found."""

    order: tuple[str, ...]
    members: dict[str, tuple[str, ...]]
    """Printed zone -> zones that belong to it."""
    bounds: dict[str, dict[str, Condition]]
    """Measure (``hdd65``) -> printed zone -> interval."""
    chosen_by: str
    suffixes: tuple[str, ...] = ()
    """Letters that fall back to the plain zone."""
    criteria: str = ""
    """Name of the published formula that gives the zone from the facts of the site; or empty."""


class Lock(NamedTuple):
    """Who checked the sheets of a folder, and what has changed since."""

    checked_by: str
    on: str
    changed: tuple[str, ...] = ()
    """Files that are not as they were; new and missing ones included."""

    def __str__(self) -> str:
        checked = f"checked by {self.checked_by} on {self.on}"
        if not self.changed:
            return f"{checked}, unchanged since"
        return f"CHANGED since it was {checked}: {', '.join(self.changed)}"


class Edition(NamedTuple):
    """One document in the chain of a folded rule set."""

    id: str
    title: str
    edition: str
    clause: str
    effective_from: date | None
    effective_until: date | None
    in_force: bool
    """On the date tested."""
    sha256: str
    lock: Lock | None = None
    """Who checked the files of its folder, where they are locked."""


class RuleSet(NamedTuple):
    """A base edition with the amendments in force folded over it."""

    id: str
    title: str
    jurisdiction: str
    status: str
    """``official``, ``transcribed`` or ``example``"""
    invented: bool
    checked_by: str
    chain: tuple[Edition, ...]
    """Base first."""
    units: str
    """``SI`` or ``IP``, from the printed units."""
    zones: Zones
    dimensions: dict[str, Dimension]
    limits: tuple[Limit, ...]
    paths_clause: str
    """Clause that lets either path be used; empty where there is one path."""
    compare: str
    """``rounded_to_printed_decimals``, ``unrounded`` or ``rounded_2dp``"""
    rounding_clause: str
    rounding_stated: bool
    conventions: Conventions
    area_limits: tuple[AreaLimit, ...]
    averaging: tuple[Averaging, ...]
    tradeoff: TradeOff | None
    trigger: Trigger | None
    exceptions: tuple[ExceptionClause, ...]
    not_judged: tuple[str, ...]
    """What the rule set says it does not cover."""
    folder: str
    remarks: tuple[str, ...] = ()
    """What the rule set holds and is not judged here, in sentences for the report."""
    other_metrics: Mapping[str, OtherMetric] = MappingProxyType({})
    """Ratings that cells offer beside their metric, by name."""
    adjustments: tuple[Adjustment, ...] = ()
