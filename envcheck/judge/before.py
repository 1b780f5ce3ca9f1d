"""What stands before a comparison: class, limit, area caps, evidence, depth, claims."""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple

from envcheck.judge.classes import Class
from envcheck.judge.paths import reach
from envcheck.judge.selection import Selection
from envcheck.model.judged import Ratio
from envcheck.model.patterns import best_pattern, matches
from envcheck.model.project import Assembly, Element, ExceptionClaim, Project
from envcheck.model.ruleset import Limit, RuleSet
from envcheck.model.solved import Properties

COMPUTED_BY = {"window": "ISO 10077-1", "curtain-wall": "ISO 12631"}
"""Kinds computed from parts, and the standard that the value follows."""


class Case(NamedTuple):
    """Everything that one line is judged from."""

    project: Project
    ruleset: RuleSet
    decides: bool
    element: Element
    assembly: Assembly
    properties: Properties
    found_class: Class
    selection: Selection
    closed: Mapping[str, Ratio]
    """Category patterns whose rows an area cap closes."""


def by_class(case: Case) -> tuple[str, str] | None:
    """Verdict and reason where the class is not settled."""
    if case.found_class.official:
        return "official_decides", case.found_class.official
    if case.found_class.missing:
        return "not_decided", f"missing: {case.found_class.missing}"
    return None


def by_limit(case: Case, metric: str, limit: Limit | None) -> tuple[str, str] | None:
    """Verdict and reason where the tables give no number."""
    if limit is None:
        outcome = case.selection.outcome(metric)
        missing = outcome is not None and outcome.state == "missing_fact"
        why = case.selection.reason_of(metric)
        return case.selection.verdict_of(metric), f"missing: {why}" if missing else why
    if limit.kind == "not_covered":
        return "not_in_table", f"the table prints {limit.cell!r} here: the code has no such case"
    if limit.kind == "no_requirement":
        return "no_requirement", f"the table prints {limit.cell}"
    by_official = [note for note in limit.notes if note.by_official]
    if by_official:
        return "official_decides", f"footnote {by_official[0].mark}: {by_official[0].text}"
    return None


def by_area_cap(case: Case) -> str | None:
    """Why an area cap closes the row, or None."""
    for pattern, ratio in case.closed.items():
        if matches(pattern, case.found_class.category):
            most = (ratio.most or 0.0) * 100
            return (
                f"{ratio.clause}: {ratio.value * 100:.3g} % is above {most:.3g} %; "
                "this row does not apply until the area is brought down"
            )
    return None


def lacks_evidence(case: Case, metric: str) -> str | None:
    """Why the evidence of a product is not accepted, or None.

    A value computed from parts is a calculation to its own standard, and never a rating.
    """
    rated = case.assembly.rated
    if rated is None:
        standard = COMPUTED_BY.get(case.assembly.kind)
        return _not_accepted(case, "calculation", standard) if standard else None
    if rated.basis == "centre_of_glass" and metric != "U_glazing":
        return (
            f"missing: values of the whole product for {case.assembly.id}, frame included; only "
            f"those of the centre of glass are stated, on {case.assembly.sheet or 'its schedule'}"
        )
    return _not_accepted(case, rated.evidence, rated.standard)


def _not_accepted(case: Case, evidence: str, standard: str) -> str | None:
    stated = case.ruleset.conventions.accepted_evidence
    pattern = best_pattern(case.found_class.category, stated)
    accepted = stated[pattern] if pattern is not None else ()
    kinds = [kind for kind in accepted if not kind.startswith("standard:")]
    standards = [kind.partition(":")[2] for kind in accepted if kind.startswith("standard:")]
    if kinds and evidence not in kinds:
        return (
            f"missing: evidence that the rule set accepts ({', '.join(kinds)}); "
            f"{case.assembly.id} has {_named(case, evidence, standard)}"
        )
    computed = case.assembly.rated is None
    if computed:  # the standard that a rule set names may carry its year
        standards = [name.partition(":")[0] for name in standards]
    if standards and standard not in standards:
        also = f", which is computed to {standard}" if computed else ""
        return f"missing: a rating to {' or '.join(standards)} for {case.assembly.id}{also}"
    return None


def _named(case: Case, evidence: str, standard: str) -> str:
    """What stands behind a product, in words."""
    if case.assembly.rated is None:
        return f"a {evidence} to {standard}"
    return evidence or "none"


def claim_of(case: Case) -> ExceptionClaim | None:
    """The exception claimed for this element, or None."""
    return next((c for c in case.project.exceptions if c.element == case.element.tag), None)


def lacks_depth(case: Case, limit: Limit) -> str | None:
    """A below-grade wall needs the depth to which its insulation reaches."""
    element = case.element
    if limit.metric != "C_factor" or not case.properties.continuous_resistance:
        return None
    if element.insulated_depth is None:
        sheet = case.assembly.sheet or element.sheet or "its section"
        return f"missing: the depth to which {element.tag} is insulated, on {sheet}"
    if (
        element.depth_below_grade is not None
        and element.insulated_depth + 1e-3 < element.depth_below_grade
    ):
        return (
            f"missing: a value for the part of {element.tag} below its insulation "
            f"({reach(element.insulated_depth, limit)} of "
            f"{reach(element.depth_below_grade, limit)} insulated): "
            "enter two elements, split at that depth"
        )
    return None
