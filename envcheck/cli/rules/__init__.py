"""``envcheck rules``: tools for whoever types tables. One small file per command."""

from __future__ import annotations

import click

from envcheck.cli import CONTEXT, LazyGroup

COMMANDS = {
    "new": ("envcheck.cli.rules.new:new", "Write a rule-set folder to type a table into."),
    "lint": ("envcheck.cli.rules.lint:lint", "Find what looks wrong in typed tables."),
    "show": (
        "envcheck.cli.rules.show:show",
        "Print sheets back, a zone's limits, or every cell.",
    ),
    "diff": ("envcheck.cli.rules.diff:diff", "Compare two editions cell by cell."),
    "lock": ("envcheck.cli.rules.lock:lock", "Note who checked the sheets, and when."),
}


class RulesGroup(LazyGroup):
    """The commands of this folder."""

    table = COMMANDS


@click.group(cls=RulesGroup, context_settings=CONTEXT)
def rules() -> None:
    """Type limit tables, find slips in them, print them back, compare and lock them.

    The order of work: new, type, lint, show (a second person initials the print-out beside the
    law), lock.

    \b
    A worked line:
      envcheck rules lint rules/merrow-2025
    """
