"""A value printed on a drawing, held against the computed one in the unit and digits typed."""

from __future__ import annotations

import re
from collections.abc import Iterable
from decimal import Decimal
from typing import NamedTuple

from envcheck.judge.compare import exact_decimal, rounded
from envcheck.model.project import Assembly, Declared
from envcheck.model.solved import Solved
from envcheck.units import convert

TOLERANCE = 0.01
"""Share by which a declared value may miss the computed one."""
SHORT = 4
"""Decimals from which a value is shown with no more than the drawing has."""
R_IP = "h*ft2*degF/Btu"
R_SI = "m2*K/W"
_TYPED = re.compile(r"(R-|RSI[ -])?((?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?) ?(.*)", re.ASCII)
METRICS = {
    "u_factor": ("U_assembly", "U_product", "C_factor"),
    "resistance": ("U_assembly", "U_product", "C_factor"),
    "linear_transmittance": ("F_factor",),
}
"""Quantity of a declared value -> metrics that it can be held against."""


class Figure(NamedTuple):
    """A value as typed."""

    prefix: str
    """``R-``, ``RSI `` or empty."""
    digits: Decimal
    unit: str
    """A spelling of ``units``."""

    @property
    def decimals(self) -> int:
        """Decimals as typed."""
        exponent = self.digits.as_tuple().exponent
        return max(0, -int(exponent))

    def printed(self, value: float) -> Decimal:
        """An SI value in this unit, at these decimals."""
        return rounded(convert(value, self.unit), self.decimals)

    def show(self, value: float) -> str:
        """An SI value in this unit, one decimal more than typed where that is little."""
        decimals = self.decimals + (self.decimals < SHORT)
        return f"{self.prefix}{rounded(convert(value, self.unit), decimals)}"


class Disagreement(NamedTuple):
    """A declared value that is not the computed one."""

    figure: Figure
    solved: Solved
    """The solution that the value is nearest to being about: the first one."""
    computed: str
    """``0.0647``, or ``between 0.2730 and 0.2735``."""
    off: float
    """Computed over declared, less 1."""


def figure(declared: Declared) -> Figure | None:
    """Take the typed text apart; None where its digits cannot be told."""
    match = _TYPED.fullmatch(declared.text.strip())
    if match is None:
        return None
    prefix = match[1] or ""
    unit = {"": match[3], "R-": R_IP}.get(prefix, R_SI)
    return Figure(prefix, Decimal(match[2]), unit) if unit else None


def disagreement(assembly: Assembly, solutions: Iterable[Solved]) -> Disagreement | None:
    """Hold the declared value against every solution; None where it agrees with one of them.

    It agrees where a solution rounds to its digits, or lies within 1 % and one unit of its last
    digit. A value that only bounds decide agrees with anything between them.
    """
    declared = assembly.declared
    typed = figure(declared) if declared is not None else None
    if declared is None or typed is None:
        return None
    first: Disagreement | None = None
    for solved in solutions:
        ends = _ends(solved, declared.quantity)
        if ends is None:
            continue
        if _agrees(typed, *ends):
            return None
        if first is None:
            first = _disagreement(typed, solved, *ends)
    return first


def _ends(solved: Solved, quantity: str) -> tuple[float, float] | None:
    """Least and greatest computed value in the declared quantity, SI."""
    if solved.setting.metric not in METRICS.get(quantity, ()):
        return None
    low, high = solved.value, solved.value
    if solved.decided_by_bracket:
        low, high = solved.low, solved.high
    if not low or not high:
        return None
    return (1.0 / high, 1.0 / low) if quantity == "resistance" else (low, high)


def _agrees(typed: Figure, low: float, high: float) -> bool:
    if typed.printed(low) <= typed.digits <= typed.printed(high):
        return True
    nearest = low if typed.digits < typed.printed(low) else high
    exact = exact_decimal(convert(nearest, typed.unit))
    unit = Decimal(1).scaleb(-typed.decimals)
    near = abs(exact - typed.digits) <= exact * exact_decimal(TOLERANCE)
    return near and abs(typed.printed(nearest) - typed.digits) <= unit


def _disagreement(typed: Figure, solved: Solved, low: float, high: float) -> Disagreement:
    nearest = low if typed.digits < typed.printed(low) else high
    off = convert(nearest, typed.unit) / float(typed.digits) - 1.0
    computed = typed.show(low)
    if low != high:
        computed = f"between {computed} and {typed.show(high)}"
    return Disagreement(typed, solved, computed, off)


def system_of(typed: Figure) -> str:
    """System of the typed unit."""
    return "IP" if "Btu" in typed.unit or "ft" in typed.unit else "SI"
