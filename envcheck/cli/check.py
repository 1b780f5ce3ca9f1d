"""``envcheck check``: the main job."""

from __future__ import annotations

from datetime import datetime

import click

from envcheck.cli import options
from envcheck.cli.writing import deliver
from envcheck.report import registry

OVER, OPEN = 1, 3


@click.command()
@options.PROJECT
@options.RULES
@options.one_of(registry.names(), "text")
@options.OUTPUT
@options.UNITS
@click.option(
    "--date",
    type=click.DateTime(["%Y-%m-%d"]),
    metavar="YYYY-MM-DD",
    help="Date to print on the report in place of the project's.",
)
@options.COLOR
@click.option("--bounds", is_flag=True, help="A column with the bounds of each drawn assembly.")
@click.option("--details", is_flag=True, help="Every assembly with its layers and their sources.")
@click.option(
    "--fail-on",
    type=click.Choice(["over", "open"]),
    default="over",
    show_default=True,
    help="With 'open', exit status 1 also where lines are only open.",
)
def check(
    project: str,
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    units: str | None,
    date: datetime | None,
    color: str,
    bounds: bool,
    details: bool,
    fail_on: str,
) -> int:
    """Hold every element of PROJECT against its limit and print a row per line.

    PROJECT is a project file, or - for standard input.

    \b
    A worked line:
      envcheck check library.yaml --rules rules --units SI --output report.txt
    """
    from envcheck import pipeline
    from envcheck.report import view

    run = pipeline.run(project, rules, bounds)
    form = registry.format_named(format_name)
    asked = view.ViewOptions(
        units=units or "",
        date=date.date().isoformat() if date else "",
        colour=options.colour(color, output),
        width=options.width(output),
        details=details or form.details,
        workings=form.workings,
        bounds=bounds,
    )
    made = options.rendered(form, view.build(run.project, run.rulesets, run.judged, asked))
    deliver(made, output, (project,))
    return OVER if run.exit_status == OPEN and fail_on == "open" else run.exit_status
