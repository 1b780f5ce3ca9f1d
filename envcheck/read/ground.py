"""What stands on or in the ground: slabs with their edge, suspended floors, basements."""

from __future__ import annotations

from envcheck.model.ground import Basement, Ground, Slab, Suspended
from envcheck.read.context import Context
from envcheck.read.layers import read_layers
from envcheck.read.yaml_reader import Entry


def read_ground(context: Context, entry: Entry) -> Ground:
    """Read perimeter, area, wall and soil; what is not stated is named when it is asked for."""
    return Ground(
        perimeter=context.optional(entry, "perimeter", "length"),
        area=context.optional(entry, "area", "area"),
        wall_thickness=context.optional(entry, "wall_thickness", "length"),
        soil_conductivity=context.optional(entry, "soil_conductivity", "conductivity"),
        measured=entry.get("measured", ""),
    )


def read_slab(context: Context, entry: Entry) -> Slab:
    """Read a slab on the ground with the insulation along its edge."""
    edge = entry.get("edge_insulation")
    position, resistance, extent, thickness, covered = "none", 0.0, 0.0, None, None
    if edge is not None:
        position, covered = edge["position"], edge.get("top_edge_covered")
        size = {"vertical": "depth", "horizontal": "width"}.get(position)
        context.out_of_place(
            edge,
            tuple(key for key in ("depth", "width") if key != size),
            f"edge insulation of position {position!r}",
            f"use {size!r}" if size else "delete it, or mend the position",
        )
        _complete(context, edge, position, size)
        thickness = context.optional(edge, "thickness", "length")
        resistance = _resistance(context, edge, thickness)
        extent = context.optional(edge, size, "length") or 0.0 if size else 0.0
        if thickness is not None and size in edge and thickness >= extent:
            found, limit = edge["thickness"], f"the {size} of the insulation"
            line = edge.lines["thickness"]
            context.add("too-thick", line, found=found, key="thickness", limit=limit)
    ground = read_ground(context, entry)
    return Slab(
        insulation=position,
        resistance=resistance,
        extent=extent,
        heated=entry.get("heated"),
        top_edge_covered=covered,
        wall_thickness=ground.wall_thickness,
        soil_conductivity=ground.soil_conductivity,
        perimeter=ground.perimeter,
        area=ground.area,
        thickness=thickness,
        measured=ground.measured,
    )


def _complete(context: Context, edge: Entry, position: str, size: str | None) -> None:
    """Note what edge insulation of this position lacks."""
    if position == "none":
        return
    by_conductivity = "conductivity" in edge
    if by_conductivity and "resistance" in edge:
        keys = ("resistance", "conductivity")
        context.exactly_one(edge, keys, f"{position} edge insulation")
    needed = "thickness" if by_conductivity else "resistance"
    for key in filter(None, (needed, size)):
        if key not in edge:
            where = f"{position} edge insulation"
            context.add("missing-key", edge.line, key=key, where=where, hint="")


def _resistance(context: Context, edge: Entry, thickness: float | None) -> float:
    if "conductivity" in edge and "resistance" not in edge:
        return (thickness or 0.0) / context.positive(edge, "conductivity", "conductivity")
    return context.optional(edge, "resistance", "resistance") or 0.0


def read_suspended(context: Context, entry: Entry) -> Suspended:
    """Read the space below a suspended floor."""
    height = context.optional(entry, "height", "length")
    openings = (
        context.not_negative(entry, "openings_per_length", "openings_per_length")
        if "openings_per_length" in entry
        else None
    )
    if height is not None and openings is not None and openings >= height:
        context.out_of_range(
            entry,
            "openings_per_length",
            f"openings smaller than the wall of the space, {height * 1e6:.4g} mm2/m",
            "check the area of the openings and the height of the floor",
        )
    return Suspended(
        ground=read_ground(context, entry),
        height=height,
        wall_u=context.optional(entry, "wall_u_factor", "u_factor"),
        openings=openings,
        wind=context.optional(entry, "wind_speed", "speed"),
        shielding=entry.get("shielding", ""),
        ground_resistance=context.optional(entry, "ground_resistance", "resistance") or 0.0,
        depth=context.not_negative(entry, "depth", "length") if "depth" in entry else 0.0,
    )


def read_basement(context: Context, entry: Entry) -> Basement:
    """Read a basement, heated or not."""
    floor = read_layers(context, entry["floor_layers"]) if "floor_layers" in entry else ()
    return Basement(
        ground=read_ground(context, entry),
        depth=context.optional(entry, "depth", "length"),
        walls=read_layers(context, entry["wall_layers"]),
        floor=floor,
        height=context.optional(entry, "height", "length"),
        wall_u=context.optional(entry, "wall_u_factor", "u_factor"),
        volume=context.optional(entry, "volume", "volume"),
        air_changes=context.not_negative(entry, "air_changes", "air_changes")
        if "air_changes" in entry
        else None,
    )
