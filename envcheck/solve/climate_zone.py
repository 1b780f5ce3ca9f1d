"""Climate zones from degree days, temperatures and rain: criteria of ASHRAE 169.

The zone that a code's own list of places states stands above these criteria: some places disagree.
"""

from __future__ import annotations

from collections.abc import Sequence

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
    warm = range(3, 9)
    cold = [month for month in range(12) if month not in warm]
    if sum(temperatures[m] for m in warm) < sum(temperatures[m] for m in cold):
        return _dry_season(precipitation, cold=list(warm), rest=cold)
    return _dry_season(precipitation, cold=cold, rest=list(warm))


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
