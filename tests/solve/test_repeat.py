"""Members that run the same way at different spacings stand in line over their common repeat."""

from __future__ import annotations

import pytest

from envcheck.model.layers import Fill, FramedLayer
from envcheck.model.project import Member, Profile
from envcheck.solve.field.bound import bound
from envcheck.solve.field.drawing import NotDrawn, section_of
from envcheck.solve.repeat import common_repeat
from envcheck.solve.wiring import bounds, isothermal_planes, parallel_paths
from tests.solve.drawn import solved, wall_of
from tests.solve.samples import STEEL, WOOL, material, plane

WOOD = material("wood", 0.13, "wood")
BOARD = plane("board", material("board", 0.16), 0.0125)


def studs(depth: float, width: float, spacing: float, way: str = "vertical") -> FramedLayer:
    return FramedLayer(
        "framed", f"members at {spacing:g}", 1, depth, Member(WOOD, width, spacing),
        Fill(material=WOOL), None, "", (), way, False,
    )  # fmt: skip


@pytest.mark.parametrize(
    ("spacings", "bays"),
    [
        ([0.4, 0.6], [3, 2]),
        ([0.6, 0.4, 0.3], [2, 3, 4]),
        ([0.4064, 0.6096], [3, 2]),
        ([0.4, 0.4], [1, 1]),
        ([0.4, 0.61], None),
        ([0.4, 8.0], None),
    ],
)
def test_common_repeat(spacings: list[float], bays: list[int] | None) -> None:
    assert common_repeat(spacings) == bays


def test_girts_over_studs_that_run_the_same_way_are_one_drawing() -> None:
    """Studs at 400 and girts at 600: three and two over 1200 mm, each centred in its first bay."""
    wall = wall_of(studs(0.04, 0.05, 0.6), studs(0.14, 0.04, 0.4), BOARD)
    of = section_of(wall)
    assert sum(of.widths) == pytest.approx(1.2)
    at, places = 0.0, {0: [], 1: []}
    for column, width in enumerate(of.widths):
        for row in places:
            if of.conductivities[row][column] == pytest.approx(0.13):
                places[row].append((round(at, 3), round(at + width, 3)))
        at += width
    girts, members = (_joined(places[row]) for row in (0, 1))
    assert girts == [(0.275, 0.325), (0.875, 0.925)]
    assert members == [(0.18, 0.22), (0.58, 0.62), (0.98, 1.02)]


def _joined(spans: list[tuple[float, float]]) -> list[tuple[float, float]]:
    found: list[tuple[float, float]] = []
    for start, end in spans:
        if found and found[-1][1] == start:
            found[-1] = (found[-1][0], end)
        else:
            found.append((start, end))
    return found


def test_the_wirings_of_the_common_repeat_enclose_it() -> None:
    wall = wall_of(studs(0.04, 0.05, 0.6), studs(0.14, 0.04, 0.4), BOARD)
    low, high = bounds(wall)
    found = bound(section_of(wall))
    assert low <= found.low <= found.high <= high
    assert parallel_paths(wall).u_factor == pytest.approx(low)
    assert isothermal_planes(wall).u_factor == pytest.approx(high)
    words = solved([studs(0.04, 0.05, 0.6), studs(0.14, 0.04, 0.4), BOARD], "two_dimensional")
    assert any("common repeat" in text for text in words.assumptions)
    assert not any("cross each other" in text for text in words.assumptions)


def test_every_bay_is_drawn_the_same_way_round() -> None:
    """C profiles at 400 beside members at 600: three webs, each at the left end of its flange."""
    profile = Profile("C", 0.1, 0.05, 0.001)
    steel = studs(0.1, 0.05, 0.4)._replace(member=Member(STEEL, 0.05, 0.4, profile))
    of = section_of(wall_of(steel, studs(0.04, 0.05, 0.6)))
    at, webs, flanges = 0.0, [], []
    for column, width in enumerate(of.widths):
        if of.conductivities[1][column] == pytest.approx(50):
            webs.append((round(at, 4), round(at + width, 4)))
        if of.conductivities[0][column] == pytest.approx(50):
            flanges.append((round(at, 4), round(at + width, 4)))
        at += width
    assert _joined(webs) == [(0.175, 0.176), (0.575, 0.576), (0.975, 0.976)]
    assert _joined(flanges) == [(0.175, 0.225), (0.575, 0.625), (0.975, 1.025)]


@pytest.mark.parametrize(
    ("layers", "words"),
    [
        ([studs(0.04, 0.05, 0.61), studs(0.14, 0.04, 0.4)], "share no repeat"),
        ([studs(0.04, 0.05, 0.6, "horizontal"), studs(0.14, 0.04, 0.4)], "cross each other"),
    ],
)
def test_what_shares_no_repeat_says_so(layers: list[FramedLayer], words: str) -> None:
    with pytest.raises(NotDrawn, match=words):
        section_of(wall_of(*layers))
