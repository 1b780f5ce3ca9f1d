"""Criteria of climate zones: borders as printed, and monthly figures from memory.

Monthly means are rounded and from memory; they stand far from the criteria they test.
"""

from __future__ import annotations

import pytest

from envcheck.solve.climate_zone import (
    is_dry,
    is_marine,
    moisture_regime,
    thermal_zone,
    zone_name,
)

# Seattle and London: mean temperatures, degC, and rain, mm, by month.
SEATTLE = (
    [5, 6, 8, 10, 13, 16, 19, 19, 16, 11, 7, 5],
    [141, 89, 94, 69, 49, 40, 18, 22, 41, 88, 167, 136],
)
LONDON = (
    [5, 5, 8, 10, 13, 16, 19, 18, 16, 12, 8, 6],
    [55, 41, 42, 44, 49, 45, 45, 50, 49, 69, 59, 55],
)
CHICAGO = (
    [-4, -2, 4, 10, 16, 21, 24, 23, 19, 12, 5, -2],
    [44, 45, 64, 86, 94, 87, 94, 125, 82, 80, 80, 57],
)


@pytest.mark.parametrize(
    ("hdd18", "cdd10", "zone"),
    [
        (0, 6000.1, 0), (0, 6000, 1), (0, 5000.1, 1), (0, 5000, 2), (0, 3500.1, 2), (0, 3500, 3),
        (3000, 2500.1, 3), (3000, 2500, 4), (3000.1, 2500.1, 5), (4000, 0, 5), (4000.1, 0, 6),
        (5000, 0, 6), (5000.1, 0, 7), (7000, 0, 7), (7000.1, 0, 8),
    ],
)  # fmt: skip
def test_borders_as_printed(hdd18: float, cdd10: float, zone: int) -> None:
    # IECC 2006 to 2018, Table 301.3(2); zone 0: ASHRAE 169-2013.
    assert thermal_zone(hdd18, cdd10) == zone
    assert thermal_zone(hdd18, cdd10, hottest=1) == max(zone, 1)


def test_marine_climates_go_by_heating_alone() -> None:
    assert thermal_zone(2000, 2600, marine=True) == 3
    assert thermal_zone(2000.1, 2600, marine=True) == 4
    assert thermal_zone(3000.1, 1000, marine=True) == 5


def test_marine_by_months_on_both_halves_of_the_earth() -> None:
    for climate, marine in ((SEATTLE, True), (LONDON, False), (CHICAGO, False)):
        warm, rain = climate
        assert is_marine(warm, rain) is marine
        assert is_marine(warm[6:] + warm[:6], rain[6:] + rain[:6]) is marine
    assert not is_marine([t + 4 for t in SEATTLE[0]], SEATTLE[1])  # warmest month 23 degC
    assert not is_marine([t - 9 for t in SEATTLE[0]], SEATTLE[1])  # coldest month -4 degC


@pytest.mark.parametrize("temperature", [-5.0, 0.0, 10.0, 25.0])
def test_dry_is_the_same_in_both_systems(temperature: float) -> None:
    # Printed twins: 2.0 (T + 7) cm and 0.44 (T - 19.5) in, which round each other.
    fahrenheit = temperature * 9 / 5 + 32
    limit = 0.44 * (fahrenheit - 19.5) * 2.54
    assert is_dry(limit - 0.3, temperature)
    assert not is_dry(limit + 0.3, temperature)


def test_names() -> None:
    assert zone_name(4, moisture_regime(marine=False, dry=False)) == "4A"
    assert zone_name(3, moisture_regime(marine=False, dry=True)) == "3B"
    assert zone_name(4, moisture_regime(marine=True, dry=True)) == "4C"
    assert zone_name(7, "A") == "7"
