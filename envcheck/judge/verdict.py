"""One element held against one limit: the verdict and its reasons."""

from __future__ import annotations

from envcheck.judge.alterations import by_threshold, by_trigger
from envcheck.judge.before import (
    Case,
    by_area_cap,
    by_class,
    by_limit,
    claim_of,
    lacks_depth,
    lacks_evidence,
)
from envcheck.judge.compare import compare, own_term
from envcheck.judge.paths import insulation_of, insulation_path
from envcheck.judge.ratings import adjusted, by_rating
from envcheck.judge.selection import INSULATION, METRICS
from envcheck.judge.values import of_metric, value_of
from envcheck.model.judged import Choice, Comparison, Line, PathResult
from envcheck.model.project import ExceptionClaim
from envcheck.model.ruleset import Limit
from envcheck.model.solved import Solved

R_INSULATION = "R_insulation"
PRODUCTS = ("rated", "window", "curtain-wall", "glazing")
"""Kinds without labelled insulation of their own."""
OUTCOMES = {"pass": "within its limit", "fail": "over its limit"}
"""What a claimed line is without its claim, in words; anything else is not decided."""
BETWEEN_BRIDGES = (
    "the limit lies between the bounds of its bridges from drawn details: over it by the high "
    "bound, within it by the low one"
)
IN_RANGE = "the limit lies inside the interval that follows from the stated ranges"
PATH_STATES = {"not_available": " not available", "not_decided": " not decided"}


def judge(case: Case, metric: str, solved: Solved | None) -> Line:
    """Judge one element in one metric.

    The questions are asked in a fixed order and the first that stands in the way gives the
    verdict: the class, the limit, the share renewed, the value before the work, a claimed
    exception, an area cap, the evidence, the value, the comparison.
    """
    limit = case.selection.limit(metric)
    line = Line(
        ruleset=case.ruleset.id,
        decides=case.decides,
        element=case.element.tag,
        category=case.found_class.category,
        metric=metric,
        verdict="",
        reasons=(),
        limit=limit,
        solved=solved,
        comparison=None,
        trail=_trail(case),
    )
    renewal = by_trigger(case.element, case.project, case.ruleset)
    for answer in (by_class(case), by_limit(case, metric, limit), renewal):
        if answer is not None:
            return line._replace(verdict=answer[0], reasons=(answer[1],))
    assert limit is not None
    kept = by_threshold(case.element, limit, case.ruleset)
    if kept is not None:
        return line._replace(verdict=kept[0], reasons=(kept[1],))
    compared = _compare(case, line, limit, solved)
    closing = by_area_cap(case)
    if closing is not None:
        return compared._replace(verdict="path_closed", reasons=(closing, *compared.reasons))
    claim = claim_of(case)
    if claim is not None:
        return _claimed(compared, claim)
    return compared


def _claimed(line: Line, claim: ExceptionClaim) -> Line:
    """Turn a compared line into a claim: the official decides, both outcomes are said."""
    evidence = (
        f"evidence {claim.evidence}"
        if claim.evidence_found
        else f"evidence file {claim.evidence} not found"
        if claim.evidence
        else "no evidence file"
    )
    reason = f"exception {claim.clause} claimed by {claim.claimed_by or 'nobody named'}: {evidence}"
    without = OUTCOMES.get(line.verdict, "not decided")
    words = f"with it: waived if the official agrees; without it: {without}"
    return line._replace(
        verdict="official_decides",
        reasons=(reason, claim.reason, *line.reasons) if claim.reason else (reason, *line.reasons),
        with_exception=words,
    )


# ------------------------------------------------------------------------------ comparing


def _compare(case: Case, line: Line, limit: Limit, solved: Solved | None) -> Line:
    missing = lacks_evidence(case, limit.metric) or lacks_depth(case, limit)
    if missing is None and solved is not None and solved.missing:
        missing = f"missing: {solved.missing[0]}"
    if missing is None and solved is not None and solved.decided_by_bracket:
        return _with_range(case, _by_bracket(case, line, limit, solved), limit, solved)
    value = value_of(limit.metric, case.assembly, solved)
    if missing is None and value is None:
        missing = f"missing: {_named(limit.metric)} of {case.assembly.id}"
    how = ""
    if missing is None and value is not None and case.ruleset.adjustments:
        value, how, unknown = adjusted(case, limit.metric, value)
        missing = f"missing: {unknown}" if unknown else None
    labels = _labels(case, limit)
    if limit.metric == R_INSULATION:
        return _by_labels(line, labels)
    rating = by_rating(case, limit)
    if missing is not None or value is None:
        if rating is not None and rating[0] == "pass":
            return line._replace(verdict="pass", reasons=(rating[1],))
        return _without_value(line, missing or "", limit, labels)
    comparison = compare(value, own_term(limit), limit, case.ruleset)
    own = PathResult(
        "assembly",
        "pass" if comparison.within else "fail",
        f"{comparison.compared:.{comparison.decimals}f}",
        limit.cell,
        "",
    )
    verdict, reasons = _outcome(comparison, labels, rating)
    reasons = (how, *reasons) if how else reasons
    if verdict == "fail" and _within_bounds(case, value, limit, solved):
        verdict, reasons = "too_close", (BETWEEN_BRIDGES, *reasons)
    line = line._replace(
        verdict=verdict,
        comparison=comparison,
        paths=(own, labels) if labels is not None else (),
        reasons=reasons,
    )
    line = _with_range(case, line, limit, solved)
    return _with_bracket(case, line, limit, solved)


def _within_bounds(case: Case, value: float, limit: Limit, solved: Solved | None) -> bool:
    """Whether the low bound of the bridges from drawn details would be within the limit."""
    if solved is None or not solved.unsure:
        return False
    return compare(value - solved.unsure, own_term(limit), limit, case.ruleset).within


def _with_range(case: Case, line: Line, limit: Limit, solved: Solved | None) -> Line:
    """Hold both ends of the interval from stated ranges against the limit.

    Where the limit lies inside it nobody can say whether the value meets it, unless another path
    carries the line.
    """
    if solved is None or solved.ranged is None or limit.metric != solved.setting.metric:
        return line
    term = own_term(limit)
    low = compare(solved.ranged.low, term, limit, case.ruleset)
    high = compare(solved.ranged.high, term, limit, case.ruleset)
    line = line._replace(range_low=low, range_high=high)
    by_labels = any(path.path == "insulation" and path.state == "pass" for path in line.paths)
    if low.within == high.within or by_labels or line.verdict not in ("pass", "fail", "too_close"):
        return line
    reasons = tuple(reason for reason in line.reasons if not reason.startswith("both bounds"))
    return line._replace(verdict="too_close", reasons=(IN_RANGE, *reasons))


def _outcome(
    comparison: Comparison, labels: PathResult | None, rating: tuple[str, str] | None
) -> tuple[str, tuple[str, ...]]:
    """Any one path may pass; what only a person can decide is never a failure."""
    reasons = _reasons(comparison, labels)
    if comparison.within or (labels is not None and labels.state == "pass"):
        return "pass", reasons
    if labels is not None and labels.state == "not_decided":
        return "official_decides", reasons
    if rating is not None:
        verdict, why = rating
        return verdict, (why if verdict == "pass" else f"{why}; over by its own metric", *reasons)
    return "fail", reasons


def _named(metric: str) -> str:
    return f"the {METRICS[metric]}" if metric in METRICS else metric


def _labels(case: Case, limit: Limit) -> PathResult | None:
    """The R-value path, where the table prints one for this element."""
    other = case.selection.limit(R_INSULATION, INSULATION)
    if other is None and limit.metric == R_INSULATION:  # a table of labelled values alone
        other = limit
    if other is None or other.kind != "number" or case.assembly.kind in PRODUCTS:
        return None
    brought = insulation_of(case.assembly, case.element, case.properties)
    result = insulation_path(other, brought, case.ruleset)
    notes = [note for note in other.notes if note.by_official]
    if notes and result.state == "pass":
        why = f"footnote {notes[0].mark}: {notes[0].text}"
        return result._replace(state="not_decided", why=why)
    return result


def _by_labels(line: Line, labels: PathResult | None) -> Line:
    """A table that limits labelled insulation only."""
    if labels is not None and labels.state == "not_decided":
        return line._replace(verdict="official_decides", reasons=(labels.why,), paths=(labels,))
    if labels is None or labels.state == "not_available":
        why = labels.why if labels is not None else "labelled insulation"
        return line._replace(verdict="not_decided", reasons=(f"missing: {why}",))
    return line._replace(verdict=labels.state, reasons=(labels.why,), paths=(labels,))


def _without_value(line: Line, missing: str, limit: Limit, labels: PathResult | None) -> Line:
    """No U-factor: the R-value path may still carry the line."""
    if labels is None or labels.state != "pass":
        paths = (PathResult("assembly", "not_decided", "", limit.cell, missing),)
        return line._replace(
            verdict="not_decided",
            reasons=(missing,),
            paths=(*paths, labels) if labels is not None else (),
        )
    own = PathResult("assembly", "not_decided", "", limit.cell, missing)
    return line._replace(
        verdict="pass",
        reasons=(f"by the R-value path: {labels.value}, {labels.why}",),
        paths=(own, labels),
    )


def _reasons(comparison: Comparison, labels: PathResult | None) -> tuple[str, ...]:
    found = []
    if labels is not None and not comparison.within:
        if labels.state == "pass":
            found.append(f"by the R-value path: {labels.value}, {labels.why}")
        else:
            found.append(f"R-value path{PATH_STATES.get(labels.state, '')}: {labels.why}")
    return tuple(found)


def _by_bracket(case: Case, line: Line, limit: Limit, solved: Solved) -> Line:
    """The method is the two-dimensional solution: the bracket decides."""
    assert solved.low is not None and solved.high is not None
    term = own_term(limit)
    low = compare(of_metric(limit.metric, solved.low), term, limit, case.ruleset)
    high = compare(of_metric(limit.metric, solved.high), term, limit, case.ruleset)
    if high.within:
        verdict, why = "pass", "both bounds lie within the limit"
    elif not low.within:
        verdict, why = "fail", "both bounds lie over the limit"
    else:
        verdict, why = "too_close", "the limit lies between the bounds, which decide here"
    return line._replace(verdict=verdict, reasons=(why,), comparison=high, low=low, high=high)


def _with_bracket(case: Case, line: Line, limit: Limit, solved: Solved | None) -> Line:
    """Flag where the choice of method would turn the verdict, and where only rounding does."""
    flags = []
    comparison = line.comparison
    assert comparison is not None
    if comparison.by_rounding:
        flags.append("rounding")
    if comparison.compared == comparison.limit:
        flags.append("at_limit")
    if solved is None or solved.low is None or solved.high is None:
        return line._replace(flags=tuple(flags))
    term = own_term(limit)
    low = compare(of_metric(limit.metric, solved.low), term, limit, case.ruleset)
    high = compare(of_metric(limit.metric, solved.high), term, limit, case.ruleset)
    if {low.within, high.within, comparison.within} == {True, False}:
        flags.append("method")
    return line._replace(low=low, high=high, flags=tuple(flags))


def _trail(case: Case) -> tuple[Choice, ...]:
    choice = case.found_class.choice
    return case.selection.trail if choice is None else (choice, *case.selection.trail)
