"""Cells of an amendment against those that they replace."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.lint import Check, Sheets, remark
from envcheck.lint.runs import strictness
from envcheck.model.typed import Fault

MOVED = 1.67
"""Greatest factor by which an amendment moves a limit unremarked: common practice, no source."""


def repeats_base(sheets: Sheets) -> Iterator[Fault]:
    """A cell that amends nothing, unless the amendment says that it restates."""
    if sheets.set.restates:
        return
    for cell in sheets.cells():
        if cell.replaces and cell.printed and cell.printed == cell.replaced:
            what = "the amendment repeats the cell of its base"
            fix = "write . for an unchanged cell, or say `restates: yes` under `overlay:`"
            yield remark("L23", cell, what, fix)


def moves_far(sheets: Sheets) -> Iterator[Fault]:
    """A limit that an amendment moves by a large factor."""
    for cell in sheets.cells():
        for new, old in zip(cell.printed, cell.replaced, strict=False):
            a, b = strictness(new, cell.sense), strictness(old, cell.sense)
            if a and b and max(a / b, b / a) > MOVED:
                what = f"moves the limit of the base by more than a factor {MOVED:g}"
                fix = "compare the cell with the printed page; if so printed, confirm it"
                yield remark("L24", cell, what, fix, expected=f"near {cell.replaces}")
                break


CHECKS = (
    Check("L23", "Amendment repeats its base", repeats_base),
    Check("L24", "Amendment moves a limit far", moves_far),
)
