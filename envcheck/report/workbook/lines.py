"""The sheet of lines: value, rounding, comparison and verdict as formulas."""

from __future__ import annotations

from envcheck import units
from envcheck.report import numbers, wording
from envcheck.report.rows import Row
from envcheck.report.view import View
from envcheck.report.workbook.cells import LINES, Cell, Cells, Formula, Head, Input, Place, Sheet

HEADS = (
    "rule set", "tag", "sheet", "built as", "class", "metric", "amount", "unit of amount",
    "value", "unit of value", "value, printed unit", "as compared", "limit", "printed unit",
    "room left", "verdict of this sheet", "verdict of the check", "limit stands in", "why",
)  # fmt: skip
WIDTHS = (18, 9, 8, 26, 17, 12, 8, 8, 11, 16, 11, 10, 9, 16, 10, 18, 20, 38, 44)
VALUE, EXACT, COMPARED, LIMIT = "I", "K", "L", "M"
"""Columns that formulas name."""


def sheet(view: View, results: dict[Place, str]) -> Sheet:
    """A row per line; ``results`` are the cells of the worksheets' values."""
    rounding = {rules.id: rules.rounding for rules in view.rule_sets}
    rows: list[Cells] = [tuple(map(Head, HEADS))]
    for row in view.rows:
        cell = results.get((row.rule_set, row.tag, wording.METRICS.get(row.metric, row.metric)))
        rows.append(_line(row, len(rows) + 1, cell, rounding[row.rule_set], view.units))
    return Sheet(LINES, tuple(rows), WIDTHS, 1)


def _line(row: Row, number: int, cell: str | None, rounding: str, system: str) -> Cells:
    own = row.comparison
    value: Cell = row.value.number
    if own is not None:
        exact = in_report(own.value, own.unit, row.metric, system)
        value = Formula(cell, exact) if cell else Input(exact)
    return (
        row.rule_set, row.tag, row.sheet, row.built_as, row.category, row.metric,
        row.amount.number, row.amount.unit, value, row.value.unit,
        *_held(row, number, rounding, system),
        row.verdict_text, row.limit_source, "; ".join((*row.reasons, *row.notes)),
    )  # fmt: skip


def in_report(value: float, unit: str, metric: str, system: str) -> float:
    """A value of a printed unit in the unit of the report."""
    if numbers.system_of(unit) in ("", system):
        return value
    return numbers.in_system(units.to_si(value, unit), numbers.quantity(metric), system)


def _held(row: Row, number: int, rounding: str, system: str) -> Cells:
    """Value in the printed unit, as compared, limit, unit, room left, verdict."""
    own = row.comparison
    if own is None:
        return None, None, row.against or None, None, None, row.verdict_text
    value, exact = f"{VALUE}{number}", f"{EXACT}{number}"
    compared, limit = f"{COMPARED}{number}", f"{LIMIT}{number}"
    ratio = 1.0
    if numbers.system_of(own.unit) not in ("", system):
        quantity = numbers.quantity(row.metric)
        ratio = numbers.factor(quantity, system) / units.to_si(1.0, own.unit)
    sign, first, second = ("<=", limit, exact) if own.sense == "max" else (">=", exact, limit)
    return (
        Formula(value if ratio == 1.0 else f"{value}*{ratio!r}", own.value),
        Formula(_rounded(exact, rounding, own.decimals), own.compared),
        Input(own.limit),
        own.unit,
        Formula(f"{first}-{second}", own.margin),
        _verdict(row, f"{compared}{sign}{limit}", f"{exact}{sign}{limit}"),
    )


def _rounded(cell: str, rounding: str, decimals: int) -> str:
    """Twelve significant digits, then half-up, as the check does it."""
    kept = f"ROUND({cell},11-INT(LOG10(ABS({cell})+1E-300)))"
    if rounding == "unrounded":
        return kept
    return f"ROUND({kept},{2 if rounding == 'rounded_2dp' else decimals})"


def _verdict(row: Row, holds: str, holds_exactly: str) -> str | Formula:
    """The comparison as a formula where it decides the line; else the verdict of the check."""
    own = row.comparison
    if own is None or row.verdict not in ("pass", "fail") or (row.verdict == "fail") == own.within:
        return row.verdict_text
    within, over = wording.VERDICTS["pass"], wording.VERDICTS["fail"]
    text = f'IF({holds},IF({holds_exactly},"{within}","{within}{wording.BY_ROUNDING}"),"{over}")'
    value = over if not own.within else within + wording.BY_ROUNDING * own.by_rounding
    return Formula(text, value)
