"""The view as a page of headings and blocks, shared by the formats that people read."""

from __future__ import annotations

from collections.abc import Iterable

from envcheck.report import wording
from envcheck.report.details import AssemblyView
from envcheck.report.header import RuleSetView
from envcheck.report.items import FindingView, Item
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Pair, Paragraph, Section
from envcheck.report.rows import Row
from envcheck.report.view import View

MOST_PLACES = 24
TONES = {"fail": "bad", "pass": "good", "no_requirement": "good"}


def page(view: View) -> Page:
    """Lay the view out as sections: what decides first, what explains it after."""
    return Page(
        view.title,
        (
            Section("", (Facts(view.facts),)),
            *map(_rule_set, view.rule_sets),
            Section("", (Paragraph(view.summary),)),
            *(_table(view, each) for each in view.rule_sets),
            _over(view.rows),
            Section("Open items", (_items(view.open_items, numbered=True),)),
            *_if_any("Claimed exceptions", _items(view.claims)),
            *_if_any("To note", _noted(view.rows)),
            *_if_any("Findings of the cross-checks", _findings(view.findings)),
            *_building(view),
            Section(
                "Line by line: the limit in print, and a sum to repeat", (_by_line(view.rows),)
            ),
            *map(_assembly, view.assemblies),
            *_if_any("Assumed", _plain(view.assumptions)),
            *_if_any("Remarks", _plain(view.remarks)),
            Section("Cautions", (_cautions(view),)),
            Section("Not judged on this page", (_plain(view.not_judged or (wording.NOTHING,)),)),
            _close(view),
        ),
    )


def _rule_set(rules: RuleSetView) -> Section:
    conventions = tuple(
        Pair(each.topic, f"{each.counted} [{each.where}]") for each in rules.conventions
    )
    heading = f"Rule set {rules.id}: {rules.title}"
    return Section(heading, (Facts((*rules.facts, *conventions)),))


def _table(view: View, rules: RuleSetView) -> Section:
    rows = [row for row in view.rows if row.rule_set == rules.id]
    heading = f"Lines held against {rules.id}" if len(view.rule_sets) > 1 else "Lines"
    if not rows:
        return Section(heading, (Paragraph(wording.NOTHING),))
    printed = rules.printed_units
    notes = (
        rules.units_note,
        f"compared figure, limit and room left as printed, in {printed}" if printed else "",
        "negative room: over the limit",
    )
    note = "; ".join(filter(None, notes))
    blocks: list[Block] = [grid(rows, bool(printed), view.bounds)]
    blocks.append(Paragraph(f"{note[0].upper()}{note[1:]}."))
    return Section(heading, tuple(blocks))


def grid(rows: Iterable[Row], apart: bool, bounds: bool) -> Grid:
    """The main table.

    ``apart`` adds the compared figure in the printed unit, ``bounds`` those of the drawn model.
    """
    rows = list(rows)
    columns: list[tuple[str, int, list[str]]] = [
        ("tag", 5, [row.tag for row in rows]),
        ("sheet", 6, [row.sheet for row in rows]),
        ("built as", 1, [row.built_as for row in rows]),
        ("value", 7, [_value(row) for row in rows]),
        ("limit", 3, [row.limit or "-" for row in rows]),
        ("room left", 0, [row.room.text or "-" for row in rows]),
        ("verdict", 2, [row.verdict_text for row in rows]),
    ]
    if apart:
        columns.insert(4, ("as compared", 0, [row.compared.text or "-" for row in rows]))
    if bounds:
        between = [_between(row) if row.low.text else "-" for row in rows]
        columns.insert(4, ("bounds", 4, between))
    order = sorted((rank, place) for place, (_, rank, _) in enumerate(columns) if rank)
    return Grid(
        heads=tuple(head for head, _, _ in columns),
        rows=tuple(zip(*(cells for _, _, cells in columns), strict=True)),
        right=tuple(n for n, (head, _, _) in enumerate(columns) if head == "room left"),
        wrap=tuple(place for _, place in order),
        tones=tuple(TONES.get(row.verdict, "open") for row in rows),
    )


def _between(row: Row) -> str:
    if row.low.text == row.high.text:
        return row.low.text
    return f"{row.low.text} to {row.high.text}"


def _value(row: Row) -> str:
    if row.verdict == "too_close" and row.low.text:
        return f"{row.symbol} {_between(row)}"
    return f"{row.symbol} {row.value.text}" if row.value.text else "-"


def _over(rows: Iterable[Row]) -> Section:
    found = [
        (
            _place(row.tag, row.sheet),
            f"{row.verdict_text}{_by(row)}",
            (*row.reasons, *row.notes, *_bounds(row)),
        )
        for row in rows
        if row.verdict == "fail"
    ]
    return Section("Why over the limit", (_or_none(_grouped(found)),))


def _grouped(found: Iterable[tuple[str, str, tuple[str, ...]]]) -> tuple[Entry, ...]:
    """(place, what, lines) as entries, those that say the same of several places together."""
    places: dict[tuple[str, tuple[str, ...]], dict[str, None]] = {}
    for place, what, lines in found:
        places.setdefault((what, lines), {})[place] = None
    return tuple(
        Entry(f"{wording.listed(list(where), MOST_PLACES)}: {what}", lines)
        for (what, lines), where in places.items()
    )


def _by(row: Row) -> str:
    if not row.room.text:
        return ""
    return f", {row.room.text} {row.room.unit}".rstrip() + f" ({row.room_share})" * bool(
        row.room_share
    )


def _place(subject: str, sheet: str) -> str:
    return f"{subject} ({sheet})" if sheet else subject


def _paths(row: Row) -> tuple[str, ...]:
    found = []
    for path in row.paths:
        figures = " against ".join(filter(None, (path.value, path.limit)))
        text = f"{path.path}: {path.state}"
        text += f", {figures}" if figures else ""
        found.append(f"{text} ({path.why})" if path.why else text)
    return tuple(found)


def _bounds(row: Row) -> tuple[str, ...]:
    if not row.low.text or (row.low == row.high and row.low.text == row.value.text):
        return ()
    return (f"bounds of the drawn model: {_between(row)} {row.low.unit}",)


def _items(found: Iterable[Item], numbered: bool = False) -> Items:
    entries = _grouped((_place(item.subject, item.sheet), item.what, item.lines) for item in found)
    return Items(entries, numbered) if entries or not numbered else _or_none(())


def _or_none(entries: tuple[Entry, ...]) -> Items:
    return Items(entries or (Entry(wording.NOTHING),))


def _plain(texts: Iterable[str]) -> Items:
    return Items(tuple(Entry(text) for text in texts))


def _if_any(heading: str, block: Items) -> tuple[Section, ...]:
    return (Section(heading, (block,)),) if block.entries else ()


def _noted(rows: Iterable[Row]) -> Items:
    return Items(
        _grouped(
            (_place(row.tag, row.sheet), row.verdict_text, (*row.notes, *row.reasons))
            for row in rows
            if not row.open and row.verdict != "fail" and (row.notes or row.reasons)
        )
    )


def _findings(found: Iterable[FindingView]) -> Items:
    entries = []
    for each in found:
        lines = (
            f"suggests: {each.suggests}" if each.suggests else "",
            f"settles it: {each.settles}" if each.settles else "",
            f"answered by the project: {each.answered}" if each.answered else "",
        )
        what = f"{each.seen} [{each.check}, {each.severity_text}]"
        entries.append((_place(each.subject, each.sheet), what, tuple(filter(None, lines))))
    return Items(_grouped(entries))


def _building(view: View) -> tuple[Section, ...]:
    entries = []
    for ratio in view.building.ratios:
        head = f"{ratio.name}: {ratio.sum} ({ratio.cap}): {ratio.state}".replace(":  (", ": (")
        entries.append(Entry(head, tuple(f"missing: {text}" for text in ratio.missing)))
    for mean in view.building.means:
        head = f"mean {mean.group} ({mean.clause})" if mean.clause else f"mean {mean.group}"
        lines = tuple(filter(None, (f"worst member {mean.worst}", mean.cap)))
        entries.append(Entry(head, lines, (mean.sum,)))
    for each in view.building.closings:
        entries.append(Entry(f"{_place(each.surface, each.sheet)}: {each.sum}: {each.state}"))
    return _if_any("The building", Items(tuple(entries)))


def _by_line(rows: Iterable[Row]) -> Items:
    entries = []
    for row in rows:
        source = row.limit_source or "no limit found"
        size = f", {row.amount.text} {row.amount.unit}" if row.amount.text else ""
        limit = f"{row.symbol} {row.limit}" if row.limit else row.symbol
        head = f"{_place(row.tag, row.sheet)}{size}: {limit}; {source}"
        lines = (*_paths(row), *(() if row.verdict == "fail" else _bounds(row)))
        entries.append(Entry(head, lines, (row.hand_check,) if row.hand_check else ()))
    return _or_none(tuple(entries))


def _assembly(each: AssemblyView) -> Section:
    return Section(f"Assembly {each.assembly}: {each.title}", assembly_blocks(each))


def assembly_blocks(each: AssemblyView) -> tuple[Block, ...]:
    """Facts, layers and values beside of one assembly."""
    value = f"{each.symbol} = {each.value} {each.unit}" if each.value else "not computed"
    pairs = (
        ("drawn on", each.sheet),
        ("used by", wording.listed(each.elements, 30)),
        ("as drawn", each.declared),
        ("method", f"{each.method} [{each.method_from}]" if each.method_from else each.method),
        ("value", value),
        ("missing", "; ".join(each.missing)),
        ("bounds", each.bracket),
        ("films", "; ".join(each.films)),
        ("assumed", "; ".join(each.assumptions)),
    )
    blocks: list[Block] = [Facts(tuple(Pair(label, text) for label, text in pairs if text))]
    if each.layers:
        blocks.append(_layers(each))
    if each.beside:
        blocks.append(_beside(each))
    return tuple(blocks)


def _layers(each: AssemblyView) -> Grid:
    rows = tuple(
        (
            layer.title,
            layer.thickness,
            layer.conductivity,
            layer.resistance,
            layer.note,
            layer.source,
        )
        for layer in each.layers
    )
    heads = (
        "layer, outside first",
        "thickness",
        f"k, {each.conductivity_unit}",
        f"R, {each.resistance_unit}",
        "note",
        "source",
    )
    return Grid(heads, rows, (1, 2, 3), (5, 4, 0))


def _beside(each: AssemblyView) -> Grid:
    rows = tuple((b.name, b.value, b.distance, b.note) for b in each.beside)
    heads = ("beside it", f"{each.symbol}, {each.unit}".rstrip(", "), "distance", "note")
    return Grid(heads, rows, (1, 2), (3, 0))


def _cautions(view: View) -> Items:
    return Items(
        tuple(Entry(f"{each.heading}. {each.text}".strip(), each.reasons) for each in view.cautions)
    )


def _close(view: View) -> Section:
    pairs = (Pair("made by", view.tool), *(Pair(f"sha256 {h.label}", h.text) for h in view.hashes))
    if view.hashes:
        pairs = (*pairs, Pair("a hash", view.hash_note))
    return Section("", (Paragraph(view.summary), Paragraph(view.deferral), Facts(pairs)))
