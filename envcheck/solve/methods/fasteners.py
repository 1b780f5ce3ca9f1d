"""Mechanical fasteners through an insulating layer: the correction of ISO 6946."""

from __future__ import annotations

from math import pi
from typing import NamedTuple

from envcheck.model.project import (
    Assembly,
    Fasteners,
    Layer,
    MaterialLayer,
    ResistanceLayer,
    TaperedLayer,
)
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.tapered import mean_thickness
from envcheck.solve.registry import Method

SOURCE = "ISO 6946:2017, annex F"
FULL = 0.8
"""Coefficient alpha of a fastener that crosses the whole layer."""
LEAST_CONDUCTIVITY = 1.0
"""W/(m K); ISO 6946: no correction for fasteners that conduct less."""
AT_MEAN = "{} correction taken at the tapered layer's mean thickness (R1 and RT alike)"


class Correction(NamedTuple):
    """What is added to a U-factor."""

    value: float
    """W/(m2 K); of what could be counted, where something is missing."""
    steps: tuple[Step, ...] = ()
    """What leads to each addend, then the addend, whose symbol starts with ``dU``."""
    missing: tuple[str, ...] = ()
    assumptions: tuple[str, ...] = ()
    unsure: float = 0.0
    """How much less it may be: the addends stand at their high bound, W/(m2 K)."""

    @property
    def addends(self) -> tuple[Step, ...]:
        """The steps whose values are added to U."""
        return tuple(step for step in self.steps if step.symbol.startswith("dU"))


class Insulation(NamedTuple):
    """The layer that fasteners cross."""

    thickness: float
    """m"""
    resistance: float
    """m2 K/W"""


def penetration_factor(penetration: float, thickness: float) -> float:
    """Coefficient alpha: 0.8 where the fastener crosses the layer, else 0.8 d1/d0.

    penetration: d1, length within the layer. thickness: d0 of the layer, m. Dimensionless.
    Source: ISO 6946:2017, annex F.
    """
    return FULL * penetration / thickness


def fastener_area(diameter: float) -> float:
    """Cross-section of a round fastener, m2. diameter: m, any shape."""
    return pi * diameter**2 / 4.0


def fastener_correction(
    alpha: float,
    conductivity: float,
    area: float,
    density: float,
    d0: float,
    r1: float,
    r_total: float,
) -> float:
    """Addition to U for fasteners: dUf = alpha k Af nf / d0 (R1/RT)^2.

    alpha: see :func:`penetration_factor`. conductivity: k of the fastener, W/(m K). area: Af of
    one, m2. density: nf, 1/m2. d0: thickness of the insulating layer, m. r1: its resistance,
    r_total: RT, both without the fasteners, m2 K/W. Any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex F.
    """
    return alpha * conductivity * area * density / d0 * (r1 / r_total) ** 2


def correct_for_fasteners(
    assembly: Assembly, r_total: float, conventions: Conventions, outside: int = 0
) -> Correction:
    """Correct for all fasteners of an assembly by the rule set's convention.

    r_total: of the wall as drawn, films included and tapered layers at their least thickness,
    m2 K/W. outside: how many layers lie outside of a well-ventilated cavity; fasteners through
    them add nothing. A tapered layer is counted here at its mean thickness, in R1 and RT.
    """
    fasteners = assembly.fasteners
    if not fasteners:
        return Correction(0.0)
    if conventions.fasteners == "ignored":
        titles = ", ".join(dict.fromkeys(one.layer for one in fasteners))
        said = f"fasteners through {titles} are not counted, as the rule set says"
        return Correction(0.0, assumptions=(said,))
    if conventions.fasteners == "chi":
        return _by_chi(assembly)
    drawn = assembly.layers[outside:]
    left_out = {layer.title for layer in assembly.layers[:outside]}
    at_mean, assumptions = total_at_mean(drawn, r_total, "fastener")
    steps: list[Step] = []
    missing: list[str] = []
    for number, one in enumerate(fasteners, 1):
        insulation = insulation_of(drawn, one.layer)
        if one.layer in left_out:
            words = f"fasteners through {one.layer} lie outside of what counts: no correction"
            assumptions.append(words)
        elif one.material.conductivity < LEAST_CONDUCTIVITY:
            words = f"fasteners through {one.layer} conduct less than 1 W/(m K): no correction"
            assumptions.append(words)
        elif insulation is None:
            missing.append(f"thickness and resistance of {one.layer!r} that fasteners cross")
        else:
            steps += _steps(str(number), one, insulation, at_mean)
    counted = Correction(0.0, tuple(steps), tuple(missing), tuple(assumptions))
    return counted._replace(value=sum(step.value for step in counted.addends))


def _by_chi(assembly: Assembly) -> Correction:
    said = "fasteners count as point bridges (chi), as the rule set says"
    if any(bridge.kind == "point" for bridge in assembly.bridges):
        return Correction(0.0, assumptions=(said,))
    need = f"the point transmittance (chi) of the fasteners through {assembly.fasteners[0].layer}"
    return Correction(0.0, missing=(need,), assumptions=(said,))


def total_at_mean(layers: tuple[Layer, ...], r_total: float, what: str) -> tuple[float, list[str]]:
    """RT with tapered layers at their mean thickness, and what is said of it.

    layers: drawn. r_total: with tapered layers at their least thickness, m2 K/W. what: the
    correction, in words.
    """
    tapered = [layer for layer in layers if isinstance(layer, TaperedLayer)]
    added = sum((mean_thickness(x) - x.least) / x.material.conductivity for x in tapered)
    return r_total + added, [AT_MEAN.format(what)] if tapered else []


def insulation_of(layers: tuple[Layer, ...], title: str) -> Insulation | None:
    """Thickness and resistance of the layer of that title; None where it has not both."""
    layer = next((layer for layer in layers if layer.title == title), None)
    if isinstance(layer, MaterialLayer):
        return Insulation(layer.thickness, layer.thickness / layer.material.conductivity)
    if isinstance(layer, ResistanceLayer) and layer.thickness > 0:
        return Insulation(layer.thickness, layer.resistance)
    if isinstance(layer, TaperedLayer):
        thickness = mean_thickness(layer)
        return Insulation(thickness, thickness / layer.material.conductivity)
    return None


def resistance_of(layers: tuple[Layer, ...], title: str) -> float | None:
    """Resistance of the layer of that title, m2 K/W; None where it has none of its own."""
    layer = next((layer for layer in layers if layer.title == title), None)
    if isinstance(layer, ResistanceLayer):
        return layer.resistance
    insulation = insulation_of(layers, title)
    return None if insulation is None else insulation.resistance


def _steps(number: str, fasteners: Fasteners, layer: Insulation, r_total: float) -> list[Step]:
    inside = layer.thickness if fasteners.penetration is None else fasteners.penetration
    alpha = penetration_factor(min(inside, layer.thickness), layer.thickness)
    area = fastener_area(fasteners.diameter)
    conductivity, density = fasteners.material.conductivity, fasteners.density
    value = fastener_correction(
        alpha, conductivity, area, density, layer.thickness, layer.resistance, r_total
    )
    coefficient, section = f"alpha_f{number}", f"A_f{number}"
    d0 = Operand("d0", layer.thickness, "length")
    d1 = Operand("d1", min(inside, layer.thickness), "length")
    operands = (
        Operand(coefficient, alpha, "number"),
        Operand("k", conductivity, "conductivity"),
        Operand(section, area, "area"),
        Operand("n", density, "per_area"),
        d0,
        Operand("R_1", layer.resistance, "resistance"),
        Operand("R_T", r_total, "resistance"),
    )
    expression = (
        f"{{{coefficient}}} * {{k}} * {{{section}}} * {{n}} / {{d0}} * ({{R_1}} / {{R_T}}) ** 2"
    )
    return [
        Step(
            section, f"section of one fastener, {fasteners.layer}", "3.14159265 * {D} ** 2 / 4",
            (Operand("D", fasteners.diameter, "run"),), area, "area",
        ),
        Step(
            coefficient, "coefficient by the depth that the fastener crosses",
            "0.8 * {d1} / {d0}", (d1, d0), alpha, "number", SOURCE,
        ),
        Step(
            f"dU_f{number}", f"fasteners through {fasteners.layer}", expression, operands, value,
            "u_factor", SOURCE,
        ),
    ]  # fmt: skip


METHODS = (
    Method(
        name="fasteners",
        title="Mechanical fasteners through insulation",
        formula="dUf = alpha k Af nf / d0 (R1 / RT)^2, alpha = 0.8 or 0.8 d1/d0",
        source=SOURCE,
        valid="fasteners of 1 W/(m K) or more; not where both ends touch metal sheets, nor for "
        "ties across an empty cavity",
    ),
)
