"""``envcheck new``: a commented project to start from."""

from __future__ import annotations

from pathlib import Path

import click

from envcheck.cli.schema import FILES
from envcheck.cli.writing import write_whole

TEMPLATES = Path(__file__).parent / "templates"
RULE_SET = "example-town"


@click.command()
@click.argument("file", type=click.Path())
@click.option(
    "--with-rules",
    is_flag=True,
    help=f"Write the invented rule set '{RULE_SET}' into a folder 'rules' beside FILE.",
)
def new(file: str, with_rules: bool) -> int:
    """Write a commented project of 30 lines to FILE, ready to be changed.

    Nothing that exists is overwritten. With --with-rules the project can be checked at once; the
    limits are invented, so put those of your code in their place.

    \b
    A worked line:
      envcheck new garden-room.yaml --with-rules
    """
    target = Path(file)
    made = {target: _template("project.yaml", "project")}
    if with_rules:
        folder = target.parent / "rules" / RULE_SET
        made[folder / "ruleset.yaml"] = _template("rules/ruleset.yaml", "rules")
        made[folder / "table-1.csv"] = _template("rules/table-1.csv", "")
    try:
        for path in made:
            if path.exists() or path.is_symlink():
                raise click.ClickException(f"{path}: exists already. Fix: name another file")
        for path, text in made.items():
            if path is not target:
                path.parent.mkdir(parents=True, exist_ok=True)
            write_whole(text, path)
    except OSError as error:
        reason = error.strerror or str(error)
        raise click.ClickException(f"{file}: cannot be written ({reason})") from error
    for path in made:
        click.echo(f"wrote {path}", err=True)
    click.echo(f"next: envcheck check {file}", err=True)
    return 0


def _template(name: str, schema: str) -> str:
    """A template; its first line tells editors where the schema lies on this machine."""
    text = (TEMPLATES / name).read_text(encoding="utf-8")
    if not schema:
        return text
    place = FILES[schema].resolve().as_uri()
    return text.replace("SCHEMA", place, 1)
