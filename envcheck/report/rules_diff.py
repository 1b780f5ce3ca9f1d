"""The page of ``envcheck rules diff``."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence

from envcheck.model.editions import CellChange
from envcheck.model.ruleset import RuleSet
from envcheck.report.answer import Answer
from envcheck.report.inert import clean
from envcheck.report.parts import Facts, Grid, Page, Pair, Paragraph, Section
from envcheck.report.wording import plain

HEADS = (
    "change", "zone", "row", "label", "element", "metric", "path", "when", "old", "new", "unit",
    "factor", "direction", "old_place", "new_place",
)  # fmt: skip


def build(first: RuleSet, second: RuleSet, changes: Sequence[CellChange]) -> Answer:
    """Page and data of the differences between two rule sets."""
    kinds = Counter(change.kind for change in changes)
    ways = Counter(change.direction for change in changes if change.direction)
    counted = ", ".join(f"{kinds[k]} {k}" for k in ("added", "removed", "changed"))
    told = ", ".join(f"{number} {way}" for way, number in ways.items())
    pairs = (
        Pair("from", _document(first)),
        Pair("to", _document(second)),
        Pair("cells", f"{len(first.limits)} and {len(second.limits)} limits; {counted}"),
        Pair("of the changed", told or "none"),
    )
    rows = tuple(_row(change) for change in changes)
    heads = ("change", "zone", "row", "metric", "when", "old", "new", "factor", "direction")
    body = Grid(heads, rows, (7,), (2, 4, 5, 6, 3)) if rows else Paragraph("No cell differs.")
    title = clean(f"{first.id} and {second.id}, cell by cell")
    page = Page(title, (Section("", (Facts(pairs),)), Section("Cells", (body,))))
    records = [record(change) for change in changes]
    table = Grid(HEADS, tuple(tuple(_text(r[head]) for head in HEADS) for r in records))
    return Answer(page, {"from": first.id, "to": second.id, "changes": records}, table)


def _text(value: object) -> str:
    return clean("" if value is None else str(value))


def _document(ruleset: RuleSet) -> str:
    edition = ruleset.chain[-1].edition
    return clean(f"{ruleset.id}: {ruleset.title}" + (f", {edition}" if edition else ""))


def _row(change: CellChange) -> tuple[str, ...]:
    told, x = record(change), change.limit
    names = ("change", "zone", "row", "metric", "when", "old", "new", "factor", "direction")
    row = told["row"] if x.row != x.zone else ", ".join(x.categories)
    cells = {**told, "row": row, "metric": plain(x.metric), "factor": _factor(change)}
    return tuple(clean(str(cells[name] or "")) for name in names)


def _factor(change: CellChange) -> str:
    return f"{change.factor:.3f}" if change.factor is not None else ""


def record(change: CellChange) -> dict[str, object]:
    """One difference as plain values."""
    x, old, new = change.limit, change.old, change.new
    return {
        "change": change.kind,
        "zone": x.zone,
        "row": x.row,
        "label": x.label,
        "element": "|".join(x.categories),
        "metric": x.metric,
        "path": x.path,
        "when": "; ".join(f"{c.dimension} {c.text}" for c in x.when),
        "old": old.cell if old is not None else None,
        "new": new.cell if new is not None else None,
        "unit": x.unit,
        "factor": None if change.factor is None else float(f"{change.factor:.6g}"),
        "direction": change.direction or None,
        "old_place": f"{old.file}:{old.line}" if old is not None else None,
        "new_place": f"{new.file}:{new.line}" if new is not None else None,
    }
