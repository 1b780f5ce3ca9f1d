"""``envcheck remedy``: what would bring a line within its limit."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path
from typing import TYPE_CHECKING

import click

from envcheck.cli import options
from envcheck.cli.writing import deliver
from envcheck.report import registry

if TYPE_CHECKING:
    from envcheck.model.advised import Advice, Change


@click.command()
@options.PROJECT
@options.RULES
@options.one_of(registry.answering(), "text")
@options.OUTPUT
@options.UNITS
@click.option(
    "--apply",
    "copy",
    metavar="FILE",
    type=click.Path(dir_okay=False),
    help="Write a copy of PROJECT with the changes of --take; the project itself stays.",
)
@click.option(
    "--take",
    multiple=True,
    metavar="CHANGE",
    help="A change by its name, such as W3/1; may be given several times. Without it, the first "
    "of each assembly.",
)
def remedy(
    project: str,
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    units: str | None,
    copy: str | None,
    take: tuple[str, ...],
) -> int:
    """Say for each line of PROJECT over its limit which change would bring it within.

    Every change is solved by the method that the code prescribes and judged like the drawing. The
    exit status is 0.

    \b
    A worked line:
      envcheck remedy review.yaml --take W3/3 --apply review-b.yaml
    """
    from envcheck import pipeline
    from envcheck.report import advice as page
    from envcheck.report.view import ViewOptions

    run = pipeline.run(project, rules)
    advice = pipeline.remedies(run)
    if copy is not None:
        _apply(project, copy, _taken(advice, take))
    elif take:
        raise click.UsageError("--take names changes for --apply FILE, which is missing")
    asked = ViewOptions(units=units or "", width=options.width(output))
    made = page.build(run.project, run.rulesets, advice, asked)
    options.answered(format_name, made, output, (project,))
    return 0


def _taken(advice: Sequence[Advice], take: Sequence[str]) -> list[Change]:
    """The changes that are asked for."""
    from envcheck.errors import did_you_mean, one_of
    from envcheck.report.advice import names

    known = {
        name: change
        for each in advice
        for name, change in zip(names(each), each.changes, strict=True)
    }
    for name in take:
        if name not in known:
            hint = did_you_mean(name, known) or one_of(known) or "no change is known"
            raise click.UsageError(f"{name!r} names no change. Fix: {hint}")
    if take:
        return [known[name] for name in take]
    return [each.changes[0] for each in advice if each.changes]


def _apply(project: str, copy: str, changes: list[Change]) -> None:
    from envcheck import pipeline
    from envcheck.read.edit import NotThere

    if project == "-":
        raise click.UsageError("--apply needs a project file, not standard input")
    text = Path(project).read_text(encoding="utf-8")
    try:
        deliver(pipeline.applied(text, changes), copy, (project,))
    except NotThere as missing:
        raise click.ClickException(
            f"{project}: {missing} is not stated there, so it cannot be changed. "
            "Fix: state it, or take another change"
        ) from missing
