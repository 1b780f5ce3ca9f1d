"""The page for a desk: the first sheet decides, everything that explains it comes after.

Formats that are printed and read away from the terminal lay this page out.
"""

from __future__ import annotations

from envcheck.report import by_line, main_table, outline, wording
from envcheck.report.parts import Facts, Items, Page, Paragraph, Section
from envcheck.report.view import View

OVER = "Lines over their limit, and open lines"


def page(view: View) -> Page:
    """Lay the view out, first what a reader must decide on."""
    return Page(
        view.title,
        (
            Section("", (Paragraph(view.summary), Facts(view.facts))),
            *outline.where(view),
            *_unsettled(view),
            *outline.open_items(view),
            *outline.tables(view),
            *outline.why_over(view),
            *outline.beside_the_lines(view),
            *_trails(view),
            *outline.what_it_rests_on(view),
        ),
    )


def _trails(view: View) -> tuple[Section, ...]:
    """How the limit of each line was found; lines of one trail together."""
    entries = by_line.grouped(
        (
            by_line.place(row.tag, row.sheet),
            f"{row.symbol} {row.limit}" if row.limit else f"{row.symbol}: no limit found",
            tuple(f"{pair.label}: {pair.text}" for pair in row.trail),
        )
        for row in view.rows
    )
    return (Section("How each limit was found", (Items(entries),)),) if entries else ()


def _unsettled(view: View) -> tuple[Section, ...]:
    """Lines that decide and are over their limit or open; "none" where there are none."""
    rows = [row for row in view.rows if row.decides and (row.open or row.verdict == "fail")]
    if not rows:
        return (Section(OVER, (Paragraph(wording.NOTHING),)),)
    apart = any(rules.printed_units for rules in view.rule_sets if rules.decides)
    return (Section(OVER, (main_table.grid(rows, apart, view.bounds),)),)
