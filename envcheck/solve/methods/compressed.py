"""Batts that are thicker than their cavity: resistance in place against the label."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.model.project import Fill
from envcheck.model.ruleset import TableRow
from envcheck.model.solved import Operand, Resistor, Step
from envcheck.solve.cells import stated_cell
from envcheck.solve.registry import Context, Method

TABLE = "compressed_batts"
SAME_LABEL = 0.01
"""Relative difference within which two labels are the same in other units."""
SAME_LENGTH = 0.002
"""m; 140 mm is 5-1/2 in."""
PROPORTIONAL = "compressed batt, no published value: resistance in proportion to the thickness"


class InPlace(NamedTuple):
    """Resistance of a batt in its cavity."""

    resistance: float
    """m2 K/W"""
    way: str
    """``label``, ``maker``, ``table`` or ``proportional``."""
    source: str


def in_proportion(label: float, product_thickness: float, cavity_depth: float) -> float:
    """Cautious resistance of a compressed batt: R = label d / D.

    label: at the product's own thickness, m2 K/W. product_thickness: D, cavity_depth: d, m, any
    shape. Returns m2 K/W.
    Source: a fibre batt conducts less when it is denser (over the usual range of compression), so
    that its conductivity at full thickness never overstates the resistance in place.
    """
    return label * cavity_depth / product_thickness


def installed_resistance(
    label: float,
    product_thickness: float | None,
    cavity_depth: float,
    installed_label: float | None = None,
    rows: Sequence[TableRow] = (),
) -> InPlace:
    """Resistance in place: the maker's, else the label, a published row, or in proportion.

    label, installed_label: m2 K/W. product_thickness: m, None = that of the cavity. cavity_depth:
    m. rows: with keys ``label`` (m2 K/W), ``product_thickness`` and ``cavity_depth`` (m).
    """
    if installed_label is not None:
        return InPlace(installed_label, "maker", "stated by the maker for this thickness")
    if product_thickness is None or product_thickness <= cavity_depth + 1e-6:
        return InPlace(label, "label", "")
    for row in rows:
        keys = row.keys
        if (
            abs(float(keys["label"]) - label) <= SAME_LABEL * label
            and abs(float(keys["product_thickness"]) - product_thickness) <= SAME_LENGTH
            and abs(float(keys["cavity_depth"]) - cavity_depth) <= SAME_LENGTH
        ):
            return InPlace(row.value, "table", row.source)
    value = in_proportion(label, product_thickness, cavity_depth)
    return InPlace(value, "proportional", PROPORTIONAL)


def fill_in_place(fill: Fill, depth: float, rows: Sequence[TableRow] = ()) -> InPlace | None:
    """Resistance in place of a labelled fill; None where the fill has no label."""
    if fill.label is None:
        return None
    return installed_resistance(
        fill.label, fill.product_thickness, depth, fill.installed_label, rows
    )


def compressed_cell(symbol: str, fill: Fill, depth: float, context: Context) -> Resistor:
    """The resistor of a labelled fill in a cavity of this depth, m, with its worksheet step."""
    placed = fill_in_place(fill, depth, context.conventions.tables.get(TABLE, ()))
    assert placed is not None and fill.label is not None, "only a labelled fill is compressed"
    if placed.way == "proportional":
        operands = (
            Operand("R_label", fill.label, "resistance"),
            Operand("d", depth, "length"),
            Operand("D", fill.product_thickness or depth, "length"),
        )
        title = "insulation compressed into its cavity"
        expression = "{R_label} * {d} / {D}"
        source = f"{fill.source}; {PROPORTIONAL}" if fill.source else PROPORTIONAL
        step = Step(symbol, title, expression, operands, placed.resistance, "resistance", source)
        return Resistor(symbol, title, placed.resistance, (step,))
    titles = {
        "label": "insulation as labelled",
        "maker": "insulation in place, as its maker states",
        "table": "insulation compressed into its cavity, published value",
    }
    source = "; ".join(part for part in (fill.source, placed.source) if part)
    return stated_cell(symbol, titles[placed.way], placed.resistance, source)


METHODS = (
    Method(
        name="compressed",
        title="Compressed batt",
        formula="R in place as stated or published; else R = label x depth / product thickness",
        source="published charts of compressed glass fibre batts (data/compressed_batts.csv)",
        valid="fibre batts between members; not foams or loose fill",
    ),
)
