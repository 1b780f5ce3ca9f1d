"""Conditions as printed or typed: ``N|E|W``, ``<=0.30``, ``(0.30,0.50]``, ``2023-05-01``."""

from __future__ import annotations

import re
from datetime import date

from envcheck import units
from envcheck.model.ruleset import Condition, Dimension
from envcheck.read.cells import LONGEST, CellError
from envcheck.read.dates import read_date

_INTERVAL = re.compile(r"([\[(])\s*([\d.,]*)\s*[,;]\s*([\d.,]*)\s*([\])])")
_BOUND = re.compile(r"(<=|>=|<|>|=|\u2264|\u2265)?\s*(\d*[.,]?\d+)")
_PERIOD = re.compile(r"\[\s*([\d-]*)\s*[,;]\s*([\d-]*)\s*\)")
_EXAMPLE = "an interval such as <=0.30 or (0.30,0.50]"
_FLIPPED = {"<": ">=", "<=": ">", ">": "<=", ">=": "<"}


def read_condition(
    text: str, dimension: str, words: tuple[str, ...], unit: str = "", decimal: str = "."
) -> Condition:
    """Read a condition: words (``N|E|W``), or an interval whose ends become SI.

    ``words`` are those that the dimension allows; without any it is a number. Errors: CellError.
    """
    plain = text.strip()
    if words:
        return _words(plain, dimension, words)
    if len(plain) > LONGEST:
        raise CellError("unreadable-condition", _EXAMPLE)
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
        raise CellError("unreadable-condition", _EXAMPLE)
    value = _bound(bound[2], unit, decimal)
    sign = (bound[1] or "=").replace("\u2264", "<=").replace("\u2265", ">=")
    low = value if sign[0] in ">=" else None
    high = value if sign[0] in "<=" else None
    closed = sign in (">=", "="), sign in ("<=", "=")
    return Condition(dimension, (), low, high, *closed, plain)


def read_period(text: str, dimension: str) -> Condition:
    """Read a day (from then on) or a period ``[2015-10-01,2021-01-01)``, as ordinals.

    Errors: CellError.
    """
    plain = text.strip()[:LONGEST]
    period = _PERIOD.fullmatch(plain)
    first, end = (period[1], period[2]) if period is not None else (plain, "")
    try:
        low = read_date(first).toordinal() if first else None
        high = read_date(end).toordinal() if end else None
    except ValueError:
        raise CellError("unreadable-condition", "a day such as 2023-05-01") from None
    if low is not None and high is not None and low >= high:
        raise CellError("unreadable-condition", "the earlier day first")
    return period_of(dimension, low, high)


def period_of(dimension: str, low: float | None, high: float | None) -> Condition:
    """Give the condition of a period by ordinals: its first day, and the first day after it."""
    words = [f"from {date.fromordinal(int(low))}"] if low is not None else []
    words += [f"before {date.fromordinal(int(high))}"] if high is not None else []
    return Condition(dimension, (), low, high, True, False, " ".join(words))


def complement(condition: Condition, dimension: Dimension) -> tuple[Condition, ...]:
    """Give the conditions, none of which overlap, that hold where this one does not."""
    name = condition.dimension
    if condition.words:
        known = {w.casefold() for w in condition.words}
        rest = tuple(w for w in dimension.values if w.casefold() not in known)
        return (Condition(name, rest, text="|".join(rest)),) if rest else ()
    if dimension.kind == "date":
        return _other_days(condition)
    texts = _ends(condition.text)
    found = []
    if condition.low is not None:
        found.append(
            Condition(name, (), None, condition.low, False, not condition.low_closed, texts[0])
        )
    if condition.high is not None:
        found.append(
            Condition(name, (), condition.high, None, not condition.high_closed, False, texts[1])
        )
    return tuple(found)


def _other_days(condition: Condition) -> tuple[Condition, ...]:
    before, after = condition.low, condition.high
    found = [] if before is None else [period_of(condition.dimension, None, before)]
    return (*found, *([] if after is None else [period_of(condition.dimension, after, None)]))


def _ends(text: str) -> tuple[str, str]:
    """Text of what lies below and above an interval, in its printed unit."""
    interval = _INTERVAL.fullmatch(text)
    if interval is not None:
        below = f"{'<' if interval[1] == '[' else '<='}{interval[2]}"
        return below, f"{'>' if interval[4] == ']' else '>='}{interval[3]}"
    bound = _BOUND.fullmatch(text)
    number = bound[2] if bound is not None else text
    sign = (bound[1] or "=") if bound is not None else "="
    sign = sign.replace("\u2264", "<=").replace("\u2265", ">=")
    if sign == "=":
        return f"<{number}", f">{number}"
    return (_FLIPPED[sign] + number,) * 2


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
