"""The shortest sum that gives a printed value, on one line."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from functools import lru_cache

from envcheck import formulas
from envcheck.model.solved import Operand, Step
from envcheck.report import numbers, worksheet
from envcheck.report.inert import clean

DIGITS = (4, 6, worksheet.OPERAND_DIGITS)
"""Digits of the operands, tried in turn."""
ASTRAY = 0.01
"""Relative error that no rounding of operands explains: the formula holds in SI alone."""


def shortest(steps: Sequence[Step], system: str, decimals: int, shown: str) -> str:
    """Give the steps as one line whose result, at ``decimals`` places, is ``shown``.

    Operands get as few digits as that takes. Empty without steps.
    """
    if not steps:
        return ""
    for digits in DIGITS:
        sums = _sums(steps, system, digits)
        if sums is None:
            break
        if numbers.fixed(float(sums[-1][2]), decimals) == shown:
            return _one_line(sums, shown, steps[-1])
    return _from_worksheet(steps, system, decimals, shown)


def _sums(steps: Sequence[Step], system: str, digits: int) -> list[tuple[str, str, str]] | None:
    """(symbol, sum, result) of each step; None where one of them holds in SI alone.

    Does what :func:`worksheet.write` does, less the words, for steps without conversions.
    """
    exact: dict[str, float] = {}
    given: dict[str, tuple[str, float]] = {}
    made = []
    for symbol, _, expression, operands, value, quantity, _, si_only in steps:
        if not expression:
            written, pair = "", _printed(value, quantity, system, digits)
        elif si_only and system != "SI":
            return None
        else:
            names = tuple([name for name, _, _ in operands])
            if exact.keys().isdisjoint(names):
                pairs = [_printed(number, kind, system, digits) for _, number, kind in operands]
            else:
                pairs = _operands(operands, exact, given, system, digits)
            filled = _computed(expression, names, pairs)
            if filled is None:
                return None
            written, computed = filled
            if abs(computed * numbers.factor(quantity, system) - value) > ASTRAY * abs(value):
                return None
            result = numbers.significant(computed, worksheet.RESULT_DIGITS)
            pair = (result, float(result))
        exact[symbol], given[symbol] = value, pair
        made.append((symbol, written, pair[0]))
    return made


def _operands(
    operands: Sequence[Operand],
    exact: Mapping[str, float],
    given: Mapping[str, tuple[str, float]],
    system: str,
    digits: int,
) -> list[tuple[str, float]]:
    """Operands as printed; none where one bears the name of a step that gave another value."""
    pairs = []
    for name, number, kind in operands:
        if name not in exact:
            pairs.append(_printed(number, kind, system, digits))
        elif abs(exact[name] - number) <= 1e-9 * abs(number):
            pairs.append(given[name])
        else:
            return []
    return pairs


@lru_cache(maxsize=8192)
def _printed(value: float, quantity: str, system: str, digits: int) -> tuple[str, float]:
    """A number as printed, and the number that the print says."""
    text = worksheet.printed(value, quantity, system, digits)
    return text, float(text)


def _computed(
    expression: str, names: tuple[str, ...], pairs: Sequence[tuple[str, float]]
) -> tuple[str, float] | None:
    """A formula filled in, and its result; None where the numbers have none."""
    formula = formulas.compiled(expression)
    if len(pairs) != len(names):
        return None
    if formula.names != names:
        by_name = dict(zip(names, pairs, strict=True))
        pairs = [by_name[name] for name in formula.names]
    texts, figures = zip(*pairs, strict=True) if pairs else ((), ())
    try:
        computed = formula.evaluate(figures)
    except (ArithmeticError, ValueError):
        return None
    if min(figures, default=0.0) < 0.0:
        return formulas.filled(formula, texts), computed
    return formula.form % texts, computed


def _from_worksheet(steps: Sequence[Step], system: str, decimals: int, shown: str) -> str:
    """The same by the full worksheet, which knows how to convert."""
    lines: tuple[worksheet.Line, ...] = ()
    for digits in DIGITS:
        lines = worksheet.write(steps, system, digits)
        if numbers.fixed(float(lines[-1].result), decimals) == shown:
            break
    return _one_line([(each.symbol, each.sum, each.result) for each in lines], shown, steps[-1])


def _one_line(sums: Sequence[tuple[str, str, str]], shown: str, last: Step) -> str:
    *earlier, (symbol, written, _) = sums
    parts = [f"{name} = {text} = {result}" for name, text, result in earlier if text]
    if written:
        return "; ".join([*parts, f"{symbol} = {written} = {shown}"])
    source = f" ({clean(last.source)})" if last.source else ""
    return "; ".join([*parts, f"{symbol} = {shown}{source}"])
