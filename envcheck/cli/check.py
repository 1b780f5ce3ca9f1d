"""``envcheck check``: the main job."""

from __future__ import annotations

from datetime import datetime
from typing import TYPE_CHECKING

import click

from envcheck.cli import completing, options
from envcheck.cli.progress import progress
from envcheck.cli.writing import deliver
from envcheck.report import registry

if TYPE_CHECKING:
    from envcheck.report.registry import Format
    from envcheck.report.view import ViewOptions

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
    "--moisture", is_flag=True, help="Advisory check by ISO 13788, by months; no verdict."
)
@click.option(
    "--fail-on",
    type=click.Choice(["over", "open"]),
    default="over",
    show_default=True,
    help="With 'open', exit status 1 also where lines are only open.",
)
@click.option(
    "--only",
    multiple=True,
    metavar="TAG",
    shell_complete=completing.tags,
    help="Show only the lines of this tag or pattern ('N-*'); may be given several times. The "
    "whole building is judged; summary and exit status speak of these lines.",
)
@click.option(
    "--watch",
    is_flag=True,
    help="Check again whenever the project or its rule sets change, until Ctrl-C.",
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
    moisture: bool,
    fail_on: str,
    only: tuple[str, ...],
    watch: bool,
) -> int:
    """Hold every element of PROJECT against its limit and print a row per line.

    PROJECT is a project file, or - for standard input.

    \b
    A worked line:
      envcheck check library.yaml --rules rules --units SI --output report.txt
    """
    if watch and project == "-":
        raise click.UsageError("--watch needs a project file, not standard input")

    def once() -> int:
        from envcheck.report.view import ViewOptions

        form = registry.format_named(format_name)
        asked = ViewOptions(
            units=units or "",
            date=date.date().isoformat() if date else "",
            colour=options.colour(color, output),
            width=options.width(output),
            details=details or form.details,
            workings=form.workings,
            bounds=bounds,
            only=only,
            moisture=moisture,
        )
        status = _checked(project, rules, form, asked, output)
        return OVER if status == OPEN and fail_on == "open" else status

    if not watch:
        return once()
    from envcheck.cli.watching import until_interrupted

    return until_interrupted(project, rules, once)


def _checked(
    project: str, rules: tuple[str, ...], form: Format, asked: ViewOptions, output: str | None
) -> int:
    """One check: run it, lay it out, write it; its exit status."""
    from envcheck import pipeline
    from envcheck.report import view

    with progress(f"checking {project}"):
        run = pipeline.run(project, rules, asked.bounds)
        if asked.only:
            total = sum(line.decides for line in run.judged.lines)
            run, asked = pipeline.only(run, asked.only), asked._replace(total=total)
        advisory = pipeline.moisture(run) if asked.moisture else None
        seen = view.build(run.project, run.rulesets, run.judged, asked, advisory)
        made = options.rendered(form, seen)
    deliver(made, output, (project,))
    return run.exit_status
