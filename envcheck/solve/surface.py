"""Lowest inside surface temperature of an assembly: information, not bounded."""

from __future__ import annotations

from envcheck.model.details import Coldest
from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting
from envcheck.solve.assembly import draw
from envcheck.solve.registry import NotDecided, Wall

STILL = 0.25
"""Inside surface resistance for the lowest surface temperature, m2 K/W. Source: ISO 13788:2012,
opaque parts (from memory); U-factors have a lower one."""


class NoSurface(Exception):
    """Why an assembly has no surface temperature factor, in words."""


def plain_factor(resistance: float, film: float = STILL) -> float:
    """Temperature factor f_Rsi = 1 - U Rsi of layers in series, with U = 1 / (R + Rsi).

    resistance: of the outside film and all layers, m2 K/W. film: Rsi, m2 K/W. Any shape.
    Source: ISO 13788:2012, definition of f_Rsi.
    """
    return 1.0 - film / (resistance + film)


def coldest_of(assembly: Assembly, setting: Setting, conventions: Conventions) -> Coldest:
    """The coldest place of the inner face with an inside resistance of 0.25 m2 K/W.

    Layers in series follow from their sum; a drawn section is solved again in two dimensions
    (loads numpy and scipy). Errors: NoSurface with the reason.
    """
    try:
        wall = draw(assembly, setting, conventions)[0]
    except NotDecided as why:
        raise NoSurface(f"missing: {why}") from why
    if any(layer.kind == "tapered" for layer in wall.layers):
        raise NoSurface("a tapered layer is no rectangle")
    if not any(block.pattern for block in wall.blocks):
        layers = sum(row[0].value for block in wall.blocks for row in block.cells)
        resistance = wall.outside.value + layers
        return Coldest(plain_factor(resistance), None, None, STILL)
    return _of_section(wall)


def _of_section(wall: Wall) -> Coldest:
    from envcheck.solve.field.bound import bound
    from envcheck.solve.field.drawing import NotDrawn, section_of
    from envcheck.solve.field.networks import SolveError
    from envcheck.solve.field.section import ModelError
    from envcheck.solve.field.surfaces import coldest_of_section, section_with_still_air

    try:
        spot = coldest_of_section(bound(section_with_still_air(section_of(wall), STILL)))
    except (NotDrawn, ModelError, SolveError) as why:
        raise NoSurface(f"not solved in two dimensions: {why}") from why
    return Coldest(spot.factor, spot.x, spot.y, STILL)
