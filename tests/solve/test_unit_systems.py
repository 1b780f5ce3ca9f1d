"""The same wall typed in SI and in inch-pound units has one U-factor."""

from __future__ import annotations

from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from envcheck.model.project import Assembly
from envcheck.read.project import project_from_bytes
from tests.read.names import NAMES
from tests.solve.drawn import mm, value

# Exact by definition: international inch and pound (1959), Btu of the International Table
# (ISO 31-4), degree Fahrenheit = 5/9 K.
INCH = 0.0254
BTU = 1055.05585262
CONDUCTIVITY = BTU * INCH / (3600 * (12 * INCH) ** 2 * 5 / 9)
RESISTANCE = 3600 * (12 * INCH) ** 2 * 5 / 9 / BTU

PROJECT = """
envcheck: 1
project: {{title: Two ways to type a wall}}
site: {{place: Nowhere}}
rule_sets: [none]
materials:
  board: {{conductivity: {board}, source: invented}}
  wood: {{conductivity: {wood}, source: invented}}
  wool: {{conductivity: {wool}, source: invented}}
assemblies:
  W:
    title: invented
    inside_film: {film}
    layers:
      - {{kind: material, material: board, thickness: {plane}}}
      - {{kind: resistance, title: stated, resistance: {stated}, source: invented}}
      - {{kind: framed, title: studs, thickness: {depth}, fill: {{material: wool}},
         member: {{material: wood, width: {width}, spacing: {spacing}}}}}
      - {{kind: framed, title: rails, thickness: {plane}, fill: {{label: {stated}}},
         member: {{profile: {{shape: C, web: {plane}, flange: {width}, thickness: {sheet}}},
         spacing: {spacing}}}, orientation: horizontal}}
elements: {{E: {{assembly: W, category: wall.other, sheet: A-1, net_area: 10 m2}}}}
"""


def typed(numbers: dict[str, tuple[str, float]], units: dict[str, tuple[str, float]]) -> Assembly:
    texts = {
        name: f"{number / units[quantity][1]:.15g} {units[quantity][0]}"
        for name, (quantity, number) in numbers.items()
    }
    raw = PROJECT.format(**texts).encode()
    return project_from_bytes(raw, "two.yaml", Path(), NAMES).assemblies["W"]


lengths = {"plane": (0.03, 0.1), "depth": (0.08, 0.3), "width": (0.03, 0.06)}


@settings(deadline=None, max_examples=25)
@given(
    sizes=st.fixed_dictionaries({name: mm(*ends) for name, ends in lengths.items()}),
    k=st.tuples(*[st.floats(0.02, 0.5)] * 3),
    r=st.tuples(*[st.floats(0.1, 5.0)] * 2),
    spacing=st.sampled_from([0.4, 0.4064, 0.6]),
)
def test_si_and_ip_agree(
    sizes: dict[str, float], k: tuple[float, ...], r: tuple[float, ...], spacing: float
) -> None:
    numbers = {
        **{name: ("length", size) for name, size in sizes.items()},
        **{name: ("k", one) for name, one in zip(("board", "wood", "wool"), k, strict=True)},
        **{name: ("r", one) for name, one in zip(("stated", "film"), r, strict=True)},
        "spacing": ("length", spacing),
        "sheet": ("length", 0.001),
    }
    si = {"length": ("mm", 0.001), "k": ("W/(m*K)", 1.0), "r": ("m2*K/W", 1.0)}
    ip = {
        "length": ("in", INCH),
        "k": ("Btu*in/(h*ft2*degF)", CONDUCTIVITY),
        "r": ("h*ft2*degF/Btu", RESISTANCE),
    }
    one, other = typed(numbers, si), typed(numbers, ip)
    for method in ("weighted", "isothermal_planes"):
        assert value(other, method) == pytest.approx(value(one, method), rel=1e-9)
