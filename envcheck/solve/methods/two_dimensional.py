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
        formula="U(parallel paths) <= U <= U(isothermal planes)",
        source="ISO 10211:2017 defines the model; the bounds follow from Rayleigh's monotonicity "
        "law for resistor networks",
        valid="rectilinear sections; layers that cross each other are bounded as drawn",
        decides=decide_two_dimensional,
    ),
)
