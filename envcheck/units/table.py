"""The quantities, their units and the factors: data, and the only place for a factor.

Every factor follows from five exact numbers: the inch 0.0254 m and the pound 0.45359237 kg
(international yard and pound agreement, 1959), the foot of 12 inches (5280 to the mile), the
International Table Btu 1055.05585262 J (ISO 31-4:1992, annex; from memory), and 5/9 K to the
Fahrenheit degree.
"""

from __future__ import annotations

from typing import NamedTuple

FOOT = 0.3048
INCH = 0.0254
POUND = 0.45359237
BTU = 1055.05585262
FAHRENHEIT = 5 / 9
FREEZING_F = 32.0
KELVIN_ZERO = -273.15
HOUR = 3600.0
R_IP = HOUR * FOOT**2 * FAHRENHEIT / BTU
"""m2 K/W in one h ft2 F/Btu, the unit of a printed R-value."""


class Quantity(NamedTuple):
    """What may be measured: its name in words, an example, its units, what is printed."""

    words: str
    example: str
    spellings: tuple[str, ...]
    si: str
    """Spelling that is printed in SI; a space stands for the product."""
    ip: str


_LENGTHS = ("m", "mm", "cm", "in", "ft")
UNITS: dict[str, Quantity] = {
    "length": Quantity("a length", "140 mm or 5-1/2 in", _LENGTHS, "m", "in"),
    "thickness": Quantity("a length", "140 mm or 5-1/2 in", _LENGTHS, "mm", "in"),
    "run": Quantity("a length", "12.5 m or 41 ft", _LENGTHS, "m", "ft"),
    "area": Quantity("an area", "25 m2 or 270 ft2", ("m2", "ft2"), "m2", "ft2"),
    "conductivity": Quantity(
        "a conductivity",
        "0.035 W/(m*K) or 0.24 Btu*in/(h*ft2*degF)",
        ("W/(m*K)", "Btu*in/(h*ft2*degF)", "Btu/(h*ft*degF)"),
        "W/(m K)",
        "Btu in/(h ft2 F)",
    ),
    "resistance": Quantity(
        "a thermal resistance (R-value)",
        "R-13, RSI 2.29 or 2.29 m2*K/W",
        ("m2*K/W", "h*ft2*degF/Btu"),
        "m2 K/W",
        "h ft2 F/Btu",
    ),
    "u_factor": Quantity(
        "a U-factor",
        "0.35 W/(m2*K) or 0.062 Btu/(h*ft2*degF)",
        ("W/(m2*K)", "Btu/(h*ft2*degF)"),
        "W/(m2 K)",
        "Btu/(h ft2 F)",
    ),
    "linear_transmittance": Quantity(
        "a linear transmittance (psi or F-factor)",
        "0.06 W/(m*K) or 0.54 Btu/(h*ft*degF)",
        ("W/(m*K)", "Btu/(h*ft*degF)"),
        "W/(m K)",
        "Btu/(h ft F)",
    ),
    "point_transmittance": Quantity(
        "a point transmittance (chi)",
        "0.011 W/K or 0.020 Btu/(h*degF)",
        ("W/K", "Btu/(h*degF)"),
        "W/K",
        "Btu/(h F)",
    ),
    "density": Quantity(
        "a density", "600 kg/m3 or 38 lb/ft3", ("kg/m3", "lb/ft3"), "kg/m3", "lb/ft3"
    ),
    "specific_heat": Quantity(
        "a specific heat",
        "1000 J/(kg*K) or 0.24 Btu/(lb*degF)",
        ("J/(kg*K)", "kJ/(kg*K)", "Btu/(lb*degF)"),
        "J/(kg K)",
        "Btu/(lb F)",
    ),
    "heat_capacity": Quantity(
        "a heat capacity per area",
        "120 kJ/(m2*K) or 6 Btu/(ft2*degF)",
        ("J/(m2*K)", "kJ/(m2*K)", "Btu/(ft2*degF)"),
        "kJ/(m2 K)",
        "Btu/(ft2 F)",
    ),
    "area_weight": Quantity(
        "a weight per area", "180 kg/m2 or 38 lb/ft2", ("kg/m2", "lb/ft2"), "kg/m2", "lb/ft2"
    ),
    "temperature": Quantity(
        "a temperature", "20 degC or 68 degF", ("degC", "degF", "K"), "degC", "degF"
    ),
    "temperature_difference": Quantity(
        "a temperature difference", "20 K or 36 degF", ("K", "degC", "degF"), "K", "F"
    ),
    "degree_days": Quantity(
        "degree days", "2700 K*d or 4870 degF*d", ("K*d", "degF*d"), "K d", "F d"
    ),
    "per_area": Quantity(
        "a number per area", "5 /m2 or 0.5 /ft2", ("/m2", "/ft2"), "1/m2", "1/ft2"
    ),
    "per_length": Quantity(
        "a length per area", "0.1 1/m or 0.03 1/ft", ("/m", "/ft"), "1/m", "1/ft"
    ),
    "share": Quantity("a share", "25 %", ("%",), "", ""),
    "power_density": Quantity(
        "a heat flow per area",
        "20 W/m2 or 6 Btu/(h*ft2)",
        ("W/m2", "Btu/(h*ft2)"),
        "W/m2",
        "Btu/(h ft2)",
    ),
    "angle": Quantity("an angle", "90 deg", ("deg",), "deg", "deg"),
    "speed": Quantity("a speed", "4 m/s or 9 mph", ("m/s", "km/h", "mph"), "m/s", "mph"),
    "rain": Quantity("a depth of rain per day", "2.1 mm/d", ("mm/d", "in/d"), "mm/d", "in/d"),
    "air_changes": Quantity("air changes per hour", "0.3 /h", ("/h",), "1/h", "1/h"),
    "volume": Quantity("a volume", "120 m3 or 4200 ft3", ("m3", "ft3"), "m3", "ft3"),
    "openings_per_length": Quantity(
        "an area of openings per length",
        "1500 mm2/m or 0.7 in2/ft",
        ("mm2/m", "cm2/m", "m2/m", "in2/ft"),
        "m2/m",
        "in2/ft",
    ),
    "openings_per_area": Quantity(
        "an area of openings per area",
        "700 mm2/m2 or 0.1 in2/ft2",
        ("mm2/m2", "cm2/m2", "m2/m2", "in2/ft2"),
        "m2/m2",
        "in2/ft2",
    ),
    "vapour_pressure": Quantity(
        "a vapour pressure", "1200 Pa or 1.2 kPa", ("Pa", "kPa", "hPa"), "Pa", "Pa"
    ),
    "number": Quantity("a number", "6", (), "", ""),
}
"""Every quantity by name. Same unit, same factor, whatever the quantity (but temperature)."""

ATOMS = {
    "m": 1.0, "mm": 1e-3, "cm": 1e-2, "in": INCH, "ft": FOOT,
    "m2": 1.0, "mm2": 1e-6, "cm2": 1e-4, "in2": INCH**2, "ft2": FOOT**2,
    "m3": 1.0, "ft3": FOOT**3, "s": 1.0, "km": 1e3, "mi": 5280 * FOOT,
    "W": 1.0, "J": 1.0, "kJ": 1e3, "Btu": BTU, "h": HOUR, "d": 1.0,
    "K": 1.0, "degC": 1.0, "degF": FAHRENHEIT, "kg": 1.0, "lb": POUND,
    "Pa": 1.0, "hPa": 100.0, "kPa": 1e3, "%": 1e-2, "deg": 1.0,
}  # fmt: skip
ALIASES = {
    "hr": "h", "F": "degF", "C": "degC", "BTU": "Btu", "btu": "Btu", "lbs": "lb", "lbm": "lb",
    "inch": "in", "inches": "in", "feet": "ft", "foot": "ft", "mK": "m*K", "m2K": "m2*K",
    "kgK": "kg*K", "psf": "lb/ft2", "pcf": "lb/ft3", "sqft": "ft2", "mph": "mi/h",
}  # fmt: skip
