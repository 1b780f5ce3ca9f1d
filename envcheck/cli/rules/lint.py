"""``envcheck rules lint``: what looks wrong in typed tables."""

from __future__ import annotations

import click

from envcheck.cli import options
from envcheck.report import registry

ERRORS = 2


@click.command()
@click.argument("folders", nargs=-1, required=True, type=click.Path(), metavar="FOLDER...")
@options.one_of(registry.answering(), "text")
@options.OUTPUT
def lint(folders: tuple[str, ...], format_name: str, output: str | None) -> int:
    """Find errors and implausible figures in the rule sets of FOLDER.

    FOLDER is a rule set, or a folder that holds some. Errors stop a check until they are mended.
    Remarks never do: compare each with the printed page, and where it is printed so, confirm it in
    ruleset.yaml with a reason, such as confirmed: {"L05 T1/wall.mass/Zone 2": read twice}.

    Exit status: 0 no error (remarks or none), 2 errors or usage.

    \b
    A worked line:
      envcheck rules lint rules --format json --output lint.json
    """
    from envcheck import typing_desk
    from envcheck.report import rules_lint

    found = typing_desk.lint_folders(folders)
    entries = [(x.folder, x.set, x.faults) for x in found]
    options.answered(format_name, rules_lint.build(entries), output, ())
    return ERRORS if any(x.errors for x in found) else 0
