"""Which limit is selected and why: zone, row, conditions, and what stands in the way.

Limits are built here by hand; all of them are invented. The order of the steps is common practice
in codes with climate zones and amendments, no source.
"""

from __future__ import annotations

from datetime import date
from time import perf_counter

import pytest

from envcheck.judge.select import select
from envcheck.judge.selection import Selection
from envcheck.judge.zones import find_zone
from envcheck.model.project import Element, Fact, Options, Project, Site, ZoneStated
from envcheck.model.ruleset import (
    Condition,
    Conventions,
    Dimension,
    Edition,
    Limit,
    Note,
    RuleSet,
    Term,
    Zones,
)
from tests.changed import changed

DAY = date(2026, 3, 2)


def words(dimension: str, *allowed: str) -> Condition:
    return Condition(dimension, allowed, text="|".join(allowed))


def upto(dimension: str, low: float | None, high: float | None) -> Condition:
    return Condition(dimension, (), low, high, False, True, f"({low},{high}]")


def limit(
    zone: str,
    category: str,
    number: str,
    *when: Condition,
    metric: str = "U_assembly",
    path: str = "",
    kind: str = "number",
    notes: tuple[Note, ...] = (),
) -> Limit:
    conditions = ",".join(c.text for c in when)
    return Limit(
        id=f"town/T1/{zone}/{category}/{metric}[{conditions}]", ruleset="town", table="T1",
        clause="Table 1", zone=zone, row=category, label=category, categories=(category,),
        metric=metric, sense="max", unit="W/(m2 K)", cell=number, kind=kind,
        alternatives=((Term(float(number), number),),) if kind == "number" else (), when=when,
        path=path, applies_to="each_component", notes=notes, src="P", file="town/t.csv", line=2,
    )  # fmt: skip


ZONES = Zones(
    order=("Z1", "Z2", "Z3 and Z2w"),
    members={"Z3 and Z2w": ("Z3", "Z2w")},
    bounds={
        "hdd18": {
            "Z1": Condition("hdd18", (), None, 2000.0, False, False, "<2000"),
            "Z2": Condition("hdd18", (), 2000.0, 3000.0, True, False, "[2000,3000)"),
            "Z3 and Z2w": Condition("hdd18", (), 3000.0, None, True, False, ">=3000"),
        }
    },
    chosen_by="degree days of the site",
    suffixes=("w",),
)
DIMENSIONS = {
    "space": Dimension("space", ("heated", "semiheated"), sheet="mechanical schedule"),
    "work": Dimension("work", ("new", "alteration"), default="new"),
    "orientation": Dimension("orientation", ("N", "E", "S", "W"), sheet="elevations"),
    "window_wall_ratio": Dimension("window_wall_ratio"),
    "slab_heated": Dimension("slab_heated", ("yes", "no"), sheet="mechanical schedule"),
}
BASE = Edition("town", "Town code", "2025", "", date(2025, 1, 1), None, True, "0" * 64)


def rules(*limits: Limit, zones: Zones = ZONES, chain: tuple[Edition, ...] = (BASE,)) -> RuleSet:
    return RuleSet(
        id="town", title="Town code", jurisdiction="nowhere", status="example", invented=True,
        checked_by="", chain=chain, units="SI", zones=zones, dimensions=DIMENSIONS, limits=limits,
        paths_clause="1.2", compare="rounded_to_printed_decimals", rounding_clause="",
        rounding_stated=False, conventions=Conventions(), area_limits=(), averaging=(),
        tradeoff=None, trigger=None, exceptions=(), not_judged=(), folder="rules/town",
    )  # fmt: skip


def site(*zones: str, **measures: float) -> Site:
    stated = tuple(ZoneStated("town", zone, "map", 3) for zone in zones)
    return Site("nowhere", stated, tuple(measures.items()))


def project(where: Site | None = None, **facts: str | float | bool) -> Project:
    stated = tuple(Fact(name, value, "G-001", 5) for name, value in facts.items())
    return Project(
        file="p.yaml", title="t", reference="", prepared_by="", permit_application_date=DAY,
        report_date=None, scope="new", invented="", units="SI", site=where or site("Z2"),
        facts=stated, rule_sets=(), materials={}, assemblies={}, surfaces={}, elements={},
        exceptions=(), options=Options(),
    )  # fmt: skip


def element(category: str = "wall.mass", facing: str = "", **facts: str | float | bool) -> Element:
    stated = tuple(Fact(name, value, "A-1", 9) for name, value in facts.items())
    return Element(
        tag="E1", assembly="W1", category=category, sheet="A-1", surface="", line=8, net_area=1.0,
        gross_area=None, perimeter=None, count=None, host="", adjoins="outdoors", facing=facing,
        tilt=90.0, depth_below_grade=None, insulated_depth=None, renewed=None, measured="outside",
        mean_with="", facts=stated, bridges=(),
    )  # fmt: skip


def pick(ruleset: RuleSet, own: Element, of: Project | None = None, **derived: float) -> Selection:
    return select(own, own.category, ruleset, of or project(), derived)


# --------------------------------------------------------------------------------------- zone


@pytest.mark.parametrize(
    ("stated", "heads", "words_"),
    [
        ("Z1", ("Z1",), "stated Z1 (map)"),
        ("Z3", ("Z3 and Z2w",), "Z3 belongs to Z3 and Z2w"),
        ("Z2w", ("Z3 and Z2w",), "Z2w belongs to"),
        ("Z3w", ("Z3 and Z2w",), "the letter w falls back to Z3"),
        ("Z1w", ("Z1",), "falls back to Z1"),
        ("Z3 and Z2w", ("Z3 and Z2w",), "stated Z3 and Z2w"),
    ],
)
def test_members_come_before_dropped_letters(
    stated: str, heads: tuple[str, ...], words_: str
) -> None:
    found = find_zone(rules(), site(stated))
    assert (found.state, found.heads) == ("found", heads)
    assert words_ in found.trail[0].why


@pytest.mark.parametrize(
    ("days", "head"), [(1999.9, "Z1"), (2000.0, "Z2"), (2999.0, "Z2"), (3000.0, "Z3 and Z2w")]
)
def test_zone_by_degree_days(days: float, head: str) -> None:
    assert find_zone(rules(), site(hdd18=days)).heads == (head,)


def test_a_rounding_error_of_units_does_not_move_the_zone() -> None:
    assert find_zone(rules(), site(hdd18=3000.0 * (1 - 1e-15))).heads == ("Z3 and Z2w",)


def test_the_stated_zone_stands_over_the_bounds_and_says_so() -> None:
    found = find_zone(rules(), site("Z1", hdd18=2500.0))
    assert found.heads == ("Z1",)
    assert "would give Z2, the stated zone is used" in found.trail[0].why


def test_zones_that_cannot_be_found() -> None:
    assert find_zone(rules(), site()).state == "zone_missing"
    assert "hdd18" in find_zone(rules(), site()).why
    assert find_zone(rules(), site("Z1", "Z2")).state == "zone_ambiguous"
    unknown = find_zone(rules(), site("Z22"))
    assert unknown.state == "zone_unknown" and "did you mean 'Z2'?" in unknown.why


def test_a_zone_stated_for_another_rule_set_is_not_taken() -> None:
    other = Site("nowhere", (ZoneStated("elsewhere", "Z1", "map", 3), ZoneStated("", "Z2", "", 4)))
    assert find_zone(rules(), other).heads == ("Z2",)
    mine = changed(other, zones=(*other.zones, ZoneStated("town", "Z3", "map", 5)))
    assert find_zone(rules(), mine).heads == ("Z3 and Z2w",)


def test_a_single_zone_needs_no_statement() -> None:
    one = Zones(("all",), {}, {}, "whole country")
    assert find_zone(rules(zones=one), site()).heads == ("all",)
    none = Zones((), {}, {}, "")
    found = pick(rules(limit("*", "wall.mass", "0.3"), zones=none), element(), project(site()))
    assert found.limit("U_assembly").cell == "0.3"


def test_no_zone_no_limit() -> None:
    found = pick(rules(limit("Z2", "wall.mass", "0.3")), element(), project(site()))
    assert (found.state, found.outcomes, found.verdict_of("U_assembly")) == (
        "zone_missing",
        (),
        "not_decided",
    )
    assert "neither the zone" in found.reason_of("U_assembly")


# ---------------------------------------------------------------------------------------- row


def test_the_most_specific_row_counts() -> None:
    ruleset = rules(
        limit("Z2", "wall.*", "0.40"), limit("Z2", "*", "0.50"), limit("Z2", "wall.mass", "0.30")
    )
    assert pick(ruleset, element()).limit("U_assembly").cell == "0.30"
    assert pick(ruleset, element("wall.other")).limit("U_assembly").cell == "0.40"
    assert pick(ruleset, element("floor.mass")).limit("U_assembly").cell == "0.50"


def test_a_general_row_takes_what_the_specific_one_leaves() -> None:
    ruleset = rules(
        limit("Z2", "wall.mass", "0.30", words("space", "heated")),
        limit("Z2", "wall.*", "0.60", words("space", "semiheated")),
    )
    assert pick(ruleset, element(space="heated")).limit("U_assembly").cell == "0.30"
    assert pick(ruleset, element(space="semiheated")).limit("U_assembly").cell == "0.60"


def test_no_row() -> None:
    found = pick(rules(limit("Z2", "wall.mass", "0.3")), element("roof.attic"))
    assert (found.state, found.verdict_of("U_assembly")) == ("not_in_table", "not_in_table")
    assert "covers roof (attic) for zone Z2" in found.reason_of("U_assembly")
    other = pick(rules(limit("Z1", "wall.mass", "0.3")), element())
    assert other.state == "not_in_table"


def test_every_metric_and_path_of_the_category() -> None:
    ruleset = rules(
        limit("Z2", "fenestration.fixed", "1.4", metric="U_product"),
        limit("Z2", "fenestration.*", "0.4", words("orientation", "E", "S"), metric="SHGC"),
        limit("Z2", "wall.mass", "0.3", path="assembly"),
        limit("Z2", "wall.mass", "3.5", metric="R_insulation", path="insulation"),
    )
    window = pick(ruleset, element("fenestration.fixed", facing="S"))
    assert window.metrics == ("U_product", "SHGC")
    wall = pick(ruleset, element())
    assert wall.metrics == ("U_assembly",)
    assert wall.limit("U_assembly").cell == "0.3"
    assert wall.limit("R_insulation", "insulation").cell == "3.5"


def test_a_code_of_insulation_alone() -> None:
    ruleset = rules(limit("Z2", "wall.mass", "3.5", metric="R_insulation", path="insulation"))
    found = pick(ruleset, element())
    assert found.metrics == ("R_insulation",) and found.limit("R_insulation").cell == "3.5"


# ---------------------------------------------------------------------------------- conditions

BY_SPACE = rules(
    limit("Z2", "wall.mass", "0.30", words("space", "heated"), words("work", "new")),
    limit("Z2", "wall.mass", "0.50", words("space", "semiheated")),
)


def test_element_over_project_over_derived_over_default() -> None:
    of = project(space="heated")
    assert pick(BY_SPACE, element(), of).limit("U_assembly").cell == "0.30"
    assert pick(BY_SPACE, element(space="semiheated"), of).limit("U_assembly").cell == "0.50"
    altered = pick(BY_SPACE, element(), project(space="heated", work="alteration"))
    assert altered.outcome("U_assembly").state == "not_in_table"
    ruleset = rules(limit("Z2", "wall.mass", "0.3", upto("window_wall_ratio", None, 0.3)))
    assert pick(ruleset, element(), window_wall_ratio=0.3).limit("U_assembly").cell == "0.3"
    assert pick(ruleset, element(), window_wall_ratio=0.31).limit("U_assembly") is None
    typed = pick(ruleset, element(), project(window_wall_ratio=0.2), window_wall_ratio=0.9)
    assert typed.limit("U_assembly") is not None


def test_a_missing_fact_names_its_words_and_sheet() -> None:
    found = pick(BY_SPACE, element()).outcome("U_assembly")
    assert (found.state, found.limit) == ("missing_fact", None)
    (fact,) = found.missing
    assert (fact.name, fact.allowed, fact.sheet) == (
        "space", ("heated", "semiheated"), "mechanical schedule",
    )  # fmt: skip
    assert found.why == (
        "space (heated or semiheated) is not stated; it belongs on the mechanical schedule"
    )
    assert {x.cell for x in found.candidates} == {"0.30", "0.50"}
    assert pick(BY_SPACE, element()).verdict_of("U_assembly") == "not_decided"


def test_a_fact_that_no_longer_matters_is_not_asked_for() -> None:
    ruleset = rules(
        limit("Z2", "slab.edge", "0.9", words("space", "heated"), words("slab_heated", "no")),
        limit("Z2", "slab.edge", "1.0", words("space", "heated"), words("slab_heated", "yes")),
        limit("Z2", "slab.edge", "NR", words("space", "semiheated"), kind="no_requirement"),
    )
    found = pick(ruleset, element("slab.edge", space="semiheated"))
    assert found.limit("U_assembly").kind == "no_requirement"
    found = pick(ruleset, element("slab.edge", space="heated"))
    assert [m.name for m in found.outcome("U_assembly").missing] == ["slab_heated"]
    answered = pick(ruleset, element("slab.edge", space="heated", slab_heated=False))
    assert answered.limit("U_assembly").cell == "0.9"


def test_a_word_that_the_rule_set_does_not_know_is_never_a_pass() -> None:
    found = pick(BY_SPACE, element(space="semi-heated")).outcome("U_assembly")
    assert found.state == "missing_fact"
    assert "is stated as semi-heated (fact of E1, sheet A-1)" in found.why
    ruleset = rules(limit("Z2", "wall.mass", "0.3", upto("window_wall_ratio", None, 0.3)))
    assert (
        pick(ruleset, element(window_wall_ratio="much")).verdict_of("U_assembly") == "not_decided"
    )


def test_words_are_compared_without_case() -> None:
    assert pick(BY_SPACE, element(space="Semiheated")).limit("U_assembly").cell == "0.50"


def test_facing_stands_for_orientation() -> None:
    ruleset = rules(limit("Z2", "fenestration.fixed", "0.4", words("orientation", "S")))
    assert pick(ruleset, element("fenestration.fixed", "S")).limit("U_assembly") is not None
    assert (
        pick(ruleset, element("fenestration.fixed", "N")).verdict_of("U_assembly") == "not_in_table"
    )
    assert (
        pick(ruleset, element("fenestration.fixed", "SE")).verdict_of("U_assembly") == "not_decided"
    )
    assert pick(ruleset, element("fenestration.fixed")).verdict_of("U_assembly") == "not_decided"


def test_two_rows_that_differ_are_both_named() -> None:
    ruleset = rules(limit("Z2", "*.mass", "0.30"), limit("Z2", "wall.*", "0.40"))
    found = pick(ruleset, element()).outcome("U_assembly")
    assert found.state == "two_rows" and found.limit is None
    assert "0.30" in found.why and "0.40" in found.why


def test_a_zone_in_two_printed_zones_of_one_table_is_two_rows() -> None:
    both = changed(ZONES, members={"Z1": ("Z5",), "Z2": ("Z5",)})
    ruleset = rules(limit("Z1", "wall.mass", "0.4"), limit("Z2", "wall.mass", "0.3"), zones=both)
    assert pick(ruleset, element(), project(site("Z5"))).outcome("U_assembly").state == "two_rows"


# --------------------------------------------------------------------------------------- trail


def test_the_trail_tells_every_step_in_order() -> None:
    later = Edition(
        "town-1", "Amendment 1", "2025", "s. 1", date(2026, 7, 1), None, False, "1" * 64
    )
    note = Note("a", "info", "a remark", False)
    wall = limit("Z2", "wall.mass", "0.30", words("space", "heated"), notes=(note,))
    ruleset = rules(changed(wall, replaced="0.35 (old, Table 1)"), chain=(BASE, later))
    trail = pick(ruleset, element(space="heated")).trail
    assert [c.step for c in trail] == [
        "date", "edition", "amendment", "zone", "row", "condition", "footnote",
    ]  # fmt: skip
    said = {c.step: f"{c.chosen}; {c.why}" for c in trail}
    assert "2026-03-02" in said["date"]
    assert "not in force on that date" in said["amendment"]
    assert "replaces 0.35 (old, Table 1)" in said["row"]
    assert "space heated" in said["condition"] and "sheet A-1" in said["condition"]


def test_an_edition_not_in_force_decides_nothing() -> None:
    early = changed(BASE, effective_from=date(2027, 1, 1), in_force=False)
    found = pick(rules(limit("Z2", "wall.mass", "0.3"), chain=(early,)), element())
    assert (found.state, found.verdict_of("U_assembly")) == ("not_in_force", "not_decided")
    reason = found.reason_of("U_assembly")
    assert "2027-01-01" in reason and "2026-03-02" in reason


def test_equal_elements_share_one_selection_and_others_do_not() -> None:
    of = project(space="heated")
    first, second = pick(BY_SPACE, element(), of), pick(BY_SPACE, element(), of)
    assert first is second
    assert pick(BY_SPACE, element(space="semiheated"), of) is not first
    assert pick(BY_SPACE, element(), project(space="semiheated")).limit("U_assembly").cell == "0.50"
    assert pick(BY_SPACE, element(), of).limit("U_assembly").cell == "0.30"


def test_a_thousand_elements_cost_little() -> None:
    of = project(space="heated")
    elements = [changed(element(), tag=f"E{i}") for i in range(1000)]
    started = perf_counter()
    for own in elements:
        pick(BY_SPACE, own, of)
    assert perf_counter() - started < 0.5  # about 0.01 s on an ordinary core
