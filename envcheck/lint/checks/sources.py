"""Where figures come from, and footnotes that nothing calls."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.errors import did_you_mean, one_of
from envcheck.lint import Check, Sheets
from envcheck.model.typed import Fault


def without_source(sheets: Sheets) -> Iterator[Fault]:
    """A row whose `src` names no source of the rule set, a table without its clause."""
    known = sheets.set.sources
    for table in sheets.set.tables:
        if not table.clause.strip():
            what, fix = "the table has no clause", "write under `clause:` how the print names it"
            yield Fault("L07", "remark", table.file, None, what, "", "", fix, place=table.id)
        for row in table.rows:
            first = row[0]
            letters = first.src.split()
            missing = [letter for letter in letters if letter not in known]
            if letters and not missing:
                continue
            what = "the row names no source that the rule set has"
            fix = did_you_mean(missing[0], known) if missing else ""
            fix = fix or "write in the column src a letter that `sources:` explains"
            place = first.place.rsplit("/", len(first.heads))[0]
            found, expected = first.src or "nothing", one_of(sorted(known)) if known else ""
            yield Fault(
                "L07", "remark", first.file, first.line, what, found, expected, fix, first.row,
                "src", place,
            )  # fmt: skip


def unused_footnote(sheets: Sheets) -> Iterator[Fault]:
    """A footnote that no cell, label or head calls: its mark was lost in typing."""
    for note in sheets.set.unused:
        what = "the footnote is called nowhere in the sheet"
        fix = "put its mark where it is printed, or take it out"
        place = f"{note.table}/{note.mark}"
        yield Fault(
            "L12", "remark", sheets.set.file, note.line, what, f"[{note.mark}]", "", fix,
            place=place,
        )  # fmt: skip


CHECKS = (
    Check("L07", "No source or clause", without_source),
    Check("L12", "Footnote never called", unused_footnote),
)
