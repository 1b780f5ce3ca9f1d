"""What of a wall can be drawn as a section, and how; invented walls."""

from __future__ import annotations

import pytest

from envcheck.model.project import ContactLayer, Fill, FramedLayer, Layer, Member
from envcheck.solve.field.bound import bound
from envcheck.solve.field.drawing import NotDrawn, section_of
from envcheck.solve.wiring import bounds
from tests.solve.drawn import wall_of
from tests.solve.samples import WOOD, WOOL, material, plane

GYPSUM = plane("gypsum", material("gypsum", 0.16), 0.0127)
SHEATHING = plane("sheathing", material("sheathing", 0.13), 0.011)


def studs(
    spacing: float | None = 0.406, share: float | None = None, way: str = "vertical"
) -> FramedLayer:
    member = Member(WOOD, 0.038, spacing)
    return FramedLayer(
        "framed", "studs", 1, 0.14, member, Fill(WOOL), share, "drawing", (), way, False
    )


def contact(resistance: float) -> ContactLayer:
    return ContactLayer("contact", "contact", 1, resistance, "stated")


def test_members_stand_at_their_spacing_with_equivalent_conductivities() -> None:
    drawn = section_of(wall_of(SHEATHING, studs(), GYPSUM))
    assert drawn.widths == pytest.approx((0.184, 0.038, 0.184))
    assert drawn.depths == pytest.approx((0.011, 0.14, 0.0127))
    expected = [[0.13] * 3, [0.037, 0.13, 0.037], [0.16] * 3]
    assert [list(row) for row in drawn.conductivities] == [pytest.approx(row) for row in expected]
    assert (drawn.outside, drawn.inside, drawn.periodic) == (0.04, 0.13, True)


def test_a_share_is_one_member_of_that_share_of_the_spacing() -> None:
    drawn = section_of(wall_of(SHEATHING, studs(share=0.25)))
    assert drawn.widths[1] == pytest.approx(0.25 * 0.406)
    assert sum(drawn.widths) == pytest.approx(0.406)


def test_layers_of_one_pattern_stand_in_line() -> None:
    drawn = section_of(wall_of(studs(share=0.25), GYPSUM, studs()))
    assert len(drawn.widths) == 5
    assert sum(drawn.widths) == pytest.approx(0.406)
    assert len(drawn.depths) == 3


@pytest.mark.parametrize(
    ("layers", "words"),
    [
        ([studs(), studs(way="horizontal")], "cross each other need three dimensions"),
        ([studs(spacing=None, share=0.25)], "spacing of the members is not stated"),
        ([SHEATHING, GYPSUM], "homogeneous"),
    ],
)
def test_what_cannot_be_drawn_says_why(layers: list[Layer], words: str) -> None:
    with pytest.raises(NotDrawn, match=words):
        section_of(wall_of(*layers))


@pytest.mark.parametrize("resistance", [1e-4, 0.01, 0.5])
def test_a_contact_keeps_its_resistance(resistance: float) -> None:
    wall = wall_of(SHEATHING, contact(resistance), studs(), GYPSUM)
    drawn = section_of(wall)
    assert drawn.depths[1] / drawn.conductivities[1][0] == pytest.approx(resistance)
    found, (low, high) = bound(drawn), bounds(wall)
    assert low <= found.low <= found.high <= high


def test_a_contact_of_no_resistance_is_left_out() -> None:
    assert section_of(wall_of(contact(0.0), studs())) == section_of(wall_of(studs()))
