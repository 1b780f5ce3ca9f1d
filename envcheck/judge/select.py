"""Which limit an element is held against, and why that one.

Order, each step on the trail: date and edition, amendments, zone, row, conditions. For each metric
and path exactly one limit must remain; what stands in the way is named, never guessed.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from envcheck.judge import trail as trails
from envcheck.judge.between import interpolate, interpolated_over
from envcheck.judge.facts import Known, Value, building_fact, fact_of, in_words
from envcheck.judge.selection import MissingFact, Outcome, Selection
from envcheck.judge.zones import ZoneFound, find_zone, holds
from envcheck.model.patterns import closeness
from envcheck.model.patterns import in_words as category_in_words
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import Condition, Limit, RuleSet

KEPT = 8
"""Rule sets whose index is kept."""


Group = tuple[tuple[str, str, str], tuple[tuple[Limit, ...], ...]]
"""(metric, path, applies to) and the limits of the rows that cover a category, most specific rows
first; a row for all other cases comes last."""
ENVELOPE = "envelope"
"""What a limit for the building as a whole covers."""


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
    met: dict[tuple[int, Value], bool] = field(default_factory=dict)
    """Whether a condition of the rule set (by identity) holds for a value."""


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
    zone, asked = _asked(index, project, category)
    facts = {
        name: fact_of(name, element, project, derived_facts or {}, ruleset.dimensions[name])
        for name in asked
    }
    return _remembered(index, zone, category, facts, project)


def select_envelope(
    ruleset: RuleSet, project: Project, derived_facts: Mapping[str, Value] | None = None
) -> Selection:
    """Select the limits of the building as a whole (a global coefficient)."""
    index = _index(ruleset)
    zone, asked = _asked(index, project, ENVELOPE)
    facts = {
        name: building_fact(name, project, derived_facts or {}, ruleset.dimensions[name])
        for name in asked
    }
    return _remembered(index, zone, ENVELOPE, facts, project)


def _asked(index: _Index, project: Project, category: str) -> tuple[ZoneFound, tuple[str, ...]]:
    """Give the zone of the site, and the facts that limits of a category ask for there."""
    zone = _zone(index, project)
    key = (zone.heads, category)
    if key not in index.groups:
        _lay_out(index, zone.heads, category)
    return zone, index.dimensions[key]


def _remembered(
    index: _Index, zone: ZoneFound, category: str, facts: dict[str, Known], project: Project
) -> Selection:
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
    found: dict[tuple[str, str, str], dict[int, list[Limit]]] = {}
    fits: dict[tuple[str, ...], int] = {}
    for head in (*heads, "*"):
        for limit in index.by_zone.get(head, ()):
            fit = fits.get(limit.categories)
            if fit is None:
                fit = max((closeness(p, category) for p in limit.categories), default=-1)
                fits[limit.categories] = fit
            if fit >= 0 and (category != ENVELOPE or ENVELOPE in limit.categories):
                key = (limit.metric, limit.path, limit.applies_to)
                levels = found.setdefault(key, {})
                levels.setdefault(-1 if limit.otherwise else fit, []).append(limit)
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
    trail = [*trails.editions(ruleset, project), *zone.trail]

    def stopped(state: str, why: str) -> Selection:
        return Selection(ruleset.id, category, zone.printed, state, why, (), tuple(trail))

    base = ruleset.chain[0]
    if not base.in_force:
        return stopped("not_in_force", trails.not_in_force(ruleset, project))
    if zone.state != "found":
        return stopped(zone.state, zone.why)
    groups = index.groups[(zone.heads, category)]
    if not groups:
        printed = f" for zone {zone.printed}" if zone.printed else ""
        why = f"no row of {ruleset.title} covers {category_in_words(category)}{printed}"
        return stopped("not_in_table", why)
    outcomes = tuple(_outcome(key, levels, index, facts) for key, levels in groups)
    trail += trails.of_rows(outcomes, facts, ruleset)
    by = {(o.metric, o.path): o for o in reversed(outcomes)}
    return Selection(ruleset.id, category, zone.printed, "selected", "", outcomes, tuple(trail), by)


def _outcome(
    key: tuple[str, str, str],
    levels: tuple[tuple[Limit, ...], ...],
    index: _Index,
    facts: Mapping[str, Known],
) -> Outcome:
    """Go from the most specific rows down until rows hold, or could hold if a fact were known."""
    metric, path, applies_to = key
    ruleset = index.ruleset
    out: list[tuple[Limit, Condition | None]] = []

    def outcome(state: str, limit: Limit | None = None, why: str = "") -> Outcome:
        return Outcome(metric, path, state, limit, (), (), why, applies_to, tuple(out))

    for level, limits in enumerate(levels):
        holding, undecided, lacking = _hold(limits, index, facts, out)
        if undecided:
            missing = tuple(_missing(name, ruleset, facts[name]) for name in lacking)
            every = (*holding, *undecided)
            found = outcome("missing_fact", why="; ".join(map(str, missing)))
            return found._replace(candidates=every, missing=missing)
        over = interpolated_over(holding, ruleset)
        if over:
            limit, why = interpolate(holding, over, facts[over], ruleset)
            return outcome("found" if limit is not None else "not_in_table", limit, why)
        if len(holding) == 1:
            out += [(x, None) for rest in levels[level + 1 :] for x in rest]
            return outcome("found", holding[0])
        if holding:
            rows = " and ".join(f"{x.clause}, {x.label}: {x.cell}" for x in holding)
            return outcome("two_rows", why=f"two rows: {rows}")._replace(candidates=tuple(holding))
    stated = ", ".join(f"{n} {in_words(k)}" for n, k in facts.items() if k.value is not None)
    return outcome("not_in_table", why=f"no row holds for {stated}" if stated else "no row holds")


def _hold(
    limits: tuple[Limit, ...],
    index: _Index,
    facts: Mapping[str, Known],
    out: list[tuple[Limit, Condition | None]],
) -> tuple[list[Limit], list[Limit], list[str]]:
    """Split limits into those that hold and those that lack facts; ``out`` takes the others."""
    holding: list[Limit] = []
    undecided: list[Limit] = []
    lacking: dict[str, None] = {}
    for limit in limits:
        unknown, against = _unknown(limit, index, facts)
        if against is not None:
            out.append((limit, against))
            continue
        (undecided if unknown else holding).append(limit)
        if unknown:
            lacking |= dict.fromkeys(unknown)
    return holding, undecided, list(lacking)


def _unknown(
    limit: Limit, index: _Index, facts: Mapping[str, Known]
) -> tuple[tuple[str, ...], Condition | None]:
    """Facts that the limit still asks for; or the condition by which a known fact rules it out."""
    unknown: tuple[str, ...] = ()
    for condition in limit.when:
        fact = facts[condition.dimension]
        value = fact.value
        if value is None or not fact.usable:
            unknown += (condition.dimension,)
            continue
        key = (id(condition), value)
        met = index.met.get(key)
        if met is None:
            free = index.ruleset.dimensions[condition.dimension].interpolate
            met = index.met[key] = free or holds(condition, value)
        if not met:
            return (), condition
    return unknown, None


def _missing(name: str, ruleset: RuleSet, known: Known) -> MissingFact:
    dimension = ruleset.dimensions[name]
    found = "" if known.value is None else f"{in_words(known)} ({known.where})"
    return MissingFact(
        name, dimension.values, dimension.unit, dimension.meaning, dimension.sheet, found
    )
