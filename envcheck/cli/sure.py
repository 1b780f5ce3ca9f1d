"""``envcheck sure``: which inputs a verdict hangs on."""

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
def sure(
    project: str,
    wanted: tuple[str, ...],
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    units: str | None,
) -> int:
    """Say which stated numbers decide each verdict, and so need documents.

    Each is moved within its stated range, the band of its class or of its kind of evidence.
    Information, never a verdict. The exit status is 0.

    \b
    A worked line:
      envcheck sure review.yaml W4
    """
    from envcheck import pipeline
    from envcheck.report import sure as page
    from envcheck.report.view import ViewOptions

    run = pipeline.run(project, rules)
    options.known_subjects(run.project, wanted)
    asked = ViewOptions(units=units or "", width=options.width(output))
    found = pipeline.sureness(run, wanted)
    made = page.build(run.project, run.rulesets, found, asked)
    options.answered(format_name, made, output, (project,))
    return 0
