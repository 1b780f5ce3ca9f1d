"""The moisture check as sections of a page."""

from __future__ import annotations

from collections.abc import Iterable

from envcheck.model.moisture import MONTHS
from envcheck.report import wording
from envcheck.report.moisture import CheckView, MoistureView, MonthView
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Pair, Paragraph, Section
from envcheck.report.worksheet import Line

HEADING = "Moisture check (advisory)"


def sections(view: CheckView) -> tuple[Section, ...]:
    """Lay the check out: the air first, then a section for each assembly."""
    blocks: list[Block] = [Paragraph(view.scope)]
    if view.missing:
        blocks.append(
            Items(tuple(Entry(f"not computed; missing: {each}") for each in view.missing))
        )
        return (Section(HEADING, tuple(blocks)),)
    pairs = [Pair("outdoor air", view.outdoors), Pair("air of the rooms", view.indoors)]
    if view.critical_month:
        pairs.append(Pair("critical month", f"{view.critical_month}, f_min = {view.critical.text}"))
    if view.not_checked:
        words = "no layers, no outdoor air beyond, or no line shown here"
        pairs.append(Pair("not checked", f"{wording.listed(view.not_checked, 30)} ({words})"))
    blocks += [Facts(tuple(pairs)), _air(view.months)]
    if view.worksheet:
        blocks.append(_sums(view.worksheet))
    each = (
        Section(f"Moisture, {one.assembly}: {one.title}", tuple(_blocks(one)), 3)
        for one in view.assemblies
    )
    return (Section(HEADING, tuple(blocks)), *each)


def _air(months: tuple[MonthView, ...]) -> Grid:
    heads = ("month", "T out", "p out", "T in", "p in", "T_si,min", "f_min")
    unit = months[0]
    labels = ("", *(f", {figure.unit}" if figure.unit else "" for figure in unit[1:]))
    return Grid(
        tuple(f"{head}{label}" for head, label in zip(heads, labels, strict=True)),
        tuple((one.month, *(figure.text for figure in one[1:])) for one in months),
        (1, 2, 3, 4, 5, 6),
    )


def _blocks(one: MoistureView) -> Iterable[Block]:
    pairs = [("drawn on", one.sheet), ("used by", wording.listed(one.elements, 30))]
    yield Facts(tuple(Pair(label, text) for label, text in pairs if text))
    if one.missing:
        yield _missing(one.missing)
        return
    if one.withheld:
        yield Items((Entry("no favourable statement is made for this assembly:", one.withheld),))
    yield Items(tuple(map(Entry, one.says)))
    yield _layers(one)
    if one.faces:
        yield _amounts(one)
    if one.worksheet:
        yield _sums(one.worksheet)


def _missing(texts: Iterable[str]) -> Items:
    return Items(tuple(Entry(f"not computed; missing: {each}") for each in texts))


def _layers(one: MoistureView) -> Grid:
    first = one.layers[0]
    resistance, diffusion = first.resistance.unit, first.diffusion.unit
    rows = (
        (each.title, each.resistance.text, each.ratio, each.diffusion.text, each.source)
        for each in one.layers
    )
    heads = ("layer, outside first", f"R, {resistance}", "mu", f"sd, {diffusion}", "source")
    return Grid(heads, tuple(rows), (1, 2, 3), (4, 0))


def _amounts(one: MoistureView) -> Grid:
    """Water at each face at the end of each month."""
    heads = ("end of", *(f"{face.symbol}, {face.greatest.unit}" for face in one.faces))
    by_month = zip(*(face.amounts for face in one.faces), strict=True)
    rows = (
        (name, *(figure.text for figure in row)) for name, row in zip(MONTHS, by_month, strict=True)
    )
    return Grid(heads, tuple(rows), tuple(range(1, len(heads))))


def _sums(lines: Iterable[Line]) -> Items:
    entries = (
        Entry(
            line.title + (f" [{line.source}]" if line.source else ""),
            (f"where {', '.join(line.operands)}",) if line.operands else (),
            (line.text,),
        )
        for line in lines
    )
    return Items(tuple(entries), numbered=True)


def flat(section: Section) -> Iterable[tuple[str, ...]]:
    """A section of this page as rows of cells."""
    for block in section.blocks:
        match block:
            case Paragraph(text):
                yield (text,)
            case Facts(pairs):
                yield from ((pair.label, pair.text) for pair in pairs)
            case Items(entries):
                for entry in entries:
                    yield (entry.head,)
                    yield from ((text,) for text in (*entry.lines, *entry.sums))
            case Grid(heads, rows):
                yield from (heads, *rows)
