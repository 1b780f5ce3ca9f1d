"""Weight and heat capacity of layers, per area: what the class tests of a code ask for."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.project import (
    AirSpaceLayer,
    ContactLayer,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    Profile,
    ResistanceLayer,
    SectionLayer,
    TaperedLayer,
)
from envcheck.solve.methods.drawn_section import visible_areas
from envcheck.solve.methods.framed import area_shares
from envcheck.solve.methods.masonry import column_shares
from envcheck.solve.methods.tapered import mean_thickness


class Mass(NamedTuple):
    """What a layer, or several, weigh and store."""

    weight: float | None
    """kg/m2; None where a density is missing."""
    heat_capacity: float | None
    """J/(m2 K); None where a density or specific heat is missing."""
    missing: tuple[str, ...] = ()
    """Titles of the materials or layers without density or specific heat."""


NOTHING = Mass(0.0, 0.0)


def heat_capacity(density: float, specific_heat: float, thickness: float) -> float:
    """Heat capacity of a layer per area: rho c L.

    density: kg/m3. specific_heat: J/(kg K). thickness: m, any shape. Returns J/(m2 K).
    Source: definition; ANSI/ASHRAE/IES 90.1, 3.2 (heat capacity of a wall per area).
    """
    return density * specific_heat * thickness


def sheet_per_area(profile: Profile, spacing: float) -> float:
    """Thickness that a profile's steel would have, spread over the wall, m.

    The developed width of web, two flanges and two lips (hat: a crown of one flange, two webs, two
    brims of one lip) times the sheet's thickness, divided by the spacing. Bends are counted square.
    """
    if profile.shape == "hat":
        developed = 2.0 * profile.web + profile.flange + 2.0 * profile.lip
    else:
        developed = profile.web + 2.0 * profile.flange + 2.0 * profile.lip
    return developed * profile.thickness / spacing


def mass_of(layer: Layer) -> Mass:
    """Weight and heat capacity of one layer; air, films and labelled batts count nothing."""
    if isinstance(layer, MaterialLayer):
        return solid(layer.material, layer.thickness)
    if isinstance(layer, TaperedLayer):
        return solid(layer.material, mean_thickness(layer))
    if isinstance(layer, ResistanceLayer):
        if layer.material is None or layer.thickness <= 0:
            return Mass(None, None, (layer.title,))
        return solid(layer.material, layer.thickness)
    if isinstance(layer, FramedLayer):
        return _framed(layer)
    if isinstance(layer, MasonryLayer):
        return _masonry(layer)
    if isinstance(layer, SectionLayer):
        return _drawn(layer)
    assert isinstance(layer, AirSpaceLayer | ContactLayer), f"a layer of kind {layer.kind!r}"
    return NOTHING


def solid(material: Material, thickness: float) -> Mass:
    """Mass of a solid thickness (m) of a material, spread over the whole area."""
    if thickness == 0:
        return NOTHING
    if material.density is None:
        return Mass(None, None, (material.title,))
    weight = material.density * thickness
    if material.specific_heat is None:
        return Mass(weight, None, (material.title,))
    stored = heat_capacity(material.density, material.specific_heat, thickness)
    return Mass(weight, stored)


def together(masses: list[Mass]) -> Mass:
    """Sum of masses; what is missing in one is missing in the sum."""
    weights = [mass.weight for mass in masses if mass.weight is not None]
    stored = [mass.heat_capacity for mass in masses if mass.heat_capacity is not None]
    return Mass(
        sum(weights) if len(weights) == len(masses) else None,
        sum(stored) if len(stored) == len(masses) else None,
        tuple(dict.fromkeys(title for mass in masses for title in mass.missing)),
    )


def _framed(layer: FramedLayer) -> Mass:
    shares, member = area_shares(layer), layer.member
    if member.profile is not None and member.spacing is not None:
        solid_depth = sheet_per_area(member.profile, member.spacing)
        cavity = shares.cavity + shares.member
    else:
        solid_depth, cavity = shares.member * layer.thickness, shares.cavity
    parts = [solid(member.material, solid_depth)]
    parts += [solid(extra.material, extra.share * extra.thickness) for extra in layer.extras]
    if layer.fill.material is not None:
        parts.append(solid(layer.fill.material, cavity * layer.thickness))
    return together(parts)


def _drawn(layer: SectionLayer) -> Mass:
    """What is seen of each piece, spread over the wall; air weighs nothing."""
    pieces = zip(layer.pieces, visible_areas(layer), strict=True)
    return together(
        [solid(p.material, area / layer.repeat) for p, area in pieces if p.material is not None]
    )


def _masonry(layer: MasonryLayer) -> Mass:
    """Shells, webs, fill, grout and joints; a stated weight stands for all of them."""
    if layer.weight is not None:
        stored = layer.material.specific_heat
        missing = () if stored is not None else (layer.material.title,)
        return Mass(layer.weight, layer.weight * stored if stored else None, missing)
    shares = column_shares(layer)
    core = layer.thickness - 2.0 * layer.shell
    units = 1.0 - layer.joint_share
    parts = [solid(layer.material, units * 2.0 * layer.shell + shares["web"] * core)]
    if layer.fill.material is not None:
        parts.append(solid(layer.fill.material, shares["cell"] * core))
    if layer.grout is not None:
        parts.append(solid(layer.grout, shares["grout"] * core))
    if layer.mortar is not None:
        parts.append(solid(layer.mortar, shares["joint"] * layer.thickness))
    return together(parts)
