"""Twelve months of condensation and drying at the faces of an assembly, and their worksheet."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck.model.moisture import DAYS, MONTHS, Flow, Month, Plane, Year
from envcheck.model.solved import Operand, Step
from envcheck.model.vapour import OVER_ICE, OVER_WATER, TRIPLE, saturation_pressure
from envcheck.solve.methods.iso13788_condensation import (
    DAY,
    PERMEABILITY,
    SOURCE,
    Change,
    Point,
    starts,
    year_from,
)
from envcheck.solve.vapour_layers import Face, points_of


def year_of(faces: Sequence[Face], total: float, months: Sequence[Month]) -> Year:
    """Twelve months from the start that collects most. All as :func:`points_of`."""
    if faces[-1].diffusion <= 0.0:
        return Year(0, (), ())
    drawn = [points_of(faces, total, month) for month in months]
    lines = [points for points, _ in drawn]
    made = [_counted(start, faces, drawn, year_from(start, lines, DAYS)) for start in starts(lines)]
    if not made:
        return Year(0, (), ())
    return max(made, key=lambda year: sum(plane.greatest for plane in year.planes))


def _counted(
    start: int,
    faces: Sequence[Face],
    drawn: Sequence[tuple[Sequence[Point], Sequence[int]]],
    year: Sequence[tuple[int, list[Change]]],
) -> Year:
    wet = sorted({change.face for _, changes in year for change in changes})
    symbols = {face: f"C{number}" for number, face in enumerate(wet, 1)}
    names = drawn[0][1]
    amounts = {face: [0.0] * len(MONTHS) for face in wet}
    held = dict.fromkeys(wet, 0.0)
    flows = []
    for month, changes in year:
        for one in changes:
            held[one.face] = one.after
            title = faces[names[one.face]].title
            flows.append(
                Flow(
                    month, one.part, one.days, title, symbols[one.face], one.outer, one.at,
                    one.inner, one.change, one.after,
                )
            )  # fmt: skip
        for face in wet:
            amounts[face][month] = held[face]
    planes = []
    for face in wet:
        series = amounts[face]
        month = max(range(len(series)), key=lambda n: series[n])
        title = faces[names[face]].title
        planes.append(Plane(title, tuple(series), series[month], month, held[face]))
    return Year(start, tuple(planes), tuple(flows))


def flow_steps(
    year: Year, faces: Sequence[Face], total: float, months: Sequence[Month]
) -> Iterable[Step]:
    """What each wet face gains or loses, month by month; temperature and pressure there first."""
    resistances = {face.title: face.resistance for face in faces}
    for flow in year.flows:
        month = MONTHS[flow.month]
        name, title = f"{flow.symbol}_{month}", f"{flow.plane}, {month}"
        if flow.part == 1:
            yield from _at_face(name, title, resistances[flow.plane], total, months[flow.month])
        else:
            name, title = f"{name}_{flow.part}", f"{title}, part {flow.part}"
        yield _flow_step(name, title, flow)


def _at_face(
    name: str, title: str, resistance: float, total: float, month: Month
) -> Iterable[Step]:
    warm, cold = month.indoor_temperature, month.outdoor_temperature
    here = cold + (warm - cold) * resistance / total
    operands = (
        Operand("T_e", cold, "temperature"),
        Operand("T_i", warm, "temperature"),
        Operand("R_f", resistance, "resistance"),
        Operand("R_T", total, "resistance"),
    )
    yield Step(
        f"T_{name}", f"temperature, {title}", "{T_e} + ({T_i} - {T_e}) * {R_f} / {R_T}",
        operands, here, "temperature",
    )  # fmt: skip
    yield saturation_step(f"p_{name}", f"saturation, {title}", f"T_{name}", here)


def _flow_step(name: str, title: str, flow: Flow) -> Step:
    operands = (
        Operand("days", flow.days, "number"),
        Operand("p_in", flow.inner[1], "vapour_pressure"),
        Operand("p", flow.at[1], "vapour_pressure"),
        Operand("p_out", flow.outer[1], "vapour_pressure"),
        Operand("s_in", flow.inner[0], "length"),
        Operand("s", flow.at[0], "length"),
        Operand("s_out", flow.outer[0], "length"),
    )
    expression = (
        f"{PERMEABILITY * DAY:.3e} * {{days}} * (({{p_in}} - {{p}}) / ({{s_in}} - {{s}}) - "
        "({p} - {p_out}) / ({s} - {s_out}))"
    )
    return Step(name, title, expression, operands, flow.change, "area_weight", SOURCE, True)


def saturation_step(symbol: str, title: str, name: str, temperature: float) -> Step:
    """The step from a temperature of that name, degC, to its saturation pressure."""
    factor, offset = OVER_WATER if temperature >= 0.0 else OVER_ICE
    return Step(
        symbol, title, f"{TRIPLE} * exp({factor} * {{{name}}} / ({offset} + {{{name}}}))",
        (Operand(name, temperature, "temperature"),), saturation_pressure(temperature),
        "vapour_pressure", "ISO 13788:2012, annex E", True,
    )  # fmt: skip
