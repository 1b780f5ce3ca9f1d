"""Tables by the library ``tabulate``, which is loaded with the first table that is laid out."""

from __future__ import annotations

from collections.abc import Collection, Sequence


def lines(
    rows: Sequence[Sequence[str]], right: Collection[int], form: str, heads: Sequence[str] = ()
) -> list[str]:
    """Lay out cells of a single line each; text stays text, however much it is like a number.

    right: columns set flush right. form: a table form of ``tabulate``.
    """
    from tabulate import tabulate  # costs more to load than the rest of a small report

    if not rows and not heads:
        return []
    sides = ["right" if n in right else "left" for n in range(len(heads or rows[0]))]
    table = tabulate(rows, heads, tablefmt=form, disable_numparse=True, colalign=sides)
    return table.splitlines()
