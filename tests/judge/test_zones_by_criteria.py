"""Climate zones by the criteria that a rule set names; sites and rule sets are invented.

Monthly means and sums are rounded and from memory; they stand far from the criteria they test.
"""

from __future__ import annotations

import json

import pytest

from envcheck.judge.zones import ZoneFound, contradicted, find_zone
from envcheck.model.project import Climate, Site, ZoneStated
from envcheck.model.ruleset import Condition, Zones
from envcheck.read.schema import schema_text
from envcheck.solve.climate_zone import CRITERIA, by_criteria, with_criteria
from tests.judge import crosscheck_models as m
from tests.solve.test_climate_zone import CHICAGO, SEATTLE

ORDER = ("2", "3", "4 except Marine", "5 and Marine 4", "6")
MEMBERS = {"5 and Marine 4": ("5", "4C"), "4 except Marine": ("4A", "4B")}


def climate(months: tuple[list[int], list[int]]) -> Climate:
    warm, rain = (tuple(map(float, values)) for values in months)
    metres = tuple(value / 1000 for value in rain)
    return Climate("normals", warm, metres, sum(warm) / 12, sum(metres))


def site(hdd18: float, cdd10: float, weather: Climate | None, stated: str = "") -> Site:
    zones = (ZoneStated("", stated, "county list", 1),) if stated else ()
    return Site("X", zones, (("hdd18", hdd18), ("cdd10", cdd10)), climate=weather)


def find(where: Site, criteria: str = "ashrae_169_2006", **bounds: Condition) -> ZoneFound:
    by_measure = {"hdd18": bounds} if bounds else {}
    zones = Zones(ORDER, MEMBERS, by_measure, "a map", ("A", "B", "C"), criteria)
    ruleset = m.ruleset()._replace(zones=zones)
    return find_zone(ruleset, with_criteria(where, [criteria]))


def test_the_reader_knows_the_criteria_that_are_computed() -> None:
    zones = json.loads(schema_text("rules"))["properties"]["zones"]["properties"]
    assert zones["criteria"]["enum"] == list(CRITERIA)


@pytest.mark.parametrize("criteria", CRITERIA)
def test_a_marine_and_a_moist_site(criteria: str) -> None:
    # Degree days of Seattle and Chicago, 90.1 appendix D (from memory): 4908 and 6536 degF d of
    # heating, 1823 and 2941 of cooling.
    seattle = find(site(4908 / 1.8, 1823 / 1.8, climate(SEATTLE)), criteria)
    assert seattle.heads == ("5 and Marine 4",)
    assert f"4C by {criteria} from HDD18 2727 and CDD10 1013 K d: zone 4, marine" in str(
        seattle.trail
    )
    chicago = find(site(6536 / 1.8, 2941 / 1.8, climate(CHICAGO)), criteria)
    assert chicago.heads == ("5 and Marine 4",)
    (choice,) = chicago.trail
    assert "zone 5, moist: P 93.8 cm >= 2 (T + 7)" in choice.why  # T = 10.5 degC
    assert "= 35.0 cm with T 10.5 degC (normals)" in choice.why
    assert "the letter A falls back to 5" in choice.why


def test_facts_that_are_missing_are_named() -> None:
    bare = find(Site("X"))
    assert bare.state == "zone_missing"
    assert "hdd18 or hdd65 and cdd10 or cdd50 of the site" in bare.why
    dry = find(site(2700, 1000, None))
    assert "whether its climate is marine" in dry.why
    year = find(site(2700, 1000, Climate("a station", marine=False)))
    assert "mean temperature and precipitation of a year" in year.why
    months = find(site(2700, 1000, Climate("x", (), (), 12.0, 0.3, False)), "ashrae_169_2013")
    assert "monthly temperatures and precipitation" in months.why


def test_cold_zones_need_no_rain() -> None:
    assert by_criteria("ashrae_169_2006", site(5500, 800, None)).zone == "7"
    assert by_criteria("ashrae_169_2013", site(7100, 500, None)).zone == "8"


def test_editions_differ_between_three_and_four() -> None:
    warm = Climate("x", (), (), 17.0, 1.0, False)
    # 2300 K d of heating and 2600 of cooling: zone 3 by Table 301.3(2), 4 since 169-2013.
    assert by_criteria("ashrae_169_2006", site(2300, 2600, warm)).zone == "3A"
    months = climate(([17] * 12, [80] * 12))
    assert by_criteria("ashrae_169_2013", site(2300, 2600, months)).zone == "4A"


@pytest.mark.parametrize(("summer", "zone"), [(72, "3B"), (40, "3A"), (8, "3A")])
def test_rain_in_summer_counts_less_since_2013(summer: int, zone: str) -> None:
    # 480 mm a year at 12 degC: dry below 520 (90 % in summer), 380 (half) or 240 mm (a tenth).
    halves = [7] * 3 + [17] * 6 + [7] * 3, [80 - summer] * 3 + [summer] * 6 + [80 - summer] * 3
    weather = climate(halves)._replace(marine=False)
    assert by_criteria("ashrae_169_2013", site(1900, 2600, weather)).zone == zone


def test_a_stated_zone_stands_above_the_criteria_and_is_a_finding() -> None:
    where = site(6536 / 1.8, 2941 / 1.8, climate(CHICAGO), stated="6")
    assert find(where).heads == ("6",)
    zones = Zones(ORDER, MEMBERS, {}, "a map", ("A", "B", "C"), "ashrae_169_2006")
    ruleset = m.ruleset()._replace(zones=zones)
    told = contradicted(ruleset, with_criteria(where, ["ashrae_169_2006"]))
    assert told is not None and told[0] == "6" and told[1].zone == "5A"
    agreed = where._replace(zones=(ZoneStated("", "5", "county list", 1),))
    assert contradicted(ruleset, with_criteria(agreed, ["ashrae_169_2006"])) is None
    assert contradicted(ruleset, agreed) is None


def test_bounds_that_disagree_leave_the_zone_open() -> None:
    cold = Condition("hdd18", low=3500.0, text=">3500")
    found = find(site(6536 / 1.8, 2941 / 1.8, climate(CHICAGO)), **{"6": cold})
    assert found.state == "zone_ambiguous"
    assert "bounds and criteria disagree" in found.why


def test_a_zone_that_the_rule_set_does_not_print_is_said() -> None:
    found = find(site(7500, 500, None))
    assert found.state == "zone_unknown" and "no zone 8" in found.why
