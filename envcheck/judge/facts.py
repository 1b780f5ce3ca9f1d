"""Values of the facts that conditions ask for, and where each is said."""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple

from envcheck.model.days import ordinal
from envcheck.model.project import Element, Fact, Project
from envcheck.model.ruleset import Dimension

Value = str | float


class Known(NamedTuple):
    """The value of a fact and where it is said; the value None is not stated."""

    value: Value | None
    where: str
    usable: bool = True
    text: str = ""
    """As shown, where that is not the value itself: a day."""


def fact_of(
    name: str,
    element: Element,
    project: Project,
    derived: Mapping[str, Value],
    dimension: Dimension,
) -> Known:
    """Look a fact up: element, project, derived facts, the rule set's default, in this order."""
    stated = next((f for f in element.facts if f.name == name), None)
    if stated is not None:
        return _known(stated.value, _said(stated, element.tag), dimension)
    return building_fact(name, project, derived, dimension, element)


def building_fact(
    name: str,
    project: Project,
    derived: Mapping[str, Value],
    dimension: Dimension,
    element: Element | None = None,
) -> Known:
    """Look a fact up that no element states for itself; ``element`` None for the building."""
    if element is None:
        return _of_project(name, project, derived, dimension)
    if name in ("orientation", "facing") and element.facing:
        return _known(element.facing, f"facing of {element.tag}", dimension)
    if name == "adjoins":
        return _known(element.adjoins, f"what {element.tag} adjoins", dimension)
    return _of_project(name, project, derived, dimension)


def _of_project(
    name: str, project: Project, derived: Mapping[str, Value], dimension: Dimension
) -> Known:
    stated = next((f for f in project.facts if f.name == name), None)
    if stated is not None:
        return _known(stated.value, _said(stated, "project"), dimension)
    if name in derived:
        return _known(derived[name], "computed from the project", dimension)
    tested = project.permit_application_date
    if dimension.kind == "date" and tested is not None:
        where = "permit application date of the project"
        return Known(float(tested.toordinal()), where, text=tested.isoformat())
    if dimension.default:
        return _known(dimension.default, "default of the rule set", dimension)
    return Known(None, "")


def _said(fact: Fact, where: str) -> str:
    return f"fact of {where}, sheet {fact.sheet}" if fact.sheet else f"fact of {where}"


def _known(value: str | float | bool, where: str, dimension: Dimension) -> Known:
    """Bring a value to the form of its dimension; a word that it does not know is unusable."""
    if isinstance(value, bool):
        value = "yes" if value else "no"
    if dimension.kind == "date":
        return _day(str(value), where)
    if dimension.values:
        word = str(value).casefold()
        usable = any(word == v.casefold() for v in dimension.values)
        return Known(str(value), where, usable)
    try:
        return Known(float(value), where)
    except ValueError:
        return Known(str(value), where, False)


def _day(text: str, where: str) -> Known:
    day = ordinal(text)
    return Known(text, where, False) if day is None else Known(day, where, text=text)


def shown(value: Value | None) -> str:
    """A value in words."""
    return f"{value:.6g}" if isinstance(value, float) else str(value)


def in_words(known: Known) -> str:
    """A fact in words: a day as a date."""
    return known.text or shown(known.value)
