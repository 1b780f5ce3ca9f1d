"""Display rounding and units."""

from __future__ import annotations

import pytest

from envcheck.report import numbers
from envcheck.units import to_si


@pytest.mark.parametrize(
    ("value", "decimals", "text"),
    [(0.0645, 3, "0.065"), (0.0644999999999, 3, "0.064"), (1.005, 2, "1.01"), (2.5, 0, "3"),
     (-0.00004, 4, "0.0000"), (0.1 + 0.2, 1, "0.3"), (0.30050000000000001, 3, "0.301")],
)  # fmt: skip
def test_half_goes_up_after_binary_noise_is_cut(value: float, decimals: int, text: str) -> None:
    assert numbers.fixed(value, decimals) == text


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [(5.98000, 9, "5.98"), (1.80955737e-5, 9, "0.0000180955737"), (123456789.0, 6, "123457000"),
     (0.0646853, 6, "0.0646853"), (12.0, 6, "12")],
)  # fmt: skip
def test_significant_digits_never_show_an_exponent(value: float, digits: int, text: str) -> None:
    assert numbers.significant(value, digits) == text


def test_lengths_are_decimal_inches_or_millimetres() -> None:
    assert numbers.length(to_si(3.625, "in"), "IP") == "3.625 in"
    assert numbers.length(0.0921, "SI") == "92.1 mm"
    assert numbers.length(0.0, "SI") == ""


def test_an_unrounded_value_has_one_decimal_more_than_the_limit() -> None:
    assert numbers.decimals("U_assembly", "IP") == 4
    assert numbers.decimals("U_assembly", "IP", 4) == 5
    assert numbers.decimals("U_assembly", "SI", 2) == 3
    assert numbers.decimals("SHGC", "SI", 2) == 3


@pytest.mark.parametrize(
    ("unit", "system"),
    [("Btu/(h ft2 F)", "IP"), ("W/(m2 K)", "SI"), ("h.ft2.F/Btu", "IP"), ("(m2.K)/W", "SI"),
     ("Btu/(h.ft.F)", "IP"), ("W/(m.K)", "SI"), ("", "")],
)  # fmt: skip
def test_a_printed_unit_belongs_to_a_system(unit: str, system: str) -> None:
    assert numbers.system_of(unit) == system
