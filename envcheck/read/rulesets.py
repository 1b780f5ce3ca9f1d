"""A rule set by its id: the base edition with the amendments in force folded over it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace
from datetime import date
from pathlib import Path
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import InputError, Problem, did_you_mean, one_of, problem
from envcheck.model.names import Names
from envcheck.model.ruleset import Dimension, Edition, Limit, RuleSet
from envcheck.read.overlaps import check_overlaps
from envcheck.read.rule_conventions import Source, read_conventions
from envcheck.read.rule_documents import Document, default_folders, find, read_chain
from envcheck.read.rule_parts import (
    read_area_limits,
    read_averaging,
    read_dimensions,
    read_exceptions,
    read_trigger,
    read_zones,
    say_tradeoff,
)
from envcheck.read.rule_tables import METRICS, CellKey, Table, expand
from envcheck.read.sheets import read_sheet

__all__ = ["default_folders", "find", "read_ruleset"]

RECORDED = {
    "point_limits": "limits at any point",
    "single_limits": "single limits outside the tables",
    "thresholds": "thresholds",
    "adjustments": "adjustments of a value",
    "relaxations": "relaxations",
    "exemptions": "exemptions",
}
"""Keys that the format knows, that are kept and said, and not judged."""
LATER_TABLE_KEYS = {
    "in_force": "columns by date",
    "weights": "weights in a mean",
    "otherwise_row": "a row for all other cases",
}
LATER_SCOPES = ("any_point", "whole_envelope", "by_head")
COMPARE = "rounded_to_printed_decimals"


class _Setting(NamedTuple):
    """What all tables of a chain share."""

    zones: tuple[str, ...]
    dimensions: Mapping[str, Dimension]
    units: Mapping[str, str]
    categories: tuple[str, ...]
    paths: Mapping[str, str]
    """Table id -> path, where ``paths`` names tables."""


def read_ruleset(
    id: str,
    folders: Sequence[Path | str],
    on: date | None,
    names: Names,
    asked: tuple[str, int | None] = ("", None),
) -> RuleSet:
    """Read a rule set as in force on a date.

    ``folders`` hold rule sets by id; ``on`` None folds every amendment; ``asked`` is the file and
    line that name the rule set, for messages. Errors: InputError with every problem found.
    """
    problems: list[Problem] = []
    chain = read_chain(id, [Path(folder) for folder in folders], asked, problems)
    if not chain:
        raise InputError(problems)
    in_force = _in_force(chain, on)
    active = [d for d, holds in zip(chain, in_force, strict=True) if holds or d is chain[0]]
    stating = {key: d for d in active for key in d.data}
    categories = names.categories

    def document(key: str) -> Document:
        return stating.get(key, chain[0])

    zones = read_zones(document("zones"), problems)
    dimensions = {k: v for d in active for k, v in read_dimensions(d, problems).items()}
    printed = _units(document("units"), problems)
    setting = _Setting(zones.order, dimensions, printed, categories, _table_paths(document("paths")))
    cells = _cells(chain, in_force, setting, problems)
    limits = tuple(limit for group in cells.values() for limit in group)
    check_overlaps(limits, chain[-1], problems)
    _check_paths(document("paths"), limits, problems)
    averaging, remarks = read_averaging(document("averaging"), categories, problems)
    conventions = read_conventions(_conventions(active, names), problems)
    top = chain[-1]
    rounding: Mapping[str, Any] = document("rounding").get("rounding") or {}
    ruleset = RuleSet(
        id=id,
        title=top.get("document", "title"),
        jurisdiction=top.get("jurisdiction"),
        status=top.get("status") or "transcribed",
        invented=top.get("invented") == "yes",
        checked_by=_checked_by(top.get("checked_by")),
        chain=_editions(chain, in_force),
        units="IP" if "Btu" in "".join(printed.values()) else "SI",
        zones=zones,
        dimensions=dimensions,
        limits=limits,
        paths_clause=_paths_clause(document("paths")),
        compare=rounding.get("compare", COMPARE),
        rounding_clause=rounding.get("clause", ""),
        rounding_stated=bool(rounding),
        conventions=conventions,
        area_limits=read_area_limits(document("area_limits"), categories, problems),
        averaging=averaging,
        tradeoff=say_tradeoff(document("tradeoff")),
        trigger=read_trigger(document("trigger"), problems),
        exceptions=read_exceptions(*active),
        not_judged=tuple(text for d in active for text in d.get("not_judged") or ()),
        folder=top.folder.as_posix(),
        remarks=(*remarks, *_remarks(active, limits)),
    )
    if problems:
        raise InputError(dict.fromkeys(problems))
    return ruleset


# ------------------------------------------------------------------------------- the chain


def _in_force(chain: Sequence[Document], on: date | None) -> list[bool]:
    """Whether each document is in force; an edition told as a difference lends its base its own."""
    holds = []
    for document in chain:
        try:
            first, end = document.date("effective", "from"), document.date("effective", "until")
        except ValueError:
            first = end = None
        holds.append(
            on is None or ((first is None or first <= on) and (end is None or on < end))
        )
    for i in range(len(chain) - 1, 0, -1):
        if chain[i].get("overlay", "kind") == "edition":
            holds[i - 1] = holds[i]
    return holds


def _editions(chain: Sequence[Document], in_force: Sequence[bool]) -> tuple[Edition, ...]:
    return tuple(
        Edition(
            id=d.id,
            title=d.get("document", "title"),
            edition=d.get("document", "edition"),
            clause=d.get("overlay", "clause") or "",
            effective_from=_date(d, "from"),
            effective_until=_date(d, "until"),
            in_force=holds,
            sha256=d.sha256,
        )
        for d, holds in zip(chain, in_force, strict=True)
    )


def _date(document: Document, key: str) -> date | None:
    try:
        return document.date("effective", key)
    except ValueError:
        return None


def _conventions(active: Sequence[Document], names: Names) -> Source:
    stated: dict[str, Any] = {}
    origin: dict[str, Document] = {}
    clauses: dict[str, str] = {}
    for document in active:
        own: Mapping[str, Any] = document.get("conventions") or {}
        clauses |= own.get("clauses") or {}
        stated |= own
        origin |= dict.fromkeys(own, document)
    return Source({**stated, "clauses": clauses}, {**dict.fromkeys(stated, active[0]), **origin}, names)


def _checked_by(stated: Any) -> str:
    if isinstance(stated, Mapping):
        return ", ".join(f"{k} {v}" for k, v in stated.items())
    return ", ".join(stated) if isinstance(stated, list) else str(stated or "")


# -------------------------------------------------------------------------------- tables


def _cells(
    chain: Sequence[Document],
    in_force: Sequence[bool],
    setting: _Setting,
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
        for i, entry in enumerate(document.get("tables") or ()):
            settings = _table_settings(document, i, entry, known, amends, problems)
            if settings is not None:
                found |= _read_table(document, i, settings, chain, setting, amends, problems)
                known = {**known, str(settings["id"]): settings}
        if amends:
            _check_amended(document, found, cells, problems)
            found = {
                key: tuple(_replacing(limit, cells.get(key, ())) for limit in limits)
                for key, limits in found.items()
            }
        if holds or not amends:
            cells |= found
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
    setting: _Setting,
    amends: bool,
    problems: list[Problem],
) -> dict[CellKey, tuple[Limit, ...]]:
    """Read one sheet and expand it; guidance is read for its mistakes and left out."""
    other: dict[str, Any] = {}
    notes: dict[str, Any] = {}
    for d in chain[: list(chain).index(document) + 1]:
        other |= d.data
        by_table: Mapping[str, Any] = d.get("notes") or {}
        notes |= {**(by_table.get("*") or {}), **(by_table.get(settings["id"]) or {})}
    file = str(settings["file"])
    sheet = read_sheet(
        document.folder / file,
        document.shown(file),
        str(other.get("separator", ",")),
        int(settings.get("header_rows", 1)),
        problems,
    )
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


def _replacing(limit: Limit, base: tuple[Limit, ...]) -> Limit:
    if not base:
        return limit
    return replace(limit, replaced=f"{base[0].cell} ({base[0].ruleset}, {base[0].clause})")


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
            known = sorted({r[1] for r in rows if r[0] == key[0]})
            fix = did_you_mean(limit.row, [k for k in known if k != limit.row])
            conditions = ", ".join(f"{d} {t}" for d, t in key[2])
            found_row = f"{limit.row} ({conditions})" if conditions else limit.row
            fill = {"found": found_row, "expected": one_of(known), "fix": fix}
            problems.append(problem("no-base-row", file, limit.line, **fill))
        else:
            known = sorted(" / ".join(h) for t, h in columns if t == key[0])
            name = " / ".join(key[3])
            fix = did_you_mean(name, known)
            fill = {"found": name, "expected": one_of(known), "fix": fix}
            problems.append(problem("no-base-cell", file, limit.line, **fill))


# ------------------------------------------------------------------------- units and paths


def _units(document: Document, problems: list[Problem]) -> dict[str, str]:
    """Printed units by key, as labels of the units table."""
    found: dict[str, str] = {}
    quantities = {m.key: m.quantity for m in METRICS.values() if m.key}
    for key, spelling in (document.get("units") or {}).items():
        quantity = quantities.get("R" if key == "RSI" else key, "")
        factor = units.quantity_of(spelling) and units.to_si(1.0, spelling)
        for system in ("SI", "IP"):
            label = units.label(quantity, system) if quantity else ""
            if label and factor == units.to_si(1.0, label):
                found["R" if key == "RSI" else key] = label
        if quantity and not found.get("R" if key == "RSI" else key):
            line, expected = document.line("units", key), units.label(quantity, "SI")
            expected += f" or {units.label(quantity, 'IP')}"
            fill = {"found": spelling, "expected": expected, "key": key}
            problems.append(problem("wrong-table-unit", document.name, line, **fill))
    if "U" in found:
        found.setdefault("C", found["U"])
    return found


def _table_paths(document: Document) -> dict[str, str]:
    """Give tables that are each a path of their own: the R-value table and the others."""
    tables = {t["id"]: t for t in document.get("tables") or () if "id" in t}
    found = {}
    for entry in document.get("paths") or ():
        for name in entry["any_of"]:
            if name in tables:
                insulation = "R_insulation" in str(tables[name])
                found[name] = "insulation" if insulation else "assembly"
    return found


def _paths_clause(document: Document) -> str:
    return ", ".join(str(p.get("clause", "")) for p in document.get("paths") or ())


def _check_paths(document: Document, limits: Sequence[Limit], problems: list[Problem]) -> None:
    """Two paths must be stated as alternatives: else both would have to hold, or one: unknown."""
    used = {limit.path for limit in limits if limit.path}
    if len(used) > 1 and not document.get("paths"):
        found = " and ".join(sorted(used))
        problems.append(problem("paths-not-stated", document.name, None, found=found))


def _remarks(active: Sequence[Document], limits: Sequence[Limit]) -> tuple[str, ...]:
    """What the rule set holds and this version does not judge."""
    found = []
    for document in active:
        for key, words in RECORDED.items():
            clauses = [str(e.get("clause", "")) for e in document.get(key) or ()]
            if clauses:
                found.append(f"{document.id}: {words} ({', '.join(clauses)}) are not judged")
        for table in document.get("tables") or ():
            if table.get("status") == "guidance":
                found.append(f"{document.id}: {table['clause']} is guidance and is not judged")
    means = dict.fromkeys(x.clause for x in limits if x.applies_to == "area_weighted_mean")
    found += [
        f"{clause} limits an area-weighted mean: each element is held against it by itself unless "
        "the project asks for the mean"
        for clause in means
    ]
    return tuple(found)
