"""Options that several commands share."""

from __future__ import annotations

import os
import sys
from collections.abc import Callable, Iterable
from typing import TYPE_CHECKING, Any, TypeVar

import click

if TYPE_CHECKING:
    from envcheck.model.project import Project
    from envcheck.report.answer import Answer
    from envcheck.report.registry import Format
    from envcheck.report.view import View

PROJECT = click.argument("project", type=click.Path(allow_dash=True))
RULES = click.option(
    "--rules",
    "rules",
    multiple=True,
    metavar="DIR",
    type=click.Path(exists=True, file_okay=False),
    help="Folder that holds rule sets; may be given several times. Without it, the nearest "
    "folder 'rules' at or above the project file.",
)
UNITS = click.option(
    "--units",
    type=click.Choice(["SI", "IP"], case_sensitive=False),
    metavar="SI|IP",
    help="Units of the report. Without it, the project's, else those of the rule set.",
)
OUTPUT = click.option(
    "-o",
    "--output",
    metavar="FILE",
    type=click.Path(dir_okay=False),
    help="Write to FILE, whole or not at all, and not to standard output.",
)
COLOR = click.option(
    "--color",
    type=click.Choice(["auto", "always", "never"]),
    default="auto",
    show_default=True,
    help="Colour beside the words of the text format; NO_COLOR is honoured.",
)
Function = TypeVar("Function", bound=Callable[..., Any])
WIDTH = 100
NARROWEST = 72


def one_of(names: tuple[str, ...], default: str) -> Callable[[Function], Function]:
    """Make the option ``--format`` from the names that the registry knows."""
    return click.option(
        "-f",
        "--format",
        "format_name",
        type=click.Choice(names),
        default=default,
        show_default=True,
        help="Form of the report.",
    )


def answered(format_name: str, made: Answer, output: str | None, inputs: tuple[str, ...]) -> None:
    """Lay out what a command other than ``check`` says, and deliver it."""
    from envcheck.cli.writing import deliver
    from envcheck.report import registry

    lay_out = registry.format_named(format_name).answer
    assert lay_out is not None, "the option offers only formats that have one"
    deliver(lay_out(made, width(output)), output, inputs)


def rendered(form: Format, view: View) -> str | bytes:
    """Lay a view out. Errors: click.ClickException where the library of an extra is missing."""
    from envcheck.report.registry import MissingExtra

    try:
        return form.render(view)
    except MissingExtra as missing:
        raise click.ClickException(
            f"the format {form.name} needs {missing.library}, which is not installed. "
            f"Fix: pip install 'envcheck[{missing.extra}]'"
        ) from missing


def colour(choice: str, output: str | None) -> bool:
    """Decide on colour: the option, then NO_COLOR, FORCE_COLOR, then whether a person reads."""
    if choice != "auto":
        return choice == "always"
    if output or os.environ.get("NO_COLOR"):
        return False
    return bool(os.environ.get("FORCE_COLOR")) or sys.stdout.isatty()


def width(output: str | None) -> int:
    """Width of the text format: 100 columns, less only on a narrower terminal."""
    if output or not sys.stdout.isatty():
        return WIDTH
    try:
        columns = os.get_terminal_size(sys.stdout.fileno()).columns
    except OSError:
        return WIDTH
    return max(NARROWEST, min(WIDTH, columns))


def known_subjects(project: Project, wanted: Iterable[str]) -> None:
    """Refuse a name that is neither an element nor an assembly. Errors: InputError, all at once."""
    from envcheck.errors import InputError, did_you_mean, one_of, problem

    known = (*project.elements, *project.assemblies)
    problems = [
        problem(
            "unknown-element", project.file, None, name=name, expected=one_of(known),
            hint=did_you_mean(name, known) or "name an element or an assembly of the project",
        )
        for name in wanted
        if name not in known
    ]  # fmt: skip
    if problems:
        raise InputError(problems)
