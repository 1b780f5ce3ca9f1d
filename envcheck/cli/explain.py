"""``envcheck explain``: one element, assembly or detail, from layers to verdict."""

from __future__ import annotations

import click

from envcheck.cli import completing, options
from envcheck.errors import InputError, did_you_mean, one_of, problem
from envcheck.report import registry


@click.command()
@options.PROJECT
@click.argument("subject", metavar="TAG_OR_ASSEMBLY", shell_complete=completing.subjects)
@options.RULES
@options.one_of(registry.answering(), "text")
@options.OUTPUT
@options.UNITS
@click.option("--close", is_flag=True, help="Bounds ten times as close, where that takes time.")
def explain(
    project: str,
    subject: str,
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    units: str | None,
    close: bool,
) -> int:
    """Show how one element, assembly or detail of PROJECT comes to its value and its verdict.

    Every step can be repeated with a pocket calculator, to the last printed digit. The exit status
    is 0 whatever the verdict.

    \b
    A worked line:
      envcheck explain library.yaml N-W1 --units IP
    """
    from envcheck import pipeline
    from envcheck.report import explain as explained
    from envcheck.report.view import ViewOptions

    run = pipeline.run(project, rules, bounds=True, close=subject if close else "")
    known = explained.subjects(run.project)
    if subject not in known:
        hint = (
            did_you_mean(subject, known)
            or "name an element, an assembly or a detail of the project"
        )
        file, expected = run.project.file, one_of(known)
        raise InputError(
            [problem("unknown-element", file, None, name=subject, expected=expected, hint=hint)]
        )
    asked = ViewOptions(units=units or "", width=options.width(output))
    extras = pipeline.extras(run, subject)
    made = explained.build(
        run.project, run.rulesets, run.judged, subject, asked, pipeline.why, extras
    )
    options.answered(format_name, made, output, (project,))
    return 0
