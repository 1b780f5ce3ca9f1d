"""Ground by the code's own factors: F of a slab edge is looked up, C of a buried wall summed."""

from __future__ import annotations

from collections.abc import Sequence
from math import isclose

from envcheck.model.project import Assembly, FramedLayer, MasonryLayer, SectionLayer, Slab
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.ground_layers import bare_wall
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.registry import Decision, Method, NotDecided
from envcheck.solve.wiring import isothermal_planes, layer_steps, parallel_paths
from envcheck.units import convert

TABLE = "f_factors"
SAME = 1e-3
"""Relative difference within which two numbers are the same number in other units."""
HEATED = "whether the slab is heated (slab_heated): a heated slab has a factor of its own"
TOP_EDGE = "whether the top edge of the slab's vertical insulation is covered (top_edge_covered)"
UNCOVERED = (
    "the top edge of the slab's insulation is not covered: counted as a slab without insulation"
)
NO_SOIL = "C-factor: layers of the wall only, without films and soil"


def f_factor(
    rows: Sequence[TableRow], position: str, extent: float, resistance: float, heated: bool
) -> TableRow:
    """The row of a table of F-factors; its value is F in W/(m K) of exposed perimeter.

    rows: with keys ``position`` (``none`` for no insulation), ``extent`` (m), ``resistance``
    (m2 K/W) and ``heated`` (``yes`` or ``no``). Never computed, interpolated or extrapolated.
    Errors: NotDecided where no row fits, naming those that come near.
    Source: the rule set's table.
    """
    if not rows:
        raise NotDecided("a table of F-factors in the rule set (conventions: f_factors)")
    word = "yes" if heated else "no"
    near = [r for r in rows if r.keys["heated"] == word and r.keys["position"] == position]
    for row in near:
        if position == "none" or (
            _same(_number(row, "extent"), extent) and _same(_number(row, "resistance"), resistance)
        ):
            return row
    slab = "heated slab" if heated else "unheated slab"
    what = "without insulation" if position == "none" else _words(position, extent, resistance)
    others = "; ".join(_words("", _number(r, "extent"), _number(r, "resistance")) for r in near)
    known = f" (the table has {others})" if others else ""
    raise NotDecided(f"a row of the rule set's F-factors for a {slab} {what}{known}")


def solve_f_factor(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Look up the F-factor of a slab edge, W/(m K).

    Errors: NotDecided where a fact or a row is missing.
    """
    slab = assembly.slab
    if slab is None:
        raise NotDecided("insulation and heating of the slab")
    position, assumptions = _position(slab)
    missing = [HEATED] if slab.heated is None else []
    if position == "vertical" and slab.top_edge_covered is None:
        missing.append(TOP_EDGE)
    if missing:
        raise NotDecided("; ".join(missing))
    rows = conventions.tables.get(TABLE, ())
    row = f_factor(rows, position, slab.extent, slab.resistance, bool(slab.heated))
    title = f"F-factor as printed ({row.text})" if row.text else "F-factor as printed"
    step = Step("F", title, "", (), row.value, "linear_transmittance", row.source)
    return Decision(row.value, steps=(step,), assumptions=assumptions)


def solve_c_factor(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """C-factor of a wall below grade, W/(m2 K): C = 1 / R of its layers, no films, no soil.

    Wired by parallel paths; hollow masonry by isothermal planes.
    Errors: NotDecided for members of metal, which neither wiring can count.
    """
    metal = [x.title for x in assembly.layers if isinstance(x, FramedLayer) and is_metal(x)]
    if metal:
        raise NotDecided(f"a C-factor of the metal-framed layer {metal[0]!r}: test or table")
    wall = bare_wall(assembly, setting, conventions)
    planes = any(isinstance(layer, MasonryLayer | SectionLayer) for layer in assembly.layers)
    wired = isothermal_planes(wall) if planes else parallel_paths(wall)
    if wired.resistance <= 0:
        raise NotDecided("a layer with a resistance")
    value = 1.0 / wired.resistance
    operand = Operand("R", wired.resistance, "resistance")
    closing = Step("C", "C-factor", "1 / {R}", (operand,), value, "u_factor")
    layers = layer_steps(wall)
    steps = (*layers, *wired.steps, closing)
    bridges = any(block.pattern for block in wall.blocks)
    way = "isothermal planes" if planes else "parallel paths"
    wiring = (f"bridged layers of the wall wired by {way}",) if bridges else ()
    return Decision(value, wired.tree, steps, len(layers), assumptions=(NO_SOIL, *wiring))


def _position(slab: Slab) -> tuple[str, tuple[str, ...]]:
    if slab.insulation == "none" or slab.resistance <= 0:
        return "none", ()
    if slab.insulation == "vertical" and slab.top_edge_covered is False:
        return "none", (UNCOVERED,)
    return slab.insulation, ()


def _number(row: TableRow, key: str) -> float:
    return float(row.keys.get(key, 0.0))


def _same(printed: float, value: float) -> bool:
    return isclose(printed, value, rel_tol=SAME, abs_tol=1e-9)


def _words(position: str, extent: float, resistance: float) -> str:
    in_ip = f"R-{convert(resistance, 'h*ft2*degF/Btu'):.4g} for {convert(extent, 'in'):.4g} in"
    in_si = f"{resistance:.3g} m2 K/W for {extent:.3g} m"
    return f"{position} {in_ip} = {in_si}".strip()


METHODS = (
    Method(
        name="f_factor",
        title="F-factor of a slab edge, looked up",
        formula="F as printed for position, extent, resistance and heating",
        source="the rule set's table (of the form of ANSI/ASHRAE/IES 90.1 Appendix A, A6)",
        valid="the printed rows only; per length of exposed perimeter",
        solves=(("slab-on-grade", solve_f_factor),),
        metric="F_factor",
    ),
    Method(
        name="c_factor",
        title="C-factor of a wall below grade",
        formula="C = 1 / (sum of the layers' resistances)",
        source="definition in ANSI/ASHRAE/IES 90.1, 3.2 and Normative Appendix A, A4",
        valid="walls below grade; layers without films and soil; no metal members",
        solves=(("below-grade-wall", solve_c_factor),),
        metric="C_factor",
    ),
)
