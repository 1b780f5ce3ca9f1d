"""Walls whose members cross, and walls with drawn clips, as boxes; their narrow bracket."""

from __future__ import annotations

import re
import shutil
from pathlib import Path

import pytest

from envcheck.__main__ import main
from envcheck.model.layers import Bridge, DrawnBox, DrawnPoint, Layer
from envcheck.model.solved import Solved
from envcheck.pipeline import run
from envcheck.solve.assembly import solve
from envcheck.solve.box import Box, wirings
from envcheck.solve.bracket import CLOSE, narrow
from envcheck.solve.field.box_drawing import box_of
from envcheck.solve.field.drawing import NotDrawn
from envcheck.solve.wiring import bounds
from tests.solve.drawn import PLAIN, wall_of
from tests.solve.field.boxes import turned
from tests.solve.field.test_drawn_walls import GYPSUM, SHEATHING, studs
from tests.solve.samples import WOOL, assembly, material, plane, setting

ROOT = Path(__file__).parent.parent.parent.parent
RENOVATION = ROOT / "projects" / "brannvik-warehouse" / "renovation.yaml"
CLIPS = """    bridges:
      - kind: point
        title: Cladding brackets
        drawn:
          layer: Wood fibre sheathing
          spacing: [600 mm, 800 mm]
          boxes:
            - {material: aluminium, x: [-2 mm, 2 mm], z: [-50 mm, 50 mm]}
            - {material: aluminium, x: [-2 mm, 58 mm], z: [-50 mm, 50 mm], y: [57 mm, 60 mm]}
"""
INSULATION = plane("insulation", WOOL, 0.15)
CONCRETE = plane("concrete", material("concrete", 2.3), 0.2)
ALUMINIUM = material("aluminium", 160.0)


def volume(of: Box, least: float) -> float:
    """Of all blocks that conduct more than ``least``, m3."""
    return sum(
        width * height * depth
        for depth, plane in zip(of.depths, of.conductivities, strict=True)
        for height, line in zip(of.heights, plane, strict=True)
        for width, k in zip(of.widths, line, strict=True)
        if k > least
    )


def clip(
    along: float = 0.6, up: float = 0.8, layer: str = "insulation", wide: float = 0.004
) -> DrawnPoint:
    """A web of 4 x 100 mm through 150 mm of insulation on a plate of 80 x 120 x 4 mm."""
    web = DrawnBox(ALUMINIUM, (-wide / 2, wide / 2), (-0.05, 0.05), (0.0, 0.15), 1)
    foot = DrawnBox(ALUMINIUM, (-0.04, 0.04), (-0.06, 0.06), (0.146, 0.15), 1)
    return DrawnPoint(layer, along, up, (web, foot), 1)


def bridge(point: DrawnPoint, chi: float = float("nan"), evidence: str = "assumed") -> Bridge:
    return Bridge(
        "point", "brackets", chi, 1 / (point.along * point.up), True, "", evidence, 1, drawn=point
    )


# ------------------------------------------------------------------------- what is drawn


def test_members_that_cross_are_cut_along_and_up_the_wall() -> None:
    wall = wall_of(SHEATHING, studs(), studs(way="horizontal", spacing=0.6), GYPSUM)
    of = box_of(wall)
    assert sum(of.widths) == pytest.approx(0.406)
    assert sum(of.heights) == pytest.approx(0.6)
    assert sum(of.depths) == pytest.approx(sum(layer.thickness for layer in wall.layers))


def test_the_wirings_of_the_box_are_those_of_the_wall() -> None:
    """The share of a path where two layers cross is the product of both shares."""
    for layers in ([studs(), studs(way="horizontal", spacing=0.6)], [SHEATHING, studs(), GYPSUM]):
        wall = wall_of(*layers)
        assert wirings(box_of(wall)) == pytest.approx(bounds(wall))


def test_a_clip_keeps_its_volume_wherever_it_stands() -> None:
    walls = ([INSULATION, CONCRETE], [INSULATION, studs()], [INSULATION, studs(way="horizontal")])
    spacings = ((0.6, 0.8), (0.812, 0.5), (0.7, 1.218))
    metal = 0.004 * 0.1 * 0.146 + 0.08 * 0.12 * 0.004
    for layers, spacing in zip(walls, spacings, strict=True):
        of = box_of(wall_of(*layers), [clip(*spacing)])
        assert of.area == pytest.approx(spacing[0] * spacing[1])
        assert volume(of, 100.0) == pytest.approx(metal)


def test_a_clip_that_reaches_over_the_edge_of_the_drawing_comes_in_on_the_other_side() -> None:
    """On two bays the clip stands at the first member, a quarter of the repeat from its side."""
    of = box_of(wall_of(INSULATION, studs()), [clip(0.812, 0.5, wide=0.5)])
    assert volume(of, 100.0) == pytest.approx(0.5 * 0.1 * 0.146 + (0.5 * 0.1 + 0.08 * 0.02) * 0.004)


def test_later_boxes_lie_on_top() -> None:
    point = clip()
    gap = DrawnBox(material("gap", 0.2), (-0.1, 0.1), (-0.1, 0.1), (0.0, 0.15), 1)
    of = box_of(wall_of(INSULATION), [point._replace(boxes=(*point.boxes, gap))])
    assert volume(of, 100.0) == 0


@pytest.mark.parametrize(
    ("layers", "points", "words"),
    [
        ([SHEATHING, GYPSUM], [], "homogeneous"),
        ([studs(spacing=None, share=0.2), studs(way="horizontal")], [], "spacing of the members"),
        ([INSULATION, studs()], [clip(0.6, 0.8)], "repeat at 600 mm, which is no multiple"),
        ([INSULATION], [clip(), clip(0.7)], "repeat on different areas"),
        ([SHEATHING], [clip()], "outside a well-ventilated cavity"),
    ],
)
def test_what_cannot_be_drawn_says_why(
    layers: list[Layer], points: list[DrawnPoint], words: str
) -> None:
    with pytest.raises(NotDrawn, match=words):
        box_of(wall_of(*layers), points)


# ------------------------------------------------------------------------- what it decides


def narrowed(
    *layers: Layer,
    bridges: tuple[Bridge, ...] = (),
    method: str = "two_dimensional",
    tolerance: float = 1e-3,
) -> tuple[Solved, Solved]:
    """Before and after."""
    whole = assembly(*layers)._replace(bridges=bridges)
    by = setting(method=method)
    wide = solve(whole, by, PLAIN)
    return wide, narrow(whole, by, PLAIN, wide, tolerance)


def test_a_crossing_decides_by_its_box() -> None:
    wide, found = narrowed(SHEATHING, studs(), studs(way="horizontal", spacing=0.6), GYPSUM)
    assert wide.low <= found.low <= found.high <= wide.high
    assert found.high / found.low <= 1.01
    assert found.value == found.high
    assert found.bracket_note.startswith("the drawn box in three dimensions")
    assert found.steps[-1].symbol == "U_high"
    assert found.steps[-1].value == found.high


def test_a_clip_decides_by_its_box_where_bounds_do() -> None:
    wide, found = narrowed(INSULATION, CONCRETE, bridges=(bridge(clip()),))
    assert wide.value == wide.high
    assert wide.low <= found.low <= found.high <= wide.high
    assert found.value == found.high
    assert found.high / found.low <= 1.01
    plain = 1 / (0.04 + 0.13 + 0.15 / WOOL.conductivity + 0.2 / 2.3)
    assert found.low > plain
    chi = {step.symbol: step.value for step in found.steps}
    area = 0.6 * 0.8
    assert chi["chi_low"] == pytest.approx((found.low - plain) * area, rel=1e-6)
    assert chi["chi_high"] == pytest.approx((found.high - plain) * area, rel=1e-6)
    # The web alone, as a path of its own, is the least; without the insulation, the most.
    assert 0 < chi["chi_low"] < chi["chi_high"] < 0.0004 * 160 / 0.15


def test_a_closer_bound_takes_the_place_of_the_first() -> None:
    _, first = narrowed(INSULATION, CONCRETE, bridges=(bridge(clip()),))
    _, closer = narrowed(INSULATION, CONCRETE, bridges=(bridge(clip()),), tolerance=CLOSE)
    assert first.low <= closer.high
    assert closer.low <= first.high
    assert closer.high / closer.low <= 1.0025
    names = [step.symbol for step in closer.steps]
    assert len(set(names)) == len(names)


def test_elsewhere_a_clip_needs_its_chi_and_the_box_is_information() -> None:
    point = clip()
    (missing,) = narrowed(INSULATION, CONCRETE, bridges=(bridge(point),), method="series")[
        0
    ].missing
    assert "chi of 'brackets'" in missing
    wide, found = narrowed(
        INSULATION, CONCRETE, bridges=(bridge(point, 0.03, "test"),), method="series"
    )
    assert found.value == wide.value == pytest.approx(found.clear + 0.03 / 0.48)
    assert found.added == 0  # the box holds the clip already
    assert found.low < found.value
    assert found.steps[-1].symbol == "U_total"


def test_a_project_with_crossing_battens_and_a_drawn_clip(tmp_path: Path) -> None:
    """The invented renovation: verdicts stay, and the box stands in the explanation."""
    found = run(str(RENOVATION), [str(ROOT / "rules")], bounds=True)
    (roof,) = [line for line in found.judged.lines if line.element == "R-S3"]
    assert roof.verdict == "pass"
    assert "three dimensions" in roof.solved.bracket_note
    assert roof.solved.high / roof.solved.low <= 1.01

    text = RENOVATION.read_text(encoding="utf-8")
    end = text.index("  S8:\n    {kind: rated")
    copy = tmp_path / "renovation.yaml"
    copy.write_text(text[:end] + CLIPS + text[end:], encoding="utf-8")
    shutil.copytree(RENOVATION.parent / "evidence", tmp_path / "evidence")
    output = tmp_path / "page.txt"
    asked = ["explain", str(copy), "D-S7", "--rules", str(ROOT / "rules"), "-o", str(output)]
    assert main(asked) == 0
    page = words_of(output)
    assert "the drawn box in three dimensions" in page
    assert "upper bound of the drawn box in three dimensions" in page
    assert "least that one drawn point adds" in page
    assert main([*asked[:2], "R-S3", *asked[3:], "--close"]) == 0
    apart = re.search(r"bounds ([\d.]+) % apart", words_of(output))
    assert apart is not None
    assert float(apart[1]) <= 0.25


def words_of(page: Path) -> str:
    return " ".join(page.read_text(encoding="utf-8").split())


def test_a_clip_is_solved_the_same_whichever_way_the_wall_is_turned() -> None:
    """Studs and girts exchange their directions, and the clip is turned with them."""
    point = clip(0.812, 0.6)
    level = point._replace(
        along=point.up, up=point.along,
        boxes=tuple(box._replace(along=box.up, up=box.along) for box in point.boxes),
    )  # fmt: skip
    one = box_of(wall_of(INSULATION, studs()), [point])
    other = box_of(wall_of(INSULATION, studs(way="horizontal")), [level])
    assert turned(other) == one
