"""U-factors of what fills a window's frame: glass, glazing, panels, and two of them in series."""

from __future__ import annotations

from envcheck.model.solved import Operand, Step
from envcheck.model.windows import Between, Infill, Light
from envcheck.solve.methods.en673_glazing import glazing_steps, spaces_steps
from envcheck.solve.registry import Context, NotDecided, drawers

R_INSIDE, R_OUTSIDE = 0.13, 0.04
"""m2 K/W, vertical windows and panels (ISO 10077-1:2017, surface resistances)."""
THICKEST, PRINTED = 0.3, 0.05
"""m: air space of ISO 6946, and thickest space in the table of ISO 10077-1:2006, annex C."""
TIGHT = (
    "two windows in series: holds where neither has gaps wider than 3 mm to the room or to "
    "outdoors (ISO 10077-1)"
)
WIDE = "air space between two windows wider than the printed range up to 50 mm: formula continued"


def in_series(u_outer: float, u_inner: float, between: float) -> float:
    """U of two windows or two glazings in series: 1 / (1/U1 - Rsi + Rs - Rse + 1/U2).

    u_outer, u_inner: W/(m2 K), each with both films. between: Rs, m2 K/W. Any shape. Returns
    W/(m2 K). Source: ISO 10077-1:2017, equations for double and coupled windows.
    """
    return 1.0 / (1.0 / u_outer - R_INSIDE + between - R_OUTSIDE + 1.0 / u_inner)


def light_u(
    light: Light, context: Context, mark: str
) -> tuple[Operand, tuple[Step, ...], tuple[str, ...]]:
    """U-factor of a light, ``U_`` and its mark, with the steps that lead to it."""
    if light.second is None or light.between is None:
        value, steps = _infill_u(light.infill, context, mark, f"U_{mark}")
        return value, steps, ()
    outer, first = _infill_u(light.infill, context, mark + "o", f"U_{mark}o")
    inner, second = _infill_u(light.second, context, mark + "i", f"U_{mark}i")
    space, said = between_steps(light.between, mark)
    resistance = Operand(space[-1].symbol, space[-1].value, "resistance")
    title = f"both glazings of {light.title} in series"
    closing = series_step(f"U_{mark}", title, outer, inner, resistance)
    value = Operand(closing.symbol, closing.value, "u_factor")
    return value, (*first, *second, *space, closing), said


def _infill_u(
    infill: Infill, context: Context, mark: str, symbol: str
) -> tuple[Operand, tuple[Step, ...]]:
    if infill.glazing is not None:
        steps = glazing_steps(infill.glazing, mark.removeprefix("g"), context.setting)
        found = steps[-1]._replace(symbol=symbol)
        return Operand(symbol, found.value, "u_factor"), (*steps[:-1], found)
    if infill.layers:
        return _panel_u(infill, context, mark, symbol)
    assert infill.u is not None, "told by the reader"
    return Operand(symbol, infill.u, "u_factor"), ()


def _panel_u(
    infill: Infill, context: Context, mark: str, symbol: str
) -> tuple[Operand, tuple[Step, ...]]:
    """An opaque panel of plane layers in series, with the films of the standard."""
    cells = []
    for number, layer in enumerate(infill.layers, 1):
        block = drawers()[layer.kind](layer, context._replace(symbol=f"R_{mark}_{number}"))
        if len(block.cells) != 1 or len(block.cells[0]) != 1:
            raise NotDecided(f"a U-factor of the panel: its layer {layer.title!r} is no plane one")
        cells.append(block.cells[0][0])
    total = R_OUTSIDE + sum(cell.value for cell in cells) + R_INSIDE
    middle = " + ".join(f"{{{cell.symbol}}}" for cell in cells)
    step = Step(
        symbol,
        "U-factor of the panel",
        f"1 / ({R_OUTSIDE:g} + {middle} + {R_INSIDE:g})",
        tuple(Operand(cell.symbol, cell.value, "resistance") for cell in cells),
        1.0 / total,
        "u_factor",
        "ISO 6946:2017, 6.7.1 with the films of ISO 10077-1",
        si_only=True,
    )
    steps = (*(step for cell in cells for step in cell.steps), step)
    return Operand(symbol, step.value, "u_factor"), steps


def between_steps(between: Between, mark: str) -> tuple[tuple[Step, ...], tuple[str, ...]]:
    """Resistance between two windows or glazings, and what is assumed of it.

    Errors: NotDecided for a space that is no air space in the sense of ISO 6946.
    """
    if between.space is None:
        assert between.resistance is not None, "told by the reader"
        stated = between.resistance
        title = "resistance between both, as stated"
        step = Step(f"Rs{mark}", title, "", (), stated, "resistance", between.source)
        return (step,), (TIGHT,)
    if between.space.thickness > THICKEST:
        raise NotDecided(
            "the resistance between both windows: a space of more than 300 mm is no air space "
            "in the sense of ISO 6946"
        )
    *steps, last = spaces_steps((between.space,), mark)
    wide = (WIDE,) if between.space.thickness > PRINTED else ()
    return (*steps, last._replace(source="ISO 10077-1:2006, annex C (EN 673)")), (TIGHT, *wide)


def series_step(symbol: str, title: str, outer: Operand, inner: Operand, between: Operand) -> Step:
    """The step that puts two windows or glazings in series."""
    names = f"1 / {{{outer.name}}}", f"{{{between.name}}}", f"1 / {{{inner.name}}}"
    return Step(
        symbol,
        title,
        f"1 / ({names[0]} - {R_INSIDE:g} + {names[1]} - {R_OUTSIDE:g} + {names[2]})",
        (outer, between, inner),
        in_series(outer.value, inner.value, between.value),
        "u_factor",
        "ISO 10077-1:2017, double and coupled windows",
        si_only=True,
    )
