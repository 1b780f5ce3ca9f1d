"""The narrow bracket: the drawn section solved in two dimensions, where somebody asks for it."""

from __future__ import annotations

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting, Solved, Step
from envcheck.solve.assembly import draw

TOLERANCE = 1e-3
"""Gap of the bounds, as a share of the value, that is asked for first ..."""
CLOSE = 1e-4
"""... and where a deciding bracket still holds the limit."""

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
    """Solve the drawn section in two dimensions and put its bounds in place of the wide ones.

    Corrections (points, lines, fasteners) stay added. A section that cannot be drawn or solved
    keeps its wide bracket and says why. Loads numpy and scipy.
    """
    from envcheck.solve.field.bound import bound
    from envcheck.solve.field.drawing import NotDrawn, section_of
    from envcheck.solve.field.networks import SolveError
    from envcheck.solve.field.reasons import section_reasons
    from envcheck.solve.field.section import ModelError

    assert solved.low is not None and solved.high is not None, "see can_narrow"
    try:
        wall = draw(assembly, setting, conventions)[0]
        section = section_of(wall)
        found = bound(section, tolerance)
    except (NotDrawn, ModelError, SolveError) as why:
        note = solved.bracket_note.partition("; not solved")[0]
        return solved._replace(bracket_note=f"{note}; not solved in two dimensions: {why}")
    low = max(solved.low, found.low + solved.added - solved.unsure)
    high = min(solved.high, found.high + solved.added)
    note = (
        f"the drawn section in two dimensions: {found.rounds} rounds, {found.nodes} nodes, "
        f"bounds {found.gap * 100:.2g} % apart"
    )
    if found.stopped_by != "tolerance":
        note += f", stopped by its most {found.stopped_by}"
    by_bracket = solved.decided_by_bracket and solved.value is not None
    if by_bracket:
        bound_step = Step("U_high", "upper bound of the drawn section in two dimensions", "", (),
                          high, "u_factor", note)  # fmt: skip
        solved = solved._replace(
            steps=_ending_in(bound_step, solved.steps),
            hand_check=_ending_in(bound_step, solved.hand_check),
        )
    return solved._replace(
        low=low,
        high=high,
        bracket_note=note,
        value=high if by_bracket else solved.value,
        clear=high - solved.added if by_bracket else solved.clear,
        drawn=section_reasons(wall, section, found),
    )


def _ending_in(step: Step, steps: tuple[Step, ...]) -> tuple[Step, ...]:
    """Steps with this one last, and none of its name before it: a closer bound replaces one."""
    kept = (one for one in steps if one.symbol != step.symbol)
    return (*(one._replace(title=PLANES) if one.symbol == "U" else one for one in kept), step)
