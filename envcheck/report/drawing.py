"""Drawings of the page as SVG, black on white: hatches and words, no meaning by colour."""

from __future__ import annotations

import math
from collections.abc import Sequence
from itertools import pairwise
from statistics import fmean
from xml.etree import ElementTree as Xml

from envcheck.report.ladder import Ladder, Strip

WIDTH = 700.0
LEFT, RIGHT = 8.0, 64.0
"""Margins, the right one for the words of a limit."""
BAR = 22.0
STRIP = 62.0
"""Height of a strip with its title above and its figures beneath."""
RULER = 44.0
LETTER = 5.6
"""Width of a letter of the small print."""
HATCHES = ("plain", "rising", "dots", "falling")
NUMBERED_FROM = 12.0
"""Least width of a piece that carries its number."""


def ladder(each: Ladder, name: str) -> str:
    """Draw a ladder as an SVG element; the numbers in the pieces are those of the table beside it.

    ``name`` makes the ids of the drawing unique on the page.
    """
    longest = max([s.length for s in each.strips] + [t.length for t in each.ticks])
    scale = (WIDTH - LEFT - RIGHT) / longest
    height = STRIP * len(each.strips) + RULER + (14.0 if each.ticks else 0.0)
    svg = Xml.Element(
        "svg",
        {
            "xmlns": "http://www.w3.org/2000/svg",
            "viewBox": f"0 0 {WIDTH:g} {height:g}",
            "class": "ladder",
            "role": "img",
            "aria-label": spoken(each),
        },
    )
    _hatches(svg, name)
    top = 14.0 if each.ticks else 0.0
    for number, strip in enumerate(each.strips):
        _strip(svg, strip, each.outdoor, top + STRIP * number, scale, name)
    foot = top + STRIP * len(each.strips)
    _ruler(svg, foot, longest, scale, each.unit)
    for tick in each.ticks:
        at = LEFT + tick.length * scale
        _line(svg, at, top, at, foot + 6.0, "limit")
        anchor = "end" if at > WIDTH / 2 else "start"
        _text(svg, at, top - 4.0, tick.text, anchor)
    return Xml.tostring(svg, encoding="unicode")


def spoken(each: Ladder) -> str:
    """The ladder as one sentence, for those who hear the page."""
    strips = "; ".join(
        f"{s.title}{f' ({s.share} of the area)' if s.share else ''}: R {s.resistance}"
        for s in each.strips
    )
    ticks = "".join(f"; {tick.text}" for tick in each.ticks)
    return f"Resistance ladder, R in {each.unit}: {strips}{ticks}"


def _hatches(svg: Xml.Element, name: str) -> None:
    definitions = Xml.SubElement(svg, "defs")
    lines = {"rising": "M0 6L6 0", "falling": "M0 0L6 6"}
    for hatch in HATCHES[1:]:
        pattern = Xml.SubElement(
            definitions,
            "pattern",
            {
                "id": f"{name}-{hatch}",
                "width": "6",
                "height": "6",
                "patternUnits": "userSpaceOnUse",
            },
        )
        if hatch in lines:
            _path(pattern, lines[hatch], {"stroke-width": "0.5"})
        else:
            Xml.SubElement(pattern, "circle", {"cx": "3", "cy": "3", "r": "0.7", "fill": "#000"})


def _strip(
    svg: Xml.Element, strip: Strip, outdoor: str, top: float, scale: float, name: str
) -> None:
    share = f", {strip.share} of the area" if strip.share else ""
    _text(svg, LEFT, top + 11.0, f"{strip.title}{share}: R {strip.resistance}", "start")
    bar = top + 16.0
    if not strip.rungs:
        _box(svg, LEFT, bar, strip.length * scale, "#fff")
        return
    at = LEFT
    ends = [(at, outdoor)]
    for number, rung in enumerate(strip.rungs, 1):
        wide = rung.length * scale
        if not wide:
            continue
        hatch = HATCHES[(number - 1) % len(HATCHES)]
        _box(svg, at, bar, wide, "#fff" if hatch == "plain" else f"url(#{name}-{hatch})")
        if wide >= NUMBERED_FROM:
            _box(svg, at + wide / 2 - 5.5, bar + 5.0, 11.0, "#fff", 12.0, "none")
            _text(svg, at + wide / 2, bar + 14.5, str(number), "middle")
        at += wide
        ends.append((at, rung.behind))
    _figures(svg, ends, bar + BAR)


def _figures(svg: Xml.Element, ends: Sequence[tuple[float, str]], top: float) -> None:
    """Figures beneath the rungs, pushed apart where they would touch, each led to its rung."""
    places = spread([at for at, _ in ends], [LETTER * len(text) + 6.0 for _, text in ends])
    for (at, text), place in zip(ends, places, strict=True):
        leader = f"M{at:.1f} {top:.1f}L{at:.1f} {top + 3:.1f}L{place:.1f} {top + 8:.1f}"
        _path(svg, leader, {"stroke-width": "0.5"})
        _text(svg, place, top + 17.0, text, "middle")


def spread(places: Sequence[float], widths: Sequence[float]) -> list[float]:
    """Move centres apart by as little as keeps texts of these widths from touching.

    Texts that would touch form a group that stands about its mean (pooled adjacent violators, the
    least sum of squared moves); the row as a whole is kept within 0 and ``WIDTH`` where it fits.
    """
    offsets = [0.0]
    for one, other in pairwise(widths):
        offsets.append(offsets[-1] + (one + other) / 2.0)
    groups: list[list[float]] = []
    for place, offset in zip(places, offsets, strict=True):
        groups.append([place - offset])
        while len(groups) > 1 and fmean(groups[-2]) > fmean(groups[-1]):
            last = groups.pop()
            groups[-1] += last
    least, most = widths[0] / 2.0, WIDTH - widths[-1] / 2.0 - offsets[-1]
    starts = [fmean(group) for group in groups for _ in group]
    if most >= least:
        starts = [min(max(start, least), most) for start in starts]
    return [start + offset for start, offset in zip(starts, offsets, strict=True)]


def _ruler(svg: Xml.Element, top: float, longest: float, scale: float, unit: str) -> None:
    _line(svg, LEFT, top + 6.0, LEFT + longest * scale, top + 6.0)
    step = nice(longest / 8.0)
    for number in range(int(longest / step) + 1):
        at = LEFT + number * step * scale
        _line(svg, at, top + 3.0, at, top + 9.0)
        _text(svg, at, top + 20.0, f"{number * step:g}", "middle")
    _text(svg, LEFT, top + 36.0, f"R, {unit}; outside at the left", "start")


def nice(least: float) -> float:
    """Give the smallest of 1, 2, 5 times a power of ten that is not below ``least``."""
    power = 10.0 ** math.floor(math.log10(least))
    return next(power * m for m in (1.0, 2.0, 5.0, 10.0) if power * m >= least * (1.0 - 1e-9))


def _box(
    svg: Xml.Element,
    x: float,
    y: float,
    wide: float,
    fill: str,
    high: float = BAR,
    stroke: str = "#000",
) -> None:
    Xml.SubElement(
        svg,
        "rect",
        {
            "x": f"{x:.2f}",
            "y": f"{y:.2f}",
            "width": f"{wide:.2f}",
            "height": f"{high:g}",
            "fill": fill,
            "stroke": stroke,
            "stroke-width": "0.8",
        },
    )


def _line(svg: Xml.Element, x1: float, y1: float, x2: float, y2: float, kind: str = "") -> None:
    dash = {"stroke-dasharray": "5 3", "stroke-width": "1.6"} if kind else {"stroke-width": "0.8"}
    _path(svg, f"M{x1:.2f} {y1:.2f}L{x2:.2f} {y2:.2f}", dash)


def _path(parent: Xml.Element, d: str, style: dict[str, str]) -> None:
    Xml.SubElement(parent, "path", {"d": d, "stroke": "#000", "fill": "none", **style})


def _text(svg: Xml.Element, x: float, y: float, text: str, anchor: str) -> None:
    Xml.SubElement(
        svg, "text", {"x": f"{x:.1f}", "y": f"{y:.1f}", "text-anchor": anchor}
    ).text = text
