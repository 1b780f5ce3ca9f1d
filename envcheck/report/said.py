"""What is said of one line: its limit, where that stands in print, the verdict, notes beside it."""

from __future__ import annotations

from envcheck.model.judged import Comparison, Line
from envcheck.model.ruleset import Limit
from envcheck.report import numbers, wording
from envcheck.report.inert import clean


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
    if line.limit is None:
        return (
            f"{_sense(line.comparison.sense)}{limit_number(line.comparison)}"
            if (line.comparison)
            else ""
        )
    cell = clean(line.limit.cell)
    if line.limit.kind != "number" or cell.startswith(("<", ">")):
        return cell
    return f"{_sense(line.limit.sense)}{cell}"


def _sense(sense: str) -> str:
    return ">= " if sense == "min" else "<= "


def limit_source(limit: Limit | None, ruleset: str) -> str:
    """Table, row, zone and clause where the limit stands in print."""
    if limit is None:
        return ""
    parts = [limit.clause or limit.table, f'"{limit.label or limit.row}"']
    if limit.zone and limit.zone != "*":
        parts.append(limit.zone)
    parts += [f"{wording.plain(when.dimension)} {when.text}".strip() for when in limit.when]
    if limit.ruleset != ruleset:
        parts.append(f"printed in {limit.ruleset}")
    if limit.replaced:
        parts.append(f"in place of {limit.replaced}")
    if limit.src:
        parts.append(f"source {limit.src}")
    return clean(", ".join(filter(None, parts)))


def verdict_text(line: Line) -> str:
    """The verdict in words."""
    text = wording.VERDICTS[line.verdict]
    comparison = line.comparison
    if comparison is not None:
        if line.verdict == "fail" and comparison.sense == "min":
            text = wording.SHORT_OF
        if line.verdict == "pass" and comparison.by_rounding:
            text = wording.AFTER_ROUNDING
    return f"{text} (mean {clean(line.group)})" if line.group else text


def notes(line: Line) -> tuple[str, ...]:
    """What stands beside a verdict: flags, a group member's own comparison, a claim."""
    found = [
        wording.FLAGS.get(flag, wording.plain(flag))
        for flag in line.flags
        if flag != "rounding"  # the verdict's own words say it
    ]
    own = line.own
    if own is not None:
        word = "within" if own.within else "over"
        found.append(f"alone it would be {word}: {compared(own)} against {limit_number(own)}")
    if line.with_exception:
        found.append(f"claimed exception: {line.with_exception}")
    return tuple(map(clean, found))
