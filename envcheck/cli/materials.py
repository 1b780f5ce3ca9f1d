"""``envcheck materials``: search the materials that come along."""

from __future__ import annotations

import click

from envcheck.cli import options


@click.command()
@click.argument("words", nargs=-1)
@click.option(
    "--units",
    type=click.Choice(["SI", "IP"], case_sensitive=False),
    metavar="SI|IP",
    default="SI",
    show_default=True,
    help="Units of the list.",
)
@options.OUTPUT
def materials(words: tuple[str, ...], units: str, output: str | None) -> int:
    """List the materials whose id, title or class holds every one of WORDS; all without words.

    Each value has its source. Values of a label or a test are better: write them into the project.

    \b
    A worked line:
      envcheck materials brick --units IP
    """
    from envcheck.cli.writing import deliver
    from envcheck.read.materials import library_material, material_ids
    from envcheck.report import listing

    found = [m for name in material_ids() if (m := library_material(name)) is not None]
    wanted = [word.casefold() for word in words]
    found = [
        material
        for material in found
        if all(
            word in f"{material.id} {material.title} {material.material_class}".casefold()
            for word in wanted
        )
    ]
    if not found:
        raise click.ClickException(
            f"no material holds {' and '.join(map(repr, words))}. Fix: try one word, or describe "
            "the material in your project under 'materials:'"
        )
    deliver(listing.materials(found, units, options.width(output)), output)
    return 0
