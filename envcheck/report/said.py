"""What is said of one line: its limit, where that stands in print, the verdict, notes beside it."""

from __future__ import annotations

from envcheck.model.judged import Comparison, Difference, Line, Turn
from envcheck.model.ruleset import Limit
from envcheck.report import numbers, wording
from envcheck.report.inert import clean

NOT_HERE = "does not apply"
"""What a footnote did that does not hold for this element."""
SOURCES = {"E": "example value"}
"""Marks in the column ``src`` of a table, in words."""


def compared(comparison: Comparison) -> str:
    """The figure that was held against the limit, in the printed unit."""
    text = numbers.fixed(comparison.compared, comparison.decimals)
    if abs(float(text) - comparison.compared) > 1e-9 * abs(comparison.compared):
        return numbers.significant(comparison.compared, 6)
    return text


def limit_number(comparison: Comparison) -> str:
    """The number of the limit with its printed decimals."""
    return f"{comparison.limit:.{comparison.decimals}f}"


def limit_text(line: Line) -> str:
    """The limit as printed in the table, with its sense in front of a number."""
    own = line.own or line.comparison
    if line.limit is None:
        return f"{_sense(own.sense)}{limit_number(own)}" if own else ""
    cell = clean(line.limit.cell)
    if line.limit.kind != "number" or cell.startswith(("<", ">")):
        return cell
    return f"{_sense(line.limit.sense)}{cell}"


def against(line: Line) -> str:
    """The number that a value is held against; a cell of several numbers or none as printed."""
    limit = line.limit
    own = line.own or line.comparison
    if own is not None or limit is None or limit.kind != "number":
        return f"{_sense(own.sense)}{limit_number(own)}" if own is not None else limit_text(line)
    terms = limit.alternatives[0] if len(limit.alternatives) == 1 else ()
    return f"{_sense(limit.sense)}{terms[0].text}" if len(terms) == 1 else limit_text(line)


def _sense(sense: str) -> str:
    return ">= " if sense == "min" else "<= "


def limit_source(limit: Limit | None, ruleset: str) -> str:
    """Table, row, zone and clause where the limit stands in print."""
    if limit is None:
        return ""
    parts = [limit.clause or limit.table, f'"{limit.label or limit.row}"']
    if limit.zone and limit.zone != "*":
        parts.append(limit.zone)
    parts += [_condition(when.dimension, when.text) for when in limit.when]
    if limit.applies_to == "any_point":
        parts.append("at any point")
    if limit.ruleset != ruleset:
        parts.append(f"printed in {limit.ruleset}")
    if limit.replaced:
        parts.append(f"in place of {limit.replaced}")
    parts += [f"footnote {n.mark}: {n.did}" for n in limit.notes if n.did and n.did != NOT_HERE]
    if limit.src:
        parts.append(SOURCES.get(limit.src, f"source {limit.src}"))
    return clean(", ".join(filter(None, parts)))


def _condition(dimension: str, text: str) -> str:
    return f"{wording.plain(dimension)} {wording.either(text)}".strip()


def verdict_text(line: Line) -> str:
    """The verdict in words, with what it rests on where a value passes only just or otherwise."""
    text = wording.VERDICTS[line.verdict]
    own = line.comparison
    if line.verdict == "fail" and own is not None and own.sense == "min":
        text = wording.SHORT_OF
    if line.group_kind:
        text = wording.OVER_WITH if line.verdict == "fail" else text
        text += f" ({group(line.group_kind, line.group)})"
    return text + _only_just(line) if line.verdict == "pass" else text


def elsewhere(each: Difference | Turn) -> str:
    """What another rule set, or one convention of it, makes of a line."""
    by = (
        f"{each.other}: "
        if isinstance(each, Difference)
        else f"{each.convention} of {each.other}: "
    )
    return clean(by + wording.VERDICTS[each.after])


def group(kind: str, name: str) -> str:
    """Name a group: ``mean attic``, ``trade-off conditioned``."""
    return clean(f"{wording.GROUPS[kind]} {name}".strip())


def _only_just(line: Line) -> str:
    """How a line passes, where its value alone does not say so."""
    own = line.comparison
    if own is None or not own.within:
        by_labels = any(path.path == "insulation" and path.state == "pass" for path in line.paths)
        return f", {wording.INSULATION_PATH}" if by_labels and len(line.paths) > 1 else ""
    if own.by_rounding:
        return wording.BY_ROUNDING
    if own.compared != own.limit:
        return ""
    return wording.AT_LIMIT if _exactly_at(own) else wording.ROUNDED_TO_LIMIT


def _exactly_at(own: Comparison) -> bool:
    """Whether the unrounded value prints as the limit, at one decimal more."""
    return not numbers.fixed(own.margin, own.decimals + 1).strip("0.")


def choice(step: str, chosen: str, why: str) -> tuple[str, str]:
    """One step of the trail: its name, and what was chosen with the reason.

    Of a row the reason names table and row; what was chosen is an identifier.
    """
    label = wording.TRAIL.get(step, wording.plain(step))
    if step == "row" and why:
        return label, why
    return label, f"{chosen}: {why}" if why else chosen


def notes(line: Line) -> tuple[str, ...]:
    """What stands beside a verdict: flags, a group member's own comparison, a claim."""
    found = []
    if "method" in line.flags:
        found.append(wording.WITHIN_BY_METHOD if line.verdict == "pass" else wording.ON_METHOD)
    own = line.own
    if own is not None:
        word = "within" if own.within else "over"
        found.append(f"alone it would be {word}: {compared(own)} against {limit_number(own)}")
    if line.range_low is not None and line.range_high is not None:
        ends = f"{compared(line.range_low)} to {compared(line.range_high)}"
        against = limit_number(line.range_high)
        found.append(f"by the stated ranges of its inputs {ends} against {against}")
    if line.with_exception:
        found.append(f"claimed exception: {line.with_exception}")
    return tuple(map(clean, found))
