"""``envcheck rules new``: a rule-set folder to type a table into."""

from __future__ import annotations

import re
import shutil
import tempfile
from collections.abc import Iterable
from datetime import date
from pathlib import Path
from string import Template

import click

from envcheck.cli.schema import FILES
from envcheck.cli.writing import write_whole

DIRECTIONS = ("zones-across", "zones-down", "one-sheet-per-zone", "none")
TEMPLATE = Path(__file__).parent.parent / "templates" / "rules" / "new.yaml"
MOST_ZONES = 50


@click.command()
@click.argument("id", metavar="ID")
@click.option(
    "--direction",
    type=click.Choice(DIRECTIONS),
    default=DIRECTIONS[0],
    show_default=True,
    help="Where the zones stand in the print.",
)
@click.option(
    "--zones",
    default="Zone 1,Zone 2",
    show_default=True,
    metavar="Z,Z,...",
    help="Printed zones, warm to cold.",
)
@click.option(
    "--metrics",
    default="U_assembly,U_product",
    show_default=True,
    metavar="M,M,...",
    help="What the figures are: U_assembly, R_insulation, C_factor, F_factor, U_product, SHGC ...",
)
@click.option(
    "--rows",
    "categories",
    metavar="C,C,...",
    default="",
    help="Rows as envcheck categories. Without it, four common ones.",
)
@click.option(
    "--units",
    type=click.Choice(["SI", "IP"], case_sensitive=False),
    default="IP",
    metavar="SI|IP",
    show_default=True,
    help="Units of the print.",
)
@click.option(
    "--decimal",
    type=click.Choice([".", ","]),
    default=".",
    show_default=True,
    help="Decimal mark of the print; with a comma, columns are parted by semicolons.",
)
@click.option(
    "--in",
    "parent",
    metavar="DIR",
    type=click.Path(file_okay=False),
    default="rules",
    show_default=True,
    help="Folder of rule sets to write into.",
)
def new(
    id: str,
    direction: str,
    zones: str,
    metrics: str,
    categories: str,
    units: str,
    decimal: str,
    parent: str,
) -> int:
    """Write a rule-set folder named ID with commented ruleset.yaml and empty sheets.

    Nothing that exists is overwritten. `envcheck rules lint` then names every cell that is still to
    be typed, and nothing else.

    \b
    A worked line:
      envcheck rules new my-town --zones "A,B,C" --metrics U_assembly,R_insulation --units SI
    """
    from envcheck.cli.rules.layout import ROWS, Layout, texts
    from envcheck.model.metrics import METRICS
    from envcheck.read.materials import categories as known

    if not re.fullmatch(r"[a-z0-9][a-z0-9-]*", id):
        raise click.UsageError("ID is of lower-case letters, digits and hyphens, such as my-town")
    titles = {name: category.title for name, category in known().items()}
    named = () if direction == "none" else _names(zones, "--zones")
    rows = _known(_names(categories, "--rows"), titles, "--rows") if categories else ROWS
    asked = _known(_names(metrics, "--metrics"), METRICS, "--metrics")
    layout = Layout(direction, named, asked, rows, units.upper(), decimal, titles)
    fields, sheets = texts(layout)
    if not sheets:
        raise click.UsageError("no row takes one of the metrics. Fix: name rows with --rows")
    text = Template(TEMPLATE.read_text(encoding="utf-8")).substitute(
        fields, id=id, today=date.today().isoformat()
    )
    text = text.replace("SCHEMA", FILES["rules"].resolve().as_uri(), 1)
    _write(Path(parent) / id, {"ruleset.yaml": text, **sheets})
    return 0


def _names(text: str, option: str) -> tuple[str, ...]:
    found = tuple(name.strip() for name in text.split(","))
    twice = len(set(found)) < len(found)
    if twice or len(found) > MOST_ZONES or not all(n and n.isprintable() for n in found):
        raise click.UsageError(
            f"{option} needs different names parted by commas, at most {MOST_ZONES}"
        )
    return found


def _known(names: tuple[str, ...], known: Iterable[str], option: str) -> tuple[str, ...]:
    from envcheck.errors import did_you_mean, one_of, visible

    for name in names:
        if name not in known:
            hint = did_you_mean(name, known) or one_of(known)
            raise click.UsageError(f"{option}: {visible(name)!r} is not known. Fix: {hint}")
    return names


def _write(folder: Path, files: dict[str, str]) -> None:
    """Write the folder whole or not at all."""
    made = None
    try:
        if folder.exists() or folder.is_symlink():
            raise click.ClickException(f"{folder}: exists already. Fix: name another ID")
        folder.parent.mkdir(parents=True, exist_ok=True)
        made = Path(tempfile.mkdtemp(prefix=f".{folder.name}.", dir=folder.parent))
        for name, text in files.items():
            write_whole(text, made / name)
        made.chmod(folder.parent.stat().st_mode & 0o777)
        made.rename(folder)
    except OSError as error:
        reason = error.strerror or str(error)
        raise click.ClickException(f"{folder}: cannot be written ({reason})") from error
    finally:
        if made is not None and made.exists():
            shutil.rmtree(made, ignore_errors=True)
    for name in files:
        click.echo(f"wrote {folder / name}", err=True)
    click.echo(f"next: type the sheets, then envcheck rules lint {folder}", err=True)
