"""Site, options and answers: the smaller sections of a project file."""

from __future__ import annotations

from typing import TYPE_CHECKING

from envcheck.model.project import Climate, Options, Site, ZoneStated
from envcheck.read.context import Context
from envcheck.read.yaml_reader import Entry
from envcheck.units import to_si

if TYPE_CHECKING:
    from envcheck.model.vapour import IndoorAir

COLDEST = -100.0
HOTTEST = 100.0


def read_site(context: Context, entry: Entry) -> Site:
    """Read the place, its zones, degree days (K d) and altitude (m), and temperatures (deg C)."""
    measures = [
        (name, _degree_days(name, value))
        for name, value in entry.items()
        if name.startswith(("hdd", "cdd"))
    ]
    if "altitude" in entry:
        measures.append(("altitude", context.number(entry, "altitude", "length")))
    return Site(
        place=entry.get("place", ""),
        zones=tuple(
            ZoneStated(
                zone.get("rule_set", ""), str(zone["zone"]), zone.get("source", ""), zone.line
            )
            for zone in entry.get("zones", ())
        ),
        measures=tuple(measures),
        indoor_temperature=temperature(context, entry, "indoor_temperature"),
        outdoor_temperature=temperature(context, entry, "outdoor_temperature"),
        climate=_climate(context, entry["climate"]) if "climate" in entry else None,
        indoor_air=_indoor_air(context, entry),
        line=entry.line,
    )


def _climate(context: Context, entry: Entry) -> Climate:
    """Read monthly means and rain, or those of the year; the months stand above the year."""
    temperatures = _months(context, entry, "temperatures", "temperature")
    rain = _months(context, entry, "precipitation", "length")
    for months, key in ((temperatures, "mean_temperature"), (rain, "annual_precipitation")):
        if months:
            hint = "it follows from the months: delete it"
            context.out_of_place(entry, (key,), "a climate with monthly values", hint)
    mean = temperature(context, entry, "mean_temperature")
    annual = None
    if "annual_precipitation" in entry:
        annual = context.not_negative(entry, "annual_precipitation", "length")
    return Climate(
        entry["source"],
        temperatures,
        rain,
        sum(temperatures) / len(temperatures) if temperatures else mean,
        sum(rain) if rain else annual,
        entry.get("marine"),
        _outdoor_pressures(context, entry, temperatures),
    )


def _outdoor_pressures(
    context: Context, entry: Entry, temperatures: tuple[float, ...]
) -> tuple[float, ...]:
    if "humidities" not in entry and "vapour_pressures" not in entry:
        return ()
    from envcheck.read.humidity import outdoor_pressures  # few projects state moisture

    return outdoor_pressures(context, entry, temperatures)


def _indoor_air(context: Context, entry: Entry) -> IndoorAir | None:
    if "indoor_air" not in entry:
        return None
    from envcheck.read.humidity import indoor_air

    return indoor_air(context, entry["indoor_air"])


def _months(context: Context, entry: Entry, key: str, quantity: str) -> tuple[float, ...]:
    """Twelve quantities from January."""
    texts = entry.get(key)
    if texts is None:
        return ()
    months = Entry(entry.lines[key])
    for place, text in enumerate(texts):
        months[str(place)], months.lines[str(place)] = text, texts.lines[place]
    if quantity == "length":
        return tuple(context.not_negative(months, place, quantity) for place in months)
    return tuple(temperature(context, months, place) or 0.0 for place in months)


def _degree_days(name: str, value: float) -> float:
    """The base temperature in the name tells the unit: no one heats to 32 deg C."""
    return to_si(float(value), "degF*d" if int(name[3:]) >= 32 else "K*d")


def temperature(context: Context, entry: Entry, key: str) -> float | None:
    """Read a temperature that a climate may have, degC; None where it is left out."""
    if key not in entry:
        return None
    value = context.number(entry, key, "temperature")
    if not COLDEST <= value <= HOTTEST and value == value:
        expected = f"{COLDEST:.0f} degC to {HOTTEST:.0f} degC"
        context.out_of_range(entry, key, expected, "check the unit")
    return value


def read_options(context: Context, entry: Entry) -> Options:
    """Read stock thicknesses, m, by material, and what they cost per m2."""
    stock = _by_material(context, entry, "stock", "length")
    costs = _by_material(context, entry, "costs", "per_area")
    sizes = {name: len(each) for name, each in stock}
    for name, each in costs:
        if len(each) != sizes.get(name, 0):
            line = entry["costs"].lines[name]
            found = f"{len(each)} costs for {sizes.get(name, 0)} thicknesses of {name}"
            context.add("costs-differ", line, found=found)
    return Options(stock, costs, entry.get("currency", ""))


def _by_material(
    context: Context, entry: Entry, key: str, quantity: str
) -> tuple[tuple[str, tuple[float, ...]], ...]:
    """Lists of quantities by the id of a material."""
    lists = entry.get(key, Entry(entry.line))
    found = []
    for name, texts in lists.items():
        named = Entry(lists.lines[name])
        named["material"], named.lines["material"] = name, lists.lines[name]
        context.material(named)
        numbered = Entry(texts.line)
        for place, text in enumerate(texts):
            numbered[str(place)], numbered.lines[str(place)] = text, texts.lines[place]
        found.append((name, tuple(context.positive(numbered, x, quantity) for x in numbered)))
    return tuple(found)


def read_answers(context: Context, entries: list[Entry]) -> tuple[tuple[str, str], ...]:
    """Read answers to findings, each as (``finding subject``, answer)."""
    known = context.names.findings
    for entry in entries:
        if known and entry["finding"] not in known:
            context.unknown("unknown-finding", entry.lines["finding"], entry["finding"], known)
    return tuple((f"{entry['finding']} {entry['subject']}", entry["answer"]) for entry in entries)
