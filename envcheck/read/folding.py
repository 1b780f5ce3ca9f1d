"""The tables of a chain of documents: the base's cells with those of the amendments folded over."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any, NamedTuple

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.ruleset import Dimension, Limit
from envcheck.read.rule_documents import Document
from envcheck.read.rule_tables import expand
from envcheck.read.sheets import Sheet, is_plain, read_sheet
from envcheck.read.table_entry import CellKey, Table

LATER_TABLE_KEYS = {
    "in_force": "columns by date",
    "weights": "weights in a mean",
    "otherwise_row": "a row for all other cases",
}
HEAD_ROWS = ("1", "2", "3")
LATER_SCOPES = ("any_point", "whole_envelope", "by_head")


class Setting(NamedTuple):
    """What all tables of a chain share."""

    zones: tuple[str, ...]
    dimensions: Mapping[str, Dimension]
    units: Mapping[str, str]
    categories: tuple[str, ...]
    paths: Mapping[str, str]
    """Table id -> path, where ``paths`` names tables."""


def fold(
    chain: Sequence[Document],
    in_force: Sequence[bool],
    setting: Setting,
    problems: list[Problem],
) -> dict[CellKey, tuple[Limit, ...]]:
    """Cells of the base with those of the amendments in force put in their place."""
    cells: dict[CellKey, tuple[Limit, ...]] = {}
    known: dict[str, Mapping[str, Any]] = {}
    for document, holds in zip(chain, in_force, strict=True):
        amends = document is not chain[0]
        if amends and document.get("overlay", "replaces") != "cells":
            line = document.line("overlay", "replaces")
            fill = {"found": "table", "what": "an amendment that replaces whole tables"}
            problems.append(problem("not-executed", document.name, line, **fill))
            continue
        found: dict[CellKey, tuple[Limit, ...]] = {}
        own = known
        for i, entry in enumerate(document.get("tables") or ()):
            settings = _table_settings(document, i, entry, own, amends, problems)
            if settings is not None:
                found |= _read_table(document, i, settings, chain, setting, amends, problems)
                own = {**own, str(settings["id"]): settings}
        if amends:
            _check_amended(document, found, cells, problems)
            found = {
                key: tuple(_replacing(limit, cells[key]) for limit in limits)
                for key, limits in found.items()
                if key in cells
            }
        if holds or not amends:
            cells |= found
            known = own
    return cells


def _table_settings(
    document: Document,
    i: int,
    entry: Mapping[str, Any],
    known: Mapping[str, Mapping[str, Any]],
    amends: bool,
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
    if not amends and entry["id"] in known:
        problems.append(problem("repeated-table", document.name, line, found=entry["id"]))
        return None
    settings = {**(known[like] if like is not None else {}), **entry}
    later = [k for k in LATER_TABLE_KEYS if settings.get(k)]
    if settings.get("applies_to") in LATER_SCOPES:
        later.append("applies_to")
    for name in later:
        what = LATER_TABLE_KEYS.get(name, f"a limit that applies to {settings['applies_to']}")
        fill = {"found": name, "what": what}
        problems.append(problem("not-executed", document.name, line, **fill))
    return None if later else settings


def _read_table(
    document: Document,
    i: int,
    settings: Mapping[str, Any],
    chain: Sequence[Document],
    setting: Setting,
    amends: bool,
    problems: list[Problem],
) -> dict[CellKey, tuple[Limit, ...]]:
    """Read one sheet and expand it; guidance is read for its mistakes and left out."""
    other, notes = _surroundings(document, chain, str(settings["id"]))
    sheet = _sheet(document, i, settings, str(other.get("separator", ",")), problems)
    if sheet is None:
        return {}
    for dimension in sheet.when:
        if dimension not in setting.dimensions:
            fix = did_you_mean(dimension, setting.dimensions)
            fix = fix or f"declare {dimension!r} under `dimensions:`"
            fill = {"found": dimension, "fix": fix}
            problems.append(problem("undeclared-condition", sheet.file, 1, **fill))
            return {}
    table = Table(
        document, ("tables", i), settings, sheet, setting.dimensions, setting.zones,
        setting.units, notes, other, setting.categories,
        setting.paths.get(str(settings["id"]), ""), amends,
    )  # fmt: skip
    cells = expand(table, problems)
    return {} if settings.get("status") == "guidance" else cells


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
