"""The workbook: sheets of texts, numbers and live formulas, with nothing said of its file format.

A person who changes a thickness sees the value, the rounding and the verdict move. What cannot be a
formula (a bound of a drawn section, a figure of a table) is a number, and its row says so.
"""

from __future__ import annotations

from envcheck.report.view import View
from envcheck.report.workbook import assemblies, lines, lists, sums
from envcheck.report.workbook.cells import Sheet


def build(view: View) -> tuple[Sheet, ...]:
    """Lay a view out as sheets. The view holds details and workings."""
    worked, results = assemblies.sheet(view)
    return (
        lists.check(view),
        lines.sheet(view, results),
        worked,
        *sums.sheets(view),
        *(lists.listed(each.heading, each.grid) for each in view.schedules),
        lists.layers(view),
        *lists.moisture(view),
        lists.notes(view),
    )
