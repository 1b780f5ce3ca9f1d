"""Single faults seeded into typed sheets, and how many lint finds: by hand,

    python -m tests.benchmarks.faults [--per N] [FOLDER...]

Each folder holds rule sets that lint finds clean but for confirmed findings. One cell, row or head
is changed at a time, at most N per sheet and class, and the set is linted again; a fault counts as
found where a finding is there that the clean set has not. Prints a table by class; the exit status
is 1 where less than 90 % are found over all classes but the control. The classes are the slips that
people make in typing tables (common practice, no source). Thresholds of lint were set with these
sheets at hand, so the figures say what it does on them, not on every table.
"""

from __future__ import annotations

import csv
import io
import re
import shutil
import sys
import tempfile
from collections import defaultdict
from collections.abc import Callable, Iterator
from itertools import pairwise
from pathlib import Path
from typing import NamedTuple

from envcheck.lint import Sheets, lint
from envcheck.model.typed import Fault, TypedCell, TypedSet, TypedTable
from envcheck.pipeline import names
from envcheck.read.typed import folders_of, plausible_ranges, read_typed

ROOT = Path(__file__).parent.parent.parent
FOLDERS = ("rules", "tests/cases/rules", "tests/cases/building/rules", "tests/cases/law")
CONTROL = "last digit one off (control)"
WANTED = 0.90
PER = 6
NUMBER = re.compile(r"\d+[.,]?\d*")
OTHER_UNIT = {"Btu/(h ft2 F)": 5.678263, "h ft2 F/Btu": 1 / 5.678263, "Btu/(h ft F)": 1.730735}
"""IP unit -> SI figure over IP figure, from the definitions of foot, pound, Btu and kelvin."""


class Seeded(NamedTuple):
    """One fault: which cell of a sheet's grid becomes what."""

    kind: str
    what: str
    grid: list[list[str]]


class Sheet(NamedTuple):
    """A sheet as a grid of texts, with what was read from it."""

    typed: TypedSet
    table: TypedTable
    grid: list[list[str]]
    first: int
    """Index of the first printed column."""
    heads: int

    def numbers(self) -> Iterator[tuple[int, int, TypedCell, re.Match[str]]]:
        """Cells that begin with a figure: row and column of the grid, cell, its first number."""
        for r, row in enumerate(self.table.rows, self.heads):
            for c, cell in enumerate(row, self.first):
                if any(p.kind == "number" for p in cell.printed) and cell.text not in "<^":
                    found = NUMBER.search(cell.text)
                    if found is not None:
                        yield r, c, cell, found

    def with_text(self, r: int, c: int, text: str) -> list[list[str]]:
        """The grid with one text changed."""
        return [
            [text if (i, j) == (r, c) else cell for j, cell in enumerate(row)]
            for i, row in enumerate(self.grid)
        ]


Seeder = Callable[[Sheet], Iterator[tuple[str, list[list[str]]]]]
SEEDERS: dict[str, Seeder] = {}


def seeder(kind: str) -> Callable[[Seeder], Seeder]:
    """Register a class of faults."""

    def add(make: Seeder) -> Seeder:
        SEEDERS[kind] = make
        return make

    return add


# --------------------------------------------------------------------------- one figure changed


def _figures(
    sheet: Sheet, change: Callable[[str, TypedCell], str | None]
) -> Iterator[tuple[str, list[list[str]]]]:
    for r, c, cell, found in sheet.numbers():
        new = change(found[0], cell)
        if new is not None and new != found[0]:
            text = cell.text[: found.start()] + new + cell.text[found.end() :]
            yield f"{cell.place}: {cell.text} -> {text}", sheet.with_text(r, c, text)


def _written(value: float, like: str) -> str:
    """A figure with as many significant digits as the one it stands for, in its decimal mark."""
    digits = max(len(like.replace(".", "").replace(",", "").lstrip("0")), 2)
    text = f"{value:.{digits}g}"
    text = f"{float(text):.6f}".rstrip("0").rstrip(".")
    return text.replace(".", ",") if "," in like else text


def _value(text: str) -> float:
    return float(text.replace(",", "."))


@seeder("decimal mark lost (0.35 -> 35)")
def _mark_lost(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    def change(text: str, cell: TypedCell) -> str | None:
        return re.sub("[.,]", "", text).lstrip("0") or None if re.search("[.,]", text) else None

    return _figures(sheet, change)


@seeder("wrong decimal mark")
def _wrong_mark(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    return _figures(sheet, lambda text, cell: text.translate(str.maketrans(".,", ",.")))


@seeder("factor ten")
def _factor_ten(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    def change(text: str, cell: TypedCell) -> str | None:
        value = _value(text)
        return _written(value * 10 if value < 1 else value / 10, text) if value else None

    return _figures(sheet, change)


@seeder("value in the other unit system")
def _other_unit(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    si = {"W/(m2 K)": 1 / 5.678263, "m2 K/W": 5.678263, "W/(m K)": 1 / 1.730735}

    def change(text: str, cell: TypedCell) -> str | None:
        factor = (OTHER_UNIT | si).get(cell.unit)
        return _written(_value(text) * factor, text) if factor and _value(text) else None

    return _figures(sheet, change)


@seeder("R typed in a U row")
def _r_for_u(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    def change(text: str, cell: TypedCell) -> str | None:
        inverse = cell.metric.startswith(("U_", "C_")) and _value(text)
        return _written(1 / _value(text), text) if inverse else None

    return _figures(sheet, change)


@seeder("digits swapped (0.26 -> 0.62)")
def _digits_swapped(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    def change(text: str, cell: TypedCell) -> str | None:
        pairs = [i for i in range(len(text) - 1) if text[i : i + 2].isdigit()]
        pairs = [i for i in pairs if text[i] != text[i + 1] and text[i : i + 2] != "00"]
        if not pairs:
            return None
        i = pairs[-1]
        return text[:i] + text[i + 1] + text[i] + text[i + 2 :]

    return _figures(sheet, change)


@seeder(CONTROL)
def _last_digit(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    def change(text: str, cell: TypedCell) -> str | None:
        return text[:-1] + str((int(text[-1]) + 1) % 10)

    return _figures(sheet, change)


# ------------------------------------------------------------------------------ marks and words


@seeder("footnote bracket lost (30g)")
def _bracket_lost(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r, row in enumerate(sheet.grid[sheet.heads :], sheet.heads):
        for c, text in enumerate(row[sheet.first : -1], sheet.first):
            mark = re.search(r"(?<=\d)\[([^\]\s]+)\]$", text)
            if mark is not None:
                bare = text[: mark.start()] + mark[1]
                yield f"{text} -> {bare}", sheet.with_text(r, c, bare)


@seeder("unknown footnote mark")
def _unknown_mark(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r, c, cell, _ in sheet.numbers():
        yield f"{cell.place}[zz]", sheet.with_text(r, c, re.sub(r"\[.*\]", "", cell.text) + "[zz]")


@seeder('"or" lost')
def _or_lost(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r, c, cell, _ in sheet.numbers():
        if " or " in cell.text:
            text = cell.text.replace(" or ", " ", 1)
            yield f"{cell.text} -> {text}", sheet.with_text(r, c, text)


@seeder("cell blank")
def _blank(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r, c, cell, _ in sheet.numbers():
        yield f"{cell.place} blank", sheet.with_text(r, c, "")


# ----------------------------------------------------------------------------- rows, zones, heads


@seeder("neighbouring zones swapped")
def _zones_swapped(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    spots: dict[tuple[object, ...], list[tuple[int, int, TypedCell]]] = defaultdict(list)
    for r, c, cell, _ in sheet.numbers():
        row = "" if cell.row == cell.zone else cell.row
        spots[(row, cell.when, cell.beside)].append((r, c, cell))
    for found in spots.values():
        for (r, c, a), (s, d, b) in pairwise(found):
            if a.zone != b.zone and a.text != b.text:
                grid = sheet.with_text(r, c, b.text)
                grid[s] = [a.text if j == d else t for j, t in enumerate(grid[s])]
                yield f"{a.place} and {b.zone} swapped", grid


@seeder("row typed twice")
def _row_twice(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r in range(sheet.heads, len(sheet.grid)):
        yield f"row {r} twice", [*sheet.grid[: r + 1], *sheet.grid[r:]]


@seeder("source missing")
def _no_source(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r in range(sheet.heads, len(sheet.grid)):
        yield f"row {r} without source", sheet.with_text(r, len(sheet.grid[r]) - 1, "")


@seeder("zone misspelt")
def _zone_misspelt(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    zones = set(sheet.typed.zones)
    for r, row in enumerate(sheet.grid):
        for c, text in enumerate(row):
            if text in zones and (r < sheet.heads or c == 0):
                yield f"zone {text} misspelt", sheet.with_text(r, c, text + "x")


@seeder("zone row missing")
def _zone_row_missing(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    if sheet.table.across:
        return
    for r in range(sheet.heads, len(sheet.grid)):
        if sheet.grid[r][0] in sheet.typed.zones:
            yield f"row {sheet.grid[r][0]} missing", sheet.grid[:r] + sheet.grid[r + 1 :]


# ---------------------------------------------------------------------------------- conditions


def _conditions(sheet: Sheet) -> Iterator[tuple[int, int, str]]:
    for r, row in enumerate(sheet.grid[sheet.heads :], sheet.heads):
        for c in range(2, sheet.first):
            if row[c]:
                yield r, c, row[c]


@seeder("condition word misspelt")
def _word_misspelt(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    for r, c, text in _conditions(sheet):
        if text[0].isalpha():
            yield f"{text} misspelt", sheet.with_text(r, c, text[:-1] + "qx")


@seeder("conditions overlap")
def _overlap(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    yield from _intervals(sheet, -1)


@seeder("conditions leave a gap")
def _gap(sheet: Sheet) -> Iterator[tuple[str, list[list[str]]]]:
    yield from _intervals(sheet, 1)


def _intervals(sheet: Sheet, sign: int) -> Iterator[tuple[str, list[list[str]]]]:
    """Move the lower end of an interval that follows on another: down to overlap, up to gape."""
    for r, c, text in _conditions(sheet):
        lower = re.fullmatch(r"([(\[])([\d.]+),(.*)", text)
        if lower is not None:
            moved = f"{lower[1]}{_value(lower[2]) * (1 + sign * 0.1):g},{lower[3]}"
            yield f"{text} -> {moved}", sheet.with_text(r, c, moved)


# ------------------------------------------------------------------------------------ the bench


def _grid(path: Path, separator: str) -> list[list[str]]:
    text = path.read_text(encoding="utf-8-sig")
    return [row for row in csv.reader(io.StringIO(text), delimiter=separator) if any(row)]


def _text(grid: list[list[str]], separator: str) -> str:
    out = io.StringIO(newline="")
    csv.writer(out, delimiter=separator, lineterminator="\n").writerows(grid)
    return out.getvalue()


def _spread(
    found: list[tuple[str, list[list[str]]]], most: int
) -> list[tuple[str, list[list[str]]]]:
    """At most so many, spread evenly over the sheet."""
    if len(found) <= most:
        return found
    return [found[i * len(found) // most] for i in range(most)]


def faults_of(folder: Path) -> tuple[TypedSet | None, tuple[Fault, ...]]:
    """Lint one folder."""
    typed = read_typed(folder, names())
    sheets = Sheets(typed.set, plausible_ranges()) if typed.set is not None else None
    return typed.set, lint(sheets, typed.problems)


def _signature(fault: Fault) -> tuple[str, ...]:
    return (fault.check, fault.file, fault.place or str(fault.line), fault.found, fault.what)


def measure(folder: Path, per: int) -> Iterator[tuple[str, str, bool]]:
    """(class, what was done, whether it was found) for every fault seeded into one rule set."""
    with tempfile.TemporaryDirectory() as temporary:
        home = Path(temporary) / "rules"
        shutil.copytree(folder.parent, home)
        own = home / folder.name
        typed, clean = faults_of(own)
        assert typed is not None
        assert all(fault.confirmed for fault in clean), f"{folder} is not clean: {clean[0]}"
        known = {_signature(fault) for fault in clean}
        for table in typed.tables:
            if table.guidance or not table.rows:
                continue
            path = own / Path(table.file).name
            before = path.read_bytes()
            separator = ";" if b";" in before.splitlines()[0] else ","
            heads = len(table.head_rows)
            sheet = Sheet(typed, table, _grid(path, separator), 2 + len(table.dimensions), heads)
            for kind, make in SEEDERS.items():
                for what, grid in _spread(list(make(sheet)), per):
                    path.write_text(_text(grid, separator), encoding="utf-8")
                    new = {_signature(f) for f in faults_of(own)[1] if not f.confirmed}
                    yield kind, f"{folder.name}/{table.id}: {what}", bool(new - known)
            path.write_bytes(before)


def counted(
    given: list[str], per: int = PER, missed: list[str] | None = None
) -> dict[str, list[int]]:
    """Class -> [found, seeded] over the rule sets of folders; without any, those of the project."""
    counts: dict[str, list[int]] = {kind: [0, 0] for kind in SEEDERS}
    for folder in folders_of(given or [str(ROOT / f) for f in FOLDERS]):
        if folder.name == "template":
            continue  # its cells are still to be typed
        for kind, what, found in measure(folder, per):
            counts[kind][0] += found
            counts[kind][1] += 1
            if not found and missed is not None:
                missed.append(f"{kind}: {what}")
    return counts


def main(arguments: list[str]) -> int:
    """Measure and print the table; 1 where too few are found."""
    per = PER
    if arguments[:1] == ["--per"]:
        per, arguments = int(arguments[1]), arguments[2:]
    missed: list[str] = []
    counts = counted(arguments, per, missed)
    for kind, (found, seeded) in counts.items():
        print(f"{kind:34} {found:5} of {seeded:5}")
    found, seeded = (sum(c[i] for k, c in counts.items() if k != CONTROL) for i in (0, 1))
    print(f"{'all but the control':34} {found:5} of {seeded:5}  {found / max(seeded, 1):.1%}")
    if "-v" in sys.argv:
        print("\n".join(missed))
    return 0 if found >= WANTED * seeded else 1


if __name__ == "__main__":
    sys.exit(main([a for a in sys.argv[1:] if a != "-v"]))
