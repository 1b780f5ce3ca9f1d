"""Point bridges drawn as boxes: clips and brackets on a repeat area."""

from __future__ import annotations

from typing import Any

from envcheck.model.project import DrawnBox, DrawnPoint, FramedLayer, Layer
from envcheck.read.context import MATCHES, NAN, Context
from envcheck.read.framing import METAL
from envcheck.read.yaml_reader import Entry

THINNEST = 2e-4
"""m; metal thinner than this cannot be resolved in three dimensions."""
PIN = 6e-3
"""m; metal slimmer than this both along the wall and up it is a screw or pin."""

_Span = tuple[float, float]


def read_point(context: Context, entry: Entry, layers: tuple[Layer, ...]) -> DrawnPoint | None:
    """Read a clip or bracket; None after a problem that leaves nothing to draw."""
    titles = [layer.title for layer in layers]
    along, up = _lengths(context, entry, "spacing")
    if along <= 0 or up <= 0:
        context.add(
            "not-positive", entry.lines["spacing"], found=_typed(entry["spacing"]),
            expected="two lengths more than zero", key="spacing",
        )  # fmt: skip
        along = up = NAN
    if entry["layer"] not in titles:
        context.unknown("unknown-layer", entry.lines["layer"], entry["layer"], titles)
        return None
    layer = layers[titles.index(entry["layer"])]
    depth = getattr(layer, "thickness", NAN)
    _check_spacing(context, entry, layers, along, up)
    boxes = tuple(
        _box(context, each, depth, along, up) for each in entry["boxes"] if each is not None
    )
    return DrawnPoint(entry["layer"], along, up, boxes, entry.line)


def _check_spacing(
    context: Context, entry: Entry, layers: tuple[Layer, ...], along: float, up: float
) -> None:
    """The points must meet the members again at each repeat."""
    line = entry.lines["spacing"]
    for layer in layers:
        if not isinstance(layer, FramedLayer) or layer.member.spacing is None:
            continue
        own = layer.member.spacing
        size = along if layer.orientation == "vertical" else up
        if size > 0 and own > 0 and abs(max(1, round(size / own)) * own - size) > MATCHES:
            way = "along the wall" if layer.orientation == "vertical" else "up the wall"
            context.add(
                "points-off-spacing", line, found=f"{size * 1000:.4g} mm {way}",
                expected=f"a multiple of {own * 1000:.4g} mm", layer=layer.title,
            )  # fmt: skip


def _box(context: Context, entry: Entry, depth: float, along: float, up: float) -> DrawnBox:
    material = context.material(entry)
    x, z = _lengths(context, entry, "x"), _lengths(context, entry, "z")
    y = _lengths(context, entry, "y") if "y" in entry else (0.0, depth)
    for key, span, least, most, words in (
        ("x", x, -along / 2, along / 2, "half the spacing along the wall to either side"),
        ("z", z, -up / 2, up / 2, "half the spacing up the wall to either side"),
        ("y", y, 0.0, depth, "the thickness of the layer, from its outer face"),
    ):
        if key not in entry:
            continue
        line, found = entry.lines[key], f"{key}: {_typed(entry[key])}"
        if span[1] <= span[0]:
            context.add("box-without-size", line, found=found, key=key)
        elif span[0] < least - MATCHES or span[1] > most + MATCHES:
            expected = f"{least * 1000:.4g} to {most * 1000:.4g} mm"
            context.add("box-outside", line, found=found, expected=expected, limit=words)
    sizes = [span[1] - span[0] for span in (x, z, y)]
    slim = min(sizes) < THINNEST or max(sizes[:2]) < PIN
    if material.conductivity > METAL and min(sizes) > 0 and slim:
        found = " x ".join(f"{size * 1000:.4g}" for size in sizes) + " mm"
        context.add(
            "too-thin-to-draw", entry.line, found=found, material=entry["material"],
            expected=f"metal of {THINNEST * 1000:g} mm or more, and {PIN * 1000:g} mm or more "
            "along the wall or up it",
        )  # fmt: skip
    return DrawnBox(material, x, z, y, entry.line)


def _lengths(context: Context, entry: Entry, key: str) -> _Span:
    """Two lengths typed as a list, m."""
    ends: Any = entry[key]
    here = Entry(entry.lines[key])
    for name, text in zip(("first", "second"), ends, strict=True):
        here[name] = text
        here.lines[name] = entry.lines[key]
    first, second = (context.number(here, name, "length") for name in ("first", "second"))
    return first, second


def _typed(ends: Any) -> str:
    return f"[{', '.join(map(str, ends))}]"
