"""The trail of a selection: every step that led to the limit, and why no other row did.

Rule sets: ``tests/cases/rules`` (invented), ``tests/cases/law`` (public laws, see their sources).
"""

from __future__ import annotations

from datetime import date
from pathlib import Path
from typing import Any

from envcheck import pipeline
from envcheck.judge.select import select
from envcheck.judge.selection import Selection
from envcheck.model.project import Site
from envcheck.read.rulesets import read_ruleset
from tests.changed import changed
from tests.judge.test_selections import LAW, element, project

RULES = Path(__file__).parent.parent / "cases" / "rules"


def chosen(name: str, folder: Path, case: dict[str, Any], **site: Any) -> Selection:
    own = project(case)
    if site:
        own = changed(own, site=Site("", (), tuple(site.items())))
    ruleset = read_ruleset(name, [folder], own.permit_application_date, pipeline.names())
    return select(element(case), case["category"], ruleset, own)


def steps(selection: Selection) -> list[tuple[str, str, str]]:
    return [(c.step, c.chosen, c.why) for c in selection.trail]


WALL = {
    "category": "wall.wood_frame",
    "date": "2026-03-02",
    "facts": {"work": "new", "space_category": "heated"},
}


def test_every_step_from_the_date_to_the_footnote() -> None:
    selection = chosen("example-2024-hilltown", RULES, WALL, hdd18=5400.0)
    found = steps(selection)
    assert [s for s, _, _ in found[:4]] == ["date", "edition", "amendment", "zone"]
    assert found[0][1] == date(2026, 3, 2).isoformat()
    assert found[3][1:] == ("Zone 3", "hdd18 of the site lies in >=5000")
    row = next(s for s in found if s[0] == "row")
    assert "ordinance 7 s. 3" in row[2]
    assert "replaces 0.045 (example-2024, Table 1)" in row[2]
    assert ("condition", "work new", "the row asks for new (fact of project)") in found
    assert ("path", "assembly", "either path is enough (1.2)") in found


def test_why_no_other_row_holds() -> None:
    selection = chosen("example-2024", RULES, WALL, hdd18=2000.0)
    (other,) = [why for step, what, why in steps(selection) if (step, what) == (
        "no other row", "U-factor")]  # fmt: skip
    assert '"Wall" 0.124 speaks of more than this category' in other
    selection = chosen(
        "us-wi-sps322-r", LAW,
        {"category": "wall.mass", "zone": "1", "date": "2020-01-01",
         "facts": {"mass_wall_insulation": "more_than_half_interior"}},
    )  # fmt: skip
    (other,) = [why for step, _, why in steps(selection) if step == "no other row"]
    assert "asks for mass wall insulation less_than_half_interior" in other
    assert "which is more_than_half_interior" in other


def test_a_footnote_says_what_it_did() -> None:
    case = {"category": "floor.framed", "zone": "1", "date": "2020-01-01",
            "facts": {"framing_cavity_filled": "yes"}}  # fmt: skip
    found = steps(chosen("us-wi-sps322-r", LAW, case))
    words = "or fill the cavity with R-19 at least: 19 instead of 30"
    assert ("footnote", "[h]", words) in found
    case["facts"] = {"framing_cavity_filled": "no"}
    found = steps(chosen("us-wi-sps322-r", LAW, case))
    assert ("footnote", "[h]", "or fill the cavity with R-19 at least: does not apply") in found


def test_a_missing_fact_is_named_with_its_words_and_its_sheet() -> None:
    case = {**WALL, "facts": {"work": "new"}}
    outcome = chosen("example-2024", RULES, case, hdd18=2000.0).outcome("U_assembly")
    assert outcome is not None and outcome.state == "missing_fact"
    said = outcome.why
    assert "space category (heated or semiheated) is not stated" in said
    assert "it belongs on the mechanical schedule" in said


def test_rows_that_a_missing_fact_would_choose_between_are_printed() -> None:
    case = {"category": "fenestration.fixed", "date": "2026-03-02", "facts": {"wwr": 0.3}}
    found = steps(chosen("example-2024", RULES, case, hdd18=2000.0))
    (row,) = [why for _, what, why in found if what == "SHGC: none"]
    assert "orientation (N or E or S or W) is not stated" in row
    gain = "Solar heat gain coefficient"
    assert f'; open between "{gain}" 0.25 and "{gain}" 0.40' in row


def test_a_step_in_time_shows_the_day() -> None:
    case = {"category": "fenestration.fixed", "zone": "1", "date": "2023-11-01",
            "facts": {"building": "housing"}}  # fmt: skip
    found = steps(chosen("nz-h1-as1-5", LAW, case))
    (why,) = [why for _, what, why in found if what == "from date 2023-11-01"]
    assert why.startswith("the row asks for from 2023-05-01 before 2023-11-02 (permit application")


def test_interpolation_shows_both_rows() -> None:
    from envcheck.judge.select import select_envelope

    case = {"category": "envelope", "zone": "D", "date": "2020-06-01",
            "facts": {"use": "residential", "work": "new", "compactness": 2.5}}  # fmt: skip
    own = project(case)
    ruleset = read_ruleset("es-cte-he1-2019", [LAW], date(2020, 6, 1), pipeline.names())
    found = [why for step, _, why in steps(select_envelope(ruleset, own)) if step == "row"]
    assert "0.58 (between 0,48 at 1 and 0,67 at 4)" in found[0]
