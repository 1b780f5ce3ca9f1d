"""A folder as typed: every sheet cell by cell with what it was read as, to lint and to print."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from pathlib import Path
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import InputError, Problem, problem
from envcheck.model.names import Names
from envcheck.model.ruleset import Limit
from envcheck.model.typed import Printed, Range, TypedCell, TypedSet, TypedTable, UnusedNote
from envcheck.read.cells import CellError, split_marks
from envcheck.read.locks import read_lock
from envcheck.read.materials import rows
from envcheck.read.rule_documents import MEANING, Document, read_document
from envcheck.read.rulesets import read_ruleset
from envcheck.read.sheets import Row
from envcheck.read.table_entry import CellKey, Table
from envcheck.read.table_meaning import row_pattern

Cells = Mapping[CellKey, tuple[Limit, ...]]
Seen = list[tuple[Table, dict[CellKey, tuple[Limit, ...]]]]


class TypedFolder(NamedTuple):
    """What became of one folder."""

    set: TypedSet | None
    """None where ``ruleset.yaml`` cannot be used at all."""
    problems: tuple[Problem, ...]


def folders_of(given: Sequence[str]) -> tuple[Path, ...]:
    """Folders of rule sets: those given, or for one that holds rule sets those within it.

    Errors: InputError for a folder that is and holds none.
    """
    found: list[Path] = []
    problems = []
    for folder in map(Path, given):
        inner = [folder] if (folder / MEANING).is_file() else _within(folder)
        found += inner
        if not inner:
            expected = f"a folder with {MEANING}, or one that holds such folders"
            fill = {"found": folder.as_posix(), "expected": expected}
            problems.append(problem("unknown-rule-set", folder.as_posix(), None, **fill))
    if problems:
        raise InputError(problems)
    return tuple(dict.fromkeys(found))


def _within(folder: Path) -> list[Path]:
    return sorted(path.parent for path in folder.glob(f"*/{MEANING}")) if folder.is_dir() else []


def read_typed(folder: Path, names: Names) -> TypedFolder:
    """Read a rule set with all that is wrong in it; what could be read is there all the same."""
    folder = folder if folder.name else folder.resolve()
    seen: Seen = []
    limits: tuple[Limit, ...] = ()
    found: tuple[Problem, ...] = ()
    try:
        ruleset = read_ruleset(
            folder.name, [folder.parent], None, names, (folder.as_posix(), None), typed=seen
        )
        limits = ruleset.limits
    except InputError as error:
        found = error.problems
    problems: list[Problem] = []
    document = read_document(folder, problems)
    if document is None:
        return TypedFolder(None, found or tuple(problems))
    lock = read_lock(folder, [])
    return TypedFolder(_typed_set(document, seen)._replace(lock=lock, limits=limits), found)


def _typed_set(document: Document, seen: Seen) -> TypedSet:
    own = [(table, cells) for table, cells in seen if table.document.id == document.id]
    other = own[0][0].other if own else document.data
    base: dict[CellKey, tuple[Limit, ...]] = {}
    for table, cells in seen:
        if table.document.id != document.id:
            base |= cells
    zones: Mapping[str, Any] = other.get("zones") or {}
    return TypedSet(
        document.id,
        str(document.get("document", "title") or ""),
        str(document.get("document", "edition") or ""),
        str(document.get("jurisdiction") or ""),
        document.name,
        tuple(map(str, zones.get("order") or ())),
        {str(k): tuple(map(str, v)) for k, v in (zones.get("members") or {}).items()},
        zones.get("order_is_coldness") != "no",
        tuple(_typed_table(table, cells, base) for table, cells in own),
        tuple(_unused(document, [table for table, _ in own])),
        frozenset(other.get("sources") or ()),
        document.get("overlay", "restates") == "yes",
        {
            str(k): (str(v), document.line("confirmed", k))
            for k, v in (document.get("confirmed") or {}).items()
        },
        None,
    )


# ----------------------------------------------------------------------------------- tables


def _typed_table(table: Table, cells: Cells, base: Cells) -> TypedTable:
    sheet, settings = table.sheet, table.settings
    used = _marks(table)
    heads = zip(*(column.heads for column in sheet.columns), strict=True)
    bottom = [f"{c.heads[-1]}{_shown(c.marks)}" for c in sheet.columns]
    return TypedTable(
        table.id,
        str(settings.get("clause", "")),
        sheet.file,
        settings.get("orientation", "zones_across") == "zones_across",
        (*list(heads)[:-1], tuple(bottom)),
        sheet.when,
        tuple(_typed_row(table, row, cells, base) for row in sheet.rows),
        tuple(f"{row.label}{_shown(row.marks)}" for row in sheet.rows),
        settings.get("status") == "guidance",
        tuple((m, str(n.get("text", n["effect"]))) for m, n in table.notes.items() if m in used),
        frozenset(table.notes),
    )


def _shown(marks: Iterable[str]) -> str:
    return "".join(f"[{mark}]" for mark in marks)


def _typed_row(table: Table, row: Row, cells: Cells, base: Cells) -> tuple[TypedCell, ...]:
    first = table.sheet.columns[0].at
    found = []
    plain = ""
    pattern = row_pattern(table, row, []) or ""
    for column in table.sheet.columns:
        key = (table.id, row.key, row.when, column.heads)
        limits = cells.get(key, ())
        text = row.cells[column.at - first]
        plain = plain if text == "<" else _without_marks(text)
        below = base.get(key, ()) if table.unchanged else ()
        zone = limits[0].zone if limits else _zone(table, row, column.heads)
        cell = TypedCell(
            table.id, row.key, row.label, row.when, column.heads,
            tuple(h for h in column.heads if h != zone), zone, text, table.sheet.file, row.line,
            row.src, _monotone(table, row, pattern, column.heads),
        )  # fmt: skip
        if limits:
            common = frozenset.intersection(*(frozenset(x.when) for x in limits))
            x = limits[0]
            reads = plain if text not in ("<", "^") else x.cell
            cell = cell._replace(
                categories=tuple(dict.fromkeys(c for x in limits for c in x.categories)),
                metric=x.metric, sense=x.sense, unit=x.unit, common=common,
                printed=_printed(limits, reads),
                threshold=x.threshold.number if x.threshold is not None else None,
                replaces=below[0].cell if below else "",
                replaced=_printed(below, below[0].cell) if below else (),
            )  # fmt: skip
        found.append(cell)
    return tuple(found)


def _without_marks(text: str) -> str:
    try:
        return " ".join(split_marks(text)[0].split())
    except CellError:
        return text


def _zone(table: Table, row: Row, heads: tuple[str, ...]) -> str:
    if table.settings.get("orientation") == "zones_down":
        return row.key
    return next((h for h in heads if h in table.zones), str(table.settings.get("zone", "*")))


def _printed(limits: Sequence[Limit], text: str) -> tuple[Printed, ...]:
    """Readings of the printed text itself, one for each side of a slash."""
    own = [x for x in limits if x.cell == text]
    plain = [x for x in own if not any(note.did for note in x.notes)]
    found = []
    for limit in plain or [x for x in own if x.kind == "number"]:
        sums = tuple(
            sum(term.number for term in alternative if not term.metric)
            for alternative in limit.alternatives
            if not all(term.metric for term in alternative)
        )
        roles = {t.role for a in limit.alternatives for t in a if t.number and not t.metric}
        found.append(Printed(limit.kind, sums, frozenset(roles)))
    return tuple(dict.fromkeys(found))


def _monotone(table: Table, row: Row, pattern: str, heads: tuple[str, ...]) -> bool:
    settings = table.settings
    by_row: Mapping[str, Any] = settings.get("rows") or {}
    by_head: list[Any] = [settings.get("heads"), *(settings.get("head_levels") or ())]
    said = [level.get(head) for level in by_head if isinstance(level, Mapping) for head in heads]
    stated = [settings, by_row.get(pattern), *said]
    if any(isinstance(s, Mapping) and s.get("monotone") == "none" for s in stated):
        return False
    return row.key not in (settings.get("monotone_exceptions") or ())


# -------------------------------------------------------------------------------- footnotes


def _marks(table: Table) -> set[str]:
    """Every footnote mark that stands in a sheet or that its heads and rows inherit."""
    sheet = table.sheet
    used = {mark for marks in table.inherited.values() for mark in marks}
    used |= {mark for column in sheet.columns for mark in column.marks}
    for row in sheet.rows:
        used |= set(row.marks)
        for cell in row.cells:
            if "[" in cell:
                try:
                    used |= set(split_marks(cell)[1])
                except CellError:
                    continue
    return used


def _unused(document: Document, tables: Sequence[Table]) -> Iterable[UnusedNote]:
    used = {table.id: _marks(table) for table in tables}
    anywhere = set().union(*used.values())
    for owner, notes in (document.get("notes") or {}).items():
        if owner != "*" and owner not in used:
            continue  # of a sheet that could not be read
        for mark in notes:
            if mark not in (anywhere if owner == "*" else used[owner]):
                yield UnusedNote(owner, mark, document.line("notes", owner, mark))


# ----------------------------------------------------------------------------------- ranges


def plausible_ranges() -> tuple[Range, ...]:
    """Plausible figures by metric, category and unit (``data/plausible_ranges.csv``)."""
    return tuple(
        Range(
            row["metric"], row["category"],
            units.label(row["quantity"], row["system"]) if row["quantity"] else "",
            float(row["low"]), float(row["high"]), row["source"],
        )
        for row in rows("plausible_ranges").values()
    )  # fmt: skip
