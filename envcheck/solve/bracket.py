"""The narrow bracket: the drawn section or box solved, where somebody asks for it."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.model.layers import DrawnPoint
from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Reasons, Setting, Solved, Step
from envcheck.solve import wiring
from envcheck.solve.assembly import draw, drawn_points
from envcheck.solve.registry import Wall

TOLERANCE = 1e-3
"""Gap of the bounds, as a share of the value, that is asked for first ..."""
CLOSE = 1e-4
"""... and where a deciding bracket still holds the limit."""
BOX_TOLERANCE = 1e-2
"""The same for a box in three dimensions ..."""
BOX_CLOSE = 2.5e-3
"""... which takes half a minute of work."""

PLANES = "U-factor by isothermal planes: the widest upper bound"


def can_narrow(solved: Solved, tolerance: float) -> bool:
    """Whether there is a bracket of drawn pieces that is wider than the tolerance."""
    return (
        solved.low is not None
        and solved.high is not None
        and solved.high > (solved.low + solved.unsure) * (1.0 + tolerance)
    )


def narrow(
    assembly: Assembly,
    setting: Setting,
    conventions: Conventions,
    solved: Solved,
    tolerance: float = TOLERANCE,
) -> Solved:
    """Solve the drawn section or box and put its bounds in place of the wide ones.

    Members that cross and drawn points make a box, everything else is a section. Corrections
    (points, lines, fasteners) stay added. What cannot be drawn or solved keeps its wide bracket
    and says why. Loads numpy and scipy.
    """
    from envcheck.solve.field.box_drawing import crosses
    from envcheck.solve.field.drawing import NotDrawn
    from envcheck.solve.field.networks import SolveError
    from envcheck.solve.field.section import ModelError

    assert solved.low is not None and solved.high is not None, "see can_narrow"
    wall, points = draw(assembly, setting, conventions)[0], drawn_points(assembly)
    box = crosses(wall) or bool(points)
    dimensions = "three" if box else "two"
    if box and not can_narrow(solved, _box_tolerance(tolerance)):
        return solved
    try:
        found = _box(wall, points, tolerance) if box else _section(wall, tolerance)
    except (NotDrawn, ModelError, SolveError) as why:
        note = solved.bracket_note.partition("; not solved")[0]
        return solved._replace(bracket_note=f"{note}; not solved in {dimensions} dimensions: {why}")
    low = max(solved.low, found.low + solved.added - solved.unsure)
    high = min(solved.high, found.high + solved.added)
    by_bracket = solved.decided_by_bracket and solved.value is not None
    if by_bracket:
        bound_step = Step("U_high", f"upper bound of {found.of}", "", (), high, "u_factor",
                          found.note)  # fmt: skip
        solved = solved._replace(
            steps=_ending_in(bound_step, solved.steps),
            hand_check=_ending_in(bound_step, solved.hand_check),
        )
    return solved._replace(
        low=low,
        high=high,
        bracket_note=found.note,
        value=high if by_bracket else solved.value,
        clear=high - solved.added if by_bracket else solved.clear,
        drawn=found.reasons,
        steps=_before_last(found.steps, solved.steps),
    )


class _Found(NamedTuple):
    """Bounds of a section or a box, and what is said of them."""

    low: float
    """W/(m2 K)"""
    high: float
    of: str
    note: str
    reasons: Reasons | None = None
    steps: tuple[Step, ...] = ()


def _section(wall: Wall, tolerance: float) -> _Found:
    from envcheck.solve.field.bound import bound
    from envcheck.solve.field.drawing import section_of
    from envcheck.solve.field.reasons import section_reasons

    section = section_of(wall)
    found = bound(section, tolerance)
    of = "the drawn section in two dimensions"
    note = _note(of, found.rounds, found.nodes, found.gap, found.stopped_by)
    return _Found(found.low, found.high, of, note, section_reasons(wall, section, found))


def _box(wall: Wall, points: Sequence[DrawnPoint], tolerance: float) -> _Found:
    from envcheck.solve.field.box_bound import bound_box
    from envcheck.solve.field.box_drawing import box_of

    box = box_of(wall, points)
    found = bound_box(box, _box_tolerance(tolerance))
    of = "the drawn box in three dimensions"
    note = _note(of, found.rounds, found.nodes, found.gap, found.stopped_by)
    steps = _chi(wall, box.area, found.low, found.high, tolerance) if points else ()
    return _Found(found.low, found.high, of, note, steps=steps)


def _chi(wall: Wall, area: float, low: float, high: float, tolerance: float) -> tuple[Step, Step]:
    """Both bounds of what one drawn point adds: chi = (U with it - U without it) A.

    Source: ISO 10211:2017, 3D coupling coefficient less what the plane parts conduct.
    """
    from envcheck.solve.field.box_drawing import crosses

    if crosses(wall):
        plain = _box(wall, (), tolerance)
    elif any(block.pattern for block in wall.blocks):
        plain = _section(wall, tolerance)
    else:
        same = wiring.bounds(wall)[0]
        plain = _Found(same, same, "", "")
    ends = []
    for name, title, box, rest in (
        ("chi_low", "least that one drawn point adds", low, plain.high),
        ("chi_high", "most that one drawn point adds", high, plain.low),
    ):
        operands = (
            Operand("U_with", box, "u_factor"),
            Operand("U_without", rest, "u_factor"),
            Operand("A", area, "area"),
        )
        value = (box - rest) * area
        expression = "({U_with} - {U_without}) * {A}"
        source = "bounds of the box with and without it (ISO 10211:2017)"
        ends.append(Step(name, title, expression, operands, value, "point_transmittance", source))
    return ends[0], ends[1]


def _box_tolerance(tolerance: float) -> float:
    return BOX_TOLERANCE if tolerance >= TOLERANCE else BOX_CLOSE


def _note(of: str, rounds: int, nodes: int, gap: float, stopped_by: str) -> str:
    note = f"{of}: {rounds} rounds, {nodes} nodes, bounds {gap * 100:.2g} % apart"
    return note if stopped_by == "tolerance" else f"{note}, stopped by its most {stopped_by}"


def _before_last(added: tuple[Step, ...], steps: tuple[Step, ...]) -> tuple[Step, ...]:
    """Steps that lead to nothing, in front of the result; they replace those of their names."""
    names = {step.symbol for step in added}
    kept = [step for step in steps if step.symbol not in names]
    return (*kept[:-1], *added, *kept[-1:])


def _ending_in(step: Step, steps: tuple[Step, ...]) -> tuple[Step, ...]:
    """Steps with this one last, and none of its name before it: a closer bound replaces one."""
    kept = (one for one in steps if one.symbol != step.symbol)
    return (*(one._replace(title=PLANES) if one.symbol == "U" else one for one in kept), step)
