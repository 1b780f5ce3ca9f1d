"""What a drawing may not say: gaps, hidden pieces, good conductors that meet in a corner only."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from envcheck.model.layers import FramedLayer, Layer, MasonryLayer, SectionLayer, SectionPiece
from envcheck.model.rectangles import SAME, Cut, cut
from envcheck.read.context import MATCHES, Context
from envcheck.read.yaml_reader import Entry

CONTRAST = 20.0
"""Ratio of conductivities from which two conductors that meet in a corner only are refused: the
flow through a point has no value that a finer drawing would confirm."""
AIR = 1.0
"""W/(m K), more than any air space conducts in the directions that matter here."""
MOST_CELLS = 20_000
"""Cells that the edges of the pieces may make before any refinement."""


def check_outline(context: Context, section: SectionLayer) -> None:
    """Note every piece that reaches out of the drawing."""
    for piece in (piece for piece in section.pieces if _reaches_out(section, piece)):
        context.add(
            "piece-outside",
            piece.line,
            found=f"x to {_mm(piece.right)}, y to {_mm(piece.inner)}",
            expected=f"x to {_mm(section.repeat)} at most, y to {_mm(section.thickness)}",
            title=piece.title,
        )


def check_drawing(context: Context, section: SectionLayer) -> None:
    """Note what is open, hidden, or meets in a corner, and drawings of too many cells."""
    drawn = cut([piece[2:6] for piece in section.pieces], section.repeat, section.thickness)
    cells = len(drawn.top) * len(drawn.top[0])
    if cells > MOST_CELLS:
        expected = f"at most {MOST_CELLS}"
        context.add("drawing-too-fine", section.line, found=f"{cells} cells", expected=expected)
        return
    _check_gap(context, section, drawn)
    _check_hidden(context, section, drawn)
    _check_corners(context, section, drawn)


def _reaches_out(section: SectionLayer, piece: SectionPiece) -> bool:
    return piece.right > section.repeat + SAME or piece.inner > section.thickness + SAME


def _mm(length: float) -> str:
    return f"{length * 1000:.6g} mm"


def _check_gap(context: Context, section: SectionLayer, drawn: Cut) -> None:
    """Name the first place where nothing is drawn, as wide and as deep as it is open."""
    for row, seen in enumerate(drawn.top):
        if -1 not in seen:
            continue
        first = seen.index(-1)
        last = next((n for n in range(first, len(seen)) if seen[n] != -1), len(seen))
        end = row
        while end < len(drawn.top) and all(n == -1 for n in drawn.top[end][first:last]):
            end += 1
        x = f"x {_mm(drawn.columns[first])} to {_mm(drawn.columns[last])}"
        y = f"y {_mm(drawn.rows[row])} to {_mm(drawn.rows[end])}"
        beside = seen[first - 1] if first else seen[last] if last < len(seen) else -1
        beside = drawn.top[row - 1][first] if beside < 0 and row else beside
        near = f", beside {section.pieces[beside].title!r}" if beside >= 0 else ""
        context.add("section-gap", section.line, found=f"{x}, {y}{near}", title=section.title)
        return


def _check_hidden(context: Context, section: SectionLayer, drawn: Cut) -> None:
    seen = {number for row in drawn.top for number in row}
    for number, piece in enumerate(section.pieces):
        if number not in seen:
            over = [p.title for p in section.pieces[number + 1 :] if _overlap(piece, p)]
            context.add(
                "piece-hidden", piece.line, title=piece.title, over=" and ".join(map(repr, over))
            )


def _overlap(one: SectionPiece, other: SectionPiece) -> bool:
    across = min(one.right, other.right) > max(one.left, other.left)
    return across and min(one.inner, other.inner) > max(one.outer, other.outer)


def _check_corners(context: Context, section: SectionLayer, drawn: Cut) -> None:
    """Find two good conductors that touch in a point only, also across a repeating side."""
    k = [AIR if p.material is None else p.material.conductivity for p in section.pieces]
    last = len(drawn.columns) - 1
    for row in range(1, len(drawn.top)):
        for column in range(1 if section.symmetric else 0, last):
            a, b = drawn.top[row - 1][column - 1], drawn.top[row - 1][column]
            c, d = drawn.top[row][column - 1], drawn.top[row][column]
            for (one, other), beside in (((a, d), (b, c)), ((b, c), (a, d))):
                if min(one, other, *beside) < 0:
                    continue
                if min(k[one], k[other]) > CONTRAST * max(k[beside[0]], k[beside[1]]):
                    pieces = section.pieces[max(one, other)], section.pieces[min(one, other)]
                    at = f"x {_mm(drawn.columns[column])}, y {_mm(drawn.rows[row])}"
                    names = " and ".join(dict.fromkeys(repr(piece.title) for piece in pieces))
                    context.add("corner-contact", pieces[0].line, found=at, pieces=names)
                    return


# ------------------------------------------------------------------- together with other layers


def check_beside(context: Context, layers: Sequence[Layer]) -> None:
    """Hold drawn layers against the members that stand in line with them."""
    for section in (layer for layer in layers if isinstance(layer, SectionLayer)):
        for other in layers:
            if other is not section:
                _check_spacing(context, section, other)
                if section.symmetric:
                    _check_symmetry(context, section, other)


def _check_spacing(context: Context, section: SectionLayer, other: Layer) -> None:
    if isinstance(other, FramedLayer):
        spacing, way = other.member.spacing, other.orientation
    elif isinstance(other, SectionLayer):
        spacing, way = other.repeat, other.orientation
    elif isinstance(other, MasonryLayer):
        spacing, way = other.length, "vertical"
    else:
        return
    told = isinstance(other, SectionLayer) and other.line > section.line  # once of two drawings
    if spacing is None or way != section.orientation or told:
        return
    if abs(spacing - section.repeat) > MATCHES:
        context.add(
            "repeat-not-spacing",
            section.line,
            found=f"a repeat of {_mm(section.repeat)}",
            expected=f"{_mm(spacing)}, the spacing of {other.title!r}",
        )


def _check_symmetry(context: Context, section: SectionLayer, other: Layer) -> None:
    words = ""
    if isinstance(other, FramedLayer) and other.member.profile is not None:
        if other.member.profile.shape in ("C", "Z"):
            words = f"a {other.member.profile.shape} profile, which no mirror leaves as it is"
    elif isinstance(other, SectionLayer) and not other.symmetric:
        words = "a drawing that repeats"
    if words:
        found = f"{other.title!r}: {words}"
        context.add("symmetry-contradicted", section.line, found=found)


def check_films(context: Context, entry: Entry, films: Mapping[str, float | None]) -> None:
    """A drawn section exchanges heat over both faces: neither film may be stated as none."""
    for key, film in films.items():
        if film == 0:
            context.add("no-film", entry.lines[key], found=f"{key}: {entry[key]}", key=key)
