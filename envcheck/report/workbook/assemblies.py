"""The sheet of worksheets: every step a formula of the cells above it."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck import formulas, units
from envcheck.model.solved import Step
from envcheck.report import numbers, wording, worksheet
from envcheck.report.details import AssemblyView
from envcheck.report.view import View
from envcheck.report.workbook.cells import (
    ASSEMBLIES,
    Cells,
    Formula,
    Head,
    Input,
    Place,
    Sheet,
)

EXACT_IN_IP = 1e-12
"""Most by which a formula may differ between the unit systems to be written without conversion."""


def sheet(view: View) -> tuple[Sheet, dict[Place, str]]:
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
