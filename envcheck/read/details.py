"""Drawn details: air first, solid pieces over it, and the assemblies that meet."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from itertools import pairwise
from math import isnan
from typing import Any

from envcheck.model.details import EDGES, Detail, Flank, Rectangle, crossings
from envcheck.model.rectangles import Cut, cut
from envcheck.read.context import MATCHES, NAN, Context
from envcheck.read.yaml_reader import Entry

FILMS = {"outdoors": 0.04, "indoors": 0.13}
"""m2 K/W where none is stated. Source: ISO 6946:2017, table 7, horizontal flow."""
CONTRAST = 20.0
"""Ratio of conductivities from which two conductors that meet in a corner only are refused."""
_Span = tuple[float, float]


def read_detail(context: Context, name: str, entry: Entry, assemblies: Iterable[str]) -> Detail:
    """Read one detail; its checks run where everything in it could be read."""
    before = len(context.problems)
    rectangles = [
        _air(context, item, key)
        for key in ("outdoors", "indoors")
        for item in entry[key]
        if item is not None
    ]
    rectangles += [_piece(context, item) for item in entry["pieces"] if item is not None]
    sound = len(context.problems) == before
    flanks = [_flank(context, item, assemblies) for item in entry["flanks"] if item is not None]
    left, bottom = min(r.left for r in rectangles), min(r.bottom for r in rectangles)
    right, top = max(r.right for r in rectangles), max(r.top for r in rectangles)
    moved = [
        r._replace(left=r.left - left, right=r.right - left, bottom=r.bottom - bottom,
                   top=r.top - bottom)
        for r in rectangles
    ]  # fmt: skip
    drawn = Cut((), (), ())
    if sound:
        drawn = cut([r[2:6] for r in moved], right - left, top - bottom)
    detail = Detail(
        id=name,
        title=entry["title"],
        sheet=entry.get("sheet", ""),
        line=entry.line,
        measured=entry.get("measured", "outside"),
        rectangles=tuple(moved),
        columns=drawn.columns,
        rows=drawn.rows,
        seen=drawn.top,
        flanks=tuple(flanks),
    )
    if sound and _check_seen(context, detail) and len(context.problems) == before:
        _check_flanks(context, detail)
    return detail


# -------------------------------------------------------------------------------- rectangles


def _air(context: Context, entry: Entry, key: str) -> Rectangle:
    title = f"{key[:-1]} air"
    film = context.positive(entry, "film", "resistance") if "film" in entry else FILMS[key]
    x, y = (_span(context, entry, axis, title) for axis in ("x", "y"))
    return Rectangle(title, entry.line, *x, *y, None, key == "indoors", film)


def _piece(context: Context, entry: Entry) -> Rectangle:
    material = context.material(entry)
    title = entry.get("title") or material.title
    x, y = (_span(context, entry, axis, title) for axis in ("x", "y"))
    return Rectangle(title, entry.line, *x, *y, material)


def _span(context: Context, entry: Entry, key: str, title: str) -> _Span:
    """From where to where a rectangle reaches, m."""
    ends: list[Any] = entry[key]
    here = Entry(entry.lines[key])
    for name, text in zip(("from", "to"), ends, strict=True):
        here[name] = text
        here.lines[name] = entry.lines[key]
    start, end = (context.number(here, name, "length") for name in ("from", "to"))
    if end <= start + MATCHES:
        found = f"{key}: [{ends[0]}, {ends[1]}]"
        fix = "exchange the two" if end < start else ""
        context.add(
            "piece-without-size", entry.lines[key], found=found, title=title, key=key, fix=fix
        )
        return NAN, NAN
    return start, end


def _check_seen(context: Context, detail: Detail) -> bool:
    """Note open places, hidden pieces, air that meets air, pieces that touch in a corner only."""
    before = len(context.problems)
    for number in range(len(detail.rectangles)):
        if not any(number in row for row in detail.seen):
            over = detail.rectangles[number]
            context.add("piece-hidden", over.line, title=over.title, over="what is drawn over it")
    _check_gap(context, detail)
    _check_air(context, detail)
    if len(context.problems) == before:
        _check_corners(context, detail)
    return len(context.problems) == before


def _mm(length: float) -> str:
    return f"{length * 1000:.6g} mm"


def _at(detail: Detail, row: int, column: int) -> str:
    return f"x {_mm(detail.columns[column])}, y {_mm(detail.rows[row])}"


def _check_gap(context: Context, detail: Detail) -> None:
    for row, seen in enumerate(detail.seen):
        if -1 in seen:
            first = seen.index(-1)
            end = next((c for c in range(first, len(seen)) if seen[c] != -1), len(seen))
            x = f"x {_mm(detail.columns[first])} to {_mm(detail.columns[end])}"
            y = f"y {_mm(detail.rows[row])} to {_mm(detail.rows[row + 1])}"
            context.add("detail-gap", detail.line, found=f"{x}, {y}")
            return


def _check_air(context: Context, detail: Detail) -> None:
    """Note where outdoor and indoor air lie in one place or side by side."""
    airs = [r for r in detail.rectangles if r.material is None]
    for row, seen in enumerate(detail.seen):
        for column, number in enumerate(seen):
            if not 0 <= number < len(airs):
                continue
            beside = [
                detail.seen[r][c]
                for r, c in ((row, column + 1), (row + 1, column))
                if r < len(detail.seen) and c < len(seen)
            ]
            x = (detail.columns[column] + detail.columns[column + 1]) / 2
            y = (detail.rows[row] + detail.rows[row + 1]) / 2
            under = [n for n, air in enumerate(airs) if _holds(air, x, y)]
            for other in (*under, *beside):
                if 0 <= other < len(airs) and airs[other].indoors != airs[number].indoors:
                    found = _at(detail, row, column)
                    context.add("air-meets-air", airs[number].line, found=found)
                    return


def _holds(air: Rectangle, x: float, y: float) -> bool:
    return air.left < x < air.right and air.bottom < y < air.top


def _check_corners(context: Context, detail: Detail) -> None:
    """Find two conductors that touch in a point only: air beside them conducts nothing."""
    k = [0.0 if r.material is None else r.material.conductivity for r in detail.rectangles]
    if any(isnan(value) for value in k):
        return  # an unknown material, told already
    for row, (below, above) in enumerate(pairwise(detail.seen), 1):
        for column in range(1, len(below)):
            a, b = below[column - 1], below[column]
            c, d = above[column - 1], above[column]
            for (one, other), (left, right) in (((a, d), (b, c)), ((b, c), (a, d))):
                least = min(k[one], k[other])
                if least > 0 and least > CONTRAST * max(k[left], k[right]):
                    pieces = detail.rectangles[max(one, other)], detail.rectangles[min(one, other)]
                    names = " and ".join(dict.fromkeys(repr(piece.title) for piece in pieces))
                    found = _at(detail, row, column)
                    context.add("corner-contact", pieces[0].line, found=found, pieces=names)
                    return


# ------------------------------------------------------------------------------------ flanks


def _flank(context: Context, entry: Entry, assemblies: Iterable[str]) -> Flank:
    name = entry["assembly"]
    if name not in assemblies:
        context.unknown("unknown-assembly", entry.lines["assembly"], name, assemblies)
    length = context.positive(entry, "length", "length")
    return Flank(name, entry["cut"], length, entry.line)


def _check_flanks(context: Context, detail: Detail) -> None:
    """Every cut of the envelope needs one flank, and every flank one cut."""
    flanks: dict[str, Flank] = {}
    for flank in detail.flanks:
        if flank.cut in flanks:
            context.add("cut-twice", flank.line, found=flank.assembly, edge=flank.cut)
        flanks[flank.cut] = flank
    for edge in EDGES:
        crossed, meant = crossings(detail, edge), flanks.get(edge)
        if meant is None:
            if crossed:
                context.add("cut-without-flank", detail.line, edge=edge)
        elif len(crossed) != 1:
            found = f"{len(crossed)} times" if crossed else "nowhere"
            context.add("flank-without-cut", meant.line, found=found, edge=edge)
        else:
            _check_length(context, detail, meant)


def _check_length(context: Context, detail: Detail, flank: Flank) -> None:
    lines: Sequence[float] = detail.columns if flank.cut in ("left", "right") else detail.rows
    if flank.length > lines[-1] - lines[0] + MATCHES:
        found, expected = _mm(flank.length), f"at most {_mm(lines[-1] - lines[0])}"
        context.add(
            "too-thick", flank.line, found=found, expected=expected, key="length",
            limit="the drawing is that way",
        )  # fmt: skip
