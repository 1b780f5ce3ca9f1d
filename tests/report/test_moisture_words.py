"""What the moisture check says where it must not judge, and that nothing else slips in."""

from __future__ import annotations

import pytest

from envcheck.model.moisture import Check, Moisture, Month, Plane, Sheet, Year
from envcheck.report.moisture import NONE_COMPUTED, build
from envcheck.report.moisture_page import sections
from tests.report.fixture import PROJECT

MONTH = Month(0.0, 500.0, 20.0, 1168.0, 12.6, 0.63)
ONE = Moisture(
    "W1", "wall", "A-1", ("E1",), sheets=(Sheet("brick", 0.5, 2.0, "table", 10.0, 0.2),),
    factor=0.9, year=Year(0, (), ()),
)  # fmt: skip
GATHERS = Year(10, (Plane("a / b", (0.1,) * 12, 0.1, 1, 0.0),), ())
WHY = ("insulation inside masonry: rain decides there",)


def says(one: Moisture) -> tuple[str, ...]:
    check = Check((), (MONTH,) * 12, 0, (one,))
    return build(check, PROJECT, "SI", False).assemblies[0].says


def test_nothing_computed_is_no_statement_that_it_is_dry() -> None:
    assert NONE_COMPUTED in says(ONE)
    assert "not a statement that the wall is dry" in NONE_COMPUTED


@pytest.mark.parametrize("year", [Year(0, (), ()), GATHERS])
def test_nothing_favourable_where_it_must_not_judge(year: Year) -> None:
    said = says(ONE._replace(withheld=WHY, year=year))
    assert [text for text in said if "no statement" not in text] == []
    assert NONE_COMPUTED not in said and not any("is not below" in text for text in said)


def test_what_is_left_adds_up() -> None:
    wet = GATHERS._replace(planes=(GATHERS.planes[0]._replace(left=0.05),))
    said = " ".join(says(ONE._replace(year=wet)))
    assert "0.0500 kg/m2 is left, which adds up year by year" in said


def test_what_is_missing_stands_alone() -> None:
    assert says(ONE._replace(missing=("mu of brick",))) == ()
    page = sections(build(Check(("the air of the rooms",)), PROJECT, "SI", False))
    assert len(page) == 1 and "the air of the rooms" in str(page)
