"""Curtain walls by the area weighting of their components (ISO 12631)."""

from __future__ import annotations

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting
from envcheck.solve.methods.iso10077_window import solve_parts
from envcheck.solve.registry import Context, Decision, Method, NotDecided

SOURCE = "ISO 12631:2017, component assessment method"


def solve_curtain_wall(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Solve a module of a curtain wall between its axes of symmetry, as a window of many parts.

    Errors: NotDecided where parts are missing or lie outside the range of their standard.
    """
    if assembly.window is None:
        raise NotDecided("size, glass, panels, frames and joints of the curtain wall module")
    decision = solve_parts(assembly.window, Context("R", setting, conventions), SOURCE)
    *steps, last = decision.steps
    title = "U-factor of the curtain wall module"
    return decision._replace(steps=(*steps, last._replace(title=title)))


METHODS = (
    Method(
        name="iso12631_curtain_wall",
        title="Curtain wall by area weighting of its components",
        formula="U = (sum of Ag Ug + Ap Up + Af Uf + Am Um + At Ut + l psi) / (sum of areas)",
        source=SOURCE,
        valid="a module between axes of symmetry; U of glass, panels, frames, mullions and "
        "transoms, and psi of every joint between them; vertical",
        solves=(("curtain-wall", solve_curtain_wall),),
        metric="U_product",
    ),
)
