"""Masonry units: sums by hand by the isothermal planes of shells, webs and cells.

Conductivity of block concrete: k = 0.5 e^(0.02 d) Btu in/(h ft2 degF), d in lb/ft3 (formula of ACI
122R, from memory); air in cells R-0.97 (handbook, from memory). The walls are invented.
"""

from __future__ import annotations

from math import exp

import pytest

from envcheck.model.project import Fill, MasonryLayer, Slab
from envcheck.solve.field.bound import bound
from envcheck.solve.field.drawing import NotDrawn, section_of
from envcheck.solve.methods.masonry import column_shares
from envcheck.solve.wiring import bounds
from tests.solve.drawn import solved, value, wall_of
from tests.solve.samples import (
    INCH,
    R_IP,
    U_IP,
    XPS,
    assembly,
    assert_recomputes,
    material,
    plane,
)

K = 0.5 * exp(0.02 * 115)
CONCRETE = material("block concrete", K * INCH / R_IP, "masonry")
PERLITE = material("perlite", 0.31 * INCH / R_IP, "insulation")
GROUT = material("grout", 1.4, "masonry")
MORTAR = material("mortar", 0.9, "masonry")
BLOCK = MasonryLayer(
    "masonry", "8 in block", 1, 7.625 * INCH, CONCRETE, 1.25 * INCH, 0.20, Fill(), None, 0.0, 0.0,
    None, 0.97 * R_IP,
)  # fmt: skip
FILLED = BLOCK._replace(cell_resistance=None, fill=Fill(PERLITE))
FILMS = {"outside_film": 0.17 * R_IP, "inside_film": 0.68 * R_IP}
SHELL, WEB, CORE = 1.25 / K, 5.125 / K, 5.125 / 0.31


# Hand sums: .85 of films, two shells .251, webs 20 % of 1.028 beside cells of .97 or 16.5.
@pytest.mark.parametrize(
    ("block", "outside", "cell", "printed"),
    [
        (BLOCK, 1.5, 0.97, 0.1017),
        (BLOCK, 2.0, 0.97, 0.0811),
        (FILLED, 0.0, CORE, 0.1829),
        (FILLED, 1.0, CORE, 0.0955),
    ],
)
def test_block_by_planes(block: MasonryLayer, outside: float, cell: float, printed: float) -> None:
    layers = [plane("XPS", XPS, outside * INCH), block] if outside else [block]
    found = solved(layers, "isothermal_planes", **FILMS)
    by_hand = 1 / (0.85 + 5 * outside + 2 * SHELL + 1 / (0.2 / WEB + 0.8 / cell))
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(by_hand, rel=1e-9)
    assert found.value / U_IP == pytest.approx(printed, abs=5e-5)
    assert found.high == pytest.approx(found.value)
    assert_recomputes(found.steps)


def test_filled_cells_trigger_the_cautions_of_insulation() -> None:
    foam = PERLITE._replace(title="foam inserts", combustible=True)
    block = FILLED._replace(fill=Fill(foam))
    topics = {c.topic for c in solved([block], "isothermal_planes", **FILMS).cautions}
    assert {"moisture", "fire"} <= topics
    empty = {c.topic for c in solved([BLOCK], "isothermal_planes", **FILMS).cautions}
    assert not {"moisture", "fire"} & empty


def test_parallel_paths_flatter_and_are_refused() -> None:
    found = solved([FILLED], "parallel_path", **FILMS)
    assert found.value is None
    assert found.missing == (
        "a method other than parallel paths, which are not accepted as a result for masonry units "
        "with cells ('8 in block')",
    )
    by_hand = 0.2 / (0.85 + 2 * SHELL + WEB) + 0.8 / (0.85 + 2 * SHELL + CORE)
    assert found.low is not None
    assert found.low / U_IP == pytest.approx(by_hand)
    assert found.low / U_IP == pytest.approx(0.129, abs=5e-4)


def test_weighted_masonry_is_no_refusal() -> None:
    low, high = bounds(wall_of(FILLED))
    assert value([FILLED], "weighted", weight=0.5) == pytest.approx(2 / (1 / low + 1 / high))


def test_grouted_cells_and_joints_take_their_share() -> None:
    partly = FILLED._replace(
        grout=GROUT, grouted_share=0.25, mortar=MORTAR, joint_share=0.05, thickness=0.2, shell=0.03
    )
    assert column_shares(partly) == pytest.approx(
        {"web": 0.95 * 0.2, "cell": 0.95 * 0.8 * 0.75, "grout": 0.95 * 0.8 * 0.25, "joint": 0.05}
    )
    k = CONCRETE.conductivity
    shells = 1 / (0.95 * k / 0.03 + 0.05 * 0.9 / 0.03)
    units = 0.19 * k + 0.57 * PERLITE.conductivity + 0.19 * 1.4 + 0.05 * 0.9
    found = solved([partly], "isothermal_planes")
    assert found.value == pytest.approx(1 / (0.17 + 2 * shells + 0.14 / units))
    assert_recomputes(found.steps)
    assert found.counted[0].note == "webs 20 % of the area"


def solid(mortar: bool) -> MasonryLayer:
    """Bricks without cells, as the reader hands them: two halves of half the thickness."""
    brick = material("brick", 0.77, "masonry")
    return MasonryLayer(
        "masonry", "brickwork", 1, 0.2, brick, 0.1, 1.0, Fill(brick), MORTAR if mortar else None,
        0.2 if mortar else 0.0, 0.0, None, None,
    )  # fmt: skip


@pytest.mark.parametrize("method", ["series", "parallel_path", "isothermal_planes", "weighted"])
def test_solid_units_are_a_plane_layer(method: str) -> None:
    found = solved([solid(mortar=False)], method)
    assert found.value == pytest.approx(1 / (0.17 + 0.2 / 0.77))
    assert found.low == pytest.approx(found.high)
    assert found.counted[0].resistance == pytest.approx(0.2 / 0.77)
    assert_recomputes(found.steps)


def test_solid_units_with_joints() -> None:
    mean_k = 0.8 * 0.77 + 0.2 * 0.9
    by_paths = 0.8 / (0.17 + 0.2 / 0.77) + 0.2 / (0.17 + 0.2 / 0.9)
    walls = [solid(mortar=True)]
    assert value(walls, "isothermal_planes") == pytest.approx(1 / (0.17 + 0.2 / mean_k))
    assert value(walls, "parallel_path") == pytest.approx(by_paths)
    assert "bridged layer 'brickwork'" in solved(walls, "series").missing[0]
    assert solved(walls, "weighted").counted[0].note == "joints 20 % of the area"


def test_solid_units_in_the_ground_count_as_a_plane_layer() -> None:
    slab = Slab("none", 0.0, 0.0, False, None, 0.5, 2.0, 46.0, 126.0)
    paving = plane("paving", material("brick", 0.77, "masonry"), 0.2)
    floors = [
        solved(assembly(layer, kind="slab-on-grade", slab=slab), "iso13370_slab").value
        for layer in (solid(mortar=False), paving)
    ]
    assert floors[0] == pytest.approx(floors[1])
    wall = solved(assembly(solid(mortar=False), kind="below-grade-wall"), "c_factor")
    assert wall.value == pytest.approx(0.77 / 0.2)


# ------------------------------------------------------------------------- units drawn to scale

# Two cores of 155 mm between webs of 30 mm in a unit of 400 mm: webs 90/400 of the area.
TO_SCALE = MasonryLayer(
    "masonry", "block", 1, 0.2, material("block", 1.0, "masonry"), 0.03, 0.225,
    Fill(material("fill", 0.05, "insulation")), None, 0.0, 0.0, None, None, None, 0.4, 2,
)  # fmt: skip


def test_a_unit_of_stated_length_is_the_drawn_block() -> None:
    """Value of quadratic triangles by scikit-fem 12.0.2 for the same block drawn in full."""
    of = section_of(wall_of(TO_SCALE))
    assert of.widths == pytest.approx((0.03, 0.155, 0.03, 0.155, 0.03))
    found = bound(of, 2e-4)
    assert found.low <= 1.164652 <= found.high


def test_length_and_number_of_cells_leave_the_wirings_alone() -> None:
    not_to_scale = bounds(wall_of(TO_SCALE._replace(length=None)))
    for cells in (1, 2, 3):
        assert bounds(wall_of(TO_SCALE._replace(cells=cells))) == pytest.approx(not_to_scale)


def test_joints_are_one_beside_the_unit() -> None:
    of = section_of(wall_of(TO_SCALE._replace(mortar=MORTAR, joint_share=0.05)))
    assert of.widths[0] == pytest.approx(0.05 * 0.4)
    assert [row[0] for row in of.conductivities] == pytest.approx([0.9] * 3)
    assert sum(of.widths) == pytest.approx(0.4)


@pytest.mark.parametrize(
    ("change", "words"),
    [
        ({"length": None}, "length of the units of 'block' is not stated"),
        ({"grout": GROUT, "grouted_share": 0.1}, "which cells of 'block' are grouted"),
    ],
)
def test_units_that_are_not_drawn_say_why(change: dict[str, object], words: str) -> None:
    with pytest.raises(NotDrawn, match=words):
        section_of(wall_of(TO_SCALE._replace(**change)))


def test_solid_units_with_joints_are_drawn() -> None:
    solid = TO_SCALE._replace(web_share=1.0, shell=0.1, mortar=MORTAR, joint_share=0.05)
    of = section_of(wall_of(solid))
    assert of.widths == pytest.approx((0.38, 0.02))
    assert of.conductivities[0] == pytest.approx((1.0, 0.9))
