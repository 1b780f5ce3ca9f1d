"""Conditions as printed or typed: ``N|E|W``, ``<=0.30``, ``(0.30,0.50]``, ``>3``."""

from __future__ import annotations

import re

from envcheck import units
from envcheck.model.ruleset import Condition
from envcheck.read.cells import CellError

_INTERVAL = re.compile(r"([\[(])\s*([\d.,]*)\s*[,;]\s*([\d.,]*)\s*([\])])")
_BOUND = re.compile(r"(<=|>=|<|>|=|\u2264|\u2265)?\s*(\d*[.,]?\d+)")


def read_condition(
    text: str, dimension: str, words: tuple[str, ...], unit: str = "", decimal: str = "."
) -> Condition:
    """Read a condition: words (``N|E|W``), or an interval whose ends become SI.

    ``words`` are those that the dimension allows; without any it is a number. Errors: CellError.
    """
    plain = text.strip()
    if words:
        return _words(plain, dimension, words)
    interval = _INTERVAL.fullmatch(plain)
    if interval is not None:
        low = _bound(interval[2], unit, decimal)
        high = _bound(interval[3], unit, decimal)
        if low is not None and high is not None and low > high:
            raise CellError("unreadable-condition", "the lower end first")
        closed = interval[1] == "[", interval[4] == "]"
        return Condition(dimension, (), low, high, *closed, plain)
    bound = _BOUND.fullmatch(plain)
    if bound is None:
        raise CellError("unreadable-condition", "an interval such as <=0.30 or (0.30,0.50]")
    value = _bound(bound[2], unit, decimal)
    sign = (bound[1] or "=").replace("\u2264", "<=").replace("\u2265", ">=")
    low = value if sign[0] in ">=" else None
    high = value if sign[0] in "<=" else None
    closed = sign in (">=", "="), sign in ("<=", "=")
    return Condition(dimension, (), low, high, *closed, plain)


def _words(text: str, dimension: str, words: tuple[str, ...]) -> Condition:
    known = {w.casefold(): w for w in words}
    found = [w.strip() for w in text.split("|")]
    wrong = [w for w in found if w.casefold() not in known]
    if wrong:
        raise CellError("unknown-word", "one of " + ", ".join(words))
    return Condition(dimension, tuple(known[w.casefold()] for w in found), text=text)


def _bound(text: str, unit: str, decimal: str) -> float | None:
    if not text:
        return None
    if ("," if decimal == "." else ".") in text:
        raise CellError("cell-decimal-mark", f"the decimal mark {decimal!r}")
    try:
        number = float(text.replace(",", "."))
    except ValueError:
        raise CellError("unreadable-condition", "one number at each end") from None
    return units.to_si(number, unit) if unit else number
