"""Slightly ventilated air spaces: between a wall whose space is closed and one that is open."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.layers import AirSpaceLayer, TaperedLayer
from envcheck.model.project import Assembly
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.registry import Decision, Method, NotDecided
from envcheck.solve.renaming import renamed
from envcheck.solve.wiring import u_step

SOURCE = "ISO 6946:2017, 6.9.3"
MM2 = 1e6
"""mm2 in one m2"""
INTERPOLATED = "no bracket: interpolated between two walls by the openings of an air space"


def between_closed_and_open(openings: float, closed: float, opened: float) -> float:
    """Total resistance of a wall with a slightly ventilated space.

    RT = (1500 - Av)/1000 RTu + (Av - 500)/1000 RTv. openings: Av, m2 per m of an upright space
    or per m2 of a level one, 500e-6 to 1500e-6. closed: RTu, opened: RTv, of the wall with the
    space unventilated and well ventilated, m2 K/W. Any shape. Returns m2 K/W.
    Source: ISO 6946:2017, 6.9.3.
    """
    area = openings * MM2
    return (1500.0 - area) / 1000.0 * closed + (area - 500.0) / 1000.0 * opened


class Pair(NamedTuple):
    """The two walls between which the value lies."""

    space: AirSpaceLayer
    openings: float
    """m2/m or m2/m2"""
    closed: Assembly
    opened: Assembly


def pair_of(assembly: Assembly, setting: Setting) -> Pair | None:
    """The two walls of an assembly with a space whose openings make it slightly ventilated.

    None where there is no such space. Errors: NotDecided where nothing can be interpolated.
    """
    found = [
        (place, layer)
        for place, layer in enumerate(assembly.layers)
        if isinstance(layer, AirSpaceLayer)
        and layer.ventilation == "slightly"
        and layer.openings is not None
    ]
    if not found:
        return None
    place, space = found[0]
    name = repr(space.title)
    if len(found) > 1:
        raise NotDecided(f"one slightly ventilated air space: {name} is not the only one")
    if setting.method == "two_dimensional":
        raise NotDecided(f"another method than two-dimensional bounds: {name} is interpolated")
    if any(isinstance(layer, TaperedLayer) for layer in assembly.layers):
        raise NotDecided(f"either a tapered layer or the slightly ventilated air space {name}")
    upright = setting.direction == "horizontal"
    if upright != (space.openings_per == "length"):
        key = "openings_per_length" if upright else "openings_per_area"
        kind = "upright" if upright else "level"
        raise NotDecided(f"{key} of the {kind} air space {name}")
    before, after = assembly.layers[:place], assembly.layers[place + 1 :]
    closed, opened = (
        assembly._replace(layers=(*before, space._replace(ventilation=as_if), *after))
        for as_if in ("unventilated", "well")
    )
    return Pair(space, space.openings or 0.0, closed, opened)


def interpolated(pair: Pair, closed: Decision, opened: Decision) -> Decision:
    """The decision between those of the two walls, with the worksheets of both."""
    if closed.value is None or opened.value is None:
        return closed._replace(value=None, missing=(*closed.missing, *opened.missing))
    known = {step.symbol: step.value for step in closed.steps[: closed.layer_steps]}
    ours = {s.symbol: f"{s.symbol}_closed" for s in closed.steps[closed.layer_steps :]}
    others = [step for step in opened.steps if known.get(step.symbol) != step.value]
    theirs = {step.symbol: f"{step.symbol}_open" for step in others}
    total = between_closed_and_open(pair.openings, 1.0 / closed.value, 1.0 / opened.value)
    quantity = f"openings_per_{pair.space.openings_per}"
    u_closed, u_open = ours[closed.steps[-1].symbol], theirs[opened.steps[-1].symbol]
    closing = Step(
        "R_T",
        f"{pair.space.title}: between closed and open by its openings",
        f"(0.0015 - {{A_v}}) / 0.001 / {{{u_closed}}} + ({{A_v}} - 0.0005) / 0.001 / {{{u_open}}}",
        (
            Operand("A_v", pair.openings, quantity),
            Operand(u_closed, closed.value, "u_factor"),
            Operand(u_open, opened.value, "u_factor"),
        ),
        total,
        "resistance",
        SOURCE,
        True,
    )
    steps = (*renamed(closed.steps, ours), *renamed(others, theirs), closing, u_step(total, "R_T"))
    return closed._replace(
        value=1.0 / total,
        tree=None,
        steps=steps,
        assumptions=(*closed.assumptions, *opened.assumptions),
        beside=(),
    )


METHODS = (
    Method(
        name="slightly_ventilated",
        title="Slightly ventilated air space, by its openings",
        formula="RT = (1500 - Av)/1000 RTu + (Av - 500)/1000 RTv; RTu with the space closed, RTv "
        "with it well ventilated",
        source=SOURCE,
        valid="openings above 500 up to 1500 mm2 per m of an upright space, or per m2 of a level "
        "one; one such space in an assembly",
    ),
)
