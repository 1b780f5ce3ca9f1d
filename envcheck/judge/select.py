"""Which limit an element is held against, and why that one.

Order, each step on the trail: date and edition, amendments, zone, row, conditions. For each metric
and path exactly one limit must remain; what stands in the way is named, never guessed.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from envcheck.judge.facts import Known, Value, fact_of, shown
from envcheck.judge.selection import METRICS, MissingFact, Outcome, Selection
from envcheck.judge.zones import ZoneFound, find_zone, holds
from envcheck.model.judged import Choice
from envcheck.model.patterns import closeness, in_words
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import Limit, RuleSet

KEPT = 8
"""Rule sets whose index is kept."""


Group = tuple[tuple[str, str], tuple[tuple[Limit, ...], ...]]
"""(metric, path) and the limits of the rows that cover a category, most specific rows first."""


@dataclass(slots=True)
class _Index:
    """A rule set laid out for quick selection."""

    ruleset: RuleSet
    by_zone: dict[str, list[Limit]] = field(default_factory=dict)
    groups: dict[tuple[tuple[str, ...], str], tuple[Group, ...]] = field(default_factory=dict)
    dimensions: dict[tuple[tuple[str, ...], str], tuple[str, ...]] = field(default_factory=dict)
    zone: tuple[Project, ZoneFound] | None = None
    """Of the project asked for last."""
    done: dict[tuple[object, ...], Selection] = field(default_factory=dict)
    """What was selected for that project."""


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
        name: fact_of(name, element, project, derived_facts or {}, ruleset.dimensions[name])
        for name in index.dimensions[key]
    }
    memo = (category, tuple(facts.items()))
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
    if index.zone is None or index.zone[0] is not project:
        index.done.clear()
        index.zone = (project, find_zone(index.ruleset, project.site))
    return index.zone[1]


def _lay_out(index: _Index, heads: tuple[str, ...], category: str) -> None:
    """Group the limits that cover a category by metric and path, most specific rows first."""
    found: dict[tuple[str, str], dict[int, list[Limit]]] = {}
    for head in (*heads, "*"):
        for limit in index.by_zone.get(head, ()):
            fit = max((closeness(p, category) for p in limit.categories), default=-1)
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


# ----------------------------------------------------------------------------------- selection


def _selection(
    index: _Index,
    zone: ZoneFound,
    category: str,
    facts: Mapping[str, Known],
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
        why = f"no row of {ruleset.title} covers {in_words(category)}{printed}"
        return stopped("not_in_table", why)
    outcomes = tuple(_outcome(key, levels, ruleset, facts) for key, levels in groups)
    trail += _row_trail(outcomes, facts)
    by = {(o.metric, o.path): o for o in outcomes}
    return Selection(ruleset.id, category, zone.printed, "selected", "", outcomes, tuple(trail), by)


def _outcome(
    key: tuple[str, str],
    levels: tuple[tuple[Limit, ...], ...],
    ruleset: RuleSet,
    facts: Mapping[str, Known],
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
    stated = ", ".join(f"{n} {shown(k.value)}" for n, k in facts.items() if k.value is not None)
    why = f"no row holds for {stated}" if stated else "no row holds"
    return Outcome(metric, path, "not_in_table", None, why=why)


def _unknown(limit: Limit, facts: Mapping[str, Known]) -> tuple[str, ...] | None:
    """Facts that the limit still asks for; None where a known fact rules it out."""
    unknown = []
    for condition in limit.when:
        fact = facts[condition.dimension]
        if fact.value is None or not fact.usable:
            unknown.append(condition.dimension)
        elif not holds(condition, fact.value):
            return None
    return tuple(unknown)


def _missing(name: str, ruleset: RuleSet, known: Known) -> MissingFact:
    dimension = ruleset.dimensions[name]
    found = "" if known.value is None else f"{shown(known.value)} ({known.where})"
    return MissingFact(
        name, dimension.values, dimension.unit, dimension.meaning, dimension.sheet, found
    )


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


def _row_trail(outcomes: tuple[Outcome, ...], facts: Mapping[str, Known]) -> list[Choice]:
    trail: list[Choice] = []
    for outcome in outcomes:
        limit = outcome.limit
        what = METRICS.get(outcome.metric, outcome.metric)
        if limit is None:
            trail.append(Choice("row", f"{what}: none", outcome.why))
            continue
        covers = ", ".join(map(in_words, limit.categories))
        why = f'{limit.clause}, row "{limit.label}", covers {covers}; {what} {limit.cell}'
        if limit.replaced:
            why += f"; replaces {limit.replaced}"
        trail.append(Choice("row", limit.id, why))
        for condition in limit.when:
            fact = facts[condition.dimension]
            chosen = f"{condition.dimension.replace('_', ' ')} {shown(fact.value)}"
            why = f"the row asks for {condition.text} ({fact.where})"
            trail.append(Choice("condition", chosen, why))
        trail += [Choice("footnote", f"[{note.mark}]", note.text) for note in limit.notes]
    return list(dict.fromkeys(trail))
