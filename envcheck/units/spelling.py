"""How units may be spelt: every usual way of writing one unit leads to one key."""

from __future__ import annotations

import re
from functools import lru_cache
from math import prod

from envcheck.units.table import ALIASES, ATOMS, UNITS

CHARACTERS = str.maketrans(
    {
        "²": "2", "³": "3", "¹": "1", "⁻": "-", "\u2212": "-", "\u2011": "-",
        "·": "*", "⋅": "*", "∙": "*", "•": "*", "\u00d7": "*",
        "\u00a0": " ", "\u2009": " ", "\u202f": " ", "º": "°", "^": "",
    }
)  # fmt: skip
"""Typographic twins of plain characters."""
_DEGREES = re.compile(r"(?:°|deg) ?([CF])\b")
_PRODUCT = re.compile(r" ?[*.] ?| +|-(?=[A-Za-z])")
_ATOM = re.compile(r"([A-Za-z%]+[23]?)(?:-([123]))?")
Key = tuple[tuple[str, ...], tuple[str, ...]]


def _factors(text: str) -> list[tuple[str, bool]] | None:
    """Split a product into atoms, each with whether its power is negative; None: no product."""
    atoms: list[tuple[str, bool]] = []
    for word in filter(None, _PRODUCT.split(text)):
        for part in ALIASES.get(word, word).split("*"):
            match = _ATOM.fullmatch(part)
            if match is None:
                return None
            power = match[2]
            atom = match[1] + (power if power and power != "1" else "")
            atoms.append((ALIASES.get(atom, atom), power is not None))
    return atoms


@lru_cache(maxsize=1024)
def unit_key(unit: str) -> Key | None:
    """Give the atoms over and under the line, sorted; None where the text is no unit.

    A divisor of several atoms must stand in parentheses: ``W/m*K`` can be read in two ways.
    """
    text = _DEGREES.sub(r"deg\1", unit.translate(CHARACTERS).replace("**", "").strip())
    text = text.removesuffix(".").replace("sq ft", "ft2")
    over, *under = ALIASES.get(text, text).split("/")
    sides: tuple[list[str], list[str]] = ([], [])
    for place, part in enumerate((over, *under)):
        inner = part.strip()
        closed = inner.startswith("(") and inner.endswith(")")
        inner = inner[1:-1].strip() if closed else inner
        if place == 0 and inner in ("", "1"):
            continue
        if place and not closed and len(_PRODUCT.split(inner)) > 1:
            return None
        atoms = _factors(inner)
        if not atoms or any(atom not in ATOMS for atom, _ in atoms):
            return None
        for atom, negative in atoms:
            sides[(place > 0) ^ negative].append(atom)
    if len(sides[0]) + len(sides[1]) > 1:
        sides = ([_in_product(a) for a in sides[0]], [_in_product(a) for a in sides[1]])
    return tuple(sorted(sides[0])), tuple(sorted(sides[1]))


def _in_product(atom: str) -> str:
    """A degree in a product is a difference: degC there is K."""
    return "K" if atom == "degC" else atom


def _factor(key: Key) -> float:
    return prod(ATOMS[a] for a in key[0]) / prod(ATOMS[a] for a in key[1])


def _by_key() -> dict[Key, tuple[float, tuple[str, ...]]]:
    found: dict[Key, tuple[float, tuple[str, ...]]] = {}
    for name, quantity in UNITS.items():
        for spelling in quantity.spellings:
            key = unit_key(spelling)
            assert key is not None, spelling
            factor, names = found.get(key, (_factor(key), ()))
            found[key] = (factor, (*names, name))
    return found


_TABLE = _by_key()


@lru_cache(maxsize=1024)
def known_unit(unit: str) -> tuple[float, tuple[str, ...]] | None:
    """Give factor to SI and the quantities that a spelling can stand for."""
    key = unit_key(unit)
    return None if key is None else _TABLE.get(key)
