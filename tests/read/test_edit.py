"""Values typed anew in their own units; everything else stays, letter by letter."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.advised import Edit
from envcheck.read.edit import NotThere, edited
from envcheck.units import UnitError, parse
from envcheck.units.respell import number, respelled

FILE = """# head
materials:
  foam: {title: "Foam, grey", resistance: R-5, thickness: 1 in}   # by the label
  wool: {conductivity: '0.035 W/(m*K)'}
assemblies:
  A:
    layers:
      - {kind: material, thickness: 1-1/2 in}  # first
      - kind: framed
        share: 25 %
"""


@pytest.mark.parametrize(
    ("path", "value", "quantity", "up", "old", "new"),
    [
        (("assemblies", "A", "layers", 0, "thickness"), 0.05, "thickness", True,
         "1-1/2 in", "1.9686 in"),
        (("assemblies", "A", "layers", 1, "share"), 0.2, "share", False, "25 %", "20 %"),
        (("materials", "wool", "conductivity"), 0.03, "conductivity", False,
         "'0.035 W/(m*K)'", "'0.03 W/(m*K)'"),
        (("materials", "foam", "resistance"), 1.0, "resistance", True, "R-5", "R-5.6783"),
        # a conductivity that the file states as R for a thickness: 0.0254 m / 0.02 = 1.27
        (("materials", "foam", "conductivity"), 0.02, "conductivity", False, "R-5", "R-7.2114"),
    ],
)  # fmt: skip
def test_one_value_changes(
    path: tuple[str | int, ...], value: float, quantity: str, up: bool, old: str, new: str
) -> None:
    assert edited(FILE, [Edit(path, value, quantity, up)]) == FILE.replace(old, new, 1)


def test_several_values_change_at_once() -> None:
    both = [
        Edit(("assemblies", "A", "layers", 0, "thickness"), 0.0508, "thickness", True),
        Edit(("assemblies", "A", "layers", 1, "share"), 0.1, "share", False),
    ]
    assert edited(FILE, both) == FILE.replace("1-1/2 in", "2 in").replace("25 %", "10 %")


def test_what_is_not_stated_is_named() -> None:
    with pytest.raises(NotThere, match="assemblies / B / layers / 0 / thickness"):
        edited(FILE, [Edit(("assemblies", "B", "layers", 0, "thickness"), 1.0, "thickness", True)])


def test_a_unit_of_another_quantity_is_refused() -> None:
    with pytest.raises(UnitError):
        respelled("25 %", 0.1, "thickness", True)


@given(st.floats(1e-4, 1e3), st.booleans(), st.sampled_from(["2 in", "50 mm", "3/4 in", "0.2 m"]))
def test_what_is_typed_never_falls_short(value: float, up: bool, text: str) -> None:
    """Read back it lies on the safe side, within the last of its five digits."""
    read = parse(respelled(text, value, "thickness", up), "thickness")
    slack = 1e-6 * value
    assert (read >= value - slack) if up else (read <= value + slack)
    assert read == pytest.approx(value, rel=1.1e-4)


def test_a_number_close_to_a_rounder_one_is_that() -> None:
    assert number(0.0599999999, False) == number(0.0600000001, True) == "0.06"
    assert number(1234567.0, True) == "1234600"
