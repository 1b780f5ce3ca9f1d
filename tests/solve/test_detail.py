"""Psi of drawn details: exact corners, straight walls, finite elements, measuring bases."""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from envcheck.model.details import Detail, crossings, face_lengths
from envcheck.read.project import project_from_bytes
from envcheck.solve.detail import NotSolved, outline_of, solve_detail
from tests.read.names import NAMES
from tests.solve.field.test_outlines import by_elements

SOUND = Path(__file__).parent.parent / "cases" / "sound"
CORNER = (SOUND / "corner.yaml").read_text(encoding="utf-8")
HEAD = """\
envcheck: 1
project: {title: Trial}
rule_sets: [any]
materials:
  block: {conductivity: 0.8 W/(m*K)}
  wool: {conductivity: 0.035 W/(m*K)}
  concrete: {conductivity: 2 W/(m*K)}
  beyond: {conductivity: 9000 W/(m*K)}
assemblies: {W: {title: W, layers: [{kind: material, material: block, thickness: 1 m}]}}
details:
  D:
    title: Detail
"""


def details(text: str) -> dict[str, Detail]:
    return project_from_bytes(text.encode(), "p.yaml", SOUND, NAMES).details


def drawn(body: str) -> Detail:
    return details(HEAD + "".join(f"    {line}\n" for line in body.splitlines()))["D"]


def plain_corner(measured: str, length: str) -> Detail:
    return drawn(f"""\
measured: {measured}
outdoors: [{{x: [0 m, 2.2 m], y: [0 m, 0.1 m], film: 0.0000001 m2*K/W}},
           {{x: [0 m, 0.1 m], y: [0.1 m, 2.2 m], film: 0.0000001 m2*K/W}}]
indoors: [{{x: [0.4 m, 2.2 m], y: [0.4 m, 2.2 m], film: 0.0000001 m2*K/W}}]
pieces: [{{material: block, x: [0.1 m, 2.2 m], y: [0.1 m, 0.4 m]}},
         {{material: block, x: [0.1 m, 0.4 m], y: [0.4 m, 2.2 m]}}]
flanks: [{{assembly: W, cut: right, length: {length}}}, {{assembly: W, cut: top, length: {length}}}]
""")


def test_plain_corner_has_its_exact_psi_on_either_basis() -> None:
    """Conformal mapping (from memory): 1 - 2 ln 2 / pi squares more than both inner faces.

    Inside dimensions: psi = k S; outside ones take two squares more: psi = k (S - 2).
    """
    shape = 1.0 - 2.0 * math.log(2.0) / math.pi
    for measured, length, exact in (
        ("inside", "1.8 m", 0.8 * shape),
        ("outside", "2.1 m", 0.8 * (shape - 2.0)),
    ):
        found = solve_detail(plain_corner(measured, length))
        assert found.psi_low - 1e-4 <= exact <= found.psi_high + 1e-4
        assert found.psi_high - found.psi_low < 3e-3


def test_straight_wall_has_no_psi() -> None:
    found = solve_detail(
        drawn("""\
outdoors: [{x: [0 m, 2 m], y: [0 m, 0.2 m]}]
indoors: [{x: [0 m, 2 m], y: [0.5 m, 0.6 m]}]
pieces: [{material: wool, x: [0 m, 2 m], y: [0.2 m, 0.3 m]},
         {material: block, x: [0 m, 2 m], y: [0.3 m, 0.5 m]}]
flanks: [{assembly: W, cut: left, length: 0.7 m}, {assembly: W, cut: right, length: 1.3 m}]
""")
    )
    assert found.psi_low == pytest.approx(0.0, abs=1e-9)
    assert found.psi_high == pytest.approx(0.0, abs=1e-9)
    u = 1.0 / (0.04 + 0.1 / 0.035 + 0.2 / 0.8 + 0.13)
    assert found.low == pytest.approx(2.0 * u, rel=1e-9)
    for flank in found.flanks:
        assert flank.u_factor == pytest.approx(u)
        assert flank.resistance == pytest.approx(0.1 / 0.035 + 0.2 / 0.8)
        assert flank.even == pytest.approx(1.0)
        assert (flank.face_outside, flank.face_inside) == pytest.approx((2.0, 2.0))


def test_insulated_corner_against_finite_elements() -> None:
    """scikit-fem on a mesh of its own gives L2D from above; psi of it by hand from U and l."""
    (detail,) = details(CORNER).values()
    found = solve_detail(detail)
    u = 1.0 / (0.04 + 0.1 / 0.035 + 0.2 / 0.8 + 0.13)
    by_mesh = by_elements(outline_of(detail), 14) - u * (1.7 + 1.8)
    assert found.psi_low <= by_mesh
    assert by_mesh == pytest.approx(found.psi_high, abs=2e-4)


BALCONY = """\
outdoors: [{{x: [0 m, 0.6 m], y: [0 m, 2.2 m]}}]
indoors: [{{x: [0.9 m, 1.9 m], y: [0 m, 1 m]}}, {{x: [0.9 m, 1.9 m], y: [1.2 m, 2.2 m]}}]
pieces: [{{material: wool, x: [0.6 m, 0.7 m], y: [0 m, 2.2 m]}},
         {{material: block, x: [0.7 m, 0.9 m], y: [0 m, 2.2 m]}},
         {{material: concrete, x: [{start}, 1.9 m], y: [1 m, 1.2 m]}}]
flanks: [{{assembly: W, cut: bottom, length: 1.1 m}}, {{assembly: W, cut: top, length: 1.1 m}}]
"""


def test_a_slab_through_the_insulation_costs_most() -> None:
    through = solve_detail(drawn(BALCONY.format(start="0 m")), surfaces=True)
    behind = solve_detail(drawn(BALCONY.format(start="0.7 m")), surfaces=True)
    assert through.psi_low > 0.4
    assert abs(behind.psi_high) < 0.05
    assert through.coldest is not None and behind.coldest is not None
    assert through.coldest.factor < behind.coldest.factor
    assert through.coldest.x == pytest.approx(0.9)
    assert through.coldest.y in (pytest.approx(1.0), pytest.approx(1.2))


def test_cuts_and_faces_of_a_corner() -> None:
    (detail,) = details(CORNER).values()
    assert [edge for edge in ("left", "right", "bottom", "top") if crossings(detail, edge)] == [
        "right",
        "top",
    ]
    (right,) = crossings(detail, "right")
    assert face_lengths(detail, "right", right) == pytest.approx((1.7, 1.4))
    titles = [detail.rectangles[number].title for number, _ in right.solids]
    assert titles == ["Wool board", "Block"]
    assert [size for _, size in right.solids] == pytest.approx([0.1, 0.2])
    assert not right.indoors_first


def test_a_shifted_and_a_turned_drawing_is_the_same() -> None:
    there = solve_detail(plain_corner("inside", "1.8 m"))
    turned = solve_detail(
        drawn("""\
measured: inside
outdoors: [{x: [3 m, 5.2 m], y: [7.1 m, 7.2 m], film: 0.0000001 m2*K/W},
           {x: [5.1 m, 5.2 m], y: [5 m, 7.1 m], film: 0.0000001 m2*K/W}]
indoors: [{x: [3 m, 4.8 m], y: [5 m, 6.8 m], film: 0.0000001 m2*K/W}]
pieces: [{material: block, x: [3 m, 5.1 m], y: [6.8 m, 7.1 m]},
         {material: block, x: [4.8 m, 5.1 m], y: [5 m, 6.8 m]}]
flanks: [{assembly: W, cut: left, length: 1.8 m}, {assembly: W, cut: bottom, length: 1.8 m}]
""")
    )
    for flank in turned.flanks:  # from indoors to outdoors along these edges
        assert (flank.face_outside, flank.face_inside) == pytest.approx((2.1, 1.8))
        assert flank.even == pytest.approx(1.0, abs=0.01)
    assert turned.psi_low == pytest.approx(there.psi_low, abs=1e-3)
    assert turned.psi_low <= there.psi_high and there.psi_low <= turned.psi_high


def test_what_cannot_be_solved_says_why() -> None:
    (detail,) = details(CORNER).values()
    rectangles = tuple(
        r._replace(material=r.material._replace(conductivity=2e4)) if r.material else r
        for r in detail.rectangles
    )
    with pytest.raises(NotSolved, match=r"conducts 2e\+04"):
        solve_detail(detail._replace(rectangles=rectangles))
