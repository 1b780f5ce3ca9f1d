"""The sheet of sums as drawn against the table; their values follow those of the lines."""

from __future__ import annotations

from envcheck.report.groups import GroupView, PartView
from envcheck.report.rows import Row
from envcheck.report.view import View
from envcheck.report.workbook.cells import LINES, Cell, Cells, Formula, Head, Input, Place, Sheet
from envcheck.report.workbook.lines import VALUE, in_report


def sheets(view: View) -> tuple[Sheet, ...]:
    """Sums as drawn against the table; values follow those of the sheet Lines."""
    groups = [group for group in view.building.groups if group.parts]
    if not groups:
        return ()
    lines: dict[Place, tuple[int, Row]] = {}
    for place, row in enumerate(view.rows, 2):
        lines.setdefault((row.rule_set, row.tag, row.symbol), (place, row))
    heads = ("elements", "built as", "letter", "amount", "unit", "value", "limit", "as drawn",
             "by the table", "difference", "verdict of its own")  # fmt: skip
    rows: list[Cells] = []
    for group in groups:
        rows += [(Head(group.title),), (group.state_text,), tuple(map(Head, heads))]
        first, drawn, table = len(rows) + 1, 0.0, 0.0
        for part in group.parts:
            cells, ours, theirs = _part(group, part, len(rows) + 1, lines, view.units)
            rows.append(cells)
            drawn, table = drawn + ours, table + theirs
        last = len(rows)
        totals = (
            Formula(f"SUM({column}{first}:{column}{last})", value)
            for column, value in (("H", drawn), ("I", table), ("J", drawn - table))
        )
        rows += [("sum", "", "", "", "", "", "", *totals, group.drawn.unit)]
        rows += [(text,) for text in (*group.waits, *group.charges)] + [()]
    return (Sheet("Sums", tuple(rows), (34, 34, 8, 12, 8, 14, 12, 14, 14, 14, 24)),)


def _part(
    group: GroupView,
    part: PartView,
    number: int,
    lines: dict[Place, tuple[int, Row]],
    system: str,
) -> tuple[Cells, float, float]:
    """The row of a part, and its two products."""
    value: Cell = None
    exact = part.value.number or 0.0
    found = lines.get((group.rule_set, part.elements[0], part.symbol))
    if found is not None and found[1].comparison is not None:
        own = found[1].comparison
        exact = in_report(own.value, own.unit, found[1].metric, system)
        value = Formula(f"'{LINES}'!${VALUE}${found[0]}", exact)
    else:
        value = Input(exact)
    amount, limit = part.amount.number or 0.0, part.limit.number or 0.0
    cells: Cells = (
        ", ".join(part.elements), part.built_as, part.symbol, amount, part.amount.unit, value,
        Input(limit), Formula(f"D{number}*F{number}", amount * exact),
        Formula(f"D{number}*G{number}", amount * limit),
        Formula(f"H{number}-I{number}", amount * (exact - limit)), part.verdict_text,
    )  # fmt: skip
    return cells, amount * exact, amount * limit
