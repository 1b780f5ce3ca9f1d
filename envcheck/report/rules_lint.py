"""The page of ``envcheck rules lint``: errors first, then remarks, then what is confirmed."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck.model.typed import Fault, TypedSet
from envcheck.report.answer import Answer
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Grid, Items, Page, Paragraph, Section

MOST = 200
"""Findings of one severity and set on the page; the data hold all."""
CANNOT = (
    "Lint cannot see a small slip of a digit, nor figures swapped where no zone tells them apart: "
    "have a second person compare the print-out of `envcheck rules show` with the law."
)
HEADS = (
    "check", "severity", "file", "line", "row", "column", "what", "found", "expected", "fix",
    "place", "confirmed",
)  # fmt: skip
Entries = Sequence[tuple[str, TypedSet | None, tuple[Fault, ...]]]


def build(entries: Entries) -> Answer:
    """Page and data for (folder, set or None, its findings)."""
    faults = [fault for _, _, found in entries for fault in found]
    sections = [_section(folder, typed, found) for folder, typed, found in entries]
    summary = _summary(len(entries), faults)
    page = Page(summary, (*sections, Section("", (Paragraph(CANNOT),))))
    data: dict[str, object] = {
        "rule_sets": [
            {"folder": folder, "cells": _cells(typed), "findings": [_data(f) for f in found]}
            for folder, typed, found in entries
        ],
        "errors": sum(f.severity == "error" for f in faults),
        "remarks": sum(_open(f) for f in faults),
        "confirmed": sum(bool(f.confirmed) for f in faults),
    }
    return Answer(page, data, Grid(HEADS, tuple(map(_row, faults))))


def _row(fault: Fault) -> tuple[str, ...]:
    told = fault._asdict()
    return tuple(clean("" if told[head] is None else str(told[head])) for head in HEADS)


def _open(fault: Fault) -> bool:
    return fault.severity == "remark" and not fault.confirmed


def _count(number: int, word: str) -> str:
    return f"{number} {word}" + "s" * (number != 1)


def _summary(sets: int, faults: Sequence[Fault]) -> str:
    errors = sum(f.severity == "error" for f in faults)
    remarks = sum(map(_open, faults))
    confirmed = sum(bool(f.confirmed) for f in faults)
    return (
        f"{_count(sets, 'rule set')}: {_count(errors, 'error')}, {_count(remarks, 'remark')}, "
        f"{confirmed} confirmed"
    )


def _cells(typed: TypedSet | None) -> int:
    return 0 if typed is None else sum(len(row) for t in typed.tables for row in t.rows)


def _section(folder: str, typed: TypedSet | None, faults: Sequence[Fault]) -> Section:
    groups = (
        ("Errors, which stop a check", [f for f in faults if f.severity == "error"]),
        ("Remarks, to compare with the printed page", [f for f in faults if _open(f)]),
        ("Confirmed by the rule set", [f for f in faults if f.confirmed]),
    )
    blocks: list[Block] = []
    for title, found in groups:
        if found:
            blocks += [Paragraph(f"{title}: {len(found)}"), _items(found)]
    if not blocks:
        blocks = [Paragraph(f"{_cells(typed)} cells, no finding.")]
    return Section(clean(folder), tuple(blocks))


def _items(faults: Sequence[Fault]) -> Items:
    before = ["", *(fault.fix for fault in faults)]
    entries = [_entry(f, f.fix != b) for f, b in zip(faults[:MOST], before, strict=False)]
    if len(faults) > MOST:
        entries.append(Entry(f"... and {len(faults) - MOST} more; the JSON format lists all"))
    return Items(tuple(entries))


def _entry(fault: Fault, with_fix: bool) -> Entry:
    """One finding; a fix that the one above names already is left out."""
    place = fault.file if fault.line is None else f"{fault.file}:{fault.line}"
    cell = f"row {fault.row!r}, column {fault.column!r}: " if fault.row else ""
    lines = list(_lines(fault, with_fix))
    return Entry(clean(f"{fault.check} {place}: {cell}{fault.what}"), tuple(map(clean, lines)))


def _lines(fault: Fault, with_fix: bool) -> Iterable[str]:
    facts = (("found", fault.found), ("expected", fault.expected))
    words = "; ".join(f"{name} {text}" for name, text in facts if text)
    if words:
        yield words
    if fault.confirmed:
        yield f"confirmed: {fault.confirmed}"
        return
    if with_fix:
        yield f"fix: {fault.fix}"
    if fault.place:
        yield f'confirm with: "{fault.check} {fault.place}": reason'


def _data(fault: Fault) -> dict[str, object]:
    return {**fault._asdict(), "confirmed": fault.confirmed or None}
