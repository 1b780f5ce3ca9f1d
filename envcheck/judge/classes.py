"""Which class of construction an element is judged in, by the rule set's own tests."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.judged import CERTAIN, Choice, Finding
from envcheck.model.patterns import in_words, matches
from envcheck.model.project import Assembly, Element
from envcheck.model.ruleset import ClassTest, RuleSet
from envcheck.model.solved import Properties
from envcheck.units import convert

FRAMED = {"steel": "wall.steel_frame", "wood": "wall.wood_frame", "none": "wall.other"}
"""Class of a wall that fails the test for a mass wall, by its framing."""


class Class(NamedTuple):
    """The class that counts, how it was found, and what it contradicts."""

    category: str
    choice: Choice | None = None
    finding: Finding | None = None
    official: str = ""
    """Not empty: two classes fit and the official decides between them."""
    missing: str = ""
    """Not empty: the test cannot be made, and why."""


def classify(
    element: Element, assembly: Assembly, properties: Properties, ruleset: RuleSet
) -> Class:
    """Apply the class test of the category that the project claims."""
    found = Class(element.category)
    for test in ruleset.conventions.class_tests:
        if not matches(test.category, element.category):
            continue
        found = _apply(test, element, assembly, properties)
        if found.category != element.category or found.missing:
            return found
    return found


def _apply(test: ClassTest, element: Element, assembly: Assembly, properties: Properties) -> Class:
    if test.measure == "visible_transmittance":
        return _by_light(element, assembly, test)
    if test.measure in ("heat_capacity", "weight"):
        return _by_mass(element, properties, test)
    return _by_geometry(element, properties, test)


def _by_geometry(element: Element, properties: Properties, test: ClassTest) -> Class:
    """Slope, depth below grade, or how much of the insulation lies clear of the framing."""
    value, words = _share_or_slope(element, properties, test)
    if value is None:
        return Class(element.category, missing=f"{words}, for the class test of {test.clause}")
    seen = f"{words} {_amount_of(test, value)}"
    if test.holds(value):
        why = f"{test.clause}: {seen} is {test.words}"
        return Class(element.category, Choice("class", in_words(element.category), why))
    other = test.otherwise or FRAMED[properties.framing]
    why = f"{test.clause}: {seen} is not {test.words}"
    claimed = in_words(element.category)
    return Class(other, Choice("class", in_words(other), why), _finding(
        element, f"claimed as {claimed}; {seen}, {test.words} needed", other, test,
        "a category that the drawing bears out",
    ))  # fmt: skip


def _share_or_slope(
    element: Element, properties: Properties, test: ClassTest
) -> tuple[float | None, str]:
    """The value of a test and its name; or None and what is missing."""
    if test.measure == "tilt":
        return element.tilt, "tilt"
    if test.measure == "below_grade_share":
        depth, height = element.depth_below_grade, element.wall_height
        if depth is None or height is None:
            return None, f"depth_below_grade and wall_height of {element.tag}"
        return depth / height, "share of the height below grade"
    between, clear = properties.cavity_resistance or 0.0, properties.continuous_resistance
    if between + clear == 0:
        return None, f"insulation in {element.assembly}"
    return clear / (between + clear), "share of the insulation that nothing crosses"


def _amount_of(test: ClassTest, value: float) -> str:
    """A slope or share in words."""
    return f"{value:.3g} deg" if test.measure == "tilt" else f"{value * 100:.3g} %"


def _finding(element: Element, seen: str, other: str, test: ClassTest, settles: str) -> Finding:
    return Finding(
        "class-claimed",
        "E",
        element.tag,
        element.sheet,
        seen,
        f"by {test.clause} it is {in_words(other)}, and is judged as such (category {other})",
        settles,
        title="The layers do not bear out the class",
        sure=CERTAIN,
    )


def _by_light(element: Element, assembly: Assembly, test: ClassTest) -> Class:
    """An element that lets no light through is opaque, whatever frame it stands in."""
    rated, window = assembly.rated, assembly.window
    clear = (
        assembly.glazing is not None
        or (window is not None and not window.opaque)
        or (
            rated is not None
            and ((rated.visible_transmittance or 0.0) > test.at_least or bool(rated.shgc))
        )
    )
    if clear:
        return Class(element.category)
    why = f"{test.clause}: {assembly.id} lets no light through (no visible transmittance, no SHGC)"
    return Class(test.otherwise, Choice("class", in_words(test.otherwise), why))


def _by_mass(element: Element, properties: Properties, test: ClassTest) -> Class:
    """A wall without the mass that its class asks for falls to the class of its framing."""
    counted, whole = _measured(test, properties)
    if counted is None:
        materials = ", ".join(properties.missing) or "the layers"
        need = f"density and specific heat of {materials}, for the class test of {test.clause}"
        return Class(element.category, missing=need)
    if test.holds(counted):
        why = f"{test.clause}: {_amount(test, counted)} is {test.words}"
        return Class(element.category, Choice("class", in_words(element.category), why))
    other = test.otherwise or FRAMED[properties.framing]
    short = f"not {test.words}" if test.below else f"below {test.text}"
    why = f"{test.clause}: {_amount(test, counted)} is {short}"
    claimed = in_words(element.category)
    seen = f"claimed as {claimed}; {_amount(test, counted)} counts, {test.text} needed"
    if whole is not None:
        seen += f" ({_amount(test, whole)} over the whole wall)"
    settles = "a category that the layers bear out, or layers with the mass that the class asks for"
    finding = _finding(element, seen, other, test, settles)
    official = ""
    if test.arguable and whole is not None and test.holds(whole):
        official = f"{test.clause} leaves the way of counting open: {claimed} or {in_words(other)}"
    return Class(other, Choice("class", in_words(other), why), finding, official)


def _measured(test: ClassTest, properties: Properties) -> tuple[float | None, float | None]:
    """What the test counts, and the same over the whole wall where that differs."""
    if test.measure == "heat_capacity":
        whole, indoor = properties.heat_capacity, properties.heat_capacity_indoor
    else:
        whole, indoor = properties.weight, properties.weight_indoor
    return (whole, None) if test.counted == "whole" else (indoor, whole)


def _amount(test: ClassTest, value: float) -> str:
    """A heat capacity or weight in words, in the unit of the printed test."""
    unit = test.text.partition(" ")[2]
    what = "heat capacity" if test.measure == "heat_capacity" else "weight"
    return f"{what} {convert(value, unit):.3g} {unit}"
