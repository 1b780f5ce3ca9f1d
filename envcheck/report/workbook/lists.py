"""Sheets of texts and printed numbers: head, lists to tick off, layers, notes."""

from __future__ import annotations

import re
from collections.abc import Iterable

from envcheck import units
from envcheck.report import wording
from envcheck.report.items import FindingView
from envcheck.report.parts import Grid, Pair
from envcheck.report.view import View
from envcheck.report.workbook.cells import Cells, Head, Sheet


def check(view: View) -> Sheet:
    """The head of the report: what was judged, by what, and what the hashes are."""
    rows: list[Cells] = [(Head(view.title),), (view.summary,)]
    rows += [(text,) for text in view.lead]
    rows += [(), *_pairs(view.facts)]
    for rules in view.rule_sets:
        rows += [(), (Head(f"By rule set {rules.id}: {rules.title}"),), *_pairs(rules.facts)]
        rows += [(each.topic, each.counted, each.where) for each in rules.conventions]
    rows += [(), (view.deferral,), ("made by", view.tool)]
    rows += [(f"sha256 {pair.label}", pair.text) for pair in view.hashes]
    rows += [("a hash", view.hash_note)] if view.hashes else []
    return Sheet("Check", tuple(rows), (30, 90, 50))


def _pairs(pairs: Iterable[Pair]) -> list[Cells]:
    return [(pair.label, pair.text) for pair in pairs]


def listed(name: str, grid: Grid) -> Sheet:
    """A table of the page as a sheet; figures become numbers."""
    rows: list[Cells] = [tuple(map(Head, grid.heads))]
    rows += [
        tuple(number(cell) if at in grid.right else cell for at, cell in enumerate(row))
        for row in grid.rows
    ]
    widths = tuple(
        min(max(len(head), *(len(row[at]) for row in grid.rows)) + 2, 60)
        for at, head in enumerate(grid.heads)
    )
    return Sheet(name, tuple(rows), widths, 1)


def number(text: str) -> str | float:
    """A printed number as a number; any other text as it is."""
    return float(text) if re.fullmatch(r"[+-]?\d+(\.\d+)?", text) else text


def layers(view: View) -> Sheet:
    """Every layer of every assembly, outside first."""
    first = next(iter(view.assemblies), None)
    length = units.label("thickness", view.units)
    k, r = (first.conductivity_unit, first.resistance_unit) if first else ("", "")
    heads = (
        "assembly", "title", "layer, outside first", f"thickness, {length}", f"k, {k}", f"R, {r}",
        "note", "source",
    )  # fmt: skip
    rows: list[Cells] = [tuple(map(Head, heads))]
    for each in view.assemblies:
        for layer in each.layers:
            thickness = layer.thickness.removesuffix(f" {length}")
            figures = map(number, (thickness, layer.conductivity, layer.resistance))
            rows.append(
                (each.assembly, each.title, layer.title, *figures, layer.note, layer.source)
            )
    return Sheet("Layers", tuple(rows), (12, 34, 34, 14, 20, 16, 50, 60), 1)


def moisture(view: View) -> tuple[Sheet, ...]:
    """The advisory check, where it is asked for: texts and numbers as on the page."""
    if view.moisture is None:
        return ()
    from envcheck.report import moisture_page

    rows: list[Cells] = []
    for section in moisture_page.sections(view.moisture):
        rows += [(Head(section.heading),)]
        rows += [tuple(map(number, texts)) for texts in (*moisture_page.flat(section), ())]
    return (Sheet("Moisture", tuple(rows), (60, 16, 16, 16, 40, 16, 16)),)


def notes(view: View) -> Sheet:
    """Open items, findings, the building, cautions, what is not judged: texts."""
    rows: list[Cells] = [(Head("Open items"),)]
    rows += [(x.subject, x.sheet, x.what, "; ".join(x.lines)) for x in view.open_items] or [
        (wording.NOTHING,)
    ]
    rows += [(), (Head("Findings"),)]
    rows += [
        (x.subject, x.sheet, f"{x.severity_text}: {x.seen}", _suggests(x), x.settles, x.answered)
        for x in view.findings
    ] or [(wording.NOTHING,)]
    rows += [(), (Head("The building"),)]
    rows += [(x.name, x.cap, x.sum, x.state) for x in view.building.ratios]
    rows += [(x.title, x.state_text, x.sum, x.cap) for x in view.building.groups]
    rows += [(x.surface, x.sheet, x.sum, x.state) for x in view.building.closings]
    rows += [(), (Head("Cautions"),)]
    rows += [(x.heading, "", x.text, "; ".join(x.reasons)) for x in view.cautions]
    rows += [(), (Head("Not judged here"),)]
    rows += [(text,) for text in view.not_judged or (wording.NOTHING,)]
    return Sheet("Notes", tuple(rows), (30, 12, 90, 60, 50, 40))


def _suggests(finding: FindingView) -> str:
    """What a finding suggests, and how sure that is."""
    sure = f" ({finding.sure})" if finding.sure else ""
    return f"suggests{sure}: {finding.suggests}" if finding.suggests else ""
