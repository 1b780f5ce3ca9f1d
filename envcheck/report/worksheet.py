"""Worksheet steps written out so that a pocket calculator repeats every printed number.

Every operand is printed with at most nine significant digits; an operand that an earlier step
gave is printed as that step printed it. Each result is computed from the *printed* operands and
shown to six significant digits. A formula whose constants hold in SI alone stays in SI, and
lines that convert stand before and behind it.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from typing import NamedTuple

from envcheck import formulas, units
from envcheck.model.solved import Operand, Step
from envcheck.report import numbers
from envcheck.report.inert import clean

OPERAND_DIGITS = 9
RESULT_DIGITS = 6
COHERENT = 1e-7
"""Most by which a formula that holds in both systems may differ between them: noise."""


class Line(NamedTuple):
    """One printed step."""

    symbol: str
    title: str
    formula: str
    """With names: ``L / k``; empty for a value taken from a source."""
    operands: tuple[str, ...]
    """``L = 3.625 in`` for each operand that no earlier step gave."""
    sum: str
    """With numbers: ``3.625 / 6.24``."""
    result: str
    unit: str
    source: str

    @property
    def text(self) -> str:
        """The step as one line of arithmetic."""
        middle = f"{self.sum} = " if self.sum else ""
        return f"{self.symbol} = {middle}{self.result} {self.unit}".rstrip()


class _Sheet:
    """What has been printed so far."""

    def __init__(self, system: str, digits: int) -> None:
        self.system = system
        self.digits = digits
        self.lines: list[Line] = []
        self.given: dict[str, float] = {}
        """Symbol -> exact SI value."""
        self.printed: dict[str, dict[str, str]] = {}
        """Symbol -> unit -> printed result; the first unit is the one it was computed in."""


def write(steps: Iterable[Step], system: str, digits: int = OPERAND_DIGITS) -> tuple[Line, ...]:
    """Print the steps in ``system`` ``SI`` or ``IP``."""
    sheet = _Sheet(system, digits)
    for step in steps:
        if not step.expression:
            _value(sheet, step)
        elif system == "SI" or not fails_in_ip(step):
            _formula(sheet, step, system)
        else:
            _in_si(sheet, step)
        sheet.given[step.symbol] = step.value
    return tuple(sheet.lines)


def _value(sheet: _Sheet, step: Step) -> None:
    """A value from a source: nothing to compute."""
    text = printed(step.value, step.quantity, sheet.system, sheet.digits)
    _print(sheet, step, sheet.system, "", (), text)


def _formula(sheet: _Sheet, step: Step, system: str) -> None:
    values: dict[str, str] = {}
    stated: list[str] = []
    for operand in step.operands:
        name, unit = operand.name, units.label(operand.quantity, system)
        found = earlier(sheet.given, operand) if sheet.given else ""
        if found:
            values[name] = _in_unit(sheet, found, unit, operand.quantity)
            if found != name:
                stated.append(f"{name} = {found}")
        else:
            values[name] = printed(operand.value, operand.quantity, system, sheet.digits)
            stated.append(f"{name} = {values[name]} {unit}".rstrip())
    try:
        result = formulas.evaluate(step.expression, {k: float(v) for k, v in values.items()})
    except (ArithmeticError, ValueError):
        result = numbers.in_system(step.value, step.quantity, system)
    written = formulas.fill(step.expression, values)
    text = numbers.significant(result, RESULT_DIGITS)
    _print(sheet, step, system, written, tuple(stated), text)


def _in_si(sheet: _Sheet, step: Step) -> None:
    """Compute in SI and convert the result."""
    _formula(sheet, step, "SI")
    _in_unit(sheet, step.symbol, units.label(step.quantity, sheet.system), step.quantity)


_HELD_IN_IP: dict[tuple[str, str, tuple[str, ...]], float] = {}


def fails_in_ip(step: Step, most: float = COHERENT) -> bool:
    """Whether a formula that is true in SI misses its value with operands in IP units by more than
    the share ``most``.

    That is a matter of the formula and its quantities, so each pair is tried once.
    """
    key = (step.expression, step.quantity, tuple(o.quantity for o in step.operands))
    if key not in _HELD_IN_IP:
        _HELD_IN_IP[key] = _missed_in_ip(step)
    return step.si_only or _HELD_IN_IP[key] > most


def _missed_in_ip(step: Step) -> float:
    """Share by which the formula misses with operands in IP units; infinite without a result."""
    converted = {o.name: numbers.in_system(o.value, o.quantity, "IP") for o in step.operands}
    try:
        truth = formulas.evaluate(step.expression, {o.name: o.value for o in step.operands})
        result = formulas.evaluate(step.expression, converted)
    except (ArithmeticError, ValueError):
        return math.inf
    expected = numbers.in_system(truth, step.quantity, "IP")
    if result == expected:
        return 0.0
    return abs(result - expected) / abs(expected) if expected else math.inf


def earlier(given: Mapping[str, float], operand: Operand) -> str:
    """Symbol of the step that gave the operand: of its name, else of its very value; or empty.

    given: results of the earlier steps by symbol, SI.
    """
    of_name = given.get(operand.name)
    if of_name is not None and abs(of_name - operand.value) <= 1e-9 * abs(of_name):
        return operand.name
    if of_name is None:
        return ""
    return next((name for name, value in given.items() if value == operand.value), "")


def printed(value: float, quantity: str, system: str, digits: int) -> str:
    """Write a number given in SI without its unit, to so many significant digits."""
    return numbers.significant(numbers.in_system(value, quantity, system), digits)


def _print(
    sheet: _Sheet, step: Step, system: str, written: str, stated: tuple[str, ...], result: str
) -> None:
    unit = units.label(step.quantity, system)
    formula = formulas.named(step.expression)
    title, source = clean(step.title), clean(step.source)
    sheet.lines.append(Line(step.symbol, title, formula, stated, written, result, unit, source))
    sheet.printed[step.symbol] = {unit: result}


def _in_unit(sheet: _Sheet, symbol: str, target: str, quantity: str) -> str:
    """Give an earlier result in a unit, with a line that converts it where that is another."""
    known = sheet.printed[symbol]
    if target in known:
        return known[target]
    unit, text = next(iter(known.items()))
    if not unit or not target:
        return text
    if quantity == "temperature":
        written = f"{text} * 1.8 + 32" if target == "degF" else f"({text} - 32) / 1.8"
    else:
        ratio = units.to_si(1.0, unit) / units.to_si(1.0, target)
        sign, factor = ("*", ratio) if ratio > 1.0 else ("/", 1.0 / ratio)
        written = f"{text} {sign} {numbers.significant(factor, OPERAND_DIGITS)}"
    result = numbers.significant(formulas.evaluate(written, {}), RESULT_DIGITS)
    title = f"{symbol} from {unit} to {target}"
    sheet.lines.append(Line(symbol, title, "", (), written, result, target, ""))
    known[target] = result
    return result
