"""Climate zones from degree days, temperatures and rain: criteria of ASHRAE 169.

The zone that a code's own list of places states stands above these criteria: some places disagree.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from typing import NamedTuple

from envcheck.model.project import ByCriteria, Climate, Site

SOURCE = "ANSI/ASHRAE/IES 90.1-2010, Table B-4, and IECC 2006 to 2018, Table 301.3(2)"
LOWER_CDD = {0: 6000.0, 1: 5000.0, 2: 3500.0, 3: 2500.0}
"""Zone -> cooling degree days to base 10 degC above which it holds, K d; zone 0 since 2013."""
UPPER_HDD = {4: 3000.0, 5: 4000.0, 6: 5000.0, 7: 7000.0}
"""Zone -> heating degree days to base 18 degC up to which it holds, K d."""
WARM_MARINE = 2000.0
"""K d to base 18 degC up to which a marine climate is zone 3, not 4."""


def thermal_zone(hdd18: float, cdd10: float, marine: bool = False, hottest: int = 0) -> int:
    """Thermal zone 0 (extremely hot) to 8 (subarctic).

    hdd18: heating degree days to base 18 degC; cdd10: cooling degree days to base 10 degC, K d
    (their twins in inch-pound units are HDD65 and CDD50, 9/5 as many). marine: whether the climate
    is marine, which is zone 3 or 4 by heating alone up to 3000 K d. hottest: 1 under editions
    before 2013, which have no zone 0. Source: SOURCE; zone 0: ASHRAE 169-2013.
    """
    if marine and hdd18 <= UPPER_HDD[4]:
        return 3 if hdd18 <= WARM_MARINE else 4
    for zone in (0, 1, 2):
        if cdd10 > LOWER_CDD[zone]:
            return max(zone, hottest)
    if cdd10 > LOWER_CDD[3] and hdd18 <= UPPER_HDD[4]:
        return 3
    return next((zone for zone, upper in UPPER_HDD.items() if hdd18 <= upper), 8)


def thermal_zone_2013(hdd18: float, cdd10: float) -> int:
    """Thermal zone 0 to 8 since 2013: heating alone where cooling is at most 3500 K d.

    hdd18, cdd10: as in :func:`thermal_zone`. Zone 3 goes up to 2000 K d of heating, whether the
    climate is marine or not. Source: ANSI/ASHRAE Standard 169-2013, annex A (from memory).
    """
    for zone in (0, 1, 2):
        if cdd10 > LOWER_CDD[zone]:
            return zone
    if hdd18 <= WARM_MARINE:
        return 3
    return next((zone for zone, upper in UPPER_HDD.items() if hdd18 <= upper), 8)


def is_dry(precipitation_cm: float, mean_temperature: float) -> bool:
    """Whether a climate that is not marine is dry: P < 2.0 (T + 7).

    precipitation_cm: P, of a year, cm. mean_temperature: T, of a year, degC. In inch-pound units
    the same is printed as P < 0.44 (T - 19.5). Source: IECC 2006 to 2018, 301.3; later editions of
    ASHRAE 169 let the limit depend on the season of the rain.
    """
    return precipitation_cm < 2.0 * (mean_temperature + 7.0)


def is_marine(temperatures: Sequence[float], precipitation: Sequence[float]) -> bool:
    """Whether a climate is marine, by all four criteria at once.

    The coldest month lies between -3 and 18 degC; the warmest below 22 degC; at least four months
    above 10 degC; and the wettest month of the cold season has at least three times the rain of the
    driest month of the rest of the year. temperatures: monthly means, degC, precipitation: of each
    month, one unit for all, both from January; the cold season is October to March north and April
    to September south of the equator, told by which half of the year is colder.
    Source: IECC 2006 to 2018, 301.3.
    """
    if not -3.0 < min(temperatures) < 18.0 or max(temperatures) >= 22.0:
        return False
    if sum(temperature > 10.0 for temperature in temperatures) < 4:
        return False
    summer = warm_season(temperatures)
    cold = [month for month in range(12) if month not in summer]
    return _dry_season(precipitation, cold=cold, rest=summer)


def warm_season(temperatures: Sequence[float]) -> list[int]:
    """Months of the high sun, from 0: April to September, or October to March in the south."""
    north = list(range(3, 9))
    south = [month for month in range(12) if month not in north]
    warmer = sum(temperatures[m] for m in north) >= sum(temperatures[m] for m in south)
    return north if warmer else south


def dry_limit(mean_temperature: float, summer_share: float) -> float:
    """Precipitation below which a climate that is not marine is dry, cm a year.

    2 (T + 14) where at least 70 % of the rain falls in the high-sun half of the year, 2 T where at
    most 30 % does, 2 (T + 7) between. mean_temperature: T, degC. summer_share: 0..1.
    Source: ANSI/ASHRAE Standard 169-2013, annex A (from memory); printed for inches as
    0.44 (T - 7), 0.44 (T - 32) and 0.44 (T - 19.5), degF.
    """
    shift = 14.0 if summer_share >= 0.7 else 0.0 if summer_share <= 0.3 else 7.0
    return 2.0 * (mean_temperature + shift)


def _dry_season(precipitation: Sequence[float], cold: Sequence[int], rest: Sequence[int]) -> bool:
    wettest = max(precipitation[month] for month in cold)
    return wettest >= 3.0 * min(precipitation[month] for month in rest)


def moisture_regime(marine: bool, dry: bool) -> str:
    """``C`` marine, ``B`` dry, ``A`` moist. Source: IECC 2006 to 2018, 301.3."""
    if marine:
        return "C"
    return "B" if dry else "A"


def zone_name(thermal: int, regime: str) -> str:
    """Name of a zone: 4A; zones 7 and 8 have no letter. Source: SOURCE."""
    return str(thermal) if thermal >= 7 else f"{thermal}{regime}"


# ------------------------------------------------------------- the criteria, from a site's facts


class Missing(Exception):
    """A fact of the site that the criteria ask for, in words."""


class Facts(NamedTuple):
    """What the criteria see of a site."""

    hdd18: float
    cdd10: float
    climate: Climate

    @property
    def marine(self) -> bool:
        """Whether the climate is marine: as stated, else by its months. Errors: Missing."""
        climate = self.climate
        if climate.marine is not None:
            return climate.marine
        if not climate.temperatures or not climate.precipitation:
            raise Missing(
                "monthly temperatures and precipitation of the site, or whether its climate is "
                "marine"
            )
        return is_marine(climate.temperatures, climate.precipitation)

    @property
    def year(self) -> tuple[float, float]:
        """Mean temperature, degC, and precipitation, cm, of a year. Errors: Missing."""
        mean, rain = self.climate.mean_temperature, self.climate.annual_precipitation
        if mean is None or rain is None:
            raise Missing("mean temperature and precipitation of a year at the site")
        return mean, 100.0 * rain


def with_criteria(site: Site, names: Iterable[str]) -> Site:
    """Add the zone by each of these criteria to a site."""
    return site._replace(by_criteria=tuple(by_criteria(name, site) for name in names))


def by_criteria(name: str, site: Site) -> ByCriteria:
    """Find the zone by the criteria of that name, with the way to it or what is missing."""
    try:
        zone, why = CRITERIA[name](_facts(site))
    except Missing as missing:
        return ByCriteria(name, "", str(missing))
    source = f" ({site.climate.source})" if site.climate is not None else ""
    return ByCriteria(name, zone, why + source)


def _facts(site: Site) -> Facts:
    measures = dict(site.measures)
    found = {
        name: next((measures[key] for key in keys if key in measures), None)
        for name, keys in (("heating", ("hdd18", "hdd65")), ("cooling", ("cdd10", "cdd50")))
    }
    heating, cooling = found["heating"], found["cooling"]
    if heating is None or cooling is None:
        named = [
            words
            for value, words in ((heating, "hdd18 or hdd65"), (cooling, "cdd10 or cdd50"))
            if value is None
        ]
        raise Missing(f"{' and '.join(named)} of the site")
    return Facts(heating, cooling, site.climate or Climate(""))


def _by_2006(facts: Facts) -> tuple[str, str]:
    """Criteria of ASHRAE 169-2006 and IECC 2006 to 2018."""
    cold = facts.hdd18 > UPPER_HDD[6]
    marine = False if cold else facts.marine
    thermal = thermal_zone(facts.hdd18, facts.cdd10, marine, hottest=1)
    regime, why = _regime(facts, thermal, marine, lambda mean: (2.0 * (mean + 7.0), "2 (T + 7)"))
    return zone_name(thermal, regime), f"{_degree_days(facts)}: zone {thermal}{why}"


def _by_2013(facts: Facts) -> tuple[str, str]:
    """Criteria of ASHRAE 169-2013 and later, and of IECC 2021."""
    thermal = thermal_zone_2013(facts.hdd18, facts.cdd10)
    marine = thermal < 7 and facts.marine

    def limit(mean: float) -> tuple[float, str]:
        rain, months = facts.climate.precipitation, facts.climate.temperatures
        if not rain or not months:
            raise Missing("monthly temperatures and precipitation of the site")
        share = sum(rain[month] for month in warm_season(months)) / (sum(rain) or 1.0)
        most = dry_limit(mean, share)
        form = f"2 (T + {most / 2.0 - mean:.0f})"
        return most, f"{form}, as {share:.0%} falls in the high-sun half of the year"

    regime, why = _regime(facts, thermal, marine, limit)
    return zone_name(thermal, regime), f"{_degree_days(facts)}: zone {thermal}{why}"


def _degree_days(facts: Facts) -> str:
    return f"HDD18 {facts.hdd18:.0f} and CDD10 {facts.cdd10:.0f} K d"


def _regime(
    facts: Facts, thermal: int, marine: bool, limit: Callable[[float], tuple[float, str]]
) -> tuple[str, str]:
    """Letter of the moisture regime, and in words how it was found."""
    if thermal >= 7:
        return "", ", which has no letter"
    if marine:
        return "C", ", marine"
    mean, rain = facts.year
    most, form = limit(mean)
    dry = rain < most
    sign = "<" if dry else ">="
    words = f"P {rain:.1f} cm {sign} {form} = {most:.1f} cm with T {mean:.1f} degC"
    return moisture_regime(False, dry), f", {'dry' if dry else 'moist'}: {words}"


CRITERIA: dict[str, Callable[[Facts], tuple[str, str]]] = {
    "ashrae_169_2006": _by_2006,
    "ashrae_169_2013": _by_2013,
}
"""Name in a rule set -> the criteria."""
