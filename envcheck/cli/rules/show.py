"""``envcheck rules show``: sheets as printed, one zone's limits, or every cell in long form."""

from __future__ import annotations

import click

from envcheck.cli import options
from envcheck.cli.writing import deliver
from envcheck.report import registry


@click.command()
@click.argument("id_or_folder", metavar="ID_OR_FOLDER")
@options.RULES
@options.one_of(registry.answering(), "text")
@options.OUTPUT
@click.option("--zone", metavar="ZONE", help="The limits of one zone on one page.")
@click.option("--long", "every_cell", is_flag=True, help="Every cell in long form, as CSV.")
def show(
    id_or_folder: str,
    rules: tuple[str, ...],
    format_name: str,
    output: str | None,
    zone: str | None,
    every_cell: bool,
) -> int:
    """Print the sheets of a rule set back in printed layout, to be initialled beside the law.

    Without --rules, an ID is looked up in the nearest folder 'rules'. The long form has a record
    for each limit that a cell gives, with what the rule set amends folded in.

    \b
    A worked line:
      envcheck rules show rules/merrow-2025 --format html --output merrow.html
    """
    from envcheck import typing_desk
    from envcheck.report import rules_show

    if zone is not None and every_cell:
        raise click.UsageError("--zone and --long exclude each other")
    folder = typing_desk.folder_of(id_or_folder, rules)
    typed = typing_desk.typed_set(folder)
    if every_cell and format_name not in ("text", "csv", "json"):
        raise click.UsageError("--long is CSV, or with --format json the same records")
    if zone is not None:
        _known(typed.zones, typed.members, zone)
    answer = registry.format_named(_form(format_name, every_cell)).answer
    assert answer is not None
    if every_cell:
        made = rules_show.long(typed)
    else:
        made = rules_show.zone(typed, zone) if zone is not None else rules_show.sheets(typed)
    deliver(answer(made, options.width(output)), output)
    return 0


def _form(format_name: str, every_cell: bool) -> str:
    return "csv" if every_cell and format_name == "text" else format_name


def _known(zones: tuple[str, ...], members: object, zone: str) -> None:
    from envcheck.errors import did_you_mean, one_of, visible

    known = dict.fromkeys(zones)
    if isinstance(members, dict):
        known |= dict.fromkeys(m for of in members.values() for m in of)
    if zone not in known:
        hint = did_you_mean(zone, known) or one_of(known) if known else "the set has no zones"
        raise click.UsageError(f"{visible(zone)!r} is no zone of the rule set. Fix: {hint}")
