"""Kinds of errors in a project: references, amounts, sizes."""

from __future__ import annotations

from envcheck.errors import Kind

KINDS = (
    Kind(
        "costs-differ",
        "costs and thicknesses in stock do not pair",
        "give one cost for each thickness of 'stock', in the same order",
        "Costs of a material whose number is not that of its thicknesses in stock.",
    ),
    Kind(
        "unknown-material",
        "the material {name!r} is not known",
        "{hint}",
        "A material id that neither the project nor the library holds.",
    ),
    Kind(
        "unknown-profile",
        "the steel profile {name!r} is not known",
        "{hint}",
        "A profile id that the library does not hold; profiles can be described in place.",
    ),
    Kind(
        "unknown-assembly",
        "the assembly {name!r} is not in this file",
        "{hint}",
        "An element names an assembly that is not described.",
    ),
    Kind(
        "unknown-surface",
        "the surface {name!r} is not in this file",
        "{hint}",
        "An element names a surface that is not described.",
    ),
    Kind(
        "unknown-element",
        "the element {name!r} is not in this file",
        "{hint}",
        "A host, exception or answer names an element that is not there.",
    ),
    Kind(
        "unknown-layer",
        "the assembly has no layer titled {name!r}",
        "{hint}",
        "Fasteners and drawn points name the title of the layer they lie in.",
    ),
    Kind(
        "unknown-category",
        "the category {name!r} is not known",
        "{hint}",
        "Categories are a fixed list.",
    ),
    Kind(
        "unknown-finding",
        "the finding {name!r} is not known",
        "{hint}",
        "An answer names the id of a finding.",
    ),
    Kind(
        "unknown-conversion",
        "no conversion is printed for the class {name!r}",
        "{hint}",
        "Classes of material whose conversion coefficients come with envcheck (ISO 10456).",
    ),
    Kind(
        "unknown-gas",
        "the gas {name!r} is not known",
        "{hint}",
        "Gases of glazing are air, argon, krypton and sf6, as in EN 673.",
    ),
    Kind(
        "panes-and-gaps",
        "the panes and the gaps between them do not match",
        "give one gap fewer than panes, outside first",
        "Every two panes next to each other have one gap between them.",
    ),
    Kind(
        "parts-do-not-close",
        "the parts of the window do not add up to its size",
        "{hint}",
        "Lights and frames that state their areas fill width times height within 0.5 %; one frame "
        "may take the rest.",
    ),
    Kind(
        "no-class-band",
        "the material {name!r} has no range by its class",
        "{hint}",
        "A range by class needs a class of the table of classes, and a conductivity inside its "
        "band.",
    ),
    Kind(
        "needs-one-of",
        "{where} needs exactly one of {keys}",
        "{hint}",
        "A value that can be given in several ways, given in none or in several.",
    ),
    Kind(
        "no-amount",
        "the element has no amount",
        "give net_area, gross_area, perimeter, or count with width and height",
        "An element needs an area, a perimeter, or a count with a size.",
    ),
    Kind(
        "two-amounts",
        "the element has more than one amount",
        "keep one: net_area, gross_area, perimeter, or count with width and height",
        "Two amounts of one element may contradict each other.",
    ),
    Kind(
        "wrong-amount",
        "a {category} is measured by {measure}",
        "{hint}",
        "Slab edges are measured by their length, everything else by area.",
    ),
    Kind(
        "net-over-gross",
        "the net area is larger than the gross area",
        "exchange the two, or keep the one that the drawing shows",
        "An impossible area.",
    ),
    Kind(
        "openings-over-host",
        "the openings are larger than the element that holds them",
        "check the counts and sizes of {openings}",
        "Openings that name this element as host take up all of its gross area or more.",
    ),
    Kind(
        "own-host",
        "the element is its own host",
        "name the wall or roof that the opening is cut from",
        "An opening that names itself.",
    ),
    Kind(
        "below-grade-over-gross",
        "the area below grade is larger than the gross area",
        "check both areas",
        "An impossible area.",
    ),
    Kind(
        "framing-too-wide",
        "the members are as wide as their spacing or wider",
        "check width and spacing",
        "Members that leave no cavity.",
    ),
    Kind(
        "shares-over-one",
        "the shares leave no room: together {total}",
        "check the shares",
        "Shares of framing and headers, or of webs and joints, that take up all of the area.",
    ),
    Kind(
        "air-not-cavity",
        "the air space is not as deep as its cavity",
        "give it the thickness of the framed layer; what else lies there is a layer of its own",
        "A thinner space would leave a part of the cavity that nobody describes.",
    ),
    Kind(
        "points-off-spacing",
        "the drawn points do not meet the members of {layer!r} again at each repeat",
        "draw the points at a multiple of the spacing of the members, or give chi instead",
        "A box in three dimensions needs one repeat area for members and points.",
    ),
    Kind(
        "box-without-size",
        "the box reaches from {key} to nowhere: its second end does not lie behind the first",
        "exchange the two ends, or check them",
        "A box of a drawn point without a width, height or depth.",
    ),
    Kind(
        "box-outside",
        "the box reaches out of {limit}",
        "check its ends, or cut it where its layer ends and draw the rest in the next layer",
        "A box of a drawn point that leaves its layer or its repeat area.",
    ),
    Kind(
        "too-thin-to-draw",
        "the box of {material} is too thin to be drawn in three dimensions",
        "use chi: state 'chi' and 'density' of the bridge from a test or a table in place of "
        "'drawn'",
        "Screws, pins and foils: metal that no box of reasonable size resolves.",
    ),
    Kind(
        "unknown-zone",
        "the {what} of the site is not known to the rule sets",
        "check the spelling",
        "A stated zone must be printed in a rule set of the project, or fall back to one that is.",
    ),
    Kind(
        "ventilated-fill",
        "air between members cannot be well ventilated",
        "use an air-space layer of its own, so that what lies outside of it is left out",
        "What lies outside a well-ventilated space counts nothing; between members it cannot be.",
    ),
    Kind(
        "too-thick",
        "{key!r} is larger than {limit}",
        "check both sizes",
        "A part larger than what it lies in.",
    ),
    Kind(
        "unknown-junction",
        "the kind of junction {name!r} is not known",
        "{hint}",
        "The list of junctions names a kind that envcheck does not know.",
    ),
    Kind(
        "unknown-bridge",
        "no bridge of this file has the title {name!r}",
        "{hint}",
        "A junction is said to be counted by a bridge that is not there.",
    ),
    Kind(
        "contradicts",
        "{key!r} contradicts {other!r}",
        "{hint}",
        "Two keys of one thing that cannot both be true.",
    ),
    Kind(
        "layer-out-of-place",
        "the layer {name!r} has no place here: {why}",
        "{hint}",
        "A layer that the thing it stands in cannot have.",
    ),
    Kind(
        "evidence-outside",
        "the evidence lies outside the project's folder",
        "copy the document into the project's folder and name it from there",
        "Nothing in a project file reaches outside the folder that it lies in.",
    ),
    Kind(
        "unknown-key",
        "{key!r} is not a key of {where}",
        "{hint}",
        "A key that the format does not know, most often a misspelling.",
    ),
)
