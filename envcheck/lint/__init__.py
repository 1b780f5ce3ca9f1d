"""Lint: what looks wrong in a typed table, each fault found by one function.

A file in the folder ``checks`` with a tuple ``CHECKS`` is found; there is no list to keep. Errors
of input come from the reader and stop a check; what is found here is a remark, which never does.
The rule set confirms a remark at its place with a reason, and it stays silent.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence
from functools import cache
from importlib import import_module
from pkgutil import iter_modules
from typing import NamedTuple

from envcheck.errors import Problem
from envcheck.lint.numbers import NUMBERS
from envcheck.model.typed import Fault, Range, TypedCell, TypedSet

BOUNDARIES = ("/", "[")
"""Signs behind which a place may go on: a confirmation of a row covers its cells."""


class Sheets(NamedTuple):
    """What a check may look at."""

    set: TypedSet
    ranges: tuple[Range, ...]

    def cells(self) -> Iterator[TypedCell]:
        """Every cell of every table."""
        return (cell for table in self.set.tables for row in table.rows for cell in row)


class Check(NamedTuple):
    """One check of plausibility."""

    id: str
    title: str
    run: Callable[[Sheets], Iterable[Fault]]


@cache
def all_checks() -> tuple[Check, ...]:
    """All checks, in the order of their numbers."""
    package = import_module("envcheck.lint.checks")
    names = sorted(info.name for info in iter_modules(package.__path__))
    found = [c for name in names for c in import_module(f"{package.__name__}.{name}").CHECKS]
    return tuple(sorted(found, key=lambda check: check.id))


def remark(
    check: str, cell: TypedCell, what: str, fix: str, found: object = "", expected: object = ""
) -> Fault:
    """A remark on one cell."""
    heads = " / ".join(cell.heads)
    return Fault(
        check, "remark", cell.file, cell.line, what, str(found) or cell.text, str(expected), fix,
        cell.row, heads, cell.place,
    )  # fmt: skip


def lint(sheets: Sheets | None, problems: Sequence[Problem]) -> tuple[Fault, ...]:
    """Every fault of one rule set: the reader's errors, then the remarks by place."""
    errors = [_error(p) for p in problems]
    remarks = [] if sheets is None else [f for c in all_checks() for f in c.run(sheets)]
    if sheets is not None:
        remarks = [*_confirmed(sheets.set, remarks), *_stale(sheets.set, remarks, bool(errors))]
    return (*errors, *sorted(remarks, key=lambda f: (f.file, f.line or 0, f.check)))


def _error(p: Problem) -> Fault:
    number = NUMBERS.get(p.kind.id, p.kind.id)
    return Fault(number, "error", p.file, p.line, p.what, p.found, p.expected, p.fix)


def _confirmed(typed: TypedSet, remarks: Iterable[Fault]) -> Iterator[Fault]:
    for fault in remarks:
        keys = [key for key in typed.confirmed if _answers(key, fault)]
        yield fault._replace(confirmed=typed.confirmed[keys[0]][0]) if keys else fault


def _answers(key: str, fault: Fault) -> bool:
    check, _, place = key.partition(" ")
    place = place.strip().rstrip("/")
    if check != fault.check or not place or not fault.place.startswith(place):
        return False
    rest = fault.place[len(place) :]
    return not rest or rest.startswith(BOUNDARIES)


def _stale(typed: TypedSet, remarks: Sequence[Fault], unread: bool) -> Iterator[Fault]:
    """Confirmations that answer nothing; not asked where errors keep sheets from being read."""
    for key, (_, line) in typed.confirmed.items():
        if not unread and not any(_answers(key, fault) for fault in remarks):
            what = "a finding is confirmed that is not there"
            fix = "take the entry out, or write the place as the finding names it"
            yield Fault("L26", "remark", typed.file, line, what, key, "", fix)
