"""The moisture check of one assembly and of a site's air: advisory, never a verdict."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

from envcheck.model.judged import Line
from envcheck.model.layers import AirSpaceLayer, FramedLayer, Layer, Material
from envcheck.model.moisture import Check, Moisture, Month, Sheet
from envcheck.model.project import Assembly, Element, Project, Site
from envcheck.model.ruleset import Conventions, RuleSet
from envcheck.model.solved import Operand, Setting, Step
from envcheck.model.vapour import excess_at, saturation_pressure
from envcheck.solve.assembly import draw
from envcheck.solve.cautions import cautions
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.methods.iso13788_surface import (
    critical_factor,
    critical_steps,
    factor_step,
    least_surface_temperature,
)
from envcheck.solve.methods.slightly_ventilated import pair_of
from envcheck.solve.registry import NotDecided, Wall
from envcheck.solve.surface import plain_factor
from envcheck.solve.vapour_layers import faces_of, sheet_steps, sheets_of
from envcheck.solve.vapour_year import flow_steps, year_of

CLASSES_OF_WOOD = ("wood", "board")


def check_project(
    project: Project, rulesets: Mapping[str, RuleSet], lines: Iterable[Line]
) -> Check:
    """Check every layered assembly of elements that adjoin outdoor air.

    lines: with the values, by which each is drawn; the first of an assembly counts. Nothing is
    raised: what is missing is said.
    """
    missing = missing_of(project.site)
    if missing:
        return Check(missing)
    months = months_of(project.site)
    outdoors: dict[str, list[Element]] = {}
    for element in project.elements.values():
        if element.adjoins == "outdoors" and project.assemblies[element.assembly].kind == "layers":
            outdoors.setdefault(element.assembly, []).append(element)
    found: dict[str, Moisture] = {}
    for line in lines:
        element, solved = project.elements[line.element], line.solved
        name = element.assembly
        if solved is None or name in found or element.adjoins != "outdoors":
            continue
        if name in outdoors:
            conventions = rulesets[line.ruleset].conventions
            found[name] = check(
                project.assemblies[name], outdoors[name], solved.setting, conventions, months
            )
    worst = worst_of(months)
    checked = tuple(found[name] for name in project.assemblies if name in found)
    left = tuple(name for name in project.assemblies if name not in found)
    steps = () if worst is None else critical_steps(months[worst])
    return Check((), months, worst, checked, left, steps)


def months_of(site: Site) -> tuple[Month, ...]:
    """Air on both sides by month; the site states both (see :func:`missing_of`)."""
    climate, air = site.climate, site.indoor_air
    assert climate is not None and air is not None, "told by missing_of"
    found = []
    for place, (outdoors, outside, indoors) in enumerate(
        zip(climate.temperatures, climate.vapour_pressures, air.temperatures, strict=True)
    ):
        if air.humidities:
            inside = air.humidities[place] * saturation_pressure(indoors)
        else:
            inside = outside + excess_at(air.excess, outdoors)
        least = least_surface_temperature(inside)
        critical = critical_factor(least, outdoors, indoors)
        found.append(Month(outdoors, outside, indoors, inside, least, critical))
    return tuple(found)


def worst_of(months: Sequence[Month]) -> int | None:
    """The month of the greatest critical factor; None where it is never colder outdoors."""
    found = {n: month.critical for n, month in enumerate(months) if month.critical is not None}
    return max(found, key=lambda n: found[n]) if found else None


def missing_of(site: Site) -> tuple[str, ...]:
    """What a site lacks for the check, each with its place in the project file."""
    at = f"(section site, line {site.line})"
    found = []
    if site.climate is None or not site.climate.temperatures:
        found.append(f"twelve monthly temperatures: climate.temperatures {at}")
    if site.climate is None or not site.climate.vapour_pressures:
        found.append(f"outdoor humidity: climate.humidities or climate.vapour_pressures {at}")
    if site.indoor_air is None:
        found.append(f"the air of the rooms: indoor_air {at}")
    return tuple(found)


def check(
    assembly: Assembly,
    elements: Sequence[Element],
    setting: Setting,
    conventions: Conventions,
    months: Sequence[Month],
) -> Moisture:
    """Check one layered assembly between outdoor air and rooms, along its clear field.

    elements: those of the assembly that adjoin outdoor air. setting, conventions: by which its U
    is computed. Nothing is raised: what is missing is said.
    """
    blank = Moisture(
        assembly.id, assembly.title, assembly.sheet, tuple(each.tag for each in elements)
    )
    try:
        pair = pair_of(assembly, setting)
        wall = draw(pair.closed if pair else assembly, setting, conventions)[0]
    except NotDecided as need:
        return blank._replace(missing=(str(need),))
    sheets, missing = sheets_of(wall)
    if missing:
        return blank._replace(missing=missing)
    outside, inside = wall.outside.value, wall.inside.value
    resistance = outside + sum(sheet.resistance for sheet in sheets)
    factor = plain_factor(resistance)
    short = tuple(
        n
        for n, month in enumerate(months)
        if month.critical is not None and factor < month.critical
    )
    faces = faces_of(sheets, outside)
    year = year_of(faces, resistance + inside, months)
    return blank._replace(
        withheld=withheld(assembly, elements),
        notes=_notes(assembly, elements),
        sheets=sheets,
        factor=factor,
        short=short,
        year=year,
        steps=(
            *sheet_steps(sheets),
            *_steps(wall, sheets, resistance, factor),
            *flow_steps(year, faces, resistance + inside, months),
        ),
    )


# ------------------------------------------------------------------------- what is not judged


def withheld(assembly: Assembly, elements: Iterable[Element]) -> tuple[str, ...]:
    """Why nothing favourable may be said of an assembly by this method."""
    layers, found = assembly.layers, []
    for caution in cautions(assembly):
        if caution.topic == "solid_masonry":
            reason = caution.reason.removeprefix(f"{assembly.id}: ")
            found.append(
                f"{reason}: rain, capillary flow, storage and ends of beams decide there, and this "
                "method knows none of them"
            )
    framed = [layer for layer in layers if isinstance(layer, FramedLayer)]
    timber = any(not is_metal(layer) for layer in framed) or any(
        material is not None and material.material_class in CLASSES_OF_WOOD and material.combustible
        for material in map(_material, layers)
    )
    if timber and any(element.category.startswith("roof") for element in elements):
        found.append(
            "a timber roof: air flow through leaks and built-in moisture decide there, and this "
            "method knows neither"
        )
    for layer in framed:
        kind = "metal" if is_metal(layer) else "timber"
        found.append(
            f"{layer.title} is framed: figures are one-dimensional along its clear field, and heat "
            f"and vapour at the {kind} members are not computed"
        )
    for space in layers:
        if isinstance(space, AirSpaceLayer) and space.ventilation != "unventilated":
            found.append(f"{space.title} is ventilated: its air flow is not computed")
    return tuple(found)


def _material(layer: Layer) -> Material | None:
    return getattr(layer, "material", None)


def _notes(assembly: Assembly, elements: Iterable[Element]) -> tuple[str, ...]:
    bridged = bool(assembly.bridges or assembly.fasteners)
    if bridged or any(element.bridges for element in elements):
        return ("fasteners and bridges are colder than the clear field and not covered",)
    return ()


def _steps(wall: Wall, sheets: Sequence[Sheet], resistance: float, factor: float) -> Iterable[Step]:
    """The sum of resistances along the clear field, and the factor that follows."""
    layers = [Operand(f"R{n}", sheet.resistance, "resistance") for n, sheet in enumerate(sheets, 1)]
    parts = (Operand("Ro", wall.outside.value, "resistance"), *layers)
    expression = " + ".join(f"{{{part.name}}}" for part in parts)
    title = "outside film and layers along the clear field"
    yield Step("R", title, expression, parts, resistance, "resistance")
    yield factor_step(resistance, factor)
    both = Operand("R", resistance, "resistance"), Operand("Ri", wall.inside.value, "resistance")
    total = resistance + wall.inside.value
    yield Step("R_T", "from air to air", "{R} + {Ri}", both, total, "resistance")
