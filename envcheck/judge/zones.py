"""The zone of a site under one rule set: stated, or by degree days."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from math import isclose
from typing import NamedTuple

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.judged import Choice
from envcheck.model.project import ByCriteria, Project, Site, ZoneStated
from envcheck.model.ruleset import Condition, RuleSet, Zones

FALLEN = 3
"""Most suffix letters that a zone may lose."""


class ZoneFound(NamedTuple):
    """The zone, or why there is none."""

    state: str
    """``found``, ``zone_missing``, ``zone_unknown`` or ``zone_ambiguous``."""
    heads: tuple[str, ...]
    """Printed zones that the site belongs to: tables may merge zones in different ways."""
    printed: str
    """As printed, for the report."""
    why: str
    trail: tuple[Choice, ...]


def find_zone(ruleset: RuleSet, site: Site) -> ZoneFound:
    """Find the printed zone of a site: a stated one first, else by the rule set's bounds."""
    zones = ruleset.zones
    if not zones.order:
        return _found((), "", "the rule set has no zones")
    ids = {edition.id for edition in ruleset.chain} | {ruleset.id}
    own = [z for z in site.zones if z.ruleset in ids]
    stated = own or [z for z in site.zones if not z.ruleset]
    names = list(dict.fromkeys(z.zone for z in stated))
    if len(names) > 1:
        why = f"the project states {' and '.join(names)} for {ruleset.id}"
        return ZoneFound("zone_ambiguous", (), "", why, ())
    by_bounds = _by_bounds(zones, site)
    criteria = _criteria(zones, site)
    if criteria is not None and criteria.zone and not names:
        found = _stated(zones, criteria.zone, criteria.why, by_bounds, "by")
        other = [zone for zone in by_bounds if zone not in found.heads]
        if found.state == "found" and other:
            why = f"{by_bounds[other[0]]}, but {criteria.why} gives {criteria.zone}"
            return ZoneFound("zone_ambiguous", (), "", f"bounds and criteria disagree: {why}", ())
        return found
    if names:
        return _stated(zones, names[0], stated[0].source, by_bounds)
    if len(by_bounds) == 1:
        zone, why = next(iter(by_bounds.items()))
        return _found((zone,), zone, why)
    if by_bounds:
        why = "; ".join(f"{zone} by {why}" for zone, why in by_bounds.items())
        return ZoneFound("zone_ambiguous", (), "", f"the bounds disagree: {why}", ())
    if len(zones.order) == 1:
        return _found(zones.order, zones.order[0], "the only zone of the rule set")
    measures = " or ".join(zones.bounds)
    ways = f" or its {measures}" if measures else ""
    if criteria is not None:
        ways += f" or, for the criteria {criteria.criteria}: {criteria.why}"
    why = f"the project states neither the zone of the site{ways} ({zones.chosen_by})"
    return ZoneFound("zone_missing", (), "", why, ())


def contradicted(ruleset: RuleSet, site: Site) -> tuple[str, ByCriteria] | None:
    """The stated zone, and the criteria that give another one; None where they agree."""
    zones = ruleset.zones
    criteria = _criteria(zones, site)
    if criteria is None or not criteria.zone:
        return None
    stated = find_zone(ruleset, site)
    computed = find_zone(ruleset, site._replace(zones=(), measures=()))
    if stated.state != "found" or set(stated.heads) & set(computed.heads):
        return None
    return stated.printed, criteria


def _criteria(zones: Zones, site: Site) -> ByCriteria | None:
    """What the rule set's criteria make of the site."""
    return next((found for found in site.by_criteria if found.criteria == zones.criteria), None)


def zone_problems(project: Project, rulesets: Iterable[RuleSet]) -> list[Problem]:
    """Zones that the project states and no rule set knows: a slip of the file, not an open line."""
    problems = []
    sets = list(rulesets)
    ids = {edition.id for ruleset in sets for edition in ruleset.chain}
    for stated in project.site.zones:
        known: list[str] = []
        if stated.ruleset and stated.ruleset not in ids:
            problems.append(_unknown(project, stated, stated.ruleset, sorted(ids), "rule set"))
            continue
        for ruleset in sets:
            own = {edition.id for edition in ruleset.chain}
            if ruleset.zones.order and (not stated.ruleset or stated.ruleset in own):
                members = ruleset.zones.members.values()
                known += [*ruleset.zones.order, *(name for names in members for name in names)]
                if find_zone(ruleset, Site("", (stated,))).state != "zone_unknown":
                    break
        else:
            if known:
                problems.append(_unknown(project, stated, stated.zone, known, "zone"))
    return problems


def _unknown(
    project: Project, stated: ZoneStated, name: str, known: Sequence[str], what: str
) -> Problem:
    hint = did_you_mean(name, known) or f"write a {what} that is printed there"
    return problem(
        "unknown-zone", project.file, stated.line, found=name, expected=one_of(known), fix=hint,
        what=what,
    )  # fmt: skip


def _found(heads: tuple[str, ...], printed: str, why: str) -> ZoneFound:
    trail = (Choice("zone", printed, why),) if printed else ()
    return ZoneFound("found", heads, printed, "", trail)


def _stated(
    zones: Zones, name: str, source: str, by_bounds: dict[str, str], how: str = "stated"
) -> ZoneFound:
    """Take a stated zone: printed as such, a member of a printed one, or with letters dropped.

    A zone ``by`` the rule set's criteria is taken the same way.
    """
    said = f"stated {name}" + (f" ({source})" if source else "")
    if how == "by":
        said = f"{name} by {zones.criteria} from {source}"
    plain, dropped = name, ""
    for _ in range(FALLEN):
        heads = _heads(zones, plain)
        if heads:
            break
        suffix = next((s for s in zones.suffixes if plain.endswith(s) and plain != s), "")
        if not suffix:
            known = [*zones.order, *(m for ms in zones.members.values() for m in ms)]
            hint = did_you_mean(name, known)
            why = f"the rule set has no zone {name}; {hint or one_of(zones.order)}"
            return ZoneFound("zone_unknown", (), "", why, ())
        plain, dropped = plain.removesuffix(suffix), suffix + dropped
    else:
        return ZoneFound("zone_unknown", (), "", f"the rule set has no zone {name}", ())
    why = said
    if dropped:
        why += f"; no printed zone names {name}, and the letter {dropped} falls back to {plain}"
    if plain not in heads:
        why += f"; {plain} belongs to {' and '.join(heads)}"
    other = [zone for zone in by_bounds if zone not in heads]
    if other and how == "stated":
        why += f"; {by_bounds[other[0]]} would give {other[0]}, the stated zone is used"
    return _found(heads, " / ".join(heads), why)


def _heads(zones: Zones, name: str) -> tuple[str, ...]:
    """Printed zones that are the name or have it as a member."""
    return tuple(
        zone for zone in zones.order if zone == name or name in zones.members.get(zone, ())
    )


def _by_bounds(zones: Zones, site: Site) -> dict[str, str]:
    """Zones by each measure that the site states, with the reason."""
    found: dict[str, str] = {}
    for measure, value in site.measures:
        for zone, condition in zones.bounds.get(measure, {}).items():
            if holds(condition, value):
                found.setdefault(zone, f"{measure} of the site lies in {condition.text}")
    return found


def holds(condition: Condition, value: str | float) -> bool:
    """Whether a value meets a condition.

    A number that differs from a bound by a rounding error (another unit) is the bound.
    """
    if not condition.words and not isinstance(value, str):
        for bound in (condition.low, condition.high):
            if bound is not None and isclose(value, bound, rel_tol=1e-12):
                value = bound
    return condition.holds(value)
