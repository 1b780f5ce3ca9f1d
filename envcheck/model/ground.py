"""What stands on or in the ground, as read: numbers SI, None where nothing is stated."""

from typing import NamedTuple

from envcheck.model.layers import Layer


class Ground(NamedTuple):
    """What every way of counting the ground by ISO 13370 asks for."""

    perimeter: float | None
    """Exposed, m"""
    area: float | None
    """m2"""
    wall_thickness: float | None
    """Full thickness of the external wall, m."""
    soil_conductivity: float | None
    """W/(m K)"""
    measured: str = ""
    """``outside`` or ``inside`` dimensions of perimeter and area; empty = not stated."""


class Slab(NamedTuple):
    """A slab on the ground."""

    insulation: str
    """``none``, ``vertical``, ``horizontal`` or ``under`` (whole area)."""
    resistance: float
    """Of the edge insulation, m2 K/W."""
    extent: float
    """Depth or width of the edge insulation, m."""
    heated: bool | None
    """None = not stated."""
    top_edge_covered: bool | None
    wall_thickness: float | None
    """Full thickness of the external wall, m (ISO 13370)."""
    soil_conductivity: float | None
    """W/(m K)"""
    perimeter: float | None
    area: float | None
    thickness: float | None = None
    """Of the edge insulation, m (ISO 13370)."""
    measured: str = ""
    """``outside`` or ``inside`` dimensions of perimeter and area."""

    @property
    def ground(self) -> Ground:
        """What ISO 13370 asks of any ground."""
        return Ground(
            self.perimeter, self.area, self.wall_thickness, self.soil_conductivity, self.measured
        )


class Suspended(NamedTuple):
    """The space below a suspended floor; the floor itself is the layers of the assembly."""

    ground: Ground
    height: float | None
    """Of the floor's upper face above the ground outside, m."""
    wall_u: float | None
    """Of the walls of the space, above ground, W/(m2 K)."""
    openings: float | None
    """Ventilation openings by length of the perimeter, m2/m."""
    wind: float | None
    """Mean speed at 10 m, m/s."""
    shielding: str
    """``sheltered``, ``average``, ``exposed``; empty = not stated."""
    ground_resistance: float = 0.0
    """Of insulation on the ground below, m2 K/W."""
    depth: float = 0.0
    """By which the ground below lies under the ground outside, m."""


class Basement(NamedTuple):
    """A basement; the layers of the assembly are its floor, or the floor above an unheated one."""

    ground: Ground
    depth: float | None
    """Of the floor below the ground outside, m."""
    walls: tuple[Layer, ...]
    """Against the ground, from outside to inside."""
    floor: tuple[Layer, ...] = ()
    """Of an unheated basement; none = bare ground."""
    height: float | None = None
    """Of the floor above an unheated basement over the ground outside, m."""
    wall_u: float | None = None
    """Of the walls of an unheated basement above ground, W/(m2 K)."""
    volume: float | None = None
    """Of its air, m3; None = area by height and depth."""
    air_changes: float | None = None
    """1/s; None = as the standard says."""

    @property
    def others(self) -> tuple[tuple[str, tuple[Layer, ...]], ...]:
        """Its stacks of layers beside those of the assembly, with what they are."""
        stacks = (("wall of the basement", self.walls), ("floor of the basement", self.floor))
        return tuple((name, layers) for name, layers in stacks if layers)
