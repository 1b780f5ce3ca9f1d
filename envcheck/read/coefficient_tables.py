"""Coefficient tables in CSV: those of a rule set's folder and those that come with envcheck."""

from __future__ import annotations

from collections.abc import Mapping
from csv import DictReader
from functools import lru_cache
from typing import NamedTuple

from envcheck import units
from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.ruleset import TableRow
from envcheck.read.materials import DATA
from envcheck.read.rule_documents import Document
from envcheck.read.sheets import is_plain, read_lines


class Form(NamedTuple):
    """Columns of a coefficient table: numbers with the column of their unit, and words."""

    value: tuple[str, str, str]
    """Column, column of its unit (or empty), quantity."""
    numbers: tuple[tuple[str, str, str], ...] = ()
    """The same for the numbers that find a row; with no unit column the cell holds the unit."""
    words: tuple[str, ...] = ()


_LENGTHS = (("depth", "", "length"), ("spacing", "", "length"))
FORMS = {
    "cavity_factors": Form(("factor", "", "number"), (("label", "unit", "resistance"), *_LENGTHS)),
    "effective_layers": Form(
        ("resistance", "unit", "resistance"), (("label", "unit", "resistance"), *_LENGTHS)
    ),
    "weights": Form(
        ("weight", "", "number"),
        (("spacing_over", "", "length"), ("spacing_up_to", "", "length")),
        ("continuous_insulation",),
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
    "compressed_batts": Form(
        ("resistance", "", "resistance"),
        (
            ("label", "", "resistance"),
            ("product_thickness", "", "length"),
            ("cavity_depth", "", "length"),
        ),
    ),
    "films": Form(("resistance", "unit", "resistance"), (), ("side", "adjoins", "direction")),
}
WORDS = {
    "side": ("inside", "outside"),
    "direction": ("up", "horizontal", "down", "*"),
    "heated": ("yes", "no"),
    "continuous_insulation": ("yes", "no", "*"),
    "adjoins": (
        "*", "outdoors", "ground", "vented_attic", "vented_crawl_space", "garage", "unheated",
        "semiheated", "conditioned", "ventilated_cladding",
    ),
}  # fmt: skip


@lru_cache(maxsize=8)
def _data(name: str) -> tuple[dict[str, str], ...]:
    with (DATA / name).open(encoding="utf-8", newline="") as lines:
        return tuple(DictReader(lines))


@lru_cache(maxsize=8)
def built_in(table: str, chosen: str) -> tuple[TableRow, ...]:
    """Rows of a table that comes with envcheck; of films those of one set."""
    rows = (r for r in _data(f"{table}.csv") if not chosen or r["set"] == chosen)
    return tuple(_table_row(table, row) for row in rows)


def own_table(
    document: Document, key: str, file: str, problems: list[Problem]
) -> tuple[TableRow, ...]:
    """Read a coefficient table of the rule set's folder."""
    if not is_plain(file):
        at = document.line("conventions", key)
        problems.append(problem("sheet-outside", document.name, at, found=file))
        return ()
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
            keys[name] = units.parse(
                f"{cells[name]} {cells[unit]}" if unit else cells[name], quantity
            )
    name, unit, quantity = form.value
    text = f"{cells[name]} {cells[unit]}" if unit else cells[name]
    source = cells.get("src", "")
    return TableRow(table, keys, units.parse(text, quantity), text, source)


def film_sets() -> tuple[str, ...]:
    """Names of the built-in film sets."""
    return tuple(dict.fromkeys(row["set"] for row in _data("films.csv")))
