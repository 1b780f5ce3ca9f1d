"""Which class of construction an element is judged in, by the rule set's own tests."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.judged import Choice, Finding
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
    tests = ruleset.conventions.class_tests
    test = next((t for t in tests if matches(t.category, element.category)), None)
    if test is None:
        return Class(element.category)
    if test.measure == "visible_transmittance":
        return _by_light(element, assembly, test)
    return _by_mass(element, properties, test)


def _by_light(element: Element, assembly: Assembly, test: ClassTest) -> Class:
    """An element that lets no light through is opaque, whatever frame it stands in."""
    rated, window = assembly.rated, assembly.window
    clear = window is not None or (
        rated is not None
        and ((rated.visible_transmittance or 0.0) > test.at_least or bool(rated.shgc))
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
    if counted >= test.at_least:
        why = f"{test.clause}: {_amount(test, counted)} is at least {test.text}"
        return Class(element.category, Choice("class", in_words(element.category), why))
    other = test.otherwise or FRAMED[properties.framing]
    why = f"{test.clause}: {_amount(test, counted)} is below {test.text}"
    claimed = in_words(element.category)
    seen = f"claimed as {claimed}; {_amount(test, counted)} counts, {test.text} needed"
    if whole is not None:
        seen += f" ({_amount(test, whole)} over the whole wall)"
    finding = Finding(
        "class-claimed",
        "E",
        element.tag,
        element.sheet,
        seen,
        f"by {test.clause} it is {in_words(other)}, and is judged as such (category {other})",
        "a category that the layers bear out, or layers with the mass that the class asks for",
        title="The layers do not bear out the class",
    )
    official = ""
    if test.arguable and whole is not None and whole >= test.at_least:
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
