"""What a printed limit may speak of: "R" alone is six different things."""

from typing import NamedTuple


class Metric(NamedTuple):
    """One metric: its letter under ``units``, its quantity, its usual sense, its value."""

    key: str
    """Key of the rule set's ``units``; empty where the figure has no unit."""
    quantity: str
    sense: str
    """``max`` or ``min``"""
    words: str
    solved_as: str = ""
    """How the value is found: ``own`` (a solution for this metric), ``heat_flow`` (the U-factor of
    the element, whatever its kind) or empty: read off a product, or of a group or the building."""
    reciprocal: bool = False
    """The value is one over the U-factor."""
    symbol: str = ""
    """Letters before a value; empty: none but its name."""


METRICS = {
    "U_assembly": Metric("U", "u_factor", "max", "U-factor", "own", symbol="U"),
    "U_product": Metric("U", "u_factor", "max", "U-factor of the whole product", "own", symbol="U"),
    "U_glazing": Metric("U", "u_factor", "max", "U-factor of the glazing", symbol="Ug"),
    "U_curtain_wall": Metric(
        "U", "u_factor", "max", "U-factor of the curtain wall", "heat_flow", symbol="Ucw"
    ),
    "U_mean": Metric("U", "u_factor", "max", "area-weighted mean U-factor", symbol="Um"),
    "K_global": Metric("U", "u_factor", "max", "global coefficient of the envelope", symbol="K"),
    "C_factor": Metric("C", "u_factor", "max", "C-factor", "own", symbol="C"),
    "F_factor": Metric("F", "linear_transmittance", "max", "F-factor", "own", symbol="F"),
    "R_insulation": Metric("R", "resistance", "min", "R-value of the insulation", symbol="R"),
    "R_total": Metric("R", "resistance", "min", "total R-value", "heat_flow", True, symbol="R"),
    "R_construction": Metric(
        "R", "resistance", "min", "construction R-value", "heat_flow", True, symbol="R"
    ),
    "RSI_effective": Metric(
        "R", "resistance", "min", "effective RSI", "heat_flow", True, symbol="RSI"
    ),
    "R_without_framing": Metric("R", "resistance", "min", "R-value without framing", symbol="R"),
    "R_old_and_new": Metric("R", "resistance", "min", "R-value of old and new layers", symbol="R"),
    "SHGC": Metric("", "number", "max", "SHGC", symbol="SHGC"),
    "VT": Metric("", "number", "min", "visible transmittance", symbol="VT"),
    "VT_per_SHGC": Metric("", "number", "min", "visible transmittance over SHGC", symbol="VT/SHGC"),
    "solar_admittance": Metric("", "number", "max", "solar admittance"),
    "solar_absorptance": Metric("", "number", "max", "solar absorptance"),
}
"""Every metric by name; ``R_insulation`` stands for labelled values in IP and in SI."""
