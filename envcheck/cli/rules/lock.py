"""``envcheck rules lock``: who checked the sheets, and when."""

from __future__ import annotations

from datetime import datetime

import click

from envcheck.cli.writing import write_whole


@click.command()
@click.argument("folder", type=click.Path())
@click.option("--checked-by", required=True, metavar="NAME", help="Who compared the sheets.")
@click.option(
    "--on",
    required=True,
    type=click.DateTime(["%Y-%m-%d"]),
    metavar="YYYY-MM-DD",
    help="When they were compared with the printed page.",
)
def lock(folder: str, checked_by: str, on: datetime) -> int:
    """Write the hashes of ruleset.yaml and of the sheets of FOLDER into its file ruleset.lock.

    Reports name who checked the set; once a file is changed they say so, and rules lint says which.
    A set with errors is not locked. A lock shows that files are the same, not that they are right.

    \b
    A worked line:
      envcheck rules lock rules/my-town --checked-by "Plan desk, two readers" --on 2026-11-30
    """
    from envcheck import typing_desk

    name = " ".join(checked_by.split())
    if not name or not name.isprintable():
        raise click.UsageError("--checked-by needs a name in printable letters")
    target, text = typing_desk.lock(typing_desk.folder_of(folder, ()), name, on.date())
    try:
        write_whole(text, target)
    except OSError as error:
        reason = error.strerror or str(error)
        raise click.ClickException(f"{target}: cannot be written ({reason})") from error
    click.echo(f"wrote {target}", err=True)
    return 0
