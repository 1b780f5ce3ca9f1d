"""Shell completion of tags, assemblies and details, from the project on the command line."""

from __future__ import annotations

from pathlib import Path

import click

MOST = 2_000_000
"""Bytes of a project file that are looked through."""


def tags(context: click.Context, parameter: click.Parameter, incomplete: str) -> list[str]:
    """Tags of elements that begin with what is typed."""
    return _names(context, incomplete, ("elements",))


def subjects(context: click.Context, parameter: click.Parameter, incomplete: str) -> list[str]:
    """Tags, assemblies and details that begin with what is typed."""
    return _names(context, incomplete, ("elements", "assemblies", "details"))


def _names(context: click.Context, incomplete: str, sections: tuple[str, ...]) -> list[str]:
    from envcheck.read.names_of import names_of

    # behind an option that waits for its value, click has not read the arguments yet
    project = context.params.get("project") or next(iter(context.args), None)
    if not project or project == "-":
        return []
    try:
        with Path(project).open("rb") as file:
            text = file.read(MOST).decode("utf-8", "replace")
    except OSError:
        return []
    return [name for name in names_of(text, sections) if name.startswith(incomplete)]
