"""The tables of a check: every line once, and the lines on which rule sets differ."""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.report import wording
from envcheck.report.header import RuleSetView
from envcheck.report.parts import Grid, Paragraph, Section
from envcheck.report.rows import Row

TONES = {"fail": "bad", "pass": "good", "no_requirement": "good"}


def section(rows: Sequence[Row], rules: RuleSetView, several: bool, bounds: bool) -> Section:
    """The table of one rule set; ``bounds`` adds those of the drawn model."""
    heading = f"Lines held against {rules.id}" if several else "Lines"
    heading += "" if rules.decides else " (information only)"
    if not rows:
        return Section(heading, (Paragraph(wording.NOTHING),))
    printed = rules.printed_units
    notes = (
        rules.units_note,
        f"compared figure, limit and room left as printed, in {printed}" if printed else "",
        "negative room: over the limit",
    )
    note = "; ".join(filter(None, notes))
    return Section(
        heading, (grid(rows, bool(printed), bounds), Paragraph(f"{note[0].upper()}{note[1:]}."))
    )


def grid(rows: Sequence[Row], apart: bool, bounds: bool) -> Grid:
    """The main table.

    ``apart`` adds the compared figure in the printed unit, ``bounds`` those of the drawn model.
    """
    columns: list[tuple[str, int, list[str]]] = [
        ("tag", 5, [row.tag for row in rows]),
        ("sheet", 6, [row.sheet for row in rows]),
        ("built as", 1, [row.built_as for row in rows]),
        ("value", 7, [_value(row) for row in rows]),
        ("limit", 3, [row.against or "-" for row in rows]),
        ("room left", 0, [row.room.text or "-" for row in rows]),
        ("verdict", 2, [row.verdict_text for row in rows]),
    ]
    if apart:
        columns.insert(4, ("as compared", 0, [row.compared.text or "-" for row in rows]))
    if bounds:
        columns.insert(4, ("bounds", 4, [between(row) or "-" for row in rows]))
    order = sorted((rank, place) for place, (_, rank, _) in enumerate(columns) if rank)
    figures = ("value", "bounds", "as compared", "limit", "room left")
    return Grid(
        heads=tuple(head for head, _, _ in columns),
        rows=tuple(zip(*(cells for _, _, cells in columns), strict=True)),
        right=tuple(n for n, (head, _, _) in enumerate(columns) if head in figures),
        wrap=tuple(place for _, place in order),
        tones=tuple(TONES.get(row.verdict, "open") for row in rows),
    )


def between(row: Row) -> str:
    """Bounds of the drawn model as one text; empty where there are none."""
    if row.low.text == row.high.text:
        return row.low.text
    return f"{row.low.text} to {row.high.text}"


def _value(row: Row) -> str:
    if row.verdict == "too_close" and row.low.text:
        return f"{row.symbol} {between(row)}"
    return f"{row.symbol} {row.value.text or '-'}"
