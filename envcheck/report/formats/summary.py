"""A line for each line that is over or open, and the counts: for a log that a machine keeps."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.report.by_line import place
from envcheck.report.rows import Row
from envcheck.report.view import View

NAME = "summary"
TITLE = "one line for each line over or open, and the counts"
EXTENSION = "log"


def render(view: View) -> str:
    """Write ``over`` and ``open`` lines of the rule sets that decide, then what is counted."""
    return "\n".join([*_over(view), *_open(view), view.summary]) + "\n"


def _over(view: View) -> Iterator[str]:
    for row in view.rows:
        if row.decides and row.verdict == "fail":
            yield f"over {place(row.tag, row.sheet)}: {_figures(row)} [{row.rule_set}]"


def _figures(row: Row) -> str:
    value = row.compared.text or row.value.text or "-"
    unit = f" {row.compared.unit}" if row.compared.unit else ""
    return f"{row.symbol} {value}, limit {row.against}{unit}; {row.verdict_text}"


def _open(view: View) -> Iterator[str]:
    for row in view.rows:
        if row.decides and row.open:
            why = f": {row.reasons[0]}" if row.reasons else ""
            yield (
                f"open {place(row.tag, row.sheet)}: {row.symbol} {row.verdict_text}{why} "
                f"[{row.rule_set}]"
            )
    for item in view.open_items:
        if item.what.startswith("finding: "):
            yield f"open {place(item.subject, item.sheet)}: {item.what}"
