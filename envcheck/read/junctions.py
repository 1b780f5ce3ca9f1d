"""Kinds of junctions that a building has, and the bridges that count them."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck.model.project import Assembly, Element, Junction
from envcheck.read.context import NAN, Context
from envcheck.read.materials import rows
from envcheck.read.yaml_reader import Entry


def read_junction(context: Context, name: str, entry: Entry, bridges: Sequence[str]) -> Junction:
    """Read one kind of junction; ``bridges`` are the titles that may count it."""
    known = rows("junctions")
    row = known.get(name)
    if row is None:
        context.unknown("unknown-junction", entry.line, name, known)
    counted_as = entry.get("counted_as", "")
    if counted_as and counted_as not in bridges:
        context.unknown("unknown-bridge", entry.lines["counted_as"], counted_as, bridges)
    return Junction(
        id=name,
        title=row["title"] if row is not None else name,
        sheet=entry.get("sheet", ""),
        length=context.positive(entry, "length", "length") if "length" in entry else None,
        counted_as=counted_as,
        reason=entry.get("reason", ""),
        band=(float(row["low"]), float(row["high"])) if row is not None else (NAN, NAN),
        line=entry.line,
    )


def bridge_titles(assemblies: Iterable[Assembly], elements: Iterable[Element]) -> tuple[str, ...]:
    """Titles of all bridges of the file, each once."""
    bridges = [bridge for one in assemblies for bridge in one.bridges]
    bridges += [bridge for one in elements for bridge in one.bridges]
    return tuple(dict.fromkeys(bridge.title for bridge in bridges))
