"""The tables of a chain of documents: the base's cells with those of the amendments folded over."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any, NamedTuple

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.ruleset import Dimension, Limit
from envcheck.read.coverage import check_coverage
from envcheck.read.rule_documents import Document
from envcheck.read.rule_tables import expand
from envcheck.read.sheets import Sheet, is_plain, read_sheet
from envcheck.read.table_entry import CellKey, Table
from envcheck.read.weights import weights_of

HEAD_ROWS = ("1", "2", "3")
Marks = dict[str, dict[tuple[str, ...], tuple[str, ...]]]
"""Table id -> heads, or (row key,) -> their footnote marks."""


class Setting(NamedTuple):
    """What all tables of a chain share."""

    zones: tuple[str, ...]
    dimensions: Mapping[str, Dimension]
    units: Mapping[str, Mapping[str, str]]
    """Document id -> its units."""
    categories: tuple[str, ...]
    paths: Mapping[str, str]
    """Table id -> path, where ``paths`` names tables."""
    typed: list[tuple[Table, dict[CellKey, tuple[Limit, ...]]]] | None = None
    """Where asked for, every table as it is read, for those who check the typing."""


class _Fold:
    """What is known of the documents below the one being read."""

    def __init__(self) -> None:
        self.cells: dict[CellKey, tuple[Limit, ...]] = {}
        self.settings: dict[str, Mapping[str, Any]] = {}
        self.marks: Marks = {}


def fold(
    chain: Sequence[Document],
    in_force: Sequence[bool],
    setting: Setting,
    problems: list[Problem],
) -> dict[CellKey, tuple[Limit, ...]]:
    """Cells of the base with those of the amendments in force put in their place."""
    below = _Fold()
    for document, holds in zip(chain, in_force, strict=True):
        base = document is chain[0]
        whole = not base and document.get("overlay", "replaces") == "table"
        found: dict[CellKey, tuple[Limit, ...]] = {}
        own, marks = dict(below.settings), dict(below.marks)
        for i, entry in enumerate(document.get("tables") or ()):
            amends = not base and not whole
            settings = _table_settings(document, i, entry, own, amends, whole, problems)
            if settings is not None:
                inherited = below.marks.get(str(settings["id"]), {}) if amends else {}
                cells, printed = _read_table(
                    document, i, settings, chain, setting, amends, inherited, problems
                )
                found |= cells
                own[str(settings["id"])] = settings
                marks[str(settings["id"])] = {**inherited, **printed}
        if whole:
            found = _in_place_of(document, found, below.cells, holds, problems)
        elif not base:
            _check_amended(document, found, below.cells, problems)
            found = {
                key: tuple(_replacing(limit, below.cells[key]) for limit in limits)
                for key, limits in found.items()
                if key in below.cells
            }
        if holds or base:
            below.cells |= found
            below.settings, below.marks = own, marks
    return below.cells


def _in_place_of(
    document: Document,
    found: Mapping[CellKey, tuple[Limit, ...]],
    cells: dict[CellKey, tuple[Limit, ...]],
    holds: bool,
    problems: list[Problem],
) -> dict[CellKey, tuple[Limit, ...]]:
    """Take whole tables of the base out; their successors say what they stand for."""
    stated: Mapping[str, Any] = document.get("overlay", "table_map") or {}
    known = {key[0] for key in cells}
    replaced: dict[str, str] = {}
    for i, entry in enumerate(document.get("tables") or ()):
        name = str(stated.get(str(entry["id"]), entry["id"]))
        if name not in known and str(entry["id"]) in {key[0] for key in found}:
            if str(entry["id"]) in stated or not stated:
                fill = {"found": name, "expected": one_of(sorted(known))}
                line = document.line("tables", i, "id")
                fix = did_you_mean(name, known) or "say under `overlay: {table_map: {own: base}}`"
                p = problem("unknown-base-table", document.name, line, fix=fix, **fill)
                problems.append(p)
            continue
        replaced[str(entry["id"])] = name
    of = {
        name: next(limits[0] for key, limits in cells.items() if key[0] == name and limits)
        for name in set(replaced.values())
        if any(key[0] == name and limits for key, limits in cells.items())
    }
    if holds:
        gone = set(replaced.values())
        for key in [key for key in cells if key[0] in gone]:
            del cells[key]
    made = {}
    for key, limits in found.items():
        base = of.get(replaced.get(key[0], ""))
        words = f"the whole of {base.clause} ({base.ruleset})" if base is not None else ""
        made[key] = tuple(limit._replace(replaced=words) for limit in limits)
    return made


def _table_settings(
    document: Document,
    i: int,
    entry: Mapping[str, Any],
    known: Mapping[str, Mapping[str, Any]],
    amends: bool,
    whole: bool,
    problems: list[Problem],
) -> dict[str, Any] | None:
    """Settings of a table over those of the table that it is like, or that it amends."""
    like = entry.get("like") or (entry["id"] if amends else None)
    key = "like" if entry.get("like") else "id"
    line = document.line("tables", i, key)
    if like is not None and like not in known:
        kind = "unknown-base-table" if amends else "unknown-like"
        fix = did_you_mean(like, known)
        fill = {"found": like, "expected": one_of(known), "fix": fix}
        problems.append(problem(kind, document.name, line, **fill))
        return None
    if not amends and not whole and entry["id"] in known:
        problems.append(problem("repeated-table", document.name, line, found=entry["id"]))
        return None
    settings = {**(known[like] if like is not None else {}), **entry}
    settings.pop("like", None)
    return settings


def _read_table(
    document: Document,
    i: int,
    settings: Mapping[str, Any],
    chain: Sequence[Document],
    setting: Setting,
    amends: bool,
    inherited: Mapping[tuple[str, ...], tuple[str, ...]],
    problems: list[Problem],
) -> tuple[dict[CellKey, tuple[Limit, ...]], dict[tuple[str, ...], tuple[str, ...]]]:
    """Read one sheet and expand it; guidance is read for its mistakes and left out."""
    other, notes = _surroundings(document, chain, str(settings["id"]))
    sheet = _sheet(document, i, settings, str(other.get("separator", ",")), problems)
    if sheet is None or not _known_conditions(sheet, setting, problems):
        return {}, {}
    table = Table(
        document, ("tables", i), settings, sheet, setting.dimensions, setting.zones,
        setting.units[document.id], notes, other, setting.categories,
        setting.paths.get(str(settings["id"]), ""), amends, inherited,
    )  # fmt: skip
    table = table._replace(weights=weights_of(table, problems))
    cells = expand(table, problems)
    check_coverage(table, cells, problems)
    if setting.typed is not None:
        setting.typed.append((table, cells))
    printed = {column.heads: column.marks for column in sheet.columns if column.marks}
    printed |= {(row.key,): row.marks for row in sheet.rows if row.marks}
    return {} if settings.get("status") == "guidance" else cells, printed


def _known_conditions(sheet: Sheet, setting: Setting, problems: list[Problem]) -> bool:
    """Whether every ``when:`` column names a declared dimension."""
    unknown = [d for d in sheet.when if d not in setting.dimensions]
    for dimension in unknown:
        fix = did_you_mean(dimension, setting.dimensions)
        fix = fix or f"declare {dimension!r} under `dimensions:`"
        fill = {"found": dimension, "fix": fix}
        problems.append(problem("undeclared-condition", sheet.file, 1, **fill))
    return not unknown


def _surroundings(
    document: Document, chain: Sequence[Document], table: str
) -> tuple[dict[str, Any], dict[str, Any]]:
    """Give settings of the whole rule set and footnotes of a table, those of the base below."""
    other: dict[str, Any] = {}
    notes: dict[str, Any] = {}
    for d in chain[: list(chain).index(document) + 1]:
        other |= d.data
        by_table: Mapping[str, Any] = d.get("notes") or {}
        notes |= {**(by_table.get("*") or {}), **(by_table.get(table) or {})}
    return other, notes


def _sheet(
    document: Document,
    i: int,
    settings: Mapping[str, Any],
    separator: str,
    problems: list[Problem],
) -> Sheet | None:
    file, rows = str(settings["file"]), str(settings.get("header_rows", "1"))
    if not is_plain(file):
        line = document.line("tables", i, "file")
        problems.append(problem("sheet-outside", document.name, line, found=file))
        return None
    if rows not in HEAD_ROWS:
        line = document.line("tables", i, "header_rows")
        fill = {"found": rows, "expected": "1, 2 or 3 rows of heads"}
        problems.append(problem("unreadable-figure", document.name, line, **fill))
        return None
    path = document.folder / file
    return read_sheet(path, document.shown(file), separator, int(rows), problems)


def _replacing(limit: Limit, base: tuple[Limit, ...]) -> Limit:
    if not base:
        return limit
    return limit._replace(replaced=f"{base[0].cell} ({base[0].ruleset}, {base[0].clause})")


def _check_amended(
    document: Document,
    found: Mapping[CellKey, tuple[Limit, ...]],
    base: Mapping[CellKey, tuple[Limit, ...]],
    problems: list[Problem],
) -> None:
    """Each cell of an amendment stands where the base has one."""
    rows = {key[:3] for key in base}
    columns = {(key[0], key[3]) for key in base}
    for key, limits in found.items():
        if key in base or not limits:
            continue
        limit = limits[0]
        file = document.shown(limit.file.partition("/")[2])
        if key[:3] not in rows:
            known = sorted(_row_words(r[1], r[2]) for r in rows if r[0] == key[0])
            name = _row_words(limit.row, key[2])
            same = [k for k in known if k.partition(" ")[0] == limit.row]
            fix = did_you_mean(name, same or known)
            fill = {"found": name, "expected": one_of(same or known), "fix": fix}
            problems.append(problem("no-base-row", file, limit.line, **fill))
        else:
            known = sorted(" / ".join(h) for t, h in columns if t == key[0])
            name = " / ".join(key[3])
            fix = did_you_mean(name, known)
            fill = {"found": name, "expected": one_of(known), "fix": fix}
            problems.append(problem("no-base-cell", file, limit.line, **fill))


def _row_words(key: str, when: tuple[tuple[str, str], ...]) -> str:
    """A row in words: its key and what its conditions say."""
    conditions = ", ".join(f"{dimension} {text}" for dimension, text in when)
    return f"{key} ({conditions})" if conditions else key
