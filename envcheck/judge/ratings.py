"""Ratings that a cell offers beside its own metric, and factors on the design's own value."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from envcheck.judge.before import Case
from envcheck.judge.facts import Known, fact_of
from envcheck.judge.zones import holds
from envcheck.model.ruleset import Adjustment, Dimension, Limit, OtherMetric, Term


def by_rating(case: Case, limit: Limit) -> tuple[str, str] | None:
    """Verdict and reason by the ratings of the cell; None where it offers none.

    A rating is a fact of the element or the project under its own name: ``WER: B``, ``ER: 34``.
    """
    offered = list(_offered(limit))
    if not offered:
        return None
    short, unknown = [], []
    for term in offered:
        printed = f"{term.metric} {term.text}"
        stated = _stated(case, term.metric)
        met = None if stated is None else _meets(stated, term, case.ruleset.other_metrics)
        if met:
            return "pass", f"by {term.metric} {stated}, which meets {printed}"
        if met is None:
            unknown.append(
                f"the {term.metric} of {case.element.tag} (the cell also offers {printed})"
            )
        else:
            short.append(f"{term.metric} {stated} is short of {printed}")
    if unknown:
        return "not_decided", "; ".join([f"missing: {' or '.join(unknown)}", *short])
    return "fail", "; ".join(short)


def _offered(limit: Limit) -> Iterator[Term]:
    for alternative in limit.alternatives:
        if len(alternative) == 1 and alternative[0].metric not in ("", limit.metric):
            yield alternative[0]


def _stated(case: Case, name: str) -> str | None:
    for fact in (*case.element.facts, *case.project.facts):
        if fact.name.casefold() == name.casefold():
            return str(fact.value)
    return None


def _meets(stated: str, term: Term, known: Mapping[str, OtherMetric]) -> bool | None:
    """Whether a stated rating meets a printed one; None where it cannot be read."""
    other = known.get(term.metric)
    if other is None:
        return None
    if term.band:
        bands = [band.casefold() for band in other.bands]
        band = stated.strip().casefold()
        return bands.index(band) <= term.number if band in bands else None
    try:
        value = float(stated)
    except ValueError:
        return None
    return value <= term.number if other.sense == "max" else value >= term.number


# ------------------------------------------------------------------------------------- factors


def adjusted(case: Case, metric: str, value: float) -> tuple[float, str, str]:
    """Give the value times the factor that the rule set prescribes, how, and what is missing.

    A factor that can only help is left out where its facts are not stated.
    """
    own = [a for a in case.ruleset.adjustments if a.metric == metric]
    missing: dict[str, None] = {}
    for adjustment in own:
        state = _state(case, adjustment)
        if state == "holds":
            words = f"{adjustment.clause}: times {adjustment.factor:g}"
            return value * adjustment.factor, words, ""
        if state:
            missing[state] = None
    if missing and any(a.factor > 1.0 for a in own):
        return value, "", f"{' and '.join(missing)}, for the factor of {own[0].clause}"
    return value, "", ""


def _state(case: Case, adjustment: Adjustment) -> str:
    """``holds``, empty where it does not, or the name of the fact that is missing."""
    for condition in adjustment.when:
        known = _fact(case, condition.dimension)
        if known.value is None or not known.usable:
            return condition.dimension.replace("_", " ")
        if not holds(condition, known.value):
            return ""
    return "holds"


def _fact(case: Case, name: str) -> Known:
    dimension = case.ruleset.dimensions.get(name, Dimension(name))
    return fact_of(name, case.element, case.project, {}, dimension)
