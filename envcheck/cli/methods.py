"""``envcheck methods``: list the calculation methods."""

from __future__ import annotations

import click

from envcheck.cli import options


@click.command()
@click.argument("name", required=False)
@options.OUTPUT
def methods(name: str | None, output: str | None) -> int:
    """List every method with formula, source and range, or one of that NAME.

    A rule set prescribes a method by its name under 'conventions: methods:'.

    \b
    A worked line:
      envcheck methods parallel_path
    """
    from envcheck.cli.writing import deliver
    from envcheck.errors import did_you_mean, one_of
    from envcheck.report import listing
    from envcheck.solve import registry

    known = registry.methods()
    if name is not None and name not in known:
        hint = did_you_mean(name, known) or one_of(known)
        raise click.ClickException(f"{name!r} is no method. Fix: {hint}")
    prescribable = registry.prescribable()
    chosen = [known[name]] if name else list(known.values())
    rows = [(m.name, m.title, m.formula, m.source, m.valid, m.name in prescribable) for m in chosen]
    deliver(listing.methods(rows, options.width(output)), output)
    return 0
