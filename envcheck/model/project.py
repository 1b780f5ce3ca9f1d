"""The project as read: plain facts about a drawn envelope, all numbers SI.

The order of layers is always from outside to inside. ``line`` is the line in the project file
where a thing starts, for messages of later stages.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import date


@dataclass(frozen=True, slots=True)
class Material:
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


@dataclass(frozen=True, slots=True)
class Profile:
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


@dataclass(frozen=True, slots=True)
class Layer:
    """What every layer has."""

    kind: str
    title: str
    line: int


@dataclass(frozen=True, slots=True)
class MaterialLayer(Layer):
    """A homogeneous layer: ``thickness`` of ``material``."""

    material: Material
    thickness: float
    """m"""


@dataclass(frozen=True, slots=True)
class ResistanceLayer(Layer):
    """A layer of stated resistance (label, table, test); no conductivity is implied by it."""

    resistance: float
    """m2 K/W"""
    thickness: float
    """m; 0 where it does not matter (decks, membranes)."""
    material: Material | None
    """Names class, density and specific heat where they matter."""
    source: str
    evidence: str


@dataclass(frozen=True, slots=True)
class ContactLayer(Layer):
    """A contact resistance between two faces."""

    resistance: float
    """m2 K/W"""
    source: str


@dataclass(frozen=True, slots=True)
class AirSpaceLayer(Layer):
    """An air space across the whole area."""

    thickness: float
    """m"""
    ventilation: str
    """``unventilated``, ``slightly`` or ``well`` (in the sense of ISO 6946)."""
    emittances: tuple[float, float]
    """Of the outer and the inner face; 0.9 where nothing is said."""


@dataclass(frozen=True, slots=True)
class Fill:
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


@dataclass(frozen=True, slots=True)
class Member:
    """What stands between the cavities of a framed layer."""

    material: Material
    width: float
    """Width along the wall, m (of a profile: its flange)."""
    spacing: float | None
    """Centre to centre, m; None where only a share of the area is stated."""
    profile: Profile | None = None


@dataclass(frozen=True, slots=True)
class Extra:
    """Plates, sills, headers: a share of the wall area beside the members."""

    title: str
    share: float
    """0..1 of the wall area"""
    material: Material
    thickness: float
    """m of that material that counts in the direction of heat flow"""


@dataclass(frozen=True, slots=True)
class FramedLayer(Layer):
    """Members at a spacing with infill between them."""

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


@dataclass(frozen=True, slots=True)
class MasonryLayer(Layer):
    """Units with shells and webs (hollow or filled), or solid units with joints."""

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


@dataclass(frozen=True, slots=True)
class TaperedLayer(Layer):
    """Insulation of varying thickness."""

    material: Material
    least: float
    """m"""
    greatest: float
    """m"""
    shape: str
    """``rectangle``, ``triangle_thickest_apex``, ``triangle_thinnest_apex``."""


@dataclass(frozen=True, slots=True)
class Fasteners:
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


@dataclass(frozen=True, slots=True)
class Bridge:
    """A linear or point bridge added to the clear field."""

    kind: str
    """``line`` (psi) or ``point`` (chi)."""
    title: str
    value: float
    """psi in W/(m K) or chi in W/K"""
    amount: float
    """Length in m or count of one element; per m2 where ``per_area``."""
    per_area: bool
    source: str
    evidence: str
    line: int


# --------------------------------------------------------------------------------- assemblies


@dataclass(frozen=True, slots=True)
class Declared:
    """The value printed on the drawing."""

    value: float
    """SI"""
    quantity: str
    text: str
    """As typed."""
    sheet: str


@dataclass(frozen=True, slots=True)
class Window:
    """ISO 10077-1 parts of a window or door: whole unit from glass, frame and spacer."""

    width: float
    height: float
    frame_width: float
    """Visible width of the frame, m."""
    u_glass: float
    u_frame: float
    psi: float
    """Of the glass edge, W/(m K)."""
    sources: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Rated:
    """A tested or rated whole product."""

    u_factor: float | None
    """W/(m2 K)"""
    shgc: float | None
    visible_transmittance: float | None
    basis: str
    """``whole_product``, ``centre_of_glass`` or ``default``."""
    evidence: str
    """label, rating, test, table, calculation, assumed"""
    standard: str
    """The standard that the rating follows, as printed on it."""
    document: str
    """File in the project's folder, or a reference; may be empty."""


@dataclass(frozen=True, slots=True)
class Slab:
    """A slab on the ground."""

    insulation: str
    """``none``, ``vertical``, ``horizontal`` or ``under`` (whole area)."""
    resistance: float
    """Of the edge insulation, m2 K/W."""
    extent: float
    """Depth or width of the edge insulation, m."""
    heated: bool | None
    """None = not stated."""
    top_edge_covered: bool | None
    wall_thickness: float | None
    """Full thickness of the external wall, m (ISO 13370)."""
    soil_conductivity: float | None
    """W/(m K)"""
    perimeter: float | None
    area: float | None


@dataclass(frozen=True, slots=True)
class Assembly:
    """One construction: layers from outside to inside, or a product, slab or window."""

    id: str
    kind: str
    """``layers``, ``window``, ``rated``, ``slab-on-grade``, ``below-grade-wall``."""
    title: str
    sheet: str
    line: int
    declared: Declared | None = None
    layers: tuple[Layer, ...] = ()
    fasteners: tuple[Fasteners, ...] = ()
    bridges: tuple[Bridge, ...] = ()
    window: Window | None = None
    rated: Rated | None = None
    slab: Slab | None = None
    outside_film: float | None = None
    """Stated film, m2 K/W; None = by the rule set's convention."""
    inside_film: float | None = None
    shgc: float | None = None
    """Of a computed window."""


# ----------------------------------------------------------------------------------- elements


@dataclass(frozen=True, slots=True)
class Opening:
    """An opening's mark as a surface shows it."""

    tag: str
    count: float
    area: float | None = None
    """m2 in all, where the drawing shows it."""
    host: str = ""
    """Tag of the element that it is cut from, where that is stated."""


@dataclass(frozen=True, slots=True)
class Surface:
    """A facade, roof or floor as drawn: gross area and what the drawing shows on it."""

    name: str
    sheet: str
    gross_area: float
    """m2"""
    below_grade_area: float
    """Part of the gross area below grade, m2."""
    kind: str
    """``wall``, ``roof`` or ``floor``."""
    shows: tuple[Opening, ...]
    line: int
    adjoins: str = "outdoors"
    """What lies beyond; only surfaces to the outdoors count in area ratios."""
    space_category: str = ""
    """Of the space behind it, where that is not the project's."""


@dataclass(frozen=True, slots=True)
class Fact:
    """A value that a condition of a rule set asks for."""

    name: str
    value: str | float | bool
    """Word, yes/no, or SI number."""
    sheet: str
    line: int


@dataclass(frozen=True, slots=True)
class Element:
    """One real piece of the building: an amount of an assembly, tied to a drawing sheet."""

    tag: str
    assembly: str
    category: str
    sheet: str
    surface: str
    line: int
    net_area: float | None
    """m2; follows from gross area less the openings that name their host."""
    gross_area: float | None
    perimeter: float | None
    """m"""
    count: float | None
    host: str
    """Tag of the element that this opening is cut from, or empty."""
    adjoins: str
    """outdoors, ground, vented_attic, vented_crawl_space, garage, unheated, semiheated,
    conditioned"""
    facing: str
    """N, NE, E ... or empty."""
    tilt: float
    """Degrees from horizontal: 0 roof, 90 wall, 180 floor above outdoors."""
    depth_below_grade: float | None
    insulated_depth: float | None
    renewed: float | None
    """Share of the element renewed, 0..1 (alterations)."""
    measured: str
    """``outside`` or ``inside`` dimensions."""
    mean_with: str
    """Name of the group whose area-weighted mean the project asks for, or empty."""
    facts: tuple[Fact, ...]
    bridges: tuple[Bridge, ...]
    note: str = ""


@dataclass(frozen=True, slots=True)
class ExceptionClaim:
    """A clause that somebody claims for an element."""

    element: str
    clause: str
    claimed_by: str
    reason: str
    evidence: str
    """File in the project's folder, or empty."""
    evidence_found: bool
    line: int


@dataclass(frozen=True, slots=True)
class RuleSetChoice:
    """One rule set to judge by."""

    id: str
    decides: bool
    line: int


@dataclass(frozen=True, slots=True)
class ZoneStated:
    """Zone of the site under one rule set (or any, with an empty id)."""

    ruleset: str
    zone: str
    source: str
    line: int


@dataclass(frozen=True, slots=True)
class Site:
    """Where the building stands."""

    place: str
    zones: tuple[ZoneStated, ...] = ()
    measures: tuple[tuple[str, float], ...] = ()
    """hdd18, hdd65, cdd10, altitude ... by name, SI (K d, m)."""
    indoor_temperature: float | None = None
    """degrees C"""
    outdoor_temperature: float | None = None


@dataclass(frozen=True, slots=True)
class Options:
    """What a remedy may use."""

    stock: tuple[tuple[str, tuple[float, ...]], ...] = ()
    """Material id -> thicknesses in stock, m."""


@dataclass(frozen=True, slots=True)
class Project:
    """The whole project file."""

    file: str
    title: str
    reference: str
    prepared_by: str
    permit_application_date: date | None
    report_date: date | None
    scope: str
    """new, addition, alteration, change_of_use"""
    invented: str
    """Sentence that says so where the project is invented."""
    units: str
    """Preferred units of the report: ``SI``, ``IP`` or empty (the rule set's)."""
    site: Site
    facts: tuple[Fact, ...]
    rule_sets: tuple[RuleSetChoice, ...]
    materials: dict[str, Material]
    """Those of the project and those of the library that it uses, by id."""
    assemblies: dict[str, Assembly]
    surfaces: dict[str, Surface]
    elements: dict[str, Element]
    exceptions: tuple[ExceptionClaim, ...]
    options: Options
    accepted: tuple[tuple[str, str], ...] = ()
    """Findings that the project answers: (finding id and tag, the answer)."""
    sha256: str = ""
    lines: dict[str, int] = field(default_factory=dict, compare=False, repr=False)
