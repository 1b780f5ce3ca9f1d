"""A declared conductivity and what converts it to the design: ISO 10456."""

from __future__ import annotations

import csv
from functools import lru_cache
from itertools import pairwise

from envcheck.model.conversion import Conversion
from envcheck.read.context import NAN, Context
from envcheck.read.materials import DATA
from envcheck.read.yaml_reader import Entry

DECLARED_AT = 10.0
"""degC: usual reference temperature of declared values (ISO 10456:2007, table 1)."""
SLACK = 1e-9
Row = dict[str, str]


def read_conversion(context: Context, entry: Entry, where: str) -> Conversion | None:
    """Read the conversion of a material that states a ``declared`` conductivity."""
    declared = context.positive(entry, "declared", "conductivity")
    if "conversion" not in entry:
        hint = ", which says the temperature or moisture of the design"
        context.add("missing-key", entry.line, key="conversion", where=where, hint=hint)
        return None
    stated = entry["conversion"]
    asked = [key for key in ("temperature", "moisture") if key in stated]
    if not asked:
        hint = " or 'moisture' of the design, else state the value as 'conductivity'"
        context.add("missing-key", stated.line, key="temperature", where="conversion", hint=hint)
        return None
    _known_class(context, stated)
    sources = [stated["source"]] if "source" in stated else []
    warm = _temperature(context, stated, "temperature")
    base = _temperature(context, stated, "declared_temperature")
    wet, dry = (_moisture(context, stated, key) for key in ("moisture", "declared_moisture"))
    per_kelvin = per_moisture = 0.0
    if "temperature" in stated:
        per_kelvin = _per_kelvin(context, entry, stated, declared, sources)
    if "moisture" in stated:
        per_moisture = _per_moisture(context, stated, sources)
    said = "; ".join(dict.fromkeys(sources)) or "coefficients as stated in the project"
    return Conversion(declared, per_kelvin, base, warm, per_moisture, dry, wet, said)


def _known_class(context: Context, stated: Entry) -> None:
    known = [*_temperatures(), *(name for name in _moistures() if name not in _temperatures())]
    if "class" in stated and stated["class"] not in known:
        context.unknown("unknown-conversion", stated.lines["class"], stated["class"], known)


def _temperature(context: Context, stated: Entry, key: str) -> float:
    return context.number(stated, key, "temperature") if key in stated else DECLARED_AT


def _moisture(context: Context, stated: Entry, key: str) -> float:
    if key not in stated:
        return 0.0
    value = context.not_negative(stated, key, "share")
    row = _moistures().get(stated.get("class", ""))
    most = float(row["most"]) if row and "moisture_coefficient" not in stated else 1.0
    if value > most + SLACK:
        expected = f"at most {100 * most:.4g} %, as printed for the class"
        context.out_of_range(stated, key, expected, "check the moisture content")
        return NAN
    return value


def _per_kelvin(
    context: Context, entry: Entry, stated: Entry, declared: float, sources: list[str]
) -> float:
    """Temperature coefficient, stated or of the class, linear between printed conductivities."""
    if "temperature_coefficient" in stated:
        return float(stated["temperature_coefficient"])
    points = _temperatures().get(stated.get("class", ""))
    if not points:
        _no_coefficient(context, stated, "temperature_coefficient")
        return NAN
    first, last = (float(points[place]["conductivity"]) for place in (0, -1))
    if declared < first - SLACK or declared > last + SLACK:
        expected = f"{first:g} to {last:g} W/(m*K), as printed for class {stated['class']!r}"
        hint = "state 'temperature_coefficient' with its source"
        context.out_of_range(entry, "declared", expected, hint)
        return NAN
    sources.append(f"{points[0]['title']}: {points[0]['source']}")
    found = float(points[0]["per_kelvin"])
    for low, high in pairwise(points):
        start, end = float(low["conductivity"]), float(high["conductivity"])
        if declared >= start - SLACK:
            share = min((declared - start) / (end - start), 1.0)
            found = float(low["per_kelvin"])
            found += share * (float(high["per_kelvin"]) - float(low["per_kelvin"]))
    return found


def _per_moisture(context: Context, stated: Entry, sources: list[str]) -> float:
    """Moisture coefficient, stated or of the class."""
    if "moisture_coefficient" in stated:
        return float(stated["moisture_coefficient"])
    row = _moistures().get(stated.get("class", ""))
    if row is None:
        _no_coefficient(context, stated, "moisture_coefficient")
        return NAN
    sources.append(f"{row['title']}, moisture by {row['basis']}: {row['source']}")
    return float(row["per_share"])


def _no_coefficient(context: Context, stated: Entry, key: str) -> None:
    hint = ", or a 'class' that has one printed"
    context.add("missing-key", stated.line, key=key, where="conversion", hint=hint)


@lru_cache(maxsize=2)
def _table(name: str) -> tuple[Row, ...]:
    with (DATA / f"{name}.csv").open(encoding="utf-8", newline="") as lines:
        return tuple(csv.DictReader(lines))


@lru_cache(maxsize=1)
def _temperatures() -> dict[str, list[Row]]:
    found: dict[str, list[Row]] = {}
    for row in _table("conversion_temperature"):
        found.setdefault(row["class"], []).append(row)
    return found


@lru_cache(maxsize=1)
def _moistures() -> dict[str, Row]:
    return {row["class"]: row for row in _table("conversion_moisture")}
