"""A rule set by its id: the base edition with the amendments in force folded over it."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from datetime import date
from pathlib import Path
from typing import Any

from envcheck import units
from envcheck.errors import InputError, Problem, problem
from envcheck.model.metrics import METRICS
from envcheck.model.names import Names
from envcheck.model.ruleset import Edition, Limit, OtherMetric, RuleSet
from envcheck.read.folding import Setting, fold
from envcheck.read.locks import read_lock
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
)
from envcheck.read.rule_tradeoff import read_tradeoff
from envcheck.read.single_limits import Clauses
from envcheck.read.table_entry import CellKey, Table

__all__ = ["default_folders", "find", "read_ruleset"]

COMPARE = "rounded_to_printed_decimals"


def read_ruleset(
    id: str,
    folders: Sequence[Path | str],
    on: date | None,
    names: Names,
    asked: tuple[str, int | None] = ("", None),
    typed: list[tuple[Table, dict[CellKey, tuple[Limit, ...]]]] | None = None,
) -> RuleSet:
    """Read a rule set as in force on a date.

    ``folders`` hold rule sets by id; ``on`` None folds every amendment; ``asked`` is the file and
    line that name the rule set, for messages; ``typed`` collects every table as it
    is read. Errors: InputError with every problem found.
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
    # the tables of every document are read, so that all dimensions are known; those in force win
    dimensions = {k: v for d in (*chain, *active) for k, v in read_dimensions(d, problems).items()}
    printed = _units(chain, problems)
    paths = _table_paths(document("paths"))
    setting = Setting(zones.order, dimensions, printed, categories, paths, typed)
    cells = fold(chain, in_force, setting, problems)
    clauses = [Clauses(d, dimensions, printed[d.id], categories, problems) for d in active]
    limits = _with_clauses((x for group in cells.values() for x in group), clauses)
    _check_zones_printed(zones.order, limits, document("tables"), problems)
    check_overlaps(limits, chain[-1], problems)
    _check_paths(document("paths"), limits, problems)
    averaging, remarks = read_averaging(document("averaging"), categories, problems)
    caps, prose = read_area_limits(document("area_limits"), categories, problems)
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
        chain=_editions(chain, in_force, problems),
        units="IP" if "Btu" in "".join(printed[document("units").id].values()) else "SI",
        zones=zones,
        dimensions=dimensions,
        limits=limits,
        paths_clause=_paths_clause(document("paths")),
        compare=rounding.get("compare", COMPARE),
        rounding_clause=rounding.get("clause", ""),
        rounding_stated=bool(rounding),
        conventions=conventions,
        area_limits=caps,
        averaging=averaging,
        tradeoff=read_tradeoff(document("tradeoff"), categories, dimensions, problems),
        trigger=read_trigger(document("trigger"), problems),
        exceptions=read_exceptions(*active),
        not_judged=tuple(text for d in active for text in d.get("not_judged") or ()),
        folder=top.folder.as_posix(),
        remarks=(*remarks, *prose, *_remarks(active, limits, clauses)),
        other_metrics=_other_metrics(active),
        adjustments=tuple(a for c in clauses for a in c.adjustments()),
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
        holds.append(on is None or ((first is None or first <= on) and (end is None or on < end)))
    for i in range(len(chain) - 1, 0, -1):
        if chain[i].get("overlay", "kind") == "edition":
            holds[i - 1] = holds[i]
    return holds


def _editions(
    chain: Sequence[Document], in_force: Sequence[bool], problems: list[Problem]
) -> tuple[Edition, ...]:
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
            lock=read_lock(d.folder, problems),
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
    return Source(
        {**stated, "clauses": clauses}, {**dict.fromkeys(stated, active[0]), **origin}, names
    )


def _checked_by(stated: Any) -> str:
    if isinstance(stated, Mapping):
        return ", ".join(f"{k} {v}" for k, v in stated.items())
    return ", ".join(stated) if isinstance(stated, list) else str(stated or "")


# ------------------------------------------------------------------------- units and paths


def _units(chain: Sequence[Document], problems: list[Problem]) -> dict[str, dict[str, str]]:
    """By document, printed units by key: its own over those of what it amends."""
    found: dict[str, dict[str, str]] = {}
    below: dict[str, str] = {}
    for document in chain:
        own = _own_units(document, problems)
        below = found[document.id] = {**below, **own}
    return found


def _own_units(document: Document, problems: list[Problem]) -> dict[str, str]:
    """Printed units by key, as labels of the units table."""
    found: dict[str, str] = {}
    quantities = {m.key: m.quantity for m in METRICS.values() if m.key}
    for key, spelling in (document.get("units") or {}).items():
        name = {"RSI": "R", "K": "U"}.get(key, key)
        quantity = quantities.get(name, "")
        factor = units.quantity_of(spelling) and units.to_si(1.0, spelling)
        for system in ("SI", "IP"):
            label = units.label(quantity, system) if quantity else ""
            if label and factor == units.to_si(1.0, label):
                found[name] = label
        if quantity and name not in found:
            line, expected = document.line("units", key), units.label(quantity, "SI")
            expected += f" or {units.label(quantity, 'IP')}"
            fill = {"found": spelling, "expected": expected, "key": key}
            problems.append(problem("wrong-table-unit", document.name, line, **fill))
            found[name] = units.label(quantity, "SI")
    if "U" in found:
        found.setdefault("C", found["U"])
    return found


def _other_metrics(active: Sequence[Document]) -> dict[str, OtherMetric]:
    """Ratings that cells offer beside the row's own metric."""
    stated = {k: v for d in active for k, v in (d.get("other_metrics") or {}).items()}
    bands = {k: v for d in active for k, v in (d.get("bands") or {}).items()}
    return {
        name: OtherMetric(
            name,
            str((entry or {}).get("limit", "min")),
            str((entry or {}).get("meaning", "")),
            tuple(map(str, bands.get(name) or ())),
        )
        for name, entry in stated.items()
    }


def _with_clauses(limits: Iterable[Limit], clauses: Sequence[Clauses]) -> tuple[Limit, ...]:
    """Add the limits of clauses, then split off what clauses free."""
    found = tuple(limits)
    for own in clauses:
        found += (*own.limits("single_limits"), *own.limits("point_limits"))
    for own in clauses:
        found = own.exempt(found)
    return found


def _check_zones_printed(
    order: Sequence[str], limits: Sequence[Limit], document: Document, problems: list[Problem]
) -> None:
    """Where each zone has a sheet of its own, none is left out."""
    tables = document.get("tables") or ()
    single = [t for t in tables if t.get("zone")]
    if len(single) < 2 or any(limit.zone == "*" for limit in limits):
        return
    printed = {t["zone"] for t in single}
    allowed = {z for t in tables for z in t.get("gaps_allowed") or ()}
    for zone in order:
        if zone not in printed | allowed:
            line, fill = document.line("zones", "order"), {"zone": zone, "what": "sheet"}
            problems.append(problem("zone-missing", document.name, line, found="none", **fill))


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


def _remarks(
    active: Sequence[Document], limits: Sequence[Limit], clauses: Sequence[Clauses]
) -> tuple[str, ...]:
    """What the rule set holds and this version does not judge."""
    found = []
    for document, own in zip(active, clauses, strict=True):
        found += own.remarks()
        for table in document.get("tables") or ():
            if table.get("status") == "guidance":
                found.append(f"{document.id}: {table['clause']} is guidance and is not judged")
        unknown = [n for n, c in (document.get("elements") or {}).items() if c == []]
        if unknown:
            words = f"{', '.join(unknown)}: envcheck knows no such element; not judged"
            found.append(f"{document.id}: {words}")
    whole = dict.fromkeys(x.clause for x in limits if x.applies_to == "whole_envelope")
    found += [f"{clause} limits the envelope as a whole; it is not judged" for clause in whole]
    means = dict.fromkeys(x.clause for x in limits if x.applies_to == "area_weighted_mean")
    found += [
        f"{clause} limits an area-weighted mean: each element is held against it by itself unless "
        "the project asks for the mean"
        for clause in means
    ]
    return tuple(found)
