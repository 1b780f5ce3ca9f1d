"""Materials, profiles and layers as read: what an assembly is made of, all numbers SI.

The order of layers is always from outside to inside. ``line`` is the line in the project file
where a thing starts, for messages of later stages.
"""

from typing import TYPE_CHECKING, NamedTuple

from envcheck.model.conversion import Conversion

if TYPE_CHECKING:
    from envcheck.model.details import Detail

Span = tuple[float, float]
"""Low and high end of a stated range, SI."""


class Material(NamedTuple):
    """One material: conductivity, or a resistance for a stated thickness (then converted)."""

    id: str
    title: str
    conductivity: float
    """W/(m K)"""
    density: float | None = None
    """kg/m3"""
    specific_heat: float | None = None
    """J/(kg K)"""
    material_class: str = ""
    """Plausibility class (``insulation``, ``wood``, ``metal``, ``masonry``, ``board`` ...)."""
    source: str = ""
    """Where the conductivity comes from; ``assumed`` where nobody says."""
    evidence: str = ""
    """Kind of evidence: label, rating, test, table, calculation, assumed."""
    combustible: bool = False
    conversion: Conversion | None = None
    """How the conductivity follows from a declared one; None where it is stated as it counts."""
    span: Span | None = None
    """Stated range of the conductivity, W/(m K)."""
    band: Span | None = None
    """Conductivities that are usual in its class, W/(m K)."""
    mu: float | None = None
    """Water vapour resistance factor."""
    mu_source: str = ""


class Profile(NamedTuple):
    """A cold-formed steel profile; lengths are overall dimensions in m."""

    id: str
    web: float
    """Depth of the web across the wall, m."""
    flange: float
    """Width of each flange along the wall, m."""
    thickness: float
    """Design thickness of the sheet, m."""
    lip: float = 0.0
    """Overall depth of the stiffening lip at the flange ends, m."""
    shape: str = "C"
    """``C`` (flanges to one side), ``Z`` (flanges to opposite sides), ``hat``."""
    source: str = ""


# ------------------------------------------------------------------------------------- layers


class MaterialLayer(NamedTuple):
    """A homogeneous layer: ``thickness`` of ``material``."""

    kind: str
    title: str
    line: int
    material: Material
    thickness: float
    """m"""
    span: Span | None = None
    """Stated range of the thickness, m."""
    removable: bool = False
    """It lies on ceiling tiles that can be lifted."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class ResistanceLayer(NamedTuple):
    """A layer of stated resistance (label, table, test); no conductivity is implied by it."""

    kind: str
    title: str
    line: int
    resistance: float
    """m2 K/W"""
    thickness: float
    """m; 0 where it does not matter (decks, membranes)."""
    material: Material | None
    """Names class, density and specific heat where they matter."""
    source: str
    evidence: str
    span: Span | None = None
    """Stated range of the resistance, m2 K/W."""
    value_basis: str = ""
    """What the resistance holds beside the layer: ``includes_framing``, ``includes_films``,
    ``includes_air_space``; ``bare`` or empty = nothing."""
    removable: bool = False
    """It lies on ceiling tiles that can be lifted."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class ContactLayer(NamedTuple):
    """A contact resistance between two faces."""

    kind: str
    title: str
    line: int
    resistance: float
    """m2 K/W"""
    source: str
    span: Span | None = None
    """Stated range of the resistance, m2 K/W."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class AirSpaceLayer(NamedTuple):
    """An air space across the whole area."""

    kind: str
    title: str
    line: int
    thickness: float
    """m"""
    ventilation: str
    """``unventilated``, ``slightly`` or ``well`` (in the sense of ISO 6946)."""
    emittances: tuple[float, float]
    """Of the outer and the inner face; 0.9 where nothing is said."""
    openings: float | None = None
    """Area of its openings to the outside, where it is stated, in m2 ..."""
    openings_per: str = ""
    """... for each m of ``length`` of an upright space, or m2 of ``area`` of a level one."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class Fill(NamedTuple):
    """What fills a cavity: exactly one of material, label or air."""

    material: Material | None = None
    label: float | None = None
    """Labelled resistance at the product's own thickness, m2 K/W."""
    product_thickness: float | None = None
    """Thickness of the product before it is placed, m; None = that of the cavity."""
    installed_label: float | None = None
    """Resistance that the maker states at the thickness in place, m2 K/W."""
    air: AirSpaceLayer | None = None
    source: str = ""
    evidence: str = ""
    value_basis: str = ""
    """What the stated resistance holds beside the fill; see ``ResistanceLayer``."""


class Member(NamedTuple):
    """What stands between the cavities of a framed layer."""

    material: Material
    width: float
    """Width along the wall, m (of a profile: its flange)."""
    spacing: float | None
    """Centre to centre, m; None where only a share of the area is stated."""
    profile: Profile | None = None


class Extra(NamedTuple):
    """Plates, sills, headers: a share of the wall area beside the members."""

    title: str
    share: float
    """0..1 of the wall area"""
    material: Material
    thickness: float
    """m of that material that counts in the direction of heat flow"""


class FramedLayer(NamedTuple):
    """Members at a spacing with infill between them."""

    kind: str
    title: str
    line: int
    thickness: float
    """Depth of the layer, m."""
    member: Member
    fill: Fill
    share: float | None
    """Whole framing share of the area, 0..1, where stated; else members at their spacing."""
    share_from: str
    """Where the share comes from, in words, or empty."""
    extras: tuple[Extra, ...]
    orientation: str
    """``vertical`` or ``horizontal`` run of the members."""
    crosses_insulation: bool
    """The layer is insulation outside (or inside) the main framing that members interrupt."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class MasonryLayer(NamedTuple):
    """Units with shells and webs (hollow or filled), or solid units with joints."""

    kind: str
    title: str
    line: int
    thickness: float
    """m"""
    material: Material
    """Of shells and webs."""
    shell: float
    """Thickness of one face shell, m; two are counted."""
    web_share: float
    """Share of the area that webs take between the shells, 0..1."""
    fill: Fill
    mortar: Material | None
    joint_share: float
    """Share of the area that mortar joints take over the whole thickness, 0..1."""
    grouted_share: float
    """Share of the area whose cells are grouted solid, 0..1."""
    grout: Material | None
    cell_resistance: float | None
    """Stated resistance of the cell (air or fill) over its depth, m2 K/W."""
    weight: float | None = None
    """Stated weight per area, kg/m2, for class tests; None = from the densities."""
    length: float | None = None
    """Of one unit with its joint, m; None = not stated, and the unit is not drawn to scale."""
    cells: int = 2
    """Cells beside each other in one unit."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class TaperedPiece(NamedTuple):
    """A part of a roof drained by several slopes."""

    shape: str
    """As of a tapered layer, or ``triangle`` with another thickness at each corner."""
    area: float
    """m2 in plan"""
    least: float
    """m"""
    greatest: float
    """m"""
    middle: float | None = None
    """Thickness at the middle corner of a ``triangle``, m."""
    run: float | None = None
    """Length over which the thickness rises, m."""


class TaperedLayer(NamedTuple):
    """Insulation of varying thickness."""

    kind: str
    title: str
    line: int
    material: Material
    least: float
    """m"""
    greatest: float
    """m"""
    shape: str
    """``rectangle``, ``triangle_thickest_apex``, ``triangle_thinnest_apex``."""
    run: float | None = None
    """Length over which the thickness rises, m."""
    pieces: tuple[TaperedPiece, ...] = ()
    """Of a roof drained by several slopes; ``least`` and ``greatest`` are then those of all."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class SectionPiece(NamedTuple):
    """A rectangle of a drawn section: a solid material, or air."""

    title: str
    line: int
    left: float
    """m along the wall, from the left side of the drawing"""
    right: float
    outer: float
    """m from the outer face of the drawing"""
    inner: float
    material: Material | None
    """None where it is air."""
    air: AirSpaceLayer | None = None
    """As thick as the piece is deep; it conducts like its resistance over that depth."""


class SectionLayer(NamedTuple):
    """A drawn rectangle of rectangles that repeats along the wall."""

    kind: str
    title: str
    line: int
    thickness: float
    """Depth from the outer face to the inner face, m."""
    repeat: float
    """Width of the drawing along the wall, m."""
    symmetric: bool
    """Both sides are planes of symmetry; else the drawing repeats."""
    orientation: str
    """How the pieces run: ``vertical`` or ``horizontal``."""
    pieces: tuple[SectionPiece, ...]
    """Later ones lie on top of earlier ones; together they leave nothing of the drawing open."""
    sd: float | None = None
    """Stated water vapour diffusion-equivalent air layer thickness, m."""


class Fasteners(NamedTuple):
    """Mechanical fasteners through an insulating layer."""

    layer: str
    """Title of the layer that they cross."""
    material: Material
    diameter: float
    """m"""
    density: float
    """1/m2"""
    penetration: float | None
    """Length within the insulation, m; None = its whole thickness."""
    line: int


class DrawnBox(NamedTuple):
    """A box of a drawn point bridge: from where to where it reaches, m."""

    material: Material
    along: tuple[float, float]
    """Along the wall, from the axis of the member (or the middle of the repeat area)."""
    up: tuple[float, float]
    """Up the wall, likewise."""
    through: tuple[float, float]
    """From the outer face of its layer inwards."""
    line: int


class DrawnPoint(NamedTuple):
    """A clip or bracket drawn as boxes on a repeat area; later boxes lie on top."""

    layer: str
    """Title of the layer that it lies in."""
    along: float
    """Width of the repeat area along the wall, m."""
    up: float
    """Its height, m."""
    boxes: tuple[DrawnBox, ...]
    line: int


class Bridge(NamedTuple):
    """A linear or point bridge added to the clear field."""

    kind: str
    """``line`` (psi) or ``point`` (chi)."""
    title: str
    value: float
    """psi in W/(m K) or chi in W/K; 0 where a detail gives it"""
    amount: float
    """Length in m or count of one element; per m2 where ``per_area``."""
    per_area: bool
    source: str
    evidence: str
    line: int
    detail: "Detail | None" = None
    """The drawing that gives psi."""
    drawn: DrawnPoint | None = None
    """Of a point bridge; its ``value`` is then NaN where no chi is stated."""

    @property
    def value_quantity(self) -> str:
        """Quantity of psi or chi."""
        return "linear_transmittance" if self.kind == "line" else "point_transmittance"

    @property
    def amount_quantity(self) -> str:
        """Quantity of the amount; a count has none."""
        if self.per_area:
            return "per_length" if self.kind == "line" else "per_area"
        return "run" if self.kind == "line" else ""


Layer = (
    MaterialLayer
    | ResistanceLayer
    | ContactLayer
    | AirSpaceLayer
    | FramedLayer
    | MasonryLayer
    | SectionLayer
    | TaperedLayer
)
"""Every layer has a kind, a title and a line; the order in an assembly is from outside in."""
