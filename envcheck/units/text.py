"""Text to SI: one number, one known unit, of the quantity asked for. Nothing is guessed."""

from __future__ import annotations

import re
from functools import lru_cache

from envcheck.units.spelling import CHARACTERS, known_unit, unit_key
from envcheck.units.table import ATOMS, FAHRENHEIT, FREEZING_F, KELVIN_ZERO, R_IP, UNITS

LARGEST = 1e9
"""No SI number of a building envelope is larger; what is, is a slip."""


class UnitError(ValueError):
    """A text that is no quantity of the kind asked for; ``kind`` is an id of ``error_kinds``."""

    def __init__(self, kind: str, found: str, expected: str, fix: str) -> None:
        super().__init__(f"found {found}; expected {expected}. Fix: {fix}")
        self.kind = kind
        self.found = found
        self.expected = expected
        self.fix = fix


LENGTHS = ("length", "thickness", "run")
QUANTITY = re.compile(
    r"([+-]?(?:\d+(?:\.\d+)?|\.\d+)(?:[eE][+-]?\d{1,3})?) ?(.*)", re.DOTALL | re.ASCII
)
FRACTION = re.compile(r"(?:(\d{1,5})-)?(\d{1,4})/(\d{1,4}) ?(in|ft)\b\.?", re.ASCII)
PREFIXED = re.compile(r"(R-|RSI[ -])(\d+(?:\.\d+)?|\.\d+)", re.ASCII)
_NAMED = re.compile(r"R(?:SI)?[ -]?\d", re.IGNORECASE | re.ASCII)
_COMMA = re.compile(r"\d,\d", re.ASCII)
_SEVERAL = re.compile(r"\d[ '_]\d|\d[^\d/(*-]*[ x/-]\d+(?:\.\d+)? ?(?:mm|cm|m|in|ft)?$")
_RANGE = re.compile(r"\+ ?/? ?[-\u2212]")
_MIXED = re.compile(r"(\d+) (\d+/\d+)", re.ASCII)


@lru_cache(maxsize=65536)
def parse(text: str, quantity: str) -> float:
    """Read a text with its unit as a number in SI.

    ``quantity`` is a key of :data:`UNITS`. Errors: UnitError with the kind of mistake.
    """
    match = QUANTITY.fullmatch(text.strip())
    if match is not None:
        unit = match[2]
        known = known_unit(unit) if unit else None
        if known is not None and quantity in known[1]:
            return _bounded(absolute(float(match[1]), unit, known[0], quantity), text, quantity)
        if not unit and quantity == "number":
            return _bounded(float(match[1]), text, quantity)
    value = _special(text.strip().translate(CHARACTERS), quantity)
    if value is None:
        raise _why_not(text, quantity)
    return _bounded(value, text, quantity)


def states_range(text: str) -> bool:
    """Whether a text holds a value with a range (see ``ranges``)."""
    return "±" in text or ("+" in text[1:] and _RANGE.search(text) is not None)


def _special(text: str, quantity: str) -> float | None:
    """Read fractions of an inch or foot, and ``R-13`` or ``RSI 2.29``."""
    if quantity in LENGTHS:
        match = FRACTION.fullmatch(text)
        if match is not None and int(match[3]):
            return (int(match[1] or 0) + int(match[2]) / int(match[3])) * ATOMS[match[4]]
    elif quantity == "resistance":
        match = PREFIXED.fullmatch(text)
        if match is not None:
            return float(match[2]) * (R_IP if match[1] == "R-" else 1.0)
    return None


def absolute(number: float, unit: str, factor: float, quantity: str) -> float:
    """Bring a number to SI by its factor; an absolute temperature by its zero as well."""
    if quantity != "temperature":
        return number * factor
    atom = (unit_key(unit) or (("",), ()))[0][0]
    if atom == "degF":
        return (number - FREEZING_F) * FAHRENHEIT
    return number + KELVIN_ZERO if atom == "K" else number


def _bounded(value: float, text: str, quantity: str) -> float:
    if abs(value) > LARGEST:
        words = UNITS[quantity].words
        raise UnitError("number-too-large", text, words, "check the digits and the exponent")
    return value


def _why_not(text: str, quantity: str) -> UnitError:
    """Say what is wrong with a text that could not be read."""
    words, example = UNITS[quantity].words, UNITS[quantity].example
    expected = f"{words} such as {example}"
    plain = text.strip().translate(CHARACTERS)
    text = text or "nothing"
    digits = re.sub(r"[,'_ ](?=\d)", "", plain)
    if _COMMA.search(plain):
        dot = plain.replace(",", ".")
        fix = f"write a decimal point and no thousands marks: {dot!r} or {digits!r}"
        return UnitError("comma-decimal", text, expected, fix)
    mixed = _MIXED.match(plain)
    if mixed and quantity in LENGTHS:
        fix = f"join whole and fraction with a hyphen: {plain.replace(' ', '-', 1)!r}"
        return UnitError("not-a-number", text, expected, fix)
    if states_range(plain):
        fix = f"write one value: {example}"
        return UnitError("range-not-here", text, expected, fix)
    if _NAMED.match(plain):
        if quantity != "resistance":
            found = f"{text}, a thermal resistance"
            return UnitError("wrong-unit", found, expected, f"write {example}")
        fix = "write R-13 for h*ft2*degF/Btu or RSI 2.29 for m2*K/W"
        return UnitError("not-a-number", text, expected, fix)
    if _SEVERAL.search(plain):
        fix = f"write one number without gaps, and one unit: {example}"
        return UnitError("not-a-number", text, expected, fix)
    match = QUANTITY.fullmatch(plain)
    if match is None:
        return UnitError(
            "not-a-number", text, expected, f"write one number and its unit: {example}"
        )
    return _wrong_unit(text, match[2].strip(), quantity, expected)


def _wrong_unit(text: str, unit: str, quantity: str, expected: str) -> UnitError:
    example = UNITS[quantity].example
    if not unit:
        return UnitError("missing-unit", text, expected, f"add the unit, for example {example}")
    known = known_unit(unit)
    if known is not None:
        other = UNITS[known[1][0]].words
        return UnitError("wrong-unit", f"{text}, {other}", expected, f"write {example}")
    if unit[0] in "\"'":
        unit = "in" if unit[0] == '"' else "ft"
    spellings = UNITS[quantity].spellings
    from difflib import get_close_matches  # only where something is wrong

    close = get_close_matches(unit, spellings, n=1, cutoff=0.5)
    fix = f"did you mean {close[0]!r}?" if close else f"write {example}"
    return UnitError("unknown-unit", text, expected, fix)
