"""How a code counts: films, methods, class tests, coefficient tables."""

from collections.abc import Mapping
from types import MappingProxyType
from typing import NamedTuple


class FilmRow(NamedTuple):
    """A surface resistance for a side, what lies beyond it and the direction of heat flow."""

    side: str
    """``inside`` or ``outside``"""
    adjoins: str
    """What lies beyond (``outdoors``, ``vented_attic`` ...), ``ventilated_cladding``, or ``*``."""
    direction: str
    """``up``, ``horizontal``, ``down`` or ``*``"""
    resistance: float
    """m2 K/W"""
    text: str
    """As printed, with its unit."""
    source: str


class MethodRule(NamedTuple):
    """The method that the rule set prescribes for a class of construction."""

    category: str
    """Category or pattern."""
    method: str
    clause: str
    refused: tuple[str, ...] = ()
    """Methods that the clause does not accept."""
    weight: float | str | None = None
    """Of the upper limit, for the weighted rule; or the name of a published formula for it, or
    ``table``: found in the rule set's table of weights."""


class ClassTest(NamedTuple):
    """The test that keeps an element in the class claimed: by mass, light, slope or share."""

    category: str
    """The class claimed, or a pattern."""
    measure: str
    """``heat_capacity``, ``weight``, ``tilt``, ``below_grade_share``, ``continuous_share`` or
    ``visible_transmittance`` (above ``at_least``)"""
    at_least: float
    """J/(m2 K), kg/m2, degrees or a share 0..1"""
    text: str
    """As printed: ``6 Btu/(ft2*degF)``."""
    counted: str
    """``whole`` or ``indoor_of_continuous_insulation``."""
    clause: str
    arguable: bool = False
    """The code leaves room: where ways of counting differ, the official decides."""
    otherwise: str = ""
    """Class of an element that fails; empty = by its framing."""
    below: bool = False
    """The class holds below the printed figure, not from it on."""

    @property
    def words(self) -> str:
        """The figure as the test has it: ``at least 60 deg``."""
        return f"{'below' if self.below else 'at least'} {self.text}"

    def holds(self, value: float) -> bool:
        """Whether a measured value keeps the class; a rounding error off the figure is on it."""
        reached = value >= self.at_least - 1e-9 * abs(self.at_least)
        return reached != self.below


class SpaceTest(NamedTuple):
    """The output that must bear out how a space is conditioned."""

    fact: str
    """The fact that claims it: ``space_category`` ..."""
    value: str
    """... and the word that it claims: ``semiheated``."""
    measure: str
    """The fact that bears it out: ``heating_output``, W/m2."""
    at_least: float | None
    below: float | None
    words: str
    """``at least 3.4 Btu/(h*ft2)``"""
    clause: str


class TableRow(NamedTuple):
    """One row of a coefficient table: cavity factors, effective layers, F-factors, air spaces.

    Keys and values by column; SI numbers, words as text.
    """

    table: str
    keys: dict[str, str | float]
    value: float
    text: str
    source: str


class Conventions(NamedTuple):
    """How this code counts. ``where`` says for each key whether it is stated or our default."""

    films: tuple[FilmRow, ...] = ()
    film_set: str = "iso6946"
    methods: tuple[MethodRule, ...] = ()
    air_spaces: str = "iso6946"
    """``iso6946`` (formula) or ``table`` (rows of ``tables['air_spaces']``)."""
    cladding: str = "iso6946"
    """``iso6946``: outer layers dropped, inner film outside; ``film_stays``: space and what lies
    outside count 0, outer film stays."""
    fasteners: str = "ignored"
    """``ignored`` in continuous insulation, ``iso6946`` or ``chi``."""
    air_voids: str = "ignored"
    """``ignored`` or ``iso6946``"""
    inverted_roofs: str = "ignored"
    """Rain on inverted roofs: ``ignored`` or ``iso6946``."""
    corrections_from: float | None = None
    """Share of U from which the corrections of ISO 6946 count together; None = always."""
    wind_speed: float | None = None
    """m/s, where the outside film follows from the wind."""
    tapered: str = "integral"
    """``integral``, ``mean`` or ``minimum``; with ``tapered_mean_within`` the mean may be used."""
    tapered_mean_within: float | None = None
    """m of variation up to which the mean thickness may be used."""
    tapered_least: float | None = None
    """m; least thickness that the code asks for."""
    penetration_cap: float | None = None
    """Share of the area that metal may take through continuous insulation, 0..1."""
    space_tests: tuple[SpaceTest, ...] = ()
    crossed_insulation: str = "zero"
    """Insulation crossed by continuous metal: ``zero``, ``counted`` or ``two_dimensional``."""
    framing_shares: tuple[tuple[str, float, str], ...] = ()
    """(category pattern, share, clause)"""
    tables: Mapping[str, tuple[TableRow, ...]] = MappingProxyType({})
    class_tests: tuple[ClassTest, ...] = ()
    accepted_evidence: Mapping[str, tuple[str, ...]] = MappingProxyType({})
    """Category pattern -> kinds of evidence (and ``standard:NAME``) that it accepts."""
    dimensions_measured: str = ""
    """``outside`` or ``inside`` where the code says."""
    where: Mapping[str, str] = MappingProxyType({})
    """Key -> "Table 5 of the rule set" or "default of envcheck"."""
