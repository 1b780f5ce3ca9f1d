"""Small invented objects for the tests of single methods, and the check of a worksheet."""

from __future__ import annotations

from collections.abc import Iterable

import pytest

from envcheck.formulas import evaluate
from envcheck.model.project import (
    Assembly,
    Fill,
    FramedLayer,
    Layer,
    Material,
    MaterialLayer,
    Member,
    ResistanceLayer,
)
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting, Step
from envcheck.solve.registry import Context
from envcheck.units import in_system, parse

R_IP = parse("R-1", "resistance")
"""m2 K/W in 1 h ft2 F/Btu."""
U_IP = 1.0 / R_IP
INCH = 0.0254


def setting(
    direction: str = "horizontal", method: str = "series", inside_film: float = 0.13
) -> Setting:
    return Setting(
        metric="U_assembly",
        method=method,
        method_from="clause 1",
        refused=(),
        weight=None,
        direction=direction,
        outside_film=0.04,
        outside_film_from="test",
        inside_film=inside_film,
        inside_film_from="test",
        cladding_film=0.13,
        conventions="test",
    )


def context(direction: str = "horizontal", conventions: Conventions | None = None) -> Context:
    return Context("R3", setting(direction), conventions or Conventions())


def material(
    title: str = "board",
    conductivity: float = 0.16,
    material_class: str = "board",
    density: float | None = None,
    specific_heat: float | None = None,
    combustible: bool = False,
) -> Material:
    return Material(
        title,
        title,
        conductivity,
        density,
        specific_heat,
        material_class,
        "invented",
        "table",
        combustible,
    )


XPS = material("XPS", INCH / (5 * R_IP), "insulation", 29.0, 1450.0, True)
WOOL = material("mineral wool", 0.037, "insulation", 40.0, 1030.0)
WOOD = material("softwood", 0.13, "wood", 500.0, 1600.0, True)
STEEL = material("steel", 50.0, "metal", 7800.0, 450.0)


def plane(title: str, of: Material, thickness: float) -> MaterialLayer:
    return MaterialLayer("material", title, 1, of, thickness)


def stated(
    title: str, resistance: float, thickness: float = 0.0, of: Material | None = None
) -> ResistanceLayer:
    return ResistanceLayer("resistance", title, 1, resistance, thickness, of, "label", "label")


def framed(
    title: str,
    thickness: float,
    member: Member,
    fill: Fill,
    share: float | None = None,
    crosses_insulation: bool = False,
) -> FramedLayer:
    return FramedLayer(
        "framed", title, 1, thickness, member, fill, share, "", (), "vertical", crosses_insulation
    )


def assembly(*layers: Layer, kind: str = "layers", **more: object) -> Assembly:
    return Assembly("T1", kind, "test", "A-1", 1, layers=layers, **more)


def assert_recomputes(steps: Iterable[Step]) -> None:
    """Every formula gives its value, in SI and (where it may be printed so) in IP units."""
    seen: dict[str, float] = {}
    for step in steps:
        assert step.symbol not in seen, f"two steps are called {step.symbol}"
        for system in ("SI",) if step.si_only else ("SI", "IP"):
            if step.expression:
                plain = {o.name: o.value for o in step.operands}  # SI as it stands within
                assert evaluate(step.expression, plain) == pytest.approx(step.value), step.symbol
                values = {o.name: in_system(o.value, o.quantity, system) for o in step.operands}
                expected = in_system(step.value, step.quantity, system)
                found = evaluate(step.expression, values)
                assert found == pytest.approx(expected, rel=1e-7), (step.symbol, system)
        for operand in step.operands:
            if operand.name in seen:
                assert operand.value == seen[operand.name], (step.symbol, operand.name)
        seen[step.symbol] = step.value
