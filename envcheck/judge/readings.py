"""Known slips of counting: what a drawing's value would be if one of them had been made.

A declared value that is not the computed one is mostly such a slip: labels added up, framing left
out, a mean thickness. Each is computed here from the same layers; the one that rounds to the
printed digits explains the value.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import NamedTuple

from envcheck.judge.figures import Disagreement, system_of
from envcheck.judge.words import method, resistance
from envcheck.model.project import (
    AirSpaceLayer,
    Assembly,
    ContactLayer,
    Fill,
    FramedLayer,
    Layer,
    MaterialLayer,
    ResistanceLayer,
)
from envcheck.model.solved import Node, Properties, Resistor, Series, Solved

WORDS = {
    "parallel_path": "parallel paths were taken",
    "isothermal_planes": "isothermal planes were taken",
    "combined": "the mean of both resistances was taken (ISO 6946)",
    "mean_thickness": "the tapered layer was taken at its mean thickness",
    "least_thickness": "the tapered layer was taken at its least thickness",
    "integral": "the tapered layer was counted by the areas of equal thickness",
    "centre_of_glass": "the centre of the glass was taken",
}
"""Values beside the one that decides, as the slip that they are here."""


STILL_AIR = 0.18
"""m2 K/W; unventilated, 25 mm or more, heat flowing sideways: ISO 6946:2017, Table 8."""
U_IP = 5.678263
"""W/(m2 K) in one Btu/(h ft2 F), by the exact definitions of the units."""


class Reading(NamedTuple):
    """A way of counting that gives another value."""

    words: str
    value: float
    """U, C or F, SI."""


def explain(
    found: Disagreement, assembly: Assembly, properties: Properties | None
) -> Reading | None:
    """The first reading that rounds to the printed digits; None where no reading does."""
    declared = assembly.declared
    for reading in readings(assembly, properties, found.solved, system_of(found.figure)):
        inverse = declared is not None and declared.quantity == "resistance"
        if reading.value <= 0:
            continue
        value = 1.0 / reading.value if inverse else reading.value
        if found.figure.printed(value) == found.figure.digits:
            return reading
    return None


# --------------------------------------------------------------------------------- the readings


def readings(
    assembly: Assembly, properties: Properties | None, solved: Solved, units: str
) -> Iterator[Reading]:
    """Known slips of counting, the likeliest first."""
    metric = solved.setting.metric
    films = solved.setting.outside_film + solved.setting.inside_film
    films = films if metric.startswith("U_") else 0.0
    if properties is not None and metric != "F_factor":
        yield from _labels(properties, films, units)
    for beside in solved.beside:
        words = WORDS.get(beside.name, f"the value by {method(beside.name)} was taken")
        yield Reading(words, beside.value)
    for words, value in (
        (
            "outer insulation that metal crosses was counted in full",
            crossed_in_full(assembly, solved),
        ),
        ("compressed insulation was counted at its full label", full_label(assembly, solved)),
        ("framing was left out: all layers in series", _unbridged(assembly, solved, films)),
        ("fasteners and bridges were left out", solved.clear),
    ):
        if value is not None:
            yield Reading(words, value)
    if solved.value and films and 1.0 / solved.value > films:
        yield Reading("surface films were left out", 1.0 / (1.0 / solved.value - films))
    if solved.value:
        yield from _by_other_rules(assembly, solved)


def _by_other_rules(assembly: Assembly, solved: Solved) -> Iterator[Reading]:
    """What the metric leaves out counted in, and figures of the other system of units."""
    value, setting = solved.value or 1.0, solved.setting
    if setting.metric == "C_factor":
        added = setting.outside_film + setting.inside_film
        words = "surface films were added, which a C-factor leaves out"
        yield Reading(words, 1.0 / (1.0 / value + added))
    for space, words in ((0.0, ""), (STILL_AIR, " with a space of still air")):
        cladding = _cladding(assembly, solved)
        if cladding is not None:
            what = f"the cladding outside the ventilated space was counted{words}"
            yield Reading(what, 1.0 / (1.0 / value + cladding + space))
    for factor in (U_IP, 1.0 / U_IP):
        yield Reading("the figure is that of the other system of units", value * factor)


def _cladding(assembly: Assembly, solved: Solved) -> float | None:
    """What the layers outside a well-ventilated space would add, films changed, m2 K/W."""
    spaces = [
        number
        for number, layer in enumerate(assembly.layers)
        if isinstance(layer, AirSpaceLayer) and layer.ventilation == "well"
    ]
    film = next((step.value for step in solved.steps if step.symbol == "Ro"), None)
    if not spaces or film is None:
        return None
    outside = [plain_resistance(layer) for layer in assembly.layers[: spaces[-1]]]
    return sum(value or 0.0 for value in outside) + solved.setting.outside_film - film


def _labels(properties: Properties, films: float, units: str) -> Iterator[Reading]:
    total = properties.label_sum
    if not total:
        return
    outer = properties.continuous_resistance > 0 or bool(properties.crossed)
    if properties.cavity_resistance is None:
        which = "the label of the insulation was taken alone"
    elif outer:
        which = "the labels of cavity and outer insulation were added"
    else:
        which = "the label of the cavity insulation was taken alone"
    shown = resistance(total, units)
    yield Reading(f"{which} ({shown})", 1.0 / total)
    if films:
        added = which.replace("taken alone", "added to the films")
        added = added.replace("were added", "and the films were added")
        yield Reading(f"{added} ({resistance(total + films, units)})", 1.0 / (total + films))


def recomputed(tree: Node, values: Mapping[str, float]) -> float:
    """Resistance of a tree with some resistors changed.

    values: symbol -> m2 K/W. Returns m2 K/W; 0 where a branch beside others has none.
    Source: resistances in series add, conductances side by side add by their share.
    """
    if isinstance(tree, Resistor):
        return values.get(tree.symbol, tree.value)
    if isinstance(tree, Series):
        return sum(recomputed(part, values) for part in tree.parts)
    branches = [recomputed(branch, values) for branch in tree.branches]
    if any(value <= 0 for value in branches):
        return 0.0
    return 1.0 / sum(s / r for s, r in zip(tree.shares, branches, strict=True))


def _changed(solved: Solved, values: Mapping[str, float]) -> float | None:
    """U with some resistors of the tree changed and the same corrections, W/(m2 K)."""
    if not values or solved.tree is None or not solved.clear or solved.value is None:
        return None
    as_is, changed = recomputed(solved.tree, {}), recomputed(solved.tree, values)
    if changed <= 0 or abs(as_is * solved.clear - 1.0) > 1e-6 or abs(changed - as_is) < 1e-9:
        return None
    return 1.0 / changed + solved.value - solved.clear


def full_label(assembly: Assembly, solved: Solved) -> float | None:
    """U with every compressed fill at its full label, W/(m2 K); None where nothing changes."""
    return _changed(
        solved,
        {
            f"R{number}_fill": layer.fill.label
            for number, layer in enumerate(assembly.layers, 1)
            if isinstance(layer, FramedLayer) and layer.fill.label is not None
        },
    )


def crossed_in_full(assembly: Assembly, solved: Solved) -> float | None:
    """U with insulation that metal crosses counted in full; None where nothing changes."""
    return _changed(
        solved,
        {
            f"R{number}": value
            for number, layer in enumerate(assembly.layers, 1)
            if isinstance(layer, FramedLayer) and layer.crosses_insulation
            for value in [fill_resistance(layer.fill, layer.thickness)]
            if value is not None
        },
    )


def fill_resistance(fill: Fill, depth: float) -> float | None:
    """Resistance of a fill as labelled, or of its depth (m) of a material, m2 K/W."""
    if fill.label is not None:
        return fill.label
    return None if fill.material is None else depth / fill.material.conductivity


def _unbridged(assembly: Assembly, solved: Solved, films: float) -> float | None:
    """U of films and layers in series, members left out; None where nothing is framed."""
    start = max(
        (
            number + 1
            for number, layer in enumerate(assembly.layers)
            if isinstance(layer, AirSpaceLayer) and layer.ventilation == "well"
        ),
        default=0,
    )
    layers = assembly.layers[start:]
    total = films
    if not any(isinstance(layer, FramedLayer) for layer in layers):
        return None
    for layer, counted in zip(layers, solved.counted[start:], strict=False):
        value = plain_resistance(layer)
        if isinstance(layer, FramedLayer):
            value = fill_resistance(layer.fill, layer.thickness)
        elif value is None:
            value = counted.resistance
        if value is None:
            return None
        total += value
    return 1.0 / total if total > 0 else None


def plain_resistance(layer: Layer) -> float | None:
    """Resistance of a layer of one material or a stated one, m2 K/W; None for any other."""
    if isinstance(layer, MaterialLayer):
        return layer.thickness / layer.material.conductivity
    return layer.resistance if isinstance(layer, ResistanceLayer | ContactLayer) else None
