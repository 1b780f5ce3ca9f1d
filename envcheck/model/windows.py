"""Windows, doors and curtain walls by their parts, and the glazing itself; all numbers SI."""

from typing import NamedTuple

from envcheck.model.layers import Layer


class Gas(NamedTuple):
    """Properties of a gas, or of a mixture, at 10 degC."""

    density: float
    """kg/m3"""
    viscosity: float
    """Pa s"""
    conductivity: float
    """W/(m K)"""
    specific_heat: float
    """J/(kg K)"""


class Space(NamedTuple):
    """A vertical gas space between two panes, or between two windows."""

    thickness: float
    """m"""
    gas: Gas
    air: Gas
    """What fills the rest."""
    share: float
    """Of the gas, 0..1."""
    emissivities: tuple[float, float]
    """Corrected, of the faces towards outside and inside."""
    title: str
    """The fill in words: ``90 % argon``."""
    source: str


class Glazing(NamedTuple):
    """Panes with the spaces between them, outside first."""

    panes: tuple[float, ...]
    """Thicknesses, m."""
    spaces: tuple[Space, ...]
    """One fewer than panes."""


class Between(NamedTuple):
    """What lies between two glazings or two windows: a space, or a stated resistance."""

    space: Space | None
    resistance: float | None
    """m2 K/W"""
    source: str


class Infill(NamedTuple):
    """What fills a light: exactly one of a stated U-factor, a glazing, or layers of a panel."""

    u: float | None = None
    """W/(m2 K)"""
    glazing: Glazing | None = None
    layers: tuple[Layer, ...] = ()


class Light(NamedTuple):
    """A piece of glass or an opaque panel within a frame."""

    title: str
    line: int
    opaque: bool
    width: float | None
    """m; None where the area is stated."""
    height: float | None
    area: float
    """Of one, m2."""
    edge: float
    """Visible perimeter of one, m."""
    count: int  # type: ignore[assignment]  # hides tuple.count, which nobody calls
    psi: float
    """Of the edge, W/(m K)."""
    infill: Infill
    second: Infill | None = None
    """A second glazing behind it in the same frame (coupled sashes)."""
    between: Between | None = None


class FramePart(NamedTuple):
    """A frame, mullion or transom with its own U-factor."""

    title: str
    area: float | None
    """m2; None for all that the other parts leave."""
    u: float
    """W/(m2 K)"""


class Joint(NamedTuple):
    """A line beside the edges of the lights: glazing bars, a joint of mullion and frame."""

    title: str
    length: float
    """m"""
    psi: float
    """W/(m K)"""


class Window(NamedTuple):
    """A whole window, door or curtain wall module by its parts."""

    width: float
    """Overall, m."""
    height: float
    frame_width: float | None
    """Visible width all round a single light, m; None where lights state their own size."""
    lights: tuple[Light, ...]
    frames: tuple[FramePart, ...]
    joints: tuple[Joint, ...] = ()
    sources: tuple[str, ...] = ()
    inner: "Window | None" = None
    """A second window of the same size behind this one."""
    between: Between | None = None

    @property
    def opaque(self) -> bool:
        """Whether no light lets light through."""
        return all(light.opaque for light in self.lights)

    @property
    def u_glass(self) -> float | None:
        """Stated U-factor of the glass, W/(m2 K); None where none or several are stated."""
        found = {
            None if light.second else light.infill.u for light in self.lights if not light.opaque
        }
        return next(iter(found)) if len(found) == 1 and self.inner is None else None

    @property
    def opaque_area(self) -> float:
        """Area of its opaque panels, m2."""
        return sum(light.count * light.area for light in self.lights if light.opaque)
