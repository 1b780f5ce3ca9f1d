"""Text of a value and its range: ``0.035 +- 0.002 W/(m*K)``, ``2 in +- 1/8 in``, ``1 in ± 5 %``."""

from __future__ import annotations

import re
from typing import NamedTuple

from envcheck.units.spelling import CHARACTERS
from envcheck.units.table import UNITS
from envcheck.units.text import UnitError, parse, states_range

_SIGN = re.compile(r"\s*(?:\+ ?/? ?-|±)\s*")
_NUMBER = re.compile(r"(\d+(?:\.\d+)?|\.\d+)(?:[eE][+-]?\d{1,3})?", re.ASCII)
_SHARE = re.compile(r"(\d+(?:\.\d+)?|\.\d+) ?%", re.ASCII)


class Ranged(NamedTuple):
    """A value and the range that is stated for it, SI."""

    value: float
    low: float
    high: float


def parse_range(text: str, quantity: str) -> Ranged:
    """Read ``VALUE +- HALF UNIT``, ``VALUE UNIT +- HALF UNIT`` or ``VALUE UNIT +- SHARE %``.

    ``±`` and ``+/-`` say the same. The low end must stay above zero. Errors: UnitError.
    """
    assert states_range(text), "see states_range"
    parts = _SIGN.split(text.strip().translate(CHARACTERS))
    if len(parts) != 2 or not all(parts) or parts[1].startswith("-"):
        raise _bad(text, quantity, "a value, one +- and half the width of its range")
    try:
        value, half = _value_and_half(parts[0], parts[1], quantity)
    except UnitError as error:
        found = f"{error.found.strip()} in {text}"
        raise UnitError(error.kind, found, error.expected, error.fix) from None
    if half <= 0:
        raise _bad(text, quantity, "a half width of the range above zero")
    if value - half <= 0:
        raise _bad(text, quantity, "a range whose low end is above zero")
    return Ranged(value, value - half, value + half)


def _value_and_half(left: str, right: str, quantity: str) -> tuple[float, float]:
    share = _SHARE.fullmatch(right)
    if share is not None:
        value = parse(left, quantity)
        return value, value * float(share[1]) / 100.0
    number = _NUMBER.match(right)
    bare = number is not None and _NUMBER.fullmatch(left) is not None
    unit = right[number.end() :] if number is not None else ""
    return parse(f"{left} {unit.strip()}" if bare else left, quantity), parse(right, quantity)


def _bad(text: str, quantity: str, expected: str) -> UnitError:
    example = UNITS[quantity].example.split(" or ")[0]
    fix = f"write the value, +- and half the width of its range: {example} +- 5 %"
    return UnitError("bad-range", text, expected, fix)
