"""Weights of areas in a mean, as a table states them."""

from __future__ import annotations

from envcheck.errors import Problem
from envcheck.model.ruleset import Weight
from envcheck.read.table_entry import Table, line_of_table
from envcheck.read.table_meaning import condition


def weights_of(table: Table, problems: list[Problem]) -> tuple[Weight, ...]:
    """Read ``weights``: a factor, what it is for in words, and the conditions that tell."""
    found = []
    line = line_of_table(table)
    for i, stated in enumerate(table.settings.get("weights") or ()):
        at = (*table.at, "weights", i, "factor")
        factor = table.document.figure(str(stated.get("factor", "")), "number", at, problems)
        typed = stated.get("when") or {}
        file = table.document.name
        read = [condition(table, d, t, file, line, problems) for d, t in typed.items()]
        when = tuple(c for c in read if c is not None)
        if factor is not None and len(when) == len(read):
            found.append(Weight(factor, str(stated.get("for", "")), when))
    return tuple(found)
