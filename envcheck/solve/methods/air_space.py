"""Air spaces across the whole area: the ISO 6946 formula, or a table of plane air spaces.

Assumptions: the space is closed, its faces are parallel and of one emittance each, and the
difference of temperature across it is small (ISO 6946: at most 5 K).
"""

from __future__ import annotations

from collections.abc import Sequence
from math import isclose

from envcheck.model.project import AirSpaceLayer
from envcheck.model.ruleset import TableRow
from envcheck.model.solved import Block, Operand, Resistor, Step
from envcheck.solve.cells import homogeneous
from envcheck.solve.elementary import larger
from envcheck.solve.registry import Context, Method, NotDecided

STEFAN_BOLTZMANN = 5.67e-8
"""W/(m2 K4), as ISO 6946 prints it."""
KELVIN = 273.15
MEAN_TEMPERATURE = 10.0
"""degC, the mean temperature of the spaces in ISO 6946's table and of the usual handbook rows."""
THICKEST = 0.3
"""m; ISO 6946:2017, 6.9.1: the formula holds up to 300 mm in the direction of heat flow."""
STILL_AIR = 0.025
"""W/(m K): conductivity of still air in ISO 6946's 0.025/d."""
CONVECTION = {"up": 1.95, "horizontal": 1.25}
"""W/(m2 K), least coefficient of thick spaces; downwards it is 0.12 d^-0.44."""
SLIGHTLY = "slightly ventilated: half of the unventilated value"
SOURCE_SLIGHTLY = "ISO 6946:1996, 5.3.2 (later editions interpolate by the area of the openings)"
TABLE = "air_spaces"


def effective_emittance(emittance_1: float, emittance_2: float) -> float:
    """Emittance of two parallel faces together: E = 1/(1/e1 + 1/e2 - 1).

    emittance_1, emittance_2: of the faces, above 0, at most 1, any shape. Dimensionless.
    Source: ISO 6946:2017, annex D; exact for infinite parallel grey planes.
    """
    return 1.0 / (1.0 / emittance_1 + 1.0 / emittance_2 - 1.0)


def radiative_coefficient(temperature_c: float) -> float:
    """Coefficient of black-body radiation: hr0 = 4 sigma Tm^3.

    temperature_c: mean temperature, degC, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex C; 5.1 W/(m2 K) at 10 degC.
    """
    return 4.0 * STEFAN_BOLTZMANN * (temperature_c + KELVIN) ** 3


def convective_coefficient(thickness: float, direction: str) -> float:
    """Conduction and convection across a closed air space.

    ha = max(1.95, 0.025/d) up, max(1.25, 0.025/d) horizontal, max(0.12 d^-0.44, 0.025/d) down.
    thickness: d, m, above 0 up to 0.3, any shape. direction: of the heat flow. Returns W/(m2 K).
    Source: ISO 6946:2017, annex D (2007: annex B), difference of temperature up to 5 K.
    """
    least = 0.12 * thickness**-0.44 if direction == "down" else CONVECTION[direction]
    return larger(least, STILL_AIR / thickness)


def air_space_iso6946(
    thickness: float,
    direction: str,
    emittance_1: float,
    emittance_2: float,
    mean_temperature_c: float = MEAN_TEMPERATURE,
) -> float:
    """Resistance of an unventilated air space: R = 1/(ha + E hr0).

    thickness: d, m, above 0 up to 0.3. direction: ``up``, ``horizontal`` or ``down``.
    emittance_1, emittance_2: of the faces. mean_temperature_c: degC. Any shape. Returns m2 K/W.
    Source: ISO 6946:2017, annex D.
    """
    emittance = effective_emittance(emittance_1, emittance_2)
    radiation = emittance * radiative_coefficient(mean_temperature_c)
    return 1.0 / (convective_coefficient(thickness, direction) + radiation)


def air_space_table(
    rows: Sequence[TableRow],
    thickness: float,
    direction: str,
    emittance: float,
    mean_temperature_c: float = MEAN_TEMPERATURE,
) -> float:
    """Resistance of a plane air space from a table, m2 K/W.

    rows: with keys ``thickness`` (m), ``direction``, ``emittance`` (effective) and
    ``mean_temperature`` (degC). thickness: m. emittance: effective. Interpolated linearly in
    thickness and emittance; nothing is extrapolated and no other mean temperature is used.
    Errors: NotDecided where the table does not reach.
    Source: ASHRAE Handbook - Fundamentals, table of plane air spaces (which allows linear
    interpolation), or the rule set's own table.
    """
    return _table_steps("R", rows, thickness, direction, emittance, mean_temperature_c)[-1].value


def draw_air_space(layer: AirSpaceLayer, context: Context) -> Block:
    """Draw an unventilated or slightly ventilated space; well-ventilated ones are left out before.

    Errors: NotDecided outside the range of the formula or the table.
    """
    return homogeneous(air_space_cell(context.symbol, layer, context), layer.thickness)


def air_space_cell(symbol: str, layer: AirSpaceLayer, context: Context) -> Resistor:
    """The space as one resistor whose worksheet symbol is ``symbol``."""
    halved = layer.ventilation == "slightly"
    inner = f"{symbol}_closed" if halved else symbol
    direction = context.setting.direction
    if context.conventions.air_spaces == "table":
        emittance = _emittance_step(inner, layer)
        rows = context.conventions.tables.get(TABLE, ())
        found = _table_steps(inner, rows, layer.thickness, direction, emittance.value)
        steps = (emittance, *(step._replace(title=_title(layer, direction)) for step in found))
    else:
        steps = _formula_steps(inner, layer, direction)
    if halved:
        operand = Operand(inner, steps[-1].value, "resistance")
        half = steps[-1].value / 2.0
        title = f"{layer.title}, {SLIGHTLY}"
        expression = f"{{{inner}}} / 2"
        steps += (Step(symbol, title, expression, (operand,), half, "resistance", SOURCE_SLIGHTLY),)
    return Resistor(symbol, layer.title, steps[-1].value, steps)


def _title(layer: AirSpaceLayer, direction: str) -> str:
    return f"{layer.title}, air space, heat flow {direction}"


def _emittance_step(symbol: str, layer: AirSpaceLayer) -> Step:
    outer, inner = layer.emittances
    operands = (Operand("e1", outer, "number"), Operand("e2", inner, "number"))
    value = effective_emittance(outer, inner)
    title = f"{layer.title}, effective emittance"
    return Step(f"{symbol}_E", title, "1 / (1 / {e1} + 1 / {e2} - 1)", operands, value, "number")


def _formula_steps(symbol: str, layer: AirSpaceLayer, direction: str) -> tuple[Step, ...]:
    depth = layer.thickness
    if not 0.0 < depth <= THICKEST:
        raise NotDecided(
            f"a source for the air space {layer.title!r}: ISO 6946 covers thicknesses above 0 "
            f"up to {THICKEST:g} m, this one is {depth:.4g} m"
        )
    emittance = _emittance_step(symbol, layer)
    black = radiative_coefficient(MEAN_TEMPERATURE)
    temperature = Operand("T", MEAN_TEMPERATURE, "temperature")
    names = (f"{symbol}_hr0", f"{symbol}_ha")
    radiation = Step(
        names[0], "radiation of a black body at the mean temperature",
        "4 * 5.67e-8 * ({T} + 273.15) ** 3", (temperature,), black, "u_factor",
        "ISO 6946:2017, annex C", True,
    )  # fmt: skip
    least = "0.12 * {d} ** (-0.44)" if direction == "down" else f"{CONVECTION[direction]:g}"
    convection = convective_coefficient(depth, direction)
    still = Step(
        names[1], f"{layer.title}, conduction and convection", f"max({least}, 0.025 / {{d}})",
        (Operand("d", depth, "length"),), convection, "u_factor",
        "ISO 6946:2017, annex D", True,
    )  # fmt: skip
    value = air_space_iso6946(depth, direction, *layer.emittances)
    operands = (
        Operand(names[1], convection, "u_factor"),
        Operand(emittance.symbol, emittance.value, "number"),
        Operand(names[0], black, "u_factor"),
    )
    expression = f"1 / ({{{names[1]}}} + {{{emittance.symbol}}} * {{{names[0]}}})"
    closing = Step(
        symbol, _title(layer, direction), expression, operands, value, "resistance",
        "ISO 6946:2017, annex D",
    )  # fmt: skip
    return emittance, radiation, still, closing


def _table_steps(
    symbol: str,
    rows: Sequence[TableRow],
    thickness: float,
    direction: str,
    emittance: float,
    mean_temperature_c: float = MEAN_TEMPERATURE,
) -> tuple[Step, ...]:
    grid = _grid(rows, direction, mean_temperature_c)
    low, high = _around("thickness", thickness, sorted(grid), direction)
    if low == high:
        return _across(symbol, grid[low], emittance, direction)
    names = f"{symbol}_thinner", f"{symbol}_thicker"
    before = _across(names[0], grid[low], emittance, direction)
    after = _across(names[1], grid[high], emittance, direction)
    closing = _between(
        symbol,
        "length",
        thickness,
        (low, names[0], before[-1].value),
        (high, names[1], after[-1].value),
    )
    return (*before, *after, closing)


def _grid(
    rows: Sequence[TableRow], direction: str, mean_temperature_c: float
) -> dict[float, dict[float, TableRow]]:
    """Thickness -> effective emittance -> row, of one direction and mean temperature."""
    found: dict[float, dict[float, TableRow]] = {}
    for row in rows:
        keys = row.keys
        if keys["direction"] == direction and isclose(
            float(keys.get("mean_temperature", mean_temperature_c)),
            mean_temperature_c,
            abs_tol=0.1,
        ):
            found.setdefault(float(keys["thickness"]), {})[float(keys["emittance"])] = row
    if not found:
        raise NotDecided(
            f"a table of air spaces for heat flow {direction} at a mean temperature of "
            f"{mean_temperature_c:g} degC"
        )
    return found


def _across(
    symbol: str, by_emittance: dict[float, TableRow], emittance: float, direction: str
) -> tuple[Step, ...]:
    """Steps to the resistance at one printed thickness."""
    low, high = _around("effective emittance", emittance, sorted(by_emittance), direction)
    first, second = by_emittance[low], by_emittance[high]
    if low == high:
        return (Step(symbol, "", "", (), first.value, "resistance", first.source),)
    names = "R_low", "R_high"
    step = _between(
        symbol, "number", emittance, (low, names[0], first.value), (high, names[1], second.value)
    )
    return (step._replace(source=first.source),)


PRINTED = 0.005
"""Share by which a value may miss a printed one: 0.82 stands for two faces of 0.9 (0.818)."""


def _around(
    what: str, value: float, printed: Sequence[float], direction: str
) -> tuple[float, float]:
    """The printed values on both sides of a value, twice the same where it is printed."""
    for number in printed:
        if isclose(number, value, rel_tol=PRINTED):
            return number, number
    if not printed[0] < value < printed[-1]:
        raise NotDecided(
            f"a row of the table of air spaces: {what} {value:.4g} lies outside the printed "
            f"{printed[0]:.4g} to {printed[-1]:.4g} (heat flow {direction}), and nothing is "
            "extrapolated"
        )
    high = next(number for number in printed if number > value)
    return printed[printed.index(high) - 1], high


def _between(
    symbol: str,
    quantity: str,
    x: float,
    low: tuple[float, str, float],
    high: tuple[float, str, float],
) -> Step:
    """A step that interpolates linearly; ends are (x, symbol, resistance)."""
    value = low[2] + (high[2] - low[2]) * (x - low[0]) / (high[0] - low[0])
    operands = (
        Operand(low[1], low[2], "resistance"),
        Operand(high[1], high[2], "resistance"),
        Operand("x", x, quantity),
        Operand("x_low", low[0], quantity),
        Operand("x_high", high[0], quantity),
    )
    expression = (
        f"{{{low[1]}}} + ({{{high[1]}}} - {{{low[1]}}}) * ({{x}} - {{x_low}}) / "
        "({x_high} - {x_low})"
    )
    return Step(symbol, "", expression, operands, value, "resistance")


METHODS = (
    Method(
        name="air_space",
        title="Air space",
        formula="R = 1 / (ha + E hr0), or a table of plane air spaces; half where slightly "
        "ventilated without stated openings (with them: slightly_ventilated)",
        source="ISO 6946:2017, annex D; ASHRAE Handbook - Fundamentals, table of plane air spaces",
        valid="closed spaces up to 0.3 m thick (formula) or within the printed rows (table); "
        "slightly ventilated: up to 0.15 m2 K/W outside of the space (ISO 6946:1996, 5.3.2)",
        draws=(("air-space", draw_air_space),),
    ),
)
