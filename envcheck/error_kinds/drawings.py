"""Kinds of errors in what is drawn: sections of assemblies, and details where they meet."""

from __future__ import annotations

from envcheck.errors import Kind

KINDS = (
    Kind(
        "section-gap",
        "nothing is drawn in a part of {title!r}",
        "draw a piece there, let a neighbour reach over it, or put a layer under all of it",
        "Every place of a drawn section is of some material, or of air that says how it conducts.",
    ),
    Kind(
        "piece-outside",
        "the piece {title!r} reaches out of the drawing",
        "check its x and y, and the width 'repeat'",
        "x runs from the left side to the repeat width, y from the outer face to the inner one.",
    ),
    Kind(
        "piece-without-size",
        "the piece {title!r} has no size along {key!r}",
        "write where it starts and where it ends: {key}: [10 mm, 12 mm]",
        "A piece of a drawing that ends where it starts, or before.",
    ),
    Kind(
        "piece-too-thin",
        "the piece {title!r} is thinner than can be meant (less than 0.01 mm)",
        "check the unit; a thinner film counts nothing, and a contact may be 0.1 mm thick",
        "A piece thinner than a foil is most often a slip of the unit.",
    ),
    Kind(
        "piece-hidden",
        "the piece {title!r} lies wholly under later ones: {over}",
        "move it behind them in the list, or delete it; later pieces lie on top",
        "Nothing of the piece is seen in the drawing, so that it would count nothing.",
    ),
    Kind(
        "void-piece",
        "the piece {title!r} is a void that does not say how it conducts",
        "write 'air_space: {{emittance: 0.9}}', or an equivalent 'conductivity' with its source",
        "Air in a void also carries heat by convection and radiation, so that the conductivity of "
        "still air is too low. The void needs an equivalent conductivity.",
    ),
    Kind(
        "corner-contact",
        "good conductors touch in a corner only: {pieces}",
        "let them overlap by their thickness where they are joined, or part them",
        "Two pieces that conduct 20 times better than what lies beside them meet in a point: the "
        "heat through a point has no definite value.",
    ),
    Kind(
        "detail-gap",
        "nothing is drawn in a part of the detail",
        "draw a piece or air there; cut planes lie at the edges of the drawing only",
        "What is left open would pass no heat, and nobody says that it does not.",
    ),
    Kind(
        "air-meets-air",
        "outdoor and indoor air meet with nothing between them",
        "draw the piece that parts them, or check the x and y of both",
        "A hole in the drawn envelope, or air drawn over air.",
    ),
    Kind(
        "cut-without-flank",
        "the {edge} edge of the detail cuts the envelope, and no flank is stated there",
        "add the assembly and its length to 'flanks' with 'cut: {edge}'",
        "The heat through every assembly that is cut off is taken from the flow of the detail.",
    ),
    Kind(
        "flank-without-cut",
        "the {edge} edge does not cut the envelope from outdoor to indoor air just once",
        "draw both airs up to that edge, or name the edge that cuts the assembly",
        "The U-factor of a flank is that of the layers between both airs at its cut.",
    ),
    Kind(
        "cut-twice",
        "two flanks are cut off at the {edge} edge",
        "keep one, or name the edge that cuts the other",
        "One edge of a detail cuts one assembly.",
    ),
    Kind(
        "unknown-detail",
        "the detail {name!r} is not in this file",
        "{hint}",
        "A bridge names a detail that is not drawn.",
    ),
    Kind(
        "detail-measured",
        "the bridge comes from a detail with other dimensions than its element",
        "state 'measured' alike for both, with the lengths of the flanks and the areas to match",
        "A linear transmittance belongs to outside or to inside dimensions; with the other ones it "
        "counts a corner twice or leaves it out.",
    ),
    Kind(
        "not-drawn",
        "this layer cannot lie under the pieces of a drawn section",
        "use kind material, resistance with its thickness, or a closed air space; draw the rest as "
        "pieces, or keep it as a layer beside the drawing",
        "The layers of a drawn section are homogeneous and have a thickness.",
    ),
    Kind(
        "repeat-not-spacing",
        "the drawing does not repeat as the members do that stand in line with it",
        "draw one whole spacing, or give the members the orientation in which they cross it",
        "Members and drawings that run the same way stand in line and need one repeat width.",
    ),
    Kind(
        "symmetry-contradicted",
        "the drawing is declared symmetric, and what stands in line with it is not",
        "leave out 'sides: symmetric' and draw the whole repeat",
        "A plane of symmetry must be one for every layer of the assembly.",
    ),
    Kind(
        "no-film",
        "the drawn section has no film on one face",
        "state the surface resistance, or leave out {key!r} for that of the rule set",
        "A drawn section exchanges heat with the air over both faces.",
    ),
    Kind(
        "drawing-too-fine",
        "the edges of the pieces cut the drawing into more cells than can be solved",
        "line up edges that are meant to lie on one line, or draw a smaller repeat",
        "The cells would make the solution slow before it is refined at all.",
    ),
)
