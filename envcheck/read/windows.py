"""Windows, doors and curtain walls by their parts, and glazing by its panes and spaces."""

from __future__ import annotations

from bisect import bisect_left
from functools import lru_cache
from math import pi, sqrt

from envcheck.model.layers import Layer
from envcheck.model.windows import (
    Between,
    FramePart,
    Gas,
    Glazing,
    Infill,
    Joint,
    Light,
    Space,
    Window,
)
from envcheck.read.context import NAN, Context
from envcheck.read.layers import read_layers
from envcheck.read.materials import rows
from envcheck.read.yaml_reader import Entry

UNCOATED = 0.837
"""Corrected emissivity of uncoated glass (EN 673:2011)."""
CLOSES = 0.005
"""Share of a window's area by which its parts may miss it."""
_FILLS = ("u_glass", "glazing", "u_panel", "panel_layers")


def read_window(context: Context, entry: Entry) -> Window:
    """Read a window, door or curtain wall module; a second window behind it where one stands."""
    width = context.positive(entry, "width", "length")
    height = context.positive(entry, "height", "length")
    window = _parts(context, entry, width, height)
    if "inner" not in entry:
        context.out_of_place(entry, ("between",), "a single window", "add 'inner', or delete it")
        return window
    if "between" not in entry:
        hint = ", what lies between the two windows"
        context.add("missing-key", entry.line, key="between", where="the double window", hint=hint)
        return window
    return window._replace(
        inner=_parts(context, entry["inner"], width, height),
        between=_between(context, entry["between"]),
    )


def read_glazing(context: Context, entry: Entry) -> Glazing:
    """Read panes and the spaces between them, outside first."""
    texts, gaps = entry["panes"], entry.get("gaps", ())
    panes = Entry(entry.line)
    for place, text in enumerate(texts):
        panes[str(place)], panes.lines[str(place)] = text, texts.lines[place]
    if len(gaps) != len(texts) - 1:
        context.add(
            "panes-and-gaps",
            entry.lines.get("gaps", entry.lines["panes"]),
            found=f"{len(texts)} panes and {len(gaps)} gaps",
            expected=f"{len(texts) - 1} gaps",
        )
    return Glazing(
        tuple(context.positive(panes, key, "length") for key in panes),
        tuple(_space(context, gap) for gap in gaps),
    )


# -------------------------------------------------------------------------------------- parts


def _parts(context: Context, entry: Entry, width: float, height: float) -> Window:
    sources = tuple(entry.get("sources", ()))
    joints = tuple(_joint(context, joint) for joint in entry.get("joints", ()))
    if context.exactly_one(entry, ("frame_width", "lights"), "the window") != "lights":
        return _single(context, entry, width, height)._replace(sources=sources, joints=joints)
    hint = "it belongs to each of the lights"
    context.out_of_place(entry, (*_FILLS, "coupled", "psi"), "a window with lights", hint)
    lights = tuple(_light(context, light, width, height) for light in entry["lights"])
    frames = tuple(_frame(context, frame) for frame in entry.get("frames", ()))
    if "u_frame" in entry:
        u_frame = context.positive(entry, "u_frame", "u_factor")
        frames = (*frames, FramePart("the frame", None, u_frame))
    _must_close(context, entry, Window(width, height, None, lights, frames))
    return Window(width, height, None, lights, frames, joints, sources)


def _single(context: Context, entry: Entry, width: float, height: float) -> Window:
    """One light within a frame of one width all round."""
    where = "the window of one light"
    context.out_of_place(entry, ("frames",), where, "it belongs beside 'lights'")
    frame = context.optional(entry, "frame_width", "length") or NAN
    if 2 * frame >= min(width, height):
        found, line = entry["frame_width"], entry.lines["frame_width"]
        limit = "half the window, so that no glass is left"
        context.add("too-thick", line, found=found, key="frame_width", limit=limit)
    infill, opaque = _infill(context, entry, where)
    inside = (width - 2 * frame, height - 2 * frame)
    light = Light(
        "panel" if opaque else "glass",
        entry.line,
        opaque,
        *inside,
        inside[0] * inside[1],
        2 * sum(inside),
        1,
        _required(context, entry, "psi", "linear_transmittance", where),
        infill,
        *_coupled(context, entry),
    )
    u_frame = _required(context, entry, "u_frame", "u_factor", where)
    return Window(width, height, frame, (light,), (FramePart("the frame", None, u_frame),))


def _required(context: Context, entry: Entry, key: str, quantity: str, where: str) -> float:
    if key not in entry:
        context.add("missing-key", entry.line, key=key, where=where, hint="")
        return NAN
    read = context.number if key == "psi" else context.positive
    return read(entry, key, quantity)


def _light(context: Context, entry: Entry, width: float, height: float) -> Light:
    title = entry["title"]
    where = f"the light {title!r}"
    infill, opaque = _infill(context, entry, where)
    wide = high = None
    if context.exactly_one(entry, ("width", "area"), where) == "area":
        context.out_of_place(entry, ("height",), where, "it belongs beside 'width'")
        area = context.positive(entry, "area", "area")
        edge = _required(context, entry, "edge_length", "length", where)
        _edge_fits(context, entry, area, edge, (width, height))
    else:
        context.out_of_place(entry, ("edge_length",), where, "it follows from width and height")
        wide = context.optional(entry, "width", "length") or NAN
        high = _required(context, entry, "height", "length", where)
        area, edge = wide * high, 2 * (wide + high)
        for key, size, whole in (("width", wide, width), ("height", high, height)):
            if size > whole:
                limit = f"the window, {whole:.4g} m"
                line, found = entry.lines[key], entry[key]
                context.add("too-thick", line, found=found, key=key, limit=limit)
    return Light(
        title, entry.line, opaque, wide, high, area, edge, entry.get("count", 1),
        context.number(entry, "psi", "linear_transmittance"), infill, *_coupled(context, entry),
    )  # fmt: skip


def _edge_fits(
    context: Context, entry: Entry, area: float, edge: float, window: tuple[float, float]
) -> None:
    """No edge is shorter than a circle's, or longer than a strip's along the window."""
    shortest = 2 * sqrt(pi * area) if area == area else NAN
    longest = max(2 * (side + area / side) for side in window)
    if edge < shortest * 0.999 or edge > longest * 1.001:
        expected = f"{shortest:.4g} m to {longest:.4g} m, for that area within that window"
        hint = "state the visible perimeter of one light"
        context.out_of_range(entry, "edge_length", expected, hint)


def _infill(context: Context, entry: Entry, where: str) -> tuple[Infill, bool]:
    """What fills a light, and whether it is opaque."""
    kind = context.exactly_one(entry, _FILLS, where)
    if kind == "glazing":
        return Infill(glazing=read_glazing(context, entry["glazing"])), False
    if kind == "panel_layers":
        layers: tuple[Layer, ...] = read_layers(context, entry["panel_layers"])
        return Infill(layers=layers), True
    value = context.positive(entry, kind, "u_factor") if kind else NAN
    return Infill(u=value), kind == "u_panel"


def _coupled(context: Context, entry: Entry) -> tuple[Infill | None, Between | None]:
    """A second glazing in the same frame, and what lies between both."""
    if "coupled" not in entry:
        return None, None
    context.out_of_place(
        entry, ("u_panel", "panel_layers"), "coupled glazing", "state glass or glazing"
    )
    second = entry["coupled"]
    infill, _ = _infill(context, second, "the coupled glazing")
    return infill, _between(context, second["between"])


def _frame(context: Context, entry: Entry) -> FramePart:
    area = context.positive(entry, "area", "area")
    return FramePart(entry["title"], area, context.positive(entry, "u_frame", "u_factor"))


def _joint(context: Context, entry: Entry) -> Joint:
    length = context.positive(entry, "length", "length")
    return Joint(entry["title"], length, context.number(entry, "psi", "linear_transmittance"))


def _must_close(context: Context, entry: Entry, window: Window) -> None:
    """Parts that state their area fill the window, or leave something for the rest."""
    whole = window.width * window.height
    parts = sum(light.count * light.area for light in window.lights)
    parts += sum(frame.area or 0.0 for frame in window.frames)
    rest = any(frame.area is None for frame in window.frames)
    if whole != whole or parts != parts:
        return
    fits = parts < whole if rest else abs(parts - whole) <= CLOSES * whole
    if not fits:
        context.add(
            "parts-do-not-close",
            entry.lines["lights"],
            found=f"{parts:.4g} m2 of lights and frames",
            expected=f"{'less than ' if rest else ''}{whole:.4g} m2",
            hint="check sizes and counts" + ("" if rest else ", or give 'u_frame' for the rest"),
        )


# ------------------------------------------------------------------------------------- spaces


def _between(context: Context, entry: Entry) -> Between:
    source = entry.get("source", "")
    if context.exactly_one(entry, ("thickness", "resistance"), "'between'") == "resistance":
        keys = ("emissivities", "normal_emissivities")
        context.out_of_place(entry, keys, "a stated resistance", "it belongs beside 'thickness'")
        value = context.positive(entry, "resistance", "resistance")
        return Between(None, value, source or "stated in the project")
    return Between(_space(context, entry), None, source)


def _space(context: Context, entry: Entry) -> Space:
    """A gas space; ``thickness`` was asked for by the schema or by the caller."""
    gas = entry.get("gas", "air")
    known = rows("gases")
    if gas not in known:
        context.unknown("unknown-gas", entry.lines["gas"], gas, known)
    share = 1.0
    if gas != "air" and "share" not in entry:
        hint = ", as 90 %: the share of the gas, the rest is air"
        context.add("missing-key", entry.line, key="share", where=f"a space with {gas}", hint=hint)
    elif "share" in entry:
        share = context.share(entry, "share", whole=True)
    thickness = context.optional(entry, "thickness", "length") or NAN
    emissivities, said = _emissivities(context, entry)
    row, air = known.get(gas, known["air"]), known["air"]
    title = "air" if gas == "air" else f"{100 * share:.4g} % {gas}"
    sources = [_printed(row)] if share == 1.0 else [_printed(row), _printed(air)]
    mixed = ", mixed linearly" if share < 1.0 else ""
    source = f"{' and '.join(sources)}{mixed} ({row['source']}); {said}"
    return Space(thickness, _gas(row), _gas(air), share, emissivities, title, source)


def _printed(row: dict[str, str]) -> str:
    names = {"density": "rho", "viscosity": "mu", "conductivity": "k", "specific_heat": "c"}
    return f"{row['id']} " + ", ".join(f"{short} {row[key]}" for key, short in names.items())


def _gas(row: dict[str, str]) -> Gas:
    keys = ("density", "viscosity", "conductivity", "specific_heat")
    return Gas(*(float(row[key]) for key in keys))


def _emissivities(context: Context, entry: Entry) -> tuple[tuple[float, float], str]:
    """Corrected emissivities of both faces, and in words where they come from."""
    if "normal_emissivities" not in entry:
        stated = entry.get("emissivities")
        said = "corrected emissivities as stated" if stated else "uncoated glass on both faces"
        outer, inner = stated or (UNCOATED, UNCOATED)
        return (float(outer), float(inner)), said
    if "emissivities" in entry:
        context.exactly_one(entry, ("emissivities", "normal_emissivities"), "the space")
    normal = [float(value) for value in entry["normal_emissivities"]]
    ratios = [corrected_ratio(value) for value in normal]
    first, second = (value * ratio for value, ratio in zip(normal, ratios, strict=True))
    said = " and ".join(f"{n:g} x {r:.4g}" for n, r in zip(normal, ratios, strict=True))
    return (first, second), f"corrected emissivities {said} (EN 673)"


def corrected_ratio(normal: float) -> float:
    """Corrected over normal emissivity, linear between the printed rows; the ends hold beyond.

    normal: 0..1. Source: EN 673:2011, table of corrected emissivity.
    """
    table = _ratios()
    points = [point for point, _ in table]
    at = bisect_left(points, normal)
    if at == 0 or at == len(table):
        return table[min(at, len(table) - 1)][1]
    (low, first), (high, second) = table[at - 1], table[at]
    return first + (second - first) * (normal - low) / (high - low)


@lru_cache(maxsize=1)
def _ratios() -> tuple[tuple[float, float], ...]:
    found = rows("corrected_emissivities").values()
    return tuple((float(row["normal"]), float(row["ratio"])) for row in found)
