"""From a declared to a design conductivity: temperature and moisture."""

from __future__ import annotations

from envcheck.model.conversion import Conversion, design_conductivity
from envcheck.model.solved import Operand, Step
from envcheck.solve.registry import Method

__all__ = ["METHODS", "conversion_step", "design_conductivity"]
SOURCE = "ISO 10456:2007, 7"


def conversion_step(symbol: str, title: str, conversion: Conversion) -> Step:
    """The step from the declared conductivity of a material to that of the design."""
    operands = (
        Operand("k_d", conversion.declared, "conductivity"),
        Operand("f_T", conversion.per_kelvin, "number"),
        Operand("T_2", conversion.temperature, "temperature"),
        Operand("T_1", conversion.declared_temperature, "temperature"),
        Operand("f_m", conversion.per_moisture, "number"),
        Operand("m_2", conversion.moisture, "number"),
        Operand("m_1", conversion.declared_moisture, "number"),
    )
    return Step(
        symbol,
        f"design conductivity of {title}",
        "{k_d} * exp({f_T} * ({T_2} - {T_1})) * exp({f_m} * ({m_2} - {m_1}))",
        operands,
        conversion.conductivity,
        "conductivity",
        f"{SOURCE}; {conversion.source}",
        si_only=True,
    )


METHODS = (
    Method(
        name="iso10456_conversion",
        title="Declared to design conductivity",
        formula="k2 = k1 exp(fT (T2 - T1)) exp(f_psi (psi2 - psi1))",
        source=SOURCE,
        valid="the material, conductivity and moisture for which the coefficients were published",
    ),
)
