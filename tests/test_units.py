"""Units: every factor against pint, every spelling, every refusal."""

from __future__ import annotations

import re
from typing import Any

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.units import UNITS, UnitError, convert, in_system, label, parse, quantity_of, to_si

# pint's own Btu rounds the International Table Btu to 1055.056 J; ISO 31-4 (from memory) has
# 1055.05585262 J, which pint calls Btu_it.
PINT: Any = pint.UnitRegistry()
PINT_NAMES = {
    "Btu": "Btu_it",
    "degF": "delta_degF",
    "degC": "delta_degC",
    "h": "hour",
    "d": "day",
    "lb": "pound",
    "in": "inch",
    "ft": "foot",
    "K": "kelvin",
    "deg": "degree",
}
SI = {
    "length": "m",
    "thickness": "m",
    "run": "m",
    "area": "m**2",
    "conductivity": "W/m/K",
    "resistance": "m**2*K/W",
    "u_factor": "W/m**2/K",
    "linear_transmittance": "W/m/K",
    "point_transmittance": "W/K",
    "density": "kg/m**3",
    "specific_heat": "J/kg/K",
    "heat_capacity": "J/m**2/K",
    "area_weight": "kg/m**2",
    "temperature_difference": "K",
    "degree_days": "K*day",
    "per_area": "m**-2",
    "per_length": "m**-1",
    "power_density": "W/m**2",
    "angle": "degree",
    "share": "",
    "speed": "m/s",
    "rain": "m/day",
    "air_changes": "1/s",
    "volume": "m**3",
    "openings_per_length": "m",
    "openings_per_area": "",
    "vapour_pressure": "Pa",
}
PAIRS = [(q, unit) for q in SI for unit in UNITS[q].spellings]


def pint_name(spelling: str) -> str:
    """Spell one of our units for pint."""
    text = re.sub(r"([A-Za-z])([23])\b", r"\1**\2", spelling)
    text = re.sub(r"[A-Za-z]+", lambda m: PINT_NAMES.get(m[0], m[0]), text)
    text = text.replace("%", "percent")
    return f"1{text}" if text.startswith("/") else text


@pytest.mark.parametrize(("quantity", "unit"), PAIRS)
def test_every_factor_agrees_with_pint(quantity: str, unit: str) -> None:
    expected = PINT.Quantity(1.0, PINT.parse_units(pint_name(unit).removeprefix("1/") or ""))
    if unit.startswith("/"):
        expected = 1 / expected
    assert parse(f"1 {unit}", quantity) == pytest.approx(
        expected.to(SI[quantity]).magnitude, rel=1e-12
    )


def test_every_quantity_but_temperature_and_number_is_checked() -> None:
    assert set(UNITS) - set(SI) == {"temperature", "number"}


@pytest.mark.parametrize("fahrenheit", [-459.67, -40.0, 0.0, 32.0, 70.0, 212.0])
def test_absolute_temperatures_agree_with_pint(fahrenheit: float) -> None:
    celsius = PINT.Quantity(fahrenheit, "degF").to("degC").magnitude
    assert parse(f"{fahrenheit} degF", "temperature") == pytest.approx(celsius, abs=1e-9)
    assert convert(celsius, "degF") == pytest.approx(fahrenheit, abs=1e-9)
    assert parse(f"{celsius + 273.15:.6f} K", "temperature") == pytest.approx(celsius, abs=1e-5)


def test_a_printed_r_value_in_si() -> None:
    # pint, with the International Table Btu: 13 h ft2 F/Btu
    expected = PINT.Quantity(13, "hour*foot**2*delta_degF/Btu_it").to("m**2*K/W").magnitude
    assert parse("R-13", "resistance") == pytest.approx(expected, rel=1e-12)
    # SI 10 (ASTM), table of conversion factors: 5.678263 from Btu/(h ft2 F); from memory
    assert round(to_si(1, "Btu/(h*ft2*degF)"), 6) == 5.678263


@pytest.mark.parametrize(
    ("text", "quantity", "expected"),
    [
        ("140mm", "length", 0.14),
        ("1e3 mm", "length", 1.0),
        (".5 in", "length", 0.0127),
        ("3/4 in", "length", 0.75 * 0.0254),
        ("5-1/2 in", "length", 5.5 * 0.0254),
        ("3-5/8in", "length", 3.625 * 0.0254),
        ("5-1/2 in.", "length", 5.5 * 0.0254),
        ("RSI 2.29", "resistance", 2.29),
        ("RSI-2.29", "resistance", 2.29),
        ("2 (m2.K)/W", "resistance", 2.0),
        ("2 m2K/W", "resistance", 2.0),
        ("0.3 W/(m2.K)", "u_factor", 0.3),
        ("0.3 W/(m² K)", "u_factor", 0.3),
        ("0.3 W/m²K", "u_factor", 0.3),
        ("0.3 W/(m^2*K)", "u_factor", 0.3),
        ("0.3 W/(m**2 K)", "u_factor", 0.3),
        ("0.3\u00a0W/(m2·K)", "u_factor", 0.3),
        ("0.3 W m-2 K-1", "u_factor", 0.3),
        ("0.3 W/(m2*degC)", "u_factor", 0.3),
        ("1 Btu/(h.ft2.F)", "u_factor", to_si(1, "Btu/(h*ft2*degF)")),
        ("1 Btu/(hr·ft²·°F)", "u_factor", to_si(1, "Btu/(h*ft2*degF)")),
        ("1 BTU/(ft2 h F)", "u_factor", to_si(1, "Btu/(h*ft2*degF)")),
        ("1 h.ft2.F/Btu", "resistance", to_si(1, "h*ft2*degF/Btu")),
        ("1 Btu-in/(hr-ft2-°F)", "conductivity", to_si(1, "Btu*in/(h*ft2*degF)")),
        ("38 pcf", "density", to_si(38, "lb/ft3")),
        ("38 psf", "area_weight", to_si(38, "lb/ft2")),
        ("270 sq ft", "area", to_si(270, "ft2")),
        ("5 1/m2", "per_area", 5.0),
        ("25%", "share", 0.25),
        ("-10 °C", "temperature", -10.0),
        ("6", "number", 6.0),
    ],
)
def test_usual_spellings(text: str, quantity: str, expected: float) -> None:
    assert parse(text, quantity) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize(
    ("text", "quantity", "kind", "hint"),
    [
        ("140", "length", "missing-unit", "140 mm"),
        ("0.25", "share", "missing-unit", "25 %"),
        ("1,5 mm", "length", "comma-decimal", "'1.5 mm'"),
        ("1,500 mm", "length", "comma-decimal", "'1500 mm'"),
        ("1 500 mm", "length", "not-a-number", "without gaps"),
        ("5 1/2 in", "length", "not-a-number", "'5-1/2 in'"),
        ("1/0 in", "length", "not-a-number", ""),
        ("5 ft 6 in", "length", "not-a-number", "one number"),
        ("2 x 4 in", "length", "not-a-number", "one number"),
        ("90 to 100 mm", "length", "not-a-number", "one number"),
        ("about 5 mm", "length", "not-a-number", "one number"),
        ("nan mm", "length", "not-a-number", ""),
        ("inf mm", "length", "not-a-number", ""),
        ("", "length", "not-a-number", ""),
        ("\u0663 mm", "length", "not-a-number", ""),
        ("R13", "resistance", "not-a-number", "R-13"),
        ("R 2.5", "resistance", "not-a-number", "RSI"),
        ("R-13", "length", "wrong-unit", "140 mm"),
        ("13 h*ft2*degF/Btu", "u_factor", "wrong-unit", "W/(m2*K)"),
        ("0.4 W/(m*K)", "u_factor", "wrong-unit", ""),
        ("18 K", "temperature_difference", "", ""),
        ("0.3 W/m2*K", "u_factor", "unknown-unit", "'W/(m2*K)'"),
        ("1 Btu/h*ft2*F", "u_factor", "unknown-unit", ""),
        ("5 mmm", "length", "unknown-unit", "'mm'"),
        ('5.5"', "length", "unknown-unit", "'in'"),
        ("10**10**2 mm", "length", "unknown-unit", ""),
        ("1e99 mm", "length", "number-too-large", "exponent"),
        ("1e400 mm", "length", "number-too-large", "exponent"),
        ("9" * 5000 + " mm", "length", "number-too-large", ""),
    ],
)
def test_refusals_say_what_to_write(text: str, quantity: str, kind: str, hint: str) -> None:
    if not kind:
        assert parse(text, quantity) == 18.0
        return
    with pytest.raises(UnitError) as caught:
        parse(text, quantity)
    assert caught.value.kind == kind
    assert hint in caught.value.fix


@given(st.text(max_size=60), st.sampled_from(sorted(UNITS)))
def test_any_text_is_read_or_refused(text: str, quantity: str) -> None:
    try:
        assert abs(parse(text, quantity)) < 1e10
    except UnitError as error:
        assert error.fix and error.expected


@given(st.floats(-1e6, 1e6), st.sampled_from(sorted(SI)), st.sampled_from(["SI", "IP"]))
def test_what_is_printed_reads_back(value: float, quantity: str, system: str) -> None:
    unit = label(quantity, system)
    shown = in_system(value, quantity, system)
    if unit and abs(value) < 1e4:
        assert parse(f"{shown!r} {unit}", quantity) == pytest.approx(value, rel=1e-12, abs=1e-12)


def test_labels_and_names() -> None:
    assert label("u_factor", "IP") == "Btu/(h ft2 F)"
    assert label("u_factor", "SI") == "W/(m2 K)"
    assert label("number", "SI") == ""
    assert quantity_of("h.ft2.F/Btu") == "resistance"
    assert quantity_of("furlong") == ""
    assert in_system(0.25, "share", "IP") == 0.25


@pytest.mark.parametrize("call", [lambda: to_si(1, "ell"), lambda: convert(1, "ell")])
def test_unknown_units_are_refused_in_conversions(call: object) -> None:
    with pytest.raises(UnitError):
        call()
