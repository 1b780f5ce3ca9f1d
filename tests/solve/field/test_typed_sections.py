"""The section kind: what is typed from a detail is what is solved."""

from __future__ import annotations

import re

import numpy as np
import pytest

from envcheck.solve.field.bound import Bounds, bound
from envcheck.solve.field.box_drawing import box_of
from envcheck.solve.field.drawing import section_of
from envcheck.solve.field.section import Section
from envcheck.solve.wiring import bounds, isothermal_planes, parallel_paths
from tests.solve.field.test_bound import meets
from tests.solve.field.typed import drawing, typed, wall_of

STUD = [("k0.13", "11 mm"), ("k0.04", "92 mm"), ("k0.16", "12.7 mm")]


def steel(y: float, lip: float = 0.0) -> list[tuple[str, str, str]]:
    """Web and flanges 41 x 92 x 1.1 of a C, centred in 406, from y on; lips in mm."""
    found = [
        ("k50.0", "182.5 mm, 183.6 mm", f"{y} mm, {y + 92} mm"),
        ("k50.0", "182.5 mm, 223.5 mm", f"{y} mm, {y + 1.1:.6g} mm"),
        ("k50.0", "182.5 mm, 223.5 mm", f"{y + 90.9:.6g} mm, {y + 92} mm"),
    ]
    if lip:
        found += [
            ("k50.0", "222.4 mm, 223.5 mm", f"{y} mm, {y + lip:.6g} mm"),
            ("k50.0", "222.4 mm, 223.5 mm", f"{y + 92 - lip:.6g} mm, {y + 92} mm"),
        ]
    return found


# The six sections whose geometry is stated in full, with the values that quadratic triangles of
# scikit-fem 12.0.2 (a general-purpose finite-element library) gave on its own graded mesh: the
# same as in test_bound, typed as drawings here. y from outside, mm; W/(m K).
TYPED = {
    "wood stud": (
        drawing("406 mm", [("k0.13", "11 mm"), ("k0.04", "140 mm"), ("k0.16", "12.7 mm")],
                [("k0.12", "184 mm, 222 mm", "11 mm, 151 mm")]),
        0.04, 0.301149,
    ),
    "C-stud": (drawing("406 mm", STUD, steel(11)), 0.04, 0.673762),
    "C-stud, outer insulation": (
        drawing("406 mm", [("k0.034", "38 mm"), *STUD], steel(49)), 0.04, 0.354289,
    ),
    "C-stud with lips": (drawing("406 mm", STUD, steel(11, 12.7)), 0.04, 0.674394),
    "dormer cheek": (
        drawing(
            "600 mm",
            [("k0.043", "60 mm"), ("k0.13", "12 mm"), ("k0.035", "100 mm"), ("k0.25", "12.5 mm")],
            [
                ("k50.0", "275 mm, 276 mm", "72 mm, 172 mm"),
                ("k50.0", "275 mm, 325 mm", "72 mm, 73 mm"),
                ("k50.0", "275 mm, 325 mm", "171 mm, 172 mm"),
            ],
        ),
        0.13, 0.273209,
    ),
    "block with filled cores": (
        drawing("400 mm", [("k1.0", "200 mm")],
                [("k0.05", "30 mm, 185 mm", "30 mm, 170 mm"),
                 ("k0.05", "215 mm, 370 mm", "30 mm, 170 mm")]),
        0.04, 1.164652,
    ),
}  # fmt: skip


@pytest.mark.parametrize("name", TYPED)
def test_a_typed_drawing_encloses_the_independent_value(name: str) -> None:
    text, outside, value = TYPED[name]
    found = bound(typed(text, outside), 2e-4)
    assert found.stopped_by == "tolerance"
    assert found.low <= value <= found.high


def test_inches_and_millimetres_are_one_drawing() -> None:
    text = TYPED["C-stud with lips"][0]
    inches = re.sub(r"([\d.]+) mm", lambda found: f"{float(found[1]) / 25.4:.9f} in", text)
    assert "mm" not in inches
    there, here = typed(text), typed(inches)
    for name in ("widths", "depths", "conductivities"):
        assert np.allclose(getattr(there, name), getattr(here, name), rtol=1e-6)


Piece = tuple[float, float, float, float, float]
"""k, left, right, outer, inner, mm"""
GROUND: Piece = (0.05, 0.0, 400.0, 0.0, 200.0)


def random_drawing(rng: np.random.Generator) -> list[Piece]:
    """Up to six rectangles (k, left, right, outer, inner) on a 400 x 200 mm ground, whole mm."""
    found = []
    for _ in range(rng.integers(1, 7)):
        x, y = np.sort(rng.integers(0, 41, 2)) * 10, np.sort(rng.integers(0, 21, 2)) * 10
        if x[0] < x[1] and y[0] < y[1]:
            found.append((float(rng.choice([0.12, 0.25, 1.0])), *map(float, (*x, *y))))
    return found or [(1.0, 100.0, 200.0, 50.0, 100.0)]


def as_text(pieces: list[Piece], more: str = "") -> str:
    return drawing(
        "400 mm", [], [(f"k{k}", f"{a} mm, {b} mm", f"{c} mm, {d} mm") for k, a, b, c, d in
                       [GROUND, *pieces]], more,
    )  # fmt: skip


def seen(pieces: list[Piece]) -> list[Piece]:
    """The pieces of which something shows, by painting centimetres."""
    board = np.full((20, 40), -1)
    for number, (_, a, b, c, d) in enumerate(pieces):
        board[int(c) // 10 : int(d) // 10, int(a) // 10 : int(b) // 10] = number
    return [piece for number, piece in enumerate(pieces) if (board == number).any()]


def split(pieces: list[Piece]) -> list[Piece]:
    """Each piece wider than a centimetre as two halves side by side, out of place by nothing."""
    found: list[Piece] = []
    for k, a, b, c, d in pieces:
        middle = a + 10.0
        found += [(k, a, middle, c, d), (k, middle, b, c, d)] if b > middle else [(k, a, b, c, d)]
    return found


def painted(of: Section) -> np.ndarray:
    """Conductivities on a board of centimetres."""
    columns = np.rint(np.array(of.widths) * 100).astype(int)
    rows = np.rint(np.array(of.depths) * 100).astype(int)
    return np.repeat(np.repeat(np.array(of.conductivities), rows, axis=0), columns, axis=1)


def test_random_drawings_are_painted_as_typed_whatever_way_they_are_cut() -> None:
    rng = np.random.default_rng(41)
    for _ in range(60):
        pieces = seen(random_drawing(rng))
        board = np.full((20, 40), 0.05)
        for k, a, b, c, d in pieces:
            board[int(c) // 10 : int(d) // 10, int(a) // 10 : int(b) // 10] = k
        if (board == 0.05).sum() == 0:
            continue
        assert np.allclose(painted(typed(as_text(pieces))), board, rtol=1e-9)
        halves = split(pieces)
        if seen(halves) == halves:
            assert np.allclose(painted(typed(as_text(halves))), board, rtol=1e-9)


def turned(pieces: list[Piece], mirror: bool) -> list[Piece]:
    """Mirrored left to right, or outside to inside."""
    if mirror:
        return [(k, 400 - b, 400 - a, c, d) for k, a, b, c, d in pieces]
    return [(k, a, b, 200 - d, 200 - c) for k, a, b, c, d in pieces]


def test_turning_a_drawing_changes_nothing_and_the_wirings_enclose_it() -> None:
    rng = np.random.default_rng(42)
    for _ in range(12):
        pieces = seen(random_drawing(rng))
        if GROUND not in seen([GROUND, *pieces]):
            continue
        there = bound(typed(as_text(pieces)), 5e-3)
        low, high = bounds(wall_of(as_text(pieces)))
        assert low <= there.low * (1 + 1e-9)
        assert there.high <= high * (1 + 1e-9)
        mirrored = bound(typed(as_text(turned(pieces, mirror=True))), 5e-3)
        upside_down = bound(typed(as_text(turned(pieces, mirror=False)), 0.13, 0.04), 5e-3)
        assert meets(there, mirrored)
        assert meets(there, upside_down)


def test_half_a_symmetric_drawing_is_the_whole() -> None:
    """A wood stud between two planes of symmetry: half a bay with half a stud."""
    layers = [("k0.13", "11 mm"), ("k0.04", "140 mm"), ("k0.16", "12.7 mm")]
    stud = [("k0.12", "0 mm, 19 mm", "11 mm, 151 mm")]
    of = typed(drawing("203 mm", layers, stud, "sides: symmetric"))
    assert not of.periodic
    assert typed(TYPED["wood stud"][0]).periodic
    found = bound(of, 2e-4)
    assert found.low <= 0.301149 <= found.high


def test_iso_10211_case_2_as_it_is_typed() -> None:
    """ISO 10211:2017, annex C, case 2: 9.5 W/m within 0.1 for 20 K; geometry from memory."""
    text = """
  S:
    kind: section
    title: case 2
    repeat: 500 mm
    sides: symmetric
    pieces:
      - {title: concrete, conductivity: 1.15 W/(m*K), source: test, y: [0 mm, 6 mm]}
      - {title: insulation, conductivity: 0.029 W/(m*K), source: test, y: [6 mm, 46 mm]}
      - {title: wood, conductivity: 0.12 W/(m*K), source: test, x: [0 mm, 15 mm], y: [6 mm, 11 mm]}
      - {title: lip, conductivity: 230 W/(m*K), source: test, x: [0 mm, 15 mm], y: [11 mm, 12.5 mm]}
      - {title: web, conductivity: 230 W/(m*K), source: test, x: [0 mm, 1.5 mm], y: [11 mm, 46 mm]}
      - {title: sheet, conductivity: 230 W/(m*K), source: test, y: [46 mm, 47.5 mm]}
"""
    found = bound(typed(text, 0.06, 0.11))
    assert 20 * 0.5 * found.low == pytest.approx(9.5, abs=0.1)
    assert 20 * 0.5 * found.high == pytest.approx(9.5, abs=0.1)


# ------------------------------------------------------------------------------ voids, worksheet

VOID = """
  S:
    kind: section
    title: hollow
    repeat: 100 mm
    layers: [{kind: material, material: k1.0, thickness: 100 mm}]
    pieces:
      - {title: void, air_space: {emittance: 0.9}, x: [20 mm, 80 mm], y: [30 mm, 70 mm]}
      - {title: tie, material: k50.0, x: [48 mm, 52 mm], y: [50 mm, 60 mm]}
"""


def test_a_void_conducts_like_an_air_space_as_deep_as_its_piece() -> None:
    """ISO 6946:2017, annex D by hand: 40 mm, horizontal, both faces .9, 10 degC.

    E = 1/(2/.9 - 1) = .8182; hr = .8182 x 5.1486 = 4.2125; ha = max(1.25, .025/.04) = 1.25;
    R = 1/5.4625 = .18307; k = .04/.18307 = .2185 W/(m K), also in the rows beside the tie.
    """
    of = typed(VOID)
    void, block, steel = sorted({round(k, 4) for row in of.conductivities for k in row})
    assert (void, block, steel) == (0.2185, 1.0, 50.0)


@pytest.mark.parametrize("name", ["C-stud with lips", "block with filled cores"])
def test_worksheet_of_a_drawing_adds_up(name: str) -> None:
    wall = wall_of(TYPED[name][0])
    low, high = bounds(wall)
    assert parallel_paths(wall).u_factor == pytest.approx(low, rel=1e-12)
    assert isothermal_planes(wall).u_factor == pytest.approx(high, rel=1e-12)


# ------------------------------------------------------------------------- beside other layers

BESIDE = """
  S:
    title: bay
    layers:
      - {kind: material, material: k0.13, thickness: 11 mm}
      - kind: section
        title: stud
        repeat: 406 mm
        layers: [{kind: material, material: k0.04, thickness: 140 mm}]
        pieces: [{material: k0.12, x: [184 mm, 222 mm]}]
      - {kind: material, material: k0.16, thickness: 12.7 mm}
"""
FRAMED = """
  S:
    title: bay
    layers:
      - {kind: material, material: k0.13, thickness: 11 mm}
      - {kind: framed, thickness: 140 mm, member: {material: k0.12, width: 38 mm, spacing: 406 mm},
         fill: {material: k0.04}}
      - {kind: material, material: k0.16, thickness: 12.7 mm}
"""


def same(one: Bounds, other: Bounds) -> bool:
    return one.low == pytest.approx(other.low, rel=1e-9) and one.high == pytest.approx(
        other.high, rel=1e-9
    )


def test_a_drawn_layer_is_the_framed_layer_that_it_shows() -> None:
    assert same(bound(typed(BESIDE)), bound(typed(FRAMED)))


def test_half_a_drawn_layer_between_others_has_adiabatic_sides() -> None:
    half = BESIDE.replace("406 mm", "203 mm").replace("[184 mm, 222 mm]", "[0 mm, 19 mm]")
    of = typed(
        half.replace("        title: stud\n", "        title: stud\n        sides: symmetric\n")
    )
    assert not of.periodic
    found = bound(of, 2e-4)
    assert found.low <= TYPED["wood stud"][2] <= found.high


def test_half_a_drawing_that_battens_cross_has_adiabatic_sides_along_the_wall_only() -> None:
    half = BESIDE.replace("406 mm", "203 mm").replace("[184 mm, 222 mm]", "[0 mm, 19 mm]")
    half = half.replace("title: stud", "title: stud\n        sides: symmetric")
    crossed = half.replace(
        "      - {kind: material, material: k0.16",
        "      - {kind: framed, thickness: 40 mm, fill: {material: k0.04}, orientation: horizontal,"
        " member: {material: k0.12, width: 38 mm, spacing: 600 mm}}\n"
        "      - {kind: material, material: k0.16",
    )
    box = box_of(wall_of(crossed))
    assert (box.repeats_along, box.repeats_up) == (False, True)


def test_drawn_and_framed_layers_of_one_spacing_stand_in_line() -> None:
    both = BESIDE.replace(
        "      - {kind: material, material: k0.16",
        "      - {kind: framed, thickness: 40 mm, member: {material: k0.12, width: 38 mm, "
        "spacing: 406 mm}, fill: {material: k0.04}}\n      - {kind: material, material: k0.16",
    )
    of = section_of(wall_of(both))
    assert len(of.widths) == 3
    assert len(of.depths) == 4
