"""From an element and a rule set's conventions to the setting that fixes its value."""

from __future__ import annotations

from collections.abc import Mapping

from envcheck.model.patterns import best_pattern, closeness, matches
from envcheck.model.project import (
    AirSpaceLayer,
    Assembly,
    Element,
    FramedLayer,
    Layer,
    MasonryLayer,
)
from envcheck.model.ruleset import Conventions, FilmRow, MethodRule
from envcheck.model.solved import Setting
from envcheck.solve.methods.air_space import KELVIN
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.methods.surface_films import convection_by_wind, surface_resistance
from envcheck.solve.registry import methods

DRAWN = "a drawn section is solved as it is drawn"
STEEP = 60.0
"""Degrees from horizontal from which a surface counts as a wall (ISO 6946:2017, 6.8: heat flow
is horizontal within 30 degrees of the horizontal plane)."""


EMITTANCE = 0.9
"""Of ordinary outside surfaces, as in ISO 6946's films by wind."""


class Resolver:
    """Resolves films and method under one rule set's conventions; what repeats is found once."""

    def __init__(self, conventions: Conventions, key: str) -> None:
        """``key`` names the conventions, so that settings of two rule sets never mix."""
        self._conventions, self._key = conventions, key
        self._films: dict[tuple[str, str], tuple[FilmRow, FilmRow, FilmRow]] = {}
        self._rules: dict[tuple[str, str, str], MethodRule | None] = {}
        self._shares: dict[str, tuple[float | None, str]] = {}

    def resolve(self, element: Element, assembly: Assembly, category: str, metric: str) -> Setting:
        """Resolve one element.

        category: the class it is judged in. metric: what the limit speaks of (``U_assembly``).
        """
        rule = self._rule(category, assembly.kind, metric)
        if assembly.drawn and metric in ("U_assembly", "U_product"):
            method, method_from = "two_dimensional", DRAWN
            refused, weight = () if rule is None else rule.refused, None
            if rule is not None and method in refused:
                method_from = rule.clause
        elif rule is not None:
            method, method_from = rule.method, rule.clause
            refused, weight = rule.refused, rule.weight
        else:
            method, method_from = assumed_method(assembly, metric)
            refused, weight = (), None
        direction = direction_of_flow(element.tilt)
        outside, inside, cladding = self._three_films(element.adjoins, direction)
        share = self._share(category)
        stated = "stated in the project"
        outer, inner = assembly.outside_film, assembly.inside_film
        return Setting(
            metric=metric,
            method=method,
            method_from=method_from,
            refused=refused,
            weight=weight,
            direction=direction,
            outside_film=outside.resistance if outer is None else outer,
            outside_film_from=outside.source if outer is None else stated,
            inside_film=inside.resistance if inner is None else inner,
            inside_film_from=inside.source if inner is None else stated,
            cladding_film=cladding.resistance if outer is None else outer,
            conventions=self._key,
            framing_share=share[0],
            framing_share_from=share[1],
        )

    def _rule(self, category: str, kind: str, metric: str) -> MethodRule | None:
        asked = (category, kind, metric)
        if asked not in self._rules:
            self._rules[asked] = method_rule(self._conventions, *asked)
        return self._rules[asked]

    def _share(self, category: str) -> tuple[float | None, str]:
        if category not in self._shares:
            self._shares[category] = framing_share(self._conventions, category)
        return self._shares[category]

    def _outdoors(self, row: FilmRow) -> FilmRow:
        """The film outdoors: that of the set, or by the wind that the rule set states."""
        speed = self._conventions.wind_speed
        return row if speed is None else film_by_wind(speed, self._conventions.where)

    def _three_films(self, adjoins: str, direction: str) -> tuple[FilmRow, FilmRow, FilmRow]:
        """Outside, inside, and outside a well-ventilated cavity."""
        asked = (adjoins, direction)
        if asked not in self._films:
            films = self._conventions.films
            outside = _film(films, "outside", adjoins, direction)
            self._films[asked] = (
                self._outdoors(outside) if adjoins == "outdoors" else outside,
                _film(films, "inside", adjoins, direction),
                _film(films, "outside", "ventilated_cladding", direction),
            )
        return self._films[asked]


def framing_share(conventions: Conventions, category: str) -> tuple[float | None, str]:
    """The framing share that the code gives for a class, by the most specific pattern."""
    shares = {pattern: (share, clause) for pattern, share, clause in conventions.framing_shares}
    pattern = best_pattern(category, shares)
    if pattern is None:
        return None, ""
    share, clause = shares[pattern]
    return share, clause or "the rule set"


def film_by_wind(speed: float, where: Mapping[str, str]) -> FilmRow:
    """The outside film by a wind of that speed, m/s, past an ordinary surface at 0 degC."""
    value = surface_resistance(convection_by_wind(speed), EMITTANCE, KELVIN)
    words = (
        f"1 / (4 + 4 x {speed:g} + {EMITTANCE:g} x 4 x 5.67e-8 x {KELVIN:g}^3): wind of "
        f"{speed:g} m/s, ISO 6946:2017, annex C [{where.get('wind_speed', '')}]"
    )
    return FilmRow("outside", "outdoors", "*", value, "", words)


def direction_of_flow(tilt: float) -> str:
    """Direction of heat flow out of a heated room through a surface of this tilt, degrees."""
    if tilt < STEEP:
        return "up"
    return "horizontal" if tilt <= 180.0 - STEEP else "down"


def method_rule(
    conventions: Conventions, category: str, kind: str, metric: str
) -> MethodRule | None:
    """The method prescribed for a category; the most specific pattern wins.

    A rule holds only where its method serves this kind of assembly and metric (a method for
    walls says nothing about a rated product in the same class).
    """
    rules = [
        rule
        for rule in conventions.methods
        if matches(rule.category, category) and _serves(rule.method, kind, metric)
    ]
    return max(rules, key=lambda rule: closeness(rule.category, category), default=None)


def _serves(name: str, kind: str, metric: str) -> bool:
    method = methods()[name]
    if method.decides is not None:
        return kind == "layers"
    return any(k == kind for k, _ in method.solves) and _kin(method.metric, metric)


def _kin(one: str, other: str) -> bool:
    """Assembly and product U-factors are one quantity under two rows of a table."""
    return one == other or {one, other} <= {"U_assembly", "U_product"}


def assumed_method(assembly: Assembly, metric: str) -> tuple[str, str]:
    """The method where the rule set names none, and the words that say so."""
    if assembly.kind != "layers":
        return _only_method(assembly.kind, metric)
    framed = [layer for layer in assembly.layers if isinstance(layer, FramedLayer)]
    if any(is_metal(layer) for layer in framed):
        return "", "the rule set names no method for steel framing, and none is assumed"
    if any(isinstance(layer, MasonryLayer) for layer in assembly.layers):
        return "isothermal_planes", "assumed: the rule set names no method (masonry)"
    if framed:
        return "parallel_path", "assumed: the rule set names no method (wood framing)"
    return "series", "assumed: the rule set names no method (layers in series)"


def _only_method(kind: str, metric: str) -> tuple[str, str]:
    """The method for another kind, unless the rule set must name it."""
    serving = [
        method
        for method in methods().values()
        if any(k == kind for k, _ in method.solves) and _kin(method.metric, metric)
    ]
    for method in serving:
        if method.assumed:
            return method.name, "the only method for this kind"
    if serving:
        names = " or ".join(method.name for method in serving)
        return "", f"a method for {kind!r}: the rule set does not name {names}"
    return "", f"no method gives {metric} for an assembly of kind {kind!r}"


def ventilated_at(layers: tuple[Layer, ...]) -> int | None:
    """Index of the innermost well-ventilated air space, or None."""
    found = [
        index
        for index, layer in enumerate(layers)
        if isinstance(layer, AirSpaceLayer) and layer.ventilation == "well"
    ]
    return found[-1] if found else None


def film_resistance(conventions: Conventions, side: str, direction: str) -> float | None:
    """The rule set's film for another direction than that of the setting, m2 K/W, if it has any."""
    films = conventions.films
    return _film(films, side, "*", direction).resistance if films else None


def _film(films: tuple[FilmRow, ...], side: str, adjoins: str, direction: str) -> FilmRow:
    """The most specific film row: what lies beyond counts before the direction.

    The reader makes sure that each side has a row for every direction.
    """
    fitting = [row for row in films if row.side == side and row.direction in (direction, "*")]
    named = [row for row in fitting if row.adjoins == adjoins]
    general = [row for row in fitting if row.adjoins in ("*", "outdoors")]
    rows = named or general or fitting
    return max(rows, key=lambda row: row.direction == direction)
