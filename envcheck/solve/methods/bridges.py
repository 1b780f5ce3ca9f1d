"""Linear and point thermal bridges added to the clear field."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING

from envcheck.model.project import Bridge
from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.fasteners import Correction
from envcheck.solve.registry import Method

if TYPE_CHECKING:
    from envcheck.model.details import Detail

NONE = Correction(0)
UNCONFIRMED = ("", "assumed")
"""Kinds of evidence that decide nothing."""


def added_by_bridge(transmittance: float, amount: float, area: float = 1.0) -> float:
    """Addition to U of a bridge: dU = psi l / A, or chi n / A.

    transmittance: psi, W/(m K), or chi, W/K. amount: length, m, or count. area: m2 that they
    belong to; 1 where the amount is per m2. Any shape. Returns W/(m2 K).
    Source: ISO 14683:2017 and ISO 13789:2017: H = sum U A + sum psi l + sum chi.
    """
    return transmittance * amount / area


def correct_for_bridges(
    bridges: Sequence[Bridge], area: float | None, prefix: str = "dU_b"
) -> Correction:
    """Add all bridges to a U-factor.

    bridges: of an assembly or of an element. area: of the element, m2, for amounts that are not
    per m2. prefix: of the addends' symbols. A drawn detail is solved here, and counts with its high
    bound (loads numpy and scipy). A bridge without a confirmed source, or without the
    area it needs, is named as missing and not counted.
    """
    if not bridges:
        return NONE
    steps: list[Step] = []
    missing: list[str] = []
    unsure = 0.0
    for number, bridge in enumerate(bridges, 1):
        name = "psi" if bridge.kind == "line" else "chi"
        if bridge.drawn is not None and bridge.value != bridge.value:
            missing.append(
                f"{name} of {bridge.title!r}: it is drawn, and a drawn box decides only where the "
                "rule set takes the bounds in two or three dimensions"
            )
        elif bridge.evidence in UNCONFIRMED:
            missing.append(f"a confirmed source of {name} for {bridge.title!r}")
        elif not bridge.per_area and not area:
            missing.append(f"the area that the bridge {bridge.title!r} belongs to")
        elif bridge.detail is not None:
            drawn = _from_detail(f"{prefix}{number}", bridge, bridge.detail, area)
            steps += drawn.steps
            missing += drawn.missing
            unsure += drawn.unsure
        else:
            steps.append(_step(f"{prefix}{number}", bridge, area))
    value = sum(step.value for step in steps if step.symbol.startswith(prefix))
    return Correction(value, tuple(steps), tuple(missing), (), unsure)


def _from_detail(symbol: str, bridge: Bridge, detail: Detail, area: float | None) -> Correction:
    """An addend from a drawing with the steps that lead to it."""
    from envcheck.solve.detail import SOURCE, NotSolved, solve_detail

    try:
        found = solve_detail(detail)
    except NotSolved as why:
        return Correction(0.0, missing=(f"psi of the detail {detail.id!r}: {why}",))
    psi = Step(
        f"psi_{symbol.removeprefix('dU_')}",
        f"psi of the detail {found.detail}, high bound ({found.note})",
        "{L2D}" + "".join(f" - {{U_{n}}} * {{l_{n}}}" for n in range(1, len(found.flanks) + 1)),
        (
            Operand("L2D", found.high, "linear_transmittance"),
            *(
                operand
                for n, flank in enumerate(found.flanks, 1)
                for operand in (
                    Operand(f"U_{n}", flank.u_factor, "u_factor"),
                    Operand(f"l_{n}", flank.length, "run"),
                )
            ),
        ),
        found.psi_high,
        "linear_transmittance",
        SOURCE,
    )
    addend = _step(symbol, bridge._replace(value=psi.value), area, psi.symbol)
    whole = 1.0 if bridge.per_area else area or 1.0
    spread = added_by_bridge(found.psi_high - found.psi_low, bridge.amount, whole)
    return Correction(addend.value, (psi, addend), unsure=spread)


def total_step(symbol: str, clear: Operand, additions: Sequence[Step]) -> Step:
    """The step that adds corrections to the clear field.

    symbol: of the total. clear: symbol and value of the clear-field U. additions: the steps whose
    values are added.
    """
    operands = (clear, *(Operand(step.symbol, step.value, "u_factor") for step in additions))
    expression = " + ".join(f"{{{operand.name}}}" for operand in operands)
    value = sum(operand.value for operand in operands)
    return Step(symbol, "U-factor with corrections", expression, operands, value, "u_factor")


def _step(symbol: str, bridge: Bridge, area: float | None, name: str = "") -> Step:
    """The addend of a bridge; ``name`` is the symbol of the step that its psi comes from."""
    line = bridge.kind == "line"
    name, count = name or ("psi" if line else "chi"), "l" if line else "n"
    flow = Operand(name, bridge.value, "linear_transmittance" if line else "point_transmittance")
    if bridge.per_area:
        amount = Operand(count, bridge.amount, "per_length" if line else "per_area")
        expression, operands = f"{{{name}}} * {{{count}}}", [flow, amount]
        value = added_by_bridge(bridge.value, bridge.amount)
    else:
        whole = Operand("A", area or 0.0, "area")
        amount = Operand(count, bridge.amount, "run" if line else "number")
        expression, operands = f"{{{name}}} * {{{count}}} / {{A}}", [flow, amount, whole]
        value = added_by_bridge(bridge.value, bridge.amount, whole.value)
    title, source = bridge.title, bridge.source
    return Step(symbol, title, expression, tuple(operands), value, "u_factor", source)


METHODS = (
    Method(
        name="bridges",
        title="Linear and point bridges",
        formula="dU = sum of psi l / A + sum of chi n / A",
        source="ISO 14683:2017; ISO 13789:2017; psi of a drawn detail by ISO 10211:2017",
        valid="psi and chi with a confirmed source and the dimensions that they were made for",
    ),
)
