"""A table for spreadsheets: one row per line, one meaning per column, numbers as numbers."""

from __future__ import annotations

import csv
import io
import re

from envcheck import units
from envcheck.report.answer import Answer
from envcheck.report.inert import for_csv
from envcheck.report.rows import Figure, Row
from envcheck.report.view import View

NAME = "csv"
TITLE = "CSV, a row per line"
EXTENSION = "csv"
_VALUES = (
    ("U or C", "u_factor"),
    ("F", "linear_transmittance"),
    ("R", "resistance"),
)
_BY_UNIT = {
    units.label(quantity, system): f"{letters} [{units.label(quantity, system)}]"
    for letters, quantity in _VALUES
    for system in ("SI", "IP")
}
NUMBER = re.compile(r"[+-]?\d+(\.\d+)?")
_NUMBER = "SHGC or VT [-]"
VALUE_HEADS = (*_BY_UNIT.values(), _NUMBER)
AMOUNTS = {
    "m2": "area [m2]",
    "ft2": "area [ft2]",
    "m": "perimeter [m]",
    "ft": "perimeter [ft]",
    "count": "count [-]",
}
SUMS = tuple(
    f"{what} [{units.label('point_transmittance', system)}]"
    for what in ("as drawn", "by the table")
    for system in ("SI", "IP")
)
"""What a line adds to the sums that it stands in."""
HEADS = (
    "rule set",
    "decides",
    "tag",
    "sheet",
    "surface",
    "assembly",
    "built as",
    "category",
    "metric",
    *AMOUNTS.values(),
    *VALUE_HEADS,
    "low bound [unit of the value]",
    "high bound [unit of the value]",
    "compared [printed unit]",
    "limit [printed unit]",
    "room left [printed unit]",
    "room left [% of the limit]",
    "printed unit",
    "limit as printed",
    "limit from",
    "sums",
    *SUMS,
    "verdict",
    "verdict in words",
    "verdict elsewhere",
    "why",
    "hand check",
)
TEXT = (
    frozenset(HEADS)
    - {*AMOUNTS.values(), *VALUE_HEADS, *SUMS}
    - {head for head in HEADS if "bound [" in head or "[printed unit]" in head or "[% of" in head}
)
"""Columns of text, guarded against being read as formulas."""


def render(view: View) -> str:
    """Write a head and a row per line. Columns are the same for every project."""
    buffer = io.StringIO()
    writer = csv.DictWriter(buffer, HEADS, restval="", lineterminator="\n")
    writer.writeheader()
    writer.writerows(map(_cells, view.rows))
    return buffer.getvalue()


def answer(made: Answer, width: int) -> str:
    """Write the table of another command; text is guarded, a number stays one."""
    buffer = io.StringIO()
    writer = csv.writer(buffer, lineterminator="\n")
    writer.writerow(made.table.heads)
    writer.writerows(tuple(map(_guarded, row)) for row in made.table.rows)
    return buffer.getvalue()


def _guarded(cell: str) -> str:
    return cell if NUMBER.fullmatch(cell) else for_csv(cell)


def _cells(row: Row) -> dict[str, str]:
    cells = {
        "rule set": row.rule_set,
        "decides": "yes" if row.decides else "no",
        "tag": row.tag,
        "sheet": row.sheet,
        "surface": row.surface,
        "assembly": row.assembly,
        "built as": row.built_as,
        "category": row.category,
        "metric": row.metric,
        "low bound [unit of the value]": row.low.text,
        "high bound [unit of the value]": row.high.text,
        "compared [printed unit]": row.compared.text,
        "limit [printed unit]": row.limit_number.text,
        "room left [printed unit]": row.room.text.removeprefix("+"),
        "room left [% of the limit]": row.room_share.removesuffix(" %").removeprefix("+"),
        "printed unit": row.compared.unit,
        "limit as printed": row.limit,
        "limit from": row.limit_source,
        "sums": row.group,
        "verdict": row.verdict,
        "verdict in words": row.verdict_text,
        "verdict elsewhere": row.elsewhere,
        "why": "; ".join((*row.reasons, *row.notes)),
        "hand check": row.hand_check,
    }
    cells = {head: for_csv(text) if head in TEXT else text for head, text in cells.items()}
    if row.value.text:
        cells[_value_head(row)] = row.value.text
    for what, figure in (("as drawn", row.drawn), ("by the table", row.table)):
        if figure.text:
            cells[f"{what} [{figure.unit}]"] = figure.text
    if row.amount.text:
        cells[AMOUNTS[row.amount.unit]] = row.amount.text
    return cells


def _value_head(row: Row) -> str:
    """Column of a value: by its letter, since U and C share units that F does not."""
    figure: Figure = row.value
    return _BY_UNIT.get(figure.unit, _NUMBER)
