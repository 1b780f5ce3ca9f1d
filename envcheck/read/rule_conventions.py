"""How a code counts: films, methods, coefficient tables, class tests, each with where it is said."""

from __future__ import annotations

from collections.abc import Mapping
from functools import lru_cache
from importlib.resources import files
from io import StringIO
from csv import DictReader
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.names import Names
from envcheck.model.ruleset import ClassTest, Conventions, FilmRow, MethodRule, TableRow
from envcheck.read.patterns import fits_any
from envcheck.read.rule_documents import Document
from envcheck.read.sheets import read_lines

DEFAULT = "default of envcheck"
KEYS = (
    "films", "air_spaces", "methods", "cladding", "fasteners", "tapered", "crossed_insulation",
    "framing_shares", "class_tests", "evidence", "measured", "cavity_factors",
    "effective_layers", "f_factors",
)  # fmt: skip


class Form(NamedTuple):
    """Columns of a coefficient table: numbers with the column of their unit, and words."""

    value: tuple[str, str, str]
    """Column, column of its unit (or empty), quantity."""
    numbers: tuple[tuple[str, str, str], ...] = ()
    """The same for the numbers that find a row; without a unit column the unit stands in the cell."""
    words: tuple[str, ...] = ()


_LENGTHS = (("depth", "", "length"), ("spacing", "", "length"))
FORMS = {
    "cavity_factors": Form(
        ("factor", "", "number"), (("label", "unit", "resistance"), *_LENGTHS)
    ),
    "effective_layers": Form(
        ("resistance", "unit", "resistance"), (("label", "unit", "resistance"), *_LENGTHS)
    ),
    "f_factors": Form(
        ("f_factor", "f_unit", "linear_transmittance"),
        (("extent", "", "length"), ("resistance", "unit", "resistance")),
        ("position", "heated"),
    ),
    "air_spaces": Form(
        ("resistance", "unit", "resistance"),
        (
            ("thickness", "thickness_unit", "length"),
            ("emittance", "", "number"),
            ("mean_temperature", "", "temperature"),
        ),
        ("direction",),
    ),
    "films": Form(("resistance", "unit", "resistance"), (), ("side", "adjoins", "direction")),
}
WORDS = {
    "side": ("inside", "outside"),
    "direction": ("up", "horizontal", "down", "*"),
    "heated": ("yes", "no"),
    "adjoins": (
        "*", "outdoors", "ground", "vented_attic", "vented_crawl_space", "garage", "unheated",
        "semiheated", "conditioned", "ventilated_cladding",
    ),
}  # fmt: skip


class Source(NamedTuple):
    """The conventions as stated, each key with the document that states it."""

    stated: Mapping[str, Any]
    origin: Mapping[str, Document]
    names: Names


def read_conventions(source: Source, problems: list[Problem]) -> Conventions:
    """Build the conventions of a rule set; what it does not state is our default, and said so."""
    stated = source.stated
    tapered = stated.get("tapered") or {}
    if isinstance(tapered, str):
        tapered = {"use": tapered}
    film_set, films = _films(source, problems)
    air_spaces, tables = _tables(source, problems)
    return Conventions(
        films=films,
        film_set=film_set,
        methods=_methods(source, problems),
        air_spaces=air_spaces,
        cladding=stated.get("cladding", "iso6946"),
        fasteners=stated.get("fasteners", "ignored"),
        tapered=tapered.get("use", "integral"),
        tapered_mean_within=_quantity(source, tapered, "tapered", "mean_within", "length", problems),
        crossed_insulation=stated.get("crossed_insulation", "zero"),
        framing_shares=_shares(source, problems),
        tables=tables,
        class_tests=_class_tests(source, problems),
        accepted_evidence={
            pattern: (kinds,) if isinstance(kinds, str) else tuple(kinds)
            for pattern, kinds in (stated.get("evidence") or {}).items()
            if _pattern(source, "evidence", pattern, problems)
        },
        dimensions_measured=stated.get("measured", ""),
        where={key: _where(source, key) for key in KEYS},
    )


def _where(source: Source, key: str) -> str:
    """Say where a convention comes from."""
    if source.stated.get(key) is None:
        return DEFAULT
    document = source.origin[key]
    clause = (source.stated.get("clauses") or {}).get(key)
    value = source.stated[key]
    if clause is None and isinstance(value, Mapping):
        clause = value.get("clause")
    if clause is None and isinstance(value, list):
        clauses = dict.fromkeys(item["clause"] for item in value if item.get("clause"))
        clause = ", ".join(clauses) or None
    return f"{clause} of {document.id}" if clause else f"conventions of {document.id}"


# --------------------------------------------------------------------------------------- rules


def _methods(source: Source, problems: list[Problem]) -> tuple[MethodRule, ...]:
    rules = []
    for i, rule in enumerate(source.stated.get("methods") or ()):
        names = [rule["method"], *rule.get("refused", ())]
        for name in names:
            _known(source, ("methods", i), name, source.names.methods, "unknown-method", problems)
        if not _pattern(source, "methods", rule["category"], problems, i):
            continue
        weight = _number(source, rule.get("weight"), ("methods", i), problems)
        clause, refused = rule.get("clause", ""), tuple(rule.get("refused", ()))
        rules.append(MethodRule(rule["category"], rule["method"], clause, refused, weight))
    return tuple(rules)


def _class_tests(source: Source, problems: list[Problem]) -> tuple[ClassTest, ...]:
    tests = []
    for i, test in enumerate(source.stated.get("class_tests") or ()):
        quantity = "heat_capacity" if test["measure"] == "heat_capacity" else "area_weight"
        value = _parse(source, test["at_least"], quantity, ("class_tests", i, "at_least"), problems)
        if value is None or not _pattern(source, "class_tests", test["category"], problems, i):
            continue
        counted, arguable = test.get("counted", "whole"), test.get("arguable") == "yes"
        text, clause = test["at_least"], test.get("clause", "")
        tests.append(
            ClassTest(test["category"], test["measure"], value, text, counted, clause, arguable)
        )
    return tuple(tests)


def _shares(source: Source, problems: list[Problem]) -> tuple[tuple[str, float, str], ...]:
    shares = []
    for i, share in enumerate(source.stated.get("framing_shares") or ()):
        value = _parse(source, share["share"], "share", ("framing_shares", i, "share"), problems)
        if value is not None and _pattern(source, "framing_shares", share["category"], problems, i):
            shares.append((share["category"], value, share.get("clause", "")))
    return tuple(shares)


def _pattern(
    source: Source, key: str, pattern: str, problems: list[Problem], at: int | None = None
) -> bool:
    """Whether a category pattern fits at least one category."""
    known = source.names.categories
    if fits_any(pattern, known):
        return True
    where = (key, pattern) if at is None else (key, at)
    _known(source, where, pattern, known, "unknown-category", problems)
    return False


def _known(
    source: Source,
    at: tuple[str | int, ...],
    name: str,
    known: tuple[str, ...],
    kind: str,
    problems: list[Problem],
) -> None:
    if name in known:
        return
    file, line = _place(source, at)
    fix = did_you_mean(name, known)
    fill = {"found": name, "expected": one_of(known), "fix": fix, "name": name}
    fill["hint"] = fix or "use one of the known names"
    problems.append(problem(kind, file, line, **fill))


# -------------------------------------------------------------------------------------- tables


def _films(source: Source, problems: list[Problem]) -> tuple[str, tuple[FilmRow, ...]]:
    stated = source.stated.get("films") or "iso6946"
    if stated.endswith(".csv"):
        rows, name = _own(source, "films", stated, problems), stated
    else:
        rows, name = built_in("films", stated), stated
        if not rows:
            known = tuple(dict.fromkeys(r["set"] for r in _data("films.csv")))
            _known(source, ("films",), stated, known, "unknown-film-set", problems)
    films = tuple(
        FilmRow(
            str(r.keys["side"]), str(r.keys["adjoins"]), str(r.keys["direction"]), r.value, r.text,
            r.source,
        )
        for r in rows
    )  # fmt: skip
    return name, films


def _tables(
    source: Source, problems: list[Problem]
) -> tuple[str, dict[str, tuple[TableRow, ...]]]:
    """Coefficient tables by name; air spaces are a formula, a built-in table or an own one."""
    tables = {
        key: _own(source, key, str(source.stated[key]), problems)
        for key in ("cavity_factors", "effective_layers", "f_factors")
        if source.stated.get(key) is not None
    }
    air = source.stated.get("air_spaces") or "iso6946"
    if air == "iso6946":
        return air, tables
    own = air.endswith(".csv")
    tables["air_spaces"] = (
        _own(source, "air_spaces", air, problems) if own else built_in("air_spaces", "")
    )
    return "table", tables


@lru_cache(maxsize=8)
def _data(name: str) -> tuple[dict[str, str], ...]:
    text = (files("envcheck") / "data" / name).read_text(encoding="utf-8")
    return tuple(DictReader(StringIO(text)))


@lru_cache(maxsize=8)
def built_in(table: str, chosen: str) -> tuple[TableRow, ...]:
    """Rows of a table that comes with envcheck; of films those of one set."""
    rows = (r for r in _data(f"{table}.csv") if not chosen or r["set"] == chosen)
    return tuple(_table_row(table, row) for row in rows)


def _own(
    source: Source, key: str, file: str, problems: list[Problem]
) -> tuple[TableRow, ...]:
    """Read a coefficient table of the rule set's folder."""
    document = source.origin[key]
    shown = document.shown(file)
    lines = read_lines(document.folder / file, shown, ",", problems)
    if lines is None:
        return ()
    head = lines[0].cells if lines else []
    form = FORMS[key]
    needed = [c for spec in (form.value, *form.numbers) for c in spec[:2] if c]
    needed = list(dict.fromkeys([*needed, *form.words, "src"]))
    missing = [name for name in needed if name not in head]
    if missing:
        found, expected = ", ".join(head), ", ".join(needed)
        fill = {"place": "a", "name": missing[0], "found": found, "expected": expected}
        problems.append(problem("wrong-head", shown, 1, **fill))
        return ()
    rows = []
    for line in lines[1:]:
        if len(line.cells) != len(head):
            fill = {"found": f"{len(line.cells)} columns", "expected": f"{len(head)}"}
            problems.append(problem("ragged-row", shown, line.number, **fill))
            continue
        try:
            rows.append(_table_row(key, dict(zip(head, line.cells, strict=True))))
        except units.UnitError as error:
            where = "a coefficient table"
            fill = {"found": error.found, "expected": error.expected, "fix": error.fix}
            problems.append(problem("unreadable-cell", shown, line.number, where=where, **fill))
    return tuple(rows)


def _table_row(table: str, cells: Mapping[str, str]) -> TableRow:
    """Read one row. Errors: UnitError for a number, unit or word that cannot be read."""
    form = FORMS[table]
    keys: dict[str, str | float] = {}
    for word in form.words:
        allowed = WORDS.get(word)
        if allowed and cells[word] not in allowed:
            fix = did_you_mean(cells[word], allowed) or f"write one of them under {word!r}"
            raise units.UnitError("unknown-word", cells[word], one_of(allowed), fix)
        keys[word] = cells[word]
    for name, unit, quantity in form.numbers:
        if cells[name]:
            keys[name] = units.parse(f"{cells[name]} {cells[unit]}" if unit else cells[name], quantity)
    name, unit, quantity = form.value
    text = f"{cells[name]} {cells[unit]}" if unit else cells[name]
    source = cells.get("src", "")
    return TableRow(table, keys, units.parse(text, quantity), text, source)


# ------------------------------------------------------------------------------------- figures


def _quantity(
    source: Source,
    stated: Mapping[str, Any],
    key: str,
    name: str,
    quantity: str,
    problems: list[Problem],
) -> float | None:
    text = stated.get(name)
    return None if text is None else _parse(source, text, quantity, (key, name), problems)


def _number(
    source: Source, text: str | None, at: tuple[str | int, ...], problems: list[Problem]
) -> float | None:
    return None if text is None else _parse(source, text, "number", at, problems)


def _parse(
    source: Source, text: str, quantity: str, at: tuple[str | int, ...], problems: list[Problem]
) -> float | None:
    try:
        return units.parse(text, quantity)
    except units.UnitError as error:
        file, line = _place(source, at)
        fill = {"found": error.found, "expected": error.expected, "fix": error.fix}
        problems.append(problem("unreadable-figure", file, line, **fill))
        return None


def _place(source: Source, at: tuple[str | int, ...]) -> tuple[str, int]:
    document = source.origin[str(at[0])]
    return document.name, document.line("conventions", *at)
