"""A printed table in long form: every cell becomes a limit with its zone, row, metric, conditions.

The sheet gives the figures, ``tables`` in ``ruleset.yaml`` their meaning: what a row covers
(``rows``), what a head means (``head_levels`` or ``heads``), what a slash or a plus stands for,
what a footnote does. A cell with conditional footnotes becomes a limit for each case.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from itertools import pairwise
from typing import Any, NamedTuple

from envcheck.errors import Problem, one_of, problem
from envcheck.model.days import ordinal
from envcheck.model.ruleset import Condition, Limit, Note, Term
from envcheck.read.cells import Branch, Cell, CellError, known_cell
from envcheck.read.condition_text import period_of
from envcheck.read.footnotes import (
    MOST_READINGS,
    Footnote,
    Place,
    Reading,
    apply,
    join,
    read_footnote,
)
from envcheck.read.references import resolve
from envcheck.read.sheets import Row
from envcheck.read.spots import Spot, spot_of
from envcheck.read.table_entry import CellKey, Head, Table, at
from envcheck.read.table_meaning import (
    Cover,
    check_zones,
    conditions_of,
    covers_of,
    head_of,
    head_periods,
    row_pattern,
)

MOST_PROBLEMS = 200
"""Of one sheet; more are not looked for."""
_INFO = ("info", "define")


@dataclass(slots=True)
class Expansion:
    """A table being expanded: what is looked up once and used for many cells."""

    table: Table
    problems: list[Problem]
    heads: list[Head]
    spots: dict[str, list[Spot | None]] = field(default_factory=dict)
    """By row pattern, one for each head."""
    covers: dict[tuple[str, str], tuple[Cover, ...]] = field(default_factory=dict)
    footnotes: dict[str, Footnote | None] = field(default_factory=dict)
    plain: dict[tuple[str, ...], tuple[Note, ...]] = field(default_factory=dict)
    """Footnotes by marks, where they only are printed."""
    above: dict[int, tuple[str, str]] = field(default_factory=dict)
    first: int = 0
    id: str = ""


@dataclass(slots=True)
class Line:
    """A row being expanded."""

    row: Row
    pattern: str
    when: tuple[Condition, ...]
    triggers: dict[str, tuple[Term, str]] = field(default_factory=dict)
    """Head of a target -> its threshold, and how it is printed."""
    words: str = ""
    covers: dict[str, tuple[Cover, ...]] = field(default_factory=dict)


def expand(table: Table, problems: list[Problem]) -> dict[CellKey, tuple[Limit, ...]]:
    """Turn a table into limits, cell by cell; a cell marked unchanged is left out."""
    periods = head_periods(table, problems)
    found = (head_of(table, column, periods, problems) for column in table.sheet.columns)
    heads = [h for h in found if h is not None]
    check_zones(table, heads, problems)
    cells: dict[CellKey, tuple[Limit, ...]] = {}
    expansion = Expansion(table, problems, heads, first=table.sheet.columns[0].at, id=table.id)
    before = len(problems)
    seen: dict[tuple[str, tuple[tuple[str, str], ...]], int] = {}
    ends = _days(table)
    for row in table.sheet.rows:
        same = (row.key, row.when)
        if same in seen:
            fill = {"found": row.key, "where": f"line {seen[same]}"}
            problems.append(problem("repeated-row", table.sheet.file, row.line, **fill))
            continue
        seen[same] = row.line
        line = _line(expansion, row, ends)
        if line is not None:
            for key, limits in _row_limits(expansion, line):
                cells[key] = limits
        if len(problems) - before > MOST_PROBLEMS:
            break
    return cells


def _line(e: Expansion, row: Row, ends: Mapping[tuple[str, object], float]) -> Line | None:
    pattern = row_pattern(e.table, row, e.problems)
    when = None if pattern is None else conditions_of(e.table, row, pattern, e.problems)
    if pattern is None or when is None:
        return None
    if ends:
        when = tuple(_until(c, row, e.table, ends) for c in when)
    words = ",".join([f"{c.dimension}={c.text}" for c in when])
    return Line(row, pattern, when, words=words)


# ------------------------------------------------------------------------------- rows by date


def _days(table: Table) -> dict[tuple[str, object], float]:
    """By dimension and row, the day on which the next row of the same key begins."""
    dates = [d for d in table.sheet.when if table.dimensions[d].kind == "date"]
    ends: dict[tuple[str, object], float] = {}
    for d in dates:
        same: dict[object, list[tuple[str, Row]]] = {}
        for row in table.sheet.rows:
            typed = dict(row.when)
            if d in typed and not typed[d].startswith("["):
                rest = tuple(pair for pair in row.when if pair[0] != d)
                same.setdefault((row.key, rest), []).append((typed[d], row))
        for rows in same.values():
            rows.sort(key=lambda item: item[0])
            for (_, row), (following, _) in pairwise(rows):
                end = ordinal(following)
                if end is not None:  # no day is said where the row itself is read
                    ends[(d, (row.key, row.when))] = end
    return ends


def _until(
    c: Condition, row: Row, table: Table, ends: Mapping[tuple[str, object], float]
) -> Condition:
    end = ends.get((c.dimension, (row.key, row.when)))
    if end is None or c.low is None or c.low >= end:
        return c
    return period_of(c.dimension, c.low, end)


# ------------------------------------------------------------------------------------ one row


def _row_limits(e: Expansion, line: Line) -> Iterator[tuple[CellKey, tuple[Limit, ...]]]:
    table, row = e.table, line.row
    blank_is_fine = table.settings.get("blank") == "not_printed"
    spots = e.spots.get(line.pattern)
    if spots is None:
        found = [spot_of(table, row, h, line.pattern, e.problems) for h in e.heads]
        spots = e.spots[line.pattern] = found
    for head, spot in zip(e.heads, spots, strict=True):
        if head.trigger_of:
            _threshold(e, line, head, spot)
    plain = not (row.marks or line.triggers or table.inherited)
    left: tuple[str, str] = ("", "")
    for head, spot in zip(e.heads, spots, strict=True):
        if head.trigger_of:
            continue
        if spot is None:
            left = ("", "")
            continue
        place = head.column.at
        text = row.cells[place - e.first]
        if text in _MERGED:
            merged = left if text == "<" else e.above.get(place, ("", ""))
            if merged[1] != spot.metric:
                e.problems.append(at(table, row, head, "merged-across-quantities", text))
                continue
            text = merged[0]
        left = e.above[place] = (text, spot.metric)
        if not text and blank_is_fine:
            continue
        cell = spot.cells.get(text) or _cell(e, line, head, spot, text)
        if cell is None or cell.refers == "unchanged":
            continue
        key = (e.id, row.key, row.when, head.column.heads)
        if plain and spot.plain and not head.when and not head.marks and cell.plain:
            yield key, _plain(e, line, head, spot, cell)
        else:
            yield key, _limits(e, line, head, spot, cell)


_MERGED = ("<", "^")


def _plain(e: Expansion, line: Line, head: Head, spot: Spot, cell: Cell) -> tuple[Limit, ...]:
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


def _threshold(e: Expansion, line: Line, head: Head, spot: Spot | None) -> None:
    """Read the threshold of a row; its target stands in another column."""
    text = line.row.cells[head.column.at - e.first]
    cell = None if spot is None else _cell(e, line, head, spot, text)
    if cell is None or cell.branches[0].kind != "number":
        return
    line.triggers[head.trigger_of] = cell.branches[0].alternatives[0][0], cell.text


def _cell(e: Expansion, line: Line, head: Head, spot: Spot, text: str) -> Cell | None:
    """Read a cell that this row and column have not met yet."""
    try:
        cell = known_cell(text, spot.grammar)
    except CellError as error:
        p = at(e.table, line.row, head, error.kind, text, error.expected, error.fix)
        e.problems.append(p)
        return None
    if cell.refers == "unchanged" and not e.table.unchanged:
        e.problems.append(at(e.table, line.row, head, "unchanged-without-base", text))
        return None
    if spot.metric != "R_insulation" and not all(map(_has_own_number, cell.branches)):
        expected = f"one number of the row's own metric, {spot.metric}"
        e.problems.append(at(e.table, line.row, head, "cell-not-executed", text, expected))
        return None
    spot.cells[text] = cell
    return cell


def _has_own_number(branch: Branch) -> bool:
    """Whether a branch names no figure, or one of the row's own metric."""
    return branch.kind != "number" or any(
        len(alternative) == 1 and not alternative[0].metric for alternative in branch.alternatives
    )


# ----------------------------------------------------------------------------------- one cell


def _limits(e: Expansion, line: Line, head: Head, spot: Spot, cell: Cell) -> tuple[Limit, ...]:
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


def long_form(limit: Limit) -> Mapping[str, Any]:
    """One limit as a record of plain values, for tests, differences and CSV."""
    return {
        "id": limit.id,
        "clause": limit.clause,
        "zone": limit.zone,
        "categories": "|".join(limit.categories),
        "metric": limit.metric,
        "limit": limit.sense,
        "unit": limit.unit,
        "cell": limit.cell,
        "kind": limit.kind,
        "when": "; ".join(f"{c.dimension} {c.text}" for c in limit.when),
        "path": limit.path,
        "applies_to": limit.applies_to,
        "notes": " ".join(note.mark for note in limit.notes),
        "src": limit.src,
        "place": f"{limit.file}:{limit.line}",
    }
