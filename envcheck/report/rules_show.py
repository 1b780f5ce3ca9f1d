"""The pages of ``envcheck rules show``: sheets in printed layout, one zone, the long form."""

from __future__ import annotations

from collections.abc import Iterable, Mapping

from envcheck.model.metrics import METRICS
from envcheck.model.ruleset import Limit
from envcheck.model.typed import TypedCell, TypedSet, TypedTable
from envcheck.report.answer import Answer
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Pair, Paragraph, Section
from envcheck.report.wording import plain

BLANK = "." * 30
"""To be filled in by hand."""
CELLS = ("table", "row", "label", "when", "heads", "cell", "src", "place")
ABREAST = 6
"""Printed columns side by side on one page; more go below."""
HEADS = (
    "id", "document", "edition", "clause", "zone", "element", "row", "label", "metric", "limit",
    "unit", "cell", "kind", "alternatives", "when", "notes", "applies_to", "path", "src", "place",
)  # fmt: skip


def sheets(typed: TypedSet) -> Answer:
    """Every sheet as it is printed, with room for two readers' initials."""
    page = Page(_title(typed), (_head(typed), *(_sheet(table) for table in typed.tables)))
    data: dict[str, object] = {
        **_about(typed),
        "tables": [_table_data(table) for table in typed.tables],
    }
    cells = (cell for table in typed.tables for row in table.rows for cell in row)
    return Answer(page, data, Grid(CELLS, tuple(map(_cell_row, cells))))


def _cell_row(cell: TypedCell) -> tuple[str, ...]:
    when = "; ".join(f"{name} {text}" for name, text in cell.when)
    heads, place = " / ".join(cell.heads), f"{cell.file}:{cell.line}"
    return tuple(
        map(clean, (cell.table, cell.row, cell.label, when, heads, cell.text, cell.src, place))
    )


def _title(typed: TypedSet) -> str:
    edition = f", {typed.edition}" if typed.edition else ""
    return clean(f"{typed.title or typed.id}{edition}")


def _about(typed: TypedSet) -> dict[str, object]:
    lock = str(typed.lock) if typed.lock is not None else None
    about = {"ruleset": typed.id, "document": typed.title, "edition": typed.edition}
    return {**about, "jurisdiction": typed.jurisdiction, "lock": lock}


def _head(typed: TypedSet) -> Section:
    pairs = (
        ("rule set", typed.id),
        ("jurisdiction", typed.jurisdiction),
        ("edition", typed.edition),
        ("zones, warm to cold" if typed.coldness else "zones", ", ".join(typed.zones)),
        ("lock", str(typed.lock) if typed.lock is not None else "none"),
        ("typed by", BLANK),
        ("compared by, on", BLANK),
    )
    words = (
        "Compare every cell with the printed page and initial each row. < same as left, ^ same as "
        "above, . unchanged, NR no requirement, - no such case."
    )
    kept = tuple(Pair(label, clean(text)) for label, text in pairs if text)
    return Section("", (Facts(kept), Paragraph(words)))


def _sheet(table: TypedTable) -> Section:
    blocks: list[Block] = [
        _part(table, range(start, min(start + ABREAST, len(table.head_rows[-1]))))
        for start in range(0, len(table.head_rows[-1]), ABREAST)
    ]
    if table.notes:
        blocks.append(Items(tuple(Entry(clean(f"[{mark}] {text}")) for mark, text in table.notes)))
    blocks.append(Facts((Pair("checked by, on", BLANK),)))
    guidance = " (guidance, not judged)" if table.guidance else ""
    return Section(clean(f"{table.clause}{guidance}: {table.file}"), tuple(blocks))


def _part(table: TypedTable, columns: range) -> Grid:
    """Some columns of a sheet beside its labels, as many as a page takes abreast."""
    stacks = list(zip(*table.head_rows, strict=True))
    heads = [" / ".join(dict.fromkeys(stacks[c])) for c in columns]
    names = ("label", *(f"when {d}" for d in table.dimensions), *heads, "src", "initials")
    rows = []
    for label, row in zip(table.labels, table.rows, strict=True):
        typed = dict(row[0].when)
        conditions = [typed.get(d, "") for d in table.dimensions]
        texts = (row[c].text for c in columns)
        rows.append(tuple(map(clean, (label, *conditions, *texts, row[0].src, "......"))))
    middle = range(1, len(names) - 2)
    return Grid(tuple(map(clean, names)), tuple(rows), (), (*middle, 0))


def _table_data(table: TypedTable) -> dict[str, object]:
    rows = [
        {
            "row": row[0].row,
            "label": label,
            "line": row[0].line,
            "when": dict(row[0].when),
            "cells": [cell.text for cell in row],
            "src": row[0].src,
        }
        for label, row in zip(table.labels, table.rows, strict=True)
    ]
    about = {"id": table.id, "clause": table.clause, "file": table.file}
    return {**about, "heads": [list(r) for r in table.head_rows], "rows": rows}


# ---------------------------------------------------------------------------------- one zone


def zone(typed: TypedSet, name: str) -> Answer:
    """All limits that hold in one zone; a member zone is found under its printed one."""
    wanted = {name, "*", *(printed for printed, of in typed.members.items() if name in of)}
    own = [x for x in typed.limits if x.zone in wanted]
    heads = ("element", "limit", "when", "path", "clause")
    grid = Grid(heads, tuple(map(_zone_row, own)), (), (0, 2, 1))
    zones = ", ".join(dict.fromkeys(x.zone for x in own if x.zone != "*"))
    printed = f" (printed as {zones})" if zones and zones != name else ""
    marks = {n.mark: n.text for x in own for n in x.notes}
    notes = Items(tuple(Entry(clean(f"[{m}] {t}")) for m, t in marks.items()))
    sections = [Section("", (grid,))]
    if marks:
        sections.append(Section("Footnotes", (notes,)))
    page = Page(clean(f"{_title(typed)}: zone {name}{printed}"), tuple(sections))
    records = [record(x, typed) for x in own]
    return Answer(page, {**_about(typed), "zone": name, "limits": records}, _long_grid(records))


def _zone_row(x: Limit) -> tuple[str, ...]:
    when = "; ".join(f"{plain(c.dimension)} {plain(c.text)}" for c in x.when)
    marks = "".join(f"[{n.mark}]" for n in x.notes)
    words = METRICS[x.metric].words
    if x.kind == "number":
        sign = "at most" if x.sense == "max" else "at least"
        said = f"{words} {sign} {x.cell}{marks} {x.unit}"
    else:
        said = f"{words}: {x.cell}{marks} ({plain(x.kind)})"
    return tuple(map(clean, (x.label, said, when, x.path, x.clause)))


# --------------------------------------------------------------------------------- long form


def long(typed: TypedSet) -> Answer:
    """Every cell as a record."""
    records = [record(x, typed) for x in typed.limits]
    page = Page(_title(typed), (Section("", (Paragraph(f"{len(records)} limits"),)),))
    return Answer(page, {**_about(typed), "limits": records}, _long_grid(records))


def _long_grid(records: Iterable[Mapping[str, object]]) -> Grid:
    return Grid(HEADS, tuple(tuple(clean(str(r[head])) for head in HEADS) for r in records))


def record(x: Limit, typed: TypedSet) -> dict[str, object]:
    """One limit in long form, plain values only."""
    return {
        "id": x.id,
        "document": typed.title,
        "edition": typed.edition,
        "clause": x.clause,
        "zone": x.zone,
        "element": "|".join(x.categories),
        "row": x.row,
        "label": x.label,
        "metric": x.metric,
        "limit": x.sense,
        "unit": x.unit,
        "cell": x.cell,
        "kind": x.kind,
        "alternatives": " or ".join(_sum(a) for a in x.alternatives),
        "when": "; ".join(f"{c.dimension} {c.text}" for c in x.when),
        "notes": " ".join(n.mark for n in x.notes),
        "applies_to": x.applies_to,
        "path": x.path,
        "src": x.src,
        "place": f"{x.file}:{x.line}",
    }


def _sum(alternative: Iterable[object]) -> str:
    return " + ".join(_term(term) for term in alternative)


def _term(term: object) -> str:
    text, role = getattr(term, "text", ""), getattr(term, "role", "")
    metric = getattr(term, "metric", "")
    return " ".join(filter(None, (metric, text, role)))
