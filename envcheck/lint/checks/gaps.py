"""What one part of a sheet prints and another one leaves out."""

from __future__ import annotations

import re
from collections import defaultdict
from collections.abc import Iterator

from envcheck.lint import Check, Sheets, remark
from envcheck.model.typed import Fault, TypedCell

FRACTION = re.compile(r"\d*[.,](\d+)")


def zone_without_row(sheets: Sheets) -> Iterator[Fault]:
    """Zones stand down the sheet, once for each condition: one of them lacks a zone."""
    for table in sheets.set.tables:
        by_condition: dict[tuple[tuple[str, str], ...], list[TypedCell]] = defaultdict(list)
        for row in table.rows:
            if row[0].row in sheets.set.zones:
                by_condition[row[0].when].append(row[0])
        everywhere = {cell.row for cells in by_condition.values() for cell in cells}
        for cells in by_condition.values():
            for zone in sorted(everywhere - {cell.row for cell in cells}):
                what = f"no row for zone {zone} under the conditions of this one"
                yield remark("L01", cells[-1], what, "type the row that is printed for it", zone)


def mark_without_bracket(sheets: Sheets) -> Iterator[Fault]:
    """One more decimal than all figures beside it, and the digit is a footnote mark: 0.24[1]."""
    for table in sheets.set.tables:
        marks = {mark for mark in table.marks if len(mark) == 1 and mark.isdigit()}
        cells = [cell for row in table.rows for cell in row if marks and cell.printed]
        decimals = [(len(f), f, cell) for cell in cells for f in FRACTION.findall(cell.text)]
        for metric in dict.fromkeys(cell.metric for cell in cells):
            own = [d for d in decimals if d[2].metric == metric]
            most = max((length for length, _, _ in own), default=0)
            longest = [d for d in own if d[0] == most]
            others = [length for length, _, _ in own if length < most]
            if len(longest) == 1 and others and longest[0][1][-1] in marks:
                cell, mark = longest[0][2], longest[0][1][-1]
                what = f"more decimals than any figure beside it, and {mark} is a footnote mark"
                yield remark("L10", cell, what, f"write [{mark}] where it is the mark")


CHECKS = (
    Check("L01", "Zone without a row under some condition", zone_without_row),
    Check("L10", "Footnote mark without its bracket", mark_without_bracket),
)
