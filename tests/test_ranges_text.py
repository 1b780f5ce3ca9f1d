"""A value and its range as typed."""

from __future__ import annotations

import pytest

from envcheck.units import UnitError, parse, states_range
from envcheck.units.ranges import parse_range


@pytest.mark.parametrize(
    ("text", "quantity", "low", "high"),
    [
        ("0.035 +- 0.002 W/(m*K)", "conductivity", 0.033, 0.037),
        ("0.035 W/(m*K) +- 0.002 W/(m*K)", "conductivity", 0.033, 0.037),
        ("0.035 ± 0.002 W/(m·K)", "conductivity", 0.033, 0.037),
        ("0.035 +/- 0.002 W/(m*K)", "conductivity", 0.033, 0.037),
        ("0.04 W/(m*K) +- 5 %", "conductivity", 0.038, 0.042),
        ("60 mm +- 2 mm", "length", 0.058, 0.062),
        ("60+-2 mm", "length", 0.058, 0.062),
        ("6 cm +- 2 mm", "length", 0.058, 0.062),
        ("1-1/2 in +- 1/8 in", "length", 0.034925, 0.041275),
        ("R-13 +- R-1", "resistance", 12 * 0.1761101838, 14 * 0.1761101838),
        ("0.18 +\u2212 0.02 m2*K/W", "resistance", 0.16, 0.2),
    ],
)
def test_reads_a_value_with_its_range(text: str, quantity: str, low: float, high: float) -> None:
    assert states_range(text)
    found = parse_range(text, quantity)
    assert (found.low, found.high) == pytest.approx((low, high), rel=1e-9)
    assert found.value == pytest.approx((low + high) / 2, rel=1e-9)


@pytest.mark.parametrize(
    ("text", "kind"),
    [
        ("0.03 +- 0.04 W/(m*K)", "bad-range"),
        ("0.03 +- 0.03 W/(m*K)", "bad-range"),
        ("0.03 W/(m*K) +- 0 %", "bad-range"),
        ("0.03 +- 0.001 +- 0.002 W/(m*K)", "bad-range"),
        ("0.03 W/(m*K) +-", "bad-range"),
        ("0.03 +- -0.002 W/(m*K)", "bad-range"),
        ("0.03 +- 0.002", "missing-unit"),
        ("0.03 W/(m*K) +- 2 mm", "wrong-unit"),
        ("0,03 +- 0,001 W/(m*K)", "comma-decimal"),
    ],
)
def test_says_what_is_wrong_with_a_range(text: str, kind: str) -> None:
    with pytest.raises(UnitError) as caught:
        parse_range(text, "conductivity")
    assert caught.value.kind == kind
    assert text in caught.value.found


@pytest.mark.parametrize("text", ["60 mm", "+5 mm", "1e+3 mm", "-5 mm", "R-13", "1.5e-3 m"])
def test_a_single_value_states_no_range(text: str) -> None:
    assert not states_range(text)


def test_a_range_is_refused_where_one_value_is_asked_for() -> None:
    with pytest.raises(UnitError) as caught:
        parse("16 in +- 1 in", "length")
    assert caught.value.kind == "range-not-here"
