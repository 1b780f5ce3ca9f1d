"""Which limit an element is held against, and why that one.

Order, each step on the trail: date and edition, amendments, zone, row, conditions. For each metric
and path exactly one limit must remain; what stands in the way is named, never guessed.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from fnmatch import fnmatchcase
from typing import NamedTuple

from envcheck.judge.zones import ZoneFound, find_zone, holds
from envcheck.model.judged import Choice
from envcheck.model.project import Element, Fact, Project
from envcheck.model.ruleset import Condition, Dimension, Limit, RuleSet

Value = str | float
INSULATION = "insulation"
"""Path of labelled R-values, printed beside the value of the whole."""
KEPT = 8
"""Rule sets whose index is kept."""


@dataclass(frozen=True, slots=True)
class MissingFact:
    """A fact that a condition asks for and that nobody states, or states in no known word."""

    name: str
    allowed: tuple[str, ...]
    """Allowed words; empty for a number."""
    unit: str
    meaning: str
    sheet: str
    """Drawing where the fact belongs, in words; may be empty."""
    found: str = ""
    """What is stated and cannot be used."""

    def __str__(self) -> str:
        wanted = " or ".join(self.allowed) if self.allowed else f"a number {self.unit}".strip()
        what = f"{self.name} ({wanted})"
        if self.found:
            return f"{what} is stated as {self.found}, which the rule set does not know"
        return f"{what} is not stated" + (f"; it belongs on the {self.sheet}" if self.sheet else "")


@dataclass(frozen=True, slots=True)
class Outcome:
    """What the tables say for one metric and path."""

    metric: str
    path: str
    state: str
    """``found``, ``not_in_table``, ``missing_fact`` or ``two_rows``."""
    limit: Limit | None
    """The one limit, where it is found."""
    candidates: tuple[Limit, ...] = ()
    """Both of two rows, or the rows that the missing fact would choose between."""
    missing: tuple[MissingFact, ...] = ()
    why: str = ""
    """Why there is no limit, in words."""


@dataclass(frozen=True, slots=True)
class Selection:
    """The limits for one category of element in one place, with the trail that led to them."""

    ruleset: str
    category: str
    zone: str
    """Printed zone; empty where it could not be found."""
    state: str
    """``selected``; or ``not_in_force``, ``zone_missing``, ``zone_unknown``, ``zone_ambiguous``,
    ``not_in_table``: then there are no outcomes and ``why`` says what is wrong."""
    why: str
    outcomes: tuple[Outcome, ...]
    trail: tuple[Choice, ...]
    by: Mapping[tuple[str, str], Outcome] = field(default_factory=dict, compare=False, repr=False)
    """Outcomes by metric and path."""

    @property
    def metrics(self) -> tuple[str, ...]:
        """Metrics that make a line each: those of the insulation path stand in another's line."""
        main = [o.metric for o in self.outcomes if o.path != INSULATION]
        return tuple(dict.fromkeys(main or [o.metric for o in self.outcomes]))

    @property
    def limits(self) -> dict[tuple[str, str], Limit]:
        """The limits found, by metric and path."""
        return {(o.metric, o.path): o.limit for o in self.outcomes if o.limit is not None}

    def outcome(self, metric: str, path: str = "") -> Outcome | None:
        """Outcome of a metric; without a path that of its main path."""
        if path:
            return self.by.get((metric, path))
        found = [o for o in self.outcomes if o.metric == metric]
        return min(found, key=lambda o: o.path == INSULATION, default=None)

    def limit(self, metric: str, path: str = "") -> Limit | None:
        """The limit of a metric, where one is found."""
        outcome = self.outcome(metric, path)
        return None if outcome is None else outcome.limit

    def verdict_of(self, metric: str, path: str = "") -> str:
        """Verdict that follows from having no limit; empty where there is one."""
        outcome = self.outcome(metric, path)
        if outcome is None and self.state == "selected":
            return "not_in_table"
        state = outcome.state if outcome is not None else self.state
        return {"found": "", "not_in_table": "not_in_table"}.get(state, "not_decided")

    def reason_of(self, metric: str, path: str = "") -> str:
        """Why there is no limit, in words; empty where there is one."""
        outcome = self.outcome(metric, path)
        if outcome is None:
            return self.why or f"no row of the rule set gives {metric} for {self.category}"
        return outcome.why

    @property
    def _stopped_by(self) -> str:
        return next((m for m in self.metrics if self.limit(m) is None), "")

    @property
    def verdict(self) -> str:
        """Verdict of the first metric that has no limit; empty where all have one."""
        return "" if self._all_found else self.verdict_of(self._stopped_by)

    @property
    def reason(self) -> str:
        """Why the first metric that has no limit has none."""
        return "" if self._all_found else self.reason_of(self._stopped_by)

    @property
    def _all_found(self) -> bool:
        return bool(self.outcomes) and not self._stopped_by


Group = tuple[tuple[str, str], tuple[tuple[Limit, ...], ...]]
"""(metric, path) and the limits of the rows that cover a category, most specific rows first."""


@dataclass(slots=True)
class _Index:
    """A rule set laid out for quick selection."""

    ruleset: RuleSet
    by_zone: dict[str, list[Limit]] = field(default_factory=dict)
    groups: dict[tuple[tuple[str, ...], str], tuple[Group, ...]] = field(default_factory=dict)
    dimensions: dict[tuple[tuple[str, ...], str], tuple[str, ...]] = field(default_factory=dict)
    zones: dict[int, tuple[Project, ZoneFound]] = field(default_factory=dict)
    done: dict[tuple[object, ...], Selection] = field(default_factory=dict)


_INDEXES: dict[int, _Index] = {}


def select(
    element: Element,
    category: str,
    ruleset: RuleSet,
    project: Project,
    derived_facts: Mapping[str, Value] | None = None,
) -> Selection:
    """Select the limits of an element.

    ``category`` is the one it is judged as; facts of the element stand over those of the project,
    these over ``derived_facts``, these over the rule set's defaults. Limits stay in printed units.
    """
    index = _index(ruleset)
    zone = _zone(index, project)
    key = (zone.heads, category)
    if key not in index.groups:
        _lay_out(index, zone.heads, category)
    facts = {
        name: _fact(name, element, project, derived_facts or {}, ruleset.dimensions[name])
        for name in index.dimensions[key]
    }
    memo = (id(project), category, tuple(facts.items()))
    found = index.done.get(memo)
    if found is None:
        found = _selection(index, zone, category, facts, project)
        index.done[memo] = found
    return found


def _index(ruleset: RuleSet) -> _Index:
    index = _INDEXES.get(id(ruleset))
    if index is None or index.ruleset is not ruleset:
        if len(_INDEXES) >= KEPT:
            _INDEXES.pop(next(iter(_INDEXES)))
        index = _INDEXES[id(ruleset)] = _Index(ruleset)
        for limit in ruleset.limits:
            index.by_zone.setdefault(limit.zone, []).append(limit)
    return index


def _zone(index: _Index, project: Project) -> ZoneFound:
    known = index.zones.get(id(project))
    if known is None or known[0] is not project:
        index.done.clear()
        known = index.zones[id(project)] = (project, find_zone(index.ruleset, project.site))
    return known[1]


def _lay_out(index: _Index, heads: tuple[str, ...], category: str) -> None:
    """Group the limits that cover a category by metric and path, most specific rows first."""
    found: dict[tuple[str, str], dict[int, list[Limit]]] = {}
    for head in (*heads, "*"):
        for limit in index.by_zone.get(head, ()):
            fit = max((_fit(category, p) for p in limit.categories), default=-1)
            if fit >= 0:
                levels = found.setdefault((limit.metric, limit.path), {})
                levels.setdefault(fit, []).append(limit)
    index.groups[(heads, category)] = tuple(
        (key, tuple(tuple(levels[fit]) for fit in sorted(levels, reverse=True)))
        for key, levels in found.items()
    )
    asked = (
        c.dimension
        for levels in found.values()
        for limits in levels.values()
        for limit in limits
        for c in limit.when
    )
    index.dimensions[(heads, category)] = tuple(dict.fromkeys(asked))


def _fit(category: str, pattern: str) -> int:
    """How specific a pattern is that covers the category; -1 where it does not."""
    if pattern == category:
        return 1000
    return len(pattern.replace("*", "")) if fnmatchcase(category, pattern) else -1


# --------------------------------------------------------------------------------------- facts


class _Known(NamedTuple):
    """The value of a fact and where it is said; the value None is not stated."""

    value: Value | None
    where: str
    usable: bool = True


def _fact(
    name: str,
    element: Element,
    project: Project,
    derived: Mapping[str, Value],
    dimension: Dimension,
) -> _Known:
    stated = next((f for f in element.facts if f.name == name), None)
    if stated is not None:
        return _known(stated.value, _said(stated, element.tag), dimension)
    if name in ("orientation", "facing") and element.facing:
        return _known(element.facing, f"facing of {element.tag}", dimension)
    if name == "adjoins":
        return _known(element.adjoins, f"what {element.tag} adjoins", dimension)
    stated = next((f for f in project.facts if f.name == name), None)
    if stated is not None:
        return _known(stated.value, _said(stated, "project"), dimension)
    if name in derived:
        return _known(derived[name], "computed from the project", dimension)
    if dimension.default:
        return _known(dimension.default, "default of the rule set", dimension)
    return _Known(None, "")


def _said(fact: Fact, where: str) -> str:
    return f"fact of {where}, sheet {fact.sheet}" if fact.sheet else f"fact of {where}"


def _known(value: str | float | bool, where: str, dimension: Dimension) -> _Known:
    """Bring a value to the form of its dimension; a word that it does not know is unusable."""
    if isinstance(value, bool):
        value = "yes" if value else "no"
    if dimension.values:
        word = str(value).casefold()
        usable = any(word == v.casefold() for v in dimension.values)
        return _Known(str(value), where, usable)
    try:
        return _Known(float(value), where)
    except ValueError:
        return _Known(str(value), where, False)


# ----------------------------------------------------------------------------------- selection


def _selection(
    index: _Index,
    zone: ZoneFound,
    category: str,
    facts: Mapping[str, _Known],
    project: Project,
) -> Selection:
    ruleset = index.ruleset
    trail = [*_editions(ruleset, project), *zone.trail]

    def stopped(state: str, why: str) -> Selection:
        return Selection(ruleset.id, category, zone.printed, state, why, (), tuple(trail))

    base = ruleset.chain[0]
    if not base.in_force:
        return stopped("not_in_force", _not_in_force(ruleset, project))
    if zone.state != "found":
        return stopped(zone.state, zone.why)
    groups = index.groups[(zone.heads, category)]
    if not groups:
        printed = f" for zone {zone.printed}" if zone.printed else ""
        return stopped("not_in_table", f"no row of {ruleset.title} covers {category}{printed}")
    outcomes = tuple(_outcome(key, levels, ruleset, facts) for key, levels in groups)
    trail += _row_trail(outcomes, facts)
    by = {(o.metric, o.path): o for o in outcomes}
    return Selection(ruleset.id, category, zone.printed, "selected", "", outcomes, tuple(trail), by)


def _outcome(
    key: tuple[str, str],
    levels: tuple[tuple[Limit, ...], ...],
    ruleset: RuleSet,
    facts: Mapping[str, _Known],
) -> Outcome:
    """Go from the most specific rows down until rows hold, or could hold if a fact were known."""
    metric, path = key
    for limits in levels:
        holding: list[Limit] = []
        undecided: list[Limit] = []
        lacking: dict[str, None] = {}
        for limit in limits:
            unknown = _unknown(limit, facts)
            if unknown is None:
                continue
            (undecided if unknown else holding).append(limit)
            lacking |= dict.fromkeys(unknown)
        if undecided:
            missing = tuple(_missing(name, ruleset, facts[name]) for name in lacking)
            why = "; ".join(map(str, missing))
            every = (*holding, *undecided)
            return Outcome(metric, path, "missing_fact", None, every, missing, why)
        if len(holding) == 1:
            return Outcome(metric, path, "found", holding[0])
        if holding:
            rows = " and ".join(f"{x.clause}, {x.label}: {x.cell}" for x in holding)
            return Outcome(metric, path, "two_rows", None, tuple(holding), why=f"two rows: {rows}")
    stated = ", ".join(f"{n} {_shown(k.value)}" for n, k in facts.items() if k.value is not None)
    why = f"no row holds for {stated}" if stated else "no row holds"
    return Outcome(metric, path, "not_in_table", None, why=why)


def _unknown(limit: Limit, facts: Mapping[str, _Known]) -> tuple[str, ...] | None:
    """Facts that the limit still asks for; None where a known fact rules it out."""
    unknown = []
    for condition in limit.when:
        fact = facts[condition.dimension]
        if fact.value is None or not fact.usable:
            unknown.append(condition.dimension)
        elif not holds(condition, fact.value):
            return None
    return tuple(unknown)


def _missing(name: str, ruleset: RuleSet, known: _Known) -> MissingFact:
    dimension = ruleset.dimensions[name]
    found = "" if known.value is None else f"{_shown(known.value)} ({known.where})"
    return MissingFact(
        name, dimension.values, dimension.unit, dimension.meaning, dimension.sheet, found
    )


def _shown(value: Value | None) -> str:
    return f"{value:.6g}" if isinstance(value, float) else str(value)


# --------------------------------------------------------------------------------------- trail


def _editions(ruleset: RuleSet, project: Project) -> list[Choice]:
    tested = project.permit_application_date
    if tested is None:
        trail = [Choice("date", "not stated", "every amendment is taken as in force")]
    else:
        trail = [Choice("date", tested.isoformat(), "permit application date of the project")]
    for i, edition in enumerate(ruleset.chain):
        step = "edition" if i == 0 else "amendment"
        held = f"in force from {edition.effective_from}" if edition.effective_from else "undated"
        if edition.effective_until:
            held += f" until {edition.effective_until}"
        if not edition.in_force:
            held += "; not in force on that date, so left out"
        chosen = f"{edition.title}, {edition.edition}"
        trail.append(Choice(step, chosen, f"{edition.clause}: {held}" if edition.clause else held))
    return trail


def _not_in_force(ruleset: RuleSet, project: Project) -> str:
    base = ruleset.chain[0]
    until = f" until {base.effective_until}" if base.effective_until else ""
    return (
        f"{base.title}, {base.edition} is in force from {base.effective_from}{until}, not on "
        f"{project.permit_application_date}"
    )


def _row_trail(outcomes: tuple[Outcome, ...], facts: Mapping[str, _Known]) -> list[Choice]:
    trail: list[Choice] = []
    for outcome in outcomes:
        limit = outcome.limit
        what = f"{outcome.metric}, {outcome.path}" if outcome.path else outcome.metric
        if limit is None:
            trail.append(Choice("row", f"{what}: none", outcome.why))
            continue
        covers = ", ".join(limit.categories)
        why = f"{limit.clause}, row {limit.label!r}, covers {covers}; {what} {limit.cell}"
        if limit.replaced:
            why += f"; replaces {limit.replaced}"
        trail.append(Choice("row", limit.id, why))
        for condition in limit.when:
            fact = facts[condition.dimension]
            chosen = f"{condition.dimension} = {_shown(fact.value)}"
            trail.append(Choice("condition", chosen, f"meets {condition.text} ({fact.where})"))
        trail += [Choice("footnote", f"[{note.mark}]", note.text) for note in limit.notes]
    return list(dict.fromkeys(trail))
