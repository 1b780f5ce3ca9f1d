"""Steel framing by coefficients of the rule set, and metal that crosses outer insulation.

A code that knows steel framing prints either factors by which the labelled cavity insulation is
multiplied, or the effective resistance of the whole framed layer. Both replace the framed layer by
one resistance; what stands outside and inside of it stays in series.
"""

from __future__ import annotations

from collections.abc import Callable

from envcheck.model.project import FramedLayer, MasonryLayer
from envcheck.model.ruleset import TableRow
from envcheck.model.solved import Block, Operand, Resistor, Step
from envcheck.solve.cells import homogeneous, stated_cell
from envcheck.solve.methods.fills import fill_resistor
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.methods.wirings import decided
from envcheck.solve.registry import Context, Decision, Method, NotDecided, Wall
from envcheck.solve.wiring import isothermal_planes, parallel_paths
from envcheck.units import convert


def effective_resistance(factor: float, label: float) -> float:
    """Effective resistance of a framed layer: R = Fc R_label.

    factor: Fc, dimensionless. label: labelled resistance of the cavity insulation, m2 K/W.
    Returns m2 K/W, any shape.
    Source: the correction-factor form of ANSI/ASHRAE/IES 90.1 Normative Appendix A and of model
    codes; the factors themselves are the rule set's.
    """
    return factor * label


def decide_cavity_factor(wall: Wall) -> Decision:
    """Replace each steel-framed layer by Fc times the labelled resistance of its infill."""

    def cell(layer: FramedLayer, context: Context) -> Resistor:
        fill = fill_resistor(layer.fill, layer.thickness, context)
        row = find_row(wall, "cavity_factors", layer, fill.value, layer.fill.label)
        operands = (
            Operand("Fc", row.value, "number"),
            Operand(fill.symbol, fill.value, "resistance"),
        )
        value = effective_resistance(row.value, fill.value)
        step = Step(
            context.symbol,
            f"{layer.title}, corrected for the steel",
            f"{{Fc}} * {{{fill.symbol}}}",
            operands,
            value,
            "resistance",
            row.source,
        )
        return Resistor(context.symbol, layer.title, value, (*fill.steps, step))

    return _decide(wall, cell)


def decide_effective_layer(wall: Wall) -> Decision:
    """Replace each steel-framed layer by the effective resistance that the rule set prints."""

    def cell(layer: FramedLayer, context: Context) -> Resistor:
        fill = fill_resistor(layer.fill, layer.thickness, context)
        label = 0.0 if layer.fill.air is not None else fill.value
        row = find_row(wall, "effective_layers", layer, label, layer.fill.label)
        return stated_cell(context.symbol, f"{layer.title}, effective", row.value, row.source)

    return _decide(wall, cell)


def find_row(
    wall: Wall, table: str, layer: FramedLayer, in_place: float, label: float | None
) -> TableRow:
    """The row of a coefficient table for this label, depth and spacing; nothing is interpolated.

    Rows carry ``label`` (m2 K/W), and may carry ``depth`` and ``spacing`` (m). The resistance in
    place is looked up first, then the label on the product. Tolerances: 1 % of the label, 4 mm of
    depth (nominal sizes), 2 mm of spacing.
    Errors: NotDecided where no row fits.
    """
    for value in (in_place, in_place if label is None else label):
        for row in wall.conventions.tables.get(table, ()):
            fits = (
                _near(row, "label", value, 0.01 * value + 1e-9)
                and _near(row, "depth", layer.thickness, 0.004)
                and _near(row, "spacing", layer.member.spacing, 0.002)
            )
            if fits:
                return row
    in_ip = convert(in_place, "h*ft2*degF/Btu")
    spacing = convert(layer.member.spacing or 0.0, "in")
    raise NotDecided(
        f"a row of the rule set's {table.replace('_', ' ')} for {layer.title!r} "
        f"(label R-{in_ip:.3g} = {in_place:.3g} m2 K/W, spacing {spacing:.3g} in = "
        f"{layer.member.spacing or 0.0:.3g} m)"
    )


def _near(row: TableRow, key: str, value: float | None, tolerance: float) -> bool:
    wanted = row.keys.get(key)
    if wanted is None or wanted == "":
        return True
    return value is not None and abs(float(wanted) - value) <= tolerance


def _decide(wall: Wall, cell: Callable[[FramedLayer, Context], Resistor]) -> Decision:
    """Put one resistance in the place of every steel-framed layer and wire the rest."""
    blocks: list[Block] = []
    replaced = {}
    for index, (layer, block) in enumerate(zip(wall.layers, wall.blocks, strict=True)):
        if block.pattern and isinstance(layer, FramedLayer) and is_metal(layer):
            context = Context(block.symbol, wall.setting, wall.conventions)
            blocks.append(homogeneous(cell(layer, context), layer.thickness))
            replaced[index] = "steel framing counted by the rule set's coefficient"
        else:
            blocks.append(block)
    counted = wall._replace(blocks=tuple(blocks))
    hollow = any(isinstance(layer, MasonryLayer) for layer in wall.layers)
    decision = decided(counted, isothermal_planes(counted) if hollow else parallel_paths(counted))
    if replaced:
        return decision._replace(replaced=replaced)
    way = "isothermal planes (masonry)" if hollow else "parallel paths"
    note = f"no steel framing found in this assembly: layers wired as {way}"
    return decision._replace(assumptions=(note,))


METHODS = (
    Method(
        name="cavity_factor",
        title="Steel framing by cavity correction factors",
        formula="R = Fc R_label in the place of the framed layer",
        source="correction-factor form of ANSI/ASHRAE/IES 90.1 Normative Appendix A; the factors "
        "are the rule set's",
        valid="labels, depths and spacings that the rule set's table prints; no extrapolation",
        decides=decide_cavity_factor,
    ),
    Method(
        name="effective_layer",
        title="Steel framing by the effective resistance of the framed layer",
        formula="R = R_effective in the place of the framed layer",
        source="effective-layer form of ANSI/ASHRAE/IES 90.1 Normative Appendix A; the values "
        "are the rule set's",
        valid="labels, depths and spacings that the rule set's table prints; no extrapolation",
        decides=decide_effective_layer,
    ),
)
