"""Which class of construction an element is judged in, by the rule set's own tests."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.judged import Choice, Finding
from envcheck.model.project import Element
from envcheck.model.ruleset import ClassTest, RuleSet
from envcheck.model.solved import Properties
from envcheck.units import convert

FRAMED = {"steel": "wall.steel_frame", "wood": "wall.wood_frame", "none": "wall.other"}
"""Class of a wall that fails the test for a mass wall, by its framing."""


class Class(NamedTuple):
    """The class that counts, how it was found, and what it contradicts."""

    category: str
    choice: Choice | None
    finding: Finding | None
    official: str = ""
    """Not empty: two classes fit and the official decides between them."""
    missing: str = ""
    """Not empty: the test cannot be made, and why."""


def classify(element: Element, properties: Properties, ruleset: RuleSet) -> Class:
    """Apply the class test of the category that the project claims."""
    test = next(
        (t for t in ruleset.conventions.class_tests if t.category == element.category), None
    )
    if test is None:
        return Class(element.category, None, None)
    counted, whole = _measured(test, properties)
    if counted is None:
        materials = ", ".join(properties.missing) or "the layers"
        return Class(
            element.category,
            None,
            None,
            missing=f"density and specific heat of {materials}, for the class test of "
            f"{test.clause}",
        )
    if counted >= test.at_least:
        why = f"{test.clause}: {_amount(test, counted)} is at least {test.text}"
        return Class(element.category, Choice("class", element.category, why), None)
    other = FRAMED[properties.framing]
    why = f"{test.clause}: {_amount(test, counted)} is below {test.text}"
    finding = Finding(
        "class-claimed",
        "E",
        element.tag,
        element.sheet,
        f"claimed as {element.category}; {_amount(test, counted)} counted"
        + (f" ({_amount(test, whole)} over the whole wall)" if whole is not None else "")
        + f", {test.text} needed",
        f"by {test.clause} it is {other}, and judged as such",
        "a category that the layers bear out, or layers with the mass that the class asks for",
    )
    official = ""
    if test.arguable and whole is not None and whole >= test.at_least:
        official = (
            f"{test.clause} leaves open how the wall is counted: {element.category} or {other}"
        )
    return Class(other, Choice("class", other, why), finding, official)


def _measured(test: ClassTest, properties: Properties) -> tuple[float | None, float | None]:
    """What the test counts, and the same over the whole wall where that differs."""
    if test.measure == "heat_capacity":
        whole, indoor = properties.heat_capacity, properties.heat_capacity_indoor
    else:
        whole, indoor = properties.weight, properties.weight_indoor
    if test.counted == "whole":
        return whole, None
    return indoor, whole


def _amount(test: ClassTest, value: float) -> str:
    """A heat capacity or weight in words, in the unit of the printed test."""
    unit = test.text.partition(" ")[2]
    what = "heat capacity" if test.measure == "heat_capacity" else "weight"
    return f"{what} {convert(value, unit):.3g} {unit}"
