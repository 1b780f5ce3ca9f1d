"""The numbers that an assembly states, each with how far it may be off and how it is changed.

A band comes from the range stated for the number; else, for an assumed conductivity, from the band
of its material's class; else from a table by kind of evidence.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from math import isfinite
from typing import Any, NamedTuple

from envcheck.advise.levers import conducting
from envcheck.model.ground import Ground, Slab
from envcheck.model.layers import (
    Bridge,
    ContactLayer,
    Extra,
    Fasteners,
    Fill,
    FramedLayer,
    MasonryLayer,
    Material,
    MaterialLayer,
    Member,
    Profile,
    ResistanceLayer,
    TaperedLayer,
)
from envcheck.model.project import Assembly, Rated
from envcheck.model.windows import FramePart, Infill, Joint, Light

Rows = Mapping[str, Mapping[str, str]]
"""Rows of a data table by id."""
VARIED: dict[type, dict[str, str]] = {
    MaterialLayer: {"thickness": "length"},
    ResistanceLayer: {"resistance": "resistance"},
    ContactLayer: {"resistance": "resistance"},
    FramedLayer: {"share": "share"},
    Extra: {"share": "share"},
    Member: {"spacing": "length"},
    Profile: {"thickness": "length"},
    MasonryLayer: {
        "shell": "length", "web_share": "share", "joint_share": "share", "grouted_share": "share",
        "cell_resistance": "resistance",
    },
    TaperedLayer: {"least": "length", "greatest": "length"},
    Fasteners: {"diameter": "length", "density": "per_area"},
    Bridge: {"value": "transmittance"},
    Rated: {"u_factor": "u_factor"},
    Infill: {"u": "u_factor"},
    FramePart: {"u": "u_factor"},
    Light: {"psi": "transmittance"},
    Joint: {"psi": "transmittance"},
    Slab: {"resistance": "resistance", "extent": "length", "soil_conductivity": "conductivity"},
    Ground: {"soil_conductivity": "conductivity"},
}  # fmt: skip
"""Fields that are numbers stated by somebody, with the quantity of their band."""
WORDS = {
    "thickness": "thickness", "least": "least thickness", "greatest": "greatest thickness",
    "share": "framing share", "spacing": "spacing", "shell": "shell", "web_share": "web share",
    "joint_share": "joint share", "grouted_share": "grouted share", "cell_resistance": "cell R",
    "resistance": "R", "label": "labelled R", "installed_label": "R in place",
    "diameter": "diameter", "density": "number", "value": "transmittance", "u_factor": "U",
    "u": "U", "psi": "psi of the edge", "extent": "extent of the edge insulation",
    "soil_conductivity": "conductivity of the soil", "conductivity": "conductivity",
}  # fmt: skip
PUT = Callable[[Any, float], Any]


class Stated(NamedTuple):
    """One number of an assembly."""

    what: str
    quantity: str
    """Of its band: ``conductivity``, ``length`` ... ``transmittance``"""
    unit: str
    """A quantity of ``units``."""
    now: float
    low: float
    high: float
    basis: str
    band_source: str
    evidence: str
    source: str
    put: PUT
    """Gives the assembly with the number changed."""


def inputs(assembly: Assembly, bands: Rows, classes: Rows) -> tuple[Stated, ...]:
    """Every stated number of an assembly that has a band; each material counts once.

    bands, classes: rows of ``evidence_bands`` and ``material_classes``.
    """
    found: dict[Material | tuple[object, ...], Stated] = {}
    for path, owner, part, name in _numbers(assembly, (), assembly):
        if name == "conductivity":
            if part not in found:
                found[part] = _of_material(part, bands, classes)
        else:
            found[(*path, name)] = _of_field(path, owner, part, name, bands)
    return tuple(found.values())


def _numbers(
    part: Any, path: tuple[int, ...], owner: Any
) -> Iterator[tuple[tuple[int, ...], Any, Any, str]]:
    """(path, what it stands in, holder, field) of every number that may be off."""
    if isinstance(part, Material):
        if isfinite(part.conductivity) and part.conductivity > 0.0:
            yield path, owner, part, "conductivity"
        return
    if not isinstance(part, tuple):
        return
    for name in _fields(part):
        value = getattr(part, name)
        if isinstance(value, float | int) and isfinite(value) and value != 0.0:
            yield path, owner, part, name
    titled = part if getattr(part, "title", "") else owner
    for place, inner in enumerate(part):
        yield from _numbers(inner, (*path, place), titled)


def _fields(part: Any) -> tuple[str, ...]:
    if isinstance(part, Fill):
        return ("label",) if part.installed_label is None else ("installed_label",)
    if isinstance(part, Bridge) and (part.detail is not None or part.drawn is not None):
        return ()
    if isinstance(part, TaperedLayer) and part.pieces:
        return ()
    return tuple(VARIED.get(type(part), ()))


def _of_field(path: tuple[int, ...], owner: Any, part: Any, name: str, bands: Rows) -> Stated:
    quantity = "resistance" if isinstance(part, Fill) else VARIED[type(part)][name]
    now = float(getattr(part, name))
    title = getattr(part, "title", "") or getattr(owner, "title", "")
    evidence = getattr(part, "evidence", "")
    source = getattr(part, "source", "") or (
        getattr(part, "share_from", "") if name == "share" else ""
    )
    span = getattr(part, "span", None)
    if isinstance(part, Rated):
        source = ", ".join(word for word in (part.standard, part.document) if word)
    unit = quantity
    if quantity == "transmittance":
        point = isinstance(part, Bridge) and part.kind == "point"
        unit = "point_transmittance" if point else "linear_transmittance"
    elif quantity == "length":
        unit = "thickness"
    if span is not None:
        (low, high), basis, from_where = span, "stated range", "the project"
    else:
        row = band_row(bands, quantity, evidence)
        low, high = now * float(row["low"]), now * float(row["high"])
        basis, from_where = "evidence", row["source"]
    if quantity == "share":
        high = min(high, 1.0)

    def put(assembly: Any, value: float) -> Any:
        return _at(assembly, path, lambda held: held._replace(**{name: value}))

    what = f"{title}: {WORDS[name]}"
    return Stated(what, quantity, unit, now, low, high, basis, from_where, evidence, source, put)


def _of_material(material: Material, bands: Rows, classes: Rows) -> Stated:
    now = material.conductivity
    band = classes.get(material.material_class)
    if material.span is not None:
        (low, high), basis, from_where = material.span, "stated range", "the project"
    elif material.evidence in ("", "assumed") and band is not None:
        low, high = min(float(band["low"]), now), max(float(band["high"]), now)
        basis, from_where = "class band", band["source"]
    else:
        row = band_row(bands, "conductivity", material.evidence)
        low, high = now * float(row["low"]), now * float(row["high"])
        basis, from_where = "evidence", row["source"]
    what = f"{material.title}: {WORDS['conductivity']}"
    return Stated(
        what, "conductivity", "conductivity", now, low, high, basis, from_where,
        material.evidence or "assumed", material.source,
        lambda assembly, value: conducting(assembly, material, value),
    )  # fmt: skip


def band_row(bands: Rows, quantity: str, evidence: str) -> Mapping[str, str]:
    """The row of a quantity and a kind of evidence; what nobody says is assumed.

    Errors: KeyError where the table has no row for the quantity.
    """
    own = {row["evidence"]: row for row in bands.values() if row["quantity"] == quantity}
    return own.get(evidence) or own.get("*") or own["assumed"]


def _at(part: Any, path: tuple[int, ...], change: Callable[[Any], Any]) -> Any:
    """The same part with what stands at a path changed."""
    if not path:
        return change(part)
    inner = [*part]
    inner[path[0]] = _at(inner[path[0]], path[1:], change)
    return type(part)(*inner) if hasattr(part, "_fields") else tuple(inner)
