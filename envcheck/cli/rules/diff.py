"""``envcheck rules diff``: two editions cell by cell."""

from __future__ import annotations

import click

from envcheck.cli import options
from envcheck.report import registry


@click.command()
@click.argument("a", metavar="A")
@click.argument("b", metavar="B")
@options.RULES
@options.one_of(registry.answering(), "text")
@options.OUTPUT
def diff(a: str, b: str, rules: tuple[str, ...], format_name: str, output: str | None) -> int:
    """Compare the limits of rule sets A and B (ids or folders) cell by cell.

    Each is taken with all that it amends, as if everything were in force; cells are matched by
    zone, row, metric, path and conditions, whatever their table is called. The exit status is 0.

    \b
    A worked line:
      envcheck rules diff rules/my-town-2024 rules/my-town-2027 --format csv -o changes.csv
    """
    from envcheck import typing_desk
    from envcheck.report import rules_diff

    first, second = (typing_desk.rule_set(typing_desk.folder_of(name, rules)) for name in (a, b))
    changes = typing_desk.differences(first, second)
    options.answered(format_name, rules_diff.build(first, second, changes), output, ())
    return 0
