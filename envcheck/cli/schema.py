"""``envcheck schema``: the schema of a file format, for editors and programs."""

from __future__ import annotations

from pathlib import Path

import click

from envcheck.cli import options
from envcheck.cli.writing import deliver

PACKAGE = Path(__file__).parent.parent
FILES = {
    "project": PACKAGE / "read" / "schemas" / "project.schema.json",
    "rules": PACKAGE / "read" / "schemas" / "rules.schema.json",
    "report": PACKAGE / "report" / "schemas" / "report.schema.json",
    "explain": PACKAGE / "report" / "schemas" / "explain.schema.json",
}


@click.command()
@click.argument("name", type=click.Choice(list(FILES)))
@options.OUTPUT
def schema(name: str, output: str | None) -> int:
    """Print the JSON Schema (2020-12) of project files, rule sets or the JSON of check and explain.

    \b
    A worked line:
      envcheck schema project --output project.schema.json
    """
    deliver(FILES[name].read_text(encoding="utf-8"), output)
    return 0
