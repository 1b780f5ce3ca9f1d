"""A trade-off laid out: the two sums, what they wait for, and every line in them."""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.report import wording
from envcheck.report.groups import GroupView, PartView
from envcheck.report.parts import Block, Entry, Grid, Items, Paragraph, Section

MOST_TAGS = 24


def section(group: GroupView) -> Section:
    """One sum; the worst contributor first."""
    head = f"{group.title[0].upper()}{group.title[1:]}"
    lines = [group.state_text]
    lines += [f"waits for {why}" for why in _waits(group.waits)]
    lines += [f"worst contributors: {worst}"] if (worst := _worst(group.parts)) else []
    entries = [Entry(group.sum or wording.NOTHING, tuple(lines))]
    entries += [Entry(f"charged: {text}") for text in group.charges]
    entries += [Entry(f"left out: {tag}: {why}") for tag, why in group.left_out]
    entries += [Entry(f"rule: {group.rule}")] if group.rule else []
    blocks: list[Block] = [Items(tuple(entries))]
    if group.parts:
        unit = group.parts[0].drawn.unit
        note = f"As drawn: amount times value; by the table: amount times limit; in {unit}."
        blocks += [_grid(group.parts), Paragraph(note)]
    return Section(head, tuple(blocks))


def _waits(waits: Sequence[str]) -> list[str]:
    """What it waits for, tags of the same want together."""
    found: dict[str, list[str]] = {}
    for why in waits:
        want, _, tag = why.rpartition(" of ")
        found.setdefault(want or why, []).append(tag if want else "")
    return [
        f"{want} of {wording.listed(tags, MOST_TAGS)}" if tags != [""] else want
        for want, tags in found.items()
    ]


def _worst(parts: Sequence[PartView]) -> str:
    """Contributors above their limit, the worst first."""
    unit = next((part.difference.unit for part in parts), "")
    over = [p for p in parts if p.difference.text.startswith("+")]
    return f"{', '.join(f'{p.assembly} {p.difference.text}' for p in over)} {unit}" if over else ""


def _grid(parts: Sequence[PartView]) -> Grid:
    return Grid(
        heads=("lines", "amount", "value", "limit", "as drawn", "by the table", "difference"),
        rows=tuple(
            (
                f"{part.assembly}: {wording.listed(part.elements, MOST_TAGS)}",
                f"{part.amount.text} {part.amount.unit}",
                f"{part.symbol} {part.value.text}",
                part.limit.text,
                part.drawn.text,
                part.table.text,
                part.difference.text,
            )
            for part in parts
        ),
        right=(1, 2, 3, 4, 5, 6),
        wrap=(0,),
    )
