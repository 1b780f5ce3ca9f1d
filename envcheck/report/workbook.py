"""The workbook: sheets of texts, numbers and live formulas, with nothing said of its file format.

A person who changes a thickness sees the value, the rounding and the verdict move. What cannot be a
formula (a bound of a drawn section, a figure of a table) is a number, and its row says so.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from typing import NamedTuple

from envcheck import formulas, units
from envcheck.model.solved import Step
from envcheck.report import numbers, wording, worksheet
from envcheck.report.details import AssemblyView
from envcheck.report.groups import GroupView, PartView
from envcheck.report.items import FindingView
from envcheck.report.parts import Grid, Pair
from envcheck.report.rows import Row
from envcheck.report.view import View


class Formula(NamedTuple):
    """A live formula (without the equals sign) and the value that is stored with it."""

    text: str
    value: float | str


class Input(NamedTuple):
    """A number that a reader may change."""

    value: float


class Head(NamedTuple):
    """A text that heads a table or a part."""

    text: str


Cell = str | float | Formula | Input | Head | None
Cells = tuple[Cell, ...]


class Sheet(NamedTuple):
    """One sheet: rows of cells, the widths of its columns, rows that stay in sight."""

    name: str
    rows: tuple[Cells, ...]
    widths: tuple[int, ...]
    frozen: int = 0


LINES, ASSEMBLIES = "Lines", "Assemblies"


def build(view: View) -> tuple[Sheet, ...]:
    """Lay a view out as sheets. The view holds details and workings."""
    assemblies, results = _assemblies(view)
    return (
        _check(view),
        _lines(view, results),
        assemblies,
        *_sums(view),
        *(_listed(each.heading, each.grid) for each in view.schedules),
        _layers(view),
        _notes(view),
    )


# --------------------------------------------------------------------------------- assemblies

EXACT_IN_IP = 1e-12
"""Most by which a formula may differ between the unit systems to be written without conversion."""

Place = tuple[str, str, str]
"""Rule set, tag, metric."""


def _assemblies(view: View) -> tuple[Sheet, dict[Place, str]]:
    """Every worksheet as formulas; and the cell of each line's value."""
    rows: list[Cells] = [
        (
            "Framed numbers may be changed: every result below them follows. Lines, rounding and "
            "verdict on the sheet Lines follow too.",
        )
    ]
    results: dict[Place, str] = {}
    for each in view.assemblies:
        rows.append(())
        rows.append((Head(f"Assembly {each.assembly}: {each.title}"),))
        rows.append((f"{each.method}; {each.sheet}; used by {wording.listed(each.elements, 30)}",))
        if each.workings is None or not each.workings.steps:
            rows.append(("not computed: " + ("; ".join(each.missing) or "nothing to compute"),))
            continue
        rows.append(tuple(map(Head, ("step", "symbol", "value", "unit", "formula", "source"))))
        last = _steps(rows, each.workings.steps, view.units)
        for place in _places(each):
            results[place] = f"'{ASSEMBLIES}'!$C${last}"
    return Sheet(ASSEMBLIES, tuple(rows), (44, 14, 16, 18, 34, 60)), results


def _places(each: AssemblyView) -> Iterable[Place]:
    for rule_set in each.rule_sets:
        for tag in each.elements:
            yield rule_set, tag, each.metric


def _steps(rows: list[Cells], steps: Sequence[Step], system: str) -> int:
    """Append the rows of one worksheet; gives the number of the row of its last result."""
    given: dict[str, tuple[float, str, int]] = {}
    """Symbol -> value (SI), quantity, row."""
    for step in steps:
        cells = {}
        for operand in step.operands:
            earlier = worksheet.earlier({s: v for s, (v, _, _) in given.items()}, operand)
            if earlier:
                _, quantity, row = given[earlier]
                cells[operand.name] = _scaled(f"$C${row}", quantity, operand.quantity, system)
            else:
                value = numbers.in_system(operand.value, operand.quantity, system)
                unit = units.label(operand.quantity, system)
                rows.append(("", operand.name, Input(value), unit))
                cells[operand.name] = f"$C${len(rows)}"
        rows.append(_result(step, cells, system))
        given[step.symbol] = (step.value, step.quantity, len(rows))
    return len(rows)


def _result(step: Step, cells: dict[str, str], system: str) -> Cells:
    value = numbers.in_system(step.value, step.quantity, system)
    unit = units.label(step.quantity, system)
    if not step.expression:
        return (step.title, step.symbol, Input(value), unit, "a figure, no formula", step.source)
    if system == "SI" or not worksheet.fails_in_ip(step, EXACT_IN_IP):
        formula = formulas.spreadsheet(step.expression, cells)
    else:
        quantities = {operand.name: operand.quantity for operand in step.operands}
        in_si = {name: _to_si(cell, quantities[name]) for name, cell in cells.items()}
        formula = _from_si(formulas.spreadsheet(step.expression, in_si), step.quantity)
    named = f"{step.symbol} = {formulas.named(step.expression)}"
    return (step.title, step.symbol, Formula(formula, value), unit, named, step.source)


def _scaled(cell: str, quantity: str, wanted: str, system: str) -> str:
    """An earlier result in the unit in which another quantity of the same kind is printed."""
    if quantity == wanted or "temperature" in (quantity, wanted):
        return cell
    ratio = numbers.factor(quantity, system) / numbers.factor(wanted, system)
    return cell if ratio == 1.0 else f"({cell}*{ratio!r})"


def _to_si(cell: str, quantity: str) -> str:
    if quantity == "temperature":
        return f"(({cell}-32)/1.8)"
    factor = numbers.factor(quantity, "IP")
    return cell if factor == 1.0 else f"({cell}*{factor!r})"


def _from_si(formula: str, quantity: str) -> str:
    if quantity == "temperature":
        return f"({formula})*1.8+32"
    factor = numbers.factor(quantity, "IP")
    return formula if factor == 1.0 else f"({formula})/{factor!r}"


# -------------------------------------------------------------------------------------- lines

HEADS = (
    "rule set", "tag", "sheet", "built as", "class", "metric", "amount", "unit of amount",
    "value", "unit of value", "value, printed unit", "as compared", "limit", "printed unit",
    "room left", "verdict of this sheet", "verdict of the check", "limit stands in", "why",
)  # fmt: skip
WIDTHS = (18, 9, 8, 26, 17, 12, 8, 8, 11, 16, 11, 10, 9, 16, 10, 18, 20, 38, 44)
VALUE, EXACT, COMPARED, LIMIT = "I", "K", "L", "M"
"""Columns that formulas name."""


def _lines(view: View, results: dict[Place, str]) -> Sheet:
    rounding = {rules.id: rules.rounding for rules in view.rule_sets}
    rows: list[Cells] = [tuple(map(Head, HEADS))]
    for row in view.rows:
        cell = results.get((row.rule_set, row.tag, wording.METRICS.get(row.metric, row.metric)))
        rows.append(_line(row, len(rows) + 1, cell, rounding[row.rule_set], view.units))
    return Sheet(LINES, tuple(rows), WIDTHS, 1)


def _line(row: Row, number: int, cell: str | None, rounding: str, system: str) -> Cells:
    own = row.comparison
    value: Cell = row.value.number
    if own is not None:
        exact = _in_report(own.value, own.unit, row.metric, system)
        value = Formula(cell, exact) if cell else Input(exact)
    return (
        row.rule_set, row.tag, row.sheet, row.built_as, row.category, row.metric,
        row.amount.number, row.amount.unit, value, row.value.unit,
        *_held(row, number, rounding, system),
        row.verdict_text, row.limit_source, "; ".join((*row.reasons, *row.notes)),
    )  # fmt: skip


def _in_report(value: float, unit: str, metric: str, system: str) -> float:
    if numbers.system_of(unit) in ("", system):
        return value
    return numbers.in_system(units.to_si(value, unit), numbers.quantity(metric), system)


def _held(row: Row, number: int, rounding: str, system: str) -> Cells:
    """Value in the printed unit, as compared, limit, unit, room left, verdict."""
    own = row.comparison
    if own is None:
        return None, None, row.against or None, None, None, row.verdict_text
    value, exact = f"{VALUE}{number}", f"{EXACT}{number}"
    compared, limit = f"{COMPARED}{number}", f"{LIMIT}{number}"
    ratio = 1.0
    if numbers.system_of(own.unit) not in ("", system):
        quantity = numbers.quantity(row.metric)
        ratio = numbers.factor(quantity, system) / units.to_si(1.0, own.unit)
    sign, first, second = ("<=", limit, exact) if own.sense == "max" else (">=", exact, limit)
    return (
        Formula(value if ratio == 1.0 else f"{value}*{ratio!r}", own.value),
        Formula(_rounded(exact, rounding, own.decimals), own.compared),
        Input(own.limit),
        own.unit,
        Formula(f"{first}-{second}", own.margin),
        _verdict(row, f"{compared}{sign}{limit}", f"{exact}{sign}{limit}"),
    )


def _rounded(cell: str, rounding: str, decimals: int) -> str:
    """Twelve significant digits, then half-up, as the check does it."""
    kept = f"ROUND({cell},11-INT(LOG10(ABS({cell})+1E-300)))"
    if rounding == "unrounded":
        return kept
    return f"ROUND({kept},{2 if rounding == 'rounded_2dp' else decimals})"


def _verdict(row: Row, holds: str, holds_exactly: str) -> str | Formula:
    """The comparison as a formula where it decides the line; else the verdict of the check."""
    own = row.comparison
    if own is None or row.verdict not in ("pass", "fail") or (row.verdict == "fail") == own.within:
        return row.verdict_text
    within, over = wording.VERDICTS["pass"], wording.VERDICTS["fail"]
    text = f'IF({holds},IF({holds_exactly},"{within}","{within}{wording.BY_ROUNDING}"),"{over}")'
    value = over if not own.within else within + wording.BY_ROUNDING * own.by_rounding
    return Formula(text, value)


# --------------------------------------------------------------------------------------- sums


def _sums(view: View) -> tuple[Sheet, ...]:
    """Sums as drawn against the table; values follow those of the sheet Lines."""
    groups = [group for group in view.building.groups if group.parts]
    if not groups:
        return ()
    lines: dict[Place, tuple[int, Row]] = {}
    for place, row in enumerate(view.rows, 2):
        lines.setdefault((row.rule_set, row.tag, row.symbol), (place, row))
    heads = ("elements", "built as", "letter", "amount", "unit", "value", "limit", "as drawn",
             "by the table", "difference", "verdict of its own")  # fmt: skip
    rows: list[Cells] = []
    for group in groups:
        rows += [(Head(group.title),), (group.state_text,), tuple(map(Head, heads))]
        first, drawn, table = len(rows) + 1, 0.0, 0.0
        for part in group.parts:
            cells, ours, theirs = _part(group, part, len(rows) + 1, lines, view.units)
            rows.append(cells)
            drawn, table = drawn + ours, table + theirs
        last = len(rows)
        totals = (
            Formula(f"SUM({column}{first}:{column}{last})", value)
            for column, value in (("H", drawn), ("I", table), ("J", drawn - table))
        )
        rows += [("sum", "", "", "", "", "", "", *totals, group.drawn.unit)]
        rows += [(text,) for text in (*group.waits, *group.charges)] + [()]
    return (Sheet("Sums", tuple(rows), (34, 34, 8, 12, 8, 14, 12, 14, 14, 14, 24)),)


def _part(
    group: GroupView,
    part: PartView,
    number: int,
    lines: dict[Place, tuple[int, Row]],
    system: str,
) -> tuple[Cells, float, float]:
    """The row of a part, and its two products."""
    value: Cell = None
    exact = part.value.number or 0.0
    found = lines.get((group.rule_set, part.elements[0], part.symbol))
    if found is not None and found[1].comparison is not None:
        own = found[1].comparison
        exact = _in_report(own.value, own.unit, found[1].metric, system)
        value = Formula(f"'{LINES}'!${VALUE}${found[0]}", exact)
    else:
        value = Input(exact)
    amount, limit = part.amount.number or 0.0, part.limit.number or 0.0
    cells: Cells = (
        ", ".join(part.elements), part.built_as, part.symbol, amount, part.amount.unit, value,
        Input(limit), Formula(f"D{number}*F{number}", amount * exact),
        Formula(f"D{number}*G{number}", amount * limit),
        Formula(f"H{number}-I{number}", amount * (exact - limit)), part.verdict_text,
    )  # fmt: skip
    return cells, amount * exact, amount * limit


# ------------------------------------------------------------------------------ other sheets


def _check(view: View) -> Sheet:
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


def _listed(name: str, grid: Grid) -> Sheet:
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


def _layers(view: View) -> Sheet:
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


def _notes(view: View) -> Sheet:
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
