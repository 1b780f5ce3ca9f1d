"""``envcheck compare``: what changed from one revision to the next."""

from __future__ import annotations

import click

from envcheck.cli import options
from envcheck.cli.progress import progress
from envcheck.report import registry


@click.command()
@click.argument("old", type=click.Path(allow_dash=True))
@click.argument("new", type=click.Path(allow_dash=True))
@options.RULES
@options.one_of(registry.answering(), "text")
@options.OUTPUT
@options.UNITS
def compare(
    old: str,
    new: str,
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    units: str | None,
) -> int:
    """Say which lines changed from OLD to NEW, and what in the project caused it.

    OLD and NEW are two revisions of a project file, or the project as designed and as built; each
    is judged by its own rule sets. Elements are matched by their tags. The exit status is 0
    whatever changed.

    \b
    A worked line:
      envcheck compare review.yaml permit.yaml --format html --output changes.html
    """
    from envcheck import pipeline
    from envcheck.report import revisions
    from envcheck.report.view import ViewOptions

    if old == new == "-":
        raise click.UsageError("one of the two may be standard input, not both")
    asked = ViewOptions(units=units or "", width=options.width(output))
    with progress(f"comparing {old} and {new}"):
        before, now = pipeline.run_both(old, new, rules)
        made = revisions.build(
            revisions.Side(before.project, before.rulesets),
            revisions.Side(now.project, now.rulesets),
            pipeline.compared(before, now),
            asked,
        )
    options.answered(format_name, made, output, (old, new))
    return 0
