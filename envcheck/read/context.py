"""What every part of the project reader needs: quantities, references, and a place for problems.

After a problem reading goes on with NaN or a stand-in, so that all problems of a file are found
at once; nothing built after a problem leaves this folder.
"""

from __future__ import annotations

from collections.abc import Iterable
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING, Any

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.layers import Span
from envcheck.model.names import Names
from envcheck.model.project import Material
from envcheck.read.dates import read_date
from envcheck.read.materials import library_material, material_ids
from envcheck.read.yaml_reader import Entry
from envcheck.units import UNITS, UnitError, parse, states_range

if TYPE_CHECKING:
    from envcheck.model.details import Detail

NAN = float("nan")
MATCHES = 1e-6
"""Lengths closer than this, m, are taken as equal."""
LEAST, MOST = 1e-4, 1e4
"""W/(m K) between which a conductivity can be meant."""


class Context:
    """One reading of one project file."""

    def __init__(self, file: str, folder: Path, names: Names) -> None:
        self.file = file
        self.folder = folder
        self.names = names
        self.problems: list[Problem] = []
        self.own: dict[str, Material] = {}
        self.own_ids: frozenset[str] = frozenset()
        self.used: dict[str, Material] = {}
        self.details: dict[str, Detail] = {}
        self.detail_ids: frozenset[str] = frozenset()
        self.ranges = False
        """Whether some value of the file is stated with a range."""

    def add(self, kind: str, line: int | None, **fill: Any) -> None:
        """Note a problem."""
        self.problems.append(problem(kind, self.file, line, **fill))

    # ---------------------------------------------------------------------- quantities

    def number(self, entry: Entry, key: str, quantity: str) -> float:
        """Read a quantity of any sign as SI; NaN after a problem."""
        try:
            return parse(entry[key], quantity)
        except UnitError as error:
            self._unit_problem(entry, key, error)
            return NAN

    def ranged(self, entry: Entry, key: str, quantity: str) -> tuple[float, Span | None]:
        """Read a positive quantity that may carry a range; NaN and None after a problem."""
        if not states_range(entry[key]):
            return self.positive(entry, key, quantity), None
        from envcheck.units.ranges import parse_range

        self.ranges = True
        try:
            value, low, high = parse_range(entry[key], quantity)
        except UnitError as error:
            self._unit_problem(entry, key, error)
            return NAN, None
        return value, (low, high)

    def _unit_problem(self, entry: Entry, key: str, error: UnitError) -> None:
        self.add(
            error.kind,
            entry.lines[key],
            found=error.found,
            expected=error.expected,
            fix=error.fix,
            hint="",
        )

    def not_negative(self, entry: Entry, key: str, quantity: str) -> float:
        """Read a quantity that may be zero; NaN after a problem."""
        value = self.number(entry, key, quantity)
        return self.positive(entry, key, quantity) if value < 0 else value

    def positive(self, entry: Entry, key: str, quantity: str) -> float:
        """Read a quantity that must be more than zero; NaN after a problem."""
        value = self.number(entry, key, quantity)
        if value <= 0:
            expected = f"{UNITS[quantity].words} more than zero"
            line = entry.lines[key]
            self.add("not-positive", line, found=entry[key], expected=expected, key=key)
            return NAN
        return value

    def conductivity(self, entry: Entry, key: str) -> float:
        """Read a conductivity that a solid or a void can have; NaN after a problem."""
        return self.conducts(entry, key, self.positive(entry, key, "conductivity"))

    def conducts(self, entry: Entry, key: str, value: float) -> float:
        """Refuse a conductivity, W/(m K), that nothing has: more often a slip of the unit."""
        if not (value < LEAST or value > MOST):
            return value
        expected = f"{LEAST:g} to {MOST:g} W/(m*K); this is {value:.3g} W/(m*K)"
        self.out_of_range(entry, key, expected, "check number and unit")
        return NAN

    def optional(self, entry: Entry, key: str, quantity: str) -> float | None:
        """Read a positive quantity that may be left out."""
        return self.positive(entry, key, quantity) if key in entry else None

    def share(self, entry: Entry, key: str, *, whole: bool = False) -> float:
        """Read a share more than 0 and less than 1; ``whole`` lets 1 be."""
        value = self.number(entry, key, "share")
        if value <= 0 or value > 1 or (value == 1 and not whole):
            most = "at most" if whole else "less than"
            self.out_of_range(entry, key, f"more than 0 % and {most} 100 %", "check the share")
            return NAN
        return value

    def out_of_range(self, entry: Entry, key: str, expected: str, hint: str) -> None:
        """Note a quantity that no such thing has."""
        line, found = entry.lines[key], entry[key]
        self.add("out-of-range", line, found=found, expected=expected, key=key, hint=hint)

    def date(self, entry: Entry, key: str) -> date | None:
        """Read a date typed as year-month-day."""
        text = entry.get(key)
        if text is None:
            return None
        try:
            return read_date(text)
        except ValueError:
            self.add(
                "bad-date", entry.lines[key], found=text, expected="a day of the calendar", key=key
            )
            return None

    # ---------------------------------------------------------------------- references

    def unknown(self, kind: str, line: int, name: str, known: Iterable[str]) -> None:
        """Note a name that is not known, with the one that was likely meant."""
        names = list(known)
        hint = did_you_mean(name, names)
        expected = one_of(names) if names else "none is there"
        self.add(
            kind, line, found=name, expected=expected, name=name[:60],
            hint=hint or "check the spelling, or add what is named",
        )  # fmt: skip

    def material(self, entry: Entry, key: str = "material") -> Material:
        """Resolve a material id: those of the project first, then the library."""
        name = entry[key]
        found = self.used.get(name)
        if found is not None:
            return found
        found = self.own.get(name) or library_material(name)
        if found is None:
            if name not in self.own_ids:
                known = (*self.own_ids, *material_ids())
                hint = did_you_mean(name, known)
                self.add(
                    "unknown-material",
                    entry.lines[key],
                    found=name,
                    expected="an id of this file's materials or of the library",
                    name=name,
                    hint=hint
                    or "list the library with 'envcheck materials', or describe it in place",
                )
            found = Material(name, name, NAN)
        self.used[name] = found
        return found

    def exactly_one(self, entry: Entry, keys: tuple[str, ...], where: str) -> str:
        """Give the one key of ``keys`` that is there; empty after a problem."""
        there = [key for key in keys if key in entry]
        if len(there) == 1:
            return there[0]
        line = entry.lines[there[1]] if there else entry.line
        self.add(
            "needs-one-of",
            line,
            found=" and ".join(there) or "none of them",
            where=where,
            keys=", ".join(keys),
            hint="keep one of them" if there else f"add {keys[0]!r}",
        )
        return ""

    def out_of_place(self, entry: Entry, keys: tuple[str, ...], where: str, hint: str) -> None:
        """Note keys that say nothing where they stand, so that none is passed over in silence."""
        for key in keys:
            if key in entry:
                self.add(
                    "unknown-key", entry.lines[key], found=key, key=key, where=where, hint=hint
                )

    def evidence(self, entry: Entry) -> str:
        """Kind of evidence; ``assumed`` where nobody names a source."""
        default = "" if "source" in entry else "assumed"
        return str(entry.get("evidence", default))

    def inside_folder(self, entry: Entry, key: str) -> bool:
        """Whether the file that the key names is there; a path out of the folder is a problem."""
        try:
            folder = self.folder.resolve()
            path = (folder / entry[key]).resolve()
            inside = path.is_relative_to(folder)
            found: bool = inside and path.is_file()
        except (OSError, ValueError, RuntimeError):
            return False
        if not inside:
            expected = "a file in the folder of the project file"
            self.add("evidence-outside", entry.lines[key], found=entry[key], expected=expected)
        return found
