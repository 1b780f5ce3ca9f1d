"""Humidity outdoors and in the rooms, for the moisture check."""

from __future__ import annotations

from collections.abc import Callable

from envcheck.model.moisture import MONTHS as NAMES
from envcheck.model.vapour import IndoorAir, saturation_pressure
from envcheck.read.context import NAN, Context
from envcheck.read.materials import rows
from envcheck.read.site import COLDEST, HOTTEST, temperature
from envcheck.read.yaml_reader import Entry


def outdoor_pressures(
    context: Context, entry: Entry, temperatures: tuple[float, ...]
) -> tuple[float, ...]:
    """Monthly vapour pressures, Pa, stated or from relative humidities at the mean temperatures.

    Air cannot hold more than saturated vapour: a pressure above that is a problem.
    """
    key = context.exactly_one(entry, ("humidities", "vapour_pressures"), "climate")
    if not temperatures and key:
        hint = ", twelve monthly means"
        context.add("missing-key", entry.line, key="temperatures", where="climate", hint=hint)
    if not key or not temperatures:
        return ()
    months = listed(entry, key)
    saturated = [_saturated(each) for each in temperatures]
    if key == "humidities":
        shares = [_share(context, months, place) for place in months]
        return tuple(share * most for share, most in zip(shares, saturated, strict=True))
    pressures = [context.positive(months, place, "vapour_pressure") for place in months]
    for place, pressure, most in zip(months, pressures, saturated, strict=True):
        if pressure > most:
            expected = f"at most {most:.0f} Pa, saturation at the mean temperature of that month"
            context.out_of_range(months, place, expected, "check the unit and the month")
    return tuple(pressures)


def indoor_air(context: Context, entry: Entry) -> IndoorAir:
    """Air of the rooms: a temperature, and a relative humidity or a humidity class."""
    where = "indoor_air"
    warm = context.exactly_one(entry, ("temperature", "temperatures"), where)
    damp = context.exactly_one(entry, ("humidity", "humidities", "humidity_class"), where)
    temperatures = monthly(context, entry, warm, _temperature) if warm else ()
    if damp == "humidity_class":
        number = entry[damp]
        row = rows("humidity_classes")[str(number)]
        return IndoorAir(
            entry["source"], temperatures, (), number, float(row["excess"]), row["source"]
        )
    shares = monthly(context, entry, damp, _share) if damp else ()
    return IndoorAir(entry["source"], temperatures, shares)


def monthly(
    context: Context, entry: Entry, key: str, read: Callable[[Context, Entry, str], float]
) -> tuple[float, ...]:
    """Twelve values of a key, from January; one text counts for every month."""
    if isinstance(entry[key], str):
        return (read(context, entry, key),) * len(NAMES)
    months = listed(entry, key)
    return tuple(read(context, months, place) for place in months)


def listed(entry: Entry, key: str) -> Entry:
    """The texts of a list by key and month, each with its line."""
    texts = entry[key]
    months = Entry(entry.lines[key])
    for place, text in enumerate(texts):
        name = f"{key}, {NAMES[place]}"
        months[name], months.lines[name] = text, texts.lines[place]
    return months


def _share(context: Context, entry: Entry, key: str) -> float:
    return context.share(entry, key, whole=True)


def _temperature(context: Context, entry: Entry, key: str) -> float:
    return temperature(context, entry, key) or 0.0


def _saturated(temperature: float) -> float:
    """NaN where the temperature was refused."""
    return saturation_pressure(temperature) if COLDEST <= temperature <= HOTTEST else NAN
