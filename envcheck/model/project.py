"""The project as read: plain facts about a drawn envelope, all numbers SI.

The order of layers is always from outside to inside. ``line`` is the line in the project file
where a thing starts, for messages of later stages.
"""

from dataclasses import dataclass, field
from datetime import date
from typing import TYPE_CHECKING, NamedTuple

from envcheck.model.additions import Curved, Inverted, Voids
from envcheck.model.ground import Basement, Slab, Suspended
from envcheck.model.layers import (
    AirSpaceLayer,
    Bridge,
    ContactLayer,
    DrawnBox,
    DrawnPoint,
    Extra,
    Fasteners,
    Fill,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    Member,
    Profile,
    ResistanceLayer,
    SectionLayer,
    SectionPiece,
    TaperedLayer,
)
from envcheck.model.windows import Glazing, Window

if TYPE_CHECKING:
    from envcheck.model.details import Detail
    from envcheck.model.vapour import IndoorAir

__all__ = [
    "AirSpaceLayer",
    "Assembly",
    "Bridge",
    "ByCriteria",
    "Climate",
    "ContactLayer",
    "Declared",
    "DrawnBox",
    "DrawnPoint",
    "Element",
    "ExceptionClaim",
    "Extra",
    "Fact",
    "Fasteners",
    "Fill",
    "FramedLayer",
    "Glazing",
    "Junction",
    "Layer",
    "MasonryLayer",
    "Material",
    "MaterialLayer",
    "Member",
    "Opening",
    "Options",
    "Profile",
    "Project",
    "Rated",
    "ResistanceLayer",
    "RuleSetChoice",
    "SectionLayer",
    "SectionPiece",
    "Site",
    "Slab",
    "Surface",
    "TaperedLayer",
    "Window",
    "ZoneStated",
]

# --------------------------------------------------------------------------------- assemblies


class Declared(NamedTuple):
    """The value printed on the drawing."""

    value: float
    """SI"""
    quantity: str
    text: str
    """As typed."""
    sheet: str


class Rated(NamedTuple):
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
    document_found: bool = True
    """False where ``document`` reads like a file that is not there."""


class Assembly(NamedTuple):
    """One construction: layers from outside to inside, or a product, slab or window."""

    id: str
    kind: str
    """``layers``, ``window``, ``curtain-wall``, ``glazing``, ``rated``, ``slab-on-grade``,
    ``below-grade-wall``, ``suspended-floor``, ``heated-basement``, ``unheated-basement``,
    ``curved``."""
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
    glazing: Glazing | None = None
    """Of kind ``glazing``: panes and spaces without a frame."""
    voids: tuple[Voids, ...] = ()
    inverted: Inverted | None = None
    suspended: Suspended | None = None
    basement: Basement | None = None
    curved: Curved | None = None
    drawn: bool = False
    """A layer is a drawn section."""


# ----------------------------------------------------------------------------------- elements


class Opening(NamedTuple):
    """An opening's mark as a surface shows it."""

    tag: str
    count: float  # type: ignore[assignment]  # hides tuple.count, which nobody calls
    area: float | None = None
    """m2 in all, where the drawing shows it."""
    host: str = ""
    """Tag of the element that it is cut from, where that is stated."""


class Surface(NamedTuple):
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


class Fact(NamedTuple):
    """A value that a condition of a rule set asks for."""

    name: str
    value: str | float | bool
    """Word, yes/no, or SI number."""
    sheet: str
    line: int


class Element(NamedTuple):
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
    count: float | None  # type: ignore[assignment]  # hides tuple.count, which nobody calls
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
    wall_height: float | None = None
    """m; for the share of a wall below grade."""
    existing: Declared | None = None
    """Value before an alteration."""


class Junction(NamedTuple):
    """A kind of junction that the building has."""

    id: str
    title: str
    sheet: str
    length: float | None
    """m"""
    counted_as: str
    """Title of the bridge that counts it; empty = none does."""
    reason: str
    band: tuple[float, float]
    """Usual psi of its kind, W/(m K)."""
    line: int


class ExceptionClaim(NamedTuple):
    """A clause that somebody claims for an element."""

    element: str
    clause: str
    claimed_by: str
    reason: str
    evidence: str
    """File in the project's folder, or empty."""
    evidence_found: bool
    line: int


class RuleSetChoice(NamedTuple):
    """One rule set to judge by."""

    id: str
    decides: bool
    line: int
    path: str = "prescriptive"
    """``prescriptive`` (row by row) or ``trade_off``, where the project elects it."""


class ZoneStated(NamedTuple):
    """Zone of the site under one rule set (or any, with an empty id)."""

    ruleset: str
    zone: str
    source: str
    line: int


class Climate(NamedTuple):
    """Facts of the site that tell its climate zone and moisture regime."""

    source: str
    temperatures: tuple[float, ...] = ()
    """Monthly means from January, degC; twelve or none."""
    precipitation: tuple[float, ...] = ()
    """Of each month from January, m; twelve or none."""
    mean_temperature: float | None = None
    """Of the year, degC; where months are stated, their mean."""
    annual_precipitation: float | None = None
    """m; where months are stated, their sum."""
    marine: bool | None = None
    """Whether the climate is marine, where that is stated."""
    vapour_pressures: tuple[float, ...] = ()
    """Monthly means from January, Pa, stated or from relative humidities; twelve or none."""


class ByCriteria(NamedTuple):
    """The zone that published criteria give for a site."""

    criteria: str
    zone: str
    """Empty where a fact is missing."""
    why: str
    """How it was found, or what is missing."""


class Site(NamedTuple):
    """Where the building stands."""

    place: str
    zones: tuple[ZoneStated, ...] = ()
    measures: tuple[tuple[str, float], ...] = ()
    """hdd18, hdd65, cdd10, altitude ... by name, SI (K d, m)."""
    indoor_temperature: float | None = None
    """degrees C"""
    outdoor_temperature: float | None = None
    climate: Climate | None = None
    by_criteria: tuple[ByCriteria, ...] = ()
    """By each formula that a rule set names; filled in once the rule sets are read."""
    indoor_air: "IndoorAir | None" = None
    line: int = 0
    """Of the section, or of the file where there is none."""


class Options(NamedTuple):
    """What a remedy may use."""

    stock: tuple[tuple[str, tuple[float, ...]], ...] = ()
    """Material id -> thicknesses in stock, m."""
    costs: tuple[tuple[str, tuple[float, ...]], ...] = ()
    """Material id -> cost of each of them per m2."""
    currency: str = ""


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
    junctions: tuple[Junction, ...] = ()
    """Kinds of junctions, counted or not."""
    ranged: bool = False
    """Some value of it is stated with a range."""
    sha256: str = ""
    details: "dict[str, Detail]" = field(default_factory=dict)
    """Drawn junctions, by id."""
    lines: dict[str, int] = field(default_factory=dict, compare=False, repr=False)
