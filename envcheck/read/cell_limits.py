"""One cell as limits: a reading for each case that slash, footnotes and references make."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.errors import one_of
from envcheck.model.ruleset import Condition, Limit, Note
from envcheck.read.cells import Cell
from envcheck.read.expansion import Expansion, Line
from envcheck.read.footnote_effects import apply
from envcheck.read.footnotes import (
    MOST_READINGS,
    Footnote,
    Place,
    Reading,
    join,
    read_footnote,
)
from envcheck.read.references import resolve
from envcheck.read.spots import Spot
from envcheck.read.table_entry import Head, at
from envcheck.read.table_meaning import Cover, covers_of

_INFO = ("info", "define")


def plain_limits(e: Expansion, line: Line, head: Head, spot: Spot, cell: Cell) -> tuple[Limit, ...]:
    """Most cells: one reading, no footnotes, no conditions but the row's."""
    row, branch = line.row, cell.branches[0]
    zone = row.key if spot.zones_down else head.zone
    name = f"{spot.prefix}{zone}/{row.key}/{spot.metric}"
    if line.words:
        name = f"{name}[{line.words}]"
    return tuple(
        [
            Limit(
                name, spot.ruleset, e.id, spot.clause, zone, row.key, row.label, categories,
                spot.metric, spot.sense, spot.unit, cell.text, branch.kind, branch.alternatives,
                when, spot.path, spot.applies_to, (), row.src, spot.file, row.line,
            )
            for categories, when in _covers(e, line, spot)
        ]
    )  # fmt: skip


def _covers(e: Expansion, line: Line, spot: Spot) -> tuple[Cover, ...]:
    """Categories that the row covers, with its conditions and those of their names."""
    known = line.covers.get(spot.element_key)
    if known is not None:
        return known
    key = (line.row.key, spot.element_key)
    covers = e.covers.get(key)
    if covers is None:
        covers = covers_of(e.table, line.row, spot.element, e.problems) or ()
        e.covers[key] = covers
    own = tuple(
        Cover(cover.categories, joined)
        for cover in covers
        if (joined := join(line.when, cover.when) if cover.when else line.when) is not None
    )
    line.covers[spot.element_key] = own
    return own


def limits_of(e: Expansion, line: Line, head: Head, spot: Spot, cell: Cell) -> tuple[Limit, ...]:
    """The limits of a cell: one, or one for each case that footnotes, slash or names make."""
    zone = line.row.key if spot.zones_down else head.zone
    found: tuple[Limit, ...] = ()
    for categories, when in _covers(e, line, spot):
        joined = join(when, head.when) if head.when else when
        if joined is not None:
            found += _covered(e, Case(line, head, spot, cell, zone, categories, joined))
    return found


class Case(NamedTuple):
    """A cell for one set of categories."""

    line: Line
    head: Head
    spot: Spot
    cell: Cell
    zone: str
    categories: tuple[str, ...]
    when: tuple[Condition, ...]


def _covered(e: Expansion, case: Case) -> tuple[Limit, ...]:
    spot, cell, row = case.spot, case.cell, case.line.row
    marks = (*cell.marks, *row.marks, *e.table.inherited.get((row.key,), ()), *case.head.marks)
    if cell.refers:
        return _referred(e, case, marks)
    notes = e.plain.get(marks)
    if notes is None and not _all_printed(e, marks):
        return _by_footnotes(e, case, marks)
    if notes is None:
        notes = e.plain[marks] = _notes(e, case, marks)
    if len(cell.branches) == 1:
        branch = cell.branches[0]
        reading = Reading(
            cell.text, branch.kind, branch.alternatives, case.when, notes, spot.metric, spot.sense,
            spot.unit,
        )  # fmt: skip
        return (_limit(e, case, reading),)
    return tuple(_limit(e, case, r) for r in _branches(case, notes))


def _branches(case: Case, notes: tuple[Note, ...]) -> list[Reading]:
    spot, cell = case.spot, case.cell
    extra: tuple[tuple[Condition, ...], ...] = ((),) if len(cell.branches) == 1 else spot.slash
    return [
        Reading(
            cell.text, branch.kind, branch.alternatives, joined, notes, spot.metric, spot.sense,
            spot.unit,
        )
        for branch, conditions in zip(cell.branches, extra, strict=True)
        if (joined := join(case.when, conditions)) is not None
    ]  # fmt: skip


def _footnote(e: Expansion, case: Case, mark: str) -> Footnote | None:
    if mark not in e.footnotes:
        e.footnotes[mark] = read_footnote(e.table, mark, e.problems)
    found = e.footnotes[mark]
    if found is None:
        fix = f"add {mark!r} under `notes: {{{e.table.id}: ...}}`"
        known, row, head = one_of(e.table.notes), case.line.row, case.head
        e.problems.append(at(e.table, row, head, "undefined-footnote", f"[{mark}]", known, fix))
    return found


def _all_printed(e: Expansion, marks: tuple[str, ...]) -> bool:
    """Whether no footnote does more than to be printed."""
    stated = [e.table.notes.get(mark) for mark in marks]
    return all(
        s is None
        or (s["effect"] in _INFO and not s.keys() & {"element", "zones", "metric", "when"})
        for s in stated
    )


def _notes(e: Expansion, case: Case, marks: tuple[str, ...]) -> tuple[Note, ...]:
    notes = []
    for mark in dict.fromkeys(marks):
        footnote = _footnote(e, case, mark)
        if footnote is not None:
            official = footnote.stated.get("check") == "reviewer"
            effect = str(footnote.stated["effect"])
            notes.append(Note(mark, effect, footnote.text, official))
    return tuple(notes)


def _by_footnotes(e: Expansion, case: Case, marks: tuple[str, ...]) -> tuple[Limit, ...]:
    """Do the footnotes one after another; each may split the readings."""
    row, head, cell = case.line.row, case.head, case.cell
    where = f"row {row.key!r}, column {head.column.name!r}"
    place = Place(case.zone, case.categories, cell.text, case.spot.grammar, where, row.line)
    readings = _branches(case, ())
    for mark in dict.fromkeys(marks):
        footnote = _footnote(e, case, mark)
        if footnote is None:
            continue
        readings = apply(footnote, readings, place, e.table, e.problems)
        if len(readings) > MOST_READINGS:
            p = at(e.table, row, head, "footnotes-multiply", f"{len(readings)} cases")
            e.problems.append(p)
            return ()
    return tuple(_limit(e, case, r) for r in readings)


def _referred(e: Expansion, case: Case, marks: tuple[str, ...]) -> tuple[Limit, ...]:
    """A cell that names another row: its figure, or one for each row that may be meant."""
    notes = _notes(e, case, marks)
    readings = resolve(
        e.table, case.line.row, case.head, case.spot, case.cell, case.when, e.problems
    )
    return tuple(_limit(e, case, r._replace(notes=(*notes, *r.notes))) for r in readings)


def _limit(e: Expansion, case: Case, r: Reading) -> Limit:
    table, line, spot = e.table, case.line, case.spot
    row, words = line.row, line.words
    if r.when is not line.when:
        words = ",".join([f"{c.dimension}={c.text}" for c in r.when])
    name = f"{spot.prefix}{case.zone}/{row.key}/{r.metric}"
    limit = Limit(
        f"{name}[{words}]" if words else name,
        spot.ruleset, table.id, spot.clause, case.zone, row.key, row.label, case.categories,
        r.metric, r.sense, r.unit, r.cell, r.kind, r.alternatives, r.when, spot.path,
        spot.applies_to, r.notes, row.src, spot.file, row.line,
    )  # fmt: skip
    if not (line.triggers or spot.special):
        return limit
    threshold, printed = line.triggers.get(case.head.column.heads[-1], (None, ""))
    return limit._replace(
        threshold=threshold,
        threshold_cell=printed,
        weights=table.weights,
        otherwise=row.key == table.settings.get("otherwise_row"),
        depth_to=spot.depth_to,
    )
