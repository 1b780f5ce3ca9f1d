"""``envcheck room``: how far the numbers of a drawing may move."""

from __future__ import annotations

import click

from envcheck.cli import completing, options
from envcheck.report import registry


@click.command()
@options.PROJECT
@click.argument(
    "wanted", metavar="[TAG_OR_ASSEMBLY]...", nargs=-1, shell_complete=completing.subjects
)
@options.RULES
@options.one_of(registry.answering(), "text")
@options.OUTPUT
@options.UNITS
def room(
    project: str,
    wanted: tuple[str, ...],
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    units: str | None,
) -> int:
    """Say how far each number of an assembly may move before its lines are over their limit.

    The largest framing share, the densest fasteners, the worst psi, the thinnest layer that still
    pass; and for lines over their limit what insulation alone cannot cure. The exit status is 0.

    \b
    A worked line:
      envcheck room review.yaml W4
    """
    from envcheck import pipeline
    from envcheck.report import room as page
    from envcheck.report.view import ViewOptions

    run = pipeline.run(project, rules)
    options.known_subjects(run.project, wanted)
    asked = ViewOptions(units=units or "", width=options.width(output))
    found = pipeline.rooms(run, wanted)
    made = page.build(run.project, run.rulesets, found, asked)
    options.answered(format_name, made, output, (project,))
    return 0
