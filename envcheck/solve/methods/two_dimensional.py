"""Two-dimensional conduction of the drawn section: the bracket decides."""

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
        title="Two-dimensional conduction of the drawn section, bounded from both sides",
        formula="div(k grad T) = 0 in the drawn section; U(parallel paths) <= U(cell network) <= U "
        "<= U(node network) <= U(isothermal planes)",
        source="ISO 10211:2017 defines the model; the bounds are Dirichlet's and Thomson's "
        "principles for steady conduction, and Rayleigh's law for the two wirings",
        valid="rectilinear sections, 1e-4 to 1e4 W/(m K); layers that cross each other keep the "
        "bounds of the two wirings",
        decides=decide_two_dimensional,
    ),
)
