"""Conduction of the drawn section, or box where members cross: the bracket decides."""

from __future__ import annotations

from envcheck.model.project import TaperedLayer
from envcheck.solve.methods.wirings import decide_isothermal_planes
from envcheck.solve.registry import Decision, Method, NotDecided, Wall


def decide_two_dimensional(wall: Wall) -> Decision:
    """Bracket the drawn section; its high end stands for the value in sums and means."""
    for layer in wall.layers:
        if isinstance(layer, TaperedLayer):
            raise NotDecided(f"one thickness for {layer.title!r}: a taper has no drawn section")
    return decide_isothermal_planes(wall)._replace(by_bracket=True)


METHODS = (
    Method(
        name="two_dimensional",
        title="Conduction of the drawn section or box, bounded from both sides",
        formula="div(k grad T) = 0 in the drawn section (two dimensions) or box (three); "
        "U(parallel paths) <= U(cell network) <= U <= U(node network) <= U(isothermal planes)",
        source="ISO 10211:2017 defines the model; the bounds are Dirichlet's and Thomson's "
        "principles for steady conduction, and Rayleigh's law for the two wirings",
        valid="rectilinear sections, 1e-4 to 1e4 W/(m K); members that cross each other at right "
        "angles, and clips of stated size on a repeat area, as boxes; screws and pins by chi",
        decides=decide_two_dimensional,
    ),
)
