"""From pieces to a block: rectangles of a cross-section put on one grid."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise
from typing import NamedTuple

from envcheck.model.project import Profile
from envcheck.model.rectangles import cut


class Piece(NamedTuple):
    """A rectangle of the section, m: x along the wall, y from the outer face of its layer."""

    left: float
    right: float
    outer: float
    inner: float


def profile_pieces(profile: Profile, depth: float, repeat: float) -> list[Piece]:
    """Rectangles of a steel profile that stands in a layer of ``depth`` at ``repeat`` spacing.

    The flange against the inner face is centred in the repeat width. Dimensions of the profile are
    overall; the web reaches over the whole depth of the profile, which stands against the inner
    face of the layer. C: both flanges to one side. Z: flanges to opposite sides. Both with lips.
    hat: a crown of ``flange`` outside, two webs, and two brims of ``lip`` inside.
    """
    sheet, flange, lip = profile.thickness, profile.flange, profile.lip
    top, bottom = max(depth - profile.web, 0.0), depth
    left = (repeat - flange) / 2
    right = left + flange
    web = Piece(left, left + sheet, top, bottom)
    inner = Piece(left, right, bottom - sheet, bottom)
    outer = Piece(left, right, top, top + sheet)
    if profile.shape == "Z":
        far = left + sheet - flange
        pieces = [web, inner, Piece(far, left + sheet, top, top + sheet)]
        if lip > sheet:
            pieces.append(Piece(far, far + sheet, top, top + lip))
            pieces.append(Piece(right - sheet, right, bottom - lip, bottom))
        return pieces
    if profile.shape == "hat":
        return [
            outer,
            web,
            Piece(right - sheet, right, top, bottom),
            Piece(left + sheet - lip, left + sheet, bottom - sheet, bottom),
            Piece(right - sheet, right - sheet + lip, bottom - sheet, bottom),
        ]
    pieces = [web, inner, outer]
    if lip > sheet:
        pieces.append(Piece(right - sheet, right, top, top + lip))
        pieces.append(Piece(right - sheet, right, bottom - lip, bottom))
    return pieces


def grid(
    pieces: Sequence[Piece], repeat: float, depth: float
) -> tuple[list[float], list[float], list[list[bool]]]:
    """Cut a rectangle of ``repeat`` x ``depth`` at every edge of the pieces.

    Returns the column widths, the row depths (m) and, for each row and column, whether a piece
    covers that cell.
    """
    drawn = cut(pieces, repeat, depth)
    covered = [[number >= 0 for number in row] for row in drawn.top]
    return sizes(drawn.columns), sizes(drawn.rows), covered


def sizes(lines: Sequence[float]) -> list[float]:
    """What lies between the lines of a cut, m."""
    return [end - start for start, end in pairwise(lines)]
